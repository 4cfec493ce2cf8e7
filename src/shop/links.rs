//! Who is related to whom, gathered in one walk over the exchange.

use std::collections::HashMap;
use std::sync::atomic::{AtomicUsize, Ordering};

use foldhash::fast::RandomState;

use crate::exchange::{Entities, Entity, Id, View};

/// Solids that are read of any exchange, and of each entity besides: more is an attack by maps of maps.
const SOLIDS: (usize, usize) = (1_000_000, 16);

/// From entities to entities, in file order for each.
#[derive(Default)]
pub(super) struct Link(Vec<(Id, Id)>);

impl Link {
    /// The entities that one is linked to.
    pub fn of(&self, from: Id) -> impl Iterator<Item = Id> + '_ {
        let start = self.0.partition_point(|(key, _)| *key < from);
        self.0.iter().skip(start).take_while(move |(key, _)| *key == from).map(|(_, to)| *to)
    }

    /// Adds what a relation says from the entities of one attribute to those of another.
    fn relate(&mut self, relation: Entity<'_>, from: &str, to: &str) {
        let targets = relation.value(to);
        ids(relation.value(from), &mut |source| ids(targets, &mut |target| self.0.push((source, target))));
    }
}

/// All relations that the shop reads, and how much may still be read.
#[derive(Default)]
pub(super) struct Links {
    /// Every `IfcElement`.
    pub elements: Vec<Id>,
    /// Every `IfcRelConnectsElements`.
    pub connections: Vec<Id>,
    /// Property sets of an object by relation.
    pub property_sets: Link,
    /// Type of an occurrence.
    pub types: Link,
    /// Material definitions of an object.
    pub materials: Link,
    /// Property sets of a material.
    pub material_properties: Link,
    /// Openings and other subtractions of an element.
    pub voids: Link,
    /// Parts of a whole.
    pub parts: Link,
    /// How many more solids are read: maps and unions can multiply them.
    left: AtomicUsize,
}

/// What an entity tells by its class.
#[derive(Clone, Copy)]
enum Role {
    Element,
    Connection,
    PropertySet,
    Type,
    Material,
    MaterialProperties,
    Void,
    Aggregate,
    None,
}

const ROLES: [(&str, Role); 8] = [
    ("IfcElement", Role::Element),
    ("IfcRelConnectsElements", Role::Connection),
    ("IfcRelDefinesByProperties", Role::PropertySet),
    ("IfcRelDefinesByType", Role::Type),
    ("IfcRelAssociatesMaterial", Role::Material),
    ("IfcMaterialProperties", Role::MaterialProperties),
    ("IfcRelVoidsElement", Role::Void),
    ("IfcRelAggregates", Role::Aggregate),
];

impl Links {
    pub fn of(entities: &Entities) -> Self {
        let mut all = Self::default();
        all.refill(entities);
        // By the address of the class's name: an exchange holds few classes, and very many entities of each.
        let mut roles: HashMap<*const u8, Role, RandomState> = HashMap::default();
        for entity in entities.all() {
            let role = *roles.entry(entity.class().as_ptr()).or_insert_with(|| {
                ROLES.iter().find(|(class, _)| entity.is_a(class)).map_or(Role::None, |(_, role)| *role)
            });
            match role {
                Role::Element => all.elements.push(entity.id),
                Role::Connection => all.connections.push(entity.id),
                Role::PropertySet => {
                    all.property_sets.relate(entity, "RelatedObjects", "RelatingPropertyDefinition");
                }
                Role::Type => all.types.relate(entity, "RelatedObjects", "RelatingType"),
                Role::Material => all.materials.relate(entity, "RelatedObjects", "RelatingMaterial"),
                Role::MaterialProperties => {
                    if let Some(material) = entity.entity("Material") {
                        all.material_properties.0.push((material.id, entity.id));
                    }
                }
                Role::Void => all.voids.relate(entity, "RelatingBuildingElement", "RelatedOpeningElement"),
                Role::Aggregate => all.parts.relate(entity, "RelatingObject", "RelatedObjects"),
                Role::None => {}
            }
        }
        for link in [
            &mut all.property_sets,
            &mut all.types,
            &mut all.materials,
            &mut all.material_properties,
            &mut all.voids,
            &mut all.parts,
        ] {
            link.0.sort_by_key(|(from, _)| *from);
        }
        all
    }

    /// Allows as many solids as an exchange may have.
    pub fn refill(&self, entities: &Entities) {
        self.left.store(SOLIDS.0 + SOLIDS.1 * entities.len(), Ordering::Relaxed);
    }

    /// Takes some solids off what may still be read; false once too many were asked for.
    pub fn spend(&self, solids: usize) -> bool {
        let less = |left: usize| Some(left.saturating_sub(solids));
        self.left.fetch_update(Ordering::Relaxed, Ordering::Relaxed, less).is_ok_and(|left| left >= solids)
    }

    /// Whether nothing more may be read.
    pub fn spent(&self) -> bool {
        self.left.load(Ordering::Relaxed) == 0
    }
}

/// The entities of a value: one, a list, or a list in a defined type (`IfcPropertySetDefinitionSet`).
fn ids(value: View<'_>, see: &mut dyn FnMut(Id)) {
    let value = if let View::Typed(_, inner) = value { inner.view() } else { value };
    match value {
        View::List(list) => list.iter().filter_map(View::entity).for_each(see),
        value => value.entity().into_iter().for_each(see),
    }
}
