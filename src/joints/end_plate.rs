//! Lays out an end-plate joint on a column's flange, or says why it can't be.

use glam::DVec2;

use super::Laid;
use super::bolts::{self, Behind};
use super::boxes::Ply;
use super::draft::{Draft, Seat};
use super::frame::{Frame, Span, are_parallel};
use super::haunch;
use super::layout::{EndPlate, EndPlateLayout, FullButts, Haunch, Layout, MemberAt, Welds};
use super::scene::Scene;
use super::stiffeners::{self, OnColumn};
use super::touch::{EndOn, Pass};
use super::welds::{self, Role};
use crate::units::mm;

/// A column's end further than this from the joint, mm, is no end for any check.
const RUNS_ON: f64 = 10_000.0;

/// Beam depths that are not within 60° of the vertical have no upper flange to speak of.
pub(super) const UPRIGHT: f64 = 0.5;

/// An end-plate joint before it is laid out.
pub(super) struct Case<'a> {
    pub(super) frame: Frame,
    pub(super) plate: usize,
    pub(super) end: EndOn,
    /// Other member ends on the same plate.
    pub(super) others: &'a [EndOn],
    pub(super) column: usize,
    /// The flange that the bolts pass through.
    pub(super) ply: Ply,
    pub(super) welds: Vec<(usize, Role)>,
}

/// Puts the layout (or the reason why there is none), the seat and the roles of plates and welds into the draft.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft, case: &Case) {
    let column = &scene.steel.members[case.column];
    draft.seat = Some(Seat {
        column: case.column,
        flange: case.ply.sign(),
        level: (case.frame.origin - column.start).dot(column.along),
        depth: scene.steel.members[case.end.member].extents.y,
    });
    let outline = case.frame.outline(&scene.steel.plates[case.plate]);
    let bolted: Vec<usize> = draft.joint.plates.iter().map(|(plate, _)| *plate).collect();
    let on_column = Span::of(outline.iter().map(|p| p.y))
        .map(|heights| stiffeners::find(scene, case, heights, &bolted))
        .unwrap_or_default();
    for (_, plates, welded) in &on_column.stiffeners {
        draft.joint.plates.extend(plates.iter().map(|plate| (*plate, "stiffener")));
        draft.joint.welds.extend(welded.iter().map(|weld| (*weld, Role::Stiffener.word())));
    }
    let strengthening = &on_column.strengthening;
    draft.joint.plates.retain(|(plate, _)| !strengthening.plates.iter().any(|(other, _)| other == plate));
    draft.joint.plates.extend(&strengthening.plates);
    let welded = strengthening.welds.iter().filter(|weld| !case.welds.iter().any(|(other, _)| other == *weld));
    draft.joint.welds.extend(welded.map(|weld| (*weld, Role::Stiffener.word())));
    let listed: Vec<usize> = draft.joint.plates.iter().map(|(plate, _)| *plate).collect();
    draft.joint.plates.extend(on_column.others.iter().filter(|p| !listed.contains(p)).map(|plate| (*plate, "plate")));
    draft.joint.layout = assessable(scene, case, &outline, &bolted)
        .and_then(|()| haunch::find(scene, &case.frame, case.plate, case.end.member, &bolted, case.others))
        .and_then(|haunch| {
            every_bolt_passes_flange(scene, draft, case)?;
            let below = haunch.map(|found| take(draft, found));
            laid_out(scene, draft, case, &outline, on_column, below)
        })
        .map(|layout| Laid::Plates(Box::new(Layout::EndPlate(layout))));
}

/// # Errors
/// One sentence on the first thing that the assessment does not cover.
fn assessable(scene: &Scene, case: &Case, outline: &[DVec2], bolted: &[usize]) -> Result<(), String> {
    let (beam, column) = (&scene.steel.members[case.end.member], &scene.steel.members[case.column]);
    let plate = &scene.steel.plates[case.plate];
    let tolerances = scene.tolerances();
    let (touch, position, angle) = (tolerances.touch.get(), tolerances.position.get(), tolerances.angle);
    for (role, member) in [("beam", case.end.member), ("column", case.column)] {
        if let Some(why) = &scene.steel.members[member].not_assessed {
            return Err(format!("{role}: {why}"));
        }
    }
    if !(case.frame.up.z >= UPRIGHT) {
        return Err("the supported member is vertical or lies on its side: not assessed yet".into());
    }
    if !(case.end.slope <= angle) {
        let rises = beam.along.dot(case.frame.up).abs() >= beam.along.dot(case.frame.side).abs();
        let how = if rises { "beam slopes" } else { "beam is skewed in plan by" };
        return Err(format!("{how} {:.1}° to the end plate's normal: not assessed yet", case.end.slope));
    }
    if !are_parallel(case.frame.up, column.along, angle) {
        return Err("the beam's depth is not parallel to the column's axis: not assessed yet".into());
    }
    if !are_parallel(case.frame.out, column.depth, angle) {
        return Err("the end plate is not parallel to the column's flange: not assessed yet".into());
    }
    if !(case.end.gap <= touch) {
        return Err(format!("the beam's end stands {:.1} mm off the end plate: not assessed", case.end.gap));
    }
    if !(case.end.gap >= -touch) {
        return Err(format!("the beam runs {:.1} mm into the end plate: not assessed", -case.end.gap));
    }
    let eccentric = (case.frame.origin - column.start).dot(column.across).abs();
    if !(eccentric <= position) {
        return Err(format!("beam is eccentric to the column's web by {eccentric:.1} mm: not assessed"));
    }
    let face = column.start + column.depth * case.ply.sign() * column.extents.y / 2.0;
    let packing = packing(scene, case, bolted);
    let packed: f64 = packing.iter().map(|pack| scene.steel.plates[*pack].thickness.get()).sum();
    let gap = -plate.thickness.get() - packed - case.frame.outward(face);
    for pack in &packing {
        if let Some(why) = not_rigid(scene, case, *pack, outline) {
            let thickness = scene.steel.plates[*pack].thickness.get();
            return Err(format!("{thickness:.1} mm of packing under the end plate {why}: not assessed yet"));
        }
    }
    if !(gap.abs() <= touch) {
        let how = if gap > 0.0 { "stands off" } else { "runs into" };
        return Err(format!("the end plate {how} the column's flange by {:.1} mm: not assessed", gap.abs()));
    }
    if !is_rectangular(outline, position) {
        return Err("the end plate is no upright rectangle: not assessed yet".into());
    }
    Ok(())
}

/// Bolted plates between the end plate and the column's flange, from the end plate on.
pub(super) fn packing(scene: &Scene, case: &Case, bolted: &[usize]) -> Vec<usize> {
    let column = &scene.steel.members[case.column];
    let face = case.frame.outward(column.start + column.depth * case.ply.sign() * column.extents.y / 2.0);
    let end_plate = -scene.steel.plates[case.plate].thickness.get();
    let out = |plate: &usize| case.frame.outward(scene.steel.plates[*plate].centre);
    let between = |plate: &usize| *plate != case.plate && out(plate) < end_plate && out(plate) > face;
    let mut packing: Vec<usize> = bolted.iter().copied().filter(between).collect();
    packing.sort_by(|a, b| out(b).total_cmp(&out(a)).then(a.cmp(b)));
    packing
}

/// Why a packing plate is no rigid one under all of the end plate, in a clause.
fn not_rigid(scene: &Scene, case: &Case, pack: usize, outline: &[DVec2]) -> Option<&'static str> {
    let (position, angle) = (scene.tolerances().position.get(), scene.tolerances().angle);
    let plate = &scene.steel.plates[pack];
    if !are_parallel(case.frame.out, plate.normal, angle) {
        return Some("is not parallel to it");
    }
    let own = case.frame.outline(plate);
    let (x, y) = Span::of(own.iter().map(|p| p.x)).zip(Span::of(own.iter().map(|p| p.y)))?;
    let covers = |p: &DVec2| {
        p.x >= x.lo - position && p.x <= x.hi + position && p.y >= y.lo - position && p.y <= y.hi + position
    };
    if !is_rectangular(&own, position) || !outline.iter().all(covers) {
        return Some("does not reach under all of it");
    }
    None
}

/// A haunch belongs to the joint: its plates and welds, and how far down it sits on the column.
fn take(draft: &mut Draft, found: haunch::Found) -> Haunch {
    draft.joint.plates.extend(found.plates.iter().map(|plate| (*plate, "haunch")));
    draft.joint.welds.extend(found.welds.iter().map(|weld| (*weld, "haunch")));
    if let Some(seat) = &mut draft.seat {
        let depth = found.haunch.depth.get();
        (seat.level, seat.depth) = (seat.level - depth, seat.depth + depth);
    }
    found.haunch
}

fn every_bolt_passes_flange(scene: &Scene, draft: &Draft, case: &Case) -> Result<(), String> {
    if draft.joint.bolts.iter().any(|bolt| scene.steel.bolts[*bolt].anchor) {
        return Err("among its bolts are anchors: not assessed yet".into());
    }
    let flange = Pass::Member(case.column, case.ply);
    let count = draft.joint.bolts.iter().filter(|bolt| !scene.touches.passes[**bolt].contains(&flange)).count();
    if count > 0 {
        let all = draft.joint.bolts.len();
        return Err(format!("{count} of {all} bolts do not pass through the column's flange: not assessed"));
    }
    Ok(())
}

/// Whether each corner of the outline's extents is a corner of it, and every other corner lies on an edge.
pub(super) fn is_rectangular(outline: &[DVec2], within: f64) -> bool {
    let (Some(x), Some(y)) = (Span::of(outline.iter().map(|p| p.x)), Span::of(outline.iter().map(|p| p.y))) else {
        return false;
    };
    let on_edge =
        |p: &DVec2| [p.x - x.lo, x.hi - p.x, p.y - y.lo, y.hi - p.y].into_iter().any(|distance| distance <= within);
    let corners = [(x.lo, y.lo), (x.hi, y.lo), (x.hi, y.hi), (x.lo, y.hi)];
    outline.iter().all(on_edge)
        && corners.iter().all(|(x, y)| outline.iter().any(|p| p.distance(DVec2::new(*x, *y)) <= within))
}

fn laid_out(
    scene: &Scene,
    draft: &mut Draft,
    case: &Case,
    outline: &[DVec2],
    on_column: OnColumn,
    haunch: Option<Haunch>,
) -> Result<EndPlateLayout, String> {
    let column = &scene.steel.members[case.column];
    let plate = plate_at(scene, case.plate, outline)?;
    let mut bolts = bolts::lay_out(scene, draft, &case.frame, case.plate, Behind::Column(case.column))?;
    let bolted: Vec<usize> = draft.joint.plates.iter().map(|(plate, _)| *plate).collect();
    let packing = packing(scene, case, &bolted);
    for pack in &packing {
        let holds = |bolt: &&usize| scene.touches.passes[**bolt].contains(&Pass::Plate(*pack));
        let (through, all) = (draft.joint.bolts.iter().filter(holds).count(), draft.joint.bolts.len());
        if through < all {
            return Err(format!("{through} of {all} bolts pass through the packing: not assessed"));
        }
    }
    bolts.held.packing = packing.iter().map(|pack| scene.steel.plates[*pack].thickness).collect();
    for (plate, role) in &mut draft.joint.plates {
        if packing.contains(plate) {
            *role = "packing";
        }
    }
    let rows = Span::of(bolts.rows.iter().map(|row| row.height.get())).ok_or("the joint has no bolts")?;
    let ends = [column.start, column.end].map(|end| case.frame.height(end));
    let (above, below) = (ends[0].max(ends[1]) - rows.hi, rows.lo - ends[0].min(ends[1]));
    let mut not_credited = on_column.not_credited;
    let backing = draft.joint.plates.iter().filter(|(other, role)| *other != case.plate && *role == "plate");
    let under = backing.filter(|(other, _)| !on_column.others.contains(other)).count();
    not_credited.extend((under > 0).then(|| stiffeners::not_credited("plate under the bolts", under)));
    not_credited.sort();
    Ok(EndPlateLayout {
        column: member_at(scene, case.column),
        beam: member_at(scene, case.end.member),
        plate,
        bolts,
        welds: welds_at(scene, &case.frame, case.end.member, &case.welds),
        haunch,
        stiffeners: on_column.stiffeners.into_iter().map(|(stiffener, _, _)| stiffener).collect(),
        strengthening: on_column.strengthening.layout,
        column_above: (above <= RUNS_ON).then_some(mm(above)),
        column_below: (below <= RUNS_ON).then_some(mm(below)),
        not_credited,
    })
}

pub(super) fn member_at(scene: &Scene, member: usize) -> MemberAt {
    let member = &scene.steel.members[member];
    MemberAt {
        guid: member.identity.guid.clone(),
        mark: member.identity.mark.clone(),
        section: member.section.clone(),
        grade: member.grade.clone(),
    }
}

/// An end plate with its outline in the joint's frame.
pub(super) fn plate_at(scene: &Scene, plate: usize, outline: &[DVec2]) -> Result<EndPlate, String> {
    let plate = &scene.steel.plates[plate];
    let spans = Span::of(outline.iter().map(|p| p.x)).zip(Span::of(outline.iter().map(|p| p.y)));
    let (wide, high) = spans.ok_or("the end plate has no outline")?;
    Ok(EndPlate {
        guid: plate.identity.guid.clone(),
        thickness: plate.thickness,
        width: mm(wide.size()),
        bottom: mm(high.lo),
        top: mm(high.hi),
        grade: plate.grade.clone(),
    })
}

/// The throats of a member's welds to its end plate, `frame` being that member's own.
pub(super) fn welds_at(scene: &Scene, frame: &Frame, member: usize, roles: &[(usize, Role)]) -> Welds {
    let throat = |role, what| welds::throat(scene, frame, member, roles, role, what);
    let full = |role| welds::full_butt(scene, frame, member, roles, role);
    Welds {
        flange_top: throat(Role::FlangeTop, "weld at the top flange"),
        flange_bottom: throat(Role::FlangeBottom, "weld at the bottom flange"),
        web: throat(Role::Web, "weld at the web"),
        full: FullButts {
            flange_top: full(Role::FlangeTop),
            flange_bottom: full(Role::FlangeBottom),
            web: full(Role::Web),
        },
    }
}
