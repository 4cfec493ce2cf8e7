//! Parts as boxes: a plate is one, an I section three (its plies).

use glam::DVec3;

use crate::shop::{Member, Plate, Shape};

/// Which ply of a member.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Ply {
    /// The flange on the positive side of the member's depth.
    UpperFlange,
    /// The flange on the negative side.
    LowerFlange,
    /// The web.
    Web,
    /// Some wall of a section whose plies are not told apart.
    Wall,
}

impl Ply {
    /// Side of the member's depth: +1 and −1 for flanges, else 0.
    pub(super) fn sign(self) -> f64 {
        match self {
            Self::UpperFlange => 1.0,
            Self::LowerFlange => -1.0,
            Self::Web | Self::Wall => 0.0,
        }
    }
}

/// A box of any direction, mm.
#[derive(Clone, Copy, Debug)]
pub(super) struct Slab {
    pub(super) centre: DVec3,
    pub(super) axes: [DVec3; 3],
    pub(super) half: DVec3,
}

impl Slab {
    fn new(centre: DVec3, axes: [DVec3; 3], half: DVec3) -> Option<Self> {
        let finite = centre.is_finite() && half.is_finite() && axes.iter().all(|axis| axis.is_finite());
        (finite && half.min_element() >= 0.0).then_some(Self { centre, axes, half })
    }

    /// The box of a plate: its outline's extents and its thickness. `None` if it has no usable numbers.
    pub(super) fn of_plate(plate: &Plate) -> Option<Self> {
        let first = *plate.outline.first()?;
        let (lo, hi) = plate.outline.iter().fold((first, first), |(lo, hi), p| (lo.min(*p), hi.max(*p)));
        let (mid, half) = ((lo + hi) / 2.0, (hi - lo) / 2.0);
        Self::new(
            plate.centre + plate.u * mid.x + plate.v * mid.y,
            [plate.u, plate.v, plate.normal],
            half.extend(plate.thickness.get() / 2.0),
        )
    }

    /// The box round a member.
    pub(super) fn of_member(member: &Member) -> Option<Self> {
        let length = member.start.distance(member.end);
        Self::new(
            (member.start + member.end) / 2.0,
            [member.across, member.depth, member.along],
            DVec3::new(member.extents.x / 2.0, member.extents.y / 2.0, length / 2.0),
        )
    }

    /// Its corners' extents in the world.
    pub(super) fn bounds(&self) -> (DVec3, DVec3) {
        let reach =
            self.axes[0].abs() * self.half.x + self.axes[1].abs() * self.half.y + self.axes[2].abs() * self.half.z;
        (self.centre - reach, self.centre + reach)
    }

    /// A world point in the box's own axes, from its middle.
    pub(super) fn local(&self, point: DVec3) -> DVec3 {
        let from = point - self.centre;
        DVec3::from_array(self.axes.map(|axis| axis.dot(from)))
    }

    /// The widest gap between two boxes over all separating directions; not above 0 where they overlap.
    ///
    /// Near corners it is less than the true distance, by less than the tolerance that it is held against.
    pub(super) fn gap(&self, other: &Self) -> f64 {
        let between = other.centre - self.centre;
        let crosses = self.axes.iter().flat_map(|a| other.axes.iter().map(|b| a.cross(*b)));
        self.axes
            .iter()
            .chain(&other.axes)
            .copied()
            .chain(crosses)
            .filter(|axis| axis.length_squared() > 1e-6)
            .map(|axis| axis.normalize())
            .map(|axis| between.dot(axis).abs() - self.reach(axis) - other.reach(axis))
            .fold(f64::NEG_INFINITY, f64::max)
    }

    fn reach(&self, axis: DVec3) -> f64 {
        (0..3).map(|i| self.half[i] * self.axes[i].dot(axis).abs()).sum()
    }

    /// Whether the straight line from `a` to `b` enters the box.
    pub(super) fn is_entered_by(&self, a: DVec3, b: DVec3) -> bool {
        let (from, to) = (self.local(a), self.local(b));
        let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
        for i in 0..3 {
            let run = to[i] - from[i];
            if run.abs() < 1e-12 {
                if !(from[i].abs() <= self.half[i]) {
                    return false;
                }
                continue;
            }
            let (one, two) = ((-self.half[i] - from[i]) / run, (self.half[i] - from[i]) / run);
            enter = enter.max(one.min(two));
            leave = leave.min(one.max(two));
        }
        enter <= leave
    }
}

/// A member's plies in its cut length. Where the section is not known, flanges and web have no thickness: a bolt
/// through the flange's outer face or the web's middle plane is still found.
pub(super) fn plies(member: &Member) -> Vec<(Ply, Slab)> {
    let Some(whole) = Slab::of_member(member) else { return Vec::new() };
    if member.shape != Shape::I {
        return vec![(Ply::Wall, whole)];
    }
    let (t_f, t_w) = thicknesses(member);
    let (b, h) = (whole.half.x, whole.half.y);
    let flange = |sign: f64| Slab {
        centre: whole.centre + member.depth * sign * (h - t_f / 2.0),
        half: DVec3::new(b, t_f / 2.0, whole.half.z),
        ..whole
    };
    let web = Slab { half: DVec3::new(t_w / 2.0, (h - t_f).max(0.0), whole.half.z), ..whole };
    vec![(Ply::UpperFlange, flange(1.0)), (Ply::LowerFlange, flange(-1.0)), (Ply::Web, web)]
}

/// t_f and t_w of a member, mm; 0 where its section is not known.
pub(super) fn thicknesses(member: &Member) -> (f64, f64) {
    member.section.as_ref().map_or((0.0, 0.0), |s| (s.value.t_f.get().max(0.0), s.value.t_w.get().max(0.0)))
}
