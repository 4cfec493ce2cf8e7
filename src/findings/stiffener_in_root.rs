//! A corner of a column stiffener lies in the column's root radius.

use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};
use crate::shop::{Member, Plate};
use crate::units::Length;

const ID: &str = "stiffener-in-root";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/stiffener-in-root.md") };

/// A comment, of the corner that lies deepest; nothing where nobody knows the radius.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(joint) = context.joint else { return Vec::new() };
    let Some(column) = joint.supporting.and_then(|i| context.steelwork.members.get(i)) else { return Vec::new() };
    let stiffeners = joint.plates.iter().filter(|(_, role)| *role == "stiffener");
    let stiffeners = stiffeners.filter_map(|(index, _)| context.steelwork.plates.get(*index));
    let deep = stiffeners.filter_map(|plate| Some((plate, deepest(column, plate)?)));
    let deep: Vec<(&Plate, Length)> = deep.filter(|(_, d)| *d > context.rulebook.tolerances.position).collect();
    let Some(worst) = deep.iter().map(|(_, d)| *d).reduce(Length::max) else { return Vec::new() };
    let message = format!("a corner of a column stiffener lies {} deep in the column's root radius", mm(worst));
    let guids = deep.iter().map(|(plate, _)| plate.identity.guid.as_str());
    vec![Finding::new(ID, Outcome::Comment, message).on(context.parts(guids))]
}

/// How deep the plate's outline reaches into the fillets between web and flanges. Along an edge the distance from the
/// fillet's centre is largest at an end, so corners tell all. `None` where the radius is not known.
fn deepest(column: &Member, plate: &Plate) -> Option<Length> {
    let section = &column.section.as_ref().ok()?.value;
    let r = section.r?;
    let centre = (0.5 * section.t_w + r, 0.5 * section.h - section.t_f - r);
    let corners = plate.outline.iter().map(|p| plate.centre + plate.u * p.x + plate.v * p.y - column.start);
    let depth = |p: glam::DVec3| {
        let (x, y) = (Length(p.dot(column.across)).abs() - centre.0, Length(p.dot(column.depth)).abs() - centre.1);
        let beside = Length(x.get().hypot(y.get()));
        // Towards the corner the fillet's steel begins at r from its centre.
        if x < Length::ZERO && y > Length::ZERO { beside - r } else { Length::ZERO }
    };
    corners.map(depth).reduce(Length::max)
}
