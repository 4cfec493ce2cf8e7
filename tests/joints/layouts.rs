//! What is laid out of an end-plate joint.

use faying::joints::{EndPlateLayout, Joint, Joints, Kind, Layout, recognise};
use faying::origin::Origin;
use faying::rulebook::Grade;
use faying::shop::{Steelwork, Weld, WeldSort};
use faying::units::mm;
use glam::DVec3;

use super::build::*;

pub fn find(steel: &Steelwork) -> Joints {
    recognise(steel, &rulebook())
}

pub fn only(steel: &Steelwork) -> Joint {
    let joints = find(steel).joints;
    assert_eq!(joints.len(), 1, "{:?}", joints.iter().map(|j| (&j.mark, j.kind)).collect::<Vec<_>>());
    joints.into_iter().next().unwrap()
}

/// The layout of a joint on a column's flange.
pub fn on_column(joint: &Joint) -> EndPlateLayout {
    match &joint.layout {
        Ok(Layout::EndPlate(layout)) => layout.clone(),
        other => panic!("{other:?}"),
    }
}

pub fn layout(steel: &Steelwork) -> EndPlateLayout {
    on_column(&only(steel))
}

#[track_caller]
pub fn close(a: f64, b: f64) {
    assert!((a - b).abs() < 1e-6, "{a} is not {b}");
}

#[test]
fn rows_edges_plate_and_bolts_are_those_built() {
    let detail = Detail::default();
    let joint = only(&frame(std::slice::from_ref(&detail)));
    assert_eq!((joint.kind, joint.mark.as_str()), (Kind::EndPlateMoment, "B1 / C1"));
    assert_eq!((joint.supporting, joint.supported, joint.at_end), (Some(0), Some(1), Some(false)));
    assert_eq!(joint.disagreements, Vec::<String>::new());
    let layout = on_column(&joint);
    for (row, height) in layout.bolts.rows.iter().zip(&detail.rows) {
        close(row.height.get(), *height);
        close(row.gauge.get(), 90.0);
        close(row.edge_plate.get(), (200.0 - 90.0) / 2.0);
        close(row.edge_column.get(), (309.2 - 90.0) / 2.0);
    }
    assert_eq!(layout.bolts.rows.len(), 4);
    close(layout.plate.bottom.get(), -15.0);
    close(layout.plate.top.get(), 486.4);
    close(layout.plate.width.get(), 200.0);
    close(layout.plate.thickness.get(), 15.0);
    assert_eq!(length(&layout.bolts.diameter), Some(20.0));
    assert_eq!(layout.bolts.class.unwrap().value, "8.8");
    close(layout.column_above.unwrap().get(), 8000.0 - 4000.0 - 450.4);
    close(layout.column_below.unwrap().get(), 4000.0 + 73.0);
    assert_eq!((layout.column.guid.as_str(), layout.beam.guid.as_str()), ("-C1", "-B1"));
}

#[test]
fn welds_have_their_roles_by_place() {
    let layout = layout(&frame(&[Detail::default()]));
    assert_eq!(length(&layout.welds.flange_top), Some(7.0));
    assert_eq!(length(&layout.welds.flange_bottom), Some(7.0));
    assert_eq!(length(&layout.welds.web), Some(4.0));
}

#[test]
fn of_several_welds_the_thinnest_counts_and_an_unknown_one_spoils_it() {
    let mut steel = frame(&[Detail::default()]);
    let mut second = steel.welds[0].clone();
    second.throat = known(mm(5.0));
    steel.welds.push(second);
    assert_eq!(length(&layout(&steel).welds.flange_top), Some(5.0));
    steel.welds[3].throat = missing("throat");
    assert!(layout(&steel).welds.flange_top.is_err());
}

#[test]
fn what_no_weld_states_is_missing() {
    let mut steel = frame(&[Detail::default()]);
    steel.welds[0].sort = WeldSort::Butt;
    let reason = layout(&steel).welds.flange_top.unwrap_err().reason;
    assert_eq!(reason, "a butt weld that is not known to go through, or not all along: not assessed yet");
    steel.welds.remove(0);
    let top = layout(&steel).welds.flange_top.unwrap_err();
    assert_eq!((top.what.as_str(), top.reason.as_str()), ("weld at the top flange", "no weld is modelled there"));
}

#[test]
fn a_butt_weld_that_goes_through_all_along_is_as_strong_as_the_flange() {
    let welds = |change: &dyn Fn(&mut Weld)| {
        let mut steel = frame(&[Detail::default()]);
        change(&mut steel.welds[0]);
        layout(&steel).welds
    };
    // The flange is 12.8 thick.
    let through = welds(&|weld| (weld.sort, weld.throat) = (WeldSort::FullButt, missing("throat")));
    assert!(through.full.flange_top && !through.full.flange_bottom && !through.full.web);
    assert_eq!(length(&through.flange_top), Some(12.8));
    assert!(matches!(through.flange_top.unwrap().origin, Origin::Assumed(_)));
    assert!(welds(&|weld| (weld.sort, weld.throat) = (WeldSort::Butt, known(mm(12.8)))).full.flange_top);
    let partial = welds(&|weld| (weld.sort, weld.throat) = (WeldSort::Butt, known(mm(9.0))));
    assert!(!partial.full.flange_top && partial.flange_top.is_err());
    let short = welds(&|weld| {
        weld.sort = WeldSort::FullButt;
        shorten(weld, DVec3::Y, 0.6);
    });
    assert!(!short.full.flange_top && short.flange_top.is_err());
}

/// Draws a weld's body over a share of its length, about its middle.
fn shorten(weld: &mut Weld, along: DVec3, share: f64) {
    let middle = weld.points.iter().sum::<DVec3>() / weld.points.len() as f64;
    for point in &mut weld.points {
        let from_middle = (*point - middle).dot(along);
        *point += along * from_middle * (share - 1.0);
    }
}

/// Welds 0, 1 and 2 are top, bottom and web.
#[test]
fn a_weld_over_a_part_of_the_flange_or_web_is_not_counted_at_full_length() {
    for share in [0.3, 0.6, 0.9] {
        for (weld, along) in [(0, DVec3::Y), (1, DVec3::Y), (2, DVec3::Z)] {
            let mut steel = frame(&[Detail::default()]);
            shorten(&mut steel.welds[weld], along, share);
            let welds = layout(&steel).welds;
            let all = [welds.flange_top, welds.flange_bottom, welds.web];
            for (i, known) in all.iter().enumerate() {
                assert_eq!(known.is_ok(), i != weld, "{share} of weld {weld}: {known:?}");
            }
            let reason = &all[weld].as_ref().unwrap_err().reason;
            assert!(share == 0.3 || reason.contains("shorter or intermittent ones are not counted"), "{reason}");
        }
    }
}

/// The weld between two shares of its length.
fn piece(weld: &Weld, from: f64, to: f64) -> Weld {
    let mut piece = weld.clone();
    let ys = || weld.points.iter().map(|point| point.y);
    let (lo, hi) = (ys().fold(f64::MAX, f64::min), ys().fold(f64::MIN, f64::max));
    for point in &mut piece.points {
        point.y = lo + (hi - lo) * if point.y == lo { from } else { to };
    }
    piece
}

#[test]
fn a_seam_may_be_drawn_in_pieces_that_meet() {
    let throat = |pieces: &[(f64, f64)]| {
        let mut steel = frame(&[Detail::default()]);
        let whole = steel.welds.remove(0);
        steel.welds.extend(pieces.iter().map(|(from, to)| piece(&whole, *from, *to)));
        length(&layout(&steel).welds.flange_top)
    };
    assert_eq!(throat(&[(0.0, 0.5), (0.5, 1.0)]), Some(7.0));
    assert_eq!(throat(&[(0.0, 0.6), (0.4, 1.0)]), Some(7.0));
    assert_eq!(throat(&[(0.0, 0.4), (0.6, 1.0)]), None);
    // 0.2 of 191 mm is less than 6a = 42 mm, EN 1993-1-8:2005 4.5.1(2).
    assert_eq!(throat(&[(0.0, 0.8), (0.8, 1.0)]), None);
}

/// An intermittent seam is drawn from end to end and states the length of one piece.
#[test]
fn a_stated_length_shorter_than_what_is_drawn_counts() {
    let mut steel = frame(&[Detail::default()]);
    steel.welds[0].length = known(mm(50.0));
    let reason = layout(&steel).welds.flange_top.unwrap_err().reason;
    assert!(reason.starts_with("the welds modelled there run over 50 mm of"), "{reason}");
    steel.welds[0].length = known(mm(400.0));
    assert_eq!(length(&layout(&steel).welds.flange_top), Some(7.0), "both sides added up");
}

#[test]
fn bodies_on_one_side_only_are_no_weld_on_both() {
    let mut steel = frame(&[Detail::default()]);
    let face = steel.welds[0].points.iter().map(|p| p.z).sum::<f64>() / 8.0;
    for point in &mut steel.welds[0].points {
        point.z = if point.z > face { face + 10.0 } else { face };
    }
    let reason = layout(&steel).welds.flange_top.unwrap_err().reason;
    assert_eq!(reason, "the welds modelled there lie on one side only; the other side has none");
    // As a line it tells no side.
    let points = &mut steel.welds[0].points;
    *points = vec![points[0], points[7]];
    points[0].z = face;
    points[1].z = face;
    assert_eq!(length(&layout(&steel).welds.flange_top), Some(7.0));
}

#[test]
fn the_hole_is_modelled_stated_or_assumed() {
    let mut steel = frame(&[Detail::default()]);
    let hole_of = |steel: &Steelwork| layout(steel).bolts.hole.unwrap();
    let assumed = hole_of(&steel);
    assert_eq!(assumed.value, mm(22.0));
    assert!(matches!(assumed.origin, Origin::Assumed(_)));
    steel.bolts.iter_mut().for_each(|bolt| bolt.hole = Some(mm(21.0)));
    let stated = hole_of(&steel);
    assert_eq!(stated.value, mm(21.0));
    assert!(matches!(stated.origin, Origin::Modelled { .. }));
    // Heights from the plate's middle: its own is (486.4 - 15) / 2 = 235.7 above the soffit.
    for row in [450.4, 345.0, 265.0, 73.0] {
        steel.plates[0].holes.extend([-45.0, 45.0].map(|x| hole(x, row - 235.7, 24.0, 24.0)));
    }
    let modelled = hole_of(&steel);
    assert_eq!(modelled.value, mm(24.0));
    assert!(matches!(modelled.origin, Origin::Derived(_)));
}

#[test]
fn bolts_that_differ_are_missing_with_both_values() {
    let mut steel = frame(&[Detail::default()]);
    steel.bolts[5].diameter = known(mm(24.0));
    steel.bolts[2].class = known("10.9".into());
    let bolts = layout(&steel).bolts;
    assert_eq!(bolts.diameter.unwrap_err().reason, "the bolts of the joint differ: 20 mm and 24 mm");
    assert_eq!(bolts.class.unwrap_err().reason, "the bolts of the joint differ: 10.9 and 8.8");
    assert!(bolts.hole.is_err());
}

#[test]
fn a_bolt_without_a_class_leaves_the_class_missing() {
    let mut steel = frame(&[Detail::default()]);
    steel.bolts[0].class = missing("bolt class");
    let class = layout(&steel).bolts.class.unwrap_err();
    assert_eq!(class.reason, "1 of 8 bolts: the test leaves it out");
}

#[test]
fn shanks_may_be_drawn_as_the_plates_thickness_or_long() {
    for (back, ahead) in [(0.0, 15.0), (21.7, 15.0), (60.0, 40.0), (21.7, 0.0)] {
        let mut steel = frame(&[Detail::default()]);
        for bolt in &mut steel.bolts {
            bolt.start.x = 160.25 - back;
            bolt.end.x = 160.25 + ahead;
        }
        assert_eq!(layout(&steel).bolts.rows.len(), 4, "{back} {ahead}");
    }
}

#[test]
fn a_shank_drawn_as_the_plates_thickness_reaches_over_a_gap_that_counts_as_touching() {
    let mut steel = frame(&[Detail::default()]);
    steel.bolts.iter_mut().for_each(|bolt| bolt.start.x = 160.25);
    (steel.members[0].start.x, steel.members[0].end.x) = (-1.5, -1.5);
    assert_eq!(layout(&steel).bolts.rows.len(), 4);
}

#[test]
fn a_weld_on_the_plates_other_side_is_none_of_the_beams() {
    let mut steel = frame(&[Detail::default()]);
    let at = |x: f64, y: f64, z: f64| DVec3::new(160.25 + x, y, 4406.4 + z);
    steel.welds.push(weld("seal", at(-3.0, -88.0, -3.0), at(0.0, 88.0, 3.0), 3.0));
    assert_eq!(length(&layout(&steel).welds.flange_top), Some(7.0));
}

fn ribbed(rib: Rib) -> Steelwork {
    frame(&[Detail { ribs: vec![rib], ..Detail::default() }])
}

const RIB: Rib =
    Rib { height: 400.0, thickness: 12.0, outstand: 113.0, reach: 277.1, both_sides: true, weld: Some(6.0) };

#[test]
fn a_pair_of_stiffeners_is_one() {
    let steel = ribbed(RIB);
    let joint = only(&steel);
    assert_eq!(joint.plates.iter().filter(|(_, role)| *role == "stiffener").count(), 2);
    let layout = on_column(&joint);
    let [stiffener] = &layout.stiffeners[..] else { panic!("{:?}", layout.stiffeners) };
    close(stiffener.height.get(), 400.0);
    close(stiffener.outstand.get(), 113.0);
    close(stiffener.reach.get(), 277.1);
    close(stiffener.thickness.get(), 12.0);
    assert!(stiffener.both_sides && stiffener.full_depth);
    assert_eq!(stiffener.grade.as_ref().unwrap().value, Grade("S275".into()));
    assert_eq!(length(&stiffener.weld), Some(6.0));
    assert_eq!(layout.not_credited, Vec::<String>::new());
    // The stiffener's weld at the flange's level is none of the beam's.
    assert_eq!(length(&layout.welds.flange_top), Some(7.0));
}

#[test]
fn a_stiffener_on_one_side_or_of_part_depth_says_so() {
    let one_sided = layout(&ribbed(Rib { both_sides: false, ..RIB }));
    assert!(!one_sided.stiffeners[0].both_sides && one_sided.stiffeners[0].full_depth);
    let partial = layout(&ribbed(Rib { reach: 185.0, weld: None, ..RIB }));
    assert!(partial.stiffeners[0].both_sides && !partial.stiffeners[0].full_depth);
    assert_eq!(partial.stiffeners[0].weld.as_ref().unwrap_err().reason, "no weld is modelled there");
}

#[test]
fn two_plates_on_one_side_are_no_pair() {
    let mut steel = ribbed(Rib { both_sides: false, ..RIB });
    let mut twin = steel.plates[1].clone();
    twin.centre.z += 1.0;
    steel.plates.push(twin);
    let stiffeners = layout(&steel).stiffeners;
    assert!(stiffeners.len() == 2 && stiffeners.iter().all(|s| !s.both_sides));
}

#[test]
fn an_uneven_pair_counts_as_its_lesser_half() {
    let mut steel = ribbed(RIB);
    steel.plates[1].thickness = mm(10.0);
    steel.plates[2].grade = known(Grade("S355".into()));
    let layout = layout(&steel);
    close(layout.stiffeners[0].thickness.get(), 10.0);
    assert_eq!(layout.stiffeners[0].grade.as_ref().unwrap_err().reason, "its two plates differ: S275 and S355");
}

#[test]
fn stiffeners_far_from_the_joint_are_none_of_its() {
    assert!(layout(&ribbed(Rib { height: 800.0, ..RIB })).stiffeners.is_empty());
}

#[test]
fn a_stiffener_on_the_far_flange_only_is_not_credited() {
    let mut steel = ribbed(Rib { reach: 120.0, both_sides: false, ..RIB });
    steel.plates[1].centre.x *= -1.0;
    let layout = layout(&steel);
    assert!(layout.stiffeners.is_empty());
    assert_eq!(layout.not_credited, ["a transverse plate is not credited"]);
}

#[test]
fn beams_on_both_flanges_are_each_others_opposite() {
    let left = Detail { beam_mark: "B2", beam: DEEP, top: 600.0, turned: true, soffit: 3900.0, ..Detail::default() };
    let apart = Detail { beam_mark: "B3", turned: true, soffit: 6000.0, ..Detail::default() };
    let joints = find(&frame(&[Detail::default(), left, apart])).joints;
    let marks: Vec<_> = joints.iter().map(|j| (j.mark.as_str(), j.opposite)).collect();
    assert_eq!(marks, [("B1 / C1", Some(1)), ("B2 / C1", Some(0)), ("B3 / C1", None)]);
}

#[test]
fn a_beam_may_end_here_with_either_end() {
    let joint = only(&frame(&[Detail { at_end: true, ..Detail::default() }]));
    assert_eq!(joint.at_end, Some(true));
    close(on_column(&joint).bolts.rows[0].height.get(), 450.4);
}

#[test]
fn a_column_without_a_known_section_is_laid_out_by_its_extents() {
    let mut steel = frame(&[Detail::default()]);
    steel.members.iter_mut().for_each(|m| m.section = missing("section"));
    let layout = layout(&steel);
    close(layout.bolts.rows[0].height.get(), 450.4);
    assert!(layout.column.section.is_err());
}
