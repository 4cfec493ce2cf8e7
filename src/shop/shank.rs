//! Which solids of a fastener are one bolt, which of them is its shank, and what is a nut or a washer by shape.

use glam::{DVec2, DVec3};

use super::profile::Kind;
use super::reading::Reading;
use super::section::see;
use super::solid::Prism;

/// The largest nut or washer, mm.
pub(super) const SMALL: f64 = 150.0;

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

impl Reading<'_> {
    /// Solids on one axis that touch belong to one bolt; bolts come in the order of their first solid.
    pub fn clusters<'p>(&self, prisms: &[&'p Prism]) -> Vec<Cluster<'p>> {
        let mut clusters: Vec<Cluster<'p>> = Vec::new();
        for prism in prisms {
            let mut found = vec![OnAxis::of(prism)];
            let mut first = None;
            let mut kept = Vec::with_capacity(clusters.len() + 1);
            for cluster in clusters {
                if cluster.parts.iter().any(|other| found.iter().any(|one| self.one_bolt(one, other))) {
                    first = first.or(Some(kept.len()));
                    found.extend(cluster.parts);
                } else {
                    kept.push(cluster);
                }
            }
            kept.insert(first.unwrap_or(kept.len()), Cluster { parts: found });
            clusters = kept;
        }
        clusters
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
        let radius = outer.circle.filter(|_| prism.profile.voids.is_empty() && prism.profile.kind != Kind::Hollow);
        Self { prism, from: prism.at(centre, 0.0), axis: prism.axis(), radius: radius.map(|(_, r)| r) }
    }
}

impl Cluster<'_> {
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

/// Whether a prism is round.
pub(super) fn round(prism: &Prism) -> bool {
    prism.profile.outer.circle.is_some()
}

/// What a small part is by shape: a hexagon no longer than wide is a nut or a head, a flat ring a washer.
pub(super) fn small_part(prisms: &[&Prism]) -> Option<String> {
    let [prism] = prisms else { return None };
    let outer = &prism.profile.outer;
    let size = see(&prism.profile).bounds.size.max_element();
    if !(size <= SMALL) {
        return None;
    }
    let centre = outer.points.iter().sum::<DVec2>() / outer.points.len().max(1) as f64;
    let corner = size / 2.0;
    let hexagon =
        outer.points.len() == 6 && outer.points.iter().all(|p| (p.distance(centre) - corner).abs() <= 0.05 * corner);
    if hexagon && prism.depth <= size {
        return Some("nut or bolt head by its shape".into());
    }
    let ring = outer.circle.is_some() && (prism.profile.voids.len() == 1 || prism.profile.kind == Kind::Hollow);
    (ring && prism.depth <= 0.5 * size).then(|| "washer by its shape".into())
}
