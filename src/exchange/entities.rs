//! The entity graph: what every exchange form is read into.

use std::sync::Arc;

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
    Typed(Box<str>, Box<Value>),
}

/// All entities of one exchange.
#[derive(Debug, Default)]
pub struct Entities {
    nodes: Vec<Node>,
    file: Option<Arc<str>>,
}

#[derive(Debug)]
struct Node {
    class: &'static str,
    label: Box<str>,
    line: u32,
    column: u32,
    values: Vec<(&'static str, Value)>,
}

/// One entity of the graph.
#[derive(Clone, Copy)]
pub struct Entity<'a> {
    graph: &'a Entities,
    /// Its index.
    pub id: Id,
}

impl Entities {
    /// How many there are.
    pub fn len(&self) -> usize {
        self.nodes.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.nodes.is_empty()
    }

    /// All, in the order of the file.
    pub fn all(&self) -> impl Iterator<Item = Entity<'_>> {
        (0..self.nodes.len() as u32).map(|i| self.get(Id(i)))
    }

    /// Those of the class or a subtype of it, in the order of the file.
    pub fn of_class<'a>(&'a self, class: &'a str) -> impl Iterator<Item = Entity<'a>> {
        self.all().filter(move |e| e.is_a(class))
    }

    /// One.
    pub fn get(&self, id: Id) -> Entity<'_> {
        Entity { graph: self, id }
    }
}

impl<'a> Entity<'a> {
    fn node(self) -> &'a Node {
        &self.graph.nodes[self.id.0 as usize]
    }

    /// The class as EXPRESS spells it: `IfcBeam`.
    pub fn class(self) -> &'a str {
        self.node().class
    }

    /// Whether it is of that class or of a subtype.
    pub fn is_a(self, class: &str) -> bool {
        self.node().class == class // until the table of supertypes is read
    }

    /// The file's own name for it: `i110`, `#110`; empty where it has none.
    pub fn label(self) -> &'a str {
        &self.node().label
    }

    /// Where its definition starts.
    pub fn place(self) -> Place {
        let node = self.node();
        Place { file: self.graph.file.clone().unwrap_or_else(|| "".into()), line: node.line, column: node.column }
    }

    /// The value of an attribute, by its EXPRESS name.
    pub fn value(self, attribute: &str) -> &'a Value {
        const ABSENT: &Value = &Value::Absent;
        self.node().values.iter().find(|(name, _)| *name == attribute).map_or(ABSENT, |(_, value)| value)
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
        match self.value(attribute) {
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
