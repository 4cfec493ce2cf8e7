//! An intended bolt row is absent.

use super::say::{and, heights, mm};
use super::{Context, Rule, deviation, rows};
use crate::review::Finding;

const ID: &str = "row-missing";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/row-missing.md") };

/// Fewer bolts than intended are told here, by the row that lacks, and not once more by `bolt-count-differs`: which row
/// is absent is what decides about the strength, the count follows from it.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((intended, detailed, matched)) = rows::rows_of(context) else { return Vec::new() };
    let missing: Vec<String> = matched
        .missing
        .iter()
        .filter_map(|&i| Some(format!("row {} ({} above the soffit)", i + 1, mm(*intended.get(i)?))))
        .collect();
    if missing.is_empty() {
        return Vec::new();
    }
    let noun = if missing.len() == 1 { "an intended bolt row is" } else { "intended bolt rows are" };
    let message = format!("{noun} missing: {}", and(&missing));
    let finding = deviation(context, ID, message);
    vec![finding.against(printed(&intended), printed(&detailed)).on(context.plate())]
}

fn printed(rows: &[crate::units::Length]) -> String {
    format!("{} bolts, rows at {}", 2 * rows.len(), heights(rows.iter().copied()))
}
