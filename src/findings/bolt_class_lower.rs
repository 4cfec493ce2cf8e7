//! The bolts are of a lower strength class than intended.

use super::compare::{Strength, classes};
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "bolt-class-lower";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-class-lower.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), Ok(detailed)) = (&intended.bolt_class, &layout.bolts().class) else { return Vec::new() };
    let strength = classes(context.rulebook, &detailed.value, intended);
    if !matches!(strength, Strength::Lower | Strength::Unranked) {
        return Vec::new();
    }
    let detailed = &detailed.value;
    let message = format!("the bolt class is {}: {detailed} instead of {intended}", strength.word());
    vec![deviation(context, ID, message).against(intended, detailed).on(context.bolts())]
}
