//! Marks, and relations as the second witness.

use faying::joints::Kind;
use faying::shop::{Part, Steelwork};
use glam::DVec3;

use super::build::*;
use super::layouts::{find, on_column, only};

fn marks(steel: &Steelwork) -> Vec<String> {
    find(steel).joints.into_iter().map(|joint| joint.mark).collect()
}

fn all_bolts(steel: &Steelwork) -> Vec<Part> {
    (0..steel.bolts.len()).map(Part::Bolt).collect()
}

#[test]
fn a_relation_names_its_joint() {
    let mut steel = frame(&[Detail::default()]);
    let by = all_bolts(&steel);
    steel.told.push(told("T1", &[Part::Member(1), Part::Member(0)], &by));
    let joint = only(&steel);
    assert_eq!((joint.mark.as_str(), joint.disagreements.len()), ("T1", 0));
    steel.told[0].by.clear();
    assert_eq!(only(&steel).mark, "T1");
}

#[test]
fn a_name_that_two_relations_carry_is_no_mark() {
    let other = Detail { beam_mark: "B2", turned: true, ..Detail::default() };
    let mut steel = frame(&[Detail::default(), other]);
    for beam in [1, 2] {
        steel.told.push(told("bolted", &[Part::Member(0), Part::Member(beam)], &[]));
    }
    assert_eq!(marks(&steel), ["B1 / C1", "B2 / C1"]);
}

#[test]
fn a_weld_between_beam_and_plate_names_nothing() {
    let mut steel = frame(&[Detail::default()]);
    steel.told.push(told("W1", &[Part::Member(1), Part::Plate(0)], &[Part::Weld(0)]));
    assert_eq!(only(&steel).mark, "B1 / C1");
}

#[test]
fn equal_marks_are_told_apart_by_the_end_then_by_the_place() {
    let end = Detail { turned: true, at_end: true, ..Detail::default() };
    assert_eq!(marks(&frame(&[Detail::default(), end])), ["B1 / C1 end", "B1 / C1 start"]);
    let above = Detail { soffit: 6000.0, ..Detail::default() };
    let found = marks(&frame(&[Detail::default(), above]));
    assert_eq!(found.len(), 2);
    assert!(found[0].starts_with("B1 / C1 start at (") && found[0] != found[1], "{found:?}");
}

#[test]
fn members_without_a_mark_go_by_their_name_or_id() {
    let mut steel = frame(&[Detail::default()]);
    steel.members[0].identity.mark = None;
    steel.members[0].identity.name = "Column".into();
    steel.members[1].identity.mark = Some(" ".into());
    assert_eq!(only(&steel).mark, "-B1 / Column");
}

#[test]
fn marks_are_sorted_as_people_count() {
    let mut steel = frame(&[
        Detail { beam_mark: "T10", soffit: 1000.0, ..Detail::default() },
        Detail { beam_mark: "T2", soffit: 2500.0, ..Detail::default() },
        Detail { beam_mark: "T1", soffit: 5000.0, ..Detail::default() },
    ]);
    steel.members[0].identity.mark = Some("C".into());
    assert_eq!(marks(&steel), ["T1 / C", "T2 / C", "T10 / C"]);
}

#[test]
fn a_relation_with_other_bolts_or_members_is_a_disagreement() {
    let mut steel = frame(&[Detail::default()]);
    let by = all_bolts(&steel)[..6].to_vec();
    steel.told.push(told("T1", &[Part::Member(1), Part::Member(0)], &by));
    let said = only(&steel).disagreements;
    assert_eq!(said, ["its relation names 6 bolts, geometry finds 8; 6 are the same"]);
    let far = DVec3::X * 20_000.0;
    steel.members.push(member("C9", COLUMN, far, far + DVec3::Z * 8000.0, DVec3::X));
    steel.told[0].between[1] = Part::Member(2);
    steel.told[0].by = all_bolts(&steel);
    let said = only(&steel).disagreements;
    assert_eq!(said, ["its relation connects C9, which geometry does not find at this joint"]);
}

#[test]
fn what_only_a_relation_says_is_a_joint_that_is_not_laid_out() {
    let mut steel = frame(&[Detail { piece: false, ..Detail::default() }]);
    move_beam_away(&mut steel);
    let by: Vec<Part> = all_bolts(&steel);
    steel.told.push(told("T1", &[Part::Member(0), Part::Member(1)], &by));
    let joints = find(&steel);
    let [joint] = &joints.joints[..] else { panic!("{:?}", joints.joints) };
    assert_eq!((joint.mark.as_str(), joint.kind, joint.bolts.len()), ("T1", Kind::OtherBolted, 8));
    assert_eq!((joint.supporting, joint.supported, joint.at_end), (Some(0), Some(1), Some(false)));
    assert!(joint.layout.as_ref().unwrap_err().starts_with("only an explicit relation says so"));
    assert!(joints.loose_bolts.is_empty());
}

#[test]
fn a_relation_between_members_that_meet_nowhere_is_a_joint_too() {
    let mut steel = frame(&[]);
    let start = DVec3::new(900.0, 0.0, 4000.0);
    steel.members.push(member("B1", BEAM, start, start + DVec3::X * 3000.0, DVec3::Z));
    steel.told.push(told("", &[Part::Member(0), Part::Member(1)], &[]));
    let joint = only(&steel);
    assert_eq!((joint.mark.as_str(), joint.supporting, joint.supported), ("B1 / C1", Some(0), Some(1)));
    assert!(joint.layout.unwrap_err().ends_with("its members meet nowhere"));
}

/// Beam, plate and bolts stand 500 mm off the column, and the bolts beside the plate.
fn move_beam_away(steel: &mut Steelwork) {
    let column = steel.members[0].clone();
    move_all(steel, |p| p + DVec3::X * 500.0, |d| d);
    steel.members[0] = column;
    for bolt in &mut steel.bolts {
        bolt.start.y += 1000.0;
        bolt.end.y += 1000.0;
    }
}

#[test]
fn a_relation_between_parts_that_meet_without_bolts_is_no_joint() {
    let mut steel = frame(&[]);
    let start = DVec3::new(160.25, 0.0, 4000.0);
    steel.members.push(member("B1", BEAM, start, start + DVec3::X * 3000.0, DVec3::Z));
    steel.told.push(told("welded", &[Part::Member(0), Part::Member(1)], &[]));
    assert!(find(&steel).joints.is_empty());
}

#[test]
fn a_weld_whose_name_speaks_of_another_place_says_so() {
    let mut steel = frame(&[Detail::default()]);
    steel.welds[0].identity.name = "fillet at bottom flange".into();
    assert_eq!(only(&steel).disagreements, ["a weld lies at \"flange-top\", which its name does not say"]);
}

#[test]
fn a_weld_without_a_place_is_placed_by_its_name_and_says_so() {
    let mut steel = frame(&[Detail::default()]);
    steel.welds[0].points.clear();
    steel.welds[0].identity.name = "Flange top".into();
    steel.told.push(told("T1", &[Part::Member(0), Part::Member(1)], &[Part::Plate(0), Part::Weld(0)]));
    let reason = on_column(&only(&steel)).welds.clone().flange_top.unwrap_err().reason;
    assert_eq!(reason, "the welds there have neither a place nor a length");
    steel.welds[0].length = known(faying::units::mm(400.0));
    let joint = only(&steel);
    assert_eq!(length(&on_column(&joint).welds.flange_top), Some(7.0));
    assert_eq!(joint.disagreements, ["a weld has no place: its name alone makes it \"flange-top\""]);
}
