//! A required tying force is not carried.

use super::{Context, Rule, shortfall};
use crate::assess::About;
use crate::review::Finding;

const ID: &str = "tying-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/tying-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    shortfall::short(context, ID, About::Tying, "the joint does not carry the tying force of")
}
