//! The end plate seen from the beam: plate, column flange behind, beam cut, bolts; gauge, edges, pitches, heights.

use super::Scene;
use super::canvas::{Anchor, Canvas, Ink};
use super::dimension::{self, figure};
use crate::review::sketch::Against;

/// Draws it from paper `left` on.
pub(super) fn draw(canvas: &mut Canvas, scene: &Scene<'_>, left: f64) {
    let (sketch, scale) = (scene.sketch, scene.scale);
    let (beam, plate) = (&sketch.end.beam, &sketch.end.plate);
    let (other, name, low, high) = match &sketch.against {
        Against::Column(part) => (part.column.width_mm, "column flange", scene.bottom, scene.top),
        Against::Beam(end) => (end.plate.width_mm, "other plate", end.plate.bottom_mm, end.plate.top_mm),
    };
    let half = other.max(plate.width_mm).max(beam.width_mm) / 2.0;
    let at = |across: f64, height: f64| (left + (half + across) * scale, scene.y(height));
    canvas.text("title", Anchor::Start, (left, 4.0), "View from the beam");
    canvas.text("", Anchor::Start, (left, 9.5), &format!("{}; {}", plate.label, sketch.bolts));

    for side in [-0.5, 0.5] {
        canvas.line(Ink::Hidden, at(side * other, low), at(side * other, high));
    }
    canvas.rect(Ink::Plate, at(-plate.width_mm / 2.0, plate.bottom_mm), at(plate.width_mm / 2.0, plate.top_mm));
    let (b, h) = (beam.width_mm / 2.0, beam.depth_mm);
    match beam.web_mm.zip(beam.flange_mm) {
        Some((t_w, t_f)) => {
            let w = t_w / 2.0;
            let right = [(b, 0.0), (b, t_f), (w, t_f), (w, h - t_f), (b, h - t_f), (b, h)];
            let outline = right.iter().copied().chain(right.iter().rev().map(|(x, y)| (-x, *y)));
            canvas.polygon(Ink::Cut, &outline.map(|(x, y)| at(x, y)).collect::<Vec<_>>());
        }
        None => canvas.rect(Ink::Edge, at(-b, 0.0), at(b, h)),
    }
    for row in &sketch.rows {
        let radius = sketch.bolt_mm.map_or(1.0, |d| d / 2.0 * scale);
        for side in [-0.5, 0.5] {
            let (x, y) = at(side * row.gauge_mm, row.height_mm);
            canvas.circle(if sketch.bolt_mm.is_some() { Ink::Bolt } else { Ink::Hidden }, (x, y), radius);
            canvas.line(Ink::Thin, (x - 1.5 * radius, y), (x + 1.5 * radius, y));
            canvas.line(Ink::Thin, (x, y - 1.5 * radius), (x, y + 1.5 * radius));
        }
    }

    // Below: edges and gauge of the first row, the plate's width, the flange's width.
    let below = scene.y(scene.bottom);
    let across = |points: &[f64]| points.iter().map(|x| (at(*x, 0.0).0, *x)).collect::<Vec<_>>();
    let (b_p, b_c) = (plate.width_mm / 2.0, other / 2.0);
    if let Some(row) = sketch.rows.first() {
        let w = row.gauge_mm / 2.0;
        dimension::level(canvas, below + 6.0, &across(&[-b_p, -w, w, b_p]));
        for x in [-w, w] {
            let lowest = sketch.rows.last().map_or(0.0, |row| row.height_mm);
            canvas.line(Ink::Thin, at(x, lowest), (at(x, 0.0).0, below + 7.0));
        }
    }
    dimension::level(canvas, below + 11.0, &across(&[-b_p, b_p]));
    dimension::level(canvas, below + 16.0, &across(&[-b_c, b_c]));
    for x in [-b_p, b_p] {
        canvas.line(Ink::Thin, at(x, plate.bottom_mm), (at(x, 0.0).0, below + 12.0));
    }
    for (y, what) in [(6.0, "gauge"), (11.0, "plate"), (16.0, name)] {
        canvas.text("", Anchor::Start, (at(half, 0.0).0 + 2.0, below + y), what);
    }

    // Beside: pitches and edges, then heights from the soffit.
    let mut heights = vec![plate.top_mm, plate.bottom_mm];
    heights.extend(sketch.rows.iter().map(|row| row.height_mm));
    heights.sort_by(|a, b| b.total_cmp(a));
    let (chain, running) = (at(half, 0.0).0 + 7.0, at(half, 0.0).0 + 14.5);
    let first = sketch.rows.first().map_or(b_p, |row| row.gauge_mm / 2.0);
    for height in &heights {
        let from = if [plate.top_mm, plate.bottom_mm].contains(height) { b_p } else { first };
        canvas.line(Ink::Thin, at(from, *height), (running, scene.y(*height)));
    }
    dimension::upright(canvas, chain, &heights.iter().map(|y| (scene.y(*y), *y)).collect::<Vec<_>>());
    for height in [0.0, h] {
        canvas.line(Ink::Thin, at(b, height), (running, scene.y(height)));
    }
    let named = |height: f64| match height {
        0.0 => "0 soffit".to_owned(),
        other if other == h => format!("{} top", dimension::height(h)),
        other => dimension::height(other),
    };
    let mut labels: Vec<f64> = heights.into_iter().chain([0.0, h]).collect();
    labels.sort_by(f64::total_cmp);
    labels.dedup_by(|a, b| figure(*a) == figure(*b));
    let labels: Vec<(f64, String)> = labels.into_iter().map(|y| (scene.y(y), named(y))).collect();
    dimension::listed(canvas, running, false, &labels);
}
