//! What a review stands on: counts, basis, assumptions, and the problems of its inputs.

use super::group::{self, marks};
use super::number::factor;
use super::page::Page;
use super::text::{self, GROUPS};
use crate::review::{JointReview, Outcome, Review};

/// Problems that are not written out.
const PROBLEMS: usize = 20;

/// How many joints were found and how they end: always.
pub(super) fn counts(page: &mut Page, review: &Review) {
    let n = &review.counts;
    page.heading("COUNTS");
    page.line(
        3,
        &format!(
            "joints found {}, scheduled {}, paired {}, assessed {}; clear {}, comment {}, hold {}, unproven {}",
            n.found, n.scheduled, n.paired, n.assessed, n.clear, n.comment, n.hold, n.unproven
        ),
    );
}

/// Standard, factors, settings, signs, and which bytes were read.
pub(super) fn basis(page: &mut Page, review: &Review) {
    let basis = &review.basis;
    page.heading("BASIS");
    page.line(3, &format!("{}, {} ({})", basis.standard, basis.annex, basis.annex_source));
    page.line(
        3,
        &format!(
            "γM0 = {}, γM1 = {}, γM2 = {}",
            factor(basis.gamma_m0),
            factor(basis.gamma_m1),
            factor(basis.gamma_m2),
        ),
    );
    for (name, value) in &basis.settings {
        page.line(3, &format!("{name}: {value}"));
    }
    page.line(3, "M is positive with tension at the top of the joint, N in tension; V by magnitude.");
    page.line(3, &format!("model {}, SHA-256 {}", review.file, review.sha256));
}

/// What was assumed, said once each, and what was done without on the safe side.
pub(super) fn assumed(page: &mut Page, review: &Review) {
    let said = |joint: &'_ JointReview| joint.assumptions.clone();
    let groups =
        group::by_text(review.joints.iter().flat_map(|joint| said(joint).into_iter().map(move |text| (text, joint))));
    let carried = |joint: &&JointReview| matches!(joint.outcome, Outcome::Clear | Outcome::Comment);
    let bounds = group::lacks(review.joints.iter().filter(carried), |_, _| true);
    if groups.is_empty() && bounds.is_empty() {
        page.heading("ASSUMED: nothing");
        return;
    }
    page.heading("ASSUMED");
    let bound = page.bound(GROUPS);
    let everywhere = review.joints.iter().filter(|joint| joint.found()).count();
    let assessed = review.joints.iter().filter(|joint| group::assessed(joint)).count();
    let at = |page: &Page, joints: &[&JointReview]| match joints.len() {
        n if n == everywhere && n > 1 => "at every joint".to_owned(),
        n if n == assessed && n > 1 && joints.iter().all(|joint| group::assessed(joint)) => {
            format!("at all {n} joints that were assessed")
        }
        _ => format!("at {}", page.listed(marks(joints))),
    };
    for (text, joints) in groups.iter().take(bound) {
        let at = at(page, joints);
        page.line(3, &format!("{}: {at}", text.trim_end_matches('.')));
    }
    page.more(3, groups.len().saturating_sub(bound), ("assumption", "assumptions"));
    for lack in bounds.iter().take(bound) {
        let at = at(page, &lack.joints);
        page.line(3, &format!("on the safe side without the {} {at}", lack.what));
        text::reasons(page, lack);
    }
    page.more(3, bounds.len().saturating_sub(bound), ("thing that was done without", "things that were done without"));
}

/// Whatever could not be understood in model and schedule.
pub(super) fn problems(page: &mut Page, review: &Review) {
    let all = &review.problems;
    if all.is_empty() {
        page.heading("PROBLEMS in model and schedule: none");
        return;
    }
    page.heading(&format!("PROBLEMS in model and schedule: {}", all.len()));
    list_problems(page, review);
}

/// The problems, each with its place.
pub(super) fn list_problems(page: &mut Page, review: &Review) {
    let bound = page.bound(PROBLEMS);
    for problem in review.problems.iter().take(bound) {
        match &problem.at {
            Some(at) => page.line(3, &format!("{at} {}", problem.message)),
            None => page.line(3, &problem.message),
        }
    }
    page.more(3, review.problems.len().saturating_sub(bound), ("problem", "problems"));
}
