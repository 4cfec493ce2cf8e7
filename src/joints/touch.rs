//! Touch: which bolt passes through what, what bears on what, which weld joins what. Geometry alone.

use glam::{DVec2, DVec3};
use rayon::prelude::*;

use super::boxes::{Ply, Slab, plies};
use super::near::Grid;
use crate::rulebook::Tolerances;
use crate::shop::{Bolt, Part, Plate, Steelwork};

/// A bolt's axis must cross a ply at less than 60° to its normal to pass through it.
const CROSSES: f64 = 0.5;

/// A member whose end stands up to this far off a plate, mm, is still seen as meant to sit on it.
pub(super) const STANDS_OFF: f64 = 25.0;

/// A member whose axis is inclined to the plate's normal by more than this, degrees, does not end on the plate.
const STEEPEST: f64 = 45.0;

/// What a bolt's shank passes through.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Pass {
    /// A plate.
    Plate(usize),
    /// A ply of a member.
    Member(usize, Ply),
}

/// A member's end that sits on a plate's face, or stands near it.
#[derive(Clone, Copy, Debug)]
pub(super) struct EndOn {
    /// The member.
    pub(super) member: usize,
    /// Which end of it: false = start.
    pub(super) at_end: bool,
    /// From the plate's face to the member's end, mm; negative if the member runs into the plate.
    pub(super) gap: f64,
    /// Between the member's axis and the plate's normal, degrees.
    pub(super) slope: f64,
    /// How far its end's furthest corner stands out from the middle along the normal: what a mitred end reaches beyond the
    /// plate's face with its middle, mm.
    pub(super) mitre: f64,
}

/// Everything that touches.
pub(super) struct Touches {
    /// By bolt.
    pub(super) passes: Vec<Vec<Pass>>,
    /// By plate: member ends on its faces.
    pub(super) ends: Vec<Vec<EndOn>>,
    /// By plate: members that it touches.
    pub(super) members: Vec<Vec<usize>>,
    /// By plate: plates that it touches.
    pub(super) plates: Vec<Vec<usize>>,
    /// By member: plates that touch it.
    pub(super) plates_of: Vec<Vec<usize>>,
    /// By weld: the members and plates at which it lies.
    pub(super) welded: Vec<Vec<Part>>,
}

impl Touches {
    /// Holds every part against its neighbours.
    pub(super) fn find(steel: &Steelwork, tolerances: &Tolerances) -> Self {
        let touch = tolerances.touch.get();
        let plate_boxes: Vec<_> = steel.plates.iter().map(Slab::of_plate).collect();
        let member_boxes: Vec<_> = steel.members.iter().map(Slab::of_member).collect();
        let member_plies: Vec<_> = steel.members.iter().map(plies).collect();
        let (near_plates, near_members) = (Grid::of(&plate_boxes), Grid::of(&member_boxes));

        let passes = steel.bolts.par_iter().map_init(Vec::new, |near, bolt| {
            // A shank modelled as the grip ends at the plies' faces, one modelled as the plate's thickness at the
            // faying surface: it is lengthened by the gap that still counts as touching and as much again.
            let Some((a, b)) = lengthened(bolt, 2.0 * touch) else { return Vec::new() };
            let (lo, hi) = (a.min(b), a.max(b));
            let axis = (b - a).normalize();
            let mut through = Vec::new();
            near_plates.near(lo, hi, near);
            for &i in near.iter() {
                if plate_boxes[i].is_some_and(|slab| passes_plate(&steel.plates[i], &slab, a, b, axis)) {
                    through.push(Pass::Plate(i));
                }
            }
            near_members.near(lo, hi, near);
            for &i in near.iter() {
                for (ply, slab) in &member_plies[i] {
                    let crosses = match ply {
                        Ply::Web => slab.axes[0].dot(axis).abs() >= CROSSES,
                        Ply::Wall => true,
                        _ => slab.axes[1].dot(axis).abs() >= CROSSES,
                    };
                    if crosses && slab.is_entered_by(a, b) {
                        through.push(Pass::Member(i, *ply));
                    }
                }
            }
            through
        });
        let passes = passes.collect();

        let at_plate = plate_boxes.par_iter().enumerate().map_init(Vec::new, |near, (i, slab)| {
            let (mut ends, mut members, mut plates) = (Vec::new(), Vec::new(), Vec::new());
            let Some(slab) = slab else { return (ends, members, plates) };
            let (lo, hi) = grown(slab.bounds(), STANDS_OFF);
            near_members.near(lo, hi, near);
            for &m in near.iter() {
                if member_plies[m].iter().any(|(_, ply)| ply.gap(slab) <= touch) {
                    members.push(m);
                }
                ends.extend(end_on(steel, m, &steel.plates[i], slab, touch));
            }
            near_plates.near(lo, hi, near);
            let touches = |&other: &usize| other != i && plate_boxes[other].is_some_and(|b| b.gap(slab) <= touch);
            plates.extend(near.iter().copied().filter(touches));
            (ends, members, plates)
        });
        let at_plate: Vec<_> = at_plate.collect();
        let (mut ends, mut members, mut plates) = (Vec::new(), Vec::new(), Vec::new());
        let mut plates_of = vec![Vec::new(); steel.members.len()];
        for (plate, (its_ends, its_members, its_plates)) in at_plate.into_iter().enumerate() {
            its_members.iter().for_each(|member: &usize| plates_of[*member].push(plate));
            ends.push(its_ends);
            members.push(its_members);
            plates.push(its_plates);
        }

        let welded = steel.welds.par_iter().map_init(Vec::new, |near, weld| {
            let points = || weld.points.iter().copied().filter(|p| p.is_finite());
            let Some(first) = points().next() else { return Vec::new() };
            let throat = weld.throat.as_ref().map_or(0.0, |a| a.value.get().clamp(0.0, 50.0));
            // A weld given as an axis runs in the root or in the middle of the throat.
            let reach = touch + throat;
            let (lo, hi) = grown(points().fold((first, first), |(lo, hi), p| (lo.min(p), hi.max(p))), reach);
            let mut parts = Vec::new();
            near_members.near(lo, hi, near);
            let at_member = |i: &&usize| member_plies[**i].iter().any(|(_, slab)| lies_at(points(), slab, reach));
            parts.extend(near.iter().filter(at_member).map(|i| Part::Member(*i)));
            near_plates.near(lo, hi, near);
            let at_plate = |i: &&usize| plate_boxes[**i].is_some_and(|slab| lies_at(points(), &slab, reach));
            parts.extend(near.iter().filter(at_plate).map(|i| Part::Plate(*i)));
            parts
        });
        let welded = welded.collect();
        Self { passes, ends, members, plates, plates_of, welded }
    }
}

/// Whether two members come as near as faces that touch.
pub(super) fn members_meet(steel: &Steelwork, a: usize, b: usize, touch: f64) -> bool {
    let (a, b) = (plies(&steel.members[a]), plies(&steel.members[b]));
    a.iter().any(|(_, a)| b.iter().any(|(_, b)| a.gap(b) <= touch))
}

fn lengthened(bolt: &Bolt, by: f64) -> Option<(DVec3, DVec3)> {
    let axis = (bolt.end - bolt.start).try_normalize()?;
    let (a, b) = (bolt.start - axis * by, bolt.end + axis * by);
    (a.is_finite() && b.is_finite()).then_some((a, b))
}

fn grown((lo, hi): (DVec3, DVec3), by: f64) -> (DVec3, DVec3) {
    (lo - DVec3::splat(by), hi + DVec3::splat(by))
}

fn passes_plate(plate: &Plate, slab: &Slab, a: DVec3, b: DVec3, axis: DVec3) -> bool {
    let steepness = plate.normal.dot(axis);
    if !(steepness.abs() >= CROSSES) || !slab.is_entered_by(a, b) {
        return false;
    }
    let point = a + axis * (plate.centre - a).dot(plate.normal) / steepness - plate.centre;
    is_inside(&plate.outline, DVec2::new(point.dot(plate.u), point.dot(plate.v)))
}

/// Even-odd rule.
fn is_inside(outline: &[DVec2], p: DVec2) -> bool {
    let after = outline.iter().cycle().skip(1);
    outline
        .iter()
        .zip(after)
        .filter(|(a, b)| (a.y > p.y) != (b.y > p.y) && p.x < a.x + (b.x - a.x) * (p.y - a.y) / (b.y - a.y))
        .count()
        % 2
        == 1
}

fn lies_at(points: impl Iterator<Item = DVec3>, slab: &Slab, reach: f64) -> bool {
    let (mut lo, mut hi) = (DVec3::INFINITY, DVec3::NEG_INFINITY);
    for point in points.map(|p| slab.local(p)) {
        lo = lo.min(point);
        hi = hi.max(point);
    }
    (0..3).all(|i| lo[i] <= slab.half[i] + reach && hi[i] >= -slab.half[i] - reach)
}

fn end_on(steel: &Steelwork, m: usize, plate: &Plate, slab: &Slab, touch: f64) -> impl Iterator<Item = EndOn> + use<> {
    let member = &steel.members[m];
    let body = Slab::of_member(member);
    let at = |at_end: bool| {
        let body = body?;
        let (point, outward) = if at_end { (member.end, member.along) } else { (member.start, -member.along) };
        let slope = outward.dot(plate.normal).abs().min(1.0).acos().to_degrees();
        if !(slope <= STEEPEST) {
            return None;
        }
        // The normal that points from the plate into the member.
        let into = if outward.dot(plate.normal) > 0.0 { -plate.normal } else { plate.normal };
        let gap = (point - slab.centre).dot(into) - slab.half.z;
        // A square cut of an inclined member meets the plate with one edge only.
        let slack = touch + body.half.y.max(body.half.x) * slope.to_radians().tan();
        let seated = gap <= STANDS_OFF + slack && gap >= -2.0 * slab.half.z - slack;
        let local = slab.local(point);
        let reach =
            |axis: DVec3| member.across.dot(axis).abs() * body.half.x + member.depth.dot(axis).abs() * body.half.y;
        let over =
            local.x.abs() <= slab.half.x + reach(slab.axes[0]) && local.y.abs() <= slab.half.y + reach(slab.axes[1]);
        let mitre = reach(plate.normal);
        (seated && over).then_some(EndOn { member: m, at_end, gap, slope, mitre })
    };
    [at(false), at(true)].into_iter().flatten()
}
