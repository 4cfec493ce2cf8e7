//! Nobody states the steel grade of the end plate.

use super::{Context, Rule};
use crate::joints::Layout;
use crate::review::{Finding, Outcome};

const ID: &str = "plate-grade-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-grade-unknown.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let sides = context.layout.into_iter().flat_map(Layout::sides);
    let unknown = sides.filter_map(|side| {
        let missing = side.plate.grade.as_ref().err()?;
        let (elements, place) = context.plate_of(side);
        let message = format!("the steel grade of the end plate{} is not known: {}", side.which.of(), missing.reason);
        Some(Finding::new(ID, Outcome::Unproven, message).on((elements, missing.at.clone().or(place))))
    });
    unknown.collect()
}
