//! Drawings of joints as SVG, from the plain geometry in the [`Review`](crate::review::Review).
//!
//! Elevation on the left, the end plate seen from the beam on the right, both at one scale and level with each other.

mod canvas;
mod dimension;
mod elevation;
mod face;

use maud::Markup;

use crate::review::sketch::{Against, BeamEnd, Profile, Sketch};
use crate::review::{CheckResult, JointReview};
use canvas::Canvas;
pub use canvas::STYLE;
pub(super) use dimension::figure;

use super::group;
use super::page::clean;

/// Width of the paper, mm: A4 less its margins.
const PAPER: f64 = 180.0;

/// The most that the joint itself may be high on paper, mm.
const HIGHEST: f64 = 125.0;

/// Room above the joint for titles, below for dimensions, mm.
const ABOVE: f64 = 13.0;
const BELOW: f64 = 22.0;

/// Room left of the elevation for the stiffeners' heights, between the views, and right of the face for dimensions, mm.
const LEFT: f64 = 20.0;
const BETWEEN: f64 = 8.0;
const RIGHT: f64 = 34.0;

/// What is drawn into a view: the sketch, its forces, what governs, and the scale.
struct Scene<'a> {
    sketch: &'a Sketch,
    joint: &'a JointReview,
    /// mm of paper a mm of steel.
    scale: f64,
    /// Heights between which the column is drawn, mm of steel.
    bottom: f64,
    top: f64,
    /// How much of the beam is drawn, mm of steel.
    stub: f64,
    /// The check that governs.
    governs: Option<&'a CheckResult>,
}

impl Scene<'_> {
    /// Paper y of a height.
    fn y(&self, height: f64) -> f64 {
        ABOVE + (self.top - height) * self.scale
    }

    /// Whether what governs belongs to this part of the joint.
    fn governs(&self, parts: &[&str]) -> bool {
        self.governs.is_some_and(|check| parts.iter().any(|part| check.id.starts_with(part)))
    }
}

/// How much of a beam is drawn, in its depths.
const STUB: f64 = 0.8;

/// How far the left part reaches from the contact face, mm of steel.
fn reach(against: &Against) -> f64 {
    match against {
        Against::Column(part) => part.column.depth_mm,
        Against::Beam(end) => end.plate.thickness_mm + STUB * end.beam.depth_mm,
    }
}

/// What is behind the end plate: its width.
fn behind(against: &Against) -> f64 {
    match against {
        Against::Column(part) => part.column.width_mm,
        Against::Beam(end) => end.plate.width_mm,
    }
}

/// The dimensioned sketch of a joint with its row forces and what governs; `id` makes the drawing's ids unique on a page.
///
/// `None` where the joint has no geometry, or none that can be drawn.
pub fn sketch(joint: &JointReview, id: &str) -> Option<Markup> {
    let sketch = joint.sketch.as_deref()?;
    let (beam, plate) = (&sketch.end.beam, &sketch.end.plate);
    let other: Option<&BeamEnd> = match &sketch.against {
        Against::Column(_) => None,
        Against::Beam(end) => Some(end),
    };
    let ends = || std::iter::once(&sketch.end).chain(other);
    let upper = ends().flat_map(|end| [end.soffit_mm + end.beam.depth_mm, end.plate.top_mm]);
    let lower = ends().flat_map(|end| [end.soffit_mm, end.plate.bottom_mm]);
    let rows = || sketch.rows.iter().map(|row| row.height_mm);
    let (highest, lowest) = (upper.chain(rows()).fold(0.0, f64::max), lower.chain(rows()).fold(0.0, f64::min));
    let past = 0.22 * (highest - lowest);
    let (mut bottom, mut top) = (lowest - past, highest + past);
    let (left, stub) = (reach(&sketch.against), STUB * beam.depth_mm);
    let wide = left + plate.thickness_mm + stub + behind(&sketch.against).max(plate.width_mm).max(beam.width_mm);
    let scale = ((PAPER - LEFT - BETWEEN - RIGHT) / wide).min(HIGHEST / (top - bottom));
    let of_profile = |profile: &Profile| [profile.depth_mm, profile.width_mm];
    let of_end = |end: &BeamEnd| [end.plate.width_mm, end.plate.thickness_mm].into_iter().chain(of_profile(&end.beam));
    let sizes = ends().flat_map(of_end).chain([left]).all(|size| size > 0.0 && size.is_finite());
    if !(scale > 0.0 && scale.is_finite() && sizes && rows().all(f64::is_finite)) {
        return None;
    }
    if let Against::Column(part) = &sketch.against {
        bottom = part.bottom_mm.filter(|end| *end < lowest).map_or(bottom, |end| end.max(bottom));
        top = part.top_mm.filter(|end| *end > highest).map_or(top, |end| end.min(top));
    }
    let governing = group::governing(joint);
    let governs = joint.checks.iter().find(|check| Some(&check.title) == governing);
    let scene = Scene { sketch, joint, scale, bottom, top, stub, governs };
    let mut canvas = Canvas::default();
    elevation::draw(&mut canvas, &scene, LEFT + left * scale);
    face::draw(&mut canvas, &scene, LEFT + (left + plate.thickness_mm + stub) * scale + BETWEEN);
    let height = scene.y(scene.bottom) + BELOW;
    let title = format!("Sketch of joint {}", clean(&joint.mark));
    Some(canvas.finish((PAPER, height), id, &title, &clean(&described(&scene))))
}

/// The drawing in words.
fn described(scene: &Scene<'_>) -> String {
    let sketch = scene.sketch;
    let rows: Vec<String> = sketch.rows.iter().map(|row| figure(row.height_mm)).collect();
    let end = |end: &BeamEnd| {
        let sizes = [end.plate.width_mm, end.plate.bottom_mm, end.plate.top_mm].map(figure);
        format!(
            "beam {}; end plate {}, {} mm wide, from {} to {} mm above the soffit of the beam's lower flange",
            end.beam.label, end.plate.label, sizes[0], sizes[1], sizes[2]
        )
    };
    let other = match &sketch.against {
        Against::Column(part) => {
            let counts = [
                (part.stiffeners.len(), "stiffeners"),
                (part.web_plates.len(), "web plates"),
                (part.diagonals.len(), "diagonals"),
                (part.backing.len(), "backing plates"),
            ];
            let with: Vec<String> = counts.map(|(count, what)| format!("{count} {what}")).into();
            format!("column {} with {}", part.column.label, with.join(", "))
        }
        Against::Beam(other) => format!("against it {}", end(other)),
    };
    let mut said = vec![
        format!("Elevation and view from the beam of the end plate. {}", end(&sketch.end)),
        other,
        format!("{} rows of two bolts {} at {} mm", rows.len(), sketch.bolts, rows.join(", ")),
    ];
    let force = |row: &crate::review::RowResult| format!("row {} {:.0} kN", row.row, row.force_kn);
    if scene.joint.rows.iter().any(|row| row.force_kn.is_finite()) {
        let forces: Vec<String> = scene.joint.rows.iter().filter(|row| row.force_kn.is_finite()).map(force).collect();
        said.push(format!("row forces {}", forces.join(", ")));
    }
    said.extend(group::governing(scene.joint).map(|what| format!("governed by {what}")));
    said.join("; ") + "."
}
