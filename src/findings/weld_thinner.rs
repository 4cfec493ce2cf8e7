//! A weld between beam and end plate is thinner than intended.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, deviation};
use crate::assess::Sense;
use crate::joints::Which;
use crate::review::Finding;

const ID: &str = "weld-thinner";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/weld-thinner.md") };

/// The intended flange throat is that of the flange in tension under the leading moment; without one, of both.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let sense = context.leading_sense();
    let places = context.plates().flat_map(|(side, intended)| {
        let (top, bottom) = (sense != Some(Sense::Sagging), sense != Some(Sense::Hogging));
        let (welds, flange) = (side.welds, intended.flange_weld);
        [
            (side, "top flange", "flange-top", &welds.flange_top, flange.filter(|_| top)),
            (side, "bottom flange", "flange-bottom", &welds.flange_bottom, flange.filter(|_| bottom)),
            (side, "web", "web", &welds.web, intended.web_weld),
        ]
    });
    let thinner = places.filter_map(|(side, place, role, detailed, intended)| {
        let (intended, detailed) = (intended?, detailed.as_ref().ok()?.value);
        if !less(detailed, intended, context.rulebook.tolerances.size) {
            return None;
        }
        let message = format!(
            "the weld of the {}beam's {place} is thinner than intended: throat {} instead of {}",
            side.which.owner(),
            mm(detailed),
            mm(intended)
        );
        // The welds' roles do not tell the halves of a splice apart; the plates do.
        let on = if side.which == Which::Only { context.welds(role) } else { context.plate_of(side) };
        Some(deviation(context, ID, message).against(mm(intended), mm(detailed)).on(on))
    });
    thinner.collect()
}
