//! The sections of a sheet.

use super::content::{Block, Table, governs};
use super::formula::text;
use super::working::{self, shown};
use crate::origin::{Ask, Place};
use crate::report::drawing::figure;
use crate::report::number::{factor, one_decimal, utilisation};
use crate::report::{group, hold};
use crate::review::{CAUTION, CheckResult, JointReview, Review, StiffnessResult};
use crate::units::Quantity;

/// Said once above all workings.
pub(super) const HOW_TO_READ: &str = "Each step stands in symbols, in numbers and with its value, as it was computed; \
numbers are rounded for reading and were computed unrounded. A step without its numbers uses a value that is not on this \
page. Lengths in mm, forces in kN, moments in kNm, strengths in N/mm². E = 210000 N/mm² (EN 1993-1-1 3.2.6).";

/// One decimal, or a dash for what nobody stated or is no number.
pub(super) fn plain(value: Option<f64>) -> String {
    value.filter(|v| v.is_finite()).map_or_else(|| "-".into(), one_decimal)
}

fn used(ratio: Option<f64>) -> String {
    ratio.map_or_else(|| "-".into(), utilisation)
}

fn at(review: &Review, place: Option<&Place>) -> String {
    place.map_or_else(|| "-".into(), |place| short(review, &place.to_string()))
}

/// A text with the inputs' file names without their folders; the heading has them in full.
fn short(review: &Review, text: &str) -> String {
    let files = std::iter::once(review.file.as_str()).chain(review.schedule.iter().flat_map(|all| all.split(", ")));
    let bare = |file: &str| file.rsplit(['/', '\\']).next().unwrap_or(file).to_owned();
    files.filter(|file| !bare(file).is_empty()).fold(text.to_owned(), |text, file| text.replace(file, &bare(file)))
}

fn list(sentences: impl IntoIterator<Item = String>, none: &str) -> Vec<Block> {
    let sentences: Vec<String> = sentences.into_iter().collect();
    if sentences.is_empty() { vec![Block::Line(text(none))] } else { vec![Block::List(sentences)] }
}

/// Which bytes, which basis, which joint.
pub(super) fn head(review: &Review, joint: &JointReview) -> Vec<Block> {
    let basis = &review.basis;
    let factors = [("γM0", basis.gamma_m0), ("γM1", basis.gamma_m1), ("γM2", basis.gamma_m2)];
    let factors: Vec<String> = factors.map(|(name, value)| format!("{name} = {}", factor(value))).into();
    let settings: Vec<String> = basis.settings.iter().map(|(name, value)| format!("{name}: {value}")).collect();
    let mut pairs = vec![
        ("joint", hold::who(joint)),
        ("look at", at(review, joint.at.as_ref())),
        ("model", format!("{} ({})", review.file, review.exchange)),
        ("SHA-256", review.sha256.clone()),
        ("schedule", review.schedule.clone().unwrap_or_else(|| "none was given".into())),
        ("basis", format!("{}, {} ({})", basis.standard, basis.annex, basis.annex_source)),
        ("partial factors", factors.join(", ")),
        ("settings", settings.join("; ")),
        ("signs", "M is positive with tension at the top of the joint, N in tension; V by magnitude".into()),
    ];
    pairs.retain(|(_, value)| !value.is_empty() && value != "-");
    vec![Block::Pairs(pairs)]
}

/// How it ends, why, and the required actions by case.
pub(super) fn outcome(review: &Review, joint: &JointReview) -> Vec<Block> {
    let governed = group::governing(joint).map(|what| format!("governed by {what}"));
    let ratio = joint.utilisation().map(|ratio| format!("utilisation {}", utilisation(ratio)));
    let case = group::worst_case(joint).filter(|case| case.utilisation.is_some());
    let ratio = ratio.map(|ratio| case.map_or(ratio.clone(), |case| format!("{ratio} in {}", case.case)));
    let said: Vec<String> = ratio.into_iter().chain(governed).collect();
    let mut blocks = vec![Block::Outcome(joint.outcome.word(), said.join(", "))];
    if !joint.reasons.is_empty() {
        blocks.push(Block::List(joint.reasons.clone()));
    }
    blocks.push(Block::Line(text(format!("Resistance: {}.", hold::resistance(&joint.resistance)))));
    if let Some(intended) = &joint.intended_resistance {
        blocks.push(Block::Line(text(format!("As intended it would resist {}.", hold::resistance(intended)))));
    }
    if joint.required.is_empty() {
        blocks.push(Block::Line(text("No required actions are stated.")));
        return blocks;
    }
    let head = ["case", ">$M_Ed kNm", ">$V_Ed kN", ">$N_Ed kN", ">$M_j_Rd kNm", ">utilisation", "governed by", "line"];
    let mut table = Table::new("Required actions by load case (- : not stated)", &head);
    table.rows.extend(joint.required.iter().map(|case| {
        vec![
            case.case.clone(),
            plain(case.moment_knm),
            plain(case.shear_kn),
            plain(case.axial_kn),
            plain(case.moment_resistance_knm),
            used(case.utilisation),
            case.governed_by.clone().unwrap_or_else(|| "-".into()),
            at(review, case.at.as_ref()),
        ]
    }));
    blocks.push(Block::Table(table));
    blocks
}

/// Every number that entered a check.
pub(super) fn inputs(review: &Review, joint: &JointReview) -> Block {
    let mut table = Table::new("Every number that entered a check", &["input", "value", "where it came from"]);
    let row =
        |(name, value, origin): &(String, String, String)| vec![name.clone(), value.clone(), short(review, origin)];
    table.rows.extend(joint.inputs.iter().map(row));
    Block::Table(table)
}

/// Row forces, and how they add up to the moment resistance.
pub(super) fn rows(joint: &JointReview) -> Vec<Block> {
    let mut blocks = Vec::new();
    if let Some(basis) = &joint.row_basis {
        let side = if basis.tension_at_top { "top" } else { "bottom" };
        let case = basis.case.as_ref().map_or(String::new(), |case| format!(", for {case}"));
        blocks.push(Block::Line(text(format!(
            "At the full moment resistance with tension at the {side}{case}; β = {} (5.3). Worked down from the tension side: \
             each row takes the least that it, its groups, the compression side and the web panel still allow (6.2.7.2).",
            shown(basis.beta.shown())
        ))));
    }
    let head = ["row", ">lever arm mm", ">alone and in groups kN", ">force kN", ">force · arm kNm", "governed by"];
    let mut table = Table::new("Row forces", &head);
    let (mut force, mut moment) = (0.0, 0.0);
    for row in &joint.rows {
        let part = row.force_kn * row.lever_arm_mm / 1e3;
        (force, moment) = (force + row.force_kn, moment + part);
        table.rows.push(vec![
            row.row.to_string(),
            plain(Some(row.lever_arm_mm)),
            plain(Some(row.potential_kn)),
            plain(Some(row.force_kn)),
            plain(Some(part)),
            row.governed_by.clone(),
        ]);
    }
    let sum = ["sum".into(), String::new(), String::new(), plain(Some(force)), plain(Some(moment)), String::new()];
    table.rows.push(sum.into());
    blocks.push(Block::Table(table));
    if let Some(basis) = &joint.row_basis {
        // Written so that no number counts as a difference.
        let limited = !((basis.moment_knm - basis.of_rows_knm).abs() <= 1e-6 * basis.of_rows_knm.abs());
        blocks.push(Block::Line(match limited {
            false => text(format!("Moment resistance: the sum, {} kNm.", plain(Some(basis.moment_knm)))),
            true => text(format!(
                "Moment resistance: {} kNm, since the welds allow {} of the sum {} kNm.",
                plain(Some(basis.moment_knm)),
                used(Some(basis.moment_knm / basis.of_rows_knm)),
                plain(Some(basis.of_rows_knm))
            )),
        }));
        if !basis.notes.is_empty() {
            blocks.push(Block::List(basis.notes.clone()));
        }
    }
    blocks
}

/// All checks in one table.
pub(super) fn checks(review: &Review, joint: &JointReview) -> Vec<Block> {
    let cases = [
        ("moment", joint.row_basis.as_ref().and_then(|basis| basis.case.as_ref())),
        ("shear", joint.shear_case.as_ref()),
    ];
    let cases: Vec<String> = cases.iter().filter_map(|(what, case)| Some(format!("{what} in {}", (*case)?))).collect();
    let said = match cases.is_empty() {
        true => "No load case stands against these resistances.".to_owned(),
        false => format!(
            "The actions are of the load case that uses the joint most: {}. At a smaller moment each component carries its \
             share of what it carries at the full one.",
            cases.join(", ")
        ),
    };
    let head = ["no.", "check", ">resistance", ">acts", "unit", ">utilisation", "result", "clause"];
    let standard = format!("{} ", review.basis.standard);
    let mut table = Table::new(format!("Checks; clauses without a standard are of {}", review.basis.standard), &head);
    for (i, check) in joint.checks.iter().enumerate() {
        let governs = if governs(joint, check) { ", governs" } else { "" };
        table.rows.push(vec![
            (i + 1).to_string(),
            check.title.clone(),
            plain(check.resistance),
            plain(check.action),
            check.unit.into(),
            used(check.utilisation),
            format!("{}{governs}", check.outcome),
            check.clause.replace(&standard, ""),
        ]);
    }
    vec![Block::Line(text(said)), Block::Table(table)]
}

/// What a check comes to, above its working.
pub(super) fn result(joint: &JointReview, check: &CheckResult) -> Block {
    let acts = check.action.filter(|a| a.is_finite()).map(|a| format!(", acts {} {}", one_decimal(a), check.unit));
    let ratio = check.utilisation.map(|ratio| format!(", utilisation {}", utilisation(ratio)));
    let needed = check.needed_throat_mm.map(|a| format!("; throat needed {} mm", figure(a)));
    let governs = if governs(joint, check) { "; governs" } else { "" };
    Block::Line(text(format!(
        "{}: resistance {} {}{}{}: {}{}{governs}",
        check.clause,
        plain(check.resistance),
        check.unit,
        acts.unwrap_or_default(),
        ratio.unwrap_or_default(),
        check.outcome,
        needed.unwrap_or_default(),
    )))
}

/// Rotational stiffness and class: the springs, then the working.
pub(super) fn stiffness(result: &StiffnessResult, common: &[(&'static str, f64)]) -> Vec<Block> {
    let beta = shown(result.beta.shown());
    let finite = result.initial.is_finite();
    let said = if finite { hold::turning(result) } else { format!("stiffness: no number; {}", result.strength) };
    let mut blocks = vec![
        Block::Line(text(format!("With {}, β = {beta}. {said}.", result.sense))),
        Block::Line(text(format!(
            "The analysis takes it for: {}. Rotation capacity: {}.",
            result.assumed.unwrap_or("not stated"),
            result.rotation.trim_end_matches('.')
        ))),
    ];
    let mut table = Table::new("Springs in a row", &["spring", ">k mm"]);
    let k = |k: Option<f64>| k.map_or_else(|| "infinitely stiff".into(), |k| plain(Some(k)));
    table.rows.extend(result.springs.iter().map(|(name, own)| vec![name.clone(), k(*own)]));
    blocks.push(Block::Table(table));
    if !result.notes.is_empty() {
        blocks.push(Block::List(result.notes.clone()));
    }
    blocks.push(Block::Working(working::lines(&result.working, &[], common)));
    blocks
}

/// Findings, each with the parts it stands on and the place.
pub(super) fn findings(review: &Review, joint: &JointReview) -> Vec<Block> {
    let said = joint.findings.iter().map(|finding| {
        let parts = match finding.elements.as_slice() {
            [] => String::new(),
            guids => format!("; GlobalId {}", guids.join(", ")),
        };
        let place = finding.at.as_ref().map_or(String::new(), |place| format!("; {}", at(review, Some(place))));
        format!("{}: {}{parts}{place}", finding.severity.word(), group::sentence(finding))
    });
    list(said, "Nothing was found.")
}

/// What keeps the joint from a proof, and who can close the gap.
pub(super) fn unproven(review: &Review, joint: &JointReview) -> Vec<Block> {
    let said = joint.missing.iter().map(|missing| {
        let ask = match missing.ask {
            Ask::Fabricator => "ask the fabricator",
            Ask::Engineer => "ask the engineer",
            Ask::Method => "by hand: the method does not cover it",
        };
        let place = missing.at.as_ref().map_or(String::new(), |place| format!("; {}", at(review, Some(place))));
        format!("{missing}; {ask}{place}")
    });
    list(said, "Nothing is missing for a proof.")
}

/// What was assumed.
pub(super) fn assumptions(joint: &JointReview) -> Vec<Block> {
    list(joint.assumptions.iter().cloned(), "Nothing was assumed.")
}

/// The caution, and where to sign.
pub(super) fn record() -> Vec<Block> {
    vec![
        Block::Line(text(CAUTION)),
        Block::Line(text(format!("Drawn by {} {}.", env!("CARGO_PKG_NAME"), env!("CARGO_PKG_VERSION")))),
        Block::Blanks(vec!["Checked by", "Signature", "Date", "Remarks"]),
    ]
}
