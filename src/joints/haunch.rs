//! A haunch below a beam, welded from two plates or cut from a rolled section: what it is made of, and its sizes in the
//! joint's frame.

use glam::DVec2;

use super::boxes::Slab;
use super::frame::{Frame, Span, are_parallel, are_square, corners};
use super::layout::Haunch;
use super::scene::{Scene, shared};
use super::touch::EndOn;
use super::welds;
use crate::origin::Known;
use crate::rulebook::Grade;
use crate::shop::{Part, Plate, Shape};
use crate::units::{Length, mm};

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

/// Why a member beside the beam is not taken as a haunch.
const NO_SECTION: &str = "another member ends on the same end plate (a haunch?): not assessed yet";

/// What a haunch is made of, in the joint's frame: flange and web as (outward, height).
struct Shapes {
    guids: Vec<String>,
    /// Across: the middles of web and flange.
    middles: [f64; 2],
    width: f64,
    flange_thickness: Length,
    web_thickness: Length,
    grades: [Known<Grade>; 2],
    /// The flange's middle plane: its height at the end plate, and its rise per mm outward.
    at_plate: f64,
    rise: f64,
    /// How far from the end plate the flange begins and ends.
    reach: Span,
    web: Vec<DVec2>,
    /// The welds of flange and web to the end plate.
    welds: [Vec<usize>; 2],
}

/// The haunch below a beam, if there is one. `others`: other members' ends on the same plate.
///
/// # Errors
/// One sentence where something stands on the end plate beside the beam that is not taken as a haunch.
pub(super) fn find(
    scene: &Scene,
    frame: &Frame,
    plate: usize,
    beam: usize,
    bolted: &[usize],
    others: &[EndOn],
) -> Result<Option<Found>, String> {
    let beside = beside_beam(scene, frame, plate, beam, bolted);
    match others {
        [] => {}
        [haunch] if beside.is_empty() => return cut_from_section(scene, frame, (plate, beam), haunch).map(Some),
        _ => return Err(NO_SECTION.into()),
    }
    let side = |i: &usize| scene.steel.plates[*i].normal;
    let angle = scene.tolerances().angle;
    let (webs, others): (Vec<usize>, Vec<usize>) =
        beside.iter().partition(|i| are_parallel(side(i), frame.side, angle));
    match (&webs[..], &others[..]) {
        ([], []) => Ok(None),
        ([web], [flange]) if are_square(side(flange), frame.side, angle) => {
            let shapes = of_plates(scene, frame, plate, *web, *flange)?;
            laid_out(scene, frame, beam, shapes, vec![*flange, *web]).map(Some)
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

fn of_plates(scene: &Scene, frame: &Frame, plate: usize, web: usize, flange: usize) -> Result<Shapes, String> {
    let (web_plate, flange_plate) = (&scene.steel.plates[web], &scene.steel.plates[flange]);
    let across = |plate: &Plate| Span::of(corners(plate).map(|p| frame.across(p))).ok_or(NO_HAUNCH);
    let (web_across, wide) = (across(web_plate)?, across(flange_plate)?);
    let rise = -flange_plate.normal.dot(frame.out) / flange_plate.normal.dot(frame.up);
    let at = |part: usize| -> Vec<usize> {
        shared(scene.welds_at(Part::Plate(plate)), scene.welds_at(Part::Plate(part))).collect()
    };
    Ok(Shapes {
        guids: [flange_plate, web_plate].map(|plate| plate.identity.guid.clone()).to_vec(),
        middles: [web_across.mid(), wide.mid()],
        width: wide.size(),
        flange_thickness: flange_plate.thickness,
        web_thickness: web_plate.thickness,
        grades: [flange_plate.grade.clone(), web_plate.grade.clone()],
        at_plate: frame.height(flange_plate.centre) - rise * frame.outward(flange_plate.centre),
        rise,
        reach: Span::of(profile(frame, flange_plate).iter().map(|p| p.x)).ok_or(NO_HAUNCH)?,
        web: profile(frame, web_plate),
        welds: [at(flange), at(web)],
    })
}

/// A haunch cut from an I section: its flange away from the beam and its web as far as they stand between the end plate
/// and the beam's soffit. A member does not tell along which line it was cut; two bodies fill no place twice, so that what
/// would reach into the beam is taken as cut away.
fn cut_from_section(scene: &Scene, frame: &Frame, (plate, beam): (usize, usize), end: &EndOn) -> Result<Found, String> {
    let member = &scene.steel.members[end.member];
    if let Some(why) = &member.not_assessed {
        return Err(format!("a haunch?: {why}"));
    }
    let section = match &member.section {
        Ok(section) if member.shape == Shape::I => &section.value,
        _ => return Err(NO_SECTION.into()),
    };
    let along = if end.at_end { -member.along } else { member.along };
    if !are_parallel(member.across, frame.side, scene.tolerances().angle) {
        return Err(NO_SECTION.into());
    }
    let rise = along.dot(frame.up) / along.dot(frame.out);
    // What stands square to the member's axis, measured along the end plate.
    let upright = |size: f64| size * (1.0 + rise * rise).sqrt();
    let (point, tip) = if end.at_end { (member.end, member.start) } else { (member.start, member.end) };
    let middle = frame.height(point) - rise * frame.outward(point);
    let (half, t_f) = (member.extents.y / 2.0, section.t_f.get());
    let underside = middle - upright(half);
    // The underside's ends; a mitred end is told by its furthest corner.
    let down = -member.depth * member.depth.dot(frame.up).signum() * half;
    let (from, to) = (frame.outward(point + down), frame.outward(tip + down));
    if !(rise > frame.rise && underside < 0.0) {
        return Err(NO_SECTION.into());
    }
    let root = underside + upright(t_f);
    let (low, high) = (from.max(0.0), to.min(-root / (rise - frame.rise)));
    let top = |x: f64| (middle + upright(half - t_f) + rise * x).min(frame.rise * x);
    let web = [(low, root + rise * low), (high, root + rise * high), (high, top(high)), (low, top(low))];
    let (across, wide) = (frame.across((point + tip) / 2.0), member.extents.x);
    let (flange_welds, web_welds) = welds_of_section(scene, frame, plate, end.member, underside + upright(t_f / 2.0));
    let shapes = Shapes {
        guids: vec![member.identity.guid.clone()],
        middles: [across, across],
        width: wide,
        flange_thickness: section.t_f,
        web_thickness: section.t_w,
        grades: [member.grade.clone(), member.grade.clone()],
        at_plate: underside + upright(t_f / 2.0),
        rise,
        reach: Span { lo: low, hi: to.min(-underside / (rise - frame.rise)) },
        web: web.map(DVec2::from).to_vec(),
        welds: [flange_welds, web_welds],
    };
    laid_out(scene, frame, beam, shapes, Vec::new())
}

/// The welds between a haunch cut from a section and the end plate, at its flange and at its web.
fn welds_of_section(
    scene: &Scene,
    frame: &Frame,
    plate: usize,
    member: usize,
    flange: f64,
) -> (Vec<usize>, Vec<usize>) {
    let (mut at_flange, mut at_web) = (Vec::new(), Vec::new());
    for weld in shared(scene.welds_at(Part::Plate(plate)), scene.welds_at(Part::Member(member))) {
        let Some((across, heights)) = welds::spans(scene, frame, weld) else { continue };
        let wide = across.size() >= scene.steel.members[member].extents.x / 2.0;
        let at = wide && heights.lo - welds::BESIDE <= flange && flange <= heights.hi + welds::BESIDE;
        let upright = across.mid().abs() <= welds::BESIDE && heights.mid() < 0.0 && heights.mid() > flange;
        if at {
            at_flange.push(weld);
        }
        if upright && heights.size() > -flange / 2.0 {
            at_web.push(weld);
        }
    }
    (at_flange, at_web)
}

fn laid_out(scene: &Scene, frame: &Frame, beam: usize, shapes: Shapes, plates: Vec<usize>) -> Result<Found, String> {
    let tolerances = scene.tolerances();
    let (touch, position) = (tolerances.touch.get(), tolerances.position.get());
    let [a, b] = shapes.middles.map(f64::abs);
    let eccentric = if a <= b { b } else { a };
    if !(a <= position && b <= position) {
        return Err(format!("the haunch is eccentric to the beam's web by {eccentric:.1} mm: not assessed"));
    }
    let Shapes { at_plate, rise, reach, .. } = shapes;
    let to_normal = rise.atan().to_degrees();
    let angle = to_normal - frame.slope();
    if !(angle > 0.0) {
        return Err(NO_HAUNCH.into());
    }
    let t = shapes.flange_thickness.get();
    let upright = t / to_normal.to_radians().cos();
    // The flange runs from the end plate (mitred or square) to the beam's soffit.
    let end = at_plate + (rise - frame.rise) * reach.hi;
    if !(reach.lo <= t + touch && end.abs() <= upright + touch) {
        let ends = [format!("{:.1} mm off the end plate", reach.lo), format!("{:.1} mm off the beam's soffit", end)];
        return Err(format!("the haunch's flange ends {}: not assessed yet", ends.join(" and ")));
    }
    let depth = -(at_plate - upright / 2.0);
    if !(depth > upright) {
        return Err(NO_HAUNCH.into());
    }
    // The web fills the triangle between soffit, end plate and flange.
    let web = &shapes.web;
    let above = Span::of(web.iter().map(|p| p.y - frame.rise * p.x)).ok_or(NO_HAUNCH)?;
    let on_plate = Span::of(web.iter().filter(|p| p.x <= touch).map(|p| p.y)).ok_or(NO_HAUNCH)?;
    let full = on_plate.hi >= -2.0 * touch - t && on_plate.lo <= at_plate + upright;
    let fills = area(web) >= 0.8 * 0.5 * (depth - upright) * reach.hi;
    if !(above.hi <= touch && full && fills) {
        return Err("the haunch's web does not fill it from the end plate to its flange's end: not assessed yet".into());
    }
    let [flange_welds, web_welds] = shapes.welds;
    let [flange_grade, web_grade] = shapes.grades;
    let haunch = Haunch {
        guids: shapes.guids,
        depth: mm(depth),
        length: mm(reach.hi),
        angle,
        flange_thickness: shapes.flange_thickness,
        flange_width: mm(shapes.width),
        web_thickness: shapes.web_thickness,
        flange_grade,
        web_grade,
        flange_weld: welds::least_throat(scene, &flange_welds, "weld at the haunch's flange"),
        stiffened: scene.touches.plates_of[beam].iter().any(|i| {
            let plate = &scene.steel.plates[*i];
            let off = (frame.outward(plate.centre) - reach.hi).abs();
            are_parallel(plate.normal, frame.out, tolerances.angle + frame.slope().abs()) && off <= NEAR_END
        }),
        web_weld: welds::least_throat(scene, &web_welds, "weld at the haunch's web"),
    };
    let mut all: Vec<usize> = flange_welds.into_iter().chain(web_welds).collect();
    all.sort_unstable();
    all.dedup();
    Ok(Found { haunch, plates, welds: all })
}

/// Of a polygon, whichever way round.
fn area(shape: &[DVec2]) -> f64 {
    let after = shape.iter().cycle().skip(1);
    shape.iter().zip(after).map(|(a, b)| a.perp_dot(*b)).sum::<f64>().abs() / 2.0
}
