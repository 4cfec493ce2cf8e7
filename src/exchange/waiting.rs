//! References whose target was not known when they were read.

use super::Id;

/// Ids from here on stand for such references: the index in a list of them is added.
pub(super) const WAITING: u32 = 1 << 31;

/// What an id stands for; `None` where that is nothing.
pub(super) fn target(id: Id, targets: &[Option<Id>]) -> Option<Id> {
    match id.0.checked_sub(WAITING) {
        Some(index) => targets.get(index as usize).copied().flatten(),
        None => Some(id),
    }
}
