//! Output formats: the only room that knows them.
//!
//! Every report is drawn from the same [`Review`](crate::review::Review) and is the same for the same review: no clock,
//! no terminal and no environment is looked at here; the caller says how wide and whether in colour.

pub mod drawing;
mod group;
mod hold;
pub mod json;
mod number;
mod page;
pub mod sheet;
mod standing;
pub mod survey;
mod table;
pub mod text;
mod window;

use std::ffi::OsStr;

/// How a text is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Options {
    /// Columns to a line.
    pub width: usize,
    /// Whether to colour by ANSI escapes.
    pub colour: bool,
    /// Whether long lists are written out.
    pub all: bool,
}

impl Default for Options {
    /// What a pipe or a file gets: 100 columns, no colour, lists bounded.
    fn default() -> Self {
        Self { width: 100, colour: false, all: false }
    }
}

/// Whether a text is coloured: as the caller asked; where nobody asked, on a terminal unless `NO_COLOR` is set to
/// anything but nothing (no-color.org).
pub fn in_colour(asked: Option<bool>, terminal: bool, no_color: Option<&OsStr>) -> bool {
    asked.unwrap_or(terminal && no_color.is_none_or(OsStr::is_empty))
}
