//! The entity graph: what every exchange form is read into.

use std::collections::{BTreeMap, HashMap};
use std::sync::{Arc, OnceLock};

use super::cell::Cell;
use super::problems::Spot;
use super::schema::{Attribute, ClassId, Kind, Schema};
use super::store::Store;
use super::{Entity, Id, Value};

/// All entities of one exchange.
#[derive(Debug)]
pub struct Entities {
    schema: &'static Schema,
    file: Arc<str>,
    nodes: Vec<Node>,
    /// The attributes of all nodes, each node's in the order of the schema, and what they hold.
    pub(super) store: Store,
    /// The labels of all nodes.
    labels: String,
    /// Names of classes that the schema does not know; their numbers follow the schema's.
    strangers: Vec<Box<str>>,
    stranger_ids: HashMap<Box<str>, ClassId>,
    /// Attributes that the schema does not know, by node.
    extras: BTreeMap<Id, Vec<(Box<str>, Cell)>>,
    /// Who is pointed to by whom; from the first time somebody asks.
    pointers: OnceLock<Pointers>,
}

/// Who is pointed to by whom.
#[derive(Debug)]
struct Pointers {
    /// Where in `from` those that point to an entity start; they end where the next one's start.
    starts: Vec<u32>,
    from: Vec<Id>,
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
            store: Store::new(schema),
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
    pub fn of_class<'a>(&'a self, class: &str) -> impl Iterator<Item = Entity<'a>> + use<'a> {
        // asked once a class, not once an entity
        let count = self.schema.len() + self.strangers.len();
        let is_it: Vec<bool> = (0..count).map(|of| self.is_a(of as ClassId, class)).collect();
        self.all().filter(move |e| is_it.get(usize::from(self.class(e.id))).is_some_and(|is_it| *is_it))
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
        for (name, value) in attributes {
            let cell = self.store.put(&value);
            match self.attribute(id, name) {
                Some((index, _)) => self.set(id, index, cell),
                None => self.add_extra(id, name, cell),
            }
        }
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

    /// Adds an entity, all of its attributes absent.
    pub(super) fn open(&mut self, class: ClassId, label: &str, spot: Spot) -> Id {
        self.pointers.take(); // whoever asked before did not see this entity
        let id = Id(self.nodes.len() as u32);
        let start = self.labels.len() as u32;
        self.labels.push_str(label);
        let values = self.store.room(self.schema.class(class).map_or(0, |c| c.attributes.len()));
        self.nodes.push(Node { class, label: start, values, line: spot.line, column: spot.column });
        id
    }

    /// The value of the attribute at a position of the schema.
    pub(super) fn cell(&self, id: Id, index: usize) -> Cell {
        self.cells(id).get(index).copied().unwrap_or(Cell::ABSENT)
    }

    /// Gives the attribute at a position of the schema, of which the entity must have one there, its value.
    pub(super) fn set(&mut self, id: Id, index: usize, value: Cell) {
        let at = self.node(id).values as usize + index;
        if let Some(cell) = self.store.cell_mut(at) {
            *cell = value;
        }
    }

    /// Gives an entity an attribute that the schema does not know.
    pub(super) fn add_extra(&mut self, id: Id, name: &str, value: Cell) {
        self.extras.entry(id).or_default().push((name.into(), value));
    }

    /// Replaces waiting references by their targets; whether some have none, which are left as they are.
    pub(super) fn settle(&mut self, target: impl Fn(Id) -> Option<Id> + Sync) -> bool {
        let mut is_missing = self.store.settle(&target);
        for (_, value) in self.extras.values_mut().flatten() {
            is_missing |= !value.settle(&target);
        }
        is_missing
    }

    /// Makes the references absent that still wait, or takes them out of the list they stand in.
    pub(super) fn drop_waiting(&mut self) {
        self.store.drop_waiting();
        for (_, value) in self.extras.values_mut().flatten() {
            value.drop_waiting();
            if value.is_list() {
                *value = self.store.without_gaps(*value);
            }
        }
    }

    /// Calls with each reference that an entity holds.
    pub(super) fn each_reference(&self, from: Id, with: &mut impl FnMut(Id)) {
        let cells = self.cells(from).iter().chain(self.extras(from).iter().map(|(_, cell)| cell));
        cells.for_each(|cell| self.store.each_entity(*cell, with));
    }

    /// Takes over all entities of another graph of the same schema behind its own; what they refer to becomes what `id`
    /// makes of it.
    pub(super) fn absorb(&mut self, other: Self, id: impl Fn(Id) -> Id) {
        self.pointers.take();
        let base = self.nodes.len() as u32;
        let classes: Vec<ClassId> = other.strangers.iter().map(|name| self.class_id(name)).collect();
        let (cells, labels) = (self.store.next() as u32, self.labels.len() as u32);
        let moved = self.store.absorb(&other.store, &id);
        self.labels.reserve_exact(other.labels.len());
        self.labels.push_str(&other.labels);
        self.nodes.reserve_exact(other.nodes.len());
        self.nodes.extend(other.nodes.into_iter().map(|node| {
            let stranger = usize::from(node.class).checked_sub(self.schema.len()).and_then(|index| classes.get(index));
            let class = stranger.copied().unwrap_or(node.class);
            Node { class, label: node.label + labels, values: node.values + cells, ..node }
        }));
        for (of, extras) in other.extras {
            let store = &mut self.store;
            let extras = extras.into_iter().map(|(name, cell)| (name, store.moved(&other.store, cell, &moved, &id)));
            let extras = extras.collect();
            self.extras.insert(Id(of.0 + base), extras);
        }
    }

    /// The position and kind of an attribute.
    pub(super) fn attribute(&self, id: Id, name: &str) -> Option<(usize, Kind)> {
        let class = self.schema.class(self.class(id))?;
        let index = class.position(name)?;
        Some((index, class.attributes.get(index)?.kind))
    }

    /// The value of an attribute, by its EXPRESS name; `None` where it has no such attribute.
    #[inline]
    pub(super) fn value(&self, id: Id, name: &str) -> Option<&Cell> {
        let node = self.node(id);
        match self.schema.class(node.class).and_then(|class| class.position(name)) {
            Some(index) => self.store.cell(node.values as usize + index),
            None => self.extras(id).iter().find(|(extra, _)| **extra == *name).map(|(_, cell)| cell),
        }
    }

    #[inline]
    pub(super) fn class(&self, id: Id) -> ClassId {
        self.node(id).class
    }

    /// Whether a class is of that name or a subtype of it. What IFC4X3 renamed answers to the older name too.
    #[inline]
    pub(super) fn is_a(&self, class: ClassId, name: &str) -> bool {
        self.is_named(class, name)
            || match name {
                "IfcBuildingElement" => self.is_named(class, "IfcBuiltElement"),
                "IfcBuildingElementType" => self.is_named(class, "IfcBuiltElementType"),
                _ => false,
            }
    }

    #[inline]
    fn is_named(&self, class: ClassId, name: &str) -> bool {
        match self.schema.find_exact(name) {
            Some(asked) => self.schema.is_subtype(class, asked),
            None => usize::from(class) >= self.schema.len() && self.class_name(class) == name,
        }
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
    pub(super) fn cells(&self, id: Id) -> &[Cell] {
        self.store.cells(self.node(id).values as usize, self.attributes(id).len())
    }

    /// The attributes that the schema does not give it.
    pub(super) fn extras(&self, id: Id) -> &[(Box<str>, Cell)] {
        if self.extras.is_empty() {
            return &[];
        }
        self.extras.get(&id).map_or(&[], |extras| extras)
    }

    /// Who points to an entity.
    pub(super) fn referring(&self, id: Id) -> impl Iterator<Item = Id> {
        let Pointers { starts, from } = self.pointers.get_or_init(|| self.pointers());
        let at = id.0 as usize;
        let range = starts.get(at).zip(starts.get(at + 1)).map(|(start, end)| *start as usize..*end as usize);
        range.and_then(|range| from.get(range)).unwrap_or_default().iter().copied()
    }

    /// Calls with each entity that is pointed to and who points.
    fn each_pointer(&self, mut with: impl FnMut(usize, Id)) {
        for from in (0..self.nodes.len() as u32).map(Id) {
            self.each_reference(from, &mut |to| with(to.0 as usize, from));
        }
    }

    /// Counts who points to each entity, then puts them in their places.
    fn pointers(&self) -> Pointers {
        // who points twice is counted once: its pointers come one after the other
        let mut last = vec![u32::MAX; self.nodes.len()];
        let mut starts = vec![0_u32; self.nodes.len() + 1];
        self.each_pointer(|to, from| {
            if last.get(to).is_some_and(|last| *last != from.0) {
                last[to] = from.0;
                starts[to + 1] += 1;
            }
        });
        for index in 1..starts.len() {
            starts[index] += starts[index - 1];
        }
        let mut from_all = vec![Id(0); starts.last().map_or(0, |all| *all as usize)];
        let mut next = starts.clone();
        last.fill(u32::MAX);
        self.each_pointer(|to, from| {
            if last.get(to).is_some_and(|last| *last != from.0) {
                last[to] = from.0;
                from_all[next[to] as usize] = from;
                next[to] += 1;
            }
        });
        Pointers { starts, from: from_all }
    }

    #[inline]
    fn node(&self, id: Id) -> &Node {
        &self.nodes[id.0 as usize]
    }
}
