//! Nobody states the strength class of the bolts.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};
use crate::shop::COUNTERSUNK;

const ID: &str = "bolt-class-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-class-unknown.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(Err(missing)) = context.layout.map(|layout| &layout.bolts().class) else { return Vec::new() };
    // Their class may well be known; it is not what is missing.
    if missing.what == COUNTERSUNK {
        return Vec::new();
    }
    let (elements, place) = context.bolts();
    let message = format!("the strength class of the bolts is not known: {}", missing.reason);
    vec![Finding::new(ID, Outcome::Unproven, message).on((elements, missing.at.clone().or(place)))]
}
