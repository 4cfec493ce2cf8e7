//! A joint in its own frame: everything that its assessment needs, nothing else.
//!
//! Heights are measured up from the soffit of the supported member's lower flange, in the direction of the member's
//! depth that points to the sky; sides are measured across, from the supported member's web.

mod strengthening;

pub use strengthening::{Backing, Diagonal, EdgeWeld, Strengthening, WebPlate};

use crate::origin::{Datum, Known};
use crate::rulebook::{Category, Grade, Section};
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
    /// e: from the bolt's axis to the nearer side edge of the column's flange, or of a splice's other end plate.
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
    /// What else they hold, and how.
    pub held: Held,
}

/// What bolts hold besides the two plies, and how, as far as anybody says.
#[derive(Clone, Debug, Default)]
pub struct Held {
    /// Thickness of each rigid packing plate between the plies; as large as the end plate.
    pub packing: Vec<Length>,
    /// The shank without thread: the shortest of the bolts' lengths less their threads; `None` unless all state both.
    pub shank: Option<Length>,
    /// Category of Table 3.2; `None` where nobody states one.
    pub category: Option<Datum<Category>>,
    /// Slip factor μ of the friction surfaces; `None` where nobody states one.
    pub slip_factor: Option<Datum<f64>>,
}

/// Which of a beam's welds are butt welds of full penetration: as strong as the weaker part (EN 1993-1-8 4.7.1), and no
/// fillet beside the bolts. Their throat is the thickness of the part.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct FullButts {
    /// At the upper flange.
    pub flange_top: bool,
    /// At the lower flange.
    pub flange_bottom: bool,
    /// At the web.
    pub web: bool,
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
    /// Which of them are no fillets.
    pub full: FullButts,
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

/// A haunch below the beam: a web and an inclined flange between the beam's lower flange and the end plate, of two plates or
/// cut from a rolled section.
#[derive(Clone, Debug)]
pub struct Haunch {
    /// GlobalIds of its plates, or of the member that it is cut from.
    pub guids: Vec<String>,
    /// From the beam's soffit down to the underside of its flange at the end plate.
    pub depth: Length,
    /// From the end plate to where its flange ends.
    pub length: Length,
    /// Between its flange and the beam's, degrees.
    pub angle: f64,
    /// Thickness of its flange.
    pub flange_thickness: Length,
    /// Width of its flange.
    pub flange_width: Length,
    /// Thickness of its web.
    pub web_thickness: Length,
    /// Steel grade of its flange.
    pub flange_grade: Known<Grade>,
    /// Steel grade of its web.
    pub web_grade: Known<Grade>,
    /// Throat of its flange's fillets at the end plate.
    pub flange_weld: Known<Length>,
    /// Throat of its web's fillets at the end plate.
    pub web_weld: Known<Length>,
    /// Whether a stiffener stands on the beam's web where the haunch ends.
    pub stiffened: bool,
}

/// An end-plate joint on a column's flange.
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
    /// The haunch below the beam, if there is one.
    pub haunch: Option<Haunch>,
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

/// One half of an end-plate splice.
#[derive(Clone, Debug)]
pub struct Half {
    /// The beam.
    pub beam: MemberAt,
    /// Height of its lower flange's soffit: 0 for the supported member, whose soffit heights are measured from.
    pub soffit: Length,
    /// Its end plate.
    pub plate: EndPlate,
    /// Its welds.
    pub welds: Welds,
}

/// Two beams' end plates bolted to each other.
#[derive(Clone, Debug)]
pub struct SpliceLayout {
    /// The half of the supported member.
    pub supported: Half,
    /// The other half; a row's `edge_column` is that to its plate's edge.
    pub supporting: Half,
    /// The bolts.
    pub bolts: Bolts,
}

/// A joint of a kind that is assessed, in its own frame.
#[derive(Clone, Debug)]
#[allow(clippy::large_enum_variant, reason = "one a joint")]
pub enum Layout {
    /// A beam's end plate on a column's flange.
    EndPlate(EndPlateLayout),
    /// Two beams' end plates on each other.
    Splice(SpliceLayout),
}

/// Which side of a joint an end plate with its beam is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Which {
    /// The only one: the other side is a column.
    Only,
    /// The supported member's half of a splice.
    Supported,
    /// The other half of a splice.
    Supporting,
    /// Both halves, which are alike.
    Both,
}

impl Which {
    /// How many end plates it stands for.
    pub fn count(self) -> usize {
        if self == Self::Both { 2 } else { 1 }
    }

    /// Before a part's name: "supported ".
    pub fn owner(self) -> &'static str {
        match self {
            Self::Only | Self::Both => "",
            Self::Supported => "supported ",
            Self::Supporting => "supporting ",
        }
    }

    /// After a plate's name: " of the supported beam".
    pub fn of(self) -> &'static str {
        match self {
            Self::Only | Self::Both => "",
            Self::Supported => " of the supported beam",
            Self::Supporting => " of the supporting beam",
        }
    }

    /// After a component's name: ", supported side".
    pub fn suffix(self) -> &'static str {
        match self {
            Self::Only => "",
            Self::Supported => ", supported side",
            Self::Supporting => ", supporting side",
            Self::Both => ", both sides",
        }
    }
}

/// A beam with its end plate, wherever the plate is bolted to.
#[derive(Clone, Copy, Debug)]
pub struct PlateSide<'a> {
    /// Which side it is.
    pub which: Which,
    /// The beam.
    pub beam: &'a MemberAt,
    /// Height of its lower flange's soffit.
    pub soffit: Length,
    /// Its end plate.
    pub plate: &'a EndPlate,
    /// Its welds.
    pub welds: &'a Welds,
    /// The haunch below it.
    pub haunch: Option<&'a Haunch>,
}

/// What an end plate is bolted to.
#[derive(Clone, Copy, Debug)]
pub enum Support<'a> {
    /// The flange of a column.
    Column(&'a EndPlateLayout),
    /// Another end plate.
    Plate(PlateSide<'a>),
}

/// An end-plate joint of either kind as its assessment takes it.
#[derive(Clone, Copy, Debug)]
pub struct BoltedPlate<'a> {
    /// The supported member's side.
    pub side: PlateSide<'a>,
    /// The other side.
    pub support: Support<'a>,
    /// The bolts between them.
    pub bolts: &'a Bolts,
}

impl BoltedPlate<'_> {
    /// Thickness of the supported member's end plate and of the ply behind it; `None` if the column's section is not known.
    pub fn plies(&self) -> Option<[Length; 2]> {
        let behind = match self.support {
            Support::Column(layout) => layout.column.section.as_ref().ok()?.value.t_f,
            Support::Plate(other) => other.plate.thickness,
        };
        Some([self.side.plate.thickness, behind])
    }
}

impl Half {
    fn side(&self, which: Which) -> PlateSide<'_> {
        PlateSide { which, beam: &self.beam, soffit: self.soffit, plate: &self.plate, welds: &self.welds, haunch: None }
    }
}

impl EndPlateLayout {
    /// The beam's side.
    pub fn side(&self) -> PlateSide<'_> {
        PlateSide {
            which: Which::Only,
            beam: &self.beam,
            soffit: Length::ZERO,
            plate: &self.plate,
            welds: &self.welds,
            haunch: self.haunch.as_ref(),
        }
    }
}

impl Layout {
    /// The supported member's side.
    pub fn side(&self) -> PlateSide<'_> {
        match self {
            Self::EndPlate(layout) => layout.side(),
            Self::Splice(layout) => layout.supported.side(Which::Supported),
        }
    }

    /// Every end plate with its beam: the supported member's first.
    pub fn sides(&self) -> Vec<PlateSide<'_>> {
        match self {
            Self::EndPlate(layout) => vec![layout.side()],
            Self::Splice(layout) => {
                vec![layout.supported.side(Which::Supported), layout.supporting.side(Which::Supporting)]
            }
        }
    }

    /// The bolts.
    pub fn bolts(&self) -> &Bolts {
        match self {
            Self::EndPlate(layout) => &layout.bolts,
            Self::Splice(layout) => &layout.bolts,
        }
    }

    /// The supporting member.
    pub fn supporting(&self) -> &MemberAt {
        match self {
            Self::EndPlate(layout) => &layout.column,
            Self::Splice(layout) => &layout.supporting.beam,
        }
    }

    /// Thickness of the supported member's end plate and of the ply behind it; `None` if the column's section is not known.
    pub fn plies(&self) -> Option<[Length; 2]> {
        BoltedPlate::from(self).plies()
    }

    /// All that the bolts hold together: both plies and the packing between them.
    pub fn grip(&self) -> Option<Length> {
        Some(self.plies()?.into_iter().chain(self.bolts().held.packing.iter().copied()).sum())
    }

    /// The joint on a column's flange, if it is one.
    pub fn on_column(&self) -> Option<&EndPlateLayout> {
        match self {
            Self::EndPlate(layout) => Some(layout),
            Self::Splice(_) => None,
        }
    }
}

impl<'a> From<&'a EndPlateLayout> for BoltedPlate<'a> {
    fn from(layout: &'a EndPlateLayout) -> Self {
        Self { side: layout.side(), support: Support::Column(layout), bolts: &layout.bolts }
    }
}

impl<'a> From<&'a SpliceLayout> for BoltedPlate<'a> {
    fn from(layout: &'a SpliceLayout) -> Self {
        let support = Support::Plate(layout.supporting.side(Which::Supporting));
        Self { side: layout.supported.side(Which::Supported), support, bolts: &layout.bolts }
    }
}

impl<'a> From<&'a Layout> for BoltedPlate<'a> {
    fn from(layout: &'a Layout) -> Self {
        match layout {
            Layout::EndPlate(layout) => layout.into(),
            Layout::Splice(layout) => layout.into(),
        }
    }
}
