//! References whose target was not known when they were read.

use super::{Id, Value};

/// Ids from here on stand for such references: the index in a list of them is added.
pub(super) const WAITING: u32 = 1 << 31;

/// What an id stands for; `None` where that is nothing.
pub(super) fn target(id: Id, targets: &[Option<Id>]) -> Option<Id> {
    match id.0.checked_sub(WAITING) {
        Some(index) => targets.get(index as usize).copied().flatten(),
        None => Some(id),
    }
}

/// Replaces waiting references; those to nothing become absent, or leave the list they stood in.
pub(super) fn settle(value: &mut Value, targets: &[Option<Id>]) {
    match value {
        Value::Entity(id) => match target(*id, targets) {
            Some(to) => *id = to,
            None => *value = Value::Absent,
        },
        Value::List(items) => {
            items.retain_mut(|item| {
                settle(item, targets);
                *item != Value::Absent
            });
        }
        Value::Typed(_, inner) => settle(inner, targets),
        _ => {}
    }
}
