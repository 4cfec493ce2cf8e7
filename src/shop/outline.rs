//! Closed loops of points in a plane, mm, and what can be asked of them.

use std::f64::consts::TAU;
use std::sync::LazyLock;

use glam::{DAffine2, DVec2};

/// Points of a full circle; arcs take their share.
pub(super) const FACETS: f64 = 32.0;
/// Only so many of the longest edges are tried for the least box: an outline of very many points has no straight side.
const EDGES: usize = 64;
/// Points nearer than this are one, mm.
const SAME: f64 = 1e-6;

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
        static UNIT: LazyLock<[DVec2; FACETS as usize]> =
            LazyLock::new(|| std::array::from_fn(|i| DVec2::from_angle(TAU * i as f64 / FACETS)));
        let points = UNIT.iter().map(|unit| centre + radius * unit);
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
            .filter(|(before, at, after)| {
                (*at - *before).normalize_or_zero().perp_dot((*after - *at).normalize_or_zero()).abs() > 1e-7
                    || (*at - *before).dot(*after - *at) < 0.0
            })
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

    /// Unit direction of the edge, among the longest, along which its box has the least sum of sides: a triangle lies along
    /// a leg, so that its box ends where it does. Of equal ones the longest.
    pub fn snug_edge(&self) -> Option<DVec2> {
        let mut edges: Vec<DVec2> = neighbours(&self.points).map(|(before, at, _)| at - before).collect();
        edges.sort_by(|a, b| b.length_squared().total_cmp(&a.length_squared()));
        let sides = |x: DVec2| self.box_along(x).size.element_sum();
        let directions = edges.into_iter().take(EDGES).filter_map(DVec2::try_normalize);
        directions.map(|x| (x, sides(x))).reduce(|a, b| if b.1 < 0.999 * a.1 { b } else { a }).map(|(x, _)| x)
    }

    /// Length of its edges, mm.
    pub fn perimeter(&self) -> f64 {
        neighbours(&self.points).map(|(before, at, _)| before.distance(at)).sum()
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
        if self.circle.is_some() {
            return own;
        }
        let mut edges: Vec<DVec2> = neighbours(&self.points).map(|(before, at, _)| at - before).collect();
        edges.sort_by(|a, b| b.length_squared().total_cmp(&a.length_squared()));
        let directions = edges.into_iter().take(EDGES).filter_map(DVec2::try_normalize);
        let least = directions.map(|edge| self.box_along(edge)).min_by(|a, b| area(a).total_cmp(&area(b)));
        match least {
            Some(least) if area(&least) < 0.999 * area(&own) => least,
            _ => own,
        }
    }

    /// Whether it bulges outwards everywhere.
    pub fn convex(&self) -> bool {
        neighbours(&self.points).all(|(before, at, after)| (at - before).perp_dot(after - at) >= -1e-6)
    }

    /// Whether it contains a point (even-odd rule).
    pub fn holds(&self, point: DVec2) -> bool {
        let crossed = |(a, b, _): &(DVec2, DVec2, DVec2)| {
            (b.y > point.y) != (a.y > point.y) && point.x < (a.x - b.x) * (point.y - b.y) / (a.y - b.y) + b.x
        };
        neighbours(&self.points).filter(crossed).count() % 2 == 1
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
        && neighbours(points)
            .all(|(before, at, _)| near(at.distance(before), 2.0 * radius * (side / radius / 2.0).sin()));
    round.then_some((centre, radius))
}
