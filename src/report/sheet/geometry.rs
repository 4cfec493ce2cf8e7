//! What the joint is made of: the drawing, its measures, the intended detail beside it.

use super::content::{Block, Table};
use super::parts::plain;
use crate::report::drawing::figure;
use crate::review::JointReview;
use crate::review::sketch::{Against, BeamEnd, ColumnPart, FlatPlate, Sketch, SketchDiagonal, SketchStiffener};

/// The drawing and its measures.
pub(super) fn detailed(sketch: &Sketch) -> Vec<Block> {
    let mut pairs = beam_end("beam", "end plate", "welds", &sketch.end);
    let other = match &sketch.against {
        Against::Beam(end) => {
            pairs.extend(beam_end("other beam", "other end plate", "other welds", end));
            ">edge of other plate"
        }
        Against::Column(part) => {
            pairs.insert(0, ("column", part.column.label.clone()));
            pairs.push(("stiffeners", stiffeners(part)));
            pairs.extend(strengthening(part).into_iter().filter(|(_, said)| !said.is_empty()));
            ">edge of column flange"
        }
    };
    pairs.push(("bolts", sketch.bolts.clone()));
    let head = ["row", ">height", ">gauge", ">edge of plate", other, ">to the row above"];
    let mut table = Table::new("Bolt rows, mm; heights from the soffit of the beam's lower flange", &head);
    let mut above: Option<f64> = None;
    for (i, row) in sketch.rows.iter().enumerate() {
        let pitch = above.replace(row.height_mm).map(|above| above - row.height_mm);
        table.rows.push(vec![
            (i + 1).to_string(),
            plain(Some(row.height_mm)),
            plain(Some(row.gauge_mm)),
            plain(Some(row.edge_plate_mm)),
            plain(Some(row.edge_other_mm)),
            plain(pitch),
        ]);
    }
    vec![Block::Drawing, Block::Pairs(pairs), Block::Table(table)]
}

fn beam_end(
    beam: &'static str,
    plate: &'static str,
    welds: &'static str,
    end: &BeamEnd,
) -> Vec<(&'static str, String)> {
    let throat = |a: Option<f64>| a.map_or_else(|| "not known".into(), |a| format!("throat {} mm", figure(a)));
    let [top, web, bottom] = end.throats_mm.map(throat);
    let face = &end.plate;
    let sizes = [face.width_mm, face.bottom_mm, face.top_mm].map(figure);
    vec![
        (beam, end.beam.label.clone()),
        (plate, format!("{}, {} wide, from {} to {} mm", face.label, sizes[0], sizes[1], sizes[2])),
        (welds, format!("top flange {top}; web {web}; lower flange {bottom}")),
    ]
}

fn stiffeners(part: &ColumnPart) -> String {
    let one = |s: &SketchStiffener| {
        let sides = if s.both_sides { "a pair" } else { "on one side only" };
        let depth = if s.full_depth { "" } else { ", not from flange to flange" };
        format!("at {}, {} thick, {sides}{depth}", figure(s.height_mm), figure(s.thickness_mm))
    };
    let all: Vec<String> = part.stiffeners.iter().map(one).collect();
    if all.is_empty() { "none".into() } else { all.join("; ") }
}

fn strengthening(part: &ColumnPart) -> [(&'static str, String); 3] {
    let flat = |p: &FlatPlate| {
        let [thick, wide, bottom, top] = [p.thickness_mm, p.width_mm, p.bottom_mm, p.top_mm].map(figure);
        format!("{thick} thick, {wide} wide, from {bottom} to {top}")
    };
    let diagonal = |d: &SketchDiagonal| {
        let sides = if d.both_sides { "a pair" } else { "on one side only" };
        let [thick, near, far] = [d.thickness_mm, d.near_mm, d.far_mm].map(figure);
        format!("{thick} thick, from {near} at the joint to {far}, {sides}")
    };
    [
        ("web plates", part.web_plates.iter().map(flat).collect::<Vec<_>>().join("; ")),
        ("diagonals", part.diagonals.iter().map(diagonal).collect::<Vec<_>>().join("; ")),
        ("backing plates", part.backing.iter().map(flat).collect::<Vec<_>>().join("; ")),
    ]
}

/// The intended detail beside what was detailed.
pub(super) fn difference(joint: &JointReview, intended: &[String], detailed: &[String]) -> Vec<Block> {
    let caption = joint.detail.as_ref().map_or("The detail".into(), |name| format!("Detail {name}"));
    let mut table = Table::new(caption, &["intended", "", "detailed"]);
    let ops = similar::capture_diff_slices(similar::Algorithm::Myers, intended, detailed);
    for op in ops {
        let (left, right) = (&intended[op.old_range()], &detailed[op.new_range()]);
        for row in 0..left.len().max(right.len()) {
            let cell = |side: &[String]| side.get(row).cloned().unwrap_or_else(|| "-".into());
            let sign = if matches!(op, similar::DiffOp::Equal { .. }) { "" } else { "differs" };
            table.rows.push(vec![cell(left), sign.into(), cell(right)]);
        }
    }
    vec![Block::Table(table)]
}
