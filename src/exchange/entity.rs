//! One entity of the graph and its values.

use super::graph::Entities;
use super::problems::Spot;
use super::schema::{Attribute, ClassId};
use super::store::Cell;
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
    pub fn value(self, attribute: &str) -> View<'a> {
        let known = self.graph.attributes(self.id).iter().position(|a| a.name == attribute);
        let cell = known.map_or_else(
            || self.graph.extras(self.id).iter().find(|(name, _)| **name == *attribute).map(|(_, cell)| *cell),
            |index| self.graph.cells(self.id).get(index).copied(),
        );
        cell.map_or(View::Absent, |cell| self.graph.store.view(cell))
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
        self.referring().filter(|e| e.is_a(class) && e.entities(attribute).iter().any(|to| to.id == self.id)).collect()
    }

    /// A string attribute (also of a SELECT type); empty strings count as absent.
    pub fn text(self, attribute: &str) -> Option<&'a str> {
        let mut value = self.value(attribute);
        while let View::Typed(_, inner) = value {
            value = inner.view();
        }
        if let View::Text(text) = value { Some(text.trim()).filter(|t| !t.is_empty()) } else { None }
    }

    /// A number attribute (real or integer, also of a SELECT type), in the file's unit.
    pub fn number(self, attribute: &str) -> Option<f64> {
        self.value(attribute).number()
    }

    /// A list of numbers, such as `Coordinates`; `None` if any item is no number.
    pub fn numbers(self, attribute: &str) -> Option<Vec<f64>> {
        self.value(attribute).list()?.numbers()
    }

    /// An enumeration item, upper case.
    pub fn token(self, attribute: &str) -> Option<&'a str> {
        if let View::Token(token) = self.value(attribute) { Some(token) } else { None }
    }

    /// A BOOLEAN attribute.
    pub fn truth(self, attribute: &str) -> Option<bool> {
        if let View::Truth(truth) = self.value(attribute) { Some(truth) } else { None }
    }

    /// The entity an attribute points to.
    pub fn entity(self, attribute: &str) -> Option<Entity<'a>> {
        self.value(attribute).entity().map(|id| self.graph.get(id))
    }

    /// The entities of a list attribute (or the single one it holds).
    pub fn entities(self, attribute: &str) -> Vec<Entity<'a>> {
        let mut value = self.value(attribute);
        while let View::Typed(_, inner) = value {
            value = inner.view();
        }
        match value {
            View::List(items) => items.iter().filter_map(View::entity).map(|id| self.graph.get(id)).collect(),
            value => value.entity().map(|id| self.graph.get(id)).into_iter().collect(),
        }
    }
}
