//! An end-plate joint in its own frame: everything that its assessment needs, nothing else.
//!
//! Heights are measured up from the soffit of the supported member's lower flange, in the direction of the member's
//! depth that points to the sky; sides are measured across, from the supported member's web.

use crate::origin::Known;
use crate::rulebook::{Grade, Section};
use crate::units::Length;

/// A member as it stands in a joint.
#[derive(Clone, Debug)]
pub struct MemberAt {
    /// GlobalId.
    pub guid: String,
    /// Mark.
    pub mark: Option<String>,
    /// Section and sizes.
    pub section: Known<Section>,
    /// Steel grade.
    pub grade: Known<Grade>,
}

/// The end plate.
#[derive(Clone, Debug)]
pub struct EndPlate {
    /// GlobalId.
    pub guid: String,
    /// t_p.
    pub thickness: Length,
    /// b_p.
    pub width: Length,
    /// Height of its lower edge; negative below the soffit.
    pub bottom: Length,
    /// Height of its upper edge.
    pub top: Length,
    /// Steel grade.
    pub grade: Known<Grade>,
}

/// One row of two bolts, symmetrical about the web.
#[derive(Clone, Debug)]
pub struct BoltRow {
    /// Height of the row.
    pub height: Length,
    /// w: between the two bolts' axes.
    pub gauge: Length,
    /// e: from the bolt's axis to the plate's nearer side edge.
    pub edge_plate: Length,
    /// e: from the bolt's axis to the column flange's nearer side edge.
    pub edge_column: Length,
}

/// The bolts, all alike.
#[derive(Clone, Debug)]
pub struct Bolts {
    /// d.
    pub diameter: Known<Length>,
    /// Strength class.
    pub class: Known<String>,
    /// d_0: from modelled holes or a property, else the normal clearance of EN 1090-2 said as assumed.
    pub hole: Known<Length>,
    /// Rows from the top down.
    pub rows: Vec<BoltRow>,
}

/// Throats a of the fillets between beam and end plate; each both sides of its plate.
#[derive(Clone, Debug)]
pub struct Welds {
    /// At the upper flange.
    pub flange_top: Known<Length>,
    /// At the lower flange.
    pub flange_bottom: Known<Length>,
    /// At the web.
    pub web: Known<Length>,
}

/// A transverse stiffener of the column: a pair, one plate on each side of the web.
#[derive(Clone, Debug)]
pub struct Stiffener {
    /// GlobalIds of its plates.
    pub guids: Vec<String>,
    /// Height of its middle plane.
    pub height: Length,
    /// t_s: the thinner of the pair.
    pub thickness: Length,
    /// b_s: the outstand from the web of the narrower of the pair.
    pub outstand: Length,
    /// Length along the column's depth between the flanges, the shorter of the pair.
    pub reach: Length,
    /// Whether there is a plate on both sides of the web.
    pub both_sides: bool,
    /// Whether it reaches from flange to flange (within the touch tolerance).
    pub full_depth: bool,
    /// Steel grade.
    pub grade: Known<Grade>,
    /// Throat of its fillets.
    pub weld: Known<Length>,
}

/// A supplementary plate flat on one side of the column's web.
#[derive(Clone, Debug)]
pub struct WebPlate {
    /// GlobalId.
    pub guid: String,
    /// Which side of the web: the sign of the column's own axis across.
    pub positive: bool,
    /// t_s.
    pub thickness: Length,
    /// b_s: along the column's depth.
    pub width: Length,
    /// How far its nearer long edge lies from the middle of the column's depth: half of b_s if it is centred.
    pub half_width: Length,
    /// Height of its lower edge.
    pub bottom: Length,
    /// Height of its upper edge.
    pub top: Length,
    /// Steel grade.
    pub grade: Known<Grade>,
    /// What holds its two long edges.
    pub weld: Known<EdgeWeld>,
}

/// A weld along the edge of a plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum EdgeWeld {
    /// Fillets, and their throat a.
    Fillet(Length),
    /// Full-penetration butt welds.
    Butt,
}

/// A diagonal stiffener of the column's web: a pair, one plate on each side of the web.
#[derive(Clone, Debug)]
pub struct Diagonal {
    /// GlobalIds of its plates.
    pub guids: Vec<String>,
    /// Height at which its middle plane meets the flange with the joint.
    pub near: Length,
    /// The same at the column's other flange.
    pub far: Length,
    /// t: the thinner of the pair.
    pub thickness: Length,
    /// b: the outstand from the web of the narrower of the pair.
    pub outstand: Length,
    /// Whether there is a plate on both sides of the web.
    pub both_sides: bool,
    /// Whether it reaches from flange to flange (within the touch tolerance).
    pub full_depth: bool,
    /// Steel grade.
    pub grade: Known<Grade>,
    /// Throat of its fillets.
    pub weld: Known<Length>,
}

/// Backing plates behind the column's flange, one on each side of the web, under the same bolts.
#[derive(Clone, Debug)]
pub struct Backing {
    /// GlobalIds of its plates.
    pub guids: Vec<String>,
    /// t_bp: the thinner of the two.
    pub thickness: Length,
    /// Height of the lower edge of the higher-ending one.
    pub bottom: Length,
    /// Height of the upper edge of the lower-ending one.
    pub top: Length,
    /// From the web's face to its inner edge, the larger of the two.
    pub from_web: Length,
    /// How far it stops short of the flange's edge, the larger of the two; negative beyond it.
    pub short_of_edge: Length,
    /// Whether there is a plate on both sides of the web.
    pub both_sides: bool,
    /// Steel grade.
    pub grade: Known<Grade>,
}

/// What strengthens the column at the joint besides transverse stiffeners.
#[derive(Clone, Debug, Default)]
pub struct Strengthening {
    /// Supplementary web plates, in the order of their lower edges.
    pub web_plates: Vec<WebPlate>,
    /// Diagonal stiffeners from the top down.
    pub diagonals: Vec<Diagonal>,
    /// Backing plates from the top down.
    pub backing: Vec<Backing>,
}

/// The joint in its own frame.
#[derive(Clone, Debug)]
pub struct EndPlateLayout {
    /// The column.
    pub column: MemberAt,
    /// The beam.
    pub beam: MemberAt,
    /// The end plate.
    pub plate: EndPlate,
    /// The bolts.
    pub bolts: Bolts,
    /// The beam's welds.
    pub welds: Welds,
    /// The column's stiffeners near the joint, from the top down.
    pub stiffeners: Vec<Stiffener>,
    /// What else strengthens the column.
    pub strengthening: Strengthening,
    /// From the top row up to the column's upper end; `None` where the column runs on past 10 m.
    pub column_above: Option<Length>,
    /// From the lowest row down to the column's lower end.
    pub column_below: Option<Length>,
    /// Parts at the column here that are none of these, so that no check can credit them: one sentence each.
    pub not_credited: Vec<String>,
}
