//! What is wrong with a schedule, with its place and an excerpt of the file.

use std::fmt;
use std::sync::Arc;

use miette::{Diagnostic, LabeledSpan, MietteError, MietteSpanContents, SourceCode, SourceSpan, SpanContents};

use super::source::Source;
use crate::origin::Place;

/// Most faults that are listed; those beyond are only counted.
const MAX_FAULTS: usize = 200;

/// Characters shown before and after the marked place of a long line.
const WINDOW: usize = 60;

/// One thing that is wrong in a schedule.
#[derive(Clone, Debug, thiserror::Error)]
#[error("{at}: {message}")]
pub struct Fault {
    /// Where.
    pub at: Place,
    /// What was given and what is allowed, in one sentence.
    pub message: String,
    /// Characters of the faulty words.
    width: usize,
    excerpt: Option<Excerpt>,
}

impl Diagnostic for Fault {
    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.excerpt.as_ref().map(|excerpt| excerpt as &dyn SourceCode)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        let excerpt = self.excerpt.as_ref()?;
        Some(Box::new(std::iter::once(LabeledSpan::new_with_span(Some("here".into()), excerpt.span))))
    }
}

/// Why a schedule can't be used: everything that is wrong in it, in the order of the file.
#[derive(Clone, Debug)]
pub struct ScheduleError {
    first: Box<Fault>,
    others: Vec<Fault>,
    beyond: usize,
}

impl ScheduleError {
    /// All faults that were kept (the first 200), in the order of the file.
    pub fn faults(&self) -> impl Iterator<Item = &Fault> {
        std::iter::once(&*self.first).chain(&self.others)
    }
}

impl fmt::Display for ScheduleError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        self.first.fmt(f)?;
        match self.others.len() + self.beyond {
            0 => Ok(()),
            more => write!(f, " (and {more} more)"),
        }
    }
}

impl std::error::Error for ScheduleError {}

impl Diagnostic for ScheduleError {
    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.first.source_code()
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        self.first.labels()
    }

    fn related<'a>(&'a self) -> Option<Box<dyn Iterator<Item = &'a dyn Diagnostic> + 'a>> {
        Some(Box::new(self.others.iter().map(|fault| fault as &dyn Diagnostic)))
    }
}

/// Gathers faults, so that a reader hears of all of them at once.
#[derive(Debug, Default)]
pub(super) struct Faults {
    list: Vec<Fault>,
    beyond: usize,
}

impl Faults {
    /// Notes a fault at words that are `width` characters wide.
    pub fn push(&mut self, at: Place, width: usize, message: String) {
        if self.list.len() < MAX_FAULTS {
            self.list.push(Fault { at, message, width, excerpt: None });
        } else {
            self.beyond += 1;
        }
    }

    /// How many there are.
    pub fn len(&self) -> usize {
        self.list.len() + self.beyond
    }

    pub fn absorb(&mut self, other: Faults) {
        self.list.extend(other.list);
        self.beyond += other.beyond;
    }

    /// The error of these faults, with excerpts of the sources that are at hand.
    ///
    /// # Errors
    /// [`ScheduleError`] if there is any fault.
    pub fn check(self, sources: &[Source]) -> Result<(), ScheduleError> {
        let mut list = self.list;
        list.sort_by(|a, b| (&a.at, &a.message).cmp(&(&b.at, &b.message)));
        for fault in &mut list {
            let source = sources.iter().find(|source| source.file == fault.at.file);
            fault.excerpt = source.and_then(|source| Excerpt::of(source, &fault.at, fault.width));
        }
        let mut list = list.into_iter();
        let Some(first) = list.next() else { return Ok(()) };
        Err(ScheduleError { first: Box::new(first), others: list.collect(), beyond: self.beyond })
    }
}

/// The line of a fault, cut to a window: a diagnostic printer would print a line of 60 kB in full.
#[derive(Clone, Debug)]
struct Excerpt {
    at: Place,
    text: String,
    span: SourceSpan,
}

impl Excerpt {
    fn of(source: &Source, at: &Place, width: usize) -> Option<Self> {
        let line = source.line(at.line)?;
        let column = usize::try_from(at.column).ok()?.saturating_sub(1);
        let skipped = column.saturating_sub(WINDOW);
        let mut text = String::from(if skipped > 0 { "…" } else { "" });
        let (mut start, mut end) = (None, None);
        let mut chars = line.chars().enumerate().skip(skipped);
        for (index, char) in chars.by_ref().take(2 * WINDOW) {
            if index == column {
                start = Some(text.len());
            }
            // A control character would play with the reader's terminal.
            text.push(match char {
                '\t' => ' ',
                c if c.is_control() => '\u{fffd}',
                c => c,
            });
            if index < column + width {
                end = Some(text.len());
            }
        }
        let start = start.unwrap_or(text.len());
        let length = end.unwrap_or(start).saturating_sub(start);
        if chars.next().is_some() {
            text.push('…');
        }
        Some(Self { at: at.clone(), text, span: (start, length).into() })
    }
}

impl SourceCode for Excerpt {
    fn read_span<'a>(
        &'a self,
        span: &SourceSpan,
        lines_before: usize,
        lines_after: usize,
    ) -> Result<Box<dyn SpanContents<'a> + 'a>, MietteError> {
        let part = self.text.read_span(span, lines_before, lines_after)?;
        // Without context the printer asks for the place itself; its column is that of the uncut line.
        let column = if lines_before + lines_after == 0 { self.at.column.saturating_sub(1) as usize } else { 0 };
        let line = self.at.line.saturating_sub(1) as usize;
        let file = Arc::clone(&self.at.file).to_string();
        Ok(Box::new(MietteSpanContents::new_named(file, part.data(), *part.span(), line, column, 1)))
    }
}
