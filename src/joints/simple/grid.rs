//! A regular pattern of bolts: rows and lines, each row with a bolt on every line.

use glam::DVec3;

use crate::joints::bolts::{Placed, all_alike, hole};
use crate::joints::draft::Draft;
use crate::joints::scene::Scene;
use crate::origin::Known;
use crate::shop::Bolt;
use crate::units::{Length, mm};

/// Bolts on a grid, all alike.
#[derive(Clone, Debug)]
pub struct Grid {
    /// d.
    pub diameter: Known<Length>,
    /// Strength class.
    pub class: Known<String>,
    /// d_0, as [`crate::joints::Bolts::hole`].
    pub hole: Known<Length>,
    /// The shank without thread: the shortest of the bolts' lengths less their threads; `None` unless all state both.
    pub shank: Option<Length>,
    /// Heights of the rows from the top down.
    pub rows: Vec<Length>,
    /// Distances of the lines, ascending.
    pub lines: Vec<Length>,
}

/// Directions in which a grid is measured, from a point.
pub(super) struct Axes {
    pub(super) origin: DVec3,
    /// Towards larger distances of lines.
    pub(super) along: DVec3,
    /// Upwards.
    pub(super) up: DVec3,
}

/// The joint's bolts on a grid; their holes are looked for in `plate`.
///
/// # Errors
/// One sentence where they lie on none.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft, plate: usize, axes: &Axes) -> Result<Grid, String> {
    let tolerances = scene.tolerances();
    let (position, size, angle) = (tolerances.position.get(), tolerances.size, tolerances.angle);
    let body = &scene.steel.plates[plate];
    let mut placed = Vec::new();
    for index in &draft.joint.bolts {
        let bolt = &scene.steel.bolts[*index];
        if bolt.anchor {
            return Err("among its bolts are anchors: not assessed".into());
        }
        let axis = (bolt.end - bolt.start).normalize_or_zero();
        let lean = axis.dot(body.normal).abs().min(1.0).acos().to_degrees();
        if !(lean <= angle) {
            return Err(format!("a bolt leans {lean:.1}° from the plate's normal: not assessed yet"));
        }
        let point = bolt.start + axis * (body.centre - bolt.start).dot(body.normal) / axis.dot(body.normal);
        let from = point - axes.origin;
        placed.push(Placed { bolt: *index, point, across: from.dot(axes.along), height: from.dot(axes.up) });
    }
    let mut rows = clustered(placed.iter().map(|bolt| bolt.height).collect(), position);
    let lines = clustered(placed.iter().map(|bolt| bolt.across).collect(), position);
    rows.reverse();
    let near = |own: f64, of: &[f64]| of.iter().position(|other| (own - other).abs() <= position);
    let mut taken = vec![0_usize; rows.len() * lines.len()];
    for bolt in &placed {
        let (row, line) = (near(bolt.height, &rows), near(bolt.across, &lines));
        let cell = row.zip(line).and_then(|(row, line)| taken.get_mut(row * lines.len() + line));
        *cell.ok_or("its bolts lie on no regular grid: not assessed yet")? += 1;
    }
    if taken.is_empty() || taken.iter().any(|count| *count != 1) {
        return Err("its bolts lie on no regular grid, one at every crossing of row and line: not assessed yet".into());
    }
    let bodies: Vec<&Bolt> = placed.iter().map(|bolt| &scene.steel.bolts[bolt.bolt]).collect();
    let diameter = all_alike(
        "bolt diameter",
        bodies.iter().map(|bolt| &bolt.diameter),
        |a, b| (*a - *b).abs() <= size,
        |d| format!("{} mm", d.get()),
    );
    let class = all_alike("bolt class", bodies.iter().map(|bolt| &bolt.class), |a, b| a == b, Clone::clone);
    let hole = hole(scene, draft, &[plate], &placed, &diameter)?;
    let shanks = bodies.iter().map(|bolt| Some(bolt.length.as_ref().ok()?.value - bolt.thread?));
    let shank = shanks.collect::<Option<Vec<Length>>>().and_then(|all| all.into_iter().reduce(Length::min));
    let lengths = |all: Vec<f64>| all.into_iter().map(mm).collect();
    Ok(Grid { diameter, class, hole, shank, rows: lengths(rows), lines: lengths(lines) })
}

/// Values that follow each other within a tolerance of the first as one, their mean; ascending.
fn clustered(mut values: Vec<f64>, within: f64) -> Vec<f64> {
    values.sort_by(f64::total_cmp);
    let mut groups: Vec<Vec<f64>> = Vec::new();
    for value in values {
        match groups.last_mut() {
            Some(group) if group.first().is_some_and(|first| value - first <= within) => group.push(value),
            _ => groups.push(vec![value]),
        }
    }
    groups.iter().map(|group| group.iter().sum::<f64>() / group.len() as f64).collect()
}
