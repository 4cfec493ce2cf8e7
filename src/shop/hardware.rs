//! Nuts and washers that are parts of their own: evidence for the bolt on their axis, and no bolts.

use std::collections::HashMap;

use foldhash::fast::RandomState;
use glam::DVec3;

use super::Rejected;
use super::words::Word;

/// Edge of a cell of the index, mm.
const CELL: f64 = 250.0;
/// A bolt through more cells than this is asked for at every nut.
const MOST: usize = 64;
/// So many bolts are looked at from one nut; more lie on no axis of its own.
const ASKED: usize = 256;
/// How far a nut may sit beyond the drawn end of its shank, mm.
const BEYOND: f64 = 60.0;

/// A nut or washer.
pub(super) struct Hardware {
    pub what: Word,
    /// Its middle.
    pub at: DVec3,
    pub axis: DVec3,
    /// Who it is; the reason is completed once the bolts are known.
    pub rejected: Rejected,
}

/// The straight lines from one point to another that hardware may sit on. The map is only looked up, never walked.
#[derive(Default)]
pub(super) struct Lines {
    lines: Vec<(DVec3, DVec3)>,
    cells: HashMap<[i64; 3], Vec<usize>, RandomState>,
    long: Vec<usize>,
}

impl Lines {
    pub fn put(&mut self, from: DVec3, to: DVec3) {
        let index = self.lines.len();
        self.lines.push((from, to));
        let steps = (from.distance(to) / CELL).ceil().max(1.0);
        if !(steps <= MOST as f64) {
            return self.long.push(index);
        }
        for step in 0..=steps as usize {
            let bolts = self.cells.entry(cell(from.lerp(to, step as f64 / steps))).or_default();
            if bolts.last() != Some(&index) {
                bolts.push(index);
            }
        }
    }

    /// Whether a nut or washer sits on one of the lines; `aside` is how far off its axis it may lie, `parallel` the
    /// sine of the angle it may lean, mm.
    pub fn hold(&self, at: DVec3, axis: DVec3, aside: f64, parallel: f64) -> bool {
        if self.lines.is_empty() {
            return false;
        }
        let [x, y, z] = cell(at);
        let near = (-1..=1).flat_map(|i| (-1..=1).flat_map(move |j| (-1..=1).map(move |k| [x + i, y + j, z + k])));
        let bolts = near.filter_map(|cell| self.cells.get(&cell)).flatten().take(ASKED);
        bolts.chain(self.long.iter().take(ASKED)).filter_map(|bolt| self.lines.get(*bolt)).any(|(from, to)| {
            let Some(along) = (*to - *from).try_normalize() else { return false };
            let (level, length) = ((at - *from).dot(along), from.distance(*to));
            along.cross(axis).length() <= parallel
                && (at - *from).reject_from_normalized(along).length() <= aside
                && level >= -BEYOND
                && level <= length + BEYOND
        })
    }
}

fn cell(point: DVec3) -> [i64; 3] {
    (point / CELL).floor().to_array().map(|c| (c as i64).clamp(-(1 << 40), 1 << 40))
}
