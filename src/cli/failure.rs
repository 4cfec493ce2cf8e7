//! What ends a run, said in one sentence; with an excerpt where a schedule or a rule file is at fault.

use std::fmt::Display;
use std::io::{self, IsTerminal, Write};
use std::path::Path;

use faying::run::Failed;
use miette::{Diagnostic, GraphicalReportHandler, GraphicalTheme};

use super::output::coloured;

/// Why there is no report.
#[derive(Debug)]
pub enum Failure {
    /// One sentence.
    Sentence(String),
    /// A fault in a schedule or a rule file, with its place.
    Excerpt(Box<dyn Diagnostic + Send + Sync>),
}

impl Failure {
    /// A sentence.
    pub fn new(sentence: impl Into<String>) -> Self {
        Self::Sentence(sentence.into())
    }

    /// "what: why".
    pub fn because(what: impl Display, why: impl Display) -> Self {
        Self::Sentence(format!("{what}: {why}"))
    }

    /// "can't read the model hall.ifcxml: there is no such file".
    pub fn io(what: &str, path: &Path, error: &io::Error) -> Self {
        let why = match error.kind() {
            io::ErrorKind::NotFound => "there is no such file or folder".to_owned(),
            io::ErrorKind::PermissionDenied => "the permission is missing".to_owned(),
            io::ErrorKind::IsADirectory => "it is a folder".to_owned(),
            io::ErrorKind::NotADirectory => "a part of its path is no folder".to_owned(),
            _ => error.to_string(),
        };
        Self::because(format!("can't {what} {}", path.display()), why)
    }

    /// Says it on stderr and gives the exit code.
    pub fn tell(&self) -> u8 {
        match self {
            Self::Sentence(sentence) => say(sentence),
            Self::Excerpt(diagnostic) => to_stderr(&excerpt(diagnostic.as_ref())),
        }
        2
    }
}

/// Says a sentence on stderr.
pub fn say(sentence: &str) {
    to_stderr(&format!("faying: {sentence}\n"));
}

fn to_stderr(text: &str) {
    // Where even stderr is gone there is nobody left to tell.
    let _ = io::stderr().lock().write_all(text.as_bytes());
}

impl From<Failed> for Failure {
    fn from(failed: Failed) -> Self {
        match failed {
            Failed::Exchange(unreadable) => Self::Sentence(unreadable.to_string()),
            Failed::Schedule(diagnostic) | Failed::Rules(diagnostic) => Self::Excerpt(diagnostic),
        }
    }
}

fn excerpt(diagnostic: &dyn Diagnostic) -> String {
    let terminal = io::stderr().is_terminal();
    let theme = match terminal {
        true if coloured(None, terminal) => GraphicalTheme::unicode(),
        true => GraphicalTheme::unicode_nocolor(),
        false => GraphicalTheme::none(),
    };
    let mut drawn = String::new();
    match GraphicalReportHandler::new_themed(theme).with_links(terminal).render_report(&mut drawn, diagnostic) {
        Ok(()) => drawn,
        Err(_) => format!("faying: {diagnostic}\n"),
    }
}
