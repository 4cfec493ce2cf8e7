//! A building in plain words: what stands where. Lengths mm, z up, heights of a joint above the beam's soffit.

use super::fastening::Seam;
use super::space::Frame;

/// A building of columns and beams.
#[derive(Clone, Debug)]
pub struct Building {
    /// Its name; the GlobalIds follow from it.
    pub name: String,
    /// Where the site's origin lies.
    pub site: [f64; 3],
    /// Storeys from the lowest up.
    pub storeys: Vec<Storey>,
    /// Columns.
    pub columns: Vec<Column>,
    /// Beams with the joints at their ends.
    pub beams: Vec<Beam>,
    /// Plates welded to members besides the end plates and stiffeners of [`Detail`].
    pub fittings: Vec<Fitting>,
    /// Bolts besides those of [`Detail`].
    pub boltings: Vec<Bolting>,
    /// Notches at beams' ends.
    pub notches: Vec<Notch>,
    /// What its plates are written as.
    pub plates: PlateAs,
}

/// A notch of a beam's upper flange.
#[derive(Clone, Copy, Debug)]
pub struct Notch {
    /// Index of the beam.
    pub beam: usize,
    /// 0: at its start, 1: at its end.
    pub end: usize,
    /// Along the beam.
    pub length: f64,
    /// Down from the beam's top.
    pub depth: f64,
}

/// A plate welded to a member, where it stands.
#[derive(Clone, Debug)]
pub struct Fitting {
    /// The member of whose shipping piece it is.
    pub on: Owner,
    /// Mark, unique in the building.
    pub mark: String,
    /// Name as written.
    pub name: &'static str,
    /// Its thickness runs along z from the origin; x and y are those of the outline.
    pub frame: Frame,
    /// Corners of the outline.
    pub corners: Vec<[f64; 2]>,
    /// Round holes by centre and diameter.
    pub holes: Vec<([f64; 2], f64)>,
    /// Thickness.
    pub thickness: f64,
    /// Grade as written.
    pub grade: String,
    /// Welds along lines, with their throats.
    pub seams: Vec<(Seam, f64)>,
}

/// A member.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Owner {
    /// A column by its index.
    Column(usize),
    /// A beam by its index.
    Beam(usize),
    /// None: it is shipped loose.
    Loose,
}

/// Alike bolts.
#[derive(Clone, Debug)]
pub struct Bolting {
    /// Path, unique in the building.
    pub path: String,
    /// Level by which they belong to a storey.
    pub level: f64,
    /// Nominal diameter.
    pub diameter: f64,
    /// Strength class and where it is stated; `None`: nowhere.
    pub class: Option<(String, ClassIn)>,
    /// What their bodies look like.
    pub body: BoltBody,
    /// What they hold together.
    pub grip: f64,
    /// Length under the head; `None`: the shortest that does.
    pub length: Option<f64>,
    /// Whether they are anchors.
    pub anchors: bool,
    /// A point under the heads, z from head to nut.
    pub frame: Frame,
    /// Names and places of the bolts along x and y of the frame.
    pub at: Vec<(String, [f64; 2])>,
}

/// A storey.
#[derive(Clone, Debug)]
pub struct Storey {
    /// Its name.
    pub name: String,
    /// Its level.
    pub elevation: f64,
}

/// An I section by its sizes.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// Designation as the authoring program spells it.
    pub name: String,
    /// Overall depth.
    pub h: f64,
    /// Flange width.
    pub b: f64,
    /// Web thickness.
    pub t_w: f64,
    /// Flange thickness.
    pub t_f: f64,
    /// Root radius.
    pub r: f64,
}

/// A horizontal direction along the grid.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Along {
    /// East.
    X,
    /// North.
    Y,
}

/// A column from `bottom` to `top`.
#[derive(Clone, Debug)]
pub struct Column {
    /// Mark.
    pub mark: String,
    /// Section.
    pub section: Section,
    /// Grade as written.
    pub grade: String,
    /// Place of its axis.
    pub at: [f64; 2],
    /// Lower end.
    pub bottom: f64,
    /// Upper end.
    pub top: f64,
    /// The direction of its depth: its flanges face both ways along it.
    pub depth: Along,
}

/// A horizontal beam.
#[derive(Clone, Debug)]
pub struct Beam {
    /// Mark.
    pub mark: String,
    /// Section.
    pub section: Section,
    /// Grade as written.
    pub grade: String,
    /// Level of the upper face of its upper flange.
    pub top: f64,
    /// Start and end.
    pub ends: [End; 2],
}

/// The end of a beam.
#[derive(Clone, Debug)]
pub enum End {
    /// An end plate on a column's flange.
    Joint {
        /// Index of the column.
        column: usize,
        /// The joint.
        joint: Box<Joint>,
    },
    /// Nothing: the end lies here.
    Free([f64; 2]),
}

/// A joint as the shop model shows it.
#[derive(Clone, Debug)]
pub struct Joint {
    /// Mark.
    pub mark: String,
    /// Whether the exchange has an explicit relation between beam and column.
    pub told: bool,
    /// What was detailed.
    pub detail: Detail,
}

/// What was detailed.
#[derive(Clone, Debug)]
pub struct Detail {
    /// The end plate.
    pub plate: EndPlate,
    /// The bolts.
    pub bolts: Bolts,
    /// Throats between beam and plate; `None`: no weld is modelled.
    pub welds: Option<Welds>,
    /// Pairs of column stiffeners. Opposite beams share a pair at the same level.
    pub stiffeners: Vec<Stiffener>,
}

/// An end plate.
#[derive(Clone, Debug)]
pub struct EndPlate {
    /// Thickness.
    pub thickness: f64,
    /// Width.
    pub width: f64,
    /// Height of its lower edge above the beam's soffit (negative: below).
    pub bottom: f64,
    /// Height of its upper edge.
    pub top: f64,
    /// Grade as written.
    pub grade: String,
}

/// The bolts: two a row.
#[derive(Clone, Debug)]
pub struct Bolts {
    /// Nominal diameter.
    pub diameter: f64,
    /// Strength class and where it is stated; `None`: nowhere.
    pub class: Option<(String, ClassIn)>,
    /// Between the two bolts of a row.
    pub gauge: f64,
    /// Heights of the rows, from the top down.
    pub rows: Vec<f64>,
    /// Length under the head; `None`: the shortest that does.
    pub length: Option<f64>,
    /// What their bodies look like.
    pub body: BoltBody,
}

/// Where an authoring program writes the strength class.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ClassIn {
    /// As the bolts' material.
    Material,
    /// In the bolts' names.
    Name,
}

/// What a bolt's body looks like.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BoltBody {
    /// A cylinder of its own.
    Shank,
    /// Head, shank and nut by a map that all bolts of the type share.
    Mapped,
    /// All bolts of the joint are one fastener, which repeats that map.
    Group,
    /// A bolt, a nut and a washer, each an element of its own that says what it is by its name only.
    Proxies,
}

/// What a plate is written as.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PlateAs {
    /// A plate, extruded.
    Plate,
    /// A beam, and a stiffener a column, bounded by faces.
    Member,
}

/// Throats of the fillets, both sides of each flange and of the web.
#[derive(Clone, Debug)]
pub struct Welds {
    /// At both flanges; 0: none.
    pub flange: f64,
    /// At the web.
    pub web: f64,
    /// Whether they have bodies; otherwise they have a line only.
    pub bodies: bool,
}

/// A pair of full-depth column stiffeners.
#[derive(Clone, Debug)]
pub struct Stiffener {
    /// Beside which flange of the beam.
    pub at: Level,
    /// Thickness.
    pub thickness: f64,
    /// Grade as written.
    pub grade: String,
    /// Throat of its fillets.
    pub throat: f64,
}

/// A flange of the beam.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Level {
    /// Upper.
    Top,
    /// Lower.
    Bottom,
}

impl Beam {
    /// Level of the lower face of its lower flange.
    pub fn soffit(&self) -> f64 {
        self.top - self.section.h
    }

    /// The joints at its ends.
    pub fn joints(&self) -> impl Iterator<Item = (usize, &Joint)> {
        self.ends.iter().filter_map(|end| match end {
            End::Joint { column, joint } => Some((*column, joint.as_ref())),
            End::Free(_) => None,
        })
    }
}
