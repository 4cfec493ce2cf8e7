//! The end plate is thicker than intended.

use super::compare::more;
use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "plate-thicker";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-thicker.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let (Some(intended), detailed) = (intended.plate_thickness, layout.side().plate.thickness) else {
        return Vec::new();
    };
    if !more(detailed, intended, context.rulebook.tolerances.size) {
        return Vec::new();
    }
    let message = format!(
        "the end plate is thicker than intended: {} instead of {}; the bolts may become the weak link",
        mm(detailed),
        mm(intended)
    );
    vec![Finding::new(ID, Outcome::Comment, message).against(mm(intended), mm(detailed)).on(context.plate())]
}
