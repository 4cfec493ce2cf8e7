//! Shipping pieces and explicit relations.

use std::collections::{BTreeMap, BTreeSet};

use super::reading::Reading;
use super::{Part, Piece, Told};
use crate::exchange::{Entity, Id};

/// Assemblies nest; deeper than this is a mistake.
const DEPTH: usize = 16;

impl<'a> Reading<'a> {
    /// The piece that a whole holds together, parts of its parts included; `None` if no part of it was taken up.
    pub fn piece(&self, whole: Entity<'a>, parts: &BTreeMap<Id, Vec<Part>>) -> Option<Piece> {
        let mut inside = BTreeSet::new();
        self.descend(whole, 0, &mut inside);
        let held: Vec<Part> = inside.iter().filter_map(|id| parts.get(id)).flatten().copied().collect();
        if held.is_empty() {
            return None;
        }
        Some(Piece { identity: self.identity(whole), parts: held })
    }

    fn descend(&self, whole: Entity<'a>, depth: usize, into: &mut BTreeSet<Id>) {
        for part in self.parts_of(whole) {
            if depth >= DEPTH {
                self.problem(
                    whole,
                    format!("Assemblies nest deeper than {DEPTH} levels here; what lies below is left out."),
                );
            } else if into.insert(part.id) {
                self.descend(part, depth + 1, into);
            }
        }
    }

    /// Relations that say which parts are connected, and by what.
    pub fn told(&self, parts: &BTreeMap<Id, Vec<Part>>) -> Vec<Told> {
        let mut all = Vec::new();
        for id in &self.links.connections {
            let relation = self.entities.get(*id);
            if relation.is_a("IfcRelConnectsPathElements") {
                continue;
            }
            let mut between = Vec::new();
            for end in ["RelatingElement", "RelatedElement"] {
                let Some(element) = relation.entity(end) else {
                    self.problem(relation, format!("{} lacks its {end}.", relation.class()));
                    continue;
                };
                match self.parts_at(element, parts) {
                    Some(found) => between.extend(found),
                    None => self.problem(
                        relation,
                        format!(
                            "{} joins {} \"{}\", which was not taken up; that end is left out.",
                            relation.class(),
                            element.class(),
                            element.text("Name").unwrap_or_else(|| element.label())
                        ),
                    ),
                }
            }
            let realizing = relation.entities("RealizingElements");
            let by: Vec<Part> = realizing.iter().filter_map(|e| parts.get(&e.id)).flatten().copied().collect();
            if by.is_empty() && !realizing.is_empty() {
                self.problem(relation, "None of the parts that realise this connection was taken up.");
            }
            if between.is_empty() && by.is_empty() {
                continue;
            }
            let name = relation.text("Name").map(str::to_owned);
            all.push(Told { name, between, by, place: relation.place() });
        }
        all
    }

    /// The parts at a relation's end; of an assembly its only member, if it has just one.
    fn parts_at(&self, element: Entity<'a>, parts: &BTreeMap<Id, Vec<Part>>) -> Option<Vec<Part>> {
        if let Some(found) = parts.get(&element.id) {
            return Some(found.clone());
        }
        let members: Vec<Part> =
            self.piece(element, parts)?.parts.into_iter().filter(|part| matches!(part, Part::Member(_))).collect();
        (members.len() == 1).then_some(members)
    }
}
