//! Which solids of a fastener are one bolt, which of them is its shank, and what is a nut or a washer by shape.

use std::collections::BTreeMap;

use glam::{DVec2, DVec3};

use super::outline::Loop;
use super::profile::Kind;
use super::reading::Reading;
use super::solid::Prism;
use super::words::Word;

/// The largest nut or washer, mm.
pub(super) const SMALL: f64 = 150.0;

/// A disc without a hole up to this diameter and thickness is a washer, mm.
const DISC: (f64, f64) = (80.0, 10.0);

/// A round solid thicker than the shank by more than this is a head or a nut; a thread may be drawn thinner.
const SHANK: f64 = 1.25;

/// The solids on one axis that touch: shank, head, nut.
pub(super) struct Cluster<'p> {
    parts: Vec<OnAxis<'p>>,
}

/// A solid with its middle line.
struct OnAxis<'p> {
    prism: &'p Prism,
    from: DVec3,
    axis: DVec3,
    /// Its radius, if it is a full round.
    radius: Option<f64>,
}

/// The shank of one bolt.
pub(super) struct Shank {
    pub start: DVec3,
    pub end: DVec3,
    /// As drawn, mm.
    pub diameter: f64,
}

/// What of a part's solids matters to its bolts, without the solids.
pub(super) struct Shanks {
    /// Why one of the solids is no straight prism.
    pub beyond: Option<String>,
    /// How many bolts the solids may be.
    pub clusters: usize,
    /// The shanks among them, and whether something wider sits on each.
    pub found: Vec<(Shank, bool)>,
}

impl Reading<'_> {
    /// What of some solids matters to bolts.
    pub fn shanks(&self, prisms: &[&Prism]) -> Shanks {
        let clusters = self.clusters(prisms);
        let found = clusters.iter().filter_map(|cluster| {
            let shank = cluster.shank()?;
            let headed = cluster.headed(&shank);
            Some((shank, headed))
        });
        Shanks {
            beyond: prisms.iter().find_map(|p| p.beyond.clone()),
            clusters: clusters.len(),
            found: found.collect(),
        }
    }

    /// Solids on one axis that touch belong to one bolt; bolts come in the order of their first solid.
    pub fn clusters<'p>(&self, prisms: &[&'p Prism]) -> Vec<Cluster<'p>> {
        let parts: Vec<OnAxis<'p>> = prisms.iter().map(|prism| OnAxis::of(prism)).collect();
        if parts.len() == 1 {
            return vec![Cluster { parts }];
        }
        // Only what overlaps along the direction in which they spread most is held against each other.
        let spread = |i: usize| {
            let all = parts.iter().map(|part| part.from[i]);
            all.clone().fold(f64::NEG_INFINITY, f64::max) - all.fold(f64::INFINITY, f64::min)
        };
        let widest = (0..3).max_by(|a, b| spread(*a).total_cmp(&spread(*b))).unwrap_or(0);
        let near = 2.0 * (self.rulebook.tolerances.touch.get() + self.rulebook.tolerances.position.get());
        let ends: Vec<(f64, f64)> = parts
            .iter()
            .map(|part| (part.from[widest], (part.from + part.axis * part.prism.depth)[widest]))
            .map(|(a, b)| (a.min(b) - near, a.max(b) + near))
            .collect();
        let mut order: Vec<usize> = (0..parts.len()).collect();
        order.sort_by(|a, b| ends[*a].0.total_cmp(&ends[*b].0));
        let mut root: Vec<usize> = (0..parts.len()).collect();
        fn find(root: &mut [usize], mut at: usize) -> usize {
            while root[at] != at {
                root[at] = root[root[at]];
                at = root[at];
            }
            at
        }
        for (nth, one) in order.iter().enumerate() {
            for other in order[nth + 1..].iter().take_while(|other| ends[**other].0 <= ends[*one].1) {
                if self.one_bolt(&parts[*one], &parts[*other]) {
                    let (a, b) = (find(&mut root, *one), find(&mut root, *other));
                    root[a.max(b)] = a.min(b);
                }
            }
        }
        let mut clusters: BTreeMap<usize, Cluster<'p>> = BTreeMap::new();
        for (i, part) in parts.into_iter().enumerate() {
            clusters.entry(find(&mut root, i)).or_insert(Cluster { parts: Vec::new() }).parts.push(part);
        }
        clusters.into_values().collect()
    }

    fn one_bolt(&self, a: &OnAxis<'_>, b: &OnAxis<'_>) -> bool {
        let tolerances = &self.rulebook.tolerances;
        let offset = b.from - a.from;
        let along = offset.dot(a.axis);
        let same = a.axis.cross(b.axis).length() <= tolerances.angle.to_radians().sin()
            && (offset - along * a.axis).length() <= tolerances.position.get();
        let far = along + b.axis.dot(a.axis) * b.prism.depth;
        let touch = tolerances.touch.get();
        same && along.min(far) <= a.prism.depth + touch && along.max(far) >= -touch
    }
}

impl<'p> OnAxis<'p> {
    fn of(prism: &'p Prism) -> Self {
        let outer = &prism.profile.outer;
        let centre = outer.circle.map_or_else(|| outer.least_box(DVec2::X).centre, |(centre, _)| centre);
        let full = prism.profile.voids.is_empty() && prism.profile.kind != Kind::Hollow;
        // A long hexagon is a shank drawn with six facets.
        let radius = outer.circle.map(|(_, r)| r).or_else(|| hexagon(outer).filter(|r| prism.depth >= 4.0 * r));
        Self { prism, from: prism.at(centre, 0.0), axis: prism.axis(), radius: radius.filter(|_| full) }
    }
}

impl<'p> Cluster<'p> {
    /// Its first solid.
    pub fn first(&self) -> Option<&'p Prism> {
        self.parts.first().map(|part| part.prism)
    }

    /// Whether a head or a nut sits on the shank: something wider than it.
    pub fn headed(&self, shank: &Shank) -> bool {
        let width = |part: &OnAxis<'_>| part.prism.profile.outer.box_along(DVec2::X).size.min_element();
        self.parts.iter().any(|part| width(part) > SHANK * shank.diameter)
    }

    /// The longest full round solid (of equals the thinnest), with what continues it as thick or thinner. Head and nut
    /// are no longer than thick; a single short solid is left to be told so.
    pub fn shank(&self) -> Option<Shank> {
        let rounds = || self.parts.iter().filter_map(|part| Some((part, part.radius?)));
        let (main, radius) =
            rounds().max_by(|(a, r), (b, s)| a.prism.depth.total_cmp(&b.prism.depth).then(s.total_cmp(r)))?;
        if !(main.prism.depth >= 2.0 * radius || self.parts.len() == 1) {
            return None;
        }
        let (mut low, mut high, mut thickest) = (0.0, main.prism.depth, radius);
        for (part, r) in rounds().filter(|(_, r)| *r <= SHANK * radius) {
            let along = (part.from - main.from).dot(main.axis);
            let far = along + part.axis.dot(main.axis) * part.prism.depth;
            low = along.min(far).min(low);
            high = along.max(far).max(high);
            thickest = r.max(thickest);
        }
        let at = |along: f64| main.from + along * main.axis;
        Some(Shank { start: at(low), end: at(high), diameter: 2.0 * thickest })
    }
}

/// The distance of the corners of a regular hexagon from its middle.
fn hexagon(outer: &Loop) -> Option<f64> {
    let centre = outer.points.iter().sum::<DVec2>() / outer.points.len().max(1) as f64;
    let corner = outer.points.first()?.distance(centre);
    let regular = outer.points.len() == 6
        && outer.points.iter().all(|p| (p.distance(centre) - corner).abs() <= 0.05 * corner)
        && outer.convex();
    regular.then_some(corner)
}

/// Whether a prism is round, or a long hexagon that stands for a round.
pub(super) fn round(prism: &Prism) -> bool {
    let outer = &prism.profile.outer;
    outer.circle.is_some() || hexagon(outer).is_some_and(|r| prism.depth >= 4.0 * r)
}

/// What small solids on one axis are by shape: no longer than wide, a hexagon among them is a nut or a head; flat and
/// round, a washer.
pub(super) fn small_part(prisms: &[&Prism]) -> Option<Word> {
    let first = prisms.first()?;
    let width = |p: &&Prism| p.profile.outer.box_along(DVec2::X).size.max_element();
    let size = prisms.iter().map(width).fold(0.0, f64::max);
    let line = OnAxis::of(first);
    let along = |p: &&Prism| {
        let one = OnAxis::of(p);
        let from = (one.from - line.from).dot(line.axis);
        [from, from + one.axis.dot(line.axis) * p.depth]
    };
    let on_line = |p: &&Prism| {
        let one = OnAxis::of(p);
        one.axis.cross(line.axis).length() < 0.02
            && (one.from - line.from).reject_from_normalized(line.axis).length() < 2.0
    };
    if !(size <= SMALL) || !prisms.iter().all(on_line) {
        return None;
    }
    let ends: Vec<f64> = prisms.iter().flat_map(along).collect();
    let depth =
        ends.iter().copied().fold(f64::NEG_INFINITY, f64::max) - ends.iter().copied().fold(f64::INFINITY, f64::min);
    if prisms.iter().any(|p| hexagon(&p.profile.outer).is_some()) && depth <= size {
        return Some(Word::Nut);
    }
    let circle = prisms.iter().all(|p| p.profile.outer.circle.is_some());
    let ring = prisms.iter().all(|p| p.profile.voids.len() == 1 || p.profile.kind == Kind::Hollow);
    let washer = if ring { depth <= 0.5 * size } else { size <= DISC.0 && depth <= DISC.1 };
    (circle && washer).then_some(Word::Washer)
}
