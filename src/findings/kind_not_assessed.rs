//! The joint was recognised, and its kind or shape is not assessed.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "kind-not-assessed";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/kind-not-assessed.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(joint) = context.joint else { return Vec::new() };
    let Err(reason) = &joint.layout else { return Vec::new() };
    let finding = Finding::new(ID, Outcome::Unproven, reason).on(context.members());
    vec![Finding { detailed: Some(joint.kind.word().into()), ..finding }]
}
