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

    /// One that starts further on.
    pub fn further_on(&self, offset: usize) -> Self {
        let before = self.bytes.get(..offset).unwrap_or(self.bytes);
        let line_start = memchr::memrchr(b'\n', before).map_or(0, |at| at + 1);
        let spot = Spot { line: 1_u32.saturating_add(breaks(before)), column: 1 };
        Self { bytes: self.bytes, offset: line_start, spot }
    }

    pub fn spot(&mut self, offset: usize) -> Spot {
        let end = offset.min(self.bytes.len());
        let mut passed = self.bytes.get(self.offset..end).unwrap_or_default();
        if let Some(last) = passed.iter().rposition(|byte| *byte == b'\n') {
            let (lines, rest) = passed.split_at(last + 1);
            self.spot = Spot { line: self.spot.line.saturating_add(breaks(lines)), column: 1 };
            passed = rest;
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

/// How many line breaks there are; in steps of which none can count further than a byte does, because those are quick.
fn breaks(bytes: &[u8]) -> u32 {
    bytes.chunks(255).map(|chunk| u32::from(chunk.iter().map(|byte| u8::from(*byte == b'\n')).sum::<u8>())).sum()
}

/// The sorts of problem, by which they are counted; in words for "and 12 more …".
pub(super) type Sort = &'static str;

/// What could not be understood.
#[derive(Clone)]
pub(super) struct Problems {
    file: Arc<str>,
    listed: Vec<(Sort, Problem)>,
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
            self.listed.push((sort, Problem { at: Some(at), message: message() }));
        }
    }

    /// A list for a later part of the file.
    pub fn without_any(&self) -> Self {
        Self::new(self.file.clone())
    }

    /// Takes over those of a later part of the file.
    pub fn absorb(&mut self, later: Self) {
        for (sort, problem) in later.listed {
            if self.listed.iter().filter(|(of, _)| *of == sort).count() < LISTED_OF_A_SORT {
                self.listed.push((sort, problem));
            }
        }
        for (sort, count) in later.counts {
            *self.counts.entry(sort).or_default() += count;
        }
    }

    /// In file order; then a line for each sort that was too frequent to be listed whole.
    pub fn finish(self) -> Vec<Problem> {
        let mut all: Vec<Problem> = self.listed.into_iter().map(|(_, problem)| problem).collect();
        all.sort_by(|a, b| a.at.cmp(&b.at));
        all.extend(self.counts.iter().filter(|(_, count)| **count > LISTED_OF_A_SORT).map(|(sort, count)| Problem {
            at: None,
            message: format!("and {} more of this kind: {sort}", count - LISTED_OF_A_SORT),
        }));
        all
    }
}
