//! A required shear is not carried.

use super::{Context, Rule, shortfall};
use crate::assess::About;
use crate::review::Finding;

const ID: &str = "shear-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/shear-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    shortfall::short(context, ID, About::Shear, "the joint does not carry the shear of")
}
