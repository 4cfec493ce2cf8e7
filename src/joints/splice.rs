//! Lays out two beams' end plates that are bolted to each other, or says why they can't be.

use std::collections::BTreeSet;

use glam::DVec2;

use super::Laid;
use super::bolts::{self, Behind};
use super::cut;
use super::draft::Draft;
use super::end_plate::{self, UPRIGHT};
use super::frame::{Frame, are_parallel};
use super::haunch;
use super::layout::{Half, Layout, SpliceLayout};
use super::recognise::{covers_both_flanges, reaches_a_flange, say_how_joined};
use super::scene::Scene;
use super::touch::{EndOn, Pass};
use super::welds::{self, Role};
use crate::shop::Shape;
use crate::units::mm;

/// One half as found in the steel.
struct Found {
    plate: usize,
    end: EndOn,
    /// Its own frame, from its own soffit.
    frame: Frame,
    welds: Vec<(usize, Role)>,
}

/// Puts the layout (or the reason why there is none) and the roles of the welds into the draft.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft, plates: &[usize]) {
    let found = match halves(scene, draft, plates) {
        Ok(found) => found,
        Err(why) => return draft.joint.layout = Err(why),
    };
    let mut roles: Vec<(usize, &'static str)> = Vec::new();
    for half in &found {
        welds::say_where_names_disagree(scene, &half.welds, &mut draft.joint.disagreements);
        say_how_joined(scene, half.plate, &half.end, &half.welds, &mut draft.joint.disagreements);
        roles.extend(half.welds.iter().map(|(weld, role)| (*weld, role.word())));
    }
    let placed: BTreeSet<usize> = roles.iter().map(|(weld, _)| *weld).collect();
    roles.extend(draft.joint.welds.iter().filter(|(weld, _)| !placed.contains(weld)));
    draft.joint.welds = roles;
    draft.joint.layout = laid_out(scene, draft, &found).map(|layout| Laid::Plates(Box::new(Layout::Splice(layout))));
}

/// The half of the supported member, then the other.
fn halves(scene: &Scene, draft: &Draft, plates: &[usize]) -> Result<[Found; 2], String> {
    let [a, b] = plates else {
        return Err(format!("{} end plates are bolted to each other: not assessed", plates.len()));
    };
    let mut halves = Vec::new();
    for plate in [*a, *b] {
        let ends = cut::ends_on(scene, plate);
        let end = *ends.first().ok_or("no member ends on the end plate")?;
        // A fillet behind a thin plate reaches through it: a member belongs to the plate that it sits on.
        let sits_on_the_other = |end: &EndOn| {
            let other = if plate == *a { *b } else { *a };
            let own = |o: &EndOn| (o.member, o.at_end) == (end.member, end.at_end) && o.gap.abs() < end.gap.abs();
            cut::ends_on(scene, other).iter().any(own)
        };
        if !ends.iter().skip(1).all(sits_on_the_other) {
            return Err("another member ends on the same end plate (a haunch?): not assessed yet".into());
        }
        let member = &scene.steel.members[end.member];
        let frame = Frame::new(member, &end, &scene.steel.plates[plate]).ok_or("the end plate has no direction")?;
        let welds = welds::at_plate(scene, &frame, end.member, plate);
        halves.push(Found { plate, end, frame, welds });
    }
    halves.sort_by_key(|half| Some(half.end.member) != draft.joint.supported);
    let halves: [Found; 2] = halves.try_into().map_err(|_| "it has no two halves")?;
    if halves[0].end.member == halves[1].end.member {
        return Err("both end plates are of one member: not assessed".into());
    }
    Ok(halves)
}

fn laid_out(scene: &Scene, draft: &mut Draft, halves: &[Found; 2]) -> Result<SpliceLayout, String> {
    let frame = halves[0].frame;
    for half in halves {
        assessable(scene, half, &frame)?;
    }
    together(scene, draft, halves)?;
    let [supported, supporting] = halves;
    let bolts = bolts::lay_out(scene, draft, &frame, supported.plate, Behind::Plate(supporting.plate))?;
    Ok(SpliceLayout { supported: half(scene, supported, &frame)?, supporting: half(scene, supporting, &frame)?, bolts })
}

/// # Errors
/// One sentence on the first thing about one half that the assessment does not cover.
fn assessable(scene: &Scene, half: &Found, frame: &Frame) -> Result<(), String> {
    let Found { plate, end, .. } = half;
    let beam = &scene.steel.members[end.member];
    let tolerances = scene.tolerances();
    let (touch, position, angle) = (tolerances.touch.get(), tolerances.position.get(), tolerances.angle);
    if let Some(why) = &beam.not_assessed {
        return Err(format!("beam: {why}"));
    }
    if beam.shape != Shape::I {
        return Err("a member with an end plate is no I section: not assessed yet".into());
    }
    if !(half.frame.up.z >= UPRIGHT) {
        return Err(
            "the members are vertical or lie on their side, so that no flange is the top one: not assessed yet".into(),
        );
    }
    if !(end.slope <= angle) {
        let rises = beam.along.dot(half.frame.up).abs() >= beam.along.dot(half.frame.side).abs();
        let how = if rises { "a beam slopes" } else { "a beam is skewed in plan by" };
        return Err(format!("{how} {:.1}° to the end plate's normal (an apex?): not assessed yet", end.slope));
    }
    if !(end.gap <= touch) {
        return Err(format!("a beam's end stands {:.1} mm off its end plate: not assessed", end.gap));
    }
    if !(end.gap >= -touch) {
        return Err(format!("a beam runs {:.1} mm into its end plate: not assessed", -end.gap));
    }
    if !end_plate::is_rectangular(&outline(scene, half, frame), position) {
        return Err("an end plate is no upright rectangle: not assessed yet".into());
    }
    if !covers_both_flanges(scene, &half.frame, end, *plate) {
        return Err("an end plate does not cover both flanges of its beam: not assessed yet".into());
    }
    if !reaches_a_flange(&half.welds) {
        return Err("an end plate is welded to its beam's web only: not assessed yet".into());
    }
    if !haunch::beside_beam(scene, &half.frame, *plate, end.member, &[]).is_empty() {
        return Err("a plate stands on an end plate beside its beam (a haunch or a rib): not assessed yet".into());
    }
    Ok(())
}

/// # Errors
/// One sentence on the first thing about the two halves that the assessment does not cover.
fn together(scene: &Scene, draft: &Draft, [one, two]: &[Found; 2]) -> Result<(), String> {
    let tolerances = scene.tolerances();
    let (touch, position, angle) = (tolerances.touch.get(), tolerances.position.get(), tolerances.angle);
    let frame = &one.frame;
    let facing = frame.out.dot(two.frame.out) < 0.0;
    if !(facing && are_parallel(frame.out, two.frame.out, angle) && are_parallel(frame.up, two.frame.up, angle)) {
        return Err("the two beams do not face each other in one plane: not assessed yet".into());
    }
    let eccentric = frame.across(two.frame.origin).abs();
    if !(eccentric <= position) {
        return Err(format!("the beams' webs are {eccentric:.1} mm out of one plane: not assessed"));
    }
    let thickness = |half: &Found| scene.steel.plates[half.plate].thickness.get();
    let gap = -frame.outward(two.frame.origin) - thickness(one) - thickness(two);
    if !(gap.abs() <= touch) {
        let how = if gap > 0.0 { "stand off each other" } else { "run into each other" };
        return Err(format!("the end plates {how} by {:.1} mm: not assessed", gap.abs()));
    }
    if draft.joint.bolts.iter().any(|bolt| scene.steel.bolts[*bolt].anchor) {
        return Err("among its bolts are anchors: not assessed yet".into());
    }
    let both = [Pass::Plate(one.plate), Pass::Plate(two.plate)];
    let passes = |bolt: &usize| &scene.touches.passes[*bolt];
    let count = draft.joint.bolts.iter().filter(|bolt| !both.iter().all(|plate| passes(bolt).contains(plate))).count();
    if count > 0 {
        let all = draft.joint.bolts.len();
        return Err(format!("{count} of {all} bolts do not pass through both end plates: not assessed"));
    }
    if draft.joint.bolts.iter().any(|bolt| passes(bolt).iter().any(|pass| !both.contains(pass))) {
        return Err("its bolts pass through more than the two end plates: not assessed yet".into());
    }
    Ok(())
}

fn outline(scene: &Scene, half: &Found, frame: &Frame) -> Vec<DVec2> {
    frame.outline(&scene.steel.plates[half.plate])
}

fn half(scene: &Scene, found: &Found, frame: &Frame) -> Result<Half, String> {
    Ok(Half {
        beam: end_plate::member_at(scene, found.end.member),
        soffit: mm(frame.height(found.frame.origin)),
        plate: end_plate::plate_at(scene, found.plate, &outline(scene, found, frame))?,
        welds: end_plate::welds_at(scene, &found.frame, found.end.member, &found.welds),
    })
}
