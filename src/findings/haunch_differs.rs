//! The haunch is missing, added, or of other sizes than intended.

use super::compare::{differs, less};
use super::say::{and, mm};
use super::{Context, Rule, deviation};
use crate::review::{Finding, Outcome};

const ID: &str = "haunch-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/haunch-differs.md") };

/// A haunch that is larger in every size that differs, or that nobody intended, is a comment.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let Some(intended) = &intended.haunch else { return Vec::new() };
    let (intended, detailed) = match (intended, layout.side().haunch) {
        (None, None) => return Vec::new(),
        (Some(_), None) => {
            let message = "the intended haunch below the beam is missing";
            return vec![deviation(context, ID, message.into()).against("a haunch", "none").on(context.plate())];
        }
        (None, Some(haunch)) => {
            let on = context.parts(haunch.guids.iter().map(String::as_str));
            let message = "there is a haunch below the beam that was not intended";
            return vec![Finding::new(ID, Outcome::Comment, message).against("none", mm(haunch.depth)).on(on)];
        }
        (Some(intended), Some(detailed)) => (intended, detailed),
    };
    let tolerances = &context.rulebook.tolerances;
    let sizes = [
        ("depth", intended.depth, detailed.depth, tolerances.position),
        ("length", intended.length, detailed.length, tolerances.position),
        ("flange thickness", intended.flange_thickness, detailed.flange_thickness, tolerances.size),
        ("flange width", intended.flange_width, detailed.flange_width, tolerances.size),
        ("web thickness", intended.web_thickness, detailed.web_thickness, tolerances.size),
    ];
    let differing: Vec<_> = (sizes.into_iter())
        .filter_map(|(what, intended, detailed, tolerance)| Some((what, intended?, detailed, tolerance)))
        .filter(|(_, intended, detailed, tolerance)| differs(*intended, *detailed, *tolerance))
        .collect();
    if differing.is_empty() {
        return Vec::new();
    }
    let smaller = differing.iter().any(|(_, intended, detailed, tolerance)| less(*detailed, *intended, *tolerance));
    let each: Vec<String> = (differing.iter())
        .map(|(what, intended, detailed, _)| format!("{what} {} instead of {}", mm(*detailed), mm(*intended)))
        .collect();
    let message = format!("the haunch has another size than intended: {}", and(&each));
    let finding = if smaller { deviation(context, ID, message) } else { Finding::new(ID, Outcome::Comment, message) };
    let stated: Vec<String> = differing.iter().map(|(what, size, ..)| format!("{what} {}", mm(*size))).collect();
    let stands: Vec<String> = differing.iter().map(|(what, _, size, _)| format!("{what} {}", mm(*size))).collect();
    let on = context.parts(detailed.guids.iter().map(String::as_str));
    vec![finding.against(stated.join(", "), stands.join(", ")).on(on)]
}
