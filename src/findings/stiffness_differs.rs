//! The joint is not as stiff, or not as free to turn, as the analysis of the frame takes it.

use super::shortfall::named;
use super::{Context, Rule};
use crate::assess::classification::differs;
use crate::intent::JointClass;
use crate::review::{Finding, Outcome};

const ID: &str = "stiffness-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/stiffness-differs.md") };

/// Unproven, never a hold: the actions may differ from those that the analysis found, to either side.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let (Some(assessment), Some(scheduled)) = (context.assessment, context.scheduled) else { return Vec::new() };
    let Some(assumed) = scheduled.frame.class else { return Vec::new() };
    let asked = assessment.cases.iter().filter_map(|result| {
        let case = scheduled.cases.get(result.case)?;
        Some((named(&case.name), result.moment.as_ref()?, case.moment))
    });
    let asked: Vec<_> = asked.collect();
    let alone = || assessment.hogging.iter().chain(&assessment.sagging).map(|m| ("its own right".into(), m, None));
    let all = if asked.is_empty() { alone().collect() } else { asked };
    let found = all.into_iter().filter_map(|(name, resistance, required)| {
        let (class, classified) = differs(resistance, &scheduled.frame, required)?;
        Some((name, resistance.stiffness.as_ref()?.initial, class, classified))
    });
    // The furthest off: the least stiff where rigid is assumed, the stiffest where pinned is.
    let further = |a: f64, b: f64| if assumed == JointClass::Rigid { b < a } else { b > a };
    let Some((name, initial, class, classified)) =
        found.reduce(|a, b| if further(a.1.get(), b.1.get()) { b } else { a })
    else {
        return Vec::new();
    };
    let bound = if assessment.at_bound() { ", a lower bound" } else { "" };
    let limit = classified.limits.map(|(rigid, pinned)| match assumed {
        JointClass::Rigid => format!(", {} from {rigid} on", assumed.word()),
        _ => format!(", {} up to {pinned}", assumed.word()),
    });
    let message = format!(
        "the analysis takes the joint as {}; in {name} it is {} (Sj,ini = {initial}{bound}{}), so the required actions are \
         not those of this joint",
        assumed.word(),
        class.word(),
        limit.unwrap_or_default(),
    );
    vec![Finding::new(ID, Outcome::Unproven, message).against(assumed.word(), class.word()).on(context.whole())]
}
