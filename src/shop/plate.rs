//! Plates: two large parallel faces, whatever the exchange calls them.

use glam::{DVec2, DVec3};

use super::member::untaken;
use super::outline::Loop;
use super::profile::Kind;
use super::reading::Reading;
use super::solid::{Cut, Prism, Solid};
use super::{Hole, Plate};
use crate::exchange::Entity;
use crate::units::mm;

/// A plate's thickness is at most this share of its width.
const FLAT: f64 = 0.5;
/// A thicker one is no steel plate but a slab, a pad or a wall, mm.
const THICKEST: f64 = 150.0;
/// An outline that fills its box to this share is a flat bar, bevelled edges included.
const FILLED: f64 = 0.9;
/// Sizes in a name are whole mm.
const NAMED: f64 = 1.0;

/// A flat body before holes and grade.
pub(super) struct Flat {
    centre: DVec3,
    u: DVec3,
    v: DVec3,
    outline: Loop,
    holes: Vec<Loop>,
    pub thickness: f64,
}

/// The prism as a plate, if it is one: the thickness may be the sweep or either side of the profile. Of hollow ones
/// only what is no longer than its wall is thick: a ring, and no piece of pipe.
pub(super) fn flat(prism: &Prism) -> Option<Flat> {
    let ring = prism.profile.kind == Kind::Hollow && prism.depth <= prism.profile.wall();
    if (prism.profile.kind != Kind::Outline && !ring) || prism.beyond.is_some() {
        return None;
    }
    let outer = &prism.profile.outer;
    let bounds = outer.least_box(-prism.profile.up.perp());
    let (narrow, wide) = (bounds.size.min_element(), bounds.size.max_element());
    let bar = outer.convex() && prism.profile.voids.is_empty() && outer.area() >= FILLED * narrow * wide;
    if prism.depth <= FLAT * narrow {
        // The profile is the face.
        let local = |l: &Loop| Loop {
            points: l.points.iter().map(|p| turn(*p - bounds.centre, bounds.x)).collect(),
            circle: l.circle.map(|(c, r)| (turn(c - bounds.centre, bounds.x), r)),
        };
        return Some(Flat {
            centre: prism.at(bounds.centre, prism.depth / 2.0),
            u: prism.turned(bounds.x),
            v: prism.turned(bounds.x.perp()),
            outline: local(outer),
            holes: prism.profile.voids.iter().map(local).collect(),
            thickness: prism.depth,
        });
    }
    // The profile is the bar's cross-section; its width may be more or less than its length.
    if bar && narrow <= FLAT * wide.min(prism.depth) {
        let across = if bounds.size.x >= bounds.size.y { bounds.x } else { bounds.x.perp() };
        return Some(Flat {
            centre: prism.at(bounds.centre, prism.depth / 2.0),
            u: prism.turned(across),
            v: prism.axis(),
            outline: Loop::rectangle(wide, prism.depth),
            holes: Vec::new(),
            thickness: narrow,
        });
    }
    None
}

/// Coordinates of a vector in the axes x and its perpendicular.
fn turn(p: DVec2, x: DVec2) -> DVec2 {
    DVec2::new(p.dot(x), p.dot(x.perp()))
}

impl Flat {
    fn normal(&self) -> DVec3 {
        self.u.cross(self.v)
    }

    fn local(&self, point: DVec3) -> DVec3 {
        let p = point - self.centre;
        DVec3::new(p.dot(self.u), p.dot(self.v), p.dot(self.normal()))
    }

    /// Clips the outline by a plane at right angles to the faces; says why where it can't.
    fn clip(&mut self, at: DVec3, keep: DVec3, straight: f64) -> Option<String> {
        if keep.dot(self.normal()).abs() > straight {
            return Some(untaken("a half-space at a slant to its faces"));
        }
        let keep = DVec2::new(keep.dot(self.u), keep.dot(self.v));
        match self.outline.clipped(self.local(at).truncate(), keep) {
            Some(outline) => {
                self.outline = outline;
                None
            }
            None => Some("its cuts leave nothing of it: they are not taken into account".into()),
        }
    }

    /// Takes an extrusion through the plate as a hole; says why where it is none.
    fn pierce(&mut self, cutter: &Prism, straight: f64, touch: f64) -> Option<String> {
        let axis = cutter.axis().dot(self.normal());
        if !(axis.abs() >= (1.0 - straight * straight).sqrt()) {
            return Some(untaken("an extrusion along its faces"));
        }
        let hole: Vec<DVec3> = cutter.profile.outer.points.iter().map(|p| self.local(cutter.at(*p, 0.0))).collect();
        let level = hole.iter().map(|p| p.z).sum::<f64>() / hole.len().max(1) as f64;
        let (low, high) = if axis > 0.0 { (level, level + cutter.depth) } else { (level - cutter.depth, level) };
        let half = self.thickness / 2.0;
        let inside = hole.iter().filter(|p| self.outline.holds(p.truncate())).count();
        if !(low < half && high > -half) || inside == 0 {
            return Some("an opening said to be in it lies beside it".into());
        }
        if !(low <= touch - half && high >= half - touch) {
            return Some(untaken("an extrusion that does not pass through it"));
        }
        if inside < hole.len() {
            return Some(untaken("an extrusion across its edge"));
        }
        let centre = |c: DVec2| self.local(cutter.at(c, 0.0)).truncate();
        let circle = cutter.profile.outer.circle.map(|(c, r)| (centre(c), r));
        self.holes.push(Loop { points: hole.iter().map(|p| p.truncate()).collect(), circle });
        None
    }

    /// Moves the centre to the middle of the outline's bounding box, after cuts.
    fn recentre(&mut self) {
        let shift = self.outline.box_along(DVec2::X).centre;
        self.centre += shift.x * self.u + shift.y * self.v;
        for l in std::iter::once(&mut self.outline).chain(&mut self.holes) {
            l.points.iter_mut().for_each(|p| *p -= shift);
            if let Some((centre, _)) = &mut l.circle {
                *centre -= shift;
            }
        }
    }
}

impl<'a> Reading<'a> {
    /// What openings and other subtractions take off an element.
    pub fn openings(&self, element: Entity<'a>) -> Vec<Solid> {
        self.voids_of(element)
            .into_iter()
            .flat_map(|opening| self.body(opening).unwrap_or_else(|reason| vec![Err(reason)]))
            .collect()
    }

    /// The plate that a flat body is.
    pub fn plate(&self, element: Entity<'a>, prism: &Prism, mut flat: Flat) -> Plate {
        let tolerances = &self.rulebook.tolerances;
        let (straight, touch) = (tolerances.angle.to_radians().sin(), tolerances.touch.get());
        let mut notes = Vec::new();
        for cut in &prism.cuts {
            notes.extend(match cut {
                Cut::Plane { at, keep, bounds: None } => flat.clip(*at, *keep, straight),
                Cut::Plane { bounds: Some(_), .. } => Some(untaken("a bounded half-space")),
                Cut::Prism(cutter) => flat.pierce(cutter, straight, touch),
                Cut::Other(class) => Some(untaken(class)),
                Cut::Trim(sentence) => Some(sentence.clone()),
            });
        }
        for opening in self.openings(element) {
            notes.extend(match opening {
                Ok(cutter) => flat.pierce(&cutter, straight, touch),
                Err(reason) => Some(format!("an opening in it can't be read: {reason}")),
            });
        }
        flat.recentre();
        let size = flat.outline.box_along(DVec2::X).size;
        notes.extend(self.named_otherwise(element, [flat.thickness, size.x, size.y]));
        notes.extend(self.called_a_section(element));
        let mut holes: Vec<Hole> = Vec::new();
        for hole in flat.holes.iter().map(hole) {
            let same = |other: &Hole| other.centre.distance(hole.centre) <= tolerances.position.get();
            if !holes.iter().any(same) {
                holes.push(hole);
            }
        }
        Plate {
            identity: self.identity(element),
            centre: flat.centre,
            u: flat.u,
            v: flat.v,
            normal: flat.normal(),
            thickness: mm(flat.thickness),
            outline: flat.outline.points,
            holes,
            grade: self.grade(element),
            disagreements: notes,
        }
    }

    /// The sizes that a plate's name states: `PL15*200`, `FL 10x80`, `80*180`; nothing if it holds anything else.
    fn sizes_in(&self, text: &str) -> Option<Vec<f64>> {
        let text = text.trim();
        let prefix = text.split(|c: char| !c.is_alphabetic()).next().unwrap_or_default();
        if !(prefix.is_empty() || self.means("plate", prefix)) {
            return None;
        }
        let numbers: Option<Vec<f64>> =
            text[prefix.len()..].split(['*', 'X', 'x', '×']).map(|n| n.trim().replace(',', ".").parse().ok()).collect();
        numbers.filter(|n| n.len() >= 2 && n.iter().all(|n: &f64| *n > 0.0))
    }

    /// A sentence where a plate is named by a section.
    fn called_a_section(&self, element: Entity<'a>) -> Option<String> {
        self.names_of(element).iter().find_map(|(by, text)| {
            let section = self.text(text).section()?;
            // A longer name may say what the plate belongs to.
            let alone = text.trim().chars().count() <= section.designation.chars().count() + 2;
            alone.then(|| {
                format!("{by} \"{text}\" is the section {} but it has the shape of a plate", section.designation)
            })
        })
    }

    /// A sentence where a name like `PL15*200` states a size that the plate does not have.
    fn named_otherwise(&self, element: Entity<'a>, sizes: [f64; 3]) -> Option<String> {
        self.names_of(element).iter().find_map(|(by, text)| {
            let named = self.sizes_in(text)?;
            let has = |wanted: &f64| sizes.iter().any(|size| (size - wanted).abs() <= NAMED);
            // The thickness must be among them; a further number may be the length before cutting.
            let thickness = named.iter().copied().fold(f64::INFINITY, f64::min);
            let thick = (thickness - sizes[0]).abs() <= NAMED;
            (!thick || !named.iter().take(2).all(has)).then(|| {
                format!("{by} \"{text}\" but modelled {:.1} thick, {:.1} x {:.1}", sizes[0], sizes[1], sizes[2])
            })
        })
    }
}

/// Whether a flat body is too thick for a plate of steel; says so.
pub(super) fn too_thick(flat: &Flat) -> Option<String> {
    (!(flat.thickness <= THICKEST)).then(|| {
        format!("it is flat but {:.0} mm thick: no steel plate is thicker than {THICKEST:.0} mm", flat.thickness)
    })
}

fn hole(l: &Loop) -> Hole {
    match l.circle {
        Some((centre, radius)) => Hole { centre, diameter: 2.0 * radius, length: 2.0 * radius },
        None => {
            let bounds = l.least_box(DVec2::X);
            Hole { centre: bounds.centre, diameter: bounds.size.min_element(), length: bounds.size.max_element() }
        }
    }
}
