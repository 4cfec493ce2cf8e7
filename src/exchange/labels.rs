//! Finds entities by the file's own names for them, without a copy of the names.

use std::hash::BuildHasher;

use foldhash::fast::RandomState;
use hashbrown::HashTable;

use super::{Entities, Id};

/// The labels of a graph that is being read.
#[derive(Default)]
pub(super) struct Labels {
    ids: HashTable<Id>,
    hasher: RandomState,
}

impl Labels {
    /// The first entity of that label.
    pub fn find(&self, label: &str, entities: &Entities) -> Option<Id> {
        self.ids.find(self.hasher.hash_one(label), |id| entities.label(*id) == label).copied()
    }

    /// Enters an entity by its label; the first one of that label, which may be an earlier one.
    pub fn enter(&mut self, id: Id, entities: &Entities) -> Id {
        let label = entities.label(id);
        let same = |other: &Id| entities.label(*other) == label;
        let hash = |id: &Id| self.hasher.hash_one(entities.label(*id));
        *self.ids.entry(self.hasher.hash_one(label), same, hash).or_insert(id).get()
    }
}
