//! The welds between beam and end plate do not carry what is required.

use super::{Context, Rule, shortfall};
use crate::assess::About;
use crate::review::Finding;

const ID: &str = "weld-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/weld-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    shortfall::short(context, ID, About::Weld, "the welds between beam and end plate do not carry")
}
