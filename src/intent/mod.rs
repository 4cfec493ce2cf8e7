//! What the engineer asked for: required actions, intended details, and which joint each line means.
//!
//! `rules/schedule.md` says how a schedule is written; this room is its reader.

mod actions;
mod base;
mod csv_cells;
mod csv_form;
mod fault;
mod frame;
mod gather;
mod pairing;
mod source;
mod toml_detail;
mod toml_form;

pub use fault::{Fault, ScheduleError};
pub use gather::{merge, read, read_all};
pub use pairing::pair;
pub(crate) use source::fold;
pub use source::{MAX_BYTES, MAX_LINE_BYTES};

use crate::joints::Foundation;
use crate::origin::{Place, Problem};
use crate::rulebook::Category;
use crate::units::{Force, Length, Moment};

/// One concurrent set of actions. M is positive when it puts the top of the joint in tension, N positive in tension,
/// V is taken by magnitude. A blank cell is `None`: not stated, never zero.
#[derive(Clone, Debug, PartialEq)]
pub struct LoadCase {
    /// Its name.
    pub name: String,
    /// M_Ed.
    pub moment: Option<Moment>,
    /// V_Ed.
    pub shear: Option<Force>,
    /// N_Ed.
    pub axial: Option<Force>,
    /// A tying force of EN 1991-1-7, by magnitude.
    pub tying: Option<Force>,
    /// N_col,Ed of the supporting member at the joint, positive in tension.
    pub column_axial: Option<Force>,
    /// M_col,Ed of the supporting member at the joint, by magnitude.
    pub column_moment: Option<Moment>,
    /// The line that states it.
    pub at: Place,
}

impl LoadCase {
    /// One that states nothing yet.
    pub fn blank(name: &str, at: Place) -> Self {
        Self {
            name: name.into(),
            moment: None,
            shear: None,
            axial: None,
            tying: None,
            column_axial: None,
            column_moment: None,
            at,
        }
    }
}

/// How a joint is taken in the frame's analysis, EN 1993-1-8 5.2.2.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum JointClass {
    /// It keeps the angle between its members.
    Rigid,
    /// Its stiffness counts in the analysis.
    SemiRigid,
    /// It turns freely.
    Pinned,
}

impl JointClass {
    /// Every class.
    pub const ALL: [Self; 3] = [Self::Rigid, Self::SemiRigid, Self::Pinned];

    /// The word in schedules and reports.
    pub fn word(self) -> &'static str {
        match self {
            Self::Rigid => "rigid",
            Self::SemiRigid => "semi-rigid",
            Self::Pinned => "pinned",
        }
    }
}

/// What the analysis of the frame takes a joint for; what is not stated is not compared.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct InFrame {
    /// L_b: the supported member from column to column (axes).
    pub span: Option<Length>,
    /// Whether a bracing takes at least 80 % off the frame's sway, 5.2.2.5.
    pub braced: Option<bool>,
    /// The class that the analysis assumes.
    pub class: Option<JointClass>,
}

/// One scheduled joint with all its load cases.
#[derive(Clone, Debug)]
pub struct ScheduledJoint {
    /// The joint's mark, if given.
    pub mark: Option<String>,
    /// Mark or GlobalId of the supporting member, if given.
    pub supporting: Option<String>,
    /// Mark or GlobalId of the supported member, if given.
    pub supported: Option<String>,
    /// Which end of the supported member, as written.
    pub end: Option<String>,
    /// Load cases in the order of the file.
    pub cases: Vec<LoadCase>,
    /// Name of the intended detail it uses.
    pub detail: Option<String>,
    /// What the analysis of the frame takes it for.
    pub frame: InFrame,
    /// Its first line.
    pub at: Place,
}

/// What is stated of friction surfaces.
#[derive(Clone, Debug, PartialEq)]
pub enum Friction {
    /// A class of EN 1993-1-8 Table 3.7, as written.
    Class(String),
    /// μ by test.
    Factor(f64),
}

/// Intended plates that strengthen the column: a pair of stiffeners, web plates, diagonals or backing plates.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct IntendedStiffener {
    /// Thickness.
    pub thickness: Option<Length>,
    /// Grade as written.
    pub grade: Option<String>,
    /// Throat of their fillets; backing plates have none.
    pub throat: Option<Length>,
    /// How long a pair of stiffeners is that does not reach from flange to flange; the others have none.
    pub length: Option<Length>,
}

/// How diagonals stand in a column's web.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DiagonalForm {
    /// One pair, from the level of one flange of the beam to that of the other.
    N,
    /// Two pairs from the levels of the flanges that meet between them.
    K,
}

/// An intended haunch below the beam; what is not stated is not compared.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct IntendedHaunch {
    /// From the beam's soffit down to the underside of its flange at the end plate.
    pub depth: Option<Length>,
    /// From the end plate to where its flange ends.
    pub length: Option<Length>,
    /// Thickness of its flange.
    pub flange_thickness: Option<Length>,
    /// Width of its flange.
    pub flange_width: Option<Length>,
    /// Thickness of its web.
    pub web_thickness: Option<Length>,
}

/// An intended detail; what is not stated is not compared.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct IntendedDetail {
    /// Its name in the schedule.
    pub name: String,
    /// Section of the supporting member, as written.
    pub supporting_section: Option<String>,
    /// Section of the supported member, as written.
    pub supported_section: Option<String>,
    /// Grade of the supporting member, as written.
    pub supporting_grade: Option<String>,
    /// Grade of the supported member, as written.
    pub supported_grade: Option<String>,
    /// d.
    pub bolt_diameter: Option<Length>,
    /// Bolt class: "8.8".
    pub bolt_class: Option<String>,
    /// Category of Table 3.2.
    pub bolt_category: Option<Category>,
    /// The friction surfaces of slip-resistant bolts.
    pub friction: Option<Friction>,
    /// Heights of the rows above the soffit of the supported member, top down.
    pub rows: Option<Vec<Length>>,
    /// w.
    pub gauge: Option<Length>,
    /// t_p.
    pub plate_thickness: Option<Length>,
    /// b_p.
    pub plate_width: Option<Length>,
    /// Height of the plate's upper edge above the soffit.
    pub plate_top: Option<Length>,
    /// Height of the plate's lower edge (negative below the soffit).
    pub plate_bottom: Option<Length>,
    /// Plate grade as written.
    pub plate_grade: Option<String>,
    /// Throat at the flange that is in tension under the leading moment, or both.
    pub flange_weld: Option<Length>,
    /// Throat at the web.
    pub web_weld: Option<Length>,
    /// A pair of column stiffeners level with the beam's top flange: `Some(None)` means "none intended".
    pub stiffener_top: Option<Option<IntendedStiffener>>,
    /// The same at the bottom flange.
    pub stiffener_bottom: Option<Option<IntendedStiffener>>,
    /// Whether the steel is exposed to weather or to other corrosive influences.
    pub exposed: Option<bool>,
    /// Supplementary web plates: `Some(None)` means "none intended".
    pub web_plates: Option<Option<IntendedStiffener>>,
    /// On how many sides of the web they are: 1 or 2.
    pub web_plate_sides: Option<u8>,
    /// Diagonal stiffeners in pairs.
    pub diagonals: Option<Option<IntendedStiffener>>,
    /// How they stand.
    pub diagonal_form: Option<DiagonalForm>,
    /// Backing plates behind the column's flange, on both sides of the web.
    pub backing_plates: Option<Option<IntendedStiffener>>,
    /// The haunch below the beam: `Some(None)` means "none intended".
    pub haunch: Option<Option<IntendedHaunch>>,
    /// The foundation below a column's base plate.
    pub base: Option<Foundation>,
    /// Where it is written.
    pub at: Option<Place>,
}

impl IntendedDetail {
    /// Whether it states anything besides the foundation.
    pub fn states_steel(&self) -> bool {
        Self { name: String::new(), base: None, at: None, ..self.clone() } != Self::default()
    }
}

/// All that the engineer stated.
#[derive(Debug, Default)]
pub struct Intent {
    /// Joints in the order of the file.
    pub joints: Vec<ScheduledJoint>,
    /// Details by order of the file.
    pub details: Vec<IntendedDetail>,
    /// What was odd but did not stop the reading (a detail that no joint uses, for instance).
    pub problems: Vec<Problem>,
}

/// Most lines or joints that one schedule may hold.
pub const MAX_JOINTS: usize = 100_000;

/// Longest mark, case or detail name, in characters.
pub const MAX_TEXT: usize = 200;

/// The name of a load case that the schedule leaves unnamed.
pub const UNNAMED_CASE: &str = "(unnamed)";

/// Which scheduled joint means which joint of the steel. Each scheduled joint is either paired, or in `not_found`, or
/// in `unclear`.
#[derive(Debug, Default)]
pub struct Pairing {
    /// For each joint of the steel, the index of its scheduled joint.
    pub scheduled: Vec<Option<usize>>,
    /// Scheduled joints without steel: indices.
    pub not_found: Vec<usize>,
    /// Scheduled joints that may have steel, but nobody can say which: indices, each with a problem that says why.
    pub unclear: Vec<usize>,
    /// Ambiguities and the like.
    pub problems: Vec<Problem>,
}
