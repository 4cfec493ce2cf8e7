//! The review and the survey as JSON: structs of their own with a version each, that only ever grow.
//!
//! Lengths in mm, forces in kN, moments in kNm; `null` is "not known", "not stated" or "does not apply". Numbers are
//! rounded to 0.001 and ratios to 0.000001; what is not finite is `null`.

pub mod document;

use document::{
    Basis, BoltRow, Bolts, Check, Counts, Difference, Finding, Input, Joint, Kind, Lack, LackReason, Member, Missing,
    Model, Part, Place, Plate, Problem, Question, Recognised, Rejected, Required, Resistance, Row, Setting, Spring,
    Stiffness, Tool, Weld,
};

use std::io::{self, Write};

use serde::{Serialize, Serializer};

use super::{group, survey as drawn};
use crate::origin;
use crate::review::{self, CAUTION, Review};

/// The review's schema and version.
pub const REVIEW_SCHEMA: &str = "faying-review/1";

/// The survey's schema and version.
pub const SURVEY_SCHEMA: &str = "faying-survey/1";

/// The review as a JSON document that ends with a line end; the same bytes for the same review.
///
/// # Errors
/// Only where serde_json can't write, which these structs give no cause for.
pub fn review(review: &Review) -> serde_json::Result<String> {
    written(&document(review))
}

/// The survey as a JSON document that ends with a line end; the same bytes for the same review.
///
/// # Errors
/// Only where serde_json can't write, which these structs give no cause for.
pub fn survey(review: &Review) -> serde_json::Result<String> {
    written(&surveyed(review))
}

/// Writes what [`fn@review`] gives without ever holding all of it.
///
/// # Errors
/// Whatever the writer says.
pub fn write_review(review: &Review, to: impl Write) -> io::Result<()> {
    write(&document(review), to)
}

/// Writes what [`survey`] gives without ever holding all of it.
///
/// # Errors
/// Whatever the writer says.
pub fn write_survey(review: &Review, to: impl Write) -> io::Result<()> {
    write(&surveyed(review), to)
}

/// Items that are put into the form of the document one by one, as they are written.
struct Each<'a, T, F>(&'a [T], F);

impl<T, U: Serialize, F: Fn(&T) -> U> Serialize for Each<'_, T, F> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_seq(self.0.iter().map(&self.1))
    }
}

fn document(review: &Review) -> document::Review<impl Serialize, impl Serialize> {
    document::Review {
        schema: REVIEW_SCHEMA.into(),
        tool: this_tool(),
        model: model(review),
        schedule: review.schedule.clone(),
        basis: basis(&review.basis),
        counts: counts(&review.counts),
        joints: Each(&review.joints, joint),
        problems: Each(&review.problems, problem),
        caution: CAUTION.into(),
    }
}

fn surveyed(review: &Review) -> document::Survey {
    let s = &review.survey;
    let strings = |marks: Vec<&str>| marks.into_iter().map(str::to_owned).collect::<Vec<String>>();
    let kind = |(kind, joints): (&str, Vec<&review::JointReview>)| Kind {
        kind: kind.to_owned(),
        assessed: joints.iter().filter(|joint| group::assessed(joint)).count(),
        joints: strings(group::marks(&joints)),
    };
    let part = |part: &str, at: &origin::Place| Part { part: part.to_owned(), at: place(at) };
    let lack = |lack: group::Lack<'_>| Lack {
        what: lack.what.to_owned(),
        ask: lack.ask.word().to_owned(),
        joints: strings(group::marks(&lack.joints)),
        reasons: lack
            .reasons
            .iter()
            .map(|(reason, joints, at)| LackReason {
                reason: (*reason).to_owned(),
                joints: strings(group::marks(joints)),
                first_at: at.map(place),
            })
            .collect(),
    };
    document::Survey {
        schema: SURVEY_SCHEMA.into(),
        tool: this_tool(),
        model: model(review),
        recognised: Recognised {
            members: s.members,
            plates: s.plates,
            bolts: s.bolts,
            welds: s.welds,
            pieces: s.pieces,
            joints: review.counts.found,
        },
        kinds: drawn::kinds(review).into_iter().map(kind).collect(),
        rejected: drawn::rejected_by_reason(review)
            .into_iter()
            .map(|(reason, parts)| Rejected {
                reason: reason.to_owned(),
                parts: parts.into_iter().map(|(who, at)| part(who, at)).collect(),
            })
            .collect(),
        loose_bolts: s.loose_bolts.iter().map(|(guid, at)| part(guid, at)).collect(),
        missing: drawn::lacks(review).into_iter().map(lack).collect(),
        ask: drawn::questions(review)
            .into_iter()
            .map(|(what, joints)| Question { what, joints: strings(joints) })
            .collect(),
        problems: review.problems.iter().map(problem).collect(),
        caution: CAUTION.into(),
    }
}

fn written(document: &impl Serialize) -> serde_json::Result<String> {
    serde_json::to_string_pretty(document).map(|text| text + "\n")
}

fn write(document: &impl Serialize, to: impl Write) -> io::Result<()> {
    let mut to = io::BufWriter::with_capacity(1 << 16, to);
    serde_json::to_writer_pretty(&mut to, document)?;
    to.write_all(b"\n")?;
    to.flush()
}

/// Rounded to 0.001; `None` where it is not finite.
fn thousandth(value: f64) -> Option<f64> {
    rounded(value, 1e3)
}

/// A ratio, rounded to 0.000001.
fn ratio(value: f64) -> Option<f64> {
    rounded(value, 1e6)
}

fn rounded(value: f64, per: f64) -> Option<f64> {
    // Adding zero takes the sign off a negative zero.
    Some((value * per).round() / per + 0.0).filter(|rounded| rounded.is_finite())
}

fn this_tool() -> Tool {
    Tool { name: env!("CARGO_PKG_NAME").into(), version: env!("CARGO_PKG_VERSION").into() }
}

fn model(r: &Review) -> Model {
    Model { file: r.file.clone(), exchange: r.exchange.clone(), sha256: r.sha256.clone() }
}

fn basis(b: &review::Basis) -> Basis {
    let setting = |(name, value): &(String, String)| Setting { name: name.clone(), value: value.clone() };
    Basis {
        standard: b.standard.into(),
        annex: b.annex.clone(),
        annex_source: b.annex_source.clone(),
        gamma_m0: ratio(b.gamma_m0),
        gamma_m1: ratio(b.gamma_m1),
        gamma_m2: ratio(b.gamma_m2),
        settings: b.settings.iter().map(setting).collect(),
    }
}

fn counts(c: &review::Counts) -> Counts {
    let review::Counts { found, scheduled, paired, assessed, clear, comment, hold, unproven } = *c;
    Counts { found, scheduled, paired, assessed, clear, comment, hold, unproven }
}

fn joint(j: &review::JointReview) -> Joint {
    let input = |(name, value, origin): &(String, String, String)| Input {
        name: name.clone(),
        value: value.clone(),
        origin: origin.clone(),
    };
    Joint {
        mark: j.mark.clone(),
        kind: j.kind.clone(),
        detail: j.detail.clone(),
        outcome: j.outcome.word().into(),
        utilisation: j.utilisation().and_then(ratio),
        reasons: j.reasons.clone(),
        supporting: j.supporting.as_ref().map(member),
        supported: j.supported.as_ref().map(member),
        bolts: j.bolts.as_ref().map(bolts),
        plates: j.plates.iter().map(plate).collect(),
        welds: j
            .welds
            .iter()
            .map(|w| Weld { role: w.role.clone(), throat_mm: w.throat_mm.and_then(thousandth) })
            .collect(),
        resistance: resistance(&j.resistance),
        intended_resistance: j.intended_resistance.as_ref().map(resistance),
        required: j.required.iter().map(required).collect(),
        rows: j.rows.iter().map(row).collect(),
        stiffness: j.stiffness.as_ref().map(stiffness),
        checks: j.checks.iter().map(check).collect(),
        findings: j.findings.iter().map(finding).collect(),
        missing: j.missing.iter().map(missing).collect(),
        assumptions: j.assumptions.clone(),
        inputs: j.inputs.iter().map(input).collect(),
        difference: j
            .difference
            .as_ref()
            .map(|(intended, detailed)| Difference { intended: intended.clone(), detailed: detailed.clone() }),
        at: j.at.as_ref().map(place),
    }
}

fn member(m: &review::MemberBrief) -> Member {
    Member { guid: m.guid.clone(), mark: m.mark.clone(), section: m.section.clone(), grade: m.grade.clone() }
}

fn bolts(b: &review::BoltsBrief) -> Bolts {
    Bolts {
        count: b.count,
        diameter_mm: b.diameter_mm.and_then(thousandth),
        class: b.class.clone(),
        gauge_mm: b.gauge_mm.and_then(thousandth),
        rows: b.row_heights_mm.iter().map(|height| BoltRow { height_mm: thousandth(*height) }).collect(),
    }
}

fn plate(p: &review::PlateBrief) -> Plate {
    Plate {
        guid: p.guid.clone(),
        mark: p.mark.clone(),
        role: p.role.clone(),
        thickness_mm: thousandth(p.thickness_mm),
        width_mm: thousandth(p.width_mm),
        depth_mm: thousandth(p.depth_mm),
        grade: p.grade.clone(),
    }
}

fn resistance(r: &review::Resistance) -> Resistance {
    Resistance {
        moment_knm: r.moment_knm.and_then(thousandth),
        moment_reversed_knm: r.moment_reversed_knm.and_then(thousandth),
        moment_without_welds_knm: r.moment_without_welds_knm.and_then(thousandth),
        shear_kn: r.shear_kn.and_then(thousandth),
        axial_kn: r.axial_kn.and_then(thousandth),
        governed_by: r.governed_by.clone(),
    }
}

fn required(r: &review::Required) -> Required {
    Required {
        case: r.case.clone(),
        moment_knm: r.moment_knm.and_then(thousandth),
        shear_kn: r.shear_kn.and_then(thousandth),
        axial_kn: r.axial_kn.and_then(thousandth),
        tying_kn: r.tying_kn.and_then(thousandth),
        utilisation: r.utilisation.and_then(ratio),
        governed_by: r.governed_by.clone(),
        moment_resistance_knm: r.moment_resistance_knm.and_then(thousandth),
        at: r.at.as_ref().map(place),
    }
}

fn row(r: &review::RowResult) -> Row {
    Row {
        row: r.row,
        lever_arm_mm: thousandth(r.lever_arm_mm),
        potential_kn: thousandth(r.potential_kn),
        force_kn: thousandth(r.force_kn),
        governed_by: r.governed_by.clone(),
    }
}

fn stiffness(s: &review::StiffnessResult) -> Stiffness {
    let spring = |(title, k): &(String, Option<f64>)| Spring { title: title.clone(), k_mm: k.and_then(thousandth) };
    Stiffness {
        sense: s.sense.into(),
        beta: ratio(s.beta),
        initial_knm_per_rad: thousandth(s.initial),
        at_required_knm_per_rad: s.at_required.and_then(thousandth),
        lower_bound: s.lower_bound,
        lever_arm_mm: thousandth(s.lever_arm_mm),
        springs: s.springs.iter().map(spring).collect(),
        rigid_from_knm_per_rad: s.rigid_from.and_then(thousandth),
        pinned_up_to_knm_per_rad: s.pinned_up_to.and_then(thousandth),
        class: s.class.clone(),
        assumed: s.assumed.map(Into::into),
        strength: s.strength.into(),
        rotation: s.rotation.clone(),
        notes: s.notes.clone(),
    }
}

fn check(c: &review::CheckResult) -> Check {
    Check {
        id: c.id.clone(),
        title: c.title.clone(),
        clause: c.clause.clone(),
        resistance: c.resistance.and_then(thousandth),
        action: c.action.and_then(thousandth),
        unit: c.unit.into(),
        utilisation: c.utilisation.and_then(ratio),
        outcome: c.outcome.into(),
        needed_throat_mm: c.needed_throat_mm.and_then(thousandth),
    }
}

fn finding(f: &review::Finding) -> Finding {
    Finding {
        rule: f.rule.into(),
        severity: f.severity.word().into(),
        message: f.message.clone(),
        intended: f.intended.clone(),
        detailed: f.detailed.clone(),
        elements: f.elements.clone(),
        at: f.at.as_ref().map(place),
    }
}

fn missing(m: &origin::Missing) -> Missing {
    Missing {
        what: m.what.clone(),
        reason: m.reason.clone(),
        ask: m.ask.word().to_owned(),
        at: m.at.as_ref().map(place),
    }
}

fn problem(p: &origin::Problem) -> Problem {
    Problem { message: p.message.clone(), at: p.at.as_ref().map(place) }
}

fn place(p: &origin::Place) -> Place {
    Place { file: p.file.to_string(), line: p.line, column: p.column }
}
