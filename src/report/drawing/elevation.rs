//! The joint from the side: column, stiffeners, end plate, beam, bolts, welds, row forces, what governs.

use super::canvas::{Anchor, Canvas, Ink};
use super::dimension::{self, figure, height};
use super::{STUB, Scene, reach};
use crate::review::RowResult;
use crate::review::sketch::{Against, BeamEnd, ColumnPart};

/// Draws it with the end plate's contact face at paper `x0`.
pub(super) fn draw(canvas: &mut Canvas, scene: &Scene<'_>, x0: f64) {
    let sketch = scene.sketch;
    let view = View { scene, x0, to: 1.0 };
    let left = x0 - reach(&sketch.against) * scene.scale;
    canvas.text("title", Anchor::Start, (left, 4.0), "Elevation");
    match &sketch.against {
        Against::Column(part) => {
            canvas.text("", Anchor::Start, (left, 9.5), &format!("column {}", part.column.label));
            view.column(canvas, part);
        }
        Against::Beam(other) => {
            let below = scene.y(scene.bottom) - 1.0;
            canvas.text("", Anchor::Start, (left, below - 4.0), &format!("beam {}", other.beam.label));
            let mirrored = View { to: -1.0, ..view };
            mirrored.beam(canvas, other);
            mirrored.welds(canvas, other);
        }
    }
    view.beam(canvas, &sketch.end);
    let (x, _) = view.at(sketch.end.plate.thickness_mm + scene.stub, 0.0);
    let below = scene.y(scene.bottom) - 1.0;
    canvas.text("", Anchor::End, (x, below), &format!("beam {}", sketch.end.beam.label));
    view.governs(canvas);
    view.bolts(canvas);
    view.welds(canvas, &sketch.end);
    view.forces(canvas);
    view.dimensions(canvas, left);
}

#[derive(Clone, Copy)]
struct View<'a> {
    scene: &'a Scene<'a>,
    x0: f64,
    /// 1 where distances run to the right, −1 where they run to the left.
    to: f64,
}

impl View<'_> {
    /// Paper point of a distance from the contact face and a height, mm of steel.
    fn at(&self, out: f64, height: f64) -> (f64, f64) {
        (self.x0 + self.to * out * self.scene.scale, self.scene.y(height))
    }

    /// What the bolts at a height go through on the other side, mm of steel.
    fn grip(&self, height: f64) -> f64 {
        let backing = match &self.scene.sketch.against {
            Against::Column(part) => part.backing.as_slice(),
            Against::Beam(_) => &[],
        };
        let behind = backing.iter().filter(|plate| plate.bottom_mm <= height && height <= plate.top_mm);
        self.ply() + behind.map(|plate| plate.thickness_mm).fold(0.0, f64::max)
    }

    /// The flange or plate on the other side, mm of steel.
    fn ply(&self) -> f64 {
        match &self.scene.sketch.against {
            Against::Column(part) => part.column.flange_mm.unwrap_or(0.0),
            Against::Beam(end) => end.plate.thickness_mm,
        }
    }

    fn column(&self, canvas: &mut Canvas, part: &ColumnPart) {
        let (scene, column) = (self.scene, &part.column);
        let (h, t_f) = (column.depth_mm, column.flange_mm.unwrap_or(0.0));
        let (bottom, top) = (scene.bottom, scene.top);
        for stiffener in &part.stiffeners {
            let clear = h - 2.0 * t_f;
            let reach = if stiffener.full_depth { clear } else { stiffener.reach_mm.min(clear) };
            let half = stiffener.thickness_mm / 2.0;
            let (a, b) = (self.at(-t_f - reach, stiffener.height_mm - half), self.at(-t_f, stiffener.height_mm + half));
            canvas.rect(if stiffener.both_sides { Ink::Cut } else { Ink::Plate }, a, b);
        }
        for plate in &part.web_plates {
            let (middle, half) = (-h / 2.0, plate.width_mm / 2.0);
            let (a, b) = (self.at(middle - half, plate.bottom_mm), self.at(middle + half, plate.top_mm));
            canvas.rect(Ink::Hidden, a, b);
        }
        for diagonal in &part.diagonals {
            let half = diagonal.thickness_mm / 2.0;
            let ends = [(-t_f, diagonal.near_mm, half), (-t_f, diagonal.near_mm, -half)];
            let others = [(t_f - h, diagonal.far_mm, -half), (t_f - h, diagonal.far_mm, half)];
            let points = ends.into_iter().chain(others).map(|(x, y, half)| self.at(x, y + half));
            let ink = if diagonal.both_sides { Ink::Cut } else { Ink::Plate };
            canvas.polygon(ink, &points.collect::<Vec<_>>());
        }
        for plate in &part.backing {
            canvas.rect(Ink::Cut, self.at(-t_f - plate.thickness_mm, plate.bottom_mm), self.at(-t_f, plate.top_mm));
        }
        let edges = if t_f > 0.0 { vec![-h, t_f - h, -t_f, 0.0] } else { vec![-h, 0.0] };
        for x in edges {
            canvas.line(Ink::Edge, self.at(x, bottom), self.at(x, top));
        }
        for (end, shown) in [(part.top_mm, top), (part.bottom_mm, bottom)] {
            match end == Some(shown) {
                true => canvas.line(Ink::Edge, self.at(-h, shown), self.at(0.0, shown)),
                false => canvas.broken(self.at(-h, shown), self.at(0.0, shown)),
            }
        }
    }

    fn beam(&self, canvas: &mut Canvas, end: &BeamEnd) {
        let (beam, t_p) = (&end.beam, end.plate.thickness_mm);
        let (h, t_f, far) = (beam.depth_mm, beam.flange_mm.unwrap_or(0.0), t_p + STUB * beam.depth_mm);
        canvas.rect(Ink::Plate, self.at(0.0, end.plate.bottom_mm), self.at(t_p, end.plate.top_mm));
        let edges = if t_f > 0.0 { vec![0.0, t_f, h - t_f, h] } else { vec![0.0, h] };
        for y in edges {
            canvas.line(Ink::Edge, self.at(t_p, end.soffit_mm + y), self.at(far, end.soffit_mm + y));
        }
        canvas.broken(self.at(far, end.soffit_mm), self.at(far, end.soffit_mm + h));
    }

    /// Heads and nuts at both ends of each bolt, its axis, its row's number.
    fn bolts(&self, canvas: &mut Canvas) {
        let sketch = self.scene.sketch;
        let t_p = sketch.end.plate.thickness_mm;
        for (i, row) in sketch.rows.iter().enumerate() {
            let y = row.height_mm;
            let ply = self.grip(y);
            let reach = sketch.bolt_mm.unwrap_or(0.0);
            if let Some(d) = sketch.bolt_mm {
                canvas.rect(Ink::Bolt, self.at(-ply - 0.8 * d, y - 0.8 * d), self.at(-ply, y + 0.8 * d));
                canvas.rect(Ink::Bolt, self.at(t_p, y - 0.8 * d), self.at(t_p + 0.7 * d, y + 0.8 * d));
                for side in [-0.5, 0.5] {
                    canvas.line(Ink::Hidden, self.at(-ply, y + side * d), self.at(t_p, y + side * d));
                }
            }
            canvas.line(Ink::Axis, self.at(-ply - 2.0 * reach, y), self.at(t_p + 2.0 * reach, y));
            let (x, y) = self.at(-ply - 2.0 * reach, y);
            canvas.text("", Anchor::End, (x - 0.6, y + 0.95), &format!("row {}", i + 1));
        }
    }

    /// Fillets as they lie, not smaller than can be seen; their throats beside them.
    fn welds(&self, canvas: &mut Canvas, end: &BeamEnd) {
        let scale = self.scene.scale;
        let (t_p, h, t_f) = (end.plate.thickness_mm, end.beam.depth_mm, end.beam.flange_mm.unwrap_or(0.0));
        let (low, high) = (end.soffit_mm, end.soffit_mm + h);
        let [top, web, bottom] = end.throats_mm;
        let leg = |a: f64| (2.0_f64.sqrt() * a).max(1.1 / scale);
        let mut fillet = |a: Option<f64>, y: f64, up: f64, room: f64| {
            if let Some(leg) = a.map(leg).filter(|leg| *leg <= room) {
                let at = |out: f64, up: f64| self.at(t_p + out, y + up);
                canvas.polygon(Ink::Weld, &[at(0.0, 0.0), at(leg, 0.0), at(0.0, up * leg)]);
            }
        };
        fillet(top, high, 1.0, end.plate.top_mm - high);
        fillet(top, high - t_f, -1.0, f64::INFINITY);
        fillet(bottom, low + t_f, 1.0, f64::INFINITY);
        fillet(bottom, low, -1.0, low - end.plate.bottom_mm);
        if let Some(leg) = web.map(leg) {
            canvas.rect(Ink::Weld, self.at(t_p, low + t_f), self.at(t_p + 0.4 * leg, high - t_f));
        }
        let said = |a: Option<f64>| a.map_or_else(|| "a not known".into(), |a| format!("a {}", figure(a)));
        // The web's throat where no row's force is written.
        let rows = &self.scene.sketch.rows;
        let taken = |y: f64| rows.iter().map(|row| (row.height_mm - y).abs()).fold(f64::INFINITY, f64::min);
        let free = (2..=8).map(|part| low + f64::from(part) / 10.0 * h);
        let middle = free.max_by(|a, b| taken(*a).total_cmp(&taken(*b))).unwrap_or(low + h / 2.0);
        // On the left the rows' numbers come first.
        let (anchor, aside) = if self.to > 0.0 { (Anchor::Start, 2.2) } else { (Anchor::End, 18.0) };
        for (a, y, shift) in [(top, high - t_f, 3.0), (web, middle, 0.95), (bottom, low + t_f, -0.8)] {
            let (x, y) = self.at(t_p, y);
            canvas.text("", anchor, (x + aside * self.to, y + shift), &said(a));
        }
    }

    /// Row forces pull at the plate, their sum presses at the compression flange.
    fn forces(&self, canvas: &mut Canvas) {
        let (scene, sketch) = (self.scene, self.scene.sketch);
        let end = &sketch.end;
        let (t_p, h, t_f) = (end.plate.thickness_mm, end.beam.depth_mm, end.beam.flange_mm.unwrap_or(0.0));
        let number = |row: &&RowResult| row.force_kn.is_finite() && row.force_kn > 0.0;
        let most = scene.joint.rows.iter().filter(number).map(|row| row.force_kn).fold(0.0, f64::max);
        let room = scene.stub * scene.scale;
        let start = (1.4 * sketch.bolt_mm.unwrap_or(0.0) * scene.scale).max(3.0);
        // Arrows end where their figures still have room.
        let longest = (room - start - 21.0).max(6.0);
        for row in scene.joint.rows.iter().filter(number) {
            let Some(at) = row.row.checked_sub(1).and_then(|i| sketch.rows.get(i)) else { continue };
            let (x, y) = self.at(t_p, at.height_mm);
            let tip = x + start + (longest * row.force_kn / most).max(4.0);
            canvas.arrow(Ink::Force, (x + start, y), (tip, y));
            canvas.text("force", Anchor::Start, (tip + 0.8, y + 0.95), &format!("F{} {:.0} kN", row.row, row.force_kn));
        }
        let sum: f64 = scene.joint.rows.iter().map(|row| row.force_kn).sum();
        if let Some(basis) = &scene.joint.row_basis
            && sum.is_finite()
            && sum > 0.0
        {
            let (x, y) = self.at(t_p, if basis.tension_at_top { t_f / 2.0 } else { h - t_f / 2.0 });
            let from = x + start + longest;
            canvas.arrow(Ink::Force, (from, y), (x + 0.6, y));
            canvas.text(
                "force",
                Anchor::Start,
                (from + 0.8, if basis.tension_at_top { y - 2.4 } else { y + 4.2 }),
                &format!("ΣF {sum:.0} kN"),
            );
        }
    }

    /// A broken outline round what governs, and its name below.
    fn governs(&self, canvas: &mut Canvas) {
        let (scene, sketch) = (self.scene, self.scene.sketch);
        let end = &sketch.end;
        let (t_p, h, t_b) = (end.plate.thickness_mm, end.beam.depth_mm, end.beam.flange_mm.unwrap_or(0.0));
        let (h_c, t_c) = (reach(&sketch.against), self.ply());
        let named = scene.governs.and_then(|check| rows_in(&check.title));
        let rows = || {
            let meant = scene.joint.rows.iter().filter(|row| named.is_none_or(|(a, b)| (a..=b).contains(&row.row)));
            meant.filter_map(|row| sketch.rows.get(row.row.checked_sub(1)?))
        };
        let upper = rows().map(|row| row.height_mm).fold(f64::NEG_INFINITY, f64::max) + 40.0;
        let lower = rows().map(|row| row.height_mm).fold(f64::INFINITY, f64::min) - 40.0;
        let (upper, lower) = if upper > lower { (upper, lower) } else { (end.plate.top_mm, end.plate.bottom_mm) };
        let at_top = scene.joint.row_basis.as_ref().is_some_and(|basis| !basis.tension_at_top);
        let flange = if at_top { h - t_b } else { 0.0 };
        let tension = if at_top { 0.0 } else { h - t_b };
        let spread = 0.12 * h;
        type Corner = (f64, f64);
        let places: [(&[&str], Corner, Corner); 10] = [
            (&["column-web-panel"], (t_c - h_c, 0.0), (-t_c, h)),
            (&["column-web-in-compression"], (t_c - h_c, flange - spread), (-t_c, flange + t_b + spread)),
            (&["column-web", "column-stiffener", "stiffener"], (t_c - h_c, lower), (-t_c, upper)),
            (&["column-flange"], (-t_c, lower), (0.0, upper)),
            (&["end-plate"], (0.0, lower), (t_p, upper)),
            (&["bolts", "punching"], (-t_c - spread / 2.0, lower), (t_p + spread / 2.0, upper)),
            (&["beam-flange"], (t_p, flange - 6.0), (t_p + 2.0 * spread, flange + t_b + 6.0)),
            (&["beam-web"], (t_p, t_b), (t_p + 2.0 * spread, h - t_b)),
            (&["flange-weld"], (t_p - 6.0, tension - 15.0), (t_p + spread, tension + t_b + 15.0)),
            (&["web-weld"], (t_p - 6.0, t_b), (t_p + spread / 2.0, h - t_b)),
        ];
        if let Some((_, a, b)) = places.iter().find(|(parts, ..)| scene.governs(parts)) {
            // Off the edges, so that both stay visible.
            let ((x1, y1), (x2, y2)) = (self.at(a.0, a.1), self.at(b.0, b.1));
            canvas.rect(Ink::Governs, (x1 - 0.8, y1 + 0.8), (x2 + 0.8, y2 - 0.8));
        }
        if let Some(what) = crate::report::group::governing(scene.joint) {
            let y = scene.y(scene.bottom) + 19.5;
            let x = self.at(-h_c, 0.0).0;
            canvas.line(Ink::Governs, (x, y - 0.9), (x + 8.0, y - 0.9));
            canvas.text("governs", Anchor::Start, (x + 10.0, y), &format!("governs: {what}"));
        }
    }

    fn dimensions(&self, canvas: &mut Canvas, left: f64) {
        let (scene, sketch) = (self.scene, self.scene.sketch);
        let plate = &sketch.end.plate;
        let y = scene.y(scene.bottom) + 6.0;
        let (face, back) = (self.at(0.0, 0.0).0, self.at(plate.thickness_mm, 0.0).0);
        for x in [face, back] {
            canvas.line(Ink::Thin, (x, scene.y(plate.bottom_mm) + 0.8), (x, y + 1.2));
        }
        canvas.line(Ink::Thin, (back, y), (back + 3.0, y));
        canvas.text("", Anchor::Start, (back + 1.2, y - 0.8), &format!("plate {}", figure(plate.thickness_mm)));
        let part = match &sketch.against {
            Against::Column(part) => part,
            Against::Beam(other) => {
                let x = self.at(-other.plate.thickness_mm, 0.0).0;
                canvas.line(Ink::Thin, (x, scene.y(other.plate.bottom_mm) + 0.8), (x, y + 1.2));
                let said = format!("plate {}", figure(other.plate.thickness_mm));
                canvas.text("", Anchor::End, (x - 1.2, y - 0.8), &said);
                return;
            }
        };
        dimension::level(canvas, y, &[(left, -part.column.depth_mm), (face, 0.0)]);
        let stiffeners: Vec<(f64, String)> = (part.stiffeners.iter())
            .map(|s| (scene.y(s.height_mm), format!("{} ({})", height(s.height_mm), figure(s.thickness_mm))))
            .collect();
        if !stiffeners.is_empty() {
            canvas.text("", Anchor::Start, (1.0, scene.y(scene.top) - 3.5), "stiffeners");
            dimension::listed(canvas, left - 0.6, true, &stiffeners);
        }
    }
}

/// First and last row that a check's title names: "end plate in bending, rows 2-3 (mode 1)".
fn rows_in(title: &str) -> Option<(usize, usize)> {
    let (_, rest) = title.split_once(", row ").or_else(|| title.split_once(", rows "))?;
    let mut numbers = rest.split(|c: char| !c.is_ascii_digit()).map(str::parse::<usize>);
    let first = numbers.next()?.ok()?;
    let last = if rest[first.to_string().len()..].starts_with('-') { numbers.next()?.ok()? } else { first };
    Some((first, last))
}
