//! The end plate is of a lower steel grade than intended.

use super::compare::{Strength, grades};
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "plate-grade-lower";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-grade-lower.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let lower = context.plates().filter_map(|(side, intended)| {
        let (intended, detailed) = (intended.plate_grade.as_ref()?, side.plate.grade.as_ref().ok()?);
        let strength = grades(context.rulebook, &detailed.value, intended, Some(side.plate.thickness));
        if !matches!(strength, Strength::Lower | Strength::Unranked) {
            return None;
        }
        let (of, detailed) = (side.which.of(), &detailed.value.0);
        let message =
            format!("the grade of the end plate{of} is {}: {detailed} instead of {intended}", strength.word());
        Some(deviation(context, ID, message).against(intended, detailed).on(context.plate_of(side)))
    });
    lower.collect()
}
