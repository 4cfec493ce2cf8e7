//! What strengthens the column at a joint besides transverse stiffeners.

use crate::origin::Known;
use crate::rulebook::Grade;
use crate::units::Length;

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
