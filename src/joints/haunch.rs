//! A haunch welded from two plates below a beam: which plates it is made of, and its sizes in the joint's frame.

use glam::DVec2;

use super::boxes::Slab;
use super::frame::{Frame, Span, are_parallel, are_square, corners};
use super::layout::Haunch;
use super::scene::{Scene, shared};
use super::welds;
use crate::shop::{Part, Plate};
use crate::units::mm;

/// A haunch as found: its sizes, its plates and the welds at the end plate.
pub(super) struct Found {
    pub(super) haunch: Haunch,
    pub(super) plates: Vec<usize>,
    pub(super) welds: Vec<usize>,
}

/// A stiffener of the beam no further than this from the haunch's end, mm, stands there.
const NEAR_END: f64 = 100.0;

/// Why plates beside the beam are not taken as a haunch.
const NO_HAUNCH: &str = "a plate stands on the end plate beside the beam (a haunch or a rib): not assessed yet";

/// The haunch below a beam, if there is one.
///
/// # Errors
/// One sentence where something stands on the end plate beside the beam that is not taken as a haunch.
pub(super) fn find(
    scene: &Scene,
    frame: &Frame,
    plate: usize,
    beam: usize,
    bolted: &[usize],
) -> Result<Option<Found>, String> {
    let beside = beside_beam(scene, frame, plate, beam, bolted);
    let side = |i: &usize| scene.steel.plates[*i].normal;
    let angle = scene.tolerances().angle;
    let (webs, others): (Vec<usize>, Vec<usize>) =
        beside.iter().partition(|i| are_parallel(side(i), frame.side, angle));
    match (&webs[..], &others[..]) {
        ([], []) => Ok(None),
        ([web], [flange]) if are_square(side(flange), frame.side, angle) => {
            laid_out(scene, frame, (plate, beam), *web, *flange).map(Some)
        }
        _ => Err(NO_HAUNCH.into()),
    }
}

/// Plates that stand on the end plate, reach out from it and do not lie within the beam.
pub(super) fn beside_beam(scene: &Scene, frame: &Frame, plate: usize, beam: usize, bolted: &[usize]) -> Vec<usize> {
    let touch = scene.tolerances().touch.get();
    let beam = Slab::of_member(&scene.steel.members[beam]);
    let beside = |other: &&usize| {
        let plate = &scene.steel.plates[**other];
        let outward = Span::of(corners(plate).map(|p| frame.outward(p)));
        let stands_out = outward.is_some_and(|span| span.lo >= -touch && span.hi > plate.thickness.get() + touch);
        let within = beam.zip(Slab::of_plate(plate)).is_some_and(|(beam, plate)| {
            let beam = Slab { half: beam.half + touch, ..beam };
            let local = beam.local(plate.centre);
            (0..3).all(|i| local[i].abs() <= beam.half[i])
        });
        !bolted.contains(other) && stands_out && !within
    };
    scene.touches.plates[plate].iter().filter(beside).copied().collect()
}

/// A plate's corners as (outward, height).
fn profile(frame: &Frame, plate: &Plate) -> Vec<DVec2> {
    corners(plate).map(|p| DVec2::new(frame.outward(p), frame.height(p))).collect()
}

fn laid_out(
    scene: &Scene,
    frame: &Frame,
    (plate, beam): (usize, usize),
    web: usize,
    flange: usize,
) -> Result<Found, String> {
    let (web_plate, flange_plate) = (&scene.steel.plates[web], &scene.steel.plates[flange]);
    let tolerances = scene.tolerances();
    let (touch, position) = (tolerances.touch.get(), tolerances.position.get());
    let across = |plate: &Plate| Span::of(corners(plate).map(|p| frame.across(p)));
    let (Some(web_across), Some(wide)) = (across(web_plate), across(flange_plate)) else {
        return Err(NO_HAUNCH.into());
    };
    let eccentric = web_across.mid().abs().max(wide.mid().abs());
    if !(eccentric <= position) {
        return Err(format!("the haunch is eccentric to the beam's web by {eccentric:.1} mm: not assessed"));
    }
    // The flange's middle plane: height at the end plate and slope.
    let (n_out, n_up) = (flange_plate.normal.dot(frame.out), flange_plate.normal.dot(frame.up));
    let rise = -n_out / n_up;
    let angle = rise.atan().to_degrees();
    if !(angle > 0.0) {
        return Err(NO_HAUNCH.into());
    }
    let t = flange_plate.thickness.get();
    let upright = t / angle.to_radians().cos();
    let at_plate = frame.height(flange_plate.centre) - rise * frame.outward(flange_plate.centre);
    let (slope, shape) = (profile(frame, flange_plate), profile(frame, web_plate));
    let outward = Span::of(slope.iter().map(|p| p.x)).ok_or(NO_HAUNCH)?;
    // The flange runs from the end plate (mitred or square) to the beam's soffit.
    let end = at_plate + rise * outward.hi;
    if !(outward.lo <= t + touch && end.abs() <= upright + touch) {
        let ends = [format!("{:.1} mm off the end plate", outward.lo), format!("{:.1} mm off the beam's soffit", end)];
        return Err(format!("the haunch's flange ends {}: not assessed yet", ends.join(" and ")));
    }
    let depth = -(at_plate - upright / 2.0);
    if !(depth > upright) {
        return Err(NO_HAUNCH.into());
    }
    // The web fills the triangle between soffit, end plate and flange.
    let heights = Span::of(shape.iter().map(|p| p.y)).ok_or(NO_HAUNCH)?;
    let on_plate = Span::of(shape.iter().filter(|p| p.x <= touch).map(|p| p.y)).ok_or(NO_HAUNCH)?;
    let full = on_plate.hi >= -2.0 * touch - t && on_plate.lo <= at_plate + upright;
    let fills = area(&shape) >= 0.8 * 0.5 * (depth - upright) * outward.hi;
    if !(heights.hi <= touch && full && fills) {
        return Err("the haunch's web does not fill it from the end plate to its flange's end: not assessed yet".into());
    }
    let at = |part: usize| -> Vec<usize> {
        shared(scene.welds_at(Part::Plate(plate)), scene.welds_at(Part::Plate(part))).collect()
    };
    let (flange_welds, web_welds) = (at(flange), at(web));
    let haunch = Haunch {
        guids: [flange_plate, web_plate].map(|plate| plate.identity.guid.clone()).to_vec(),
        depth: mm(depth),
        length: mm(outward.hi),
        angle,
        flange_thickness: flange_plate.thickness,
        flange_width: mm(wide.size()),
        web_thickness: web_plate.thickness,
        flange_grade: flange_plate.grade.clone(),
        web_grade: web_plate.grade.clone(),
        flange_weld: welds::least_throat(scene, &flange_welds, "weld at the haunch's flange"),
        stiffened: scene.touches.plates_of[beam].iter().any(|i| {
            let plate = &scene.steel.plates[*i];
            let off = (frame.outward(plate.centre) - outward.hi).abs();
            are_parallel(plate.normal, frame.out, tolerances.angle) && off <= NEAR_END
        }),
        web_weld: welds::least_throat(scene, &web_welds, "weld at the haunch's web"),
    };
    let mut all: Vec<usize> = flange_welds.into_iter().chain(web_welds).collect();
    all.sort_unstable();
    all.dedup();
    Ok(Found { haunch, plates: vec![flange, web], welds: all })
}

/// Of a polygon, whichever way round.
fn area(shape: &[DVec2]) -> f64 {
    let after = shape.iter().cycle().skip(1);
    shape.iter().zip(after).map(|(a, b)| a.perp_dot(*b)).sum::<f64>().abs() / 2.0
}
