//! The bolts are of a higher strength class than intended.

use super::compare::{Strength, classes};
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "bolt-class-higher";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-class-higher.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), Ok(detailed)) = (&intended.bolt_class, &layout.bolts().class) else { return Vec::new() };
    if classes(context.rulebook, &detailed.value, intended) != Strength::Higher {
        return Vec::new();
    }
    let detailed = &detailed.value;
    let message = format!("the bolt class is higher than intended: {detailed} instead of {intended}");
    vec![Finding::new(ID, Outcome::Comment, message).against(intended, detailed).on(context.bolts())]
}
