//! The end plate is thinner than intended.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "plate-thinner";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-thinner.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let thinner = context.plates().filter_map(|(side, intended)| {
        let (intended, detailed) = (intended.plate_thickness?, side.plate.thickness);
        if !less(detailed, intended, context.rulebook.tolerances.size) {
            return None;
        }
        let of = side.which.of();
        let message =
            format!("the end plate{of} is thinner than intended: {} instead of {}", mm(detailed), mm(intended));
        Some(deviation(context, ID, message).against(mm(intended), mm(detailed)).on(context.plate_of(side)))
    });
    thinner.collect()
}
