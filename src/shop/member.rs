//! Members: long prisms of one section.

use glam::{DVec2, DVec3};

use super::profile::Kind;
use super::reading::Reading;
use super::section::{Seen, see};
use super::solid::{Cut, Prism};
use super::{Member, Notch, Shape};
use crate::exchange::Entity;
use crate::origin::{Ask, Missing};

/// A part is long if it is this much longer than wide.
pub(super) const LONG: f64 = 2.0;
/// An outline that fills less of its box than this may be a curved band.
const BAND: f64 = 0.6;
/// A plane nearer to the member's axis than this (as a sine) cuts along it, not off its end.
const ALONG: f64 = 0.17;
/// A cut that stops this short of a face, mm, still takes all of it.
const NOISE: f64 = 1.0;
/// A round cut up to this size is a bolt hole, which no member's section loses at its end, mm.
const BOLT_HOLE: f64 = 100.0;

impl<'a> Reading<'a> {
    /// The member that a prism is.
    pub fn member(&self, element: Entity<'a>, prism: &Prism) -> Member {
        let mut seen = see(&prism.profile);
        let (section, mut disagreements) = match &prism.beyond {
            None => self.section(element, &prism.profile, &seen),
            Some(reason) => (Err(no_section(element, reason)), Vec::new()),
        };
        disagreements.extend(self.called_a_plate(element));
        // An outline that is no I by itself may still be one by name, box and area.
        if section.is_ok() && seen.shape == Shape::Other {
            seen.shape = Shape::I;
        }
        let (from, to) = ends(prism, &seen, &mut disagreements);
        let mut notches = Vec::new();
        let mut take =
            |cut: &Prism, cutter: &str, told: &mut Vec<String>| match notch(prism, &seen, (from, to), cut, cutter) {
                Some(notch) => notches.push(notch),
                None => told.push(untaken(cutter)),
            };
        for cut in &prism.cuts {
            if let Cut::Prism(cut) = cut
                && !is_bolt_hole(cut)
            {
                take(cut, "an extrusion", &mut disagreements);
            }
        }
        for opening in self.openings(element) {
            match opening {
                Ok(opening) if is_bolt_hole(&opening) => {}
                Ok(opening) => take(&opening, "an opening element", &mut disagreements),
                Err(reason) => disagreements.push(format!("an opening in it can't be read: {reason}")),
            }
        }
        if let Some([a, b]) = self.axis_line(element).as_deref()
            && prism.beyond.is_none()
            && (*b - *a).normalize_or_zero().cross(prism.axis()).length() > self.straight()
        {
            disagreements.push("its Axis runs in another direction than its body, which is followed".into());
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
            notches,
            not_assessed: prism.beyond.clone(),
            disagreements,
        }
    }

    /// Several solids that are one long part: a member in the box round all of them, not assessed. `None` if they are
    /// not long.
    pub fn built_up(&self, element: Entity<'a>, prisms: &[&Prism]) -> Option<Member> {
        let main = prisms.iter().max_by(|a, b| a.bulk().total_cmp(&b.bulk()))?;
        let x = see(&main.profile).bounds.x;
        let axes = [main.turned(x), main.turned(x.perp()), main.axis()];
        let (mut low, mut high) = (DVec3::INFINITY, DVec3::NEG_INFINITY);
        for corner in prisms.iter().flat_map(|prism| prism.corners()) {
            let local = DVec3::from(axes.map(|axis| axis.dot(corner)));
            low = low.min(local);
            high = high.max(local);
        }
        let (size, middle) = (high - low, (low + high) / 2.0);
        let along = (0..3).max_by(|a, b| size[*a].total_cmp(&size[*b]))?;
        let (across, depth) = ((along + 1) % 3, (along + 2) % 3);
        if !(size[along] >= LONG * size[across].max(size[depth])) {
            return None;
        }
        let centre = axes[0] * middle.x + axes[1] * middle.y + axes[2] * middle.z;
        let half = axes[along] * size[along] / 2.0;
        let reason = match prisms {
            [_] => "curved or cranked, drawn as a band".to_owned(),
            several => format!("built up of {} solids", several.len()),
        };
        Some(Member {
            identity: self.identity(element),
            start: centre - half,
            end: centre + half,
            along: axes[along],
            across: axes[across],
            depth: axes[depth],
            shape: Shape::Other,
            extents: DVec2::new(size[across], size[depth]),
            section: Err(no_section(element, &reason)),
            grade: self.grade(element),
            notches: Vec::new(),
            not_assessed: Some(reason),
            disagreements: Vec::new(),
        })
    }

    /// A bar that is curved in one plane and drawn as the band that it shows there: about as thick as the band is wide,
    /// which no plate is.
    pub fn curved_bar(&self, element: Entity<'a>, prism: &Prism) -> Option<Member> {
        let profile = &prism.profile;
        if profile.kind != Kind::Outline || !profile.voids.is_empty() || profile.outer.circle.is_some() {
            return None;
        }
        let (area, size) = (profile.outer.area(), profile.outer.least_box(profile.up).size);
        let width = 2.0 * area / profile.outer.perimeter();
        let band = area < BAND * size.x * size.y && size.max_element() >= 4.0 * LONG * width;
        let thick = prism.depth > 0.5 * width && prism.depth <= 2.0 * LONG * width;
        if band && thick { self.built_up(element, &[prism]) } else { None }
    }

    /// A sentence where a part with the shape of a member is called a plate and nothing else.
    fn called_a_plate(&self, element: Entity<'a>) -> Option<String> {
        let plate = |text: &str| self.text(text).words().says_only(&["plate", "stiffener"]);
        let names = self.names_of(element);
        let (by, text) = names.iter().find(|(_, text)| plate(text))?;
        Some(format!("{by} calls it \"{text}\" but it has the shape of a member"))
    }
}

fn no_section(element: Entity<'_>, reason: &str) -> Missing {
    Missing {
        what: "section".into(),
        reason: format!("the member is {reason}"),
        at: Some(element.place()),
        ask: Ask::Method,
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
                // By itself: a notch or told of.
                Cut::Prism(_) => {}
                Cut::Other(class) => notes.push(untaken(class)),
                Cut::Trim(sentence) => notes.push(sentence.clone()),
                Cut::Plane { .. } => {}
            }
            continue;
        };
        let towards = keep.dot(prism.axis());
        let level = |corner: DVec2| keep.dot(*at - prism.at(corner, 0.0)) / towards;
        let whole = bounds.as_ref().is_none_or(|(frame, polygon)| {
            let inside = |corner: DVec2| {
                let point = frame.inverse().transform_point3(prism.at(corner, level(corner))).truncate();
                polygon.holds(point)
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

/// The notch that a cut makes at one end of a member, if it reaches past the end and past one flange over all of its width,
/// and leaves something of the other half. It is the box round the cut: no less than what is missing.
fn notch(prism: &Prism, seen: &Seen, (from, to): (f64, f64), cut: &Prism, cutter: &str) -> Option<Notch> {
    let (x, y) = (seen.bounds.x, seen.bounds.x.perp());
    let (mut low, mut high) = (DVec3::INFINITY, DVec3::NEG_INFINITY);
    for corner in cut.corners() {
        let local = prism.frame.inverse().transform_point3(corner);
        let across = local.truncate() - seen.bounds.centre;
        let own = DVec3::new(across.dot(x), across.dot(y), local.z);
        (low, high) = (low.min(own), high.max(own));
    }
    let half = seen.bounds.size / 2.0;
    if seen.shape != Shape::I || !(low.x <= NOISE - half.x && high.x >= half.x - NOISE) {
        return None;
    }
    let (length, at_end) = match (low.z <= from + NOISE, high.z >= to - NOISE) {
        (true, false) => (high.z - from, false),
        (false, true) => (to - low.z, true),
        _ => return None,
    };
    let (depth, positive) = match (high.y >= half.y - NOISE, low.y <= NOISE - half.y) {
        (true, false) => (half.y - low.y, true),
        (false, true) => (high.y + half.y, false),
        _ => return None,
    };
    let fits = length > 0.0 && depth > 0.0 && length < 0.5 * (to - from);
    fits.then(|| Notch { at_end, positive, length, depth, untaken: untaken(cutter) })
}

fn is_bolt_hole(prism: &Prism) -> bool {
    prism.profile.outer.circle.is_some_and(|(_, r)| 2.0 * r <= BOLT_HOLE)
}
