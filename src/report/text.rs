//! The review as text for a terminal or a printer: what can hurt first, then what nobody knows, what is missing, what
//! deviates and carries; last what it all stands on.

use std::collections::BTreeMap;

use super::group::{self, marks};
use super::number::{count, utilisation};
use super::page::{Page, Tone};
use super::window::Source;
use super::{Options, hold, standing, table};
use crate::origin::Missing;
use crate::review::{JointReview, Outcome, Review};

/// Held joints (alike ones count once) that are drawn in full.
const HOLDS: usize = 10;

/// Windows on the model's text; each may have to look through a line of many megabytes.
const WINDOWS: usize = 40;

/// Groups a section.
pub(super) const GROUPS: usize = 20;

/// Draws the review; `model` are the bytes of the model, for a short window of its text beside a place.
pub fn render(review: &Review, options: &Options, model: Option<&[u8]>) -> String {
    let mut page = Page::new(options);
    head(&mut page, review);
    holds(&mut page, review, model);
    unproven(&mut page, review);
    missing(&mut page, review);
    deviates(&mut page, review);
    clear(&mut page, review);
    all_joints(&mut page, review);
    standing::counts(&mut page, review);
    standing::basis(&mut page, review);
    standing::assumed(&mut page, review);
    standing::problems(&mut page, review);
    page.finish()
}

fn head(page: &mut Page, review: &Review) {
    let against = match &review.schedule {
        Some(schedule) => format!("against {schedule}"),
        None => "without a schedule: resistances only, no joint can be proven".into(),
    };
    page.toned(0, Tone::Heading, &format!("Review of {} ({}) {against}", review.file, review.exchange));
    if review.joints.is_empty() {
        page.line(0, "No joint was found and none is scheduled: nothing is proven.");
        return;
    }
    let n = &review.counts;
    page.line(
        0,
        &format!(
            "{}: {} on hold, {} unproven, {} with a comment, {} clear.",
            count(review.joints.len(), "joint", "joints"),
            n.hold,
            n.unproven,
            n.comment,
            n.clear
        ),
    );
}

fn holds(page: &mut Page, review: &Review, model: Option<&[u8]>) {
    let held = group::ended(review, Outcome::Hold);
    if held.is_empty() {
        page.heading("ON HOLD: none");
        return;
    }
    page.heading(&format!("ON HOLD: {}, worst first", count(held.len(), "joint", "joints")));
    let (steel, bare): (Vec<_>, Vec<_>) = held.into_iter().partition(|joint| joint.found());
    let mut alike: Vec<(&JointReview, Vec<&JointReview>)> = Vec::new();
    let mut seen = BTreeMap::new();
    for joint in group::worst_first(steel) {
        let index = *seen.entry(group::likeness(joint)).or_insert(alike.len());
        match alike.get_mut(index) {
            Some((_, others)) => others.push(joint),
            None => alike.push((joint, Vec::new())),
        }
    }
    let source = model.and_then(Source::new);
    let bound = page.bound(HOLDS);
    for (number, (worst, others)) in alike.iter().take(bound).enumerate() {
        if number > 0 {
            page.blank();
        }
        hold::draw(page, worst, others, &review.file, source.as_ref().filter(|_| number < WINDOWS));
    }
    let left: Vec<&JointReview> =
        alike.iter().skip(bound).flat_map(|(worst, others)| std::iter::once(worst).chain(others)).copied().collect();
    if !left.is_empty() {
        page.blank();
        let list = page.listed(left.iter().map(|joint| named(joint)));
        page.toned(0, Tone::Hold, &format!("and {} more on hold: {list}", left.len()));
    }
    if !bare.is_empty() {
        let list = page.listed(marks(&bare));
        if !alike.is_empty() {
            page.blank();
        }
        page.line(0, &format!("Scheduled, but without steel (see MISSING): {list}"));
    }
}

/// "B1 (0.97)".
fn named(joint: &JointReview) -> String {
    joint.utilisation().map_or_else(|| joint.mark.clone(), |ratio| format!("{} ({})", joint.mark, utilisation(ratio)))
}

fn unproven(page: &mut Page, review: &Review) {
    let joints = group::ended(review, Outcome::Unproven);
    let held = group::ended(review, Outcome::Hold);
    if joints.is_empty() {
        page.heading("UNPROVEN: none");
        return;
    }
    page.heading(&format!("UNPROVEN: {}, by what is missing", count(joints.len(), "joint", "joints")));
    let said = |joint: &JointReview, missing: &Missing| !group::said_as_unscheduled(review, joint, missing);
    let lacks = group::lacks(joints.iter().copied(), said);
    let bound = page.bound(GROUPS);
    for lack in lacks.iter().take(bound) {
        let list = page.listed(marks(&lack.joints));
        let too: Vec<&JointReview> =
            held.iter().copied().filter(|joint| joint.missing.iter().any(|m| m.what == lack.what)).collect();
        let too = match too.len() {
            0 => String::new(),
            _ => format!("; and on hold: {}", page.listed(marks(&too))),
        };
        let joints = count(lack.joints.len(), "joint", "joints");
        page.toned(3, Tone::Unproven, &format!("{} ({joints}): {list}{too}", lack.what));
        reasons(page, lack);
    }
    page.more(3, lacks.len().saturating_sub(bound), ("missing thing", "missing things"));

    let mut said_else = group::by_text(joints.iter().flat_map(|&joint| {
        let findings: Vec<String> = group::findings_left(joint).map(group::sentence).collect();
        let reasons = group::reasons_left(joint).map(str::to_owned);
        findings.into_iter().chain(reasons).map(move |text| (text, joint)).collect::<Vec<_>>()
    }));
    let silent: Vec<&JointReview> = joints
        .iter()
        .copied()
        .filter(|joint| joint.missing.is_empty() && joint.reasons.is_empty())
        .filter(|joint| joint.findings.iter().all(|f| f.severity == Outcome::Comment))
        .collect();
    if !silent.is_empty() {
        said_else.push(("no reason is recorded".into(), silent));
    }
    texts(page, &said_else, Tone::Unproven);
    let unscheduled: Vec<&JointReview> =
        joints.iter().copied().filter(|joint| group::unscheduled(review, joint)).collect();
    if !unscheduled.is_empty() {
        let list = page.listed(marks(&unscheduled));
        page.line(3, &format!("Without required actions (see MISSING): {list}"));
    }

    let deviating = group::by_text(comments(&joints));
    if !deviating.is_empty() {
        page.line(3, "These deviate from what was intended as well, and are not proven to carry:");
        texts(page, &deviating, Tone::Plain);
    }
}

/// Where a missing thing was looked for; with the marks where that differs from joint to joint.
pub(super) fn reasons(page: &mut Page, lack: &group::Lack<'_>) {
    let bound = page.bound(3);
    let alone = lack.reasons.len() == 1;
    for (reason, joints, at) in lack.reasons.iter().take(bound) {
        let first = at.map_or(String::new(), |at| format!("; first at {at}"));
        let at = if alone { String::new() } else { format!(" ({})", page.listed(marks(joints))) };
        page.line(5, &format!("{reason}{at}{first}"));
    }
    page.more(5, lack.reasons.len().saturating_sub(bound), ("reason", "reasons"));
}

/// Comment findings of these joints as sentences.
fn comments<'a>(joints: &[&'a JointReview]) -> Vec<(String, &'a JointReview)> {
    let of = |joint: &'a JointReview| {
        joint.findings.iter().filter(|f| f.severity == Outcome::Comment).map(move |f| (group::sentence(f), joint))
    };
    joints.iter().copied().flat_map(of).collect()
}

/// Each text once, with the marks it holds for.
fn texts(page: &mut Page, groups: &[(String, Vec<&JointReview>)], tone: Tone) {
    let bound = page.bound(GROUPS);
    for (text, joints) in groups.iter().take(bound) {
        page.toned(3, tone, text);
        let list = page.listed(marks(joints));
        let at =
            joints.iter().find_map(|joint| joint.at.as_ref()).map_or(String::new(), |at| format!("; first at {at}"));
        page.line(5, &format!("{}: {list}{at}", count(joints.len(), "joint", "joints")));
    }
    page.more(3, groups.len().saturating_sub(bound), ("of this kind", "of this kind"));
}

fn missing(page: &mut Page, review: &Review) {
    let bare: Vec<&JointReview> = review.joints.iter().filter(|joint| !joint.found()).collect();
    let unscheduled: Vec<&JointReview> = review.joints.iter().filter(|j| group::unscheduled(review, j)).collect();
    if review.schedule.is_none() {
        page.heading("MISSING: no schedule was given to hold the steel against");
        return;
    }
    if bare.is_empty() && unscheduled.is_empty() {
        page.heading("MISSING: none");
        return;
    }
    page.heading(&format!(
        "MISSING: {} without steel, {} without required actions",
        count(bare.len(), "scheduled joint", "scheduled joints"),
        count(unscheduled.len(), "joint of the steel", "joints of the steel"),
    ));
    let bound = page.bound(GROUPS);
    for joint in bare.iter().take(bound) {
        let case = group::worst_case(joint);
        let asked = case.map_or(String::new(), |case| format!("; required {}", hold::required(case)));
        let at = joint.at.as_ref().or(case.and_then(|case| case.at.as_ref()));
        let at = at.map_or(String::new(), |at| format!(", {at}"));
        let (tone, why) =
            (if joint.outcome == Outcome::Hold { Tone::Hold } else { Tone::Unproven }, group::without_steel(joint));
        page.toned(3, tone, &format!("{}: scheduled, {why}{asked}{at}", joint.mark));
        for said in
            group::findings_left(joint).map(group::sentence).chain(group::reasons_left(joint).map(str::to_owned))
        {
            page.line(5, &said);
        }
    }
    page.more(3, bare.len().saturating_sub(bound), ("scheduled joint without steel", "scheduled joints without steel"));
    if !unscheduled.is_empty() {
        page.line(3, "No schedule line states actions for these:");
        texts(page, &group::by_text(unscheduled.iter().map(|&joint| (hold::what(joint), joint))), Tone::Unproven);
    }
}

fn deviates(page: &mut Page, review: &Review) {
    let joints = group::ended(review, Outcome::Comment);
    if joints.is_empty() {
        page.heading("DEVIATES BUT CARRIES: none");
        return;
    }
    page.heading(&format!("DEVIATES BUT CARRIES: {}{}", count(joints.len(), "joint", "joints"), up_to(&joints)));
    let silent = joints.iter().copied().filter(|j| !j.findings.iter().any(|f| f.severity == Outcome::Comment));
    let reasons = silent.flat_map(|joint| match joint.reasons.is_empty() {
        true => vec![("no reason is recorded".to_owned(), joint)],
        false => joint.reasons.iter().map(|reason| (reason.clone(), joint)).collect(),
    });
    let groups = group::by_text(comments(&joints).into_iter().chain(reasons));
    texts(page, &groups, Tone::Comment);
}

/// ", utilisation up to 0.97".
fn up_to(joints: &[&JointReview]) -> String {
    let most = joints.iter().filter_map(|joint| joint.utilisation()).max_by(f64::total_cmp);
    most.map_or(String::new(), |most| format!(", utilisation up to {}", utilisation(most)))
}

fn clear(page: &mut Page, review: &Review) {
    let joints = group::ended(review, Outcome::Clear);
    if joints.is_empty() {
        page.heading("CLEAR: none");
        return;
    }
    let list = page.listed(group::worst_first(joints.iter().copied()).iter().map(|joint| &joint.mark));
    page.heading(&format!(
        "CLEAR: {}{}, the most used first: {list}",
        count(joints.len(), "joint", "joints"),
        up_to(&joints)
    ));
}

fn all_joints(page: &mut Page, review: &Review) {
    if review.joints.is_empty() {
        return;
    }
    page.heading("JOINTS, worst first; M and V of the case that governs");
    let joints = group::worst_first(&review.joints);
    let shown = joints.len().min(page.bound(table::ROWS));
    for line in table::draw(&joints[..shown], page.options().width) {
        page.raw(0, Tone::Plain, &line);
    }
    page.more(0, joints.len() - shown, ("joint", "joints"));
}
