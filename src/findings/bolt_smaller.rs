//! The bolts are smaller than intended.

use super::compare::less;
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "bolt-smaller";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-smaller.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), Ok(detailed)) = (intended.bolt_diameter, &layout.bolts().diameter) else { return Vec::new() };
    if !less(detailed.value, intended, context.rulebook.tolerances.size) {
        return Vec::new();
    }
    let (intended, detailed) = (format!("M{}", intended.get()), format!("M{}", detailed.value.get()));
    let message = format!("the bolts are smaller than intended: {detailed} instead of {intended}");
    vec![deviation(context, ID, message).against(intended, detailed).on(context.bolts())]
}
