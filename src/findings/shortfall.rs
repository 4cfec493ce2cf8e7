//! What the rules on required actions share: the worst verdict that is not met, in words.

use super::context::Context;
use crate::assess::{About, State, Verdict};
use crate::review::{Finding, Outcome};

/// The worst verdict of a sort over all load cases, with the name of its case.
pub(super) fn worst<'a>(context: &Context<'a>, of: impl Fn(&Verdict) -> bool) -> Option<(&'a str, &'a Verdict)> {
    let cases = &context.assessment?.cases;
    let verdicts = cases.iter().flat_map(|case| case.verdicts.iter().map(move |verdict| (case.case, verdict)));
    // A shortfall without a number is worse than any; of equals the first stands.
    let rank = |verdict: &Verdict| verdict.utilisation.unwrap_or(f64::INFINITY);
    let (case, verdict) = verdicts
        .filter(|(_, verdict)| of(verdict))
        .reduce(|a, b| if rank(b.1).total_cmp(&rank(a.1)).is_gt() { b } else { a })?;
    let name = context.scheduled.and_then(|scheduled| scheduled.cases.get(case)).map_or("", |case| case.name.as_str());
    Some((name, verdict))
}

/// The hold of a required action that is not carried.
pub(super) fn short(context: &Context<'_>, rule: &'static str, about: About, what: &str) -> Vec<Finding> {
    let Some((case, verdict)) = worst(context, |v| v.about == about && v.state == State::NotMet) else {
        return Vec::new();
    };
    let (required, resistance) = (stated(verdict.required, verdict.unit), stated(verdict.resistance, verdict.unit));
    let message = format!(
        "{what} {}: {required} required, resistance {resistance}, utilisation {}, governed by {}",
        named(case),
        utilisation(verdict.utilisation),
        if verdict.governed_by.is_empty() { "a component that is not named" } else { &verdict.governed_by },
    );
    vec![Finding::new(rule, Outcome::Hold, message).against(required, resistance).on(context.whole())]
}

/// "load case W1", or "a load case" if it has no name.
pub(super) fn named(case: &str) -> String {
    if case.is_empty() { "a load case without a name".into() } else { format!("load case {case}") }
}

/// One decimal and the unit.
pub(super) fn stated(value: Option<f64>, unit: &str) -> String {
    value.map_or("not known".into(), |value| format!("{value:.1} {unit}"))
}

/// Two decimals; a hair above full does not read as full.
pub(super) fn utilisation(value: Option<f64>) -> String {
    match value {
        Some(u) if u > 1.0 && u < 1.005 => "just above 1.00".into(),
        Some(u) => format!("{u:.2}"),
        None => "not known".into(),
    }
}
