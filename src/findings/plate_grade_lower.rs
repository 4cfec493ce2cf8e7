//! The end plate is of a lower steel grade than intended.

use super::compare::{Strength, grades};
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "plate-grade-lower";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-grade-lower.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), Ok(detailed)) = (&intended.plate_grade, &layout.side().plate.grade) else { return Vec::new() };
    let strength = grades(context.rulebook, &detailed.value, intended, Some(layout.side().plate.thickness));
    if !matches!(strength, Strength::Lower | Strength::Unranked) {
        return Vec::new();
    }
    let detailed = &detailed.value.0;
    let message = format!("the grade of the end plate is {}: {detailed} instead of {intended}", strength.word());
    vec![deviation(context, ID, message).against(intended, detailed).on(context.plate())]
}
