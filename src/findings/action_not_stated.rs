//! A load case leaves a cell blank that a check needs.

use super::say::and;
use super::shortfall::named;
use super::{Context, Rule};
use crate::intent::LoadCase;
use crate::review::{Finding, Outcome};

const ID: &str = "action-not-stated";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/action-not-stated.md") };

/// Load cases named in a message; the rest is counted.
const NAMED_MAX: usize = 3;

/// Which cell is blank, and what can't be checked for want of it.
type Cell = (&'static str, fn(&LoadCase) -> bool);

const CELLS: [Cell; 3] = [
    ("the moment M", |case| case.moment.is_none()),
    ("the shear V", |case| case.shear.is_none()),
    ("the axial force N", |case| case.axial.is_none()),
];

/// Speaks only of joints that are assessed: of the others no check depends on a cell.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let (Some(scheduled), Some(_)) = (context.scheduled, context.layout) else { return Vec::new() };
    let parts = || (context.members().0, Some(scheduled.at.clone()));
    if scheduled.cases.is_empty() {
        let message = "the schedule names the joint and states no load case for it";
        return vec![Finding::new(ID, Outcome::Unproven, message).on(parts())];
    }
    let blanks = CELLS.iter().filter_map(|(what, blank)| {
        let blanks: Vec<&LoadCase> = scheduled.cases.iter().filter(|case| blank(case)).collect();
        let first = blanks.first()?;
        let mut names: Vec<String> = blanks.iter().take(NAMED_MAX).map(|case| named(&case.name)).collect();
        if blanks.len() > NAMED_MAX {
            names.push(format!("{} more", blanks.len() - NAMED_MAX));
        }
        let message = format!("{what} is not stated in {}; a blank cell is not zero", and(&names));
        Some(Finding::new(ID, Outcome::Unproven, message).on((parts().0, Some(first.at.clone()))))
    });
    blanks.collect()
}
