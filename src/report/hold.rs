//! One held joint in a few lines: how much it lacks, what governs, what was intended, on which part, and where.

use similar::{Algorithm, DiffOp, capture_diff_slices};

use super::group::{self, reasons_left, sentence, worst_case};
use super::number::{action, count, utilisation};
use super::page::{Page, Tone};

use super::window::Source;
use crate::origin::Place;
use crate::review::{Finding, JointReview, MemberBrief, Outcome, Required, Resistance, StiffnessResult};

/// Findings and reasons a joint that are not written out.
const FINDINGS: usize = 8;

/// Parts of a finding that are named.
const PARTS: usize = 3;

/// Changed lines of a difference that are not written out.
const CHANGES: usize = 12;

/// Draws one held joint; `alike` are others with the same faults, that are only named.
pub(super) fn draw(
    page: &mut Page,
    joint: &JointReview,
    alike: &[&JointReview],
    model: &str,
    source: Option<&Source<'_>>,
) {
    let at = look_at(joint, model);
    let worst = worst_case(joint);
    page.toned(0, Tone::Hold, &lead(joint, worst));
    page.line(3, &who(joint));
    if let Some(case) = worst {
        page.line(3, &format!("required ({}): {}", case.case, required(case)));
        page.line(3, &format!("resistance: {}", against(joint, case)));
    } else {
        page.line(3, &format!("resistance: {}; no required actions are stated", resistance(&joint.resistance)));
    }
    if let Some(intended) = &joint.intended_resistance {
        page.line(3, &format!("as intended it would resist {}", resistance(intended)));
    }
    if let Some(stiffness) = &joint.stiffness {
        page.line(3, &turning(stiffness));
    }
    findings(page, joint, at);
    for missing in &joint.missing {
        page.line(3, &format!("not known either: {missing}"));
    }
    difference(page, joint);
    if let Some(at) = at {
        page.line(3, &format!("look at {at}"));
        if let Some(source) = source {
            window(page, at, source);
        }
    }
    if !alike.is_empty() {
        let list = page.listed(alike.iter().map(|other| brief(other)));
        page.line(3, &format!("the same faults at {}: {list}", count(alike.len(), "more joint", "more joints")));
    }
}

/// "stiffness: Sj,ini 24310 kNm/rad, semi-rigid (rigid from 48500); partial-strength".
pub(super) fn turning(s: &StiffnessResult) -> String {
    let least = if s.lower_bound { "at least " } else { "" };
    let from = s.rigid_from.map_or(String::new(), |rigid| format!(" (rigid from {rigid:.0})"));
    let class = if s.class.starts_with("not stated") { format!("class {}", s.class) } else { s.class.clone() };
    format!("stiffness: Sj,ini {least}{:.0} kNm/rad, {class}{from}; {}", s.initial, s.strength)
}

/// "B2 (1.02, part P2)".
fn brief(joint: &JointReview) -> String {
    let used = joint.utilisation().map(utilisation);
    let part = joint.findings.iter().flat_map(|f| &f.elements).find_map(|guid| mark_of(joint, guid));
    let about: Vec<String> = used.into_iter().chain(part.map(|mark| format!("part {mark}"))).collect();
    if about.is_empty() { joint.mark.clone() } else { format!("{} ({})", joint.mark, about.join(", ")) }
}

fn lead(joint: &JointReview, worst: Option<&Required>) -> String {
    let used = match worst.and_then(|case| case.utilisation) {
        Some(ratio) => format!("utilisation {}", utilisation(ratio)),
        None => "utilisation not known".into(),
    };
    match group::governing(joint) {
        Some(governed) => format!("{}: {used}, governed by {governed}", joint.mark),
        None => format!("{}: {used}", joint.mark),
    }
}

/// "B1 (UKB 457x191x67, S355) on C1 (UKC 254x254x89, grade not known); end-plate-moment, intended detail M3".
pub(super) fn who(joint: &JointReview) -> String {
    let members = match (&joint.supported, &joint.supporting) {
        (Some(on), Some(by)) => format!("{} on {}; ", member(on), member(by)),
        (Some(one), None) | (None, Some(one)) => format!("{}; ", member(one)),
        (None, None) => String::new(),
    };
    let detail = joint.detail.as_ref().map_or(String::new(), |detail| format!(", intended detail {detail}"));
    format!("{members}{}{detail}", joint.kind)
}

/// "end-plate-moment, IPE 400 on HEB 260": what joints of one sort share.
pub(super) fn what(joint: &JointReview) -> String {
    let section = |member: &Option<MemberBrief>| member.as_ref().and_then(|m| m.section.clone());
    match (section(&joint.supported), section(&joint.supporting)) {
        (Some(on), Some(by)) => format!("{}, {on} on {by}", joint.kind),
        (Some(one), None) | (None, Some(one)) => format!("{}, {one}", joint.kind),
        (None, None) => joint.kind.clone(),
    }
}

fn member(member: &MemberBrief) -> String {
    let mark = member.mark.as_deref().unwrap_or("a member without mark");
    let section = member.section.as_deref().unwrap_or("section not known");
    let grade = member.grade.as_deref().unwrap_or("grade not known");
    format!("{mark} ({section}, {grade})")
}

/// "M 262.0 kNm, V 120.0 kN, N not stated".
pub(super) fn required(case: &Required) -> String {
    let tying = case.tying_kn.map_or(String::new(), |kn| format!(", tying {}", action(Some(kn), "kN", "")));
    format!(
        "M {}, V {}, N {}{tying}",
        action(case.moment_knm, "kNm", "not stated"),
        action(case.shear_kn, "kN", "not stated"),
        action(case.axial_kn, "kN", "not stated"),
    )
}

fn against(joint: &JointReview, case: &Required) -> String {
    let over = joint.required.iter().filter(|c| c.utilisation.is_some_and(|ratio| ratio > 1.0)).count();
    let cases = match joint.required.len() {
        0 | 1 => String::new(),
        all => format!("; {over} of {all} load cases above 1.00"),
    };
    let moment = case.moment_resistance_knm.or(match case.moment_knm {
        Some(m) if m < 0.0 => joint.resistance.moment_reversed_knm,
        _ => joint.resistance.moment_knm,
    });
    format!("{}{cases}", carried(moment, String::new(), joint.resistance.shear_kn))
}

/// "M 270.1 kNm (-180.0 kNm reversed), V 400.0 kN".
pub(super) fn resistance(resistance: &Resistance) -> String {
    let reversed = match resistance.moment_reversed_knm {
        Some(_) => format!(" ({} reversed)", action(resistance.moment_reversed_knm, "kNm", "")),
        None => String::new(),
    };
    let axial = match resistance.axial_kn {
        Some(_) => format!(", N {}", action(resistance.axial_kn, "kN", "")),
        None => String::new(),
    };
    if resistance.moment_knm.is_none() && resistance.shear_kn.is_none() && resistance.axial_kn.is_some() {
        return axial.trim_start_matches(", ").to_owned();
    }
    format!("{}{axial}", carried(resistance.moment_knm, reversed, resistance.shear_kn))
}

/// A joint that carries shear alone has no moment resistance to speak of.
fn carried(moment: Option<f64>, reversed: String, shear: Option<f64>) -> String {
    let by_shear = format!("V {}", action(shear, "kN", "not known"));
    if moment.is_none() && shear.is_some() {
        return by_shear;
    }
    format!("M {}{reversed}, {by_shear}", action(moment, "kNm", "not known"))
}

fn findings(page: &mut Page, joint: &JointReview, said: Option<&Place>) {
    let bound = page.bound(FINDINGS);
    let mut named: &[String] = &[];
    for finding in joint.findings.iter().take(bound) {
        let also = if finding.severity == Outcome::Hold { "" } else { "also " };
        let text = match group::said_by_worst_case(joint, finding) {
            true => format!("{}: as said above", finding.rule),
            false => sentence(finding),
        };
        page.line(3, &format!("{also}{text}"));
        if finding.elements == named && !named.is_empty() {
            continue;
        }
        named = &finding.elements;
        if let Some(parts) = parts(page, joint, finding, said) {
            page.line(5, &parts);
        }
    }
    page.more(3, joint.findings.len().saturating_sub(bound), ("finding at this joint", "findings at this joint"));
    if joint.findings.iter().all(|finding| finding.elements.is_empty()) {
        all_parts(page, joint);
    }
    let left: Vec<&str> = reasons_left(joint).collect();
    for reason in left.iter().take(bound) {
        page.line(3, reason);
    }
    page.more(3, left.len().saturating_sub(bound), ("reason", "reasons"));
}

/// "part EP12 (GlobalId 2oxS…), hall.ifcxml:120:44".
fn parts(page: &Page, joint: &JointReview, finding: &Finding, said: Option<&Place>) -> Option<String> {
    let named = finding.elements.iter().map(|guid| match mark_of(joint, guid) {
        Some(mark) => format!("{mark} (GlobalId {guid})"),
        None => format!("GlobalId {guid}"),
    });
    let named = page.listed_to(PARTS, named);
    let noun = if finding.elements.len() == 1 { "part" } else { "parts" };
    match (finding.at.as_ref().filter(|at| Some(*at) != said), named.is_empty()) {
        (Some(at), false) => Some(format!("{noun} {named}, {at}")),
        (None, false) => Some(format!("{noun} {named}")),
        (Some(at), true) => Some(format!("at {at}")),
        (None, true) => None,
    }
}

/// Plates and members with their GlobalIds, where no finding says which part is meant.
fn all_parts(page: &mut Page, joint: &JointReview) {
    let plates = joint.plates.iter().map(|plate| (plate.role.as_str(), &plate.mark, &plate.guid));
    let members = joint.supported.iter().chain(&joint.supporting).map(|member| ("member", &member.mark, &member.guid));
    let named = plates.chain(members).map(|(role, mark, guid)| match mark {
        Some(mark) => format!("{role} {mark} (GlobalId {guid})"),
        None => format!("{role} (GlobalId {guid})"),
    });
    let list = page.listed(named);
    if !list.is_empty() {
        page.line(3, &format!("parts: {list}"));
    }
}

fn mark_of<'a>(joint: &'a JointReview, guid: &str) -> Option<&'a str> {
    let plates = joint.plates.iter().map(|plate| (&plate.guid, &plate.mark));
    let members = joint.supporting.iter().chain(&joint.supported).map(|member| (&member.guid, &member.mark));
    plates.chain(members).find(|(own, _)| *own == guid).and_then(|(_, mark)| mark.as_deref())
}

/// Only the lines that changed, intended left and detailed right.
fn difference(page: &mut Page, joint: &JointReview) {
    let Some((intended, detailed)) = &joint.difference else { return };
    let mut changes: Vec<(&str, &str, &str)> = Vec::new();
    for op in capture_diff_slices(Algorithm::Myers, intended, detailed) {
        let (left, right) = match op {
            DiffOp::Equal { .. } => continue,
            op => (&intended[op.old_range()], &detailed[op.new_range()]),
        };
        for row in 0..left.len().max(right.len()) {
            changes.push(match (left.get(row), right.get(row)) {
                (Some(a), Some(b)) => (a, "≠", b),
                (Some(a), None) => (a, "−", ""),
                (None, Some(b)) => ("", "+", b),
                (None, None) => continue,
            });
        }
    }
    if changes.is_empty() {
        return;
    }
    let bound = page.bound(CHANGES);
    let shown = &changes[..changes.len().min(bound)];
    let half = page.options().width.saturating_sub(5 + 3) / 2;
    let wide = shown.iter().map(|(a, ..)| a.chars().count()).chain(["intended".len()]).max().unwrap_or(0).min(half);
    page.raw(5, Tone::Quiet, &format!("{:wide$}   detailed", "intended"));
    for (left, sign, right) in shown {
        page.raw(5, Tone::Plain, &format!("{:wide$} {sign} {}", cut(left, wide), cut(right, half)));
    }
    page.more(5, changes.len() - shown.len(), ("changed line", "changed lines"));
}

fn cut(text: &str, wide: usize) -> String {
    if text.chars().count() <= wide {
        return text.to_owned();
    }
    text.chars().take(wide.saturating_sub(1)).chain(['…']).collect()
}

/// The place to look at first, with the model's text round it.
fn look_at<'a>(joint: &'a JointReview, model: &str) -> Option<&'a Place> {
    // The fault before what it leads to: the thin plate, not the whole joint that is short of moment.
    let (of_actions, faults): (Vec<_>, Vec<_>) = joint.findings.iter().partition(|finding| group::of_actions(finding));
    let places = faults.into_iter().chain(of_actions).filter_map(|finding| finding.at.as_ref());
    places.chain(&joint.at).find(|at| &*at.file == model)
}

fn window(page: &mut Page, at: &Place, source: &Source<'_>) {
    let width = page.options().width.saturating_sub(5 + 2);
    if let Some((text, pointer)) = source.window(at, width) {
        page.raw(5, Tone::Quiet, &text);
        page.raw(5, Tone::Quiet, &pointer);
    }
}
