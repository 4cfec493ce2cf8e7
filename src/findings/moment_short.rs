//! A required moment is not carried.

use super::{Context, Rule, shortfall};
use crate::assess::About;
use crate::review::Finding;

const ID: &str = "moment-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/moment-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    shortfall::short(context, ID, About::Moment, "the joint does not carry the moment of")
}
