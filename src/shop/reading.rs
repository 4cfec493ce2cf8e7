//! What the takers of parts share: the graph, the units, who is related to whom, and the problems met on the way.

use std::cell::{Cell, RefCell};
use std::collections::BTreeMap;
use std::rc::Rc;

use glam::DAffine3;

use super::Identity;
use super::solid::Solid;
use super::units::Units;
use crate::exchange::{Entities, Entity, Exchange, Id, View};
use crate::origin::Problem;
use crate::rulebook::Rulebook;

/// One reading of an exchange.
pub(super) struct Reading<'a> {
    pub entities: &'a Entities,
    pub rulebook: &'a Rulebook,
    pub units: Units,
    /// Property sets of an object by relation.
    property_sets: BTreeMap<Id, Vec<Id>>,
    /// Type of an occurrence.
    types: BTreeMap<Id, Id>,
    /// Material definitions of an object.
    materials: BTreeMap<Id, Vec<Id>>,
    /// Property sets of a material.
    material_properties: BTreeMap<Id, Vec<Id>>,
    /// Openings and other subtractions of an element.
    voids: BTreeMap<Id, Vec<Id>>,
    /// Parts of a whole.
    parts: BTreeMap<Id, Vec<Id>>,
    /// World placements that were already computed.
    pub placements: RefCell<BTreeMap<Id, DAffine3>>,
    /// Solids of items that more than one part may use.
    pub solids_of: RefCell<BTreeMap<Id, Rc<Vec<Solid>>>>,
    /// How many more solids are read: maps and unions can multiply them.
    left: Cell<usize>,
    problems: RefCell<Vec<Problem>>,
}

/// Solids that are read of any exchange, and of each entity besides: more is an attack by maps of maps.
const SOLIDS: (usize, usize) = (1_000_000, 16);

impl<'a> Reading<'a> {
    pub fn new(exchange: &'a Exchange, rulebook: &'a Rulebook) -> Self {
        let mut problems = Vec::new();
        let units = Units::read(exchange, &mut problems);
        let entities = &exchange.entities;
        let mut material_properties: BTreeMap<Id, Vec<Id>> = BTreeMap::new();
        for set in entities.of_class("IfcMaterialProperties") {
            if let Some(material) = set.entity("Material") {
                material_properties.entry(material.id).or_default().push(set.id);
            }
        }
        let types = related(entities, "IfcRelDefinesByType", "RelatedObjects", "RelatingType");
        Self {
            entities,
            rulebook,
            units,
            property_sets: related(
                entities,
                "IfcRelDefinesByProperties",
                "RelatedObjects",
                "RelatingPropertyDefinition",
            ),
            types: types.into_iter().filter_map(|(id, of)| Some((id, *of.first()?))).collect(),
            materials: related(entities, "IfcRelAssociatesMaterial", "RelatedObjects", "RelatingMaterial"),
            material_properties,
            voids: related(entities, "IfcRelVoidsElement", "RelatingBuildingElement", "RelatedOpeningElement"),
            parts: related(entities, "IfcRelAggregates", "RelatingObject", "RelatedObjects"),
            placements: RefCell::default(),
            solids_of: RefCell::default(),
            left: Cell::new(SOLIDS.0 + SOLIDS.1 * entities.len()),
            problems: RefCell::new(problems),
        }
    }

    /// Notes what could not be understood.
    pub fn problem(&self, at: Entity<'_>, message: impl Into<String>) {
        self.problems.borrow_mut().push(Problem { at: Some(at.place()), message: message.into() });
    }

    /// All problems in file order, each once.
    pub fn into_problems(self) -> Vec<Problem> {
        let mut problems = self.problems.into_inner();
        problems.sort();
        problems.dedup();
        problems
    }

    /// Takes some solids off what may still be read; false once too many were asked for.
    pub fn spend(&self, solids: usize) -> bool {
        let left = self.left.get().checked_sub(solids);
        self.left.set(left.unwrap_or(0));
        left.is_some()
    }

    pub fn type_of(&self, object: Entity<'_>) -> Option<Entity<'a>> {
        self.types.get(&object.id).map(|id| self.entities.get(*id))
    }

    pub fn property_sets_of(&self, object: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.property_sets, object)
    }

    /// The object's own material definitions, else those of its type.
    pub fn materials_of(&self, object: Entity<'_>) -> Vec<Entity<'a>> {
        let own = self.several(&self.materials, object);
        match self.type_of(object) {
            Some(of_type) if own.is_empty() => self.several(&self.materials, of_type),
            _ => own,
        }
    }

    pub fn material_properties_of(&self, material: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.material_properties, material)
    }

    pub fn voids_of(&self, element: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.voids, element)
    }

    pub fn parts_of(&self, whole: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.parts, whole)
    }

    fn several(&self, of: &BTreeMap<Id, Vec<Id>>, key: Entity<'_>) -> Vec<Entity<'a>> {
        of.get(&key.id).into_iter().flatten().map(|id| self.entities.get(*id)).collect()
    }

    /// The names that a part bears, with what bears them; the part's own first.
    pub fn names_of(&self, element: Entity<'_>) -> Vec<(String, &'a str)> {
        let element = self.entities.get(element.id);
        let own = ["Name", "ObjectType", "Description"].map(|attribute| (attribute.to_owned(), element, attribute));
        let of_type = self.type_of(element).into_iter().flat_map(|t| {
            ["Name", "ElementType", "Description"].map(|attribute| (format!("{attribute} of its type"), t, attribute))
        });
        own.into_iter()
            .chain(of_type)
            .filter_map(|(by, entity, attribute)| Some((by, entity.text(attribute)?)))
            .collect()
    }

    /// `PredefinedType` of the part, or of its type where the part leaves it open.
    pub fn predefined(&self, element: Entity<'_>) -> Option<&'a str> {
        let own = self.entities.get(element.id).token("PredefinedType");
        own.filter(|t| *t != "NOTDEFINED").or_else(|| self.type_of(element)?.token("PredefinedType")).or(own)
    }

    /// Who a part is. The mark is its Tag, else a property that means one; the tag of a type marks nothing.
    pub fn identity(&self, element: Entity<'_>) -> Identity {
        let mark = element.text("Tag").map(str::to_owned).or_else(|| {
            let properties = self.properties_of(element);
            let marks = |p: &&super::properties::Property<'_>| {
                self.rulebook.means("mark", p.name) || (p.name == "Reference" && p.set.starts_with("Pset_"))
            };
            properties.iter().filter(|p| !p.of_type).find(marks).and_then(|p| p.text())
        });
        Identity {
            guid: element.text("GlobalId").unwrap_or_default().to_owned(),
            class: element.class().to_owned(),
            name: element.text("Name").or(element.text("ObjectType")).unwrap_or_default().to_owned(),
            mark,
            place: element.place(),
        }
    }
}

/// From each entity of `from` to those of `to`, over all relations of one class, in file order.
fn related(entities: &Entities, class: &str, from: &str, to: &str) -> BTreeMap<Id, Vec<Id>> {
    let mut all: BTreeMap<Id, Vec<Id>> = BTreeMap::new();
    for relation in entities.of_class(class) {
        let targets = ids(relation.value(to));
        for source in ids(relation.value(from)) {
            all.entry(source).or_default().extend(&targets);
        }
    }
    all
}

/// The entities of a value: one, a list, or a list in a defined type (`IfcPropertySetDefinitionSet`).
fn ids(value: View) -> Vec<Id> {
    let value = if let View::Typed(_, inner) = value { inner.view() } else { value };
    match value {
        View::List(list) => list.iter().filter_map(View::entity).collect(),
        value => value.entity().into_iter().collect(),
    }
}
