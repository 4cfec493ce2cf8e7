//! Dimension lines, figures in mm.

use super::canvas::{Anchor, Canvas, Ink};
use crate::report::number;

/// Figures that stand closer than this would run into each other, mm of paper.
const APART: f64 = 3.1;

/// A length as it is written on a drawing: to a tenth, without a useless zero; a dash for what is no number.
pub(in crate::report) fn figure(mm: f64) -> String {
    if !mm.is_finite() {
        return "-".into();
    }
    let tenth = number::one_decimal(mm);
    tenth.strip_suffix(".0").unwrap_or(&tenth).to_owned()
}

/// A height from the soffit: "+502", "−20".
pub(super) fn height(mm: f64) -> String {
    let shown = figure(mm.abs());
    match shown.as_str() {
        "0" => shown,
        _ if mm < 0.0 => format!("−{shown}"),
        _ => format!("+{shown}"),
    }
}

/// Ticks at paper positions along a level line at `y`, the lengths between them as figures.
pub(super) fn level(canvas: &mut Canvas, y: f64, ticks: &[(f64, f64)]) {
    let Some((first, last)) = ticks.first().zip(ticks.last()) else { return };
    canvas.line(Ink::Thin, (first.0, y), (last.0, y));
    ticks.iter().for_each(|(x, _)| tick(canvas, (*x, y)));
    for pair in ticks.windows(2) {
        let ((x1, a), (x2, b)) = (pair[0], pair[1]);
        canvas.text("", Anchor::Middle, ((x1 + x2) / 2.0, y - 0.8), &figure((b - a).abs()));
    }
}

/// Ticks at paper positions along an upright line at `x`, the lengths between them as figures.
pub(super) fn upright(canvas: &mut Canvas, x: f64, ticks: &[(f64, f64)]) {
    let Some((first, last)) = ticks.first().zip(ticks.last()) else { return };
    canvas.line(Ink::Thin, (x, first.0), (x, last.0));
    ticks.iter().for_each(|(y, _)| tick(canvas, (x, *y)));
    for pair in ticks.windows(2) {
        let ((y1, a), (y2, b)) = (pair[0], pair[1]);
        let (middle, text) = ((y1 + y2) / 2.0, figure((b - a).abs()));
        // Turned figures need room along the line; where there is none the figure lies beside it.
        if (y1 - y2).abs() >= 1.9 * text.len() as f64 {
            canvas.upright((x - 0.8, middle), &text);
        } else {
            canvas.text("", Anchor::Start, (x + 0.9, middle + 0.95), &text);
        }
    }
}

fn tick(canvas: &mut Canvas, (x, y): (f64, f64)) {
    canvas.line(Ink::Edge, (x - 0.9, y + 0.9), (x + 0.9, y - 0.9));
}

/// Words at paper heights, from the top down, beside `x`; those that would run into each other are moved apart and led to
/// their place by a slanting line.
pub(super) fn listed(canvas: &mut Canvas, x: f64, to_the_left: bool, labels: &[(f64, String)]) {
    let mut labels: Vec<&(f64, String)> = labels.iter().collect();
    labels.sort_by(|a, b| a.0.total_cmp(&b.0));
    let places = spread(&labels.iter().map(|label| label.0).collect::<Vec<f64>>());
    let (anchor, sign) = if to_the_left { (Anchor::End, -1.0) } else { (Anchor::Start, 1.0) };
    for ((y, text), place) in labels.into_iter().zip(places) {
        canvas.line(Ink::Thin, (x, *y), (x + sign * 3.0, place));
        canvas.text("", anchor, (x + sign * 3.6, place + 0.95), text);
    }
}

/// Places in order, each as near to its own as it can be with all at least [`APART`] from each other: neighbours that
/// are too close form a block round the middle of what they ask for.
fn spread(wanted: &[f64]) -> Vec<f64> {
    // (sum of what each asks for the block's first place, how many)
    let mut blocks: Vec<(f64, usize)> = Vec::new();
    let first = |block: &(f64, usize)| block.0 / block.1 as f64;
    for (i, y) in wanted.iter().enumerate() {
        blocks.push((y - i as f64 * APART, 1));
        while let [.., before, last] = blocks.as_slice()
            && first(before) > first(last)
        {
            let merged = (before.0 + last.0, before.1 + last.1);
            blocks.truncate(blocks.len() - 2);
            blocks.push(merged);
        }
    }
    let starts = blocks.iter().flat_map(|block| std::iter::repeat_n(first(block), block.1));
    starts.enumerate().map(|(i, start)| start + i as f64 * APART).collect()
}
