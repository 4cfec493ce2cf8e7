//! The other kinds: listed with their parts, not laid out.

use faying::joints::{self, Joint, Kind, Laid, Meets, SimpleLayout};
use faying::shop::{Part, Shape, Steelwork};
use glam::DVec3;

use super::build::*;
use super::layouts::{find, on_column, only};

#[track_caller]
fn is(steel: &Steelwork, kind: Kind, bolts: usize, supporting: Option<usize>, supported: Option<usize>) -> Joint {
    let joint = only(steel);
    assert_eq!((joint.kind, joint.bolts.len()), (kind, bolts), "{:?}", joint.layout);
    assert_eq!((joint.supporting, joint.supported), (supporting, supported));
    let why = joint.layout.as_ref().expect_err("laid out");
    assert!(why.starts_with(&format!("kind not assessed yet: {}", kind.word())), "{why}");
    joint
}

/// A flexible end plate of the first member under the second.
#[track_caller]
fn flexible(steel: &Steelwork, bolts: usize) -> Joint {
    let joint = only(steel);
    assert_eq!((joint.kind, joint.bolts.len()), (Kind::FlexibleEndPlate, bolts), "{:?}", joint.layout);
    assert_eq!((joint.supporting, joint.supported), (Some(0), Some(1)));
    joint
}

#[test]
fn an_end_plate_welded_on_the_web_only_is_flexible() {
    let mut steel = frame(&[Detail::default()]);
    steel.welds.drain(0..2);
    assert!(flexible(&steel, 8).layout.is_ok());
}

#[test]
fn an_end_plate_shorter_than_the_beam_is_flexible() {
    let detail = Detail { bottom: 100.0, top: 330.0, rows: vec![290.0, 215.0, 140.0], ..Detail::default() };
    assert!(flexible(&frame(&[detail]), 6).layout.is_ok());
    let from_above = Detail { bottom: 20.0, ..Detail::default() };
    let from_below = Detail { top: 390.0, rows: vec![345.0, 73.0], ..Detail::default() };
    for (detail, bolts) in [(from_above, 8), (from_below, 4)] {
        let why = flexible(&frame(&[detail]), bolts).layout.expect_err("laid out");
        assert!(why.contains("welded to one of the beam's flanges"), "{why}");
    }
}

#[test]
fn an_end_plate_that_nobody_says_is_welded_is_found_and_says_so() {
    let steel = frame(&[Detail { throats: None, piece: false, ..Detail::default() }]);
    let joint = only(&steel);
    assert_eq!(joint.kind, Kind::EndPlateMoment);
    assert!(on_column(&joint).welds.web.is_err());
    assert!(joint.disagreements[0].contains("no weld, piece or relation holds them together"));
    let one_piece = only(&frame(&[Detail { throats: None, ..Detail::default() }]));
    assert_eq!((one_piece.kind, one_piece.disagreements.len()), (Kind::EndPlateMoment, 0));
}

/// The column turned by a quarter: the end plate sits on its web.
pub fn on_web(detail: Detail) -> Steelwork {
    let mut steel = frame(&[detail]);
    steel.members[0] = member("C1", COLUMN, DVec3::ZERO, DVec3::Z * 8000.0, DVec3::Y);
    let by = DVec3::X * (COLUMN.3 - COLUMN.1) / 2.0;
    let column = steel.members[0].clone();
    move_all(&mut steel, |p| p + by, |d| d);
    steel.members[0] = column;
    steel
}

#[test]
fn an_end_plate_on_a_columns_web() {
    let joint = is(&on_web(Detail::default()), Kind::EndPlateToWeb, 8, Some(0), Some(1));
    assert!(joint.layout.unwrap_err().contains("minor axis, which is not assessed"));
    let short = Detail { bottom: 100.0, top: 330.0, rows: vec![290.0, 140.0], ..Detail::default() };
    assert!(flexible(&on_web(short), 4).layout.is_ok());
}

/// Beams B1 and B2 on both sides of a column's web, with the same bolts.
fn both_sides() -> Steelwork {
    on_both_sides(&Detail::default())
}

/// The same of any detail; the beams of both are alike.
pub fn on_both_sides(detail: &Detail) -> Steelwork {
    let mut steel = on_web(detail.clone());
    let other = on_web(Detail { beam_mark: "B2", turned: true, ..detail.clone() });
    // The second joint's own column is left out; its bolts are the first one's.
    let by = DVec3::X * (COLUMN.1 - COLUMN.3);
    steel.members.extend(other.members.into_iter().skip(1).map(|mut m| {
        (m.start, m.end) = (m.start + by, m.end + by);
        m
    }));
    steel.plates.extend(other.plates.into_iter().map(|mut p| {
        p.centre += by;
        p
    }));
    steel.bolts.iter_mut().for_each(|bolt| bolt.start.x = -15.0 - 6.9);
    steel
}

#[test]
fn beams_on_both_sides_of_a_web_are_two_joints() {
    let mut steel = both_sides();
    let joints = find(&steel).joints;
    let found: Vec<_> = joints.iter().map(|j| (j.mark.as_str(), j.kind, j.bolts.len())).collect();
    assert_eq!(found, [("B1 / C1", Kind::EndPlateToWeb, 8), ("B2 / C1", Kind::EndPlateToWeb, 8)]);
    // A relation a beam, both with the same bolts: the members tell which is meant.
    let bolts: Vec<Part> = (0..8).map(Part::Bolt).collect();
    for (name, beam) in [("T1", 2), ("T2", 1)] {
        let by: Vec<Part> = bolts.iter().copied().chain([Part::Plate(beam - 1)]).collect();
        steel.told.push(told(name, &[Part::Member(beam), Part::Member(0)], &by));
    }
    let joints = find(&steel).joints;
    let found: Vec<_> = joints.iter().map(|j| (j.mark.as_str(), j.supported, j.disagreements.len())).collect();
    assert_eq!(found, [("T1", Some(2), 0), ("T2", Some(1), 0)]);
}

#[test]
fn a_beam_on_its_side_is_no_moment_joint() {
    let mut steel = frame(&[Detail::default()]);
    let beam = &steel.members[1];
    steel.members[1] = member("B1", BEAM, beam.start, beam.end, DVec3::Y);
    assert_ne!(only(&steel).kind, Kind::EndPlateMoment);
}

#[test]
fn two_end_plates_bolted_to_each_other() {
    let half = Detail { rows: vec![329.0, 71.0], bottom: -15.0, top: 430.0, ..Detail::default() };
    let other = Detail { beam_mark: "B2", ..half.clone() };
    let joint = only(&spliced(&half, &other));
    assert_eq!((joint.kind, joint.bolts.len()), (Kind::EndPlateSplice, 4));
    assert_eq!((joint.supporting, joint.supported), (Some(0), Some(1)));
    assert_eq!(joint.plates, [(0, "end-plate"), (1, "end-plate")]);
    assert_eq!(joint.mark, "B2 / B1");
}

fn fin() -> Steelwork {
    let mut steel = Steelwork::default();
    steel.members.push(member("C1", COLUMN, DVec3::ZERO, DVec3::Z * 6000.0, DVec3::X));
    steel.members.push(member("B1", BEAM, DVec3::new(170.25, 0.0, 3200.0), DVec3::new(5000.0, 0.0, 3200.0), DVec3::Z));
    let middle = DVec3::new(160.25 + 50.0, 3.95 + 5.0, 3200.0);
    steel.plates.push(plate("FP", middle, DVec3::X, DVec3::Z, (100.0, 220.0), 10.0));
    for z in [3130.0, 3200.0, 3270.0] {
        steel.bolts.push(bolt("N", DVec3::new(220.0, -20.0, z), DVec3::new(220.0, 30.0, z), 20.0));
    }
    steel
}

#[test]
fn a_fin_plate() {
    let joint = only(&fin());
    assert_eq!(
        (joint.kind, joint.bolts.len(), joint.supporting, joint.supported),
        (Kind::FinPlate, 3, Some(0), Some(1))
    );
    assert!(matches!(joint.layout, Ok(Laid::Simple(SimpleLayout::FinPlate(_)))));
    assert_eq!((joint.at_end, &joint.plates[..]), (Some(false), &[(0, "plate")][..]));
}

#[test]
fn cleats() {
    let mut steel = fin();
    steel.plates.clear();
    let at = |x: f64, z: f64| DVec3::new(x, 48.95, z);
    let mut cleat = member("A1", ("L90", 90.0, 90.0, 0.0, 0.0), at(205.25, 3080.0), at(205.25, 3320.0), DVec3::X);
    cleat.shape = Shape::Other;
    cleat.section = missing("section");
    steel.members.push(cleat);
    for z in [3130.0, 3270.0] {
        steel.bolts.push(bolt("M", DVec3::new(130.0, 54.0, z), DVec3::new(180.0, 54.0, z), 20.0));
    }
    is(&steel, Kind::WebCleats, 5, Some(0), Some(1));
}

#[test]
fn cover_plates_on_flanges_and_web_are_one_splice() {
    let mut steel = Steelwork::default();
    steel.members.push(member("B1", BEAM, DVec3::new(-3000.0, 0.0, 0.0), DVec3::new(-5.0, 0.0, 0.0), DVec3::Z));
    steel.members.push(member("B2", BEAM, DVec3::new(5.0, 0.0, 0.0), DVec3::new(3000.0, 0.0, 0.0), DVec3::Z));
    for sign in [-1.0, 1.0] {
        let face = sign * (203.2 + 7.5);
        steel.plates.push(plate("F", DVec3::Z * face, DVec3::X, DVec3::Y, (400.0, 170.0), 15.0));
        let web = DVec3::Y * sign * (3.95 + 5.0);
        steel.plates.push(plate("W", web, DVec3::X, DVec3::Z, (180.0, 250.0), 10.0));
        for x in [-150.0, -60.0, 60.0, 150.0] {
            for y in [-50.0, 50.0] {
                steel.bolts.push(bolt("N", DVec3::new(x, y, sign * 180.0), DVec3::new(x, y, sign * 230.0), 20.0));
            }
        }
    }
    for x in [-50.0, 50.0] {
        steel.bolts.push(bolt("N", DVec3::new(x, -30.0, 0.0), DVec3::new(x, 30.0, 0.0), 20.0));
    }
    let joint = is(&steel, Kind::CoverPlateSplice, 18, Some(0), Some(1));
    assert_eq!(joint.plates.len(), 4);
}

#[test]
fn a_base_plate() {
    let mut steel = Steelwork::default();
    steel.members.push(member("C1", COLUMN, DVec3::ZERO, DVec3::Z * 6000.0, DVec3::X));
    steel.plates.push(plate("BP", -DVec3::Z * 15.0, DVec3::X, DVec3::Y, (500.0, 400.0), 30.0));
    for (x, y) in [(-200.0, -100.0), (-200.0, 100.0), (200.0, -100.0), (200.0, 100.0)] {
        steel.bolts.push(bolt("N", DVec3::new(x, y, -400.0), DVec3::new(x, y, 50.0), 24.0));
    }
    let joint = only(&steel);
    assert_eq!((joint.kind, joint.bolts.len(), joint.supported), (Kind::ColumnBase, 4, Some(0)));
    assert!(joint.layout.is_ok_and(|laid| laid.simple().is_some()));
    assert_eq!((joint.at_end, joint.mark.as_str()), (Some(false), "C1"));
    assert!(find(&steel).loose_bolts.is_empty());
}

#[test]
fn a_base_plate_whose_anchors_are_not_modelled() {
    let mut steel = Steelwork::default();
    steel.members.push(member("C1", COLUMN, DVec3::Z * 6000.0, DVec3::ZERO, DVec3::X));
    steel.plates.push(plate("BP", -DVec3::Z * 15.0, DVec3::X, DVec3::Y, (500.0, 400.0), 30.0));
    let joint = is(&steel, Kind::ColumnBase, 0, None, Some(0));
    assert!(joint.layout.unwrap_err().ends_with("no bolt that was taken up holds its plate"));
    steel.told.push(told("F1", &[Part::Member(0)], &[Part::Plate(0)]));
    assert_eq!(only(&steel).mark, "F1");
    // A cap on the column's head is no base.
    steel.plates[0].centre.z = 6015.0;
    assert!(find(&steel).joints.is_empty());
}

#[test]
fn an_end_plate_without_a_support_is_not_lost() {
    let mut steel = frame(&[Detail::default()]);
    steel.members[0].start.x -= 1000.0;
    steel.members[0].end.x -= 1000.0;
    let joint = is(&steel, Kind::OtherBolted, 8, None, Some(1));
    assert!(joint.layout.unwrap_err().contains("nothing but the end plate"));
}

#[test]
fn a_plate_of_a_beam_that_runs_through_it_still_tells_who_supports() {
    let mut steel = frame(&[Detail::default()]);
    steel.members[1].start.x = 0.0;
    is(&steel, Kind::OtherBolted, 8, Some(0), Some(1));
}

#[test]
fn members_bolted_to_each_other() {
    let mut steel = Steelwork::default();
    steel.members.push(member("R1", BEAM, DVec3::ZERO, DVec3::X * 6000.0, DVec3::Z));
    let top = DVec3::new(3000.0, 0.0, 406.4);
    steel.members.push(member("P1", BEAM, top - DVec3::Y * 50.0, top + DVec3::Y * 4000.0, DVec3::Z));
    for x in [-40.0, 40.0] {
        let at = |z: f64| DVec3::new(3000.0 + x, 30.0, 203.2 + z);
        steel.bolts.push(bolt("N", at(-15.0), at(15.0), 20.0));
    }
    is(&steel, Kind::OtherBolted, 2, Some(0), Some(1));
}

#[test]
fn members_bolted_to_each_other_far_apart_are_two_joints() {
    let mut steel = Steelwork::default();
    for (mark, z) in [("R1", 0.0), ("R2", 406.4)] {
        steel.members.push(member(mark, BEAM, DVec3::Z * z, DVec3::new(6000.0, 0.0, z), DVec3::Z));
    }
    for x in [1000.0, 1100.0, 5000.0] {
        let at = |z: f64| DVec3::new(x, 40.0, 203.2 + z);
        steel.bolts.push(bolt("N", at(-15.0), at(15.0), 20.0));
    }
    let mut found: Vec<usize> = find(&steel).joints.iter().map(|joint| joint.bolts.len()).collect();
    found.sort_unstable();
    assert_eq!(found, [1, 2]);
}

#[test]
fn a_bolt_in_the_notch_of_a_plate_does_not_pass_through_it() {
    let mut steel = Steelwork::default();
    for z in [0.0, 12.0] {
        let mut corner = plate("G", DVec3::Z * z, DVec3::X, DVec3::Y, (400.0, 400.0), 12.0);
        let p = |x: f64, y: f64| glam::DVec2::new(x, y);
        corner.outline = vec![
            p(-200.0, -200.0),
            p(200.0, -200.0),
            p(200.0, -100.0),
            p(-100.0, -100.0),
            p(-100.0, 200.0),
            p(-200.0, 200.0),
        ];
        steel.plates.push(corner);
    }
    for (x, y) in [(-150.0, -150.0), (100.0, 100.0)] {
        steel.bolts.push(bolt("N", DVec3::new(x, y, -10.0), DVec3::new(x, y, 25.0), 20.0));
    }
    let joints = find(&steel);
    assert_eq!((joints.joints[0].bolts.as_slice(), joints.loose_bolts.as_slice()), (&[0][..], &[1][..]));
}

#[test]
fn bolts_through_one_ply_or_none_are_loose() {
    let mut steel = frame(&[Detail::default()]);
    steel.bolts.push(bolt("L", DVec3::new(0.0, 0.0, 9000.0), DVec3::new(50.0, 0.0, 9000.0), 20.0));
    steel.bolts.push(bolt("L", DVec3::new(3000.0, -20.0, 4200.0), DVec3::new(3000.0, 20.0, 4200.0), 20.0));
    assert_eq!(find(&steel).loose_bolts, [8, 9]);
}

#[test]
fn the_graph_keeps_the_strongest_witness() {
    let mut steel = frame(&[Detail::default()]);
    let (column, beam, end_plate) = (Part::Member(0), Part::Member(1), Part::Plate(0));
    steel.told.push(told("T1", &[column, beam], &[end_plate, Part::Bolt(0)]));
    let graph = joints::graph(&steel, &rulebook());
    let meets = |a, b| graph.edge_weight(a, b).copied();
    assert_eq!(meets(end_plate, beam), Some(Meets::BearsOn));
    assert_eq!(meets(end_plate, column), Some(Meets::BearsOn));
    assert_eq!(meets(Part::Bolt(0), column), Some(Meets::PassesThrough));
    assert_eq!(meets(Part::Bolt(0), end_plate), Some(Meets::PassesThrough));
    assert_eq!(meets(Part::Weld(2), beam), Some(Meets::WeldedTo));
    assert_eq!(meets(column, beam), Some(Meets::Told));
    assert_eq!(graph.node_count(), 2 + 1 + 8 + 3);
}
