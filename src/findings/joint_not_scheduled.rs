//! The steel holds a joint that no line of the schedule names.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "joint-not-scheduled";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/joint-not-scheduled.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    match (context.joint, context.scheduled) {
        (Some(_), None) if context.schedule_given => {
            let message = "no line of the schedule names this joint, so nothing is known of what it has to carry";
            vec![Finding::new(ID, Outcome::Unproven, message).on(context.members())]
        }
        _ => Vec::new(),
    }
}
