//! The entity graph: what every exchange form is read into.

use std::collections::{BTreeMap, HashMap};
use std::sync::{Arc, OnceLock};

use super::problems::Spot;
use super::schema::{Attribute, ClassId, Kind, Schema};
use super::{Entity, Id, Value};

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
    /// Names of classes that the schema does not know; their numbers follow the schema's.
    strangers: Vec<Box<str>>,
    stranger_ids: HashMap<Box<str>, ClassId>,
    /// Attributes that the schema does not know, by node.
    extras: BTreeMap<Id, Vec<(Box<str>, Value)>>,
    /// Who is pointed to by whom, sorted; from the first time somebody asks.
    pointers: OnceLock<Vec<(Id, Id)>>,
}

#[derive(Debug)]
struct Node {
    class: ClassId,
    /// Where its label starts; it ends where the next one's starts.
    label: u32,
    values: u32,
    line: u32,
    column: u32,
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
            stranger_ids: HashMap::new(),
            extras: BTreeMap::new(),
            pointers: OnceLock::new(),
        }
    }

    pub(super) fn schema(&self) -> &'static Schema {
        self.schema
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
        Entity::new(self, id)
    }

    /// Adds an entity by hand, for small graphs in tests; it has no place and no label. Attributes that its
    /// class does not have are kept under their name.
    pub fn add<'n>(&mut self, class: &str, attributes: impl IntoIterator<Item = (&'n str, Value)>) -> Id {
        let class = self.class_id(class);
        let id = self.open(class, "", Spot::default());
        let known = self.attributes(id);
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
        if let Some(class) = self.schema.find(name).or_else(|| self.stranger_ids.get(name).copied()) {
            return class;
        }
        let Ok(class) = ClassId::try_from(self.schema.len() + self.strangers.len()) else {
            return ClassId::MAX; // beyond 64 thousand unknown classes the last one stands for the rest
        };
        self.strangers.push(name.into());
        self.stranger_ids.insert(name.into(), class);
        class
    }

    /// The name of a class by its number.
    pub(super) fn class_name(&self, class: ClassId) -> &str {
        match self.schema.class(class) {
            Some(class) => class.name,
            None => usize::from(class)
                .checked_sub(self.schema.len())
                .and_then(|index| self.strangers.get(index))
                .map_or("", |name| name),
        }
    }

    /// Starts an entity, so that it has an id before its attributes are known.
    pub(super) fn open(&mut self, class: ClassId, label: &str, spot: Spot) -> Id {
        self.pointers.take(); // whoever asked before did not see this entity
        let id = Id(self.nodes.len() as u32);
        let start = self.labels.len() as u32;
        self.labels.push_str(label);
        self.nodes.push(Node { class, label: start, values: 0, line: spot.line, column: spot.column });
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
        let (index, known) = known.iter().enumerate().find(|(_, a)| a.name == attribute)?;
        Some((known.kind, self.values.get_mut(node.values as usize + index)?))
    }

    pub(super) fn class(&self, id: Id) -> ClassId {
        self.node(id).class
    }

    /// The names of an entity's class and its supertypes, innermost first.
    pub(super) fn lineage(&self, id: Id) -> impl Iterator<Item = &str> {
        let up = |class: &ClassId| self.schema.class(*class).and_then(|c| c.parent);
        std::iter::successors(Some(self.class(id)), up).map(|class| self.class_name(class))
    }

    pub(super) fn label(&self, id: Id) -> &str {
        let start = self.node(id).label as usize;
        let end = self.nodes.get(id.0 as usize + 1).map_or(self.labels.len(), |next| next.label as usize);
        self.labels.get(start..end).unwrap_or_default()
    }

    pub(super) fn spot(&self, id: Id) -> Spot {
        let node = self.node(id);
        Spot { line: node.line, column: node.column }
    }

    pub(super) fn file(&self) -> Arc<str> {
        self.file.clone()
    }

    /// The attributes that the schema gives an entity.
    pub(super) fn attributes(&self, id: Id) -> &'static [Attribute] {
        self.schema.class(self.class(id)).map_or(&[], |c| &c.attributes)
    }

    /// The values of these attributes.
    pub(super) fn values(&self, id: Id) -> &[Value] {
        let start = self.node(id).values as usize;
        self.values.get(start..start + self.attributes(id).len()).unwrap_or_default()
    }

    /// The attributes that the schema does not give it.
    pub(super) fn extras(&self, id: Id) -> &[(Box<str>, Value)] {
        self.extras.get(&id).map_or(&[], |extras| extras)
    }

    /// Who points to an entity.
    pub(super) fn referring(&self, id: Id) -> impl Iterator<Item = Id> {
        let pointers = self.pointers.get_or_init(|| self.pointers());
        let start = pointers.partition_point(|(to, _)| *to < id);
        pointers.iter().skip(start).take_while(move |(to, _)| *to == id).map(|(_, from)| *from)
    }

    fn pointers(&self) -> Vec<(Id, Id)> {
        fn collect(from: Id, value: &Value, into: &mut Vec<(Id, Id)>) {
            match value {
                Value::Entity(to) => into.push((*to, from)),
                Value::List(items) => items.iter().for_each(|item| collect(from, item, into)),
                Value::Typed(_, inner) => collect(from, inner, into),
                _ => {}
            }
        }
        let mut pointers = Vec::new();
        for entity in self.all() {
            entity.values().for_each(|(_, value)| collect(entity.id, value, &mut pointers));
        }
        pointers.sort_unstable();
        pointers.dedup();
        pointers
    }

    fn node(&self, id: Id) -> &Node {
        &self.nodes[id.0 as usize]
    }
}
