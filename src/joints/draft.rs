//! A joint while it is being recognised.

use std::collections::BTreeSet;

use glam::DVec3;

use super::scene::Scene;
use super::{Joint, Kind, cut};
use crate::shop::Part;

/// A joint before it has its mark.
pub(super) struct Draft {
    pub(super) joint: Joint,
    /// All members in it, ascending.
    pub(super) members: Vec<usize>,
    /// The middle of its bolts.
    pub(super) centre: DVec3,
    /// Where it sits on its column.
    pub(super) seat: Option<Seat>,
    /// What relations call it.
    pub(super) names: BTreeSet<String>,
}

/// Where an end-plate joint sits on its column.
#[derive(Clone, Copy, Debug)]
pub(super) struct Seat {
    pub(super) column: usize,
    /// Which flange: its sign along the column's depth.
    pub(super) flange: f64,
    /// The soffit along the column's axis, mm from its start.
    pub(super) level: f64,
    /// Depth of the supported member, mm.
    pub(super) depth: f64,
}

impl Draft {
    pub(super) fn new(scene: &Scene, kind: Kind, bolts: Vec<usize>, members: Vec<usize>) -> Self {
        let centre = cut::centre(scene, &bolts);
        let place = bolts.iter().map(|bolt| scene.place(Part::Bolt(*bolt))).min();
        let joint = Joint {
            mark: String::new(),
            kind,
            supporting: None,
            supported: None,
            at_end: None,
            bolts,
            plates: Vec::new(),
            welds: Vec::new(),
            layout: Err(format!("kind not assessed yet: {}", kind.word())),
            opposite: None,
            opposite_unclear: None,
            disagreements: Vec::new(),
            place,
        };
        Self { joint, members, centre, seat: None, names: BTreeSet::new() }
    }

    /// Names the supported member and its end nearest to the joint.
    pub(super) fn support(&mut self, scene: &Scene, supporting: Option<usize>, supported: Option<usize>) {
        self.joint.supporting = supporting;
        self.joint.supported = supported;
        self.joint.at_end = supported.map(|i| {
            let member = &scene.steel.members[i];
            member.end.distance(self.centre) < member.start.distance(self.centre)
        });
    }
}
