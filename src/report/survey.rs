//! What was recognised and what is missing, before any schedule is there.

use std::collections::BTreeMap;

use super::group::{self, marks};
use super::number::count;
use super::page::{Page, Tone};
use super::{Options, standing, text};
use crate::origin::{Ask, Place};
use crate::review::{JointReview, REQUIRED_ACTIONS, Review};

/// Groups and lines a section that are not written out.
const GROUPS: usize = 20;

/// Draws the survey of a review as text.
pub fn render(review: &Review, options: &Options) -> String {
    let mut page = Page::new(options);
    page.toned(0, Tone::Heading, &format!("Survey of {} ({})", review.file, review.exchange));
    recognised(&mut page, review);
    rejected(&mut page, review);
    loose(&mut page, review);
    lacking(&mut page, review);
    if !review.problems.is_empty() {
        page.heading(&format!("PROBLEMS in the model: {}", review.problems.len()));
        standing::list_problems(&mut page, review);
    }
    ask(&mut page, review);
    page.finish()
}

/// Joints by the word of their kind.
pub(super) fn kinds(review: &Review) -> BTreeMap<&str, Vec<&JointReview>> {
    let mut kinds: BTreeMap<&str, Vec<&JointReview>> = BTreeMap::new();
    for joint in review.joints.iter().filter(|joint| joint.found()) {
        kinds.entry(&joint.kind).or_default().push(joint);
    }
    kinds
}

/// Parts that were not taken up, by the reason.
pub(super) fn rejected_by_reason(review: &Review) -> Vec<(&str, Vec<(&str, &Place)>)> {
    let mut groups: BTreeMap<&str, Vec<(&str, &Place)>> = BTreeMap::new();
    for (who, why, at) in &review.survey.rejected {
        groups.entry(why).or_default().push((who, at));
    }
    let mut groups: Vec<_> = groups.into_iter().collect();
    groups.sort_by_key(|(_, parts)| std::cmp::Reverse(parts.len()));
    groups
}

/// What is missing that the model could state: everything but the actions, that are the engineer's to state.
pub(super) fn lacks(review: &Review) -> Vec<group::Lack<'_>> {
    group::lacks(review.joints.iter().filter(|joint| joint.found()), |_, m| m.what != REQUIRED_ACTIONS)
}

fn recognised(page: &mut Page, review: &Review) {
    let survey = &review.survey;
    page.heading("RECOGNISED");
    let parts = [
        count(survey.members, "member", "members"),
        count(survey.plates, "plate", "plates"),
        count(survey.bolts, "bolt", "bolts"),
        count(survey.welds, "weld", "welds"),
        count(survey.pieces, "shipping piece", "shipping pieces"),
        count(review.counts.found, "joint", "joints"),
    ];
    page.line(3, &parts.join(", "));
    for (kind, joints) in kinds(review) {
        let assessed = joints.iter().filter(|joint| group::assessed(joint)).count();
        let list = page.listed(marks(&joints));
        let joints = count(joints.len(), "joint", "joints");
        page.line(3, &format!("{kind} ({joints}, resistance computed for {assessed}): {list}"));
    }
}

fn rejected(page: &mut Page, review: &Review) {
    let groups = rejected_by_reason(review);
    if groups.is_empty() {
        page.heading("NOT TAKEN UP: nothing");
        return;
    }
    page.heading(&format!("NOT TAKEN UP: {}", count(review.survey.rejected.len(), "part", "parts")));
    let bound = page.bound(GROUPS);
    for (why, parts) in groups.iter().take(bound) {
        let list = page.listed(parts.iter().map(|(who, at)| format!("{who} ({at})")));
        page.line(3, &format!("{why} ({}): {list}", count(parts.len(), "part", "parts")));
    }
    page.more(3, groups.len().saturating_sub(bound), ("reason", "reasons"));
}

fn loose(page: &mut Page, review: &Review) {
    let bolts = &review.survey.loose_bolts;
    if bolts.is_empty() {
        return;
    }
    page.heading(&format!("BOLTS THROUGH FEWER THAN TWO PLIES: {}", bolts.len()));
    let bound = page.bound(GROUPS);
    for (guid, at) in bolts.iter().take(bound) {
        page.line(3, &format!("GlobalId {guid}, {at}"));
    }
    page.more(3, bolts.len().saturating_sub(bound), ("bolt", "bolts"));
}

fn lacking(page: &mut Page, review: &Review) {
    let (limits, lacks): (Vec<_>, Vec<_>) = lacks(review).into_iter().partition(|lack| lack.ask == Ask::Method);
    if lacks.is_empty() {
        page.heading("MISSING FOR A FULL ASSESSMENT: nothing that was looked for");
    } else {
        page.heading("MISSING FOR A FULL ASSESSMENT");
        list(page, &lacks, ("missing thing", "missing things"));
    }
    if !limits.is_empty() {
        page.heading("BEYOND WHAT IS ASSESSED: check these by other means");
        list(page, &limits, ("of this kind", "of this kind"));
    }
}

fn list(page: &mut Page, lacks: &[group::Lack<'_>], more: (&str, &str)) {
    let bound = page.bound(GROUPS);
    for lack in lacks.iter().take(bound) {
        let joints = count(lack.joints.len(), "joint", "joints");
        page.toned(3, Tone::Unproven, &format!("{} ({joints}): {}", lack.what, page.listed(marks(&lack.joints))));
        text::reasons(page, lack);
    }
    page.more(3, lacks.len().saturating_sub(bound), more);
}

/// The questions that settle most joints, in that order.
pub(super) fn questions(review: &Review) -> Vec<(String, Vec<&str>)> {
    let mut questions: Vec<(String, Vec<&str>)> = lacks(review)
        .iter()
        .filter(|l| l.ask == Ask::Fabricator)
        .map(|l| (l.what.to_owned(), marks(&l.joints)))
        .collect();
    let loose = review.survey.loose_bolts.len();
    if loose > 0 {
        let bolts = count(loose, "bolt that passes", "bolts that pass");
        questions.push((format!("what is held together by {bolts} through fewer than two plies"), Vec::new()));
    }
    let rejected = review.survey.rejected.iter().filter(|(_, why, _)| could_be_taken_up(why)).count();
    if rejected > 0 {
        let parts = count(rejected, "part that was", "parts that were");
        let what = format!("drawings of the {parts} not taken up, or an export that holds them as straight solids");
        questions.push((what, Vec::new()));
    }
    questions
}

/// Whether another export could change it that a part was not taken up: not for what is no steel, nor for what is read
/// and not assessed.
fn could_be_taken_up(why: &str) -> bool {
    !(why.ends_with("is no steel") || why.ends_with("not assessed"))
}

fn ask(page: &mut Page, review: &Review) {
    page.heading("WHAT TO ASK THE FABRICATOR FOR");
    // What the same joints lack is one question.
    let mut questions: Vec<(String, Vec<&str>)> = Vec::new();
    for (what, joints) in self::questions(review) {
        match questions.last_mut().filter(|(_, others)| !joints.is_empty() && *others == joints) {
            Some((whats, _)) => *whats += &format!(", {what}"),
            None => questions.push((what, joints)),
        }
    }
    if questions.is_empty() && review.counts.found == 0 {
        page.line(
            3,
            "An export that holds the members, plates and bolts of the joints: no joint was found in this one.",
        );
    } else if questions.is_empty() {
        page.line(3, "Nothing: whatever was looked for is stated.");
        if lacks(review).iter().any(|lack| lack.ask == Ask::Method) {
            page.line(3, "Little was looked for at the joints that are beyond what is assessed.");
        }
    }
    for (number, (what, joints)) in (1..).zip(&questions) {
        let of = match joints.len() {
            0 => String::new(),
            n => format!(", {}: {}", count(n, "joint", "joints"), page.listed(joints)),
        };
        page.line(3, &format!("{number}. {what}{of}"));
    }
}
