//! A head or nut fits, but the tool that turns it does not.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, room};
use crate::review::{Finding, Outcome};

const ID: &str = "tool-without-room";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/tool-without-room.md") };

/// A comment. What the head itself clashes with, `head-without-room` tells.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let diameter = context.layout.and_then(|layout| layout.bolts().diameter.as_ref().ok());
    let Some(size) = diameter.and_then(|d| context.rulebook.bolt_size(d.value)) else { return Vec::new() };
    let tolerance = context.rulebook.tolerances.position;
    let socket = 0.5 * context.rulebook.distances.socket * size.across_flats;
    let fits = (0.5 * size.across_corners).max(0.5 * size.washer);
    let tight = room::beside(context)
        .into_iter()
        .filter(|beside| !less(beside.distance, fits, tolerance) && less(beside.distance, socket, tolerance));
    let finding = |beside: room::Beside<'_>| {
        let message = format!(
            "a socket hardly fits on the bolts in the row at {} beside {}{}: {} from the bolt's axis, {} are wanted \
             (common practice without a source)",
            mm(beside.row),
            beside.what.0,
            beside.what.1,
            mm(beside.distance),
            mm(socket)
        );
        let (wanted, there) = (format!("at least {}", mm(socket)), mm(beside.distance));
        Finding::new(ID, Outcome::Comment, message).against(wanted, there).on(context.parts(beside.on))
    };
    tight.map(finding).collect()
}
