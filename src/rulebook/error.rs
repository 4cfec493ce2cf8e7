//! What is wrong with a rule file, and where.

use std::ops::Range;
use std::sync::Arc;

use miette::{Diagnostic, NamedSource, SourceSpan};

/// A rule file that can't be used: which file, which bytes of it, what was given and what is allowed.
#[derive(Debug, thiserror::Error, Diagnostic)]
#[error("{}: {message}", file.name())]
pub struct RuleError {
    #[source_code]
    file: NamedSource<Arc<str>>,
    #[label("here")]
    span: Option<SourceSpan>,
    message: String,
}

impl RuleError {
    pub(super) fn new(file: &str, text: &str, span: Option<Range<usize>>, message: impl Into<String>) -> Self {
        Self { file: NamedSource::new(file, text.into()), span: span.map(SourceSpan::from), message: message.into() }
    }

    /// The file's name inside the rule folder: `steel.toml`, `sections/ub.csv`.
    pub fn file(&self) -> &str {
        self.file.name()
    }

    /// The bytes of the file that are wrong, where they can be told.
    pub fn span(&self) -> Option<Range<usize>> {
        self.span.map(|span| span.offset()..span.offset() + span.len())
    }

    /// What was given and what is allowed.
    pub fn message(&self) -> &str {
        &self.message
    }
}
