//! The joint's own frame, and the sizes of its parts in it.

use glam::{DVec2, DVec3};

use super::touch::EndOn;
use crate::shop::{Member, Plate};

/// Origin at the soffit of the supported member's lower flange, in its web's plane, on the end plate's outer face.
#[derive(Clone, Copy, Debug)]
pub(super) struct Frame {
    pub(super) origin: DVec3,
    /// The supported member's depth, towards the sky.
    pub(super) up: DVec3,
    /// From the supporting into the supported member: the end plate's normal.
    pub(super) out: DVec3,
    /// Across.
    pub(super) side: DVec3,
    /// Cosine of the angle between the member's axis and the plate's normal in the web's plane.
    pub(super) cos: f64,
    /// What the member's axis rises along the plate on 1 mm away from it.
    pub(super) rise: f64,
}

/// Smallest and largest of something along one direction.
#[derive(Clone, Copy, Debug)]
pub(super) struct Span {
    pub(super) lo: f64,
    pub(super) hi: f64,
}

impl Span {
    pub(super) fn of(values: impl Iterator<Item = f64>) -> Option<Self> {
        let span = values.fold(Self { lo: f64::INFINITY, hi: f64::NEG_INFINITY }, |span, x| Self {
            lo: span.lo.min(x),
            hi: span.hi.max(x),
        });
        (span.lo <= span.hi).then_some(span)
    }

    pub(super) fn size(self) -> f64 {
        self.hi - self.lo
    }

    pub(super) fn mid(self) -> f64 {
        (self.lo + self.hi) / 2.0
    }

    pub(super) fn holds(self, x: f64) -> bool {
        self.lo <= x && x <= self.hi
    }
}

impl Frame {
    /// The frame of a member's end on a plate. `None` if its directions are no directions.
    pub(super) fn new(member: &Member, end: &EndOn, plate: &Plate) -> Option<Self> {
        let (point, inward) = if end.at_end { (member.end, -member.along) } else { (member.start, member.along) };
        let out = (plate.normal * plate.normal.dot(inward).signum()).try_normalize()?;
        let up = (member.depth - out * member.depth.dot(out)).try_normalize()?;
        let up = if up.z < 0.0 { -up } else { up };
        let cos = member.depth.dot(up).abs();
        let rise = inward.dot(up) / inward.dot(out);
        let on_plate = point - inward * (end.gap / inward.dot(out));
        let origin = on_plate - up * (member.extents.y / 2.0 / cos);
        let frame = Self { origin, up, out, side: up.cross(out), cos, rise };
        (origin.is_finite() && rise.is_finite()).then_some(frame)
    }

    /// A size square to the member's axis, measured along the plate.
    pub(super) fn along_plate(&self, size: f64) -> f64 {
        size / self.cos
    }

    /// The angle of the member's axis to the plate's normal in the web's plane, degrees, positive where it rises from the plate.
    pub(super) fn slope(&self) -> f64 {
        self.rise.atan().to_degrees()
    }

    pub(super) fn height(&self, point: DVec3) -> f64 {
        (point - self.origin).dot(self.up)
    }

    pub(super) fn across(&self, point: DVec3) -> f64 {
        (point - self.origin).dot(self.side)
    }

    pub(super) fn outward(&self, point: DVec3) -> f64 {
        (point - self.origin).dot(self.out)
    }

    /// The outline of a plate on a column's web as (along the column's depth, height).
    pub(super) fn height_outline(&self, plate: &Plate, column: &Member) -> Vec<DVec2> {
        corners(plate).map(|p| DVec2::new((p - column.start).dot(column.depth), self.height(p))).collect()
    }

    /// A plate's outline as (across, height).
    pub(super) fn outline(&self, plate: &Plate) -> Vec<DVec2> {
        corners(plate).map(|p| DVec2::new(self.across(p), self.height(p))).collect()
    }
}

/// The corners of a plate's middle plane, world.
pub(super) fn corners(plate: &Plate) -> impl Iterator<Item = DVec3> {
    plate.outline.iter().map(|p| plate.centre + plate.u * p.x + plate.v * p.y)
}

/// Whether two unit vectors are parallel or opposite within an angle in degrees.
pub(super) fn are_parallel(a: DVec3, b: DVec3, degrees: f64) -> bool {
    a.cross(b).length() <= degrees.to_radians().sin() && a.dot(b).abs() > 0.5
}

/// Whether two unit vectors are square to each other within an angle in degrees.
pub(super) fn are_square(a: DVec3, b: DVec3, degrees: f64) -> bool {
    a.dot(b).abs() <= degrees.to_radians().sin()
}
