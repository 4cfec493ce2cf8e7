//! A required axial force is not carried.

use super::{Context, Rule, shortfall};
use crate::assess::About;
use crate::review::Finding;

const ID: &str = "axial-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/axial-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    shortfall::short(context, ID, About::Force, "the joint does not carry the axial force of")
}
