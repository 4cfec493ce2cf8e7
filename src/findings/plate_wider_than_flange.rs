//! The end plate is wider than the column's flange that it bears on.

use super::compare::more;
use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "plate-wider-than-flange";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/plate-wider-than-flange.md") };

/// A comment: the formulas take the smaller edge distance of both, so the joint's strength is not touched.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(layout) = context.layout.and_then(|layout| layout.on_column()) else { return Vec::new() };
    let Ok(column) = &layout.column.section else { return Vec::new() };
    let (width, flange) = (layout.plate.width, column.value.b);
    if !more(width, flange, context.rulebook.tolerances.position) {
        return Vec::new();
    }
    let message = format!(
        "the end plate is {} wide and the column's flange {}: it stands over by {} in all",
        mm(width),
        mm(flange),
        mm(width - flange)
    );
    let finding = Finding::new(ID, Outcome::Comment, message);
    vec![finding.against(format!("at most {}", mm(flange)), mm(width)).on(context.plate())]
}
