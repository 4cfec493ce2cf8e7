//! How long and how much memory a review takes, as ratios within one run: these machines are noisy.
//!
//! `cargo bench` measures buildings of 100 and 1 000 joints; `cargo bench -- 10000` also that many (some 260 MB of ifcXML
//! in the folder for temporary files). Times are the least of several runs; memory is the peak of the built program.

#[path = "../writer/mod.rs"]
#[allow(dead_code)]
mod writer;

use std::fs;
use std::hint::black_box;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::time::{Duration, Instant};

use comfy_table::Table;
use faying::rulebook::Rulebook;
use faying::run::{Inputs, run};
use faying::{exchange, joints, shop};
use quick_xml::Reader;
use quick_xml::events::Event;
use writer::frames::frames;
use writer::ifcxml::Style;

fn main() {
    let asked: Vec<usize> = std::env::args().skip(1).filter_map(|a| a.parse().ok()).collect();
    let sizes = if asked.is_empty() { vec![100, 1000] } else { asked };
    let folder = tempfile::tempdir().expect("a folder for temporary files");
    let mut table = Table::new();
    table.set_header([
        "joints",
        "file MB",
        "review / bare event loop",
        "read",
        "take up",
        "recognise",
        "rest",
        "µs a joint",
        "peak memory / file",
    ]);
    for joints in sizes {
        let path = model(folder.path(), joints);
        let bytes = fs::read(&path).expect("the model that was just written");
        table.add_row(measure(joints, &path, &bytes));
    }
    println!("{table}");
}

fn model(folder: &Path, joints: usize) -> PathBuf {
    let path = folder.join(format!("{joints}.ifcxml"));
    let file = std::io::BufWriter::new(fs::File::create(&path).expect("a new file"));
    writer::write_ifcxml(&frames(joints, false), Style::default(), file).expect("room for the model");
    path
}

/// The least time of a few runs.
fn least(mut work: impl FnMut()) -> Duration {
    let runs = if cfg!(debug_assertions) { 1 } else { 5 };
    let mut best = Duration::MAX;
    let begun = Instant::now();
    for _ in 0..runs {
        let start = Instant::now();
        work();
        best = best.min(start.elapsed());
        if begun.elapsed() > Duration::from_secs(60) {
            break;
        }
    }
    best
}

/// A bare quick-xml event loop that also looks at every attribute: the yardstick.
fn bare_loop(bytes: &[u8]) {
    let mut reader = Reader::from_reader(bytes);
    let mut seen = 0_usize;
    loop {
        match reader.read_event() {
            Ok(Event::Start(element) | Event::Empty(element)) => {
                seen += element.attributes().flatten().map(|a| a.value.len()).sum::<usize>();
            }
            Ok(Event::Eof) => break,
            Ok(_) => {}
            Err(error) => panic!("{error}"),
        }
    }
    black_box(seen);
}

fn measure(joints: usize, path: &Path, bytes: &[u8]) -> Vec<String> {
    let rulebook = Rulebook::embedded();
    let bare = least(|| bare_loop(bytes));
    let inputs = Inputs { model: ("model.ifcxml", bytes), schedules: Vec::new(), rules: Vec::new() };
    let whole = least(|| drop(black_box(run(&inputs))));
    let read = least(|| drop(black_box(exchange::read(bytes, "model.ifcxml"))));
    let exchange = exchange::read(bytes, "model.ifcxml").expect("our own writer's model");
    let take_up = least(|| drop(black_box(shop::take_up(&exchange, &rulebook))));
    let steelwork = shop::take_up(&exchange, &rulebook);
    let recognise = least(|| drop(black_box(joints::recognise(&steelwork, &rulebook))));
    let rest = whole.saturating_sub(read + take_up + recognise);
    let ratio = |time: Duration| format!("{:.2}", time.as_secs_f64() / bare.as_secs_f64());
    vec![
        joints.to_string(),
        format!("{:.1}", bytes.len() as f64 / 1e6),
        ratio(whole),
        ratio(read),
        ratio(take_up),
        ratio(recognise),
        ratio(rest),
        format!("{:.0}", whole.as_secs_f64() * 1e6 / joints as f64),
        peak_memory(path).map_or("not measured".into(), |peak| format!("{:.2}", peak / bytes.len() as f64)),
    ]
}

/// Peak resident memory of the built program reviewing the model, in bytes; only where the system tells it.
fn peak_memory(path: &Path) -> Option<f64> {
    let mut child = Command::new(env!("CARGO_BIN_EXE_faying"))
        .args(["review", "--format", "json"])
        .arg(path)
        .stdout(Stdio::null())
        .stderr(Stdio::null())
        .spawn()
        .ok()?;
    let status = format!("/proc/{}/status", child.id());
    let mut peak = None;
    while child.try_wait().ok()?.is_none() {
        if let Ok(text) = fs::read_to_string(&status) {
            let line = text.lines().find_map(|line| line.strip_prefix("VmHWM:"));
            let kib = line.and_then(|line| line.trim().trim_end_matches(" kB").parse::<f64>().ok());
            peak = kib.map(|kib| kib * 1024.0).or(peak);
        }
        std::thread::sleep(Duration::from_millis(2));
    }
    peak
}
