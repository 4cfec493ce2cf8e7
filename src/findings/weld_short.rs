//! The welds between beam and end plate do not carry what is required.

use super::say::mm;
use super::{Context, Rule, shortfall};
use crate::assess::{About, State, Verdict};
use crate::review::Finding;
use crate::units::{Length, knm};

const ID: &str = "weld-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/weld-short.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let mut findings = shortfall::short(context, ID, About::Weld, "the welds between beam and end plate do not carry");
    let worst = shortfall::worst(context, |v| v.about == About::Weld && v.state == State::NotMet);
    if let (Some(finding), Some(needed)) = (findings.first_mut(), worst.and_then(|(_, v)| needed(context, v))) {
        finding.message += &format!("; it needs a throat of {}", mm(Length(needed.get().ceil())));
    }
    findings
}

/// The throat that the governing weld needs for what is required of it.
fn needed(context: &Context<'_>, verdict: &Verdict) -> Option<Length> {
    let cases = &context.assessment?.cases;
    let case = cases.iter().find(|case| case.verdicts.iter().any(|own| std::ptr::eq(own, verdict)))?;
    let moment = case.moment.as_ref()?;
    let weld = moment.components.iter().find(|c| c.title == verdict.governed_by)?;
    let share = knm(verdict.required?).abs() / moment.without_welds;
    weld.needed_throat(share * weld.at_full, context.rulebook.welds.min_throat)
}
