//! Tells what a body bounded by faces is: a right prism, several on one axis (a bolt), a plate with worked edges, a
//! member with cut ends, or something long that is no straight prism of one section.
//!
//! All is asked of levels and sections along a few likely axes, so that it does not matter how an export cut the
//! faces up, or which way they look.

use std::f64::consts::PI;

use glam::{DAffine2, DAffine3, DMat2, DMat3, DVec2, DVec3};

use super::levels::{CONSTANT, LEVEL, Levels, PARALLEL, Stretch, directions};
use super::mesh::{Mesh, Slice};
use super::outline::Loop;
use super::profile::{Kind, Profile};
use super::solid::{Cut, Prism, Solid};
use crate::origin::Place;

/// The largest turned part (a bolt's head, a nut), mm.
const TURNED: f64 = 150.0;
/// A round part of any outline is looked at in so many steps.
const STEPS: usize = 32;
/// A plate is at most this share of its width thick, as for any prism.
const FLAT: f64 = 0.5;
/// What is longer than this times its other sides is long.
const LONG: f64 = 2.0;
/// A changed section no longer than this between the ends is a bolt hole, mm.
const BOLT_HOLE: f64 = 100.0;

/// Who asks, for the profiles that come out.
pub(super) struct Asked<'a> {
    pub class: &'a str,
    pub place: Place,
}

impl Asked<'_> {
    /// The solids that a mesh is.
    pub fn solids(&self, mesh: Mesh) -> Vec<Solid> {
        let bodies = mesh.bodies();
        if bodies.is_empty() {
            return vec![Err(format!("its body has no faces ({})", self.class))];
        }
        bodies.iter().flat_map(|body| self.body(body)).collect()
    }

    fn body(&self, mesh: &Mesh) -> Vec<Solid> {
        let (faces, edges) = directions(mesh);
        let mut axes: Vec<DVec3> = Vec::new();
        for axis in faces.iter().take(3).chain(edges.iter().take(5)) {
            if !axes.iter().any(|other| other.cross(*axis).length() <= PARALLEL) {
                axes.push(*axis);
            }
        }
        let all: Vec<Levels<'_>> = axes.iter().map(|axis| Levels::of(mesh, *axis)).collect();
        let pure = all
            .iter()
            .filter_map(|levels| Some((levels.pure()?, levels)))
            .max_by(|a, b| a.1.depth().total_cmp(&b.1.depth()));
        if let Some((slice, levels)) = pure {
            return vec![Ok(self.prism(levels, slice, levels.low(), levels.high()))];
        }
        let along = edges
            .first()
            .or(faces.first())
            .and_then(|axis| all.iter().find(|l| l.axis.cross(*axis).length() <= PARALLEL));
        if let Some(turned) = along.and_then(|levels| self.turned(levels)) {
            return turned.into_iter().map(Ok).collect();
        }
        if let Some(rounds) = all.iter().find_map(|levels| self.rounds(levels)) {
            return rounds.into_iter().map(Ok).collect();
        }
        if let Some(plate) = all.iter().find_map(|levels| self.plate(levels)) {
            return vec![Ok(plate)];
        }
        vec![along.and_then(|levels| self.member(levels)).map_or_else(|| self.stand_in(mesh, &faces), Ok)]
    }

    fn prism(&self, levels: &Levels<'_>, slice: Slice, from: f64, to: f64) -> Prism {
        // The levels' own x means nothing: the sides of the section do.
        let along = slice.outer.snug_edge().filter(|_| slice.outer.circle.is_none()).unwrap_or(DVec2::X);
        let turn = DAffine2::from_mat2(DMat2::from_cols(along, along.perp()).transpose());
        let x = levels.x * along.x + levels.y * along.y;
        let frame = DMat3::from_cols(x, levels.axis.cross(x), levels.axis);
        let hollow = slice.voids.len() == 1 && slice.voids[0].area() > 0.5 * slice.outer.area();
        Prism {
            profile: Profile {
                class: self.class.to_owned(),
                name: None,
                kind: if hollow { Kind::Hollow } else { Kind::Outline },
                outer: slice.outer.mapped(turn, 1.0),
                voids: slice.voids.into_iter().map(|l| l.mapped(turn, 1.0)).collect(),
                up: DVec2::Y,
                several: 1,
                of_material: false,
                place: self.place.clone(),
            },
            frame: DAffine3::from_mat3_translation(frame, levels.axis * from),
            depth: to - from,
            cuts: Vec::new(),
            beyond: None,
        }
    }

    /// Round and hexagonal prisms on one axis: a bolt with head and nut in one body, a nut with a collar.
    fn turned(&self, levels: &Levels<'_>) -> Option<Vec<Prism>> {
        let stretches = levels.stretches()?;
        let slices: Vec<&Slice> = stretches.iter().filter_map(|s| s.slice.as_ref()).collect();
        let first = slices.first()?.outer.box_along(DVec2::X).centre;
        let small = |s: &&Slice| {
            let bounds = s.outer.box_along(DVec2::X);
            s.beside == 0 && bounds.size.max_element() <= TURNED && bounds.centre.distance(first) <= 1.0
        };
        let round = |s: &&Slice| s.outer.circle.is_some() || (s.outer.points.len() == 6 && s.outer.convex());
        if slices.len() < stretches.len() || !slices.iter().all(small) || !slices.iter().any(round) {
            return None;
        }
        let mut prisms: Vec<(f64, f64, Slice)> = Vec::new();
        for Stretch { from, to, slice } in stretches {
            let slice = slice?;
            match prisms.last_mut() {
                Some((_, end, last)) if last.same(&slice) => *end = to,
                _ => prisms.push((from, to, slice)),
            }
        }
        Some(prisms.into_iter().map(|(from, to, slice)| self.prism(levels, slice, from, to)).collect())
    }

    /// A small part that is round or hexagonal all along its length, with a thread, chamfers or fillets: rounds and
    /// hexagons of its widths, their lengths to a share of the whole.
    fn rounds(&self, levels: &Levels<'_>) -> Option<Vec<Prism>> {
        let (low, depth) = (levels.low(), levels.depth());
        let mut runs: Vec<(f64, f64, Slice)> = Vec::new();
        let mut middle = None;
        for i in 0..STEPS {
            let (from, to) = (i as f64 / STEPS as f64, (i + 1) as f64 / STEPS as f64);
            let slice = levels.slice(low + depth * (from + to) / 2.0)?;
            let bounds = slice.outer.box_along(DVec2::X);
            let (wide, centre) = (bounds.size.max_element(), bounds.centre);
            let fills = slice.outer.area() / (PI * wide * wide / 4.0);
            let on_axis = centre.distance(*middle.get_or_insert(centre)) <= 0.05 * wide;
            let round = (0.75..=1.08).contains(&fills) && bounds.size.min_element() >= 0.8 * wide;
            if !(slice.beside == 0 && wide <= TURNED && depth >= wide / 2.0 && round && on_axis) {
                return None;
            }
            let width = |s: &Slice| s.outer.box_along(DVec2::X).size.max_element();
            match runs.last_mut() {
                Some((_, end, last)) if (width(last) - wide).abs() <= 0.08 * wide => {
                    *end = to;
                    if width(last) < wide {
                        *last = slice;
                    }
                }
                _ => runs.push((from, to, slice)),
            }
        }
        let prism = |(from, to, mut slice): (f64, f64, Slice)| {
            let bounds = slice.outer.box_along(DVec2::X);
            let radius = bounds.size.max_element() / 2.0;
            if slice.outer.area() >= 0.9 * PI * radius * radius {
                slice.outer = Loop::circle(bounds.centre, radius);
            }
            self.prism(levels, slice, low + from * depth, low + to * depth)
        };
        Some(runs.into_iter().map(prism).collect())
    }

    /// A plate whose edges are bevelled or whose holes are countersunk: nearly one section through a small thickness.
    fn plate(&self, levels: &Levels<'_>) -> Option<Prism> {
        let [low, middle, high] = [0.03, 0.5, 0.97].map(|share| levels.slice(levels.low() + share * levels.depth()));
        let (low, middle, high) = (low?, middle?, high?);
        let bounds = middle.outer.least_box(DVec2::X).size;
        let alike = |s: &Slice| (s.area() - middle.area()).abs() <= 0.15 * middle.area() && s.beside == 0;
        if !(levels.depth() <= FLAT * bounds.min_element() && middle.beside == 0 && alike(&low) && alike(&high)) {
            return None;
        }
        let mut prism = self.prism(levels, middle, levels.low(), levels.high());
        prism.cuts.push(Cut::Trim(
            "its faces differ (bevelled edges, countersunk or blind holes): taken at mid-thickness".into(),
        ));
        Some(prism)
    }

    /// A prism that is cut at its ends or has holes: one section over most of its length.
    fn member(&self, levels: &Levels<'_>) -> Option<Prism> {
        let stretches = levels.stretches()?;
        let longest = stretches.iter().max_by(|a, b| (a.to - a.from).total_cmp(&(b.to - b.from)))?;
        let main = longest.slice.clone().filter(|s| s.beside == 0)?;
        let ends = [0.05, 0.95].map(|share| levels.slice(longest.from + share * (longest.to - longest.from)));
        if !ends.iter().all(|end| end.as_ref().is_some_and(|end| end.same(&main))) {
            return None;
        }
        let same = |s: &&Stretch| s.slice.as_ref().is_some_and(|slice| slice.same(&main));
        let constant: f64 = stretches.iter().filter(same).map(|s| s.to - s.from).sum();
        if !(constant >= CONSTANT * levels.depth()
            && levels.depth() >= main.outer.box_along(DVec2::X).size.max_element())
        {
            return None;
        }
        let first = stretches.iter().find(same).map_or(levels.low(), |s| s.from);
        let last = stretches.iter().rev().find(same).map_or(levels.high(), |s| s.to);
        let mut prism = self.prism(levels, main.clone(), levels.low(), levels.high());
        for (length, end) in [(first - levels.low(), "one end"), (levels.high() - last, "the other end")] {
            if length > LEVEL {
                prism.cuts.push(Cut::Trim(format!(
                    "its section is cut over {length:.1} mm at {end} (a mitre, cope or notch) that is not taken into account"
                )));
            }
        }
        let mut open: Option<f64> = None;
        for stretch in stretches.iter().filter(|s| s.from >= first && s.to <= last) {
            if same(&stretch) {
                let length = open.take().map_or(0.0, |from| stretch.from - from);
                if length > BOLT_HOLE {
                    prism.cuts.push(Cut::Trim(format!(
                        "its section changes over {length:.1} mm between its ends (an opening or a slot) that is not taken into account"
                    )));
                }
            } else {
                open = open.or(Some(stretch.from));
            }
        }
        Some(prism)
    }

    /// Something long that is no straight prism of one section; an error if it is not even long.
    fn stand_in(&self, mesh: &Mesh, faces: &[DVec3]) -> Solid {
        // A tapered part ends in two parallel faces; the larger one stands for it.
        let all = faces.iter().take(12).map(|axis| Levels::of(mesh, *axis)).filter(|levels| levels.at.len() == 2);
        let along = all.max_by(|a, b| a.depth().total_cmp(&b.depth()));
        if let Some(mut tapered) = along.and_then(|levels| self.tapered(&levels)) {
            let size = tapered.profile.outer.least_box(DVec2::X).size;
            if tapered.depth >= LONG * size.max_element() {
                tapered.profile.kind = Kind::Outline;
                return Ok(tapered);
            }
        }
        let first = mesh.points.first().copied().unwrap_or_default();
        let far = |from: DVec3| {
            let distance = |p: &&DVec3| p.distance_squared(from);
            mesh.points.iter().max_by(|a, b| distance(a).total_cmp(&distance(b))).copied().unwrap_or_default()
        };
        let one = far(first);
        let levels = Levels::of(mesh, (far(one) - one).normalize_or_zero());
        let flat = |p: &DVec3| DVec2::new(p.dot(levels.x), p.dot(levels.y));
        let (mut low, mut high) = (DVec2::INFINITY, DVec2::NEG_INFINITY);
        for p in mesh.points.iter().map(flat) {
            low = low.min(p);
            high = high.max(p);
        }
        let size = high - low;
        if !(levels.depth() >= LONG * size.max_element() && size.min_element() > 0.0) {
            return Err(format!("its body is neither a prism nor long ({} of {} faces)", self.class, mesh.faces.len()));
        }
        let corners = vec![low, DVec2::new(high.x, low.y), high, DVec2::new(low.x, high.y)];
        let slice = Slice { outer: Loop::new(corners)?, voids: Vec::new(), beside: 0 };
        let mut prism = self.prism(&levels, slice, levels.low(), levels.high());
        prism.profile.kind = Kind::Boxed;
        prism.beyond = Some("no straight prism of one section by its faces (curved or built up)".into());
        Ok(prism)
    }

    /// Two sections at the ends that are not one: the larger one over the whole length.
    fn tapered(&self, levels: &Levels<'_>) -> Option<Prism> {
        let [one, other] = [0.01, 0.99].map(|share| levels.slice(levels.low() + share * levels.depth()));
        let (one, other) = (one?, other?);
        let [a, b] = [&one, &other].map(|slice| slice.outer.box_along(DVec2::X).size);
        let why = if (a - b).abs().max_element() <= 2.0 * LEVEL {
            "cut at a slant to its length all along, or twisted".to_owned()
        } else {
            format!("tapered: {:.0} x {:.0} mm near one end, {:.0} x {:.0} mm near the other", a.x, a.y, b.x, b.y)
        };
        let larger = if other.outer.area() > one.outer.area() { other } else { one };
        let mut prism = self.prism(levels, larger, levels.low(), levels.high());
        prism.beyond = Some(why);
        Some(prism)
    }
}
