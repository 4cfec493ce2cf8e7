//! Cuts the bolts into joints: by end plate, else by the plates and members that they pass through.

use std::collections::{BTreeMap, BTreeSet};

use glam::DVec3;

use super::scene::Scene;
use super::touch::{EndOn, Pass};
use crate::shop::{Part, Shape};

/// Bolts through the same members further apart than this, mm, belong to different joints.
const APART: f64 = 1500.0;

/// An angle or the like that is shorter than this, mm, is a cleat: it joins, and is not what is joined.
const CLEAT: f64 = 1000.0;

/// Bolts that belong to one joint.
pub(super) enum Cluster {
    /// They pass through an end plate, or through several that are bolted to each other.
    EndPlates { plates: Vec<usize>, bolts: Vec<usize> },
    /// They pass through no end plate.
    Other { bolts: Vec<usize> },
}

/// All clusters; bolts through fewer than two plies are in none, unless their plate is an end plate or shared.
pub(super) fn cut(scene: &Scene) -> Vec<Cluster> {
    let mut clusters = by_end_plate(scene);
    let mut taken = vec![false; scene.steel.bolts.len()];
    for cluster in &clusters {
        let Cluster::EndPlates { bolts, .. } = cluster else { continue };
        bolts.iter().for_each(|bolt| taken[*bolt] = true);
    }
    let rest: Vec<usize> =
        (0..taken.len()).filter(|bolt| !taken[*bolt] && !scene.touches.passes[*bolt].is_empty()).collect();
    clusters.extend(by_plies(scene, &rest).into_iter().map(|bolts| Cluster::Other { bolts }));
    clusters
}

/// Member ends on a plate that make it an end plate, the likeliest first: the end sits on it, or weld or piece say so. One
/// that is not half as long as another of them is its haunch.
pub(super) fn ends_on(scene: &Scene, plate: usize) -> Vec<EndOn> {
    let touch = scene.tolerances().touch.get();
    let mut ends: Vec<(bool, EndOn)> = scene.touches.ends[plate]
        .iter()
        .map(|end| (scene.are_one_piece(Part::Plate(plate), Part::Member(end.member)), *end))
        .filter(|(joined, end)| *joined || end.gap.abs() <= touch || (end.gap + end.mitre).abs() <= touch)
        .collect();
    ends.sort_by(|(a_joined, a), (b_joined, b)| {
        b_joined
            .cmp(a_joined)
            .then(a.gap.abs().total_cmp(&b.gap.abs()))
            .then_with(|| scene.label(Part::Member(a.member)).cmp(&scene.label(Part::Member(b.member))))
    });
    let length = |end: &EndOn| {
        let member = &scene.steel.members[end.member];
        member.start.distance(member.end)
    };
    let joined = ends.iter().any(|(joined, _)| *joined);
    let longest = ends.iter().filter(|(own, _)| *own == joined).map(|(_, end)| length(end)).fold(0.0, f64::max);
    ends.sort_by_key(|(own, end)| (*own != joined, 2.0 * length(end) < longest));
    ends.into_iter().map(|(_, end)| end).collect()
}

/// Whether a member is a short cleat.
pub(super) fn is_cleat(scene: &Scene, member: usize) -> bool {
    let member = &scene.steel.members[member];
    member.shape == Shape::Other && member.start.distance(member.end) <= CLEAT
}

/// The middle of some bolts.
pub(super) fn centre(scene: &Scene, bolts: &[usize]) -> DVec3 {
    let ends = bolts.iter().map(|i| &scene.steel.bolts[*i]);
    ends.map(|bolt| (bolt.start + bolt.end) / 2.0).sum::<DVec3>() / bolts.len().max(1) as f64
}

fn by_end_plate(scene: &Scene) -> Vec<Cluster> {
    let mut bolts_of: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    for (bolt, passes) in scene.touches.passes.iter().enumerate() {
        for pass in passes {
            if let Pass::Plate(plate) = pass {
                bolts_of.entry(*plate).or_default().push(bolt);
            }
        }
    }
    bolts_of.retain(|plate, _| !ends_on(scene, *plate).is_empty());
    let mut sets = Sets::new(scene.steel.plates.len());
    for passes in &scene.touches.passes {
        // Plates on both sides of a column's web share bolts and are two joints all the same.
        let meets_member = passes.iter().any(|pass| matches!(pass, Pass::Member(..)));
        let mut ends = passes.iter().filter_map(|pass| match pass {
            Pass::Plate(plate) if bolts_of.contains_key(plate) => Some(*plate),
            _ => None,
        });
        if let Some(first) = ends.next().filter(|_| !meets_member) {
            ends.for_each(|other| sets.join(first, other));
        }
    }
    let mut clusters: BTreeMap<usize, (Vec<usize>, BTreeSet<usize>)> = BTreeMap::new();
    for (plate, bolts) in bolts_of {
        let (plates, all) = clusters.entry(sets.root(plate)).or_default();
        plates.push(plate);
        all.extend(bolts);
    }
    clusters
        .into_values()
        .map(|(plates, bolts)| Cluster::EndPlates { plates, bolts: bolts.into_iter().collect() })
        .collect()
}

fn by_plies(scene: &Scene, rest: &[usize]) -> Vec<Vec<usize>> {
    // First by what connects: plates and cleats.
    let plates = scene.steel.plates.len();
    let mut sets = Sets::new(plates + scene.steel.members.len());
    let connectors = |bolt: usize| {
        scene.touches.passes[bolt].iter().filter_map(move |pass| match *pass {
            Pass::Plate(plate) => Some(plate),
            Pass::Member(member, _) => is_cleat(scene, member).then_some(plates + member),
        })
    };
    for bolt in rest {
        let mut all = connectors(*bolt);
        if let Some(first) = all.next() {
            all.for_each(|other| sets.join(first, other));
        }
    }
    let mut connected: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    let mut clusters: BTreeMap<Vec<usize>, Vec<Vec<usize>>> = BTreeMap::new();
    for bolt in rest {
        let first = connectors(*bolt).next();
        match first {
            Some(first) => connected.entry(sets.root(first)).or_default().push(*bolt),
            None => clusters.entry(members_of(scene, &[*bolt])).or_default().push(vec![*bolt]),
        }
    }
    for bolts in connected.into_values() {
        clusters.entry(members_of(scene, &bolts)).or_default().push(bolts);
    }
    // Then what holds the same two members or more at one place is one joint: the plates of a splice.
    let mut joints = Vec::new();
    for (members, groups) in clusters {
        let joined = if members.len() < 2 { groups } else { gathered(scene, groups) };
        joints.extend(joined.into_iter().filter(|bolts| bolts.iter().any(|b| scene.touches.passes[*b].len() > 1)));
    }
    joints
}

/// Members that bolts pass through, cleats left out; ascending.
pub(super) fn members_of(scene: &Scene, bolts: &[usize]) -> Vec<usize> {
    let mut members: BTreeSet<usize> = passed(scene, bolts).1.into_keys().collect();
    members.retain(|member| !is_cleat(scene, *member));
    members.into_iter().collect()
}

/// The plates that bolts pass through, and the members with the plies.
pub(super) fn passed(
    scene: &Scene,
    bolts: &[usize],
) -> (BTreeSet<usize>, BTreeMap<usize, BTreeSet<super::boxes::Ply>>) {
    let (mut plates, mut members) = (BTreeSet::new(), BTreeMap::<_, BTreeSet<_>>::new());
    for pass in bolts.iter().flat_map(|bolt| &scene.touches.passes[*bolt]) {
        match *pass {
            Pass::Plate(plate) => _ = plates.insert(plate),
            Pass::Member(member, ply) => _ = members.entry(member).or_default().insert(ply),
        }
    }
    (plates, members)
}

/// Joins groups whose middles follow each other at less than [`APART`] along the direction in which they spread.
fn gathered(scene: &Scene, groups: Vec<Vec<usize>>) -> Vec<Vec<usize>> {
    let mut placed: Vec<(DVec3, Vec<usize>)> = groups.into_iter().map(|bolts| (centre(scene, &bolts), bolts)).collect();
    let Some(first) = placed.first().map(|(point, _)| *point) else { return Vec::new() };
    let far = |from: DVec3| placed.iter().map(|(p, _)| *p).max_by(|a, b| a.distance(from).total_cmp(&b.distance(from)));
    let one = far(first).unwrap_or(first);
    let axis = (far(one).unwrap_or(one) - one).normalize_or_zero();
    placed.sort_by(|(a, _), (b, _)| a.dot(axis).total_cmp(&b.dot(axis)));
    let mut joints: Vec<(f64, Vec<usize>)> = Vec::new();
    for (point, bolts) in placed {
        let at = point.dot(axis);
        match joints.last_mut() {
            Some((last, joint)) if at - *last <= APART => {
                *last = at;
                joint.extend(bolts);
            }
            _ => joints.push((at, bolts)),
        }
    }
    joints.into_iter().map(|(_, bolts)| bolts).collect()
}

/// Disjoint sets.
struct Sets(Vec<usize>);

impl Sets {
    fn new(count: usize) -> Self {
        Self((0..count).collect())
    }

    fn root(&mut self, mut item: usize) -> usize {
        while self.0[item] != item {
            self.0[item] = self.0[self.0[item]];
            item = self.0[item];
        }
        item
    }

    fn join(&mut self, a: usize, b: usize) {
        let (a, b) = (self.root(a), self.root(b));
        self.0[a.max(b)] = a.min(b);
    }
}
