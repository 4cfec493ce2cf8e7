//! Nobody states the throat of a weld between beam and end plate.

use super::say::and;
use super::{Context, Rule};
use crate::joints::Layout;
use crate::review::{Finding, Outcome};

const ID: &str = "weld-not-found";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/weld-not-found.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let sides = context.layout.into_iter().flat_map(Layout::sides);
    let unknown = sides.filter_map(|side| {
        let welds = side.welds;
        let places = [("top flange", &welds.flange_top), ("bottom flange", &welds.flange_bottom), ("web", &welds.web)];
        let unknown: Vec<_> =
            places.into_iter().filter_map(|(place, weld)| Some((place, weld.as_ref().err()?))).collect();
        let (_, first) = unknown.first()?;
        let names: Vec<String> = unknown.iter().map(|(place, _)| (*place).into()).collect();
        let mut reasons: Vec<String> = unknown.iter().map(|(_, missing)| missing.reason.clone()).collect();
        reasons.dedup();
        let owner = side.which.owner();
        let message =
            format!("no throat is known of the welds at the {owner}beam's {}: {}", and(&names), reasons.join("; "));
        let (elements, place) = context.plate_of(side);
        Some(Finding::new(ID, Outcome::Unproven, message).on((elements, first.at.clone().or(place))))
    });
    unknown.collect()
}
