//! Who touches whom, what is one joint, and what kind of joint it is.

#![allow(clippy::neg_cmp_op_on_partial_ord, reason = "written so that NaN fails")]

mod bolts;
mod boxes;
mod cut;
mod draft;
mod end_plate;
mod frame;
mod graph;
mod haunch;
mod layout;
mod marks;
mod near;
mod opposite;
mod rank;
mod recognise;
mod scene;
mod simple;
mod splice;
mod stiffeners;
mod strengthening;
mod told;
mod touch;
mod welds;

pub use layout::{
    Backing, BoltRow, BoltedPlate, Bolts, Diagonal, EdgeWeld, EndPlate, EndPlateLayout, FullButts, Half, Haunch, Held,
    Layout, MemberAt, PlateSide, SpliceLayout, Stiffener, Strengthening, Support, WebPlate, Welds, Which,
};
pub use simple::{
    Anchor, ColumnBase, Cope, FinPlate, FlexibleEndPlate, Foundation, Grid, HeldBy, On, SimpleLayout, Spread,
};

use petgraph::graphmap::UnGraphMap;

use crate::origin::Place;
use crate::rulebook::Rulebook;
use crate::shop::{Part, Steelwork};

/// How two parts meet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Meets {
    /// A bolt's shank passes through a plate or a member's ply.
    PassesThrough,
    /// Two parts bear on each other, face to face.
    BearsOn,
    /// A weld joins the part, or two parts share a weld.
    WeldedTo,
    /// Both are part of one shipping piece.
    PartOfPiece,
    /// Only an explicit relation says so.
    Told,
}

/// The steelwork as a graph; the first witness of an edge is geometry.
pub type JointGraph = UnGraphMap<Part, Meets>;

/// The kinds of joint that are told apart.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Kind {
    /// Beam with an end plate bolted to a column's flange, flanges welded: assessed.
    EndPlateMoment,
    /// Two end plates bolted to each other.
    EndPlateSplice,
    /// A plate welded to the support, bolted to the beam's web.
    FinPlate,
    /// An end plate on the beam's web only, or shorter than the beam.
    FlexibleEndPlate,
    /// Angles bolted to the web.
    WebCleats,
    /// Plates over flanges or web of two members in line.
    CoverPlateSplice,
    /// A base plate with anchors.
    ColumnBase,
    /// A bracing member bolted to a gusset.
    Gusset,
    /// An end plate bolted to a column's web.
    EndPlateToWeb,
    /// Bolted, and not told apart further.
    OtherBolted,
}

impl Kind {
    /// The word in reports.
    pub fn word(self) -> &'static str {
        match self {
            Self::EndPlateMoment => "end-plate-moment",
            Self::EndPlateSplice => "end-plate-splice",
            Self::FinPlate => "fin-plate",
            Self::FlexibleEndPlate => "flexible-end-plate",
            Self::WebCleats => "web-cleats",
            Self::CoverPlateSplice => "cover-plate-splice",
            Self::ColumnBase => "column-base",
            Self::Gusset => "gusset",
            Self::EndPlateToWeb => "end-plate-to-web",
            Self::OtherBolted => "other-bolted",
        }
    }
}

/// A joint laid out.
#[derive(Clone, Debug)]
pub enum Laid {
    /// By end plates that carry moments.
    Plates(Box<Layout>),
    /// By anything else.
    Simple(SimpleLayout),
}

impl Laid {
    /// End plates that carry moments, if it is laid out by them.
    pub fn plates(&self) -> Option<&Layout> {
        match self {
            Self::Plates(layout) => Some(layout),
            Self::Simple(_) => None,
        }
    }

    /// The layout of any other kind.
    pub fn simple(&self) -> Option<&SimpleLayout> {
        match self {
            Self::Plates(_) => None,
            Self::Simple(layout) => Some(layout),
        }
    }
}

/// One joint as found in the steel.
#[derive(Clone, Debug)]
pub struct Joint {
    /// The mark: the explicit relation's name, else "beam mark / column mark" (made unique by the end or the place).
    pub mark: String,
    /// What kind.
    pub kind: Kind,
    /// Index of the supporting member.
    pub supporting: Option<usize>,
    /// Index of the supported member.
    pub supported: Option<usize>,
    /// Which end of the supported member is here: false = start, true = end.
    pub at_end: Option<bool>,
    /// Its bolts.
    pub bolts: Vec<usize>,
    /// Its plates, with their role: "end-plate", "packing", "stiffener", "haunch", "plate".
    pub plates: Vec<(usize, &'static str)>,
    /// Its welds, with their role: "flange-top", "flange-bottom", "web", "stiffener", "haunch", "other".
    pub welds: Vec<(usize, &'static str)>,
    /// The joint in its own frame, or why it could not be laid out.
    pub layout: Result<Laid, String>,
    /// Index of the joint on the opposite flange of the same column at the same level, if there is one.
    pub opposite: Option<usize>,
    /// Why the moment on the column's other flange can't be told although something stands there; one clause.
    pub opposite_unclear: Option<&'static str>,
    /// Where geometry, relations and names disagree; one sentence each.
    pub disagreements: Vec<String>,
    /// Where in the file a reader should look first.
    pub place: Option<Place>,
}

/// All joints of the steelwork.
#[derive(Debug, Default)]
pub struct Joints {
    /// The joints, sorted by mark.
    pub joints: Vec<Joint>,
    /// Bolts that pass through fewer than two plies: indices.
    pub loose_bolts: Vec<usize>,
}

/// Who touches whom, as a graph; for those who want to look at it: [`recognise`] goes by the contacts themselves.
pub fn graph(steelwork: &Steelwork, rulebook: &Rulebook) -> JointGraph {
    graph::build(steelwork, &touch::Touches::find(steelwork, &rulebook.tolerances))
}

/// Finds who touches whom and cuts the steel into joints. Geometry is the first witness, relations and names are the second.
pub fn recognise(steelwork: &Steelwork, rulebook: &Rulebook) -> Joints {
    let scene = scene::Scene::new(steelwork, rulebook);
    let mut drafts = recognise::name_kinds(&scene, cut::cut(&scene));
    told::hear(&scene, &mut drafts);
    marks::mark(&scene, &mut drafts);
    let opposites: Vec<_> = opposite::opposites(&scene, &drafts);
    let mut loose = vec![true; steelwork.bolts.len()];
    for bolt in drafts.iter().flat_map(|draft| &draft.joint.bolts) {
        loose[*bolt] = false;
    }
    let joints = (drafts.into_iter().zip(opposites))
        .map(|(draft, (opposite, opposite_unclear))| Joint { opposite, opposite_unclear, ..draft.joint })
        .collect();
    Joints { joints, loose_bolts: (0..loose.len()).filter(|bolt| loose[*bolt]).collect() }
}
