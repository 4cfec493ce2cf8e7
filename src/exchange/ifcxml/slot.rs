//! An element that holds the value of an attribute, or one value of a list or SELECT.

use std::borrow::Cow;

use super::super::cell::Cell;
use super::super::problems::{Problems, Spot};
use super::super::scalar;
use super::super::schema::{Base, Kind, TypeId};
use super::super::store::Store;
use super::head::{Head, Pos};

/// Where a value goes.
#[derive(Clone, Copy, PartialEq)]
pub(super) enum Target {
    /// The attribute of that position of the entity around it.
    Attribute(usize),
    /// Entities that point by this attribute to the entity around them.
    Inverse(&'static str),
    /// An attribute that the schema does not know.
    Extra,
    /// The items of the slot around it.
    Item,
}

/// One of the values in a slot.
pub(super) type Item = (Option<Pos>, Cell);

pub(super) struct Slot<'x> {
    pub name: Cow<'x, str>,
    pub spot: Spot,
    pub target: Target,
    pub kind: Kind,
    /// The defined type that was chosen in a SELECT.
    pub typed: Option<TypeId>,
    pub pos: Option<Pos>,
    /// Where among the items of all slots its own start.
    pub items: usize,
    pub text: Cow<'x, str>,
}

impl<'x> Slot<'x> {
    pub fn new(head: &Head<'x>, items: usize, target: Target, kind: Kind) -> Self {
        Self {
            name: head.name.clone(),
            spot: head.spot,
            target,
            kind,
            typed: None,
            pos: head.pos,
            items,
            text: Cow::default(),
        }
    }

    /// Makes it hold a value of a defined type; the type is kept only where the schema leaves a choice.
    pub fn typed(mut self, name: TypeId, kind: Kind) -> Self {
        if matches!(self.kind.base, Base::Select | Base::Any) {
            self.typed = Some(name);
        }
        self.kind = kind;
        self
    }

    /// What it holds once its element has ended; absent where it is empty or not understood. Its items are taken.
    pub fn value(&self, items: &mut Vec<Item>, store: &mut Store, problems: &mut Problems) -> Cell {
        let own = items.get_mut(self.items..).unwrap_or_default();
        let value = if !own.is_empty() {
            stray_text(&self.text, &self.name, self.spot, problems);
            self.gather(own, store, problems)
        } else if self.text.is_empty() && self.kind != Kind::one(Base::Text) {
            Ok(Cell::ABSENT)
        } else {
            if self.kind.base == Base::Select {
                untyped(&self.name, self.spot, problems);
            }
            scalar::parse(store, self.kind, &self.text)
        };
        items.truncate(self.items);
        let value = value.unwrap_or_else(|wrong| {
            problems.add("value that is not understood", self.spot, || format!("{} {wrong}", self.name));
            Cell::ABSENT
        });
        match self.typed {
            Some(name) if !value.is_absent() => store.typed(name, value),
            _ => value,
        }
    }

    fn gather(&self, items: &mut [Item], store: &mut Store, problems: &mut Problems) -> Result<Cell, String> {
        let nested = self.kind.depth == 2 && self.kind.row == 0 && items.iter().all(|(pos, _)| pos.is_some());
        let mut next = 0;
        for (pos, _) in items.iter_mut() {
            let (index, _) = *pos.get_or_insert((next, 0));
            next = index.saturating_add(1);
        }
        items.sort_by_key(|(pos, _)| *pos); // stable: without pos the order of the document stands
        if nested {
            let rows = items.chunk_by(|(a, _), (b, _)| a.map(|(row, _)| row) == b.map(|(row, _)| row));
            let rows: Vec<Cell> = rows.map(|row| list(row, store)).collect();
            return Ok(store.list(&rows));
        }
        match self.kind {
            Kind { depth: 0, base: Base::Any, .. } if items.len() > 1 => Ok(list(items, store)),
            Kind { depth: 0, .. } => {
                if items.len() > 1 {
                    problems.add("several values for one", self.spot, || {
                        format!("{} holds {} values where one is allowed; the first is read", self.name, items.len())
                    });
                }
                Ok(items.first().map_or(Cell::ABSENT, |(_, value)| *value))
            }
            Kind { depth: 2, row, .. } if !items.iter().any(|(_, item)| item.is_list()) => {
                let flat = list(items, store);
                scalar::rows(store, flat, usize::from(row))
            }
            _ => Ok(list(items, store)),
        }
    }
}

fn list(items: &[Item], store: &mut Store) -> Cell {
    let start = store.next();
    items.iter().for_each(|(_, value)| store.push(*value));
    store.listed(start)
}

/// A SELECT's value without the type that tells what it is.
pub(super) fn untyped(name: &str, spot: Spot, problems: &mut Problems) {
    problems.add("value without a type", spot, || {
        format!("{name} holds a bare value; an element such as IfcLabel-wrapper is required around it")
    });
}

pub(super) fn stray_text(text: &str, name: &str, spot: Spot, problems: &mut Problems) {
    let text = text.trim();
    if !text.is_empty() {
        problems.add("text where none is allowed", spot, || {
            format!("{name} holds the text {}, which is not read", scalar::quoted(text))
        });
    }
}
