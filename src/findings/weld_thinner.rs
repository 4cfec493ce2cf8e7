//! A weld between beam and end plate is thinner than intended.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule, deviation};
use crate::assess::Sense;
use crate::review::Finding;

const ID: &str = "weld-thinner";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/weld-thinner.md") };

/// The intended flange throat is that of the flange in tension under the leading moment; without one, of both.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let sense = context.leading_sense();
    let places = [
        (
            "top flange",
            "flange-top",
            &layout.side().welds.flange_top,
            intended.flange_weld,
            sense != Some(Sense::Sagging),
        ),
        (
            "bottom flange",
            "flange-bottom",
            &layout.side().welds.flange_bottom,
            intended.flange_weld,
            sense != Some(Sense::Hogging),
        ),
        ("web", "web", &layout.side().welds.web, intended.web_weld, true),
    ];
    let thinner = places.into_iter().filter_map(|(place, role, detailed, intended, compared)| {
        let (intended, detailed) = (intended?, detailed.as_ref().ok()?.value);
        if !compared || !less(detailed, intended, context.rulebook.tolerances.size) {
            return None;
        }
        let message = format!(
            "the weld of the beam's {place} is thinner than intended: throat {} instead of {}",
            mm(detailed),
            mm(intended)
        );
        Some(deviation(context, ID, message).against(mm(intended), mm(detailed)).on(context.welds(role)))
    });
    thinner.collect()
}
