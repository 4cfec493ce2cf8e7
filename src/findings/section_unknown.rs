//! The section of a member is not known.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "section-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/section-unknown.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(layout) = context.layout else { return Vec::new() };
    let members = [
        ("supporting", &layout.supporting().section, context.column()),
        ("supported", &layout.side().beam.section, context.beam()),
    ];
    let unknown = members.into_iter().filter_map(|(which, section, (elements, place))| {
        let missing = section.as_ref().err()?;
        let message = format!("the section of the {which} member is not known: {}", missing.reason);
        Some(Finding::new(ID, Outcome::Unproven, message).on((elements, missing.at.clone().or(place))))
    });
    unknown.collect()
}
