//! The schedule names a joint that has no steel.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "joint-not-found";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/joint-not-found.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    match (context.scheduled, context.joint) {
        (Some(scheduled), None) if !context.unclear => {
            let message = "the schedule names a joint for which the shop model holds no steel";
            vec![Finding::new(ID, Outcome::Hold, message).on((Vec::new(), Some(scheduled.at.clone())))]
        }
        _ => Vec::new(),
    }
}
