//! Levels and sections of a mesh along an axis, and the axes that are worth asking.

use std::collections::HashMap;

use glam::DVec3;

use super::mesh::{Mesh, Slice};

/// Points this near along an axis are at one level, mm.
pub(super) const LEVEL: f64 = 0.1;
/// Directions within this are one (a sine).
pub(super) const PARALLEL: f64 = 1e-3;
/// A member shows its section over at least this share of its length.
pub(super) const CONSTANT: f64 = 0.5;
/// Only the longest lengths between levels are looked at.
const LENGTHS: usize = 24;
/// Only so many of the longest edges and largest faces are asked for a direction.
const ASKED: usize = 4096;

/// The levels of a mesh along an axis.
pub(super) struct Levels<'m> {
    pub mesh: &'m Mesh,
    pub axis: DVec3,
    pub x: DVec3,
    pub y: DVec3,
    /// Levels in rising order, mm.
    pub at: Vec<f64>,
}

/// A length between two levels, with its section.
pub(super) struct Stretch {
    pub from: f64,
    pub to: f64,
    pub slice: Option<Slice>,
}

impl<'m> Levels<'m> {
    pub fn of(mesh: &'m Mesh, axis: DVec3) -> Self {
        // Towards the axis of the world that it is nearest to, so that the sign does not depend on the faces' order.
        let most = axis.to_array().into_iter().max_by(|a, b| a.abs().total_cmp(&b.abs())).unwrap_or(1.0);
        let axis = if most < 0.0 { -axis } else { axis };
        let beside =
            [DVec3::X, DVec3::Y, DVec3::Z].into_iter().min_by(|a, b| a.dot(axis).abs().total_cmp(&b.dot(axis).abs()));
        let x = beside.unwrap_or(DVec3::X).reject_from(axis).normalize_or(DVec3::X);
        let mut all: Vec<f64> = mesh.points.iter().map(|p| p.dot(axis)).collect();
        all.sort_by(f64::total_cmp);
        let mut at = Vec::new();
        for one in all.chunk_by(|a, b| b - a <= LEVEL) {
            let (Some(low), Some(high)) = (one.first(), one.last()) else { continue };
            // Points that follow each other closely over a length are no level.
            if high - low <= 2.0 * LEVEL { at.push((low + high) / 2.0) } else { at.extend([low, high]) }
        }
        Self { mesh, axis, x, y: axis.cross(x), at }
    }

    pub fn low(&self) -> f64 {
        self.at.first().copied().unwrap_or_default()
    }

    pub fn high(&self) -> f64 {
        self.at.last().copied().unwrap_or_default()
    }

    pub fn depth(&self) -> f64 {
        self.high() - self.low()
    }

    pub fn slice(&self, level: f64) -> Option<Slice> {
        self.mesh.slice(self.axis, level, self.x, self.y)
    }

    /// The section, if the mesh is a right prism along the axis and nothing else.
    pub fn pure(&self) -> Option<Slice> {
        let [low, high] = *self.at.as_slice() else { return None };
        let [one, middle, other] = [0.1, 0.5, 0.9].map(|share| self.slice(low + share * (high - low)));
        let (one, middle, other) = (one?, middle?, other?);
        (middle.beside == 0 && one.same(&middle) && other.same(&middle)).then_some(middle)
    }

    /// The lengths between levels in rising order, the longest ones with their sections. `None` if there are very many.
    pub fn stretches(&self) -> Option<Vec<Stretch>> {
        let mut lengths: Vec<f64> = self.at.windows(2).map(|w| w[1] - w[0]).collect();
        lengths.sort_by(|a, b| b.total_cmp(a));
        let least = lengths.get(LENGTHS).copied().unwrap_or(f64::NEG_INFINITY);
        let whole: f64 = lengths.iter().take(LENGTHS).sum();
        if !(whole >= CONSTANT * self.depth()) {
            return None;
        }
        let stretch = |w: &[f64]| Stretch {
            from: w[0],
            to: w[1],
            slice: if w[1] - w[0] > least { self.slice((w[0] + w[1]) / 2.0) } else { None },
        };
        Some(self.at.windows(2).map(stretch).collect())
    }
}

/// The directions of a mesh's faces by area and of its edges by length, the most first.
pub(super) fn directions(mesh: &Mesh) -> (Vec<DVec3>, Vec<DVec3>) {
    let normals: Vec<DVec3> =
        mesh.faces.iter().map(|face| face.loops.first().map_or(DVec3::ZERO, |l| area(mesh, l))).collect();
    let mut first_face: HashMap<(u32, u32), usize> = HashMap::new();
    let mut edges: Vec<DVec3> = Vec::new();
    for (i, face) in mesh.faces.iter().enumerate() {
        for corners in &face.loops {
            for (a, b) in corners.iter().zip(corners.iter().cycle().skip(1)) {
                let key = (*a.min(b), *a.max(b));
                let Some(other) = first_face.insert(key, i) else { continue };
                // Faces in one plane meet in no edge of the body: the diagonals of a triangulation.
                let (m, n) = (normals[other].normalize_or_zero(), normals[i].normalize_or_zero());
                if !(m.dot(n).abs() > 1.0 - 1e-6) {
                    edges.push(mesh.points[*b as usize] - mesh.points[*a as usize]);
                }
            }
        }
    }
    (most(normals), most(edges))
}

/// Unit directions of vectors that lie on one line, by the sum of their lengths.
fn most(mut vectors: Vec<DVec3>) -> Vec<DVec3> {
    vectors.sort_by(|a, b| b.length_squared().total_cmp(&a.length_squared()));
    let mut sums: Vec<(DVec3, f64)> = Vec::new();
    for vector in vectors.into_iter().take(ASKED) {
        let Some(unit) = vector.try_normalize() else { continue };
        match sums.iter().position(|(other, _)| other.cross(unit).length() <= PARALLEL) {
            Some(known) => sums[known].1 += vector.length(),
            None if sums.len() < 64 => sums.push((unit, vector.length())),
            None => {}
        }
    }
    sums.sort_by(|a, b| b.1.total_cmp(&a.1));
    sums.into_iter().map(|(unit, _)| unit).collect()
}

/// Newell's vector of a loop: its normal, as long as its area.
fn area(mesh: &Mesh, corners: &[u32]) -> DVec3 {
    let Some(first) = corners.first().map(|i| mesh.points[*i as usize]) else { return DVec3::ZERO };
    let after = corners.iter().cycle().skip(1);
    let from = |i: &u32| mesh.points[*i as usize] - first;
    corners.iter().zip(after).map(|(a, b)| from(a).cross(from(b))).sum::<DVec3>() / 2.0
}
