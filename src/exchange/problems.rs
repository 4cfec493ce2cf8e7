//! Places in the file and a bounded list of what could not be understood.

use std::collections::BTreeMap;
use std::sync::Arc;

use crate::origin::{Place, Problem};

/// How many problems of one sort are listed before the rest is only counted.
const LISTED_OF_A_SORT: usize = 20;

/// Line and column, from 1; the column in characters.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Spot {
    pub line: u32,
    pub column: u32,
}

/// Turns byte offsets into lines and columns; offsets must not decrease.
pub(super) struct Ruler<'a> {
    bytes: &'a [u8],
    offset: usize,
    spot: Spot,
}

impl<'a> Ruler<'a> {
    pub fn new(bytes: &'a [u8]) -> Self {
        Self { bytes, offset: 0, spot: Spot { line: 1, column: 1 } }
    }

    pub fn spot(&mut self, offset: usize) -> Spot {
        let end = offset.min(self.bytes.len());
        let mut passed = self.bytes.get(self.offset..end).unwrap_or_default();
        // what is passed is short as a rule
        let lines = passed.iter().filter(|byte| **byte == b'\n').count();
        if lines > 0 {
            self.spot = Spot { line: self.spot.line.saturating_add(lines as u32), column: 1 };
            passed = passed.rsplit(|byte| *byte == b'\n').next().unwrap_or_default();
        }
        let characters = match passed.is_ascii() {
            true => passed.len(),
            false => passed.iter().filter(|byte| **byte & 0xC0 != 0x80).count(),
        };
        self.spot.column = self.spot.column.saturating_add(characters as u32);
        self.offset = self.offset.max(end);
        self.spot
    }
}

/// The sorts of problem, by which they are counted; in words for "and 12 more …".
pub(super) type Sort = &'static str;

/// What could not be understood.
#[derive(Clone)]
pub(super) struct Problems {
    file: Arc<str>,
    listed: Vec<Problem>,
    counts: BTreeMap<Sort, usize>,
}

impl Problems {
    pub fn new(file: Arc<str>) -> Self {
        Self { file, listed: Vec::new(), counts: BTreeMap::new() }
    }

    /// Lists it, or only counts it where its sort has been listed often enough.
    pub fn add(&mut self, sort: Sort, spot: Spot, message: impl FnOnce() -> String) {
        let count = self.counts.entry(sort).or_default();
        *count += 1;
        if *count <= LISTED_OF_A_SORT {
            let at = Place { file: self.file.clone(), line: spot.line, column: spot.column };
            self.listed.push(Problem { at: Some(at), message: message() });
        }
    }

    /// In file order; then a line for each sort that was too frequent to be listed whole.
    pub fn finish(mut self) -> Vec<Problem> {
        self.listed.sort_by(|a, b| a.at.cmp(&b.at));
        self.listed.extend(self.counts.iter().filter(|(_, count)| **count > LISTED_OF_A_SORT).map(|(sort, count)| {
            Problem { at: None, message: format!("and {} more of this kind: {sort}", count - LISTED_OF_A_SORT) }
        }));
        self.listed
    }
}
