//! The joint was detailed upside down.

use super::say::heights;
use super::{Context, Rule, deviation, rows};
use crate::review::Finding;

const ID: &str = "joint-handed-wrong";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/joint-handed-wrong.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let (Some((layout, intended)), true) = (context.both(), rows::upside_down(context)) else { return Vec::new() };
    let message = "the joint is detailed upside down: what was intended at one flange stands at the other".into();
    let finding = deviation(context, ID, message).on(context.plate());
    vec![match (&intended.rows, intended.plate_top.zip(intended.plate_bottom)) {
        (Some(rows), _) => finding.against(
            format!("rows at {}", heights(rows.iter().copied())),
            format!("rows at {}", heights(layout.bolts().rows.iter().map(|row| row.height))),
        ),
        (None, Some((top, bottom))) => finding.against(
            format!("plate edges at {}", heights([top, bottom])),
            format!("plate edges at {}", heights([layout.side().plate.top, layout.side().plate.bottom])),
        ),
        (None, None) => finding,
    }]
}
