//! The documents: what stands in the JSON, key for key. Readers may rely on it; it only ever grows.

use serde::{Deserialize, Serialize};

/// The whole review document; what may be many comes in lists, or in what is written like one.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Review<J = Vec<Joint>, P = Vec<Problem>> {
    /// [`REVIEW_SCHEMA`](super::REVIEW_SCHEMA).
    pub schema: String,
    /// Who wrote it.
    pub tool: Tool,
    /// The shop model.
    pub model: Model,
    /// The schedule's file.
    pub schedule: Option<String>,
    /// What it stands on.
    pub basis: Basis,
    /// Counts.
    pub counts: Counts,
    /// Joints sorted by mark.
    pub joints: J,
    /// Problems of model and schedule.
    pub problems: P,
    /// The caution.
    pub caution: String,
}

/// The program.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Tool {
    /// Its name.
    pub name: String,
    /// Its version.
    pub version: String,
}

/// The shop model.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Model {
    /// As the caller named it.
    pub file: String,
    /// Schema and form.
    pub exchange: String,
    /// Hex.
    pub sha256: String,
}

/// Standard, factors and settings.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Basis {
    /// The standard with its edition.
    pub standard: String,
    /// The annex's name.
    pub annex: String,
    /// Where its values come from.
    pub annex_source: String,
    /// γ_M0.
    #[serde(rename = "gamma_M0")]
    pub gamma_m0: Option<f64>,
    /// γ_M1.
    #[serde(rename = "gamma_M1")]
    pub gamma_m1: Option<f64>,
    /// γ_M2.
    #[serde(rename = "gamma_M2")]
    pub gamma_m2: Option<f64>,
    /// Settings as printed.
    pub settings: Vec<Setting>,
}

/// A setting.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Setting {
    /// Its name.
    pub name: String,
    /// Its value as printed.
    pub value: String,
}

/// Counts of joints.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Counts {
    /// In the steel.
    pub found: usize,
    /// In the schedule.
    pub scheduled: usize,
    /// In both.
    pub paired: usize,
    /// With a resistance.
    pub assessed: usize,
    /// End so.
    pub clear: usize,
    /// End so.
    pub comment: usize,
    /// End so.
    pub hold: usize,
    /// End so.
    pub unproven: usize,
}

/// One joint.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Joint {
    /// Mark.
    pub mark: String,
    /// Kind.
    pub kind: String,
    /// Name of the intended detail.
    pub detail: Option<String>,
    /// "hold", "unproven", "comment" or "clear".
    pub outcome: String,
    /// The largest ratio over all load cases.
    pub utilisation: Option<f64>,
    /// Why it ends so.
    pub reasons: Vec<String>,
    /// The supporting member.
    pub supporting: Option<Member>,
    /// The supported member.
    pub supported: Option<Member>,
    /// Bolts.
    pub bolts: Option<Bolts>,
    /// Plates.
    pub plates: Vec<Plate>,
    /// Welds.
    pub welds: Vec<Weld>,
    /// As detailed.
    pub resistance: Resistance,
    /// As intended.
    pub intended_resistance: Option<Resistance>,
    /// Load cases, each a concurrent set.
    pub required: Vec<Required>,
    /// Row forces of the governing sense.
    pub rows: Vec<Row>,
    /// Rotational stiffness and class; absent from documents of older versions.
    #[serde(default)]
    pub stiffness: Option<Stiffness>,
    /// Checks.
    pub checks: Vec<Check>,
    /// Findings, worst first.
    pub findings: Vec<Finding>,
    /// What is missing for a proof.
    pub missing: Vec<Missing>,
    /// What was assumed.
    pub assumptions: Vec<String>,
    /// Inputs with their origin.
    pub inputs: Vec<Input>,
    /// The detail in lines.
    pub difference: Option<Difference>,
    /// Where to look in the model.
    pub at: Option<Place>,
}

/// A member.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Member {
    /// GlobalId.
    pub guid: String,
    /// Mark.
    pub mark: Option<String>,
    /// Section.
    pub section: Option<String>,
    /// Grade.
    pub grade: Option<String>,
}

/// The bolts of a joint.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Bolts {
    /// How many.
    pub count: usize,
    /// d.
    pub diameter_mm: Option<f64>,
    /// Strength class.
    pub class: Option<String>,
    /// w.
    pub gauge_mm: Option<f64>,
    /// From the top down.
    pub rows: Vec<BoltRow>,
}

/// A row of bolts.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct BoltRow {
    /// Above the soffit of the supported member.
    pub height_mm: Option<f64>,
}

/// A plate.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Plate {
    /// GlobalId.
    pub guid: String,
    /// Mark.
    pub mark: Option<String>,
    /// Role.
    pub role: String,
    /// Thickness.
    pub thickness_mm: Option<f64>,
    /// Across the joint.
    pub width_mm: Option<f64>,
    /// Along the joint's height.
    pub depth_mm: Option<f64>,
    /// Grade.
    pub grade: Option<String>,
}

/// A weld.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Weld {
    /// Role.
    pub role: String,
    /// a.
    pub throat_mm: Option<f64>,
}

/// A resistance; what does not apply is `null` as well.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Resistance {
    /// Tension at the top.
    pub moment_knm: Option<f64>,
    /// Tension at the bottom.
    pub moment_reversed_knm: Option<f64>,
    /// The moment resistance without the welds' limit, in the sense of `moment_knm` or else the reversed one.
    #[serde(default)]
    pub moment_without_welds_knm: Option<f64>,
    /// Shear.
    pub shear_kn: Option<f64>,
    /// Axial.
    pub axial_kn: Option<f64>,
    /// What governs.
    pub governed_by: Option<String>,
}

/// One required set of actions.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Required {
    /// Case.
    pub case: String,
    /// M_Ed.
    pub moment_knm: Option<f64>,
    /// V_Ed.
    pub shear_kn: Option<f64>,
    /// N_Ed.
    pub axial_kn: Option<f64>,
    /// F_tie,Ed.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub tying_kn: Option<f64>,
    /// The largest ratio over everything checked.
    pub utilisation: Option<f64>,
    /// What that ratio belongs to.
    pub governed_by: Option<String>,
    /// What stood against the moment.
    pub moment_resistance_knm: Option<f64>,
    /// The schedule's line.
    pub at: Option<Place>,
}

/// A row's force.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Row {
    /// From the top, from 1.
    pub row: usize,
    /// From the centre of compression.
    pub lever_arm_mm: Option<f64>,
    /// Alone and in groups.
    pub potential_kn: Option<f64>,
    /// What counts.
    pub force_kn: Option<f64>,
    /// What governs.
    pub governed_by: String,
}

/// Rotational stiffness of the leading case, or in the joint's own right.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Stiffness {
    /// "tension at the top" or "tension at the bottom".
    pub sense: String,
    /// β.
    pub beta: Option<f64>,
    /// S_j,ini.
    pub initial_knm_per_rad: Option<f64>,
    /// S_j beside the required moment.
    pub at_required_knm_per_rad: Option<f64>,
    /// Whether something that is not known might make it stiffer.
    pub lower_bound: bool,
    /// z.
    pub lever_arm_mm: Option<f64>,
    /// Springs in a row.
    pub springs: Vec<Spring>,
    /// Rigid from here on; `null` where span or bracing is not stated.
    pub rigid_from_knm_per_rad: Option<f64>,
    /// Nominally pinned up to here.
    pub pinned_up_to_knm_per_rad: Option<f64>,
    /// "rigid", "semi-rigid", "pinned", or "not stated: …".
    pub class: String,
    /// What the analysis takes it for.
    pub assumed: Option<String>,
    /// "full-strength", "partial-strength" or "nominally pinned by strength".
    pub strength: String,
    /// What may be assumed of the rotation capacity.
    pub rotation: String,
    /// What is not checked.
    pub notes: Vec<String>,
}

/// A spring of the stiffness.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Spring {
    /// In words.
    pub title: String,
    /// k; `null` where it is infinitely stiff.
    pub k_mm: Option<f64>,
}

/// A check.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Check {
    /// Id.
    pub id: String,
    /// In words.
    pub title: String,
    /// Clause.
    pub clause: String,
    /// In `unit`.
    pub resistance: Option<f64>,
    /// In `unit`.
    pub action: Option<f64>,
    /// "kN" or "kNm".
    pub unit: String,
    /// action / resistance.
    pub utilisation: Option<f64>,
    /// "met", "not met" or "unproven".
    pub outcome: String,
    /// For a weld: the throat that the action needs, or that the joint's full resistance needs where none is stated.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub needed_throat_mm: Option<f64>,
}

/// A finding.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Finding {
    /// The rule's id.
    pub rule: String,
    /// "hold", "unproven" or "comment".
    pub severity: String,
    /// One sentence.
    pub message: String,
    /// As printed.
    pub intended: Option<String>,
    /// As printed.
    pub detailed: Option<String>,
    /// GlobalIds.
    pub elements: Vec<String>,
    /// Where.
    pub at: Option<Place>,
}

/// Something that is missing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Missing {
    /// The thing.
    pub what: String,
    /// Where it was looked for.
    pub reason: String,
    /// Who can close the gap: "fabricator", "engineer" or "method" (nobody: it is beyond what is assessed).
    pub ask: String,
    /// The part that lacks it.
    pub at: Option<Place>,
}

/// An input of the calculation.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Input {
    /// What it is.
    pub name: String,
    /// As printed.
    pub value: String,
    /// Where it came from.
    pub origin: String,
}

/// Intended and detailed, in lines.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Difference {
    /// Intended.
    pub intended: Vec<String>,
    /// Detailed.
    pub detailed: Vec<String>,
}

/// A problem of model or schedule.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Problem {
    /// One sentence.
    pub message: String,
    /// Where.
    pub at: Option<Place>,
}

/// A place in a file.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Place {
    /// As the caller named it.
    pub file: String,
    /// From 1; 0 where the form has no lines.
    pub line: u32,
    /// In characters, from 1.
    pub column: u32,
}

/// The whole survey document.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Survey {
    /// [`SURVEY_SCHEMA`](super::SURVEY_SCHEMA).
    pub schema: String,
    /// Who wrote it.
    pub tool: Tool,
    /// The shop model.
    pub model: Model,
    /// What was recognised.
    pub recognised: Recognised,
    /// Joints by kind.
    pub kinds: Vec<Kind>,
    /// What was not taken up, by the reason.
    pub rejected: Vec<Rejected>,
    /// Bolts through fewer than two plies.
    pub loose_bolts: Vec<Part>,
    /// What is missing for a full assessment, by the missing thing.
    pub missing: Vec<Lack>,
    /// What to ask the fabricator for.
    pub ask: Vec<Question>,
    /// Problems of the model.
    pub problems: Vec<Problem>,
    /// The caution.
    pub caution: String,
}

/// Counts of what was recognised.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Recognised {
    /// Members.
    pub members: usize,
    /// Plates.
    pub plates: usize,
    /// Bolts.
    pub bolts: usize,
    /// Welds.
    pub welds: usize,
    /// Shipping pieces.
    pub pieces: usize,
    /// Joints.
    pub joints: usize,
}

/// The joints of one kind.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Kind {
    /// The kind.
    pub kind: String,
    /// How many have a resistance.
    pub assessed: usize,
    /// Marks.
    pub joints: Vec<String>,
}

/// What was not taken up for one reason.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Rejected {
    /// The reason.
    pub reason: String,
    /// The parts.
    pub parts: Vec<Part>,
}

/// A part of the model.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Part {
    /// GlobalId, or whatever else names it.
    pub part: String,
    /// Where.
    pub at: Place,
}

/// One missing thing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Lack {
    /// The thing.
    pub what: String,
    /// Who can close the gap: "fabricator", "engineer" or "method".
    pub ask: String,
    /// Marks of all joints that lack it.
    pub joints: Vec<String>,
    /// Where it was looked for.
    pub reasons: Vec<LackReason>,
}

/// Where a missing thing was looked for.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct LackReason {
    /// One clause.
    pub reason: String,
    /// Marks.
    pub joints: Vec<String>,
    /// The first place.
    pub first_at: Option<Place>,
}

/// A question to the fabricator.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Question {
    /// What to ask for.
    pub what: String,
    /// Marks of the joints that it settles.
    pub joints: Vec<String>,
}
