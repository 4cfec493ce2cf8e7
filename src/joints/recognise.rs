//! Names each cluster's kind and says who supports whom.

use std::collections::{BTreeMap, BTreeSet};

use rayon::prelude::*;

use super::boxes::{Ply, Slab, thicknesses};
use super::cut::{self, Cluster};
use super::draft::Draft;
use super::end_plate::{self, Case};
use super::frame::{Frame, Span, are_parallel, are_square};
use super::rank::{are_in_line, of_equal_rank, ranked};
use super::scene::Scene;
use super::splice;
use super::touch::EndOn;
use super::welds::{self, Role};
use super::{Kind, Laid, simple};
use crate::shop::{Member, Part, Shape};

/// A member whose axis is within 60° of the vertical can stand on a base plate.
const STANDS: f64 = 0.5;

/// All clusters as joints, without marks.
pub(super) fn name_kinds(scene: &Scene, clusters: Vec<Cluster>) -> Vec<Draft> {
    let draft = |cluster| match cluster {
        Cluster::EndPlates { plates, bolts } if plates.len() > 1 => Some(splice(scene, &plates, bolts)),
        Cluster::EndPlates { plates, bolts } => end_plate(scene, *plates.first()?, bolts),
        Cluster::Other { bolts } => Some(other(scene, bolts)),
    };
    let mut drafts: Vec<Draft> = clusters.into_par_iter().filter_map(draft).collect();
    drafts.extend((0..scene.steel.plates.len()).filter_map(|plate| base_without_bolts(scene, plate)));
    for draft in &mut drafts {
        if let Some(laid) = simple::lay_out(scene, draft) {
            draft.joint.layout = laid.map(Laid::Simple);
        }
    }
    drafts.iter_mut().for_each(|draft| say_what_is_not_assessed(scene, draft));
    drafts
}

/// Whatever else stands against a joint, the reason why a member of it can't be assessed is told.
fn say_what_is_not_assessed(scene: &Scene, draft: &mut Draft) {
    let Err(reason) = &mut draft.joint.layout else { return };
    for member in &draft.members {
        if let Some(why) = scene.steel.members[*member].not_assessed.as_ref().filter(|why| !reason.contains(*why)) {
            reason.push_str(&format!("; {}: {why}", scene.label(Part::Member(*member))));
        }
    }
}

/// A column's foot on a plate through which no bolt passes: its anchors may have been left out of the exchange.
fn base_without_bolts(scene: &Scene, plate: usize) -> Option<Draft> {
    if scene.is_bolted(plate) || scene.touches.members[plate].len() > 1 {
        return None;
    }
    let end = *cut::ends_on(scene, plate).first()?;
    let column = &scene.steel.members[end.member];
    let spread = Slab::of_plate(&scene.steel.plates[plate])?.half;
    let wider = spread.x.min(spread.y) >= column.extents.min_element() / 2.0;
    if !wider || !stands_on_end(column, &end) {
        return None;
    }
    let mut draft = Draft::new(scene, Kind::ColumnBase, Vec::new(), vec![end.member]);
    draft.centre = scene.steel.plates[plate].centre;
    draft.support(scene, None, Some(end.member));
    draft.joint.at_end = Some(end.at_end);
    draft.joint.place = Some(scene.place(Part::Plate(plate)));
    draft.joint.plates.push((plate, "end-plate"));
    draft.joint.welds = others_at(scene, [plate]);
    draft.joint.layout =
        Err(format!("kind not assessed yet: {}: no bolt that was taken up holds its plate", Kind::ColumnBase.word()));
    Some(draft)
}

/// Whether a member stands up from that end.
fn stands_on_end(member: &Member, end: &EndOn) -> bool {
    let (foot, top) = if end.at_end { (member.end, member.start) } else { (member.start, member.end) };
    (top - foot).normalize_or_zero().z >= STANDS
}

/// Welds at plates, without a role.
fn others_at(scene: &Scene, plates: impl IntoIterator<Item = usize>) -> Vec<(usize, &'static str)> {
    let welds: BTreeSet<usize> =
        plates.into_iter().flat_map(|plate| scene.welds_at(Part::Plate(plate))).copied().collect();
    welds.into_iter().map(|weld| (weld, Role::Other.word())).collect()
}

fn splice(scene: &Scene, plates: &[usize], bolts: Vec<usize>) -> Draft {
    let ends: BTreeSet<usize> =
        plates.iter().filter_map(|p| cut::ends_on(scene, *p).first().map(|e| e.member)).collect();
    let members: Vec<usize> = ends.into_iter().collect();
    let mut draft = Draft::new(scene, Kind::EndPlateSplice, bolts, members);
    draft.joint.plates = plates.iter().map(|plate| (*plate, "end-plate")).collect();
    draft.joint.place = plates.iter().map(|plate| scene.place(Part::Plate(*plate))).min();
    draft.joint.welds = others_at(scene, plates.iter().copied());
    let (first, second) = of_equal_rank(scene, &draft.members);
    draft.support(scene, first, second);
    splice::lay_out(scene, &mut draft, plates);
    draft
}

fn end_plate(scene: &Scene, plate: usize, bolts: Vec<usize>) -> Option<Draft> {
    let ends = cut::ends_on(scene, plate);
    let end = *ends.first()?;
    let (_, mut passed) = cut::passed(scene, &bolts);
    passed.remove(&end.member);
    let support = if passed.len() == 1 { passed.iter().next().map(|(member, plies)| (*member, plies)) } else { None };
    let beam = &scene.steel.members[end.member];
    let i_support = support.filter(|(member, _)| scene.steel.members[*member].shape == Shape::I);
    let flange =
        i_support.and_then(|(member, plies)| only(plies).filter(|ply| ply.sign() != 0.0).map(|ply| (member, ply)));
    let on_web = i_support.is_some_and(|(_, plies)| only(plies) == Some(Ply::Web));

    let mut members: Vec<usize> = passed.keys().copied().chain([end.member]).collect();
    members.sort_unstable();
    let frame = Frame::new(beam, &end, &scene.steel.plates[plate]);
    let welds = frame.map(|frame| welds::at_plate(scene, &frame, end.member, plate)).unwrap_or_default();
    let strong = frame.is_some_and(|frame| covers_both_flanges(scene, &frame, &end, plate)) && reaches_a_flange(&welds);

    let (kind, why) = if passed.is_empty() {
        let why = "the bolts pass through nothing but the end plate";
        if stands_on_end(beam, &end) { (Kind::ColumnBase, None) } else { (Kind::OtherBolted, Some(why)) }
    } else if beam.shape != Shape::I {
        (Kind::OtherBolted, Some("the member with the end plate is no I section"))
    } else if !strong && (flange.is_some() || on_web) {
        (Kind::FlexibleEndPlate, None)
    } else if on_web {
        (
            Kind::EndPlateToWeb,
            Some("a moment into a web bends it about the supporting member's minor axis, which is not assessed"),
        )
    } else if let Some((column, _)) = flange {
        let column = &scene.steel.members[column];
        if are_square(beam.across, column.along, scene.tolerances().angle) {
            (Kind::EndPlateMoment, None)
        } else {
            (Kind::OtherBolted, Some("the supported member's depth does not run along the supporting member"))
        }
    } else if passed.len() > 1 {
        (Kind::OtherBolted, Some("the bolts of the end plate pass through more than one other member"))
    } else {
        (Kind::OtherBolted, Some("the bolts pass through neither one flange nor the web of an I section"))
    };

    let mut draft = Draft::new(scene, kind, bolts, members);
    draft.support(scene, support.map(|(member, _)| member), Some(end.member));
    draft.joint.at_end = Some(end.at_end);
    draft.joint.place = Some(scene.place(Part::Plate(plate)));
    draft.joint.plates.push((plate, "end-plate"));
    draft.joint.plates.extend(
        cut::passed(scene, &draft.joint.bolts)
            .0
            .into_iter()
            .filter(|other| *other != plate)
            .map(|other| (other, "plate")),
    );
    draft.joint.welds = welds.iter().map(|(weld, role)| (*weld, role.word())).collect();
    if let Some(why) = why {
        draft.joint.layout = Err(format!("kind not assessed yet: {}: {why}", kind.word()));
    }
    welds::say_where_names_disagree(scene, &welds, &mut draft.joint.disagreements);
    say_how_joined(scene, plate, &end, &welds, &mut draft.joint.disagreements);
    if let (Kind::EndPlateMoment, Some(frame), Some((column, ply))) = (kind, frame, flange) {
        let mut others = ends[1..].to_vec();
        // A sloping one in the beam's plane is seen also where neither weld nor piece holds it to the plate.
        let known = |end: &EndOn| ends.iter().any(|own| own.member == end.member);
        let in_plane = |end: &&EndOn| {
            let member = &scene.steel.members[end.member];
            let tolerances = scene.tolerances();
            end.slope > tolerances.angle
                && member.shape == Shape::I
                && Some(end.member) != draft.joint.supporting
                && are_parallel(member.across, frame.side, tolerances.angle)
                && frame.across(member.start).abs() <= tolerances.position.get()
        };
        others.extend(scene.touches.ends[plate].iter().filter(|end| !known(end)).filter(in_plane));
        end_plate::lay_out(scene, &mut draft, &Case { frame, plate, end, others: &others, column, ply, welds });
    }
    Some(draft)
}

fn only(plies: &BTreeSet<Ply>) -> Option<Ply> {
    plies.first().copied().filter(|_| plies.len() == 1)
}

/// Whether the plate reaches at least to the middle of both flanges.
pub(super) fn covers_both_flanges(scene: &Scene, frame: &Frame, end: &EndOn, plate: usize) -> bool {
    let beam = &scene.steel.members[end.member];
    let (t_f, _) = thicknesses(beam);
    let heights = Span::of(frame.outline(&scene.steel.plates[plate]).iter().map(|p| p.y));
    let middles = [t_f / 2.0, beam.extents.y - t_f / 2.0].map(|height| frame.along_plate(height));
    heights.is_some_and(|heights| middles.iter().all(|middle| heights.holds(*middle)))
}

/// Whether a weld lies at a flange, or nothing is known of the welds' places.
pub(super) fn reaches_a_flange(welds: &[(usize, Role)]) -> bool {
    let at_flange = |role: Role| matches!(role, Role::FlangeTop | Role::FlangeBottom);
    welds.iter().any(|(_, role)| at_flange(*role)) || !welds.iter().any(|(_, role)| *role == Role::Web)
}

pub(super) fn say_how_joined(
    scene: &Scene,
    plate: usize,
    end: &EndOn,
    welds: &[(usize, Role)],
    sentences: &mut Vec<String>,
) {
    let (p, m) = (Part::Plate(plate), Part::Member(end.member));
    if welds.is_empty() && !scene.are_one_piece(p, m) && !scene.are_told(p, m) {
        let why = "the end plate bears on the member's end, but no weld, piece or relation holds them together";
        sentences.push(why.into());
    }
}

fn other(scene: &Scene, bolts: Vec<usize>) -> Draft {
    let (plates, passed) = cut::passed(scene, &bolts);
    let members = cut::members_of(scene, &bolts);
    let cleats = passed.keys().any(|member| cut::is_cleat(scene, *member));
    let stands_on = stands_on(scene, &plates, &members);
    let centre = cut::centre(scene, &bolts);
    let (kind, supporting, supported) = match members[..] {
        [beam] if !plates.is_empty() => {
            let kind = if scene.steel.members[beam].shape != Shape::I {
                Kind::Gusset
            } else if stands_on.is_some() && is_on_web(scene, beam, &passed, &plates) {
                Kind::FinPlate
            } else {
                Kind::OtherBolted
            };
            // A plate bolted to a flange belongs to the other member, whose end is further off than it should be.
            let on_flange = passed.get(&beam).and_then(only).is_some_and(|ply| ply.sign() != 0.0);
            match stands_on.filter(|_| on_flange) {
                Some(other) => (kind, Some(beam), Some(other)),
                None => (kind, stands_on, Some(beam)),
            }
        }
        [a, b] if !plates.is_empty() && are_in_line(scene, a, b) => {
            let (first, second) = of_equal_rank(scene, &members);
            (Kind::CoverPlateSplice, first, second)
        }
        [a, b] => {
            let (supporting, supported) = ranked(scene, a, b, centre);
            let web = passed.get(&supported).is_some_and(|plies| only(plies) == Some(Ply::Web));
            let kind = if cleats && web { Kind::WebCleats } else { Kind::OtherBolted };
            (kind, Some(supporting), Some(supported))
        }
        _ => (Kind::OtherBolted, None, members.first().copied().filter(|_| members.len() == 1)),
    };
    let mut all = members;
    for member in [supporting, supported].into_iter().flatten() {
        if !all.contains(&member) {
            all.push(member);
        }
    }
    all.sort_unstable();
    let mut draft = Draft::new(scene, kind, bolts, all);
    draft.support(scene, supporting, supported);
    draft.joint.plates = plates.iter().map(|plate| (*plate, "plate")).collect();
    let first_plate = plates.iter().map(|plate| scene.place(Part::Plate(*plate))).min();
    draft.joint.place = first_plate.or(draft.joint.place);
    draft.joint.welds = others_at(scene, plates);
    draft
}

/// The member on which the plates stand, if it is one and not a bolted one; a weld or piece decides between several.
fn stands_on(scene: &Scene, plates: &BTreeSet<usize>, bolted: &[usize]) -> Option<usize> {
    let mut held: BTreeMap<usize, bool> = BTreeMap::new();
    for plate in plates {
        for member in scene.touches.members[*plate].iter().filter(|member| !bolted.contains(member)) {
            *held.entry(*member).or_default() |= scene.are_one_piece(Part::Plate(*plate), Part::Member(*member));
        }
    }
    let one = |held: Vec<usize>| if let [one] = held[..] { Some(one) } else { None };
    one(held.keys().copied().collect())
        .or_else(|| one(held.iter().filter(|(_, held)| **held).map(|(m, _)| *m).collect()))
}

fn is_on_web(scene: &Scene, beam: usize, passed: &BTreeMap<usize, BTreeSet<Ply>>, plates: &BTreeSet<usize>) -> bool {
    let across = scene.steel.members[beam].across;
    let along_web = |plate: &usize| are_parallel(scene.steel.plates[*plate].normal, across, scene.tolerances().angle);
    passed.get(&beam).is_some_and(|plies| only(plies) == Some(Ply::Web)) && plates.iter().all(along_web)
}
