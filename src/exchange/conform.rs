//! What the schema asks of a graph as a whole, whatever form it was read from.

use std::collections::HashSet;
use std::ops::Range;

use foldhash::fast::RandomState;
use rayon::prelude::*;

use super::cell::Cell;
use super::problems::Problems;
use super::scalar::quoted;
use super::schema::{Attribute, Base, Kind};
use super::{Entities, Entity, Id};

/// Notes what contradicts the schema and would mislead whoever follows the graph; the graph stays as it is.
pub(super) fn check(entities: &Entities, problems: &mut Problems) {
    let some = || problems.without_any();
    let all = entities.len();
    let parts = rayon::current_num_threads().clamp(1, all / 10_000 + 1);
    let bound = |part: usize| (all / parts * part) as u32;
    let part = |part: usize| {
        let end = if part + 1 == parts { all as u32 } else { bound(part + 1) };
        let mut problems = some();
        check_values(entities, bound(part)..end, &mut problems);
        problems
    };
    let mut ids = some();
    let values = || (0..parts).into_par_iter().map(part).collect();
    let (values, ()): (Vec<Problems>, ()) = rayon::join(values, || check_global_ids(entities, &mut ids));
    values.into_iter().chain([ids]).for_each(|more| problems.absorb(more));
}

fn check_values(entities: &Entities, ids: Range<u32>, problems: &mut Problems) {
    let relationship = entities.schema().find("IfcRelationship");
    for entity in ids.map(|id| entities.get(Id(id))) {
        let is_relation = relationship.is_some_and(|asked| entities.schema().is_subtype(entity.class_id(), asked));
        for (attribute, cell) in entity.known_cells() {
            if !cell.is_absent() {
                check_value(entity, attribute, attribute.kind, cell, problems);
            } else if is_relation && is_end(attribute) {
                let name = attribute.name;
                problems.add("relation without an end", entity.spot(), || {
                    format!("{} has no {name} and relates nothing", named(entity))
                });
            }
        }
    }
}

fn is_end(attribute: &Attribute) -> bool {
    attribute.name.starts_with("Relat") && matches!(attribute.kind.base, Base::Entity(_) | Base::Select)
}

fn check_value(entity: Entity, attribute: &Attribute, kind: Kind, cell: Cell, problems: &mut Problems) {
    let graph = entity.graph();
    let schema = graph.schema();
    let wrong = match (kind.base, cell.to_entity()) {
        (Base::Any | Base::Select, _) => None,
        (Base::Entity(_), None) if cell.is_list() => {
            let items = graph.store.items(cell).iter();
            return items.for_each(|item| check_value(entity, attribute, kind, *item, problems));
        }
        (_, None) if cell.is_list() => {
            let items = graph.store.items(cell).iter().filter(|item| item.is_list() || item.to_entity().is_some());
            return items.for_each(|item| check_value(entity, attribute, kind, *item, problems));
        }
        (Base::Entity(asked), Some(to)) => {
            let to = graph.get(to);
            let known = schema.class(to.class_id()); // of one that is not known nothing can be said
            known
                .filter(|_| !schema.is_subtype(to.class_id(), asked))
                .map(|_| format!("is {}, {} is required", named(to), schema.class(asked).map_or("", |c| c.name)))
        }
        (Base::Entity(_), None) if cell.is_absent() => None,
        (Base::Entity(asked), None) => {
            Some(format!("is a plain value, {} is required", schema.class(asked).map_or("", |c| c.name)))
        }
        (_, Some(to)) => Some(format!("is {}, a plain value is required", named(graph.get(to)))),
        (_, None) => None,
    };
    if let Some(wrong) = wrong {
        problems.add("value of the wrong kind", entity.spot(), || {
            format!("{} of {} {wrong}", attribute.name, named(entity))
        });
    }
}

/// Findings and concessions name parts by GlobalId: it must be there, well-formed and given once. Relations in
/// hand-made files often lack it, and nothing here needs theirs.
fn check_global_ids(entities: &Entities, problems: &mut Problems) {
    let mut given: Vec<(&str, Entity)> = Vec::new();
    let mut known: HashSet<&str, RandomState> = HashSet::default();
    let mut is_repeated = false;
    for entity in entities.of_class("IfcRoot") {
        match entity.text("GlobalId") {
            Some(guid) if is_global_id(guid) => {
                given.push((guid, entity));
                is_repeated |= !known.insert(guid);
            }
            Some(guid) => problems.add("GlobalId that is none", entity.spot(), || {
                format!(
                    "the GlobalId {} of {} is not 22 characters of 0-9 A-Z a-z _ $ from 0 to 3",
                    quoted(guid),
                    named(entity)
                )
            }),
            None if entity.is_a("IfcElement") => {
                problems
                    .add("element without a GlobalId", entity.spot(), || format!("{} has no GlobalId", named(entity)));
            }
            None => {}
        }
    }
    if !is_repeated {
        return;
    }
    given.sort_by_key(|(guid, entity)| (*guid, entity.id));
    for same in given.chunk_by(|(a, _), (b, _)| a == b) {
        for (guid, entity) in same.iter().skip(1) {
            problems.add("GlobalId given twice", entity.spot(), || {
                format!("the GlobalId {guid} of {} is also that of {}", named(*entity), named(same[0].1))
            });
        }
    }
}

/// 22 digits of base 64 for 128 bits, so the first carries two bits only (IFC4, IfcGloballyUniqueId).
fn is_global_id(text: &str) -> bool {
    text.len() == 22
        && text.starts_with(['0', '1', '2', '3'])
        && text.chars().all(|c| c.is_ascii_alphanumeric() || c == '_' || c == '$')
}

/// An entity as a user can find it.
fn named(entity: Entity) -> String {
    match entity.label() {
        "" => entity.class().to_owned(),
        label => format!("{} {label}", entity.class()),
    }
}
