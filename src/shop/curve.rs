//! Closed curves of the exchange as loops.

use std::f64::consts::TAU;

use glam::DVec2;

use super::outline::{FACETS, Loop};
use super::reading::Reading;
use crate::exchange::{Entity, View};

/// Composite curves nest; deeper than this is no outline.
const DEPTH: usize = 2;

impl Reading<'_> {
    /// Reads a closed curve of the plane.
    ///
    /// # Errors
    /// A clause where the curve is of another sort or open beyond repair.
    pub fn closed_curve(&self, curve: Option<Entity<'_>>) -> Result<Loop, String> {
        let curve = curve.ok_or("its profile has no outline")?;
        if curve.is_a("IfcCircle") {
            let centre = self
                .axes_2d(curve.entity("Position").ok_or("its outline has a circle without a position")?)?
                .translation;
            let radius = self.radius(curve)?;
            return Ok(Loop::circle(centre, radius));
        }
        Loop::new(self.curve_points(curve, 0)?)
    }

    fn radius(&self, circle: Entity<'_>) -> Result<f64, String> {
        let radius = circle.number("Radius").map(|r| r * self.units.length);
        radius
            .filter(|r| *r > 0.0 && r.is_finite())
            .ok_or_else(|| "its outline has a circle whose radius is not more than 0".into())
    }

    fn curve_points(&self, curve: Entity<'_>, depth: usize) -> Result<Vec<DVec2>, String> {
        match curve.class() {
            "IfcPolyline" => {
                curve.entities("Points").into_iter().map(|p| Ok(self.point(Some(p))?.truncate())).collect()
            }
            "IfcIndexedPolyCurve" => self.indexed_points(curve),
            "IfcCompositeCurve" if depth < DEPTH => {
                let mut points = Vec::new();
                for segment in curve.entities("Segments") {
                    let parent = segment.entity("ParentCurve").ok_or("its outline has an empty segment")?;
                    let mut piece = self.curve_points(parent, depth + 1)?;
                    if segment.truth("SameSense") == Some(false) {
                        piece.reverse();
                    }
                    points.extend(piece);
                }
                Ok(points)
            }
            "IfcTrimmedCurve" => self.trimmed_points(curve),
            other => Err(format!("its outline is not read ({other})")),
        }
    }

    fn trimmed_points(&self, curve: Entity<'_>) -> Result<Vec<DVec2>, String> {
        let unread = || "its outline has a trimmed curve that is not read".to_owned();
        let basis = curve.entity("BasisCurve").ok_or_else(unread)?;
        // Each trim is a point, a parameter, or both.
        let trim = |attribute: &str| -> Result<(Option<DVec2>, Option<f64>), String> {
            let point = curve.entities(attribute).into_iter().find(|e| e.is_a("IfcCartesianPoint"));
            let parameter = match curve.value(attribute) {
                View::List(items) => items.iter().find_map(View::number),
                value => value.number(),
            };
            Ok((point.map(|p| self.point(Some(p))).transpose()?.map(|p| p.truncate()), parameter))
        };
        let (from, to) = (trim("Trim1")?, trim("Trim2")?);
        match basis.class() {
            "IfcLine" => Ok(vec![from.0.ok_or_else(unread)?, to.0.ok_or_else(unread)?]),
            "IfcCircle" => {
                let axes = self.axes_2d(basis.entity("Position").ok_or_else(unread)?)?;
                let radius = self.radius(basis)?;
                let by_parameter = curve.token("MasterRepresentation") == Some("PARAMETER");
                let angle = |(point, parameter): (Option<DVec2>, Option<f64>)| {
                    let point = point.map(|p| axes.inverse().transform_point2(p).to_angle());
                    let parameter = parameter.map(|t| t * self.units.angle);
                    if by_parameter { parameter.or(point) } else { point.or(parameter) }
                };
                let (mut a, mut b) = (angle(from).ok_or_else(unread)?, angle(to).ok_or_else(unread)?);
                let forward = curve.truth("SenseAgreement") != Some(false);
                if !forward {
                    (a, b) = (b, a);
                }
                let sweep = (b - a).rem_euclid(TAU);
                let mut points = arc(DVec2::ZERO, radius, a, if sweep < 1e-9 { TAU } else { sweep });
                if !forward {
                    points.reverse();
                }
                Ok(points.into_iter().map(|p| axes.transform_point2(p)).collect())
            }
            _ => Err(unread()),
        }
    }

    fn indexed_points(&self, curve: Entity<'_>) -> Result<Vec<DVec2>, String> {
        let wrong = || format!("its outline has an IfcIndexedPolyCurve at {} that can't be followed", curve.place());
        let Some(rows) = curve.entity("Points").and_then(|list| list.value("CoordList").list()) else {
            return Err(wrong());
        };
        let point = |row: View| {
            let xy = row.list()?;
            Some(DVec2::new(xy.get(0)?.number()?, xy.get(1)?.number()?) * self.units.length)
        };
        let points: Vec<DVec2> = rows.iter().map(point).collect::<Option<_>>().ok_or_else(wrong)?;
        let Some(segments) = curve.value("Segments").list() else { return Ok(points) };
        let mut out = Vec::new();
        for segment in segments.iter() {
            let View::Typed(of, indices) = segment else { return Err(wrong()) };
            let Some(indices) = indices.view().list() else { return Err(wrong()) };
            let corner = |index: View| points.get((index.number()? as usize).checked_sub(1)?).copied();
            let corners: Vec<DVec2> = indices.iter().map(corner).collect::<Option<_>>().ok_or_else(wrong)?;
            match (of, corners.as_slice()) {
                ("IfcLineIndex", _) => out.extend(corners),
                ("IfcArcIndex", [a, b, c]) => out.extend(arc_through(*a, *b, *c)),
                _ => return Err(wrong()),
            }
        }
        Ok(out)
    }
}

/// Points of an arc, both ends included.
fn arc(centre: DVec2, radius: f64, from: f64, sweep: f64) -> Vec<DVec2> {
    let steps = (FACETS * sweep.abs() / TAU).ceil().clamp(2.0, FACETS);
    (0..=steps as usize).map(|i| centre + radius * DVec2::from_angle(from + sweep * i as f64 / steps)).collect()
}

/// The arc from a through b to c; the chord where they lie on one line.
fn arc_through(a: DVec2, b: DVec2, c: DVec2) -> Vec<DVec2> {
    let (u, v) = (b - a, c - a);
    let cross = 2.0 * u.perp_dot(v);
    if cross.abs() < 1e-9 {
        return vec![a, b, c];
    }
    // Circumcentre from the two perpendicular bisectors.
    let centre = a + DVec2::new(
        v.y * u.length_squared() - u.y * v.length_squared(),
        u.x * v.length_squared() - v.x * u.length_squared(),
    ) / cross;
    let (from, to) = ((a - centre).to_angle(), (c - centre).to_angle());
    let sweep = if cross > 0.0 { (to - from).rem_euclid(TAU) } else { -(from - to).rem_euclid(TAU) };
    arc(centre, a.distance(centre), from, sweep)
}
