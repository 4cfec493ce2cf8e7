//! Nobody states the diameter of the bolts, or of their holes.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "bolt-size-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-size-unknown.md") };

/// A hole whose diameter is unknown only because the bolt's is makes no finding of its own.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(bolts) = context.layout.map(|layout| layout.bolts()) else { return Vec::new() };
    let (what, missing) = match (&bolts.diameter, &bolts.hole) {
        (Err(missing), _) => ("the diameter of the bolts is", missing),
        (Ok(_), Err(missing)) => ("the diameter of the bolts' holes is", missing),
        (Ok(_), Ok(_)) => return Vec::new(),
    };
    let (elements, place) = context.bolts();
    let message = format!("{what} not known: {}", missing.reason);
    vec![Finding::new(ID, Outcome::Unproven, message).on((elements, missing.at.clone().or(place)))]
}
