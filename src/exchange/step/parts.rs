//! The records of a long DATA section, several parts of it at the same time.
//!
//! A part starts where a record seems to start. Whether one does is known when the part before has been read: only if
//! that one ends exactly there the next one counts; otherwise what follows is read again, one record after the other.
//! So the outcome is the same as that of one reading from end to end.

use memchr::memmem;
use rayon::prelude::*;

use super::super::Entities;
use super::{Id, Reader, numbers};

impl<'a> Reader<'a> {
    /// Reads as many records of the section as come one after the other, of a long one.
    pub(super) fn parts(&mut self) {
        self.cursor.peek();
        let rest = self.cursor.rest();
        let count = self.limits.parts(rest.len());
        if count < 2 || !self.entities.is_empty() {
            return;
        }
        let start_near = |at: usize| Some(at + memmem::find(rest.get(at..)?, b"\n#")? + 1);
        let starts = (1..count).filter_map(|part| start_near(rest.len() / count * part));
        let mut starts: Vec<usize> = std::iter::once(0).chain(starts).map(|start| self.cursor.at + start).collect();
        starts.dedup();
        let ends = starts[1..].iter().copied().chain([self.cursor.bytes.len()]);
        let bounds: Vec<(usize, usize)> = starts.iter().copied().zip(ends).collect();
        let parts: Vec<Self> = bounds.into_par_iter().map(|(start, end)| self.part(start, end)).collect();
        for (start, part) in starts.into_iter().zip(parts) {
            let fits = self.entities.len() + part.entities.len() <= self.limits.entities;
            if self.cursor.at != start || !fits {
                break;
            }
            self.absorb(part);
        }
    }

    /// The records that start in a part of the file.
    fn part(&self, start: usize, end: usize) -> Self {
        let mut part = Self {
            cursor: self.cursor.further_on(start),
            ruler: self.ruler.further_on(start),
            schema: self.schema,
            entities: Entities::new(self.schema, self.entities.file()),
            problems: self.problems.without_any(),
            items: Vec::new(),
            large: Vec::new(),
            recent: Vec::new(),
            dropped: Vec::new(),
            latin1: None,
            limits: self.limits,
            started: start,
        };
        while part.cursor.peek() == Some(b'#') && part.cursor.at < end && part.entities.len() < self.limits.entities {
            part.record();
        }
        part
    }

    fn absorb(&mut self, part: Self) {
        let (ids, large) = (self.entities.len() as u32, self.large.len());
        self.dropped.extend(part.dropped.into_iter().map(|(id, number)| (Id(id.0 + ids), number)));
        if self.entities.is_empty() {
            self.entities = part.entities;
        } else {
            self.entities.absorb(part.entities, |id| numbers::later(id, large));
        }
        self.problems.absorb(part.problems);
        self.large.extend(part.large);
        self.latin1 = match (self.latin1, part.latin1) {
            (Some((spot, count)), Some((_, more))) => Some((spot, count + more)),
            (first, later) => first.or(later),
        };
        (self.cursor, self.ruler) = (part.cursor, part.ruler);
    }
}
