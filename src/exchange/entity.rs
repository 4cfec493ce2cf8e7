//! One entity of the graph and its values.

use super::cell::Cell;
use super::graph::Entities;
use super::problems::Spot;
use super::schema::{Attribute, ClassId};
use super::value::View;
use crate::origin::Place;

/// An entity's index in the graph, in the order of the file.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Id(pub u32);

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
    #[inline]
    pub fn is_a(self, class: &str) -> bool {
        self.graph.is_a(self.graph.class(self.id), class)
    }

    pub(super) fn class_id(self) -> ClassId {
        self.graph.class(self.id)
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
    #[inline]
    pub fn value(self, attribute: &str) -> View<'a> {
        self.graph.value(self.id, attribute).map_or(View::Absent, |cell| self.graph.store.view(*cell))
    }

    /// All attributes with their values, absent ones too: the schema's in its order, then unknown ones.
    pub fn values(self) -> impl Iterator<Item = (&'a str, View<'a>)> {
        let extras = self.graph.extras(self.id).iter().map(|(name, cell)| (&**name, *cell));
        let all = self.known_cells().map(|(attribute, cell)| (attribute.name, cell)).chain(extras);
        all.map(move |(name, cell)| (name, self.graph.store.view(cell)))
    }

    /// The schema's attributes with their values.
    pub(super) fn known_cells(self) -> impl Iterator<Item = (&'static Attribute, Cell)> {
        self.graph.attributes(self.id).iter().zip(self.graph.cells(self.id).iter().copied())
    }

    /// The entities that point here by any attribute, in the order of the file.
    pub fn referring(self) -> impl Iterator<Item = Entity<'a>> {
        self.graph.referring(self.id).map(|id| self.graph.get(id))
    }

    /// The entities of that class (or a subtype) that point here by that attribute, in the order of the file.
    pub fn referring_by(self, class: &str, attribute: &str) -> Vec<Entity<'a>> {
        self.referring().filter(|e| e.is_a(class) && e.each(attribute).any(|to| to.id == self.id)).collect()
    }

    /// A string attribute (also of a SELECT type); empty strings count as absent.
    #[inline]
    pub fn text(self, attribute: &str) -> Option<&'a str> {
        let mut value = self.value(attribute);
        while let View::Typed(_, inner) = value {
            value = inner.view();
        }
        if let View::Text(text) = value { Some(text.trim()).filter(|t| !t.is_empty()) } else { None }
    }

    /// A number attribute (real or integer, also of a SELECT type), in the file's unit.
    #[inline]
    pub fn number(self, attribute: &str) -> Option<f64> {
        self.value(attribute).number()
    }

    /// A list of numbers, such as `Coordinates`; `None` if any item is no number.
    #[inline]
    pub fn numbers(self, attribute: &str) -> Option<Vec<f64>> {
        self.value(attribute).list()?.numbers()
    }

    /// An enumeration item, upper case.
    #[inline]
    pub fn token(self, attribute: &str) -> Option<&'a str> {
        if let View::Token(token) = self.value(attribute) { Some(token) } else { None }
    }

    /// A BOOLEAN attribute.
    #[inline]
    pub fn truth(self, attribute: &str) -> Option<bool> {
        if let View::Truth(truth) = self.value(attribute) { Some(truth) } else { None }
    }

    /// The entity an attribute points to.
    #[inline]
    pub fn entity(self, attribute: &str) -> Option<Entity<'a>> {
        self.value(attribute).entity().map(|id| self.graph.get(id))
    }

    /// The entities of a list attribute (or the single one it holds).
    #[inline]
    pub fn entities(self, attribute: &str) -> Vec<Entity<'a>> {
        let (graph, cells) = (self.graph, self.targets(attribute));
        let mut all = Vec::with_capacity(cells.len());
        all.extend(cells.iter().filter_map(|cell| cell.to_entity()).map(|id| graph.get(id)));
        all
    }

    /// As [`Entity::entities`], one after the other.
    #[inline]
    pub fn each(self, attribute: &str) -> impl Iterator<Item = Entity<'a>> + use<'a> {
        let graph = self.graph;
        self.targets(attribute).iter().filter_map(|cell| cell.to_entity()).map(|id| graph.get(id))
    }

    fn targets(self, attribute: &str) -> &'a [Cell] {
        self.graph.value(self.id, attribute).map_or(&[], |cell| self.graph.store.flat(cell))
    }
}
