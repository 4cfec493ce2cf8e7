//! The axial force passes the limit below which it may be neglected.

use super::shortfall::{named, stated, utilisation, worst};
use super::{Context, Rule};
use crate::assess::{About, State};
use crate::review::{Finding, Outcome};

const ID: &str = "axial-force-beyond-limit";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/axial-force-beyond-limit.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((case, verdict)) = worst(context, |v| v.about == About::Axial && v.state == State::NotMet) else {
        return Vec::new();
    };
    let (required, limit) = (stated(verdict.required, verdict.unit), stated(verdict.resistance, verdict.unit));
    let message = format!(
        "the axial force of {} is {required} and passes the limit of {limit} below which moment and shear may be checked \
         without it ({} times)",
        named(case),
        utilisation(verdict.utilisation),
    );
    vec![Finding::new(ID, Outcome::Unproven, message).against(required, limit).on(context.whole())]
}
