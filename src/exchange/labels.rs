//! Finds entities by the file's own names for them, without a copy of the names.

use std::hash::BuildHasher;

use foldhash::fast::RandomState;
use hashbrown::HashTable;

use super::{Entities, Id};

/// The labels of a graph that is being read.
#[derive(Default)]
pub(super) struct Labels {
    /// With the upper half of their labels' hashes, so that growing does not ask for the labels again.
    ids: HashTable<(u32, Id)>,
    hasher: RandomState,
}

impl Labels {
    /// The first entity of that label.
    pub fn find(&self, label: &str, entities: &Entities) -> Option<Id> {
        let hash = self.hash(label);
        let same = |(of, id): &(u32, Id)| *of == hash && entities.label(*id) == label;
        self.ids.find(spread(hash), same).map(|(_, id)| *id)
    }

    /// Enters an entity by its label; the first one of that label, which may be an earlier one.
    pub fn enter(&mut self, id: Id, entities: &Entities) -> Id {
        let label = entities.label(id);
        let hash = self.hash(label);
        let same = |(of, id): &(u32, Id)| *of == hash && entities.label(*id) == label;
        self.ids.entry(spread(hash), same, |(hash, _)| spread(*hash)).or_insert((hash, id)).get().1
    }

    fn hash(&self, label: &str) -> u32 {
        (self.hasher.hash_one(label) >> 32) as u32
    }
}

/// The table looks at both ends of a hash of 64 bits.
fn spread(hash: u32) -> u64 {
    u64::from(hash) << 32 | u64::from(hash)
}
