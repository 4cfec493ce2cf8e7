//! One entity of the graph and its values.

use std::sync::Arc;

use super::graph::Entities;
use super::problems::Spot;
use super::schema::Attribute;
use crate::origin::Place;

/// An entity's index in the graph, in the order of the file.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Id(pub u32);

/// An attribute's value.
#[derive(Clone, Debug, PartialEq, Default)]
pub enum Value {
    /// Not given, or derived.
    #[default]
    Absent,
    /// A string.
    Text(Box<str>),
    /// A finite real.
    Number(f64),
    /// An integer.
    Integer(i64),
    /// A BOOLEAN, or a LOGICAL that is not unknown.
    Truth(bool),
    /// An enumeration item, upper case without dots.
    Token(Box<str>),
    /// Another entity.
    Entity(Id),
    /// A list, set or array; lists of lists nest.
    List(Vec<Value>),
    /// A defined type chosen in a SELECT: `IfcLabel`, with its value.
    Typed(TypeName, Box<Value>),
}

/// The name of a defined type, such as `IfcLabel`; thin and shared, because exchanges hold very many values.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct TypeName(Arc<Box<str>>);

impl From<&str> for TypeName {
    fn from(name: &str) -> Self {
        Self(Arc::new(name.into()))
    }
}

impl std::ops::Deref for TypeName {
    type Target = str;

    fn deref(&self) -> &str {
        &self.0
    }
}

impl std::fmt::Display for TypeName {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self)
    }
}

/// One entity of the graph.
#[derive(Clone, Copy, Debug)]
pub struct Entity<'a> {
    graph: &'a Entities,
    /// Its index.
    pub id: Id,
}

impl<'a> Entity<'a> {
    pub(super) fn new(graph: &'a Entities, id: Id) -> Self {
        Self { graph, id }
    }

    pub(super) fn graph(self) -> &'a Entities {
        self.graph
    }

    /// The class as EXPRESS spells it: `IfcBeam`.
    pub fn class(self) -> &'a str {
        self.graph.class_name(self.graph.class(self.id))
    }

    /// Whether it is of that class or of a subtype, by the schema of its exchange. What IFC4X3 renamed answers to
    /// the older name too.
    pub fn is_a(self, class: &str) -> bool {
        let renamed = match class {
            "IfcBuildingElement" => "IfcBuiltElement",
            "IfcBuildingElementType" => "IfcBuiltElementType",
            same => same,
        };
        self.graph.lineage(self.id).any(|name| name == class || name == renamed)
    }

    /// The file's own name for it: `i110`, `#110`; empty where it has none.
    pub fn label(self) -> &'a str {
        self.graph.label(self.id)
    }

    /// Where its definition starts.
    pub fn place(self) -> Place {
        let Spot { line, column } = self.spot();
        Place { file: self.graph.file(), line, column }
    }

    pub(super) fn spot(self) -> Spot {
        self.graph.spot(self.id)
    }

    /// The value of an attribute, by its EXPRESS name.
    pub fn value(self, attribute: &str) -> &'a Value {
        const ABSENT: &Value = &Value::Absent;
        self.values().find(|(name, _)| *name == attribute).map_or(ABSENT, |(_, value)| value)
    }

    /// All attributes with their values, absent ones too: the schema's in its order, then unknown ones.
    pub fn values(self) -> impl Iterator<Item = (&'a str, &'a Value)> {
        let extras = self.graph.extras(self.id).iter().map(|(name, value)| (&**name, value));
        self.known_values().map(|(attribute, value)| (attribute.name, value)).chain(extras)
    }

    /// The schema's attributes with their values.
    pub(super) fn known_values(self) -> impl Iterator<Item = (&'static Attribute, &'a Value)> {
        self.graph.attributes(self.id).iter().zip(self.graph.values(self.id))
    }

    /// The entities that point here by any attribute, in the order of the file.
    pub fn referring(self) -> impl Iterator<Item = Entity<'a>> {
        self.graph.referring(self.id).map(|id| self.graph.get(id))
    }

    /// The entities of that class (or a subtype) that point here by that attribute, in the order of the file.
    pub fn referring_by(self, class: &str, attribute: &str) -> Vec<Entity<'a>> {
        self.referring().filter(|e| e.is_a(class) && e.entities(attribute).iter().any(|to| to.id == self.id)).collect()
    }

    /// A string attribute (also of a SELECT type); empty strings count as absent.
    pub fn text(self, attribute: &str) -> Option<&'a str> {
        fn text(value: &Value) -> Option<&str> {
            match value {
                Value::Text(text) => Some(text).map(|t| t.trim()).filter(|t| !t.is_empty()),
                Value::Typed(_, inner) => text(inner),
                _ => None,
            }
        }
        text(self.value(attribute))
    }

    /// A number attribute (real or integer, also of a SELECT type), in the file's unit.
    pub fn number(self, attribute: &str) -> Option<f64> {
        self.value(attribute).number()
    }

    /// A list of numbers, such as `Coordinates`; `None` if any item is no number.
    pub fn numbers(self, attribute: &str) -> Option<Vec<f64>> {
        match self.value(attribute) {
            Value::List(items) => items.iter().map(Value::number).collect(),
            _ => None,
        }
    }

    /// An enumeration item, upper case.
    pub fn token(self, attribute: &str) -> Option<&'a str> {
        match self.value(attribute) {
            Value::Token(token) => Some(token),
            _ => None,
        }
    }

    /// A BOOLEAN attribute.
    pub fn truth(self, attribute: &str) -> Option<bool> {
        match self.value(attribute) {
            Value::Truth(truth) => Some(*truth),
            _ => None,
        }
    }

    /// The entity an attribute points to.
    pub fn entity(self, attribute: &str) -> Option<Entity<'a>> {
        match self.value(attribute) {
            Value::Entity(id) => Some(self.graph.get(*id)),
            _ => None,
        }
    }

    /// The entities of a list attribute (or the single one it holds).
    pub fn entities(self, attribute: &str) -> Vec<Entity<'a>> {
        let mut value = self.value(attribute);
        while let Value::Typed(_, inner) = value {
            value = inner;
        }
        match value {
            Value::List(items) => items
                .iter()
                .filter_map(|item| if let Value::Entity(id) = item { Some(self.graph.get(*id)) } else { None })
                .collect(),
            Value::Entity(id) => vec![self.graph.get(*id)],
            _ => Vec::new(),
        }
    }
}

impl Value {
    /// A number, also inside a typed value.
    pub fn number(&self) -> Option<f64> {
        match self {
            Self::Number(number) => Some(*number),
            Self::Integer(integer) => Some(*integer as f64),
            Self::Typed(_, inner) => inner.number(),
            _ => None,
        }
    }
}
