//! A bolt row is not at its intended height.

use super::compare::differs;
use super::say::{and, heights, mm};
use super::{Context, Rule, deviation, rows};
use crate::review::Finding;

const ID: &str = "row-moved";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/row-moved.md") };

/// Silent on a joint that was detailed upside down: there every row has moved, and `joint-handed-wrong` says why.
fn look(context: &Context<'_>) -> Vec<Finding> {
    if rows::upside_down(context) {
        return Vec::new();
    }
    let Some((intended, detailed, matched)) = rows::rows_of(context) else { return Vec::new() };
    let tolerance = context.rulebook.tolerances.position;
    let moved: Vec<String> = matched
        .pairs
        .iter()
        .filter_map(|&(i, j)| Some((i, *intended.get(i)?, *detailed.get(j)?)))
        .filter(|(_, intended, detailed)| differs(*intended, *detailed, tolerance))
        .map(|(i, intended, detailed)| {
            let way = if detailed < intended { "lower" } else { "higher" };
            format!("row {} {} {way}", i + 1, mm((detailed - intended).abs()))
        })
        .collect();
    if moved.is_empty() {
        return Vec::new();
    }
    let noun = if moved.len() == 1 { "a bolt row is" } else { "bolt rows are" };
    let finding = deviation(context, ID, format!("{noun} not at the intended height: {}", and(&moved)));
    vec![finding.against(heights(intended), heights(detailed)).on(context.bolts())]
}
