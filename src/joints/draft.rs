//! A joint while it is being recognised.

use std::collections::{BTreeMap, BTreeSet};

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

/// For each joint the one on the column's other flange whose soffit is nearest, if it is within the deeper beam's depth.
pub(super) fn opposites(drafts: &[Draft]) -> Vec<Option<usize>> {
    let mut on_column: BTreeMap<usize, Vec<(usize, Seat)>> = BTreeMap::new();
    for (index, draft) in drafts.iter().enumerate() {
        if let Some(seat) = draft.seat {
            on_column.entry(seat.column).or_default().push((index, seat));
        }
    }
    let across = |draft: &Draft| {
        let seat = draft.seat?;
        let others = on_column.get(&seat.column)?.iter().filter(|(_, other)| {
            other.flange * seat.flange < 0.0 && (other.level - seat.level).abs() < other.depth.max(seat.depth)
        });
        others
            .min_by(|(_, a), (_, b)| (a.level - seat.level).abs().total_cmp(&(b.level - seat.level).abs()))
            .map(|(i, _)| *i)
    };
    drafts.iter().map(across).collect()
}
