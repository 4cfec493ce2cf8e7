//! The schedule names a joint that has no steel.

use super::{Context, Rule};
use crate::intent::fold;
use crate::review::{Finding, Outcome};

const ID: &str = "joint-not-found";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/joint-not-found.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    match (context.scheduled, context.joint) {
        (Some(scheduled), None) if !context.unclear => {
            let message = match members(context) {
                true => "the members that the schedule names are there, and no bolted joint between them was found",
                false => "the schedule names a joint for which the shop model holds no steel",
            };
            vec![Finding::new(ID, Outcome::Hold, message).on((Vec::new(), Some(scheduled.at.clone())))]
        }
        _ => Vec::new(),
    }
}

/// Whether the members that the line names are in the steel, both of them where it names both.
fn members(context: &Context<'_>) -> bool {
    let Some(scheduled) = context.scheduled else { return false };
    let is = |name: &str| {
        let mut members = context.steelwork.members.iter().map(|member| &member.identity);
        members.any(|own| own.guid == *name || own.mark.as_deref().map(fold) == Some(fold(name)))
    };
    let mut named = [&scheduled.supported, &scheduled.supporting].into_iter().flatten().peekable();
    named.peek().is_some() && named.all(|name| is(name))
}
