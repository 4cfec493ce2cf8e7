//! The bolts are larger than intended.

use super::compare::more;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "bolt-larger";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-larger.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), Ok(detailed)) = (intended.bolt_diameter, &layout.bolts().diameter) else { return Vec::new() };
    if !more(detailed.value, intended, context.rulebook.tolerances.size) {
        return Vec::new();
    }
    let (intended, detailed) = (format!("M{}", intended.get()), format!("M{}", detailed.value.get()));
    let message = format!("the bolts are larger than intended: {detailed} instead of {intended}");
    vec![Finding::new(ID, Outcome::Comment, message).against(intended, detailed).on(context.bolts())]
}
