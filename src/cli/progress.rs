//! A sign of life for work that takes longer than a second; only where a person watches the terminal.

use std::io::{IsTerminal, stderr};
use std::sync::mpsc::{RecvTimeoutError, channel};
use std::thread;
use std::time::Duration;

use indicatif::{ProgressBar, ProgressStyle};

/// Below this nobody needs to be told.
const SOON: Duration = Duration::from_secs(1);

/// Does the work; while it takes longer than a second, standard error shows what is being done. Silent in pipes.
pub fn watched<T>(what: &str, work: impl FnOnce() -> T) -> T {
    if !stderr().is_terminal() {
        return work();
    }
    let (done, waiting) = channel::<()>();
    let what = what.to_owned();
    let watcher = thread::spawn(move || {
        if waiting.recv_timeout(SOON) == Err(RecvTimeoutError::Timeout) {
            let bar = ProgressBar::new_spinner().with_message(what);
            if let Ok(style) = ProgressStyle::with_template("{spinner} {msg} ({elapsed})") {
                bar.set_style(style);
            }
            bar.enable_steady_tick(Duration::from_millis(120));
            // Nothing is ever sent: this returns when the work is over and the sender is gone.
            let _ = waiting.recv();
            bar.finish_and_clear();
        }
    });
    let result = work();
    drop(done);
    // A watcher that failed has nothing to say about the work.
    let _ = watcher.join();
    result
}
