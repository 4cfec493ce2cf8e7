//! A head, a nut or a washer clashes with a flange, a web, a weld, a root radius or a stiffener beside it.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, room};
use crate::review::{Finding, Outcome};

const ID: &str = "head-without-room";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/head-without-room.md") };

/// The smallest head of the product standards that clashes is a hold; a washer, which nobody says is there, a comment.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let diameter = context.layout.and_then(|layout| layout.bolts().diameter.as_ref().ok());
    let Some(size) = diameter.and_then(|d| context.rulebook.bolt_size(d.value)) else { return Vec::new() };
    let tolerance = context.rulebook.tolerances.position;
    let clash = |beside: room::Beside<'_>| {
        let part = |what: &str, needs| {
            let message = format!(
                "{what} of the bolts in the row at {} does not fit beside {}{}: {} from the bolt's axis, it needs {}",
                mm(beside.row),
                beside.what.0,
                beside.what.1,
                mm(beside.distance),
                mm(needs)
            );
            (message, format!("at least {}", mm(needs)))
        };
        let (head, washer) = (0.5 * size.across_corners, 0.5 * size.washer);
        let ((message, least), severity) = if less(beside.distance, head, tolerance) {
            (part("head or nut", head), Outcome::Hold)
        } else if less(beside.distance, washer, tolerance) {
            (part("a washer", washer), Outcome::Comment)
        } else {
            return None;
        };
        Some(Finding::new(ID, severity, message).against(least, mm(beside.distance)).on(context.parts(beside.on)))
    };
    room::beside(context).into_iter().filter_map(clash).collect()
}
