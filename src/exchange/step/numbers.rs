//! The numbers by which records refer to one another, `#12`.
//!
//! While a file is read a reference holds the number itself; once all records are known it becomes an id.

use std::collections::HashMap;

use foldhash::fast::RandomState;

use super::super::problems::Problems;
use super::super::waiting::WAITING;
use super::super::{Entities, Id};

/// From here on the rest of a reference is the index in a list of numbers too large for it.
const LARGE: u32 = 1 << 30;

/// The reference to a number.
pub(super) fn reference(number: u64, large: &mut Vec<u64>) -> Id {
    let own = u32::try_from(number).ok().filter(|number| *number < LARGE);
    let own = own.unwrap_or_else(|| {
        large.push(number);
        LARGE + (large.len() - 1) as u32
    });
    Id(WAITING + own)
}

/// The number of a reference; `None` where it is one no more.
pub(super) fn number(id: Id, large: &[u64]) -> Option<u64> {
    let own = id.0.checked_sub(WAITING)?;
    match own.checked_sub(LARGE) {
        Some(index) => large.get(index as usize).copied(),
        None => Some(u64::from(own)),
    }
}

/// The reference where this many large numbers come before those that it was made among.
pub(super) fn later(id: Id, large: usize) -> Id {
    if id.0 >= WAITING + LARGE { Id(id.0 + large as u32) } else { id }
}

/// The records by their numbers.
pub(super) struct Numbers {
    /// By the number itself: one more than the id, or zero.
    dense: Vec<u32>,
    /// Those that are larger.
    others: HashMap<u64, Id, RandomState>,
}

impl Numbers {
    /// Enters all records; of several with one number the first.
    pub fn of(entities: &Entities, problems: &mut Problems) -> Self {
        // most files count through, and leave out a few numbers
        let mut all = Self { dense: vec![0; 2 * entities.len() + 1], others: HashMap::default() };
        for id in (0..entities.len() as u32).map(Id) {
            let label = entities.label(id);
            let Some(number) = label.strip_prefix('#').and_then(|digits| digits.parse::<u64>().ok()) else { continue };
            let first = all.enter(number, id);
            if first != id {
                let at = entities.get(first).place();
                problems.add("id given twice", entities.spot(id), || {
                    format!("the id {label} is given a second time; references to it mean the one at {at}")
                });
            }
        }
        all
    }

    fn enter(&mut self, number: u64, id: Id) -> Id {
        match usize::try_from(number).ok().and_then(|number| self.dense.get_mut(number)) {
            Some(0) => {
                self.dense[number as usize] = id.0 + 1;
                id
            }
            Some(first) => Id(*first - 1),
            None => *self.others.entry(number).or_insert(id),
        }
    }

    /// The record of a number.
    pub fn find(&self, number: u64) -> Option<Id> {
        match usize::try_from(number).ok().and_then(|number| self.dense.get(number)) {
            Some(one_more) => one_more.checked_sub(1).map(Id),
            None => self.others.get(&number).copied(),
        }
    }
}
