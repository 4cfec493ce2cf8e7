//! An element that holds the value of an attribute, or one value of a list or SELECT.

use super::super::problems::{Problems, Spot};
use super::super::scalar;
use super::super::schema::{Base, Kind};
use super::super::{TypeName, Value};
use super::head::{Head, Pos};

/// Where a value goes.
#[derive(Clone, PartialEq)]
pub(super) enum Target {
    /// The attribute of that position of the entity around it.
    Attribute(usize),
    /// Entities that point by this attribute to the entity around them.
    Inverse(&'static str),
    /// An attribute that the schema does not know.
    Extra(Box<str>),
    /// The items of the slot around it.
    Item,
}

pub(super) struct Slot {
    pub name: Box<str>,
    pub spot: Spot,
    pub target: Target,
    pub kind: Kind,
    /// The defined type that was chosen in a SELECT.
    pub typed: Option<TypeName>,
    pub pos: Option<Pos>,
    pub items: Vec<(Option<Pos>, Value)>,
    pub text: String,
}

impl Slot {
    pub fn new(head: &Head, target: Target, kind: Kind) -> Self {
        Self {
            name: head.name.as_ref().into(),
            spot: head.spot,
            target,
            kind,
            typed: None,
            pos: head.pos,
            items: Vec::new(),
            text: String::new(),
        }
    }

    /// Makes it hold a value of a defined type; the type is kept only where the schema leaves a choice.
    pub fn typed(mut self, name: TypeName, kind: Kind) -> Self {
        if matches!(self.kind.base, Base::Select | Base::Any) {
            self.typed = Some(name);
        }
        self.kind = kind;
        self
    }

    /// What it holds once its element has ended; absent where it is empty or not understood.
    pub fn value(&mut self, problems: &mut Problems) -> Value {
        let items = std::mem::take(&mut self.items);
        let value = if !items.is_empty() {
            stray_text(&self.text, &self.name, self.spot, problems);
            self.gather(items, problems)
        } else if self.text.is_empty() && self.kind != Kind::one(Base::Text) {
            Ok(Value::Absent)
        } else {
            if self.kind.base == Base::Select {
                untyped(&self.name, self.spot, problems);
            }
            scalar::parse(self.kind, &self.text)
        };
        let value = value.unwrap_or_else(|wrong| {
            problems.add("value that is not understood", self.spot, || format!("{} {wrong}", self.name));
            Value::Absent
        });
        match self.typed.take() {
            Some(name) if value != Value::Absent => Value::Typed(name, value.into()),
            _ => value,
        }
    }

    fn gather(&self, mut items: Vec<(Option<Pos>, Value)>, problems: &mut Problems) -> Result<Value, String> {
        let nested = self.kind.depth == 2 && self.kind.row == 0 && items.iter().all(|(pos, _)| pos.is_some());
        let mut next = 0;
        for (pos, _) in &mut items {
            let (index, _) = *pos.get_or_insert((next, 0));
            next = index.saturating_add(1);
        }
        items.sort_by_key(|(pos, _)| *pos); // stable: without pos the order of the document stands
        if nested {
            let rows = items.chunk_by(|(a, _), (b, _)| a.map(|(row, _)| row) == b.map(|(row, _)| row));
            return Ok(Value::List(rows.map(|row| list(row.to_vec())).collect()));
        }
        match self.kind {
            Kind { depth: 0, base: Base::Any, .. } if items.len() > 1 => Ok(list(items)),
            Kind { depth: 0, .. } => {
                if items.len() > 1 {
                    problems.add("several values for one", self.spot, || {
                        format!("{} holds {} values where one is allowed; the first is read", self.name, items.len())
                    });
                }
                Ok(items.into_iter().next().map_or(Value::Absent, |(_, value)| value))
            }
            Kind { depth: 2, row, .. } if !items.iter().any(|(_, item)| matches!(item, Value::List(_))) => {
                scalar::rows(items.into_iter().map(|(_, value)| value).collect(), usize::from(row))
            }
            _ => Ok(list(items)),
        }
    }
}

fn list(items: Vec<(Option<Pos>, Value)>) -> Value {
    let mut items: Vec<Value> = items.into_iter().map(|(_, value)| value).collect();
    items.shrink_to_fit(); // most memory goes into short lists
    Value::List(items)
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
