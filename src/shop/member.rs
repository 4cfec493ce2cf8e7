//! Members: long prisms of one section.

use glam::DVec2;

use super::reading::Reading;
use super::section::{Seen, see};
use super::solid::{Cut, Prism};
use super::{Member, Shape};
use crate::exchange::Entity;

/// A plane nearer to the member's axis than this (as a sine) cuts along it, not off its end.
const ALONG: f64 = 0.17;
/// A round cut up to this size is a bolt hole, which no member's section loses at its end, mm.
const BOLT_HOLE: f64 = 100.0;

impl<'a> Reading<'a> {
    /// The member that a prism is.
    pub fn member(&self, element: Entity<'a>, prism: &Prism) -> Member {
        let mut seen = see(&prism.profile);
        let (section, mut disagreements) = self.section(element, &prism.profile, &seen);
        // An outline that is no I by itself may still be one by name, box and area.
        if section.is_ok() && seen.shape == Shape::Other {
            seen.shape = Shape::I;
        }
        let (from, to) = ends(prism, &seen, &mut disagreements);
        for opening in self.openings(element) {
            match opening {
                Ok(opening) if is_bolt_hole(&opening) => {}
                Ok(_) => disagreements.push(untaken("an opening element")),
                Err(reason) => disagreements.push(format!("an opening in it can't be read: {reason}")),
            }
        }
        let (start, end) = (prism.at(seen.bounds.centre, from), prism.at(seen.bounds.centre, to));
        Member {
            identity: self.identity(element),
            start,
            end,
            along: prism.axis(),
            across: prism.turned(seen.bounds.x),
            depth: prism.turned(seen.bounds.x.perp()),
            shape: seen.shape,
            extents: seen.bounds.size,
            section,
            grade: self.grade(element),
            not_assessed: None,
            disagreements,
        }
    }
}

/// Where along the sweep the member starts and ends: planes take off its ends as far as nothing of the section's
/// bounding box is left; other cuts are only told of.
fn ends(prism: &Prism, seen: &Seen, notes: &mut Vec<String>) -> (f64, f64) {
    let (x, y) = (seen.bounds.x, seen.bounds.x.perp());
    let half = seen.bounds.size / 2.0;
    let corners: Vec<DVec2> = [(-1.0, -1.0), (1.0, -1.0), (1.0, 1.0), (-1.0, 1.0)]
        .map(|(u, v)| seen.bounds.centre + u * half.x * x + v * half.y * y)
        .to_vec();
    let mut spans = vec![(0.0_f64, prism.depth); corners.len()];
    for cut in &prism.cuts {
        let Cut::Plane { at, keep, bounds } = cut else {
            match cut {
                Cut::Prism(inner) if is_bolt_hole(inner) => {}
                Cut::Prism(_) => notes.push(untaken("an extrusion")),
                Cut::Other(class) => notes.push(untaken(class)),
                Cut::Plane { .. } => {}
            }
            continue;
        };
        let towards = keep.dot(prism.axis());
        let level = |corner: DVec2| keep.dot(*at - prism.at(corner, 0.0)) / towards;
        let whole = bounds.as_ref().is_none_or(|(frame, polygon)| {
            let inside = |corner: DVec2| {
                let point = frame.inverse().transform_point3(prism.at(corner, level(corner))).truncate();
                contains(polygon, point)
            };
            corners.iter().all(|corner| inside(*corner))
        });
        if !(towards.abs() > ALONG) || !whole {
            notes.push(untaken("a half-space beside its end"));
            continue;
        }
        for (span, corner) in spans.iter_mut().zip(&corners) {
            let level = level(*corner);
            if towards > 0.0 { span.0 = span.0.max(level) } else { span.1 = span.1.min(level) }
        }
    }
    let left = spans.iter().filter(|(from, to)| from < to);
    let from = left.clone().map(|s| s.0).fold(f64::INFINITY, f64::min);
    let to = left.map(|s| s.1).fold(f64::NEG_INFINITY, f64::max);
    if from < to {
        (from, to)
    } else {
        notes.push("its cuts leave nothing of it: they are not taken into account".into());
        (0.0, prism.depth)
    }
}

pub(super) fn untaken(cutter: &str) -> String {
    format!("its body is cut by {cutter} (a cope, notch or slot) that is not taken into account")
}

fn is_bolt_hole(prism: &Prism) -> bool {
    prism.profile.outer.circle.is_some_and(|(_, r)| 2.0 * r <= BOLT_HOLE)
}

/// Whether a polygon contains a point (even-odd rule).
pub(super) fn contains(polygon: &[DVec2], point: DVec2) -> bool {
    let mut inside = false;
    let mut before = polygon.last();
    for at in polygon {
        if let Some(b) = before
            && (at.y > point.y) != (b.y > point.y)
            && point.x < (b.x - at.x) * (point.y - at.y) / (b.y - at.y) + at.x
        {
            inside = !inside;
        }
        before = Some(at);
    }
    inside
}
