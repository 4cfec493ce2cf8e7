//! The two bolts of a row are not as far apart as intended.

use super::compare::differs;
use super::say::mm;
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "gauge-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/gauge-differs.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let Some(gauge) = intended.gauge else { return Vec::new() };
    let tolerance = context.rulebook.tolerances.position;
    let gauges =
        layout.bolts().rows.iter().map(|row| row.gauge).filter(|detailed| differs(*detailed, gauge, tolerance));
    let Some(worst) = gauges.max_by(|a, b| (*a - gauge).abs().get().total_cmp(&(*b - gauge).abs().get())) else {
        return Vec::new();
    };
    let way = if worst > gauge { "wider" } else { "narrower" };
    let message = format!("the gauge of the bolts is {way} than intended: {} instead of {}", mm(worst), mm(gauge));
    vec![deviation(context, ID, message).against(mm(gauge), mm(worst)).on(context.bolts())]
}
