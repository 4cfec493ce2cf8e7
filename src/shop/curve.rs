//! Closed plane curves as loops of points, mm.

use std::f64::consts::TAU;

use glam::{DAffine2, DVec2};

use super::reading::Reading;
use crate::exchange::{Entity, Value};

/// Points of a full circle; arcs take their share.
const FACETS: f64 = 32.0;
/// Points nearer than this are one, mm.
const SAME: f64 = 1e-6;
/// Composite curves nest; deeper than this is no outline.
const DEPTH: usize = 4;

/// A closed loop, counter-clockwise, without a repeated last point.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Loop {
    pub points: Vec<DVec2>,
    /// Centre and radius, if it is a circle (also one drawn with at least eight equal facets).
    pub circle: Option<(DVec2, f64)>,
}

/// A bounding box along two directions of the plane.
#[derive(Clone, Copy, Debug)]
pub(super) struct Box2 {
    /// Unit direction of its first side; the second is 90° on.
    pub x: DVec2,
    pub centre: DVec2,
    /// Sides along x and its perpendicular.
    pub size: DVec2,
}

impl Loop {
    /// A rectangle about the origin.
    pub fn rectangle(x: f64, y: f64) -> Self {
        let (x, y) = (x / 2.0, y / 2.0);
        let points = vec![DVec2::new(-x, -y), DVec2::new(x, -y), DVec2::new(x, y), DVec2::new(-x, y)];
        Self { points, circle: None }
    }

    /// A circle.
    pub fn circle(centre: DVec2, radius: f64) -> Self {
        let points = (0..FACETS as usize).map(|i| centre + radius * DVec2::from_angle(TAU * i as f64 / FACETS));
        Self { points: points.collect(), circle: Some((centre, radius)) }
    }

    /// A loop of points in any sense, repeated points and points on a straight edge dropped.
    ///
    /// # Errors
    /// A clause if fewer than three points are left or they enclose nothing.
    pub fn new(points: Vec<DVec2>) -> Result<Self, String> {
        let mut clean: Vec<DVec2> = Vec::with_capacity(points.len());
        for point in points {
            if !point.is_finite() {
                return Err("its outline has a point that is not finite".into());
            }
            if clean.last().is_none_or(|last| last.distance(point) > SAME) {
                clean.push(point);
            }
        }
        while clean.len() > 1 && clean.first().zip(clean.last()).is_some_and(|(a, b)| a.distance(*b) <= SAME) {
            clean.pop();
        }
        let corners: Vec<DVec2> = neighbours(&clean)
            .filter(|(before, at, after)| (*at - *before).normalize_or_zero().perp_dot((*after - *at).normalize_or_zero()).abs() > 1e-7
                || (*at - *before).dot(*after - *at) < 0.0)
            .map(|(_, at, _)| at)
            .collect();
        let area = signed_area(&corners);
        if corners.len() < 3 || !(area.abs() > SAME) {
            return Err("its outline encloses no area".into());
        }
        let mut points = corners;
        if area < 0.0 {
            points.reverse();
        }
        let circle = facetted_circle(&points);
        Ok(Self { points, circle })
    }

    /// Under a similarity of the plane; still counter-clockwise where it mirrors.
    pub fn mapped(self, map: DAffine2, scale: f64) -> Self {
        let mut points: Vec<DVec2> = self.points.into_iter().map(|p| map.transform_point2(p)).collect();
        if map.matrix2.determinant() < 0.0 {
            points.reverse();
        }
        Self { points, circle: self.circle.map(|(c, r)| (map.transform_point2(c), r * scale)) }
    }

    /// Enclosed area, mm².
    pub fn area(&self) -> f64 {
        match self.circle {
            Some((_, r)) => TAU / 2.0 * r * r,
            None => signed_area(&self.points).abs(),
        }
    }

    /// The bounding box along a direction.
    pub fn box_along(&self, x: DVec2) -> Box2 {
        let y = x.perp();
        let (mut low, mut high) = (DVec2::INFINITY, DVec2::NEG_INFINITY);
        for point in &self.points {
            let local = DVec2::new(point.dot(x), point.dot(y));
            low = low.min(local);
            high = high.max(local);
        }
        let middle = (low + high) / 2.0;
        Box2 { x, centre: middle.x * x + middle.y * y, size: high - low }
    }

    /// The bounding box of least area along one of the edges; along `x` if that is as small within 0.1 %.
    pub fn least_box(&self, x: DVec2) -> Box2 {
        let area = |b: &Box2| b.size.x * b.size.y;
        let own = self.box_along(x);
        let edges = neighbours(&self.points).filter_map(|(before, at, _)| (at - before).try_normalize());
        let least = edges.map(|edge| self.box_along(edge)).min_by(|a, b| area(a).total_cmp(&area(b)));
        match least {
            Some(least) if self.circle.is_none() && area(&least) < 0.999 * area(&own) => least,
            _ => own,
        }
    }

    /// Whether it bulges outwards everywhere.
    pub fn convex(&self) -> bool {
        neighbours(&self.points).all(|(before, at, after)| (at - before).perp_dot(after - at) >= -1e-6)
    }

    /// The parts of the line `at + t·along` inside the loop, as intervals of t in rising order.
    pub fn chords(&self, at: DVec2, along: DVec2) -> Vec<(f64, f64)> {
        let side = |p: DVec2| along.perp_dot(p - at);
        let mut crossings: Vec<f64> = neighbours(&self.points)
            .filter_map(|(a, b, _)| {
                let (sa, sb) = (side(a), side(b));
                ((sa < 0.0) != (sb < 0.0)).then(|| (a + (b - a) * (sa / (sa - sb)) - at).dot(along))
            })
            .collect();
        crossings.sort_by(f64::total_cmp);
        crossings.chunks_exact(2).map(|pair| (pair[0], pair[1])).collect()
    }

    /// What is left on the side of the line through `at` to which `keep` points.
    pub fn clipped(&self, at: DVec2, keep: DVec2) -> Option<Self> {
        let side = |p: DVec2| keep.dot(p - at);
        let mut points = Vec::new();
        for (a, b, _) in neighbours(&self.points) {
            let (sa, sb) = (side(a), side(b));
            if (sa < 0.0) != (sb < 0.0) {
                points.push(a + (b - a) * (sa / (sa - sb)));
            }
            if sb >= 0.0 {
                points.push(b);
            }
        }
        Self::new(points).ok()
    }
}

/// Each point with the one before and the one after it; the pair (before, at) runs over all edges.
fn neighbours(points: &[DVec2]) -> impl Iterator<Item = (DVec2, DVec2, DVec2)> + '_ {
    let n = points.len();
    (0..n).map(move |i| (points[(i + n - 1) % n], points[i], points[(i + 1) % n]))
}

fn signed_area(points: &[DVec2]) -> f64 {
    let Some(first) = points.first() else { return 0.0 };
    neighbours(points).map(|(before, at, _)| (before - first).perp_dot(at - first)).sum::<f64>() / 2.0
}

/// At least eight corners on one circle, equally spaced: a circle as an export draws it.
fn facetted_circle(points: &[DVec2]) -> Option<(DVec2, f64)> {
    if points.len() < 8 {
        return None;
    }
    let centre = points.iter().sum::<DVec2>() / points.len() as f64;
    let radius = points.iter().map(|p| p.distance(centre)).sum::<f64>() / points.len() as f64;
    let side = TAU * radius / points.len() as f64;
    let near = |value: f64, of: f64| (value - of).abs() <= 0.01 * radius;
    let round = points.iter().all(|p| near(p.distance(centre), radius))
        && neighbours(points).all(|(before, at, _)| near(at.distance(before), 2.0 * radius * (side / radius / 2.0).sin()));
    round.then_some((centre, radius))
}

impl Reading<'_> {
    /// Reads a closed curve of the plane.
    ///
    /// # Errors
    /// A clause where the curve is of another sort or open beyond repair.
    pub fn closed_curve(&self, curve: Option<Entity<'_>>) -> Result<Loop, String> {
        let curve = curve.ok_or("its profile has no outline")?;
        if curve.is_a("IfcCircle") {
            let centre = self.axes_2d(curve.entity("Position").ok_or("its outline has a circle without a position")?)?.translation;
            let radius = self.radius(curve)?;
            return Ok(Loop::circle(centre, radius));
        }
        Loop::new(self.curve_points(curve, 0)?)
    }

    fn radius(&self, circle: Entity<'_>) -> Result<f64, String> {
        let radius = circle.number("Radius").map(|r| r * self.units.length);
        radius.filter(|r| *r > 0.0 && r.is_finite()).ok_or_else(|| "its outline has a circle whose radius is not more than 0".into())
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
                Value::List(items) => items.iter().find_map(Value::number),
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
        let Some(Value::List(rows)) = curve.entity("Points").map(|list| list.value("CoordList")) else {
            return Err(wrong());
        };
        let point = |row: &Value| match row {
            Value::List(xy) => match xy.as_slice() {
                [x, y, ..] => Some(DVec2::new(x.number()?, y.number()?) * self.units.length),
                _ => None,
            },
            _ => None,
        };
        let points: Vec<DVec2> = rows.iter().map(point).collect::<Option<_>>().ok_or_else(wrong)?;
        let Value::List(segments) = curve.value("Segments") else { return Ok(points) };
        let mut out = Vec::new();
        for segment in segments {
            let Value::Typed(of, indices) = segment else { return Err(wrong()) };
            let Value::List(indices) = &**indices else { return Err(wrong()) };
            let corner = |index: &Value| points.get((index.number()? as usize).checked_sub(1)?).copied();
            let corners: Vec<DVec2> = indices.iter().map(corner).collect::<Option<_>>().ok_or_else(wrong)?;
            match (&**of, corners.as_slice()) {
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
    let centre = a + DVec2::new(v.y * u.length_squared() - u.y * v.length_squared(), u.x * v.length_squared() - v.x * u.length_squared()) / cross;
    let (from, to) = ((a - centre).to_angle(), (c - centre).to_angle());
    let sweep = if cross > 0.0 { (to - from).rem_euclid(TAU) } else { -(from - to).rem_euclid(TAU) };
    arc(centre, a.distance(centre), from, sweep)
}
