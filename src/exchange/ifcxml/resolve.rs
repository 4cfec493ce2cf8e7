//! The second pass: references become ids, relations get the end that their place in the file implied.

use std::collections::HashSet;

use super::super::waiting::{settle, target};
use super::super::{Exchange, Id, Value, conform};
use super::parser::{Link, Parser};

pub(super) fn resolve(mut parser: Parser, form: String) -> Exchange {
    let targets: Vec<Option<Id>> =
        parser.waiting.iter().map(|w| parser.labels.find(&w.label, &parser.entities)).collect();
    for (waiting, _) in parser.waiting.iter().zip(&targets).filter(|(_, target)| target.is_none()) {
        let label = &waiting.label;
        parser
            .problems
            .add("reference to nothing", waiting.spot, || format!("refers to {label}, but no entity has that id"));
    }
    parser.entities.values_mut().for_each(|value| settle(value, &targets));
    let mut links = std::mem::take(&mut parser.links);
    links.retain_mut(|link| match target(link.relation, &targets) {
        Some(id) => {
            link.relation = id;
            true
        }
        None => false,
    });
    links.sort_by_key(|link| (link.relation, link.attribute)); // stable: parents stay in file order
    for group in links.chunk_by(|a, b| (a.relation, a.attribute) == (b.relation, b.attribute)) {
        fill_in(&mut parser, group);
    }
    conform::check(&parser.entities, &mut parser.problems);
    Exchange { form, entities: parser.entities, problems: parser.problems.finish() }
}

/// Gives one relation the parents in which it stands, beside those it names itself.
fn fill_in(parser: &mut Parser, links: &[Link]) {
    let Some(&Link { relation, attribute, spot, .. }) = links.first() else { return };
    let class = parser.entities.get(relation).class().to_owned();
    let Some((kind, value)) = parser.entities.value_mut(relation, attribute) else {
        parser
            .problems
            .add("relation of the wrong class", spot, || format!("{class} has no {attribute} and cannot stand here"));
        return;
    };
    if kind.depth == 0 {
        for link in links {
            match value {
                Value::Absent => *value = Value::Entity(link.parent),
                Value::Entity(id) if *id == link.parent => {}
                _ => parser.problems.add("relation with two ends for one", link.spot, || {
                    format!("this {class} has one {attribute} already; this second one is not read")
                }),
            }
        }
        return;
    }
    let mut items = match std::mem::take(value) {
        Value::List(items) => items,
        Value::Absent => Vec::new(),
        single => vec![single],
    };
    let mut seen: HashSet<Id> =
        items.iter().filter_map(|item| if let Value::Entity(id) = item { Some(*id) } else { None }).collect();
    items.extend(links.iter().map(|link| link.parent).filter(|id| seen.insert(*id)).map(Value::Entity));
    *value = Value::List(items);
}
