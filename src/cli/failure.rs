//! What ends a run, said in one sentence; with an excerpt where a schedule or a rule file is at fault.

use std::fmt::Display;
use std::io::{self, IsTerminal, Write};
use std::path::Path;

use faying::run::Failed;
use miette::{Diagnostic, GraphicalReportHandler, GraphicalTheme, LabeledSpan, SourceCode};

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
            io::ErrorKind::NotADirectory if path.is_file() => "it is no folder".to_owned(),
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
            Failed::Annex(why) => Self::new(why),
        }
    }
}

/// Faults that are drawn; those beyond are only counted.
const DRAWN: usize = 20;

/// A fault by itself, without those that were found beside it.
#[derive(Debug)]
struct Alone<'a>(&'a dyn Diagnostic);

impl Display for Alone<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        Display::fmt(self.0, f)
    }
}

impl std::error::Error for Alone<'_> {}

impl Diagnostic for Alone<'_> {
    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.0.source_code()
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        self.0.labels()
    }
}

fn excerpt(diagnostic: &dyn Diagnostic) -> String {
    let terminal = io::stderr().is_terminal();
    let theme = match terminal {
        true if coloured(None, terminal) => GraphicalTheme::unicode(),
        true => GraphicalTheme::unicode_nocolor(),
        false => GraphicalTheme::none(),
    };
    let handler = GraphicalReportHandler::new_themed(theme).with_links(terminal);
    let beside: Vec<&dyn Diagnostic> = diagnostic.related().into_iter().flatten().collect();
    let mut drawn = String::new();
    for one in std::iter::once(diagnostic).chain(beside.iter().copied()).take(DRAWN) {
        if handler.render_report(&mut drawn, &Alone(one)).is_err() {
            drawn.push_str(&format!("faying: {one}\n"));
        }
    }
    // How many there are in all, the first fault says.
    if beside.len() + 1 > DRAWN {
        drawn.push_str(&format!("faying: the first {DRAWN} are shown\n"));
    }
    drawn
}
