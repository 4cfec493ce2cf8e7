//! There are more bolts than intended.

use super::say::heights;
use super::{Context, Rule, rows};
use crate::review::{Finding, Outcome};

const ID: &str = "bolt-count-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-count-differs.md") };

/// Speaks of more bolts only: fewer are told by `row-missing`, which names the row.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((intended, detailed, _)) = rows::rows_of(context) else { return Vec::new() };
    if detailed.len() <= intended.len() {
        return Vec::new();
    }
    let (i, d) = (2 * intended.len(), 2 * detailed.len());
    let finding = Finding::new(ID, Outcome::Comment, format!("there are {d} bolts instead of the intended {i}"));
    let printed = |count: usize, rows: &[crate::units::Length]| {
        format!("{count} bolts, rows at {}", heights(rows.iter().copied()))
    };
    vec![finding.against(printed(i, &intended), printed(d, &detailed)).on(context.bolts())]
}
