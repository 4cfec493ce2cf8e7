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
    /// None yet, to be taken over by these later.
    pub fn further_on(&self) -> Self {
        Self { ids: HashTable::new(), hasher: self.hasher }
    }

    /// Takes over the labels of a later part of the file, made by [`Labels::further_on`], whose entities will follow
    /// those that there are; whether none of its labels was known.
    pub fn absorb(&mut self, entities: &Entities, later: Self, others: &Entities) -> bool {
        let before = entities.len() as u32;
        self.ids.reserve(later.ids.len(), |(hash, _)| spread(*hash));
        later.ids.into_iter().all(|(hash, id)| {
            let label = others.label(id);
            let same = |(of, id): &(u32, Id)| *of == hash && id.0 < before && entities.label(*id) == label;
            let is_new = self.ids.find(spread(hash), same).is_none();
            self.ids.insert_unique(spread(hash), (hash, Id(before + id.0)), |(hash, _)| spread(*hash));
            is_new
        })
    }

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
