//! The schedule's line fits no single joint of the steel.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "joint-not-paired";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/joint-not-paired.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    match (context.scheduled, context.joint) {
        (Some(scheduled), None) if context.unclear => {
            let message = "the schedule's line fits no single joint of the steel (the problems say why)";
            vec![Finding::new(ID, Outcome::Unproven, message).on((Vec::new(), Some(scheduled.at.clone())))]
        }
        _ => Vec::new(),
    }
}
