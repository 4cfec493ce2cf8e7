//! The end plate is thinner than intended.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "plate-thinner";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-thinner.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), detailed) = (intended.plate_thickness, layout.side().plate.thickness) else {
        return Vec::new();
    };
    if !less(detailed, intended, context.rulebook.tolerances.size) {
        return Vec::new();
    }
    let message = format!("the end plate is thinner than intended: {} instead of {}", mm(detailed), mm(intended));
    vec![deviation(context, ID, message).against(mm(intended), mm(detailed)).on(context.plate())]
}
