//! The axial force passes the limit below which it may be neglected.

use super::shortfall::{named, stated};
use super::{Context, Rule};
use crate::assess::{About, State, Verdict};
use crate::review::{Finding, Outcome};

const ID: &str = "axial-force-beyond-limit";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/axial-force-beyond-limit.md") };

/// Unproven, however far it is beyond: the limit is that of the method and says nothing of strength.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let cases = context.assessment.into_iter().flat_map(|assessment| &assessment.cases);
    let verdicts = cases.flat_map(|case| case.verdicts.iter().map(move |verdict| (case.case, verdict)));
    let force = |verdict: &Verdict| verdict.required.unwrap_or(f64::INFINITY).abs();
    let beyond = verdicts
        .filter(|(_, verdict)| verdict.about == About::Axial && is_beyond(verdict))
        .reduce(|a, b| if force(b.1) > force(a.1) { b } else { a });
    let Some((case, verdict)) = beyond else { return Vec::new() };
    let case = context.scheduled.and_then(|scheduled| scheduled.cases.get(case)).map_or("", |case| case.name.as_str());
    let (required, limit) = (stated(verdict.required, verdict.unit), stated(verdict.resistance, verdict.unit));
    let message = format!(
        "the axial force of {} is {required} and passes the limit of {limit} below which moment and shear may be checked \
         without it",
        named(case),
    );
    vec![Finding::new(ID, Outcome::Unproven, message).against(format!("at most {limit}"), required).on(context.whole())]
}

/// Said to be so, or left unproven with a stated force that is above a known limit.
fn is_beyond(verdict: &Verdict) -> bool {
    let above = verdict.required.zip(verdict.resistance).is_some_and(|(force, limit)| force.abs() > limit);
    verdict.state == State::NotMet || (verdict.state == State::Unproven && above)
}
