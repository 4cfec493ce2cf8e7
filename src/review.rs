//! The review: the plain data that every report is drawn from.

pub mod sketch;

use std::sync::Arc;

use sketch::Sketch;

use crate::origin::{Missing, Place, Problem};
use crate::working::Working;

/// How a joint ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Outcome {
    /// It does not carry what is required, or it is not there.
    Hold,
    /// It could not be proven.
    Unproven,
    /// It carries, and something deviates.
    Comment,
    /// It carries, and nothing deviates.
    Clear,
}

impl Outcome {
    /// The word in reports.
    pub fn word(self) -> &'static str {
        match self {
            Self::Hold => "hold",
            Self::Unproven => "unproven",
            Self::Comment => "comment",
            Self::Clear => "clear",
        }
    }
}

/// What was found at a joint by one rule.
#[derive(Clone, Debug)]
pub struct Finding {
    /// The rule's id: `plate-thinner`.
    pub rule: &'static str,
    /// Hold, unproven or comment.
    pub severity: Outcome,
    /// One sentence, without the joint's mark, so that like faults on like joints read alike.
    pub message: String,
    /// What was intended, as printed.
    pub intended: Option<String>,
    /// What was detailed, as printed.
    pub detailed: Option<String>,
    /// GlobalIds of the parts it stands on.
    pub elements: Vec<String>,
    /// Where to look.
    pub at: Option<Place>,
}

/// A member of a joint.
#[derive(Clone, Debug)]
pub struct MemberBrief {
    /// GlobalId.
    pub guid: String,
    /// Mark.
    pub mark: Option<String>,
    /// Section, if known.
    pub section: Option<String>,
    /// Grade, if known.
    pub grade: Option<String>,
}

/// The bolts of a joint.
#[derive(Clone, Debug)]
pub struct BoltsBrief {
    /// How many.
    pub count: usize,
    /// d, mm, if all agree.
    pub diameter_mm: Option<f64>,
    /// Class, if known and all agree.
    pub class: Option<String>,
    /// w, mm, if all rows agree.
    pub gauge_mm: Option<f64>,
    /// Heights of the rows above the soffit, top down, mm.
    pub row_heights_mm: Vec<f64>,
}

/// A plate of a joint.
#[derive(Clone, Debug)]
pub struct PlateBrief {
    /// GlobalId.
    pub guid: String,
    /// Mark.
    pub mark: Option<String>,
    /// Its role: "end-plate", "stiffener".
    pub role: String,
    /// mm.
    pub thickness_mm: f64,
    /// mm, across the joint.
    pub width_mm: f64,
    /// mm, along the joint's height (for a stiffener: along the column's depth).
    pub depth_mm: f64,
    /// Grade, if known.
    pub grade: Option<String>,
}

/// A weld of a joint.
#[derive(Clone, Debug)]
pub struct WeldBrief {
    /// Its role: "flange-top", "flange-bottom", "web".
    pub role: String,
    /// mm; `None` if not stated.
    pub throat_mm: Option<f64>,
}

/// A joint's resistance; only what applies and could be computed.
#[derive(Clone, Debug, Default)]
pub struct Resistance {
    /// Tension at the top, kNm.
    pub moment_knm: Option<f64>,
    /// Tension at the bottom, kNm.
    pub moment_reversed_knm: Option<f64>,
    /// What every component but the welds would carry, kNm, in the sense of `moment_knm`, or of `moment_reversed_knm` where
    /// there is no other.
    pub moment_without_welds_knm: Option<f64>,
    /// kN.
    pub shear_kn: Option<f64>,
    /// kN.
    pub axial_kn: Option<f64>,
    /// What governs the moment (else the shear) resistance.
    pub governed_by: Option<String>,
}

/// One required set of actions and how far the joint is used by it.
#[derive(Clone, Debug)]
pub struct Required {
    /// Case name.
    pub case: String,
    /// As stated.
    pub moment_knm: Option<f64>,
    /// As stated.
    pub shear_kn: Option<f64>,
    /// As stated.
    pub axial_kn: Option<f64>,
    /// As stated.
    pub tying_kn: Option<f64>,
    /// The largest ratio of required to resistance over everything that was checked; `None` if nothing was.
    pub utilisation: Option<f64>,
    /// What that ratio belongs to.
    pub governed_by: Option<String>,
    /// The resistance that stood against the moment in this case (its own sense and β).
    pub moment_resistance_knm: Option<f64>,
    /// The schedule's line.
    pub at: Option<Place>,
}

/// A row's force.
#[derive(Clone, Debug)]
pub struct RowResult {
    /// From the top, from 1.
    pub row: usize,
    /// mm.
    pub lever_arm_mm: f64,
    /// kN.
    pub potential_kn: f64,
    /// kN.
    pub force_kn: f64,
    /// What governs.
    pub governed_by: String,
}

/// What the row forces and the checks of the moment stand for.
#[derive(Clone, Debug)]
pub struct RowBasis {
    /// The load case that uses the moment resistance most; `None` where no case states a moment.
    pub case: Option<String>,
    /// Whether the tension is at the top.
    pub tension_at_top: bool,
    /// The transformation parameter of 5.3.
    pub beta: f64,
    /// Σ F·h of the rows, before the welds are asked, kNm.
    pub of_rows_knm: f64,
    /// M_j,Rd, kNm.
    pub moment_knm: f64,
    /// What the reader needs to follow them, one sentence each.
    pub notes: Vec<String>,
}

/// A joint's rotational stiffness at the leading case, or in its own right.
#[derive(Clone, Debug)]
pub struct StiffnessResult {
    /// "tension at the top" or "tension at the bottom".
    pub sense: &'static str,
    /// β.
    pub beta: f64,
    /// S_j,ini, kNm/rad.
    pub initial: f64,
    /// S_j beside the required moment, kNm/rad.
    pub at_required: Option<f64>,
    /// Whether something that is not known might make it stiffer.
    pub lower_bound: bool,
    /// z, mm.
    pub lever_arm_mm: f64,
    /// Springs in a row: in words, and k in mm (`None`: infinitely stiff).
    pub springs: Vec<(String, Option<f64>)>,
    /// Rigid from here on, kNm/rad; `None` where span or bracing is not stated.
    pub rigid_from: Option<f64>,
    /// Nominally pinned up to here, kNm/rad.
    pub pinned_up_to: Option<f64>,
    /// "rigid", "semi-rigid", "pinned", or "not stated: …".
    pub class: String,
    /// What the analysis takes it for, if the schedule says so.
    pub assumed: Option<&'static str>,
    /// "full-strength", "partial-strength" or "nominally pinned by strength".
    pub strength: &'static str,
    /// What may be assumed of the rotation capacity.
    pub rotation: String,
    /// What stands behind the class and is not checked.
    pub notes: Vec<String>,
    /// The working.
    pub working: Arc<Working>,
}

/// A check's result.
#[derive(Clone, Debug)]
pub struct CheckResult {
    /// `column-web-in-compression`.
    pub id: String,
    /// In words.
    pub title: String,
    /// "EN 1993-1-8:2005 6.2.6.2".
    pub clause: String,
    /// In `unit`.
    pub resistance: Option<f64>,
    /// In `unit`; at the leading case, or at the joint's full resistance where no action is stated.
    pub action: Option<f64>,
    /// "kN" or "kNm".
    pub unit: &'static str,
    /// action / resistance.
    pub utilisation: Option<f64>,
    /// "met", "not met" or "unproven".
    pub outcome: &'static str,
    /// For a weld: the throat that the action needs, or what the joint's full resistance needs where none is stated, mm.
    pub needed_throat_mm: Option<f64>,
    /// The working.
    pub working: Arc<Working>,
}

/// One joint's review.
#[derive(Clone, Debug)]
pub struct JointReview {
    /// The mark (of the schedule, if paired, else of the steel).
    pub mark: String,
    /// The kind's word; "not-found" for a scheduled joint without steel, "not-paired" for one that fits no single joint.
    pub kind: String,
    /// The intended type of detail, if the schedule names one.
    pub detail: Option<String>,
    /// How it ends.
    pub outcome: Outcome,
    /// Why, one sentence each.
    pub reasons: Vec<String>,
    /// The column, for instance.
    pub supporting: Option<MemberBrief>,
    /// The beam, for instance.
    pub supported: Option<MemberBrief>,
    /// Bolts.
    pub bolts: Option<BoltsBrief>,
    /// Plates.
    pub plates: Vec<PlateBrief>,
    /// Welds.
    pub welds: Vec<WeldBrief>,
    /// As detailed.
    pub resistance: Resistance,
    /// As intended, if the schedule states a detail that could be computed.
    pub intended_resistance: Option<Resistance>,
    /// Required actions.
    pub required: Vec<Required>,
    /// Row forces of the governing sense, at the full moment resistance.
    pub rows: Vec<RowResult>,
    /// What the row forces stand for.
    pub row_basis: Option<RowBasis>,
    /// The load case that the checks of the shear stand for.
    pub shear_case: Option<String>,
    /// Rotational stiffness and class.
    pub stiffness: Option<StiffnessResult>,
    /// Checks; like joints share theirs.
    pub checks: Arc<[CheckResult]>,
    /// Findings, worst first.
    pub findings: Vec<Finding>,
    /// What is missing for a proof.
    pub missing: Vec<Missing>,
    /// What was assumed, one sentence each.
    pub assumptions: Vec<String>,
    /// Inputs with their origin: name, value, origin.
    pub inputs: Vec<(String, String, String)>,
    /// The detail in lines, intended and detailed, for a two-column difference; empty if nothing is intended.
    pub difference: Option<(Vec<String>, Vec<String>)>,
    /// The geometry, if the joint could be laid out.
    pub sketch: Option<Arc<Sketch>>,
    /// Where to look in the model.
    pub at: Option<Place>,
}

impl JointReview {
    /// The largest utilisation over all cases.
    pub fn utilisation(&self) -> Option<f64> {
        self.required.iter().filter_map(|r| r.utilisation).max_by(f64::total_cmp)
    }

    /// Whether there is steel for it.
    pub fn found(&self) -> bool {
        !matches!(self.kind.as_str(), "not-found" | "not-paired")
    }
}

/// Counts that are always printed.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Counts {
    /// Joints in the steel.
    pub found: usize,
    /// Joints in the schedule.
    pub scheduled: usize,
    /// Joints in both.
    pub paired: usize,
    /// Joints whose resistance was computed.
    pub assessed: usize,
    /// Ends.
    pub clear: usize,
    /// Ends.
    pub comment: usize,
    /// Ends.
    pub hold: usize,
    /// Ends.
    pub unproven: usize,
}

/// What the review stands on.
#[derive(Clone, Debug)]
pub struct Basis {
    /// "EN 1993-1-8:2005".
    pub standard: &'static str,
    /// The annex's name.
    pub annex: String,
    /// Where its values come from.
    pub annex_source: String,
    /// γ_M0.
    pub gamma_m0: f64,
    /// γ_M1.
    pub gamma_m1: f64,
    /// γ_M2.
    pub gamma_m2: f64,
    /// Settings by name, as printed.
    pub settings: Vec<(String, String)>,
}

/// The whole review.
#[derive(Clone, Debug)]
pub struct Review {
    /// The model's file as the caller named it.
    pub file: String,
    /// "IFC4 ifcXML".
    pub exchange: String,
    /// Hex.
    pub sha256: String,
    /// The schedule's file, if any.
    pub schedule: Option<String>,
    /// What it stands on.
    pub basis: Basis,
    /// Counts.
    pub counts: Counts,
    /// Joints sorted by mark.
    pub joints: Vec<JointReview>,
    /// Problems of model and schedule.
    pub problems: Vec<Problem>,
    /// What was recognised besides joints: members, plates, bolts, welds, loose bolts, rejected parts with reasons.
    pub survey: Survey,
}

/// What was recognised, for `survey`.
#[derive(Clone, Debug, Default)]
pub struct Survey {
    /// Count of members.
    pub members: usize,
    /// Count of plates.
    pub plates: usize,
    /// Count of bolts.
    pub bolts: usize,
    /// Count of welds.
    pub welds: usize,
    /// Count of pieces.
    pub pieces: usize,
    /// Bolts through fewer than two plies: GlobalIds with places.
    pub loose_bolts: Vec<(String, Place)>,
    /// What was not taken up: who, and why.
    pub rejected: Vec<(String, String, Place)>,
}

/// [`Missing::what`] of a joint that nobody states actions for: a question to the engineer, never to the fabricator.
pub const REQUIRED_ACTIONS: &str = "required actions";

/// The caution that stands on every report.
pub const CAUTION: &str =
    "An aid to review, not a design: local codes, national annexes and a licensed engineer decide.";

impl Review {
    /// The exit code: 1 with some hold, 3 with nothing on hold but something unproven, else 0.
    ///
    /// A model in which no joint was found proves nothing either: 3, lest an empty reading pass a gate.
    pub fn exit_code(&self) -> u8 {
        match self.counts {
            Counts { hold: 1.., .. } => 1,
            Counts { unproven: 1.., .. } | Counts { found: 0, .. } => 3,
            _ => 0,
        }
    }
}
