//! The steelwork: members, plates, bolts and welds as the exchange shows them. The only room that knows IFC classes.
//!
//! All lengths are mm, in one right-handed world frame with z up; [`Steelwork::origin`] has been taken off, so that
//! coordinates of a map grid lose no digits.
//!
//! Every body comes to right prisms, whatever the exchange wrote: swept solids and primitives at once, bodies given by
//! their faces through sections across a few likely axes. What is curved, tapered or built up comes to a prism that
//! stands in for it and says so. Only then is a part told by its function: shape and size first, names second, class
//! last. Nuts and washers of their own are evidence for the bolt on their axis.

mod body;
mod bolt;
mod bolt_name;
mod curve;
mod faces;
mod hardware;
mod kin;
mod levels;
mod links;
mod material;
mod member;
mod mesh;
mod outline;
mod placement;
mod plate;
mod polyhedron;
mod profile;
mod properties;
mod reading;
mod relation;
mod section;
mod several;
mod shank;
mod solid;
mod statement;
mod sweep;
mod take_up;
mod text;
mod units;
mod weld;
mod words;

pub use bolt::COUNTERSUNK;
pub use take_up::take_up;

use glam::{DVec2, DVec3};

use crate::origin::{Known, Place, Problem};
use crate::rulebook::{Grade, Section};
use crate::units::Length;

/// Everything of the exchange that can bear on a joint.
#[derive(Debug, Default)]
pub struct Steelwork {
    /// Beams, columns, braces: whatever is long and of one section.
    pub members: Vec<Member>,
    /// Plates, told by shape.
    pub plates: Vec<Plate>,
    /// Bolts, one an item, however the exchange grouped them.
    pub bolts: Vec<Bolt>,
    /// Welds.
    pub welds: Vec<Weld>,
    /// Shipping pieces: parts that an assembly holds together.
    pub pieces: Vec<Piece>,
    /// Explicit relations between parts.
    pub told: Vec<Told>,
    /// What looked like steel and was not taken up, with a reason that a user can read.
    pub rejected: Vec<Rejected>,
    /// What was taken off all coordinates, mm.
    pub origin: DVec3,
    /// What could not be understood.
    pub problems: Vec<Problem>,
}

/// A part of the steelwork, by its index in the list of its sort.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Part {
    /// Index into [`Steelwork::members`].
    Member(usize),
    /// Index into [`Steelwork::plates`].
    Plate(usize),
    /// Index into [`Steelwork::bolts`].
    Bolt(usize),
    /// Index into [`Steelwork::welds`].
    Weld(usize),
}

/// Who a part is in the shop model.
#[derive(Clone, Debug, PartialEq)]
pub struct Identity {
    /// GlobalId, 22 characters; empty where the exchange has none.
    pub guid: String,
    /// The exchange's class, for people only: function is told by shape.
    pub class: String,
    /// Name.
    pub name: String,
    /// The mark: Tag, or a property that the vocabulary knows as a mark.
    pub mark: Option<String>,
    /// Where it stands in the file.
    pub place: Place,
}

/// The shape of a member's cross-section.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shape {
    /// I or H, doubly symmetric, parallel flanges.
    I,
    /// Circular or rectangular hollow.
    Hollow,
    /// Angle, channel, tee or anything else that is known by name or outline.
    Other,
}

/// A notch at a member's end: a rectangle taken off its web with all of one flange.
#[derive(Clone, Debug, PartialEq)]
pub struct Notch {
    /// Which end: false = start.
    pub at_end: bool,
    /// Whether it takes the flange on the positive side of the member's depth.
    pub positive: bool,
    /// From the member's end, mm: of the box round what is cut off, so never less than it is.
    pub length: f64,
    /// From the flange's outer face, mm; the same.
    pub depth: f64,
    /// The sentence for those who do not take it into account.
    pub untaken: String,
}

/// A member: one straight prism, or something recognised as "not assessed".
#[derive(Clone, Debug)]
pub struct Member {
    /// Who it is.
    pub identity: Identity,
    /// The line through the middle of the section's bounding box, from start to end, cut ends included.
    pub start: DVec3,
    /// See [`Member::start`].
    pub end: DVec3,
    /// Unit vector from start to end.
    pub along: DVec3,
    /// Unit vector across the web: the direction of the flange width.
    pub across: DVec3,
    /// Unit vector in the web: the direction of the depth; right-handed with `across` and `along`.
    pub depth: DVec3,
    /// The cross-section's shape.
    pub shape: Shape,
    /// Extents of the modelled section in `across` and `depth`, mm: geometry's own word, held against the section's.
    pub extents: DVec2,
    /// The section with its sizes.
    pub section: Known<Section>,
    /// The steel grade.
    pub grade: Known<Grade>,
    /// Notches at its ends.
    pub notches: Vec<Notch>,
    /// Why it can't be assessed although it was recognised: curved, tapered, built up.
    pub not_assessed: Option<String>,
    /// Where two witnesses disagree: name against geometry, for instance. One sentence each.
    pub disagreements: Vec<String>,
}

/// A hole in a plate's plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hole {
    /// Its centre in the plate's (u, v), mm.
    pub centre: DVec2,
    /// Its size, or a slot's width, mm.
    pub diameter: f64,
    /// A slot's overall length, mm; equal to the diameter for a round hole.
    pub length: f64,
}

/// A flat plate of any outline.
#[derive(Clone, Debug)]
pub struct Plate {
    /// Who it is.
    pub identity: Identity,
    /// The middle of its bounding box, mid-thickness.
    pub centre: DVec3,
    /// Unit vector of the first in-plane axis.
    pub u: DVec3,
    /// Unit vector of the second in-plane axis.
    pub v: DVec3,
    /// Unit normal, u × v.
    pub normal: DVec3,
    /// Outline in (u, v) from the centre, counter-clockwise, not closed, mm.
    pub outline: Vec<DVec2>,
    /// Modelled holes; empty where the exchange models none.
    pub holes: Vec<Hole>,
    /// Thickness, mm.
    pub thickness: Length,
    /// The steel grade.
    pub grade: Known<Grade>,
    /// Where two witnesses disagree: name against geometry, for instance.
    pub disagreements: Vec<String>,
}

/// One bolt.
#[derive(Clone, Debug)]
pub struct Bolt {
    /// The fastener it belongs to (a group's bolts share it).
    pub identity: Identity,
    /// One end of the modelled body on the bolt's axis.
    pub start: DVec3,
    /// The other end.
    pub end: DVec3,
    /// Nominal diameter.
    pub diameter: Known<Length>,
    /// Nominal length as stated (in the wild it may be the grip).
    pub length: Known<Length>,
    /// Length of the thread as stated; `None` where nothing states it, or two statements differ.
    pub thread: Option<Length>,
    /// Strength class: "8.8".
    pub class: Known<String>,
    /// Hole diameter as stated by a property.
    pub hole: Option<Length>,
    /// Overall length of a slotted hole as stated by a property.
    pub slot: Option<Length>,
    /// Whether it is an anchor: it ends in concrete, and holds no two parts of the steelwork together.
    pub anchor: bool,
}

/// What sort of weld.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum WeldSort {
    /// Fillet.
    Fillet,
    /// Butt, of a penetration that its throat tells, if anything does.
    Butt,
    /// Butt, of full penetration: by a word, or by the sign of a preparation without a depth (ISO 2553).
    FullButt,
    /// Nobody says.
    Unknown,
}

/// One weld as the exchange shows it.
#[derive(Clone, Debug)]
pub struct Weld {
    /// Who it is.
    pub identity: Identity,
    /// What sort.
    pub sort: WeldSort,
    /// Throat; from a leg by a = z/√2, then the origin says so.
    pub throat: Known<Length>,
    /// Length of the seam.
    pub length: Known<Length>,
    /// Corners of its body's bounding box or the ends of its axis, world; empty if it has no geometry.
    pub points: Vec<DVec3>,
}

/// Parts welded into one shipping piece.
#[derive(Clone, Debug)]
pub struct Piece {
    /// Who it is.
    pub identity: Identity,
    /// Its parts.
    pub parts: Vec<Part>,
}

/// An explicit relation: these two elements are connected, by these parts.
#[derive(Clone, Debug)]
pub struct Told {
    /// The relation's name: often the joint's mark.
    pub name: Option<String>,
    /// Both connected elements, in the file's order (which means nothing).
    pub between: Vec<Part>,
    /// The parts that realise the connection.
    pub by: Vec<Part>,
    /// Where it stands.
    pub place: Place,
}

/// Something that was not taken up.
#[derive(Clone, Debug)]
pub struct Rejected {
    /// Who it is.
    pub identity: Identity,
    /// Why, readable: "body is no straight prism (IfcRevolvedAreaSolid)".
    pub reason: String,
}

impl Steelwork {
    /// Who a part is.
    pub fn identity(&self, part: Part) -> &Identity {
        match part {
            Part::Member(i) => &self.members[i].identity,
            Part::Plate(i) => &self.plates[i].identity,
            Part::Bolt(i) => &self.bolts[i].identity,
            Part::Weld(i) => &self.welds[i].identity,
        }
    }
}
