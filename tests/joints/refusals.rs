//! Every reason for which an end-plate joint is found and not laid out.

use faying::joints::{Kind, recognise};
use faying::shop::Steelwork;
use faying::units::mm;
use glam::{DVec2, DVec3};

use super::build::*;
use super::layouts::only;

#[track_caller]
fn refused(steel: &Steelwork, reason: &str) {
    let joint = only(steel);
    assert_eq!(joint.kind, Kind::EndPlateMoment);
    let why = joint.layout.expect_err("no reason");
    assert!(why.contains(reason), "{why}");
    assert!(!joint.bolts.is_empty() && joint.plates[0] == (0, "end-plate"));
}

fn plain() -> Steelwork {
    frame(&[Detail::default()])
}

#[test]
fn slots_that_the_bolts_state() {
    let mut steel = plain();
    steel.bolts[3].slot = Some(mm(40.0));
    refused(&steel, "slotted holes");
}

#[test]
fn an_anchor_among_the_bolts() {
    let mut steel = plain();
    steel.bolts[3].anchor = true;
    refused(&steel, "among its bolts are anchors");
}

#[test]
fn a_row_of_four() {
    let mut steel = plain();
    for side in [-90.0, 90.0] {
        let at = |x: f64| DVec3::new(x, side, 4450.4);
        steel.bolts.push(bolt("more", at(138.0), at(175.0), 20.0));
    }
    refused(&steel, "the row at 450 mm has 4 in it");
}

#[test]
fn a_row_of_one() {
    let mut steel = plain();
    steel.bolts.remove(0);
    refused(&steel, "the row at 450 mm has 1 in it");
}

#[test]
fn a_row_off_the_web() {
    let mut steel = plain();
    for bolt in &mut steel.bolts[0..2] {
        bolt.start.y += 5.0;
        bolt.end.y += 5.0;
    }
    refused(&steel, "not symmetrical about the web, by 10.0 mm");
}

#[test]
fn a_bolt_that_leans() {
    let mut steel = plain();
    steel.bolts[0].end.y += 2.0;
    refused(&steel, "a bolt leans 3.1°");
}

#[test]
fn a_bolt_beside_the_columns_flange() {
    let detail = Detail { width: 400.0, gauge: 330.0, ..Detail::default() };
    let mut steel = frame(&[detail]);
    for bolt in &mut steel.bolts[0..6] {
        bolt.start.y *= 0.5;
        bolt.end.y *= 0.5;
    }
    refused(&steel, "2 of 8 bolts do not pass through the column's flange");
}

#[test]
fn slots() {
    let mut steel = plain();
    steel.plates[0].holes.push(hole(-45.0, 450.4 - 235.7, 22.0, 40.0));
    refused(&steel, "slotted holes: not assessed yet");
}

#[test]
fn an_eccentric_beam() {
    let mut steel = plain();
    steel.members[0].start.y += 30.0;
    steel.members[0].end.y += 30.0;
    refused(&steel, "beam is eccentric to the column's web by 30.0 mm: not assessed");
}

#[test]
fn a_sloping_or_skewed_beam() {
    for (rise, reason) in [(DVec3::Z, "beam slopes 5.0°"), (DVec3::Y, "beam is skewed in plan by 5.0°")] {
        let mut steel = plain();
        let start = steel.members[1].start;
        let along = (DVec3::X + rise * 5.0_f64.to_radians().tan()).normalize();
        let turned = member("B1", BEAM, start, start + along * 6000.0, DVec3::Z);
        steel.members[1] = turned;
        // The welds lie where a straight beam would have its flanges; the piece still holds beam and plate together.
        refused(&steel, reason);
    }
}

#[test]
fn a_plate_that_is_no_rectangle() {
    let mut steel = plain();
    let outline = &mut steel.plates[0].outline;
    outline[2] = DVec2::new(100.0, 220.0);
    outline.insert(3, DVec2::new(70.0, 250.7));
    refused(&steel, "no upright rectangle");
}

#[test]
fn gaps_and_packing() {
    let mut apart = plain();
    apart.members[0].start.x -= 4.0;
    apart.members[0].end.x -= 4.0;
    refused(&apart, "stands off the column's flange by 4.0 mm");
    let mut off = plain();
    off.members[1].start.x += 6.0;
    refused(&off, "the beam's end stands 6.0 mm off the end plate");
    let mut into = plain();
    into.members[1].start.x -= 15.0;
    refused(&into, "the beam runs 15.0 mm into the end plate");
    let packed = |size: (f64, f64), t: f64| {
        let mut steel = plain();
        for part in steel.members[0..1].iter_mut() {
            part.start.x -= 6.0;
            part.end.x -= 6.0;
        }
        let middle = steel.plates[0].centre - DVec3::X * (7.5 + t / 2.0);
        steel.plates.push(plate("PK", middle, DVec3::Y, DVec3::Z, size, t));
        steel.bolts.iter_mut().for_each(|bolt| bolt.start.x -= 6.0);
        steel
    };
    for size in [(150.0, 502.0), (200.0, 440.0)] {
        refused(&packed(size, 6.0), "6.0 mm of packing under the end plate does not reach under all of it");
    }
    refused(&packed((200.0, 502.0), 2.0), "stands off the column's flange by 4.0 mm");
}

/// A pack of the end plate's size or more carries compression and prying through: only the bolts' shear pays for it.
#[test]
fn rigid_packing_is_laid_out() {
    let mut steel = plain();
    for part in steel.members[0..1].iter_mut() {
        part.start.x -= 10.0;
        part.end.x -= 10.0;
    }
    let face = steel.plates[0].centre - DVec3::X * 7.5;
    for (mark, from, t) in [("PK1", 0.0, 4.0), ("PK2", 4.0, 6.0)] {
        let middle = face - DVec3::X * (from + t / 2.0);
        steel.plates.push(plate(mark, middle, DVec3::Y, DVec3::Z, (210.0, 520.0), t));
    }
    steel.bolts.iter_mut().for_each(|bolt| bolt.start.x -= 10.0);
    let joint = only(&steel);
    let layout = joint.layout.as_ref().unwrap().plates().unwrap();
    assert_eq!(layout.bolts().held.packing, [mm(4.0), mm(6.0)]);
    assert_eq!(layout.on_column().unwrap().not_credited, Vec::<String>::new());
    assert_eq!(joint.plates.iter().filter(|(_, role)| *role == "packing").count(), 2);
    assert!((layout.grip().unwrap() - layout.plies().unwrap().into_iter().sum()).get() - 10.0 < 1e-9);
}

#[test]
fn a_haunch_of_plates_or_cut_from_a_section() {
    let deep = Detail { bottom: -300.0, ..Detail::default() };
    let mut plates = frame(std::slice::from_ref(&deep));
    plates.plates.push(plate("HW", DVec3::new(275.25, 0.0, 3850.0), DVec3::X, DVec3::Z, (200.0, 280.0), 8.0));
    refused(&plates, "a plate stands on the end plate beside the beam");
    let mut cut = frame(&[deep]);
    let start = cut.members[1].start - DVec3::Z * 380.0;
    let mut haunch = member("H1", BEAM, start, start + DVec3::X * 800.0, DVec3::Z);
    haunch.extents.y = 250.0;
    cut.members.push(haunch);
    refused(&cut, "another member ends on the same end plate (a haunch?)");
}

#[test]
fn members_that_can_not_be_assessed_say_why() {
    let mut steel = plain();
    steel.members[1].not_assessed = Some("tapered member: not assessed yet".into());
    refused(&steel, "beam: tapered member: not assessed yet");
}

#[test]
fn a_post_on_a_beam_has_no_upper_flange() {
    // The same steel laid on its side: the column runs level, the beam stands up from it.
    let mut steel = plain();
    let turn = glam::DQuat::from_rotation_y(-std::f64::consts::FRAC_PI_2);
    move_all(&mut steel, |p| turn * p, |d| turn * d);
    refused(&steel, "vertical or lies on its side");
}

#[test]
fn no_number_makes_it_panic() {
    for nonsense in [f64::NAN, f64::INFINITY, 1e300] {
        let mut steel = plain();
        steel.members[1].extents.y = nonsense;
        recognise(&steel, &rulebook());
        let mut steel = plain();
        steel.bolts[0].start.z = nonsense;
        steel.plates[0].outline[1].x = nonsense;
        steel.welds[0].points[3].y = nonsense;
        steel.members[0].end.z = nonsense;
        recognise(&steel, &rulebook());
        let mut steel = plain();
        steel.plates[0].normal = DVec3::splat(nonsense);
        steel.members[0].along = DVec3::ZERO;
        recognise(&steel, &rulebook());
    }
    let mut steel = plain();
    steel.plates[0].outline.clear();
    steel.members[0].end = steel.members[0].start;
    recognise(&steel, &rulebook());
    recognise(&Steelwork::default(), &rulebook());
}
