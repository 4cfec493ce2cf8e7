//! The entity graph: what every exchange form is read into.

use std::collections::BTreeMap;
use std::sync::{Arc, OnceLock};

use super::problems::Spot;
use super::schema::{ClassId, Kind, Schema};
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
#[derive(Debug)]
pub struct Entities {
    schema: &'static Schema,
    file: Arc<str>,
    nodes: Vec<Node>,
    /// The attributes of all nodes, each node's in the order of the schema.
    values: Vec<Value>,
    /// The labels of all nodes.
    labels: String,
    /// Names of entities that the schema does not know; their numbers follow the schema's.
    strangers: Vec<Box<str>>,
    /// Attributes that the schema does not know, by node.
    extras: BTreeMap<Id, Vec<(Box<str>, Value)>>,
    /// Who points to whom, from the first time somebody asks.
    referring: OnceLock<Vec<(Id, Id)>>,
}

#[derive(Debug)]
struct Node {
    class: ClassId,
    label_len: u16,
    label: u32,
    values: u32,
    line: u32,
    column: u32,
}

/// One entity of the graph.
#[derive(Clone, Copy, Debug)]
pub struct Entity<'a> {
    graph: &'a Entities,
    /// Its index.
    pub id: Id,
}

impl Default for Entities {
    fn default() -> Self {
        Self::new(Schema::ifc4(), "".into())
    }
}

impl Entities {
    pub(super) fn new(schema: &'static Schema, file: Arc<str>) -> Self {
        Self {
            schema,
            file,
            nodes: Vec::new(),
            values: Vec::new(),
            labels: String::new(),
            strangers: Vec::new(),
            extras: BTreeMap::new(),
            referring: OnceLock::new(),
        }
    }

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

    /// Adds an entity by hand, for small graphs in tests; it has no place and no label. Attributes that its
    /// class does not have are kept under their name.
    pub fn add<'n>(&mut self, class: &str, attributes: impl IntoIterator<Item = (&'n str, Value)>) -> Id {
        let class = self.class_id(class);
        let id = self.open(class, "", Spot::default());
        let known = self.schema.class(class).map_or(&[][..], |c| &c.attributes);
        let mut values = vec![Value::Absent; known.len()];
        let mut extras = Vec::new();
        for (name, value) in attributes {
            match known.iter().position(|a| a.name == name) {
                Some(index) => values[index] = value,
                None => extras.push((name.into(), value)),
            }
        }
        self.close(id, values, extras);
        id
    }

    /// The number of a class, also of one that the schema does not know.
    pub(super) fn class_id(&mut self, name: &str) -> ClassId {
        if let Some(class) = self.schema.find(name) {
            return class;
        }
        let known = self.schema.len();
        let index = self.strangers.iter().position(|s| **s == *name).unwrap_or_else(|| {
            if known + self.strangers.len() < usize::from(ClassId::MAX) {
                self.strangers.push(name.into());
            }
            self.strangers.len() - 1 // beyond 64 thousand unknown classes the last stands for the rest
        });
        (known + index) as ClassId
    }

    /// The name of a class by its number.
    pub(super) fn class_name(&self, class: ClassId) -> &str {
        match self.schema.class(class) {
            Some(class) => class.name,
            None => self.strangers.get(usize::from(class) - self.schema.len()).map_or("", |name| name),
        }
    }

    /// Starts an entity, so that it has an id before its attributes are known.
    pub(super) fn open(&mut self, class: ClassId, label: &str, spot: Spot) -> Id {
        let id = Id(self.nodes.len() as u32);
        let start = self.labels.len() as u32;
        let label_len = label.len().min(usize::from(u16::MAX));
        let label = label.get(..label_len).unwrap_or_default();
        self.labels.push_str(label);
        self.nodes.push(Node {
            class,
            label_len: label.len() as u16,
            label: start,
            values: 0,
            line: spot.line,
            column: spot.column,
        });
        id
    }

    /// Ends an entity: `values` in the order of the schema, one an attribute.
    pub(super) fn close(&mut self, id: Id, values: Vec<Value>, extras: Vec<(Box<str>, Value)>) {
        self.nodes[id.0 as usize].values = self.values.len() as u32;
        self.values.extend(values);
        if !extras.is_empty() {
            self.extras.insert(id, extras);
        }
    }

    /// All values, to fill in what was not known when they were read.
    pub(super) fn values_mut(&mut self) -> impl Iterator<Item = &mut Value> {
        self.values.iter_mut().chain(self.extras.values_mut().flatten().map(|(_, value)| value))
    }

    /// A value and its kind, by the attribute's name.
    pub(super) fn value_mut(&mut self, id: Id, attribute: &str) -> Option<(Kind, &mut Value)> {
        let node = self.nodes.get(id.0 as usize)?;
        let known = &self.schema.class(node.class)?.attributes;
        let index = known.iter().position(|a| a.name == attribute)?;
        Some((known[index].kind, self.values.get_mut(node.values as usize + index)?))
    }

    fn pairs(&self) -> &[(Id, Id)] {
        self.referring.get_or_init(|| {
            fn collect(from: Id, value: &Value, into: &mut Vec<(Id, Id)>) {
                match value {
                    Value::Entity(to) => into.push((*to, from)),
                    Value::List(items) => items.iter().for_each(|item| collect(from, item, into)),
                    Value::Typed(_, inner) => collect(from, inner, into),
                    _ => {}
                }
            }
            let mut pairs = Vec::new();
            for entity in self.all() {
                entity.values().for_each(|(_, value)| collect(entity.id, value, &mut pairs));
            }
            pairs.sort_unstable();
            pairs.dedup();
            pairs
        })
    }
}

impl<'a> Entity<'a> {
    fn node(self) -> &'a Node {
        &self.graph.nodes[self.id.0 as usize]
    }

    /// The class as EXPRESS spells it: `IfcBeam`.
    pub fn class(self) -> &'a str {
        self.graph.class_name(self.node().class)
    }

    /// Whether it is of that class or of a subtype.
    pub fn is_a(self, class: &str) -> bool {
        let schema = self.graph.schema;
        let mut at = Some(self.node().class);
        while let Some(here) = at {
            if self.graph.class_name(here) == class {
                return true;
            }
            at = schema.class(here).and_then(|c| c.parent);
        }
        false
    }

    /// The file's own name for it: `i110`, `#110`; empty where it has none.
    pub fn label(self) -> &'a str {
        let node = self.node();
        let start = node.label as usize;
        self.graph.labels.get(start..start + usize::from(node.label_len)).unwrap_or_default()
    }

    /// Where its definition starts.
    pub fn place(self) -> Place {
        let node = self.node();
        Place { file: self.graph.file.clone(), line: node.line, column: node.column }
    }

    /// The value of an attribute, by its EXPRESS name.
    pub fn value(self, attribute: &str) -> &'a Value {
        const ABSENT: &Value = &Value::Absent;
        self.values().find(|(name, _)| *name == attribute).map_or(ABSENT, |(_, value)| value)
    }

    /// All attributes with their values, absent ones too: the schema's in its order, then unknown ones.
    pub fn values(self) -> impl Iterator<Item = (&'a str, &'a Value)> {
        let node = self.node();
        let known = self.graph.schema.class(node.class).map_or(&[][..], |c| &c.attributes);
        let start = node.values as usize;
        let values = self.graph.values.get(start..start + known.len()).unwrap_or_default();
        let extras = self.graph.extras.get(&self.id).map_or(&[][..], |extras| extras);
        known.iter().map(|a| a.name).zip(values).chain(extras.iter().map(|(name, value)| (&**name, value)))
    }

    /// The entities that point here by any attribute, in the order of the file.
    pub fn referring(self) -> impl Iterator<Item = Entity<'a>> {
        let pairs = self.graph.pairs();
        let start = pairs.partition_point(|(to, _)| *to < self.id);
        pairs[start..].iter().take_while(move |(to, _)| *to == self.id).map(move |(_, from)| self.graph.get(*from))
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
