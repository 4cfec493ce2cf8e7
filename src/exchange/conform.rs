//! What the schema asks of a graph as a whole, whatever form it was read from.

use super::problems::Problems;
use super::scalar::quoted;
use super::schema::{Base, Kind};
use super::{Entities, Entity, Value};

/// Notes what contradicts the schema and would mislead whoever follows the graph; the graph stays as it is.
pub(super) fn check(entities: &Entities, problems: &mut Problems) {
    for entity in entities.all() {
        for (attribute, value) in entity.known_values() {
            let name = attribute.name;
            check_value(entity, name, attribute.kind, value, problems);
            let end = name.starts_with("Relat") && matches!(attribute.kind.base, Base::Entity(_) | Base::Select);
            if end && *value == Value::Absent && entity.is_a("IfcRelationship") {
                problems.add("relation without an end", entity.spot(), || {
                    format!("{} has no {name} and relates nothing", named(entity))
                });
            }
        }
    }
    check_global_ids(entities, problems);
}

fn check_value(entity: Entity, name: &str, kind: Kind, value: &Value, problems: &mut Problems) {
    let schema = entity.graph().schema();
    let wrong = match (kind.base, value) {
        (_, Value::Absent) | (Base::Any, _) => None,
        (_, Value::List(items)) => {
            return items.iter().for_each(|item| check_value(entity, name, kind, item, problems));
        }
        (Base::Entity(asked), Value::Entity(to)) => {
            let to = entity.graph().get(*to);
            let known = schema.find(to.class()); // of one that is not known nothing can be said
            known
                .filter(|class| !schema.is_subtype(*class, asked))
                .map(|_| format!("is {}, {} is required", named(to), schema.class(asked).map_or("", |c| c.name)))
        }
        (Base::Entity(asked), _) => {
            Some(format!("is a plain value, {} is required", schema.class(asked).map_or("", |c| c.name)))
        }
        (Base::Select, _) => None,
        (_, Value::Entity(to)) => Some(format!("is {}, a plain value is required", named(entity.graph().get(*to)))),
        _ => None,
    };
    if let Some(wrong) = wrong {
        problems.add("value of the wrong kind", entity.spot(), || format!("{name} of {} {wrong}", named(entity)));
    }
}

/// Findings and concessions name parts by GlobalId: it must be there, well-formed and given once. Relations in
/// hand-made files often lack it, and nothing here needs theirs.
fn check_global_ids(entities: &Entities, problems: &mut Problems) {
    let mut given: Vec<(&str, Entity)> = Vec::new();
    for entity in entities.of_class("IfcRoot") {
        match entity.text("GlobalId") {
            Some(guid) if is_global_id(guid) => given.push((guid, entity)),
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
