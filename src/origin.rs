//! Where a number came from, and what is said when it came from nowhere.

use std::fmt;
use std::sync::Arc;

/// A place in a file, both counted from 1; 0 where a form has no lines.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Place {
    /// The file's name as the caller gave it (never an absolute path).
    pub file: Arc<str>,
    /// Line, from 1.
    pub line: u32,
    /// Column in characters, from 1.
    pub column: u32,
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}:{}:{}", self.file, self.line, self.column)
    }
}

/// Something in an input that could not be understood; it never stops the reading.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Problem {
    /// Where, if it has a place.
    pub at: Option<Place>,
    /// What was given and what is allowed, in one sentence.
    pub message: String,
}

/// Where a value that enters a check came from.
#[derive(Clone, Debug, PartialEq)]
pub enum Origin {
    /// Written in the shop model or the schedule; with its place and the words that held it.
    Modelled {
        /// Which attribute or property of which part.
        by: String,
        /// Where it stands.
        at: Option<Place>,
    },
    /// Computed from modelled geometry.
    Derived(String),
    /// Taken from a table: name and edition.
    LookedUp(String),
    /// Taken from a rule file or an option; printed as assumed.
    Assumed(String),
}

impl Origin {
    /// As it is printed, in a text of its own.
    pub fn printed(&self) -> String {
        use fmt::Write;
        let words = match self {
            Self::Modelled { by, at } => by.len() + at.as_ref().map_or(0, |at| at.file.len() + 24),
            Self::Derived(words) | Self::LookedUp(words) | Self::Assumed(words) => words.len(),
        };
        let mut text = String::with_capacity("looked up: ".len() + words);
        let _ = write!(text, "{self}");
        text
    }
}

impl fmt::Display for Origin {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Modelled { by, at: Some(at) } => write!(f, "modelled: {by} ({at})"),
            Self::Modelled { by, at: None } => write!(f, "modelled: {by}"),
            Self::Derived(how) => write!(f, "derived: {how}"),
            Self::LookedUp(table) => write!(f, "looked up: {table}"),
            Self::Assumed(by) => write!(f, "assumed: {by}"),
        }
    }
}

/// A value with its origin.
#[derive(Clone, Debug, PartialEq)]
pub struct Datum<T> {
    /// The value.
    pub value: T,
    /// Where it came from.
    pub origin: Origin,
}

impl<T> Datum<T> {
    /// A value with its origin.
    pub fn new(value: T, origin: Origin) -> Self {
        Self { value, origin }
    }

    /// The same origin with another form of the value.
    pub fn map<U>(self, f: impl FnOnce(T) -> U) -> Datum<U> {
        Datum { value: f(self.value), origin: self.origin }
    }
}

/// Who can close a gap.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Ask {
    /// The fabricator: the shop model could state it.
    Fabricator,
    /// The engineer: the schedule could state it.
    Engineer,
    /// Nobody: the method, or a table of the rules, does not cover what stands there.
    Method,
}

impl Ask {
    /// The word in reports.
    pub fn word(self) -> &'static str {
        match self {
            Self::Fabricator => "fabricator",
            Self::Engineer => "engineer",
            Self::Method => "method",
        }
    }
}

/// What a check needs and nobody stated.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Missing {
    /// The missing thing in the trade's words, fit for grouping: "bolt class".
    pub what: String,
    /// Where it was looked for, in one clause: "no material, name or property of the bolts states one".
    pub reason: String,
    /// The part that lacks it.
    pub at: Option<Place>,
    /// Who can close the gap.
    pub ask: Ask,
}

impl fmt::Display for Missing {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}: {}", self.what, self.reason)
    }
}

/// A value that is known with its origin, or missing with the reason.
pub type Known<T> = Result<Datum<T>, Missing>;
