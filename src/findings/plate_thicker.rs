//! The end plate is thicker than intended.

use super::compare::more;
use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "plate-thicker";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-thicker.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let thicker = context.plates().filter_map(|(side, intended)| {
        let (intended, detailed) = (intended.plate_thickness?, side.plate.thickness);
        if !more(detailed, intended, context.rulebook.tolerances.size) {
            return None;
        }
        let message = format!(
            "the end plate{} is thicker than intended: {} instead of {}; the bolts may become the weak link",
            side.which.of(),
            mm(detailed),
            mm(intended)
        );
        let finding = Finding::new(ID, Outcome::Comment, message);
        Some(finding.against(mm(intended), mm(detailed)).on(context.plate_of(side)))
    });
    thicker.collect()
}
