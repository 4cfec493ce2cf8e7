//! The steel grade of a member or a stiffener is not known.

use super::{Context, Rule};
use crate::assess::State;
use crate::review::{Finding, Outcome};

const ID: &str = "grade-unknown";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/grade-unknown.md") };

/// A joint may be proven without its stiffeners; then an unknown grade of theirs is a comment.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(layout) = context.layout else { return Vec::new() };
    let stiffeners = if context.carries() == State::Met { Outcome::Comment } else { Outcome::Unproven };
    let mut parts = vec![
        ("the supporting member", &layout.supporting().grade, context.column(), Outcome::Unproven),
        ("the supported member", &layout.side().beam.grade, context.beam(), Outcome::Unproven),
    ];
    parts.extend(layout.on_column().into_iter().flat_map(|column| &column.stiffeners).map(|stiffener| {
        let on = context.parts(stiffener.guids.iter().map(String::as_str));
        ("a column stiffener", &stiffener.grade, on, stiffeners)
    }));
    let unknown = parts.into_iter().filter_map(|(what, grade, (elements, place), severity)| {
        let missing = grade.as_ref().err()?;
        let message = format!("the steel grade of {what} is not known: {}", missing.reason);
        Some(Finding::new(ID, severity, message).on((elements, missing.at.clone().or(place))))
    });
    unknown.collect()
}
