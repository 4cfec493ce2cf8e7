//! Which solids of a fastener are one bolt, which of them is its shank, and what is a nut or a washer by shape.

use std::cmp::Ordering;

use glam::{DVec2, DVec3};

use super::profile::Kind;
use super::reading::Reading;
use super::section::see;
use super::solid::Prism;

/// The largest nut or washer, mm.
pub(super) const SMALL: f64 = 150.0;

/// The parts on one axis that touch: shank, head, nut.
pub(super) struct Cluster<'p> {
    prisms: Vec<&'p Prism>,
}

impl Reading<'_> {
    /// Prisms on one axis that touch belong to one bolt.
    pub fn clusters<'p>(&self, prisms: &[&'p Prism]) -> Vec<Cluster<'p>> {
        let mut clusters: Vec<Cluster<'p>> = Vec::new();
        for prism in prisms {
            let (mine, mut rest): (Vec<_>, Vec<_>) =
                clusters.into_iter().partition(|c| c.prisms.iter().any(|other| self.one_bolt(prism, other)));
            // Keeps the place of the first in the file.
            let mut merged: Vec<&Prism> = mine.into_iter().flat_map(|c| c.prisms).collect();
            merged.push(prism);
            rest.push(Cluster { prisms: merged });
            clusters = rest;
        }
        clusters
    }

    fn one_bolt(&self, a: &Prism, b: &Prism) -> bool {
        let tolerances = &self.rulebook.tolerances;
        let (axis, from) = axis_of(a);
        let (other, to) = axis_of(b);
        let along = (to - from).dot(axis);
        let aside = (to - from - along * axis).length();
        let same =
            axis.cross(other).length() <= tolerances.angle.to_radians().sin() && aside <= tolerances.position.get();
        let far = along + other.dot(axis) * b.depth;
        same && along.min(far) <= a.depth + tolerances.touch.get() && along.max(far) >= -tolerances.touch.get()
    }
}

impl<'p> Cluster<'p> {
    /// The longest round solid that is longer than thick (of equals the thinnest): head and nut are short.
    pub fn shank(&self) -> Option<&'p Prism> {
        let radius = |p: &Prism| p.profile.outer.circle.map_or(0.0, |(_, r)| r);
        let longer =
            |a: &&Prism, b: &&Prism| -> Ordering { a.depth.total_cmp(&b.depth).then(radius(b).total_cmp(&radius(a))) };
        let shank = self.prisms.iter().copied().filter(|p| round(p) && p.profile.voids.is_empty()).max_by(longer)?;
        (shank.depth >= 2.0 * radius(shank) || self.prisms.len() == 1).then_some(shank)
    }
}

fn axis_of(prism: &Prism) -> (DVec3, DVec3) {
    let centre = prism.profile.outer.circle.map(|(c, _)| c).unwrap_or_else(|| see(&prism.profile).bounds.centre);
    (prism.axis(), prism.at(centre, 0.0))
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
