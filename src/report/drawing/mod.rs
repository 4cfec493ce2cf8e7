//! Drawings of joints as SVG, from the plain geometry in the [`Review`](crate::review::Review).
//!
//! Elevation on the left, the end plate seen from the beam on the right, both at one scale and level with each other.

mod canvas;
mod dimension;
mod elevation;
mod face;

use maud::Markup;

use crate::review::sketch::Sketch;
use crate::review::{CheckResult, JointReview};
use canvas::Canvas;
pub use canvas::STYLE;
pub(super) use dimension::figure;

use super::group;

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

/// The dimensioned sketch of a joint with its row forces and what governs; `id` makes the drawing's ids unique on a page.
///
/// `None` where the joint has no geometry, or none that can be drawn.
pub fn sketch(joint: &JointReview, id: &str) -> Option<Markup> {
    let sketch = joint.sketch.as_deref()?;
    let (column, beam, plate) = (&sketch.column, &sketch.beam, &sketch.plate);
    let rows = || sketch.rows.iter().map(|row| row.height_mm);
    let highest = rows().fold(beam.depth_mm.max(plate.top_mm), f64::max);
    let lowest = rows().fold(plate.bottom_mm.min(0.0), f64::min);
    let past = 0.22 * (highest - lowest);
    let stub = 0.8 * beam.depth_mm;
    let wide = column.depth_mm + plate.thickness_mm + stub + column.width_mm.max(plate.width_mm).max(beam.width_mm);
    let (bottom, top) = (lowest - past, highest + past);
    let scale = ((PAPER - LEFT - BETWEEN - RIGHT) / wide).min(HIGHEST / (top - bottom));
    let sizes = [column.depth_mm, column.width_mm, beam.depth_mm, beam.width_mm, plate.width_mm, plate.thickness_mm];
    if !(scale > 0.0 && scale.is_finite() && sizes.iter().all(|size| *size > 0.0) && rows().all(f64::is_finite)) {
        return None;
    }
    let governing = group::governing(joint);
    let scene = Scene {
        sketch,
        joint,
        scale,
        bottom: sketch.column_bottom_mm.map_or(bottom, |end| end.max(bottom)),
        top,
        stub,
        governs: joint.checks.iter().find(|check| Some(&check.title) == governing),
    };
    let scene =
        Scene { top: sketch.column_top_mm.filter(|end| *end > highest).map_or(top, |end| end.min(top)), ..scene };
    let mut canvas = Canvas::default();
    let face = LEFT + (column.depth_mm + plate.thickness_mm + stub) * scale + BETWEEN;
    elevation::draw(&mut canvas, &scene, LEFT + column.depth_mm * scale);
    face::draw(&mut canvas, &scene, face);
    let height = scene.y(scene.bottom) + BELOW;
    let title = format!("Sketch of joint {}", joint.mark);
    Some(canvas.finish((PAPER, height), id, &title, &described(&scene)))
}

/// The drawing in words.
fn described(scene: &Scene<'_>) -> String {
    let sketch = scene.sketch;
    let rows: Vec<String> = sketch.rows.iter().map(|row| dimension::figure(row.height_mm)).collect();
    let mut said = vec![
        format!("Elevation and view from the beam of the end plate. Column {}", sketch.column.label),
        format!("beam {}", sketch.beam.label),
        format!(
            "end plate {}, {} mm wide, from {} to {} mm above the soffit of the beam's lower flange",
            sketch.plate.label,
            dimension::figure(sketch.plate.width_mm),
            dimension::figure(sketch.plate.bottom_mm),
            dimension::figure(sketch.plate.top_mm)
        ),
        format!("{} rows of two bolts {} at {} mm", rows.len(), sketch.bolts, rows.join(", ")),
        format!("{} stiffeners of the column", sketch.stiffeners.len()),
    ];
    let force = |row: &crate::review::RowResult| format!("row {} {:.0} kN", row.row, row.force_kn);
    if scene.joint.rows.iter().any(|row| row.force_kn.is_finite()) {
        let forces: Vec<String> = scene.joint.rows.iter().filter(|row| row.force_kn.is_finite()).map(force).collect();
        said.push(format!("row forces {}", forces.join(", ")));
    }
    said.extend(group::governing(scene.joint).map(|what| format!("governed by {what}")));
    said.join("; ") + "."
}
