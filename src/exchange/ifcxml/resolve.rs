//! The second pass: references become ids, relations get the end that their place in the file implied.

use std::collections::HashSet;

use rayon::prelude::*;

use super::super::cell::Cell;
use super::super::waiting::WAITING;
use super::super::{Exchange, Id, conform};
use super::parser::{Link, Parser};

pub(super) fn resolve(mut parser: Parser, form: String) -> Exchange {
    let targets: Vec<Option<Id>> =
        parser.waiting.par_iter().map(|w| parser.labels.find(&w.label, &parser.entities)).collect();
    for (waiting, _) in parser.waiting.iter().zip(&targets).filter(|(_, target)| target.is_none()) {
        let label = &waiting.label;
        parser
            .problems
            .add("reference to nothing", waiting.spot, || format!("refers to {label}, but no entity has that id"));
    }
    let target = |id: Id| match id.0.checked_sub(WAITING) {
        Some(index) => targets.get(index as usize).copied().flatten(),
        None => Some(id),
    };
    if parser.entities.settle(target) {
        parser.entities.drop_waiting();
    }
    let mut links = std::mem::take(&mut parser.links);
    links.retain_mut(|link| match target(link.relation) {
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
    let Some((index, kind)) = parser.entities.attribute(relation, attribute) else {
        parser
            .problems
            .add("relation of the wrong class", spot, || format!("{class} has no {attribute} and cannot stand here"));
        return;
    };
    let mut held = parser.entities.cell(relation, index);
    if kind.depth == 0 {
        for link in links {
            if held.is_absent() {
                held = Cell::entity(link.parent);
            } else if held.to_entity() != Some(link.parent) {
                parser.problems.add("relation with two ends for one", link.spot, || {
                    format!("this {class} has one {attribute} already; this second one is not read")
                });
            }
        }
        return parser.entities.set(relation, index, held);
    }
    let mut items: Vec<Cell> = match held {
        Cell::ABSENT => Vec::new(),
        list if list.is_list() => parser.entities.store.items(list).to_vec(),
        single => vec![single],
    };
    let mut seen: HashSet<Id> = items.iter().filter_map(|item| item.to_entity()).collect();
    items.extend(links.iter().map(|link| link.parent).filter(|id| seen.insert(*id)).map(Cell::entity));
    let list = parser.entities.store.list(&items);
    parser.entities.set(relation, index, list);
}
