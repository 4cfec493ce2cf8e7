//! Nobody states the steel grade of the end plate.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "plate-grade-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-grade-unknown.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(Err(missing)) = context.layout.map(|layout| &layout.side().plate.grade) else { return Vec::new() };
    let (elements, place) = context.plate();
    let message = format!("the steel grade of the end plate is not known: {}", missing.reason);
    vec![Finding::new(ID, Outcome::Unproven, message).on((elements, missing.at.clone().or(place)))]
}
