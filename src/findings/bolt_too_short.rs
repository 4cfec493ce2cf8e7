//! The bolts are too short for what they hold together.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};
use crate::units::Length;

const ID: &str = "bolt-too-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/bolt-too-short.md") };

/// Of several stated lengths the shortest; a length that nobody states makes no finding.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(layout) = context.layout else { return Vec::new() };
    let (Some(grip), Ok(d)) = (layout.grip(), &layout.bolts().diameter) else { return Vec::new() };
    let Some(size) = context.rulebook.bolt_size(d.value) else { return Vec::new() };
    let bolts = context.joint.into_iter().flat_map(|joint| &joint.bolts);
    let bolts = bolts.filter_map(|index| context.steelwork.bolts.get(*index));
    let Some(length) = bolts.filter_map(|bolt| bolt.length.as_ref().ok()).map(|l| l.value).reduce(Length::min) else {
        return Vec::new();
    };
    let (tolerances, rules) = (&context.rulebook.tolerances, &context.rulebook.distances);
    let past = rules.threads_past_nut * size.pitch;
    let washers = rules.washers * size.washer_thickness;
    let high_strength = layout.bolts().class.as_ref().is_ok_and(|class| class.value == "10.9");
    let nut = if high_strength { size.nut.min(size.nut_preloaded) } else { size.nut };
    let (least, usual) = (grip + nut + past, grip + washers + size.nut + past);
    let (severity, needs, message) = if !less(grip + 2.0 * size.washer_thickness, length, tolerances.position) {
        let message = format!(
            "the bolts' length is given as {}, no more than what they hold together ({}) with two washers: it tells \
             the grip, and nobody tells how long the bolts are",
            mm(length),
            mm(grip)
        );
        (Outcome::Comment, least, message)
    } else if less(length, least, tolerances.position) {
        let message = format!(
            "the bolts are {} long; a grip of {}, a nut of {} and {} past it need {}, without any washer",
            mm(length),
            mm(grip),
            mm(nut),
            mm(past),
            mm(least)
        );
        (Outcome::Hold, least, message)
    } else if less(length, usual, tolerances.size) {
        let message = format!(
            "the bolts are {} long; a grip of {}, washers of {}, a nut of {} and {} past it need {}",
            mm(length),
            mm(grip),
            mm(washers),
            mm(size.nut),
            mm(past),
            mm(usual)
        );
        (Outcome::Comment, usual, message)
    } else {
        return Vec::new();
    };
    let against = (format!("at least {}", mm(needs)), mm(length));
    vec![Finding::new(ID, severity, message).against(against.0, against.1).on(context.bolts())]
}
