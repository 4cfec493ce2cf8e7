//! The axial force passes the limit below which it may be neglected.

use super::shortfall::{named, stated};
use super::{Context, Rule};
use crate::assess::{About, State, Verdict};
use crate::review::{Finding, Outcome};

const ID: &str = "axial-force-beyond-limit";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/axial-force-beyond-limit.md") };

/// Unproven, however far it is beyond: the limit is that of the method, and the method of moment and axial force together is
/// a conservative one.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let cases = context.assessment.into_iter().flat_map(|assessment| &assessment.cases);
    let verdicts = cases.flat_map(|case| case.verdicts.iter().map(move |verdict| (case.case, verdict)));
    // How far it is off: by both together, else by the limit.
    let share = |v: &Verdict| v.required.zip(v.resistance).map(|(force, limit)| (force / limit).abs());
    let rank = |v: &Verdict| v.utilisation.or(share(v)).unwrap_or(f64::INFINITY);
    let beyond = verdicts
        .filter(|(_, verdict)| verdict.about == About::Axial && is_beyond(verdict))
        .reduce(|a, b| if rank(b.1) > rank(a.1) { b } else { a });
    let Some((case, verdict)) = beyond else { return Vec::new() };
    let case = context.scheduled.and_then(|scheduled| scheduled.cases.get(case)).map_or("", |case| case.name.as_str());
    let (required, limit) = (stated(verdict.required, verdict.unit), stated(verdict.resistance, verdict.unit));
    if let Some(used) = verdict.utilisation {
        let message = format!(
            "moment and axial force of {} ({required}) come to {used:.2} together by the conservative method of 6.2.7.1(3)",
            named(case),
        );
        let finding = Finding::new(ID, Outcome::Unproven, message).against("at most 1.00", format!("{used:.2}"));
        return vec![finding.on(context.whole())];
    }
    let message = format!(
        "the axial force of {} is {required} and passes the limit of {limit} below which moment and shear may be checked \
         without it",
        named(case),
    );
    vec![Finding::new(ID, Outcome::Unproven, message).against(format!("at most {limit}"), required).on(context.whole())]
}

/// Said to be so, or left unproven with a stated force that is above a known limit, or with a moment that is too much beside
/// it.
fn is_beyond(verdict: &Verdict) -> bool {
    let above = verdict.required.zip(verdict.resistance).is_some_and(|(force, limit)| force.abs() > limit);
    let together = verdict.utilisation.is_some_and(|used| used > 1.0);
    verdict.state == State::NotMet || (verdict.state == State::Unproven && (above || together))
}
