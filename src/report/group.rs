//! Like with like: what is missing by the missing thing, like faults by their fault.

use std::collections::BTreeMap;

use crate::origin::{Ask, Missing, Place};
use crate::review::{Finding, JointReview, Outcome, REQUIRED_ACTIONS, Required, Review};

/// One missing thing and the joints that lack it.
pub(super) struct Lack<'a> {
    /// The thing: "bolt class".
    pub what: &'a str,
    /// Who can close the gap.
    pub ask: Ask,
    /// Where it was looked for, the joints concerned, and the first place, most joints first.
    pub reasons: Vec<(&'a str, Vec<&'a JointReview>, Option<&'a Place>)>,
    /// All joints that lack it, in the review's order.
    pub joints: Vec<&'a JointReview>,
}

/// What is missing at these joints, the thing that most joints lack first.
pub(super) fn lacks<'a>(
    joints: impl IntoIterator<Item = &'a JointReview>,
    counts: impl Fn(&JointReview, &Missing) -> bool,
) -> Vec<Lack<'a>> {
    type Reasons<'a> = BTreeMap<&'a str, (Vec<&'a JointReview>, Option<&'a Place>)>;
    let mut by_what: BTreeMap<(&str, Ask), (Reasons<'_>, Vec<&JointReview>)> = BTreeMap::new();
    for joint in joints {
        for missing in joint.missing.iter().filter(|missing| counts(joint, missing)) {
            let (reasons, all) = by_what.entry((&missing.what, missing.ask)).or_default();
            let (some, place) = reasons.entry(&missing.reason).or_default();
            add(some, joint);
            add(all, joint);
            *place = place.or(missing.at.as_ref());
        }
    }
    let mut lacks: Vec<Lack<'_>> = by_what
        .into_iter()
        .map(|((what, ask), (reasons, joints))| {
            let mut reasons: Vec<_> = reasons.into_iter().map(|(why, (some, at))| (why, some, at)).collect();
            reasons.sort_by_key(|(_, some, _)| std::cmp::Reverse(some.len()));
            Lack { what, ask, reasons, joints }
        })
        .collect();
    lacks.sort_by_key(|lack| std::cmp::Reverse(lack.joints.len()));
    lacks
}

/// Joints come in order, so that the same joint can only have been the last one.
fn add<'a>(joints: &mut Vec<&'a JointReview>, joint: &'a JointReview) {
    if !joints.last().is_some_and(|last| std::ptr::eq(*last, joint)) {
        joints.push(joint);
    }
}

/// Texts with the joints that share them, most joints first, then in the order of the text.
pub(super) fn by_text<'a, T: Ord>(
    said: impl IntoIterator<Item = (T, &'a JointReview)>,
) -> Vec<(T, Vec<&'a JointReview>)> {
    let mut groups: BTreeMap<T, Vec<&JointReview>> = BTreeMap::new();
    for (text, joint) in said {
        add(groups.entry(text).or_default(), joint);
    }
    let mut groups: Vec<_> = groups.into_iter().collect();
    groups.sort_by_key(|(_, joints)| std::cmp::Reverse(joints.len()));
    groups
}

/// The marks of joints.
pub(super) fn marks<'a>(joints: &[&'a JointReview]) -> Vec<&'a str> {
    joints.iter().map(|joint| joint.mark.as_str()).collect()
}

/// A finding in one sentence: "stiffener-missing: the stiffeners are missing (intended a pair, detailed none)"; values
/// that the message itself gives are not said twice.
pub(super) fn sentence(finding: &Finding) -> String {
    let message = finding.message.trim_end_matches('.');
    let values = [("intended", &finding.intended), ("detailed", &finding.detailed)]
        .iter()
        .filter_map(|(word, value)| value.as_ref().map(|v| (word, v)))
        .filter(|(_, value)| !names(message, value))
        .map(|(word, value)| format!("{word} {value}"))
        .collect::<Vec<_>>()
        .join(", ");
    if values.is_empty() {
        format!("{}: {message}", finding.rule)
    } else {
        format!("{}: {message} ({values})", finding.rule)
    }
}

/// Whether a text gives a value as such: "125 mm" does not give "25 mm".
fn names(text: &str, value: &str) -> bool {
    let goes_on = |c: char| c.is_alphanumeric() || c == '.';
    text.match_indices(value)
        .any(|(at, _)| !text[..at].ends_with(goes_on) && !text[at + value.len()..].starts_with(char::is_alphanumeric))
}

/// Rules that lay an action on a resistance: their numbers belong to the joint, not to the fault.
const OF_ACTIONS: [&str; 5] = ["moment-short", "shear-short", "tying-short", "weld-short", "axial-force-beyond-limit"];

/// Whether a finding lays an action on a resistance.
pub(super) fn of_actions(finding: &Finding) -> bool {
    OF_ACTIONS.contains(&finding.rule)
}

/// Whether a finding says no more than the required actions, resistances and governing component of the worst case.
pub(super) fn said_by_worst_case(joint: &JointReview, finding: &Finding) -> bool {
    let worst = worst_case(joint);
    let governed = worst.and_then(|case| case.governed_by.as_ref());
    let used = worst.and_then(|case| case.utilisation).map(|ratio| format!("{ratio:.2}"));
    OF_ACTIONS.contains(&finding.rule)
        && governed.zip(used).is_some_and(|(by, used)| says(&finding.message, by) && says(&finding.message, &used))
}

/// What makes two held joints alike: the same kind, intended detail and governing component, the same faults and the
/// same missing things.
pub(super) fn likeness(joint: &JointReview) -> impl Ord {
    let fault = |f: &Finding| if OF_ACTIONS.contains(&f.rule) { f.rule.to_owned() } else { sentence(f) };
    let faults: Vec<String> = joint.findings.iter().map(fault).collect();
    let missing: Vec<&str> = joint.missing.iter().map(|missing| missing.what.as_str()).collect();
    (&joint.kind, &joint.detail, governing(joint), faults, missing)
}

/// What governs the worst case; the joint's own resistance where no case says so.
pub(super) fn governing(joint: &JointReview) -> Option<&String> {
    worst_case(joint).and_then(|case| case.governed_by.as_ref()).or(joint.resistance.governed_by.as_ref())
}

/// The case that uses the joint most; the first one where nothing was computed.
pub(super) fn worst_case(joint: &JointReview) -> Option<&Required> {
    let used = |case: &Required| case.utilisation.unwrap_or(f64::NEG_INFINITY);
    joint.required.iter().reduce(|worst, case| if used(case).total_cmp(&used(worst)).is_gt() { case } else { worst })
}

/// Reasons of a joint that neither its findings nor its missing things say.
pub(super) fn reasons_left(joint: &JointReview) -> impl Iterator<Item = &str> {
    joint.reasons.iter().map(String::as_str).filter(|reason| {
        !joint.findings.iter().any(|finding| says(reason, &finding.message))
            && !joint.missing.iter().any(|missing| says(reason, &missing.reason))
    })
}

/// Why a scheduled joint has no steel beside it.
pub(super) fn without_steel(joint: &JointReview) -> &'static str {
    let members = joint.findings.iter().any(|f| f.rule == "joint-not-found" && f.message.contains("no bolted joint"));
    match joint.kind.as_str() {
        "not-paired" => "fits no single joint",
        _ if members => "its members have no bolted joint",
        _ => "no steel found",
    }
}

/// Rules of what has a section of its own: steel without a schedule line, and the other way round.
const PAIRING: [&str; 3] = ["joint-not-scheduled", "joint-not-found", "joint-not-paired"];

/// Findings of a joint that are no comments and that neither its missing things nor a section of its own say.
pub(super) fn findings_left(joint: &JointReview) -> impl Iterator<Item = &Finding> {
    joint.findings.iter().filter(|finding| {
        finding.severity != Outcome::Comment
            && !PAIRING.contains(&finding.rule)
            && !joint.missing.iter().any(|missing| says(&finding.message, &missing.reason))
    })
}

/// Whether a text holds what another one says.
fn says(text: &str, other: &str) -> bool {
    let other = other.trim_end_matches('.');
    !other.is_empty() && text.contains(other)
}

/// Whether a schedule was given that states no actions for this joint.
pub(super) fn unscheduled(review: &Review, joint: &JointReview) -> bool {
    review.schedule.is_some() && joint.found() && joint.required.is_empty()
}

/// Whether a missing thing is a matter of the schedule alone, said in its own section.
pub(super) fn said_as_unscheduled(review: &Review, joint: &JointReview, missing: &Missing) -> bool {
    missing.what == REQUIRED_ACTIONS && unscheduled(review, joint)
}

/// Whether anything of the joint's resistance was computed.
pub(super) fn assessed(joint: &JointReview) -> bool {
    let r = &joint.resistance;
    [r.moment_knm, r.moment_reversed_knm, r.shear_kn, r.axial_kn].iter().any(Option::is_some)
}

/// The joints that end so.
pub(super) fn ended(review: &Review, outcome: Outcome) -> Vec<&JointReview> {
    review.joints.iter().filter(|joint| joint.outcome == outcome).collect()
}

/// Worst first: holds before unproven before comments, the more used before the less; then the review's order.
pub(super) fn worst_first<'a>(joints: impl IntoIterator<Item = &'a JointReview>) -> Vec<&'a JointReview> {
    let mut joints: Vec<_> = joints.into_iter().collect();
    joints.sort_by(|a, b| {
        let used = |joint: &JointReview| joint.utilisation().unwrap_or(f64::NEG_INFINITY);
        a.outcome.cmp(&b.outcome).then_with(|| used(b).total_cmp(&used(a)))
    });
    joints
}
