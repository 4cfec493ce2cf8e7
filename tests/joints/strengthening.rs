//! Web plates, diagonals and backing plates found by where they lie. The column is 320.5 deep, 309.2 wide, its web 13.8
//! and its flanges 21.7 thick; the soffit of the 406.4 mm beam lies at 4000.

use faying::joints::EdgeWeld;
use faying::shop::{Steelwork, WeldSort};
use faying::units::mm;
use glam::DVec3;

use super::build::{Detail, frame, known, moved, plate, weld};
use super::layouts::{close, layout, only};

/// A 10 mm plate on the web from 4000 − 100 to 4000 + 600, on the side of positive y, and its fillets along both edges.
fn web_plate(throat: Option<f64>) -> Steelwork {
    let mut steel = frame(&[Detail::default()]);
    let y = 6.9 + 5.0;
    steel.plates.push(plate("WP", DVec3::new(0.0, y, 4250.0), DVec3::X, DVec3::Z, (246.0, 700.0), 10.0));
    for (i, side) in [-1.0, 1.0].into_iter().enumerate() {
        let Some(a) = throat else { continue };
        let (lo, hi) = (DVec3::new(123.0 * side, y - 5.0, 3900.0), DVec3::new(123.0 * side + a * side, y, 4600.0));
        steel.welds.push(weld(&format!("WPW{i}"), lo.min(hi), lo.max(hi), a));
    }
    steel
}

#[test]
fn a_web_plate_with_its_fillets() {
    let steel = web_plate(Some(7.0));
    let joint = only(&steel);
    assert_eq!(joint.plates.iter().filter(|(_, role)| *role == "web-plate").count(), 1);
    let layout = layout(&steel);
    let [found] = &layout.strengthening.web_plates[..] else { panic!("{:?}", layout.strengthening) };
    for (size, expected) in [
        (found.thickness, 10.0),
        (found.width, 246.0),
        (found.half_width, 123.0),
        (found.bottom, -100.0),
        (found.top, 600.0),
    ] {
        close(size.get(), expected);
    }
    assert_eq!(found.weld.as_ref().unwrap().value, EdgeWeld::Fillet(mm(7.0)));
    assert_eq!(layout.not_credited, Vec::<String>::new());
}

#[test]
fn both_long_edges_of_a_web_plate_must_be_welded() {
    let reason =
        |steel: &Steelwork| layout(steel).strengthening.web_plates[0].weld.as_ref().unwrap_err().reason.clone();
    assert_eq!(reason(&web_plate(None)), "no weld is modelled there");
    let mut one = web_plate(Some(7.0));
    one.welds.pop();
    assert_eq!(reason(&one), "0 mm of a long edge of 700 mm are welded");
    let mut short = web_plate(Some(7.0));
    short.welds.last_mut().unwrap().points.iter_mut().for_each(|p| p.z = p.z.min(4200.0));
    assert_eq!(reason(&short), "300 mm of a long edge of 700 mm are welded");
}

#[test]
fn butt_welds_along_a_web_plate() {
    let mut steel = web_plate(Some(7.0));
    steel.welds.iter_mut().filter(|w| w.identity.guid.contains("WPW")).for_each(|w| w.sort = WeldSort::Butt);
    // 7 mm deep in a plate of 10 mm: not known to go through.
    assert!(layout(&steel).strengthening.web_plates[0].weld.is_err());
    steel.welds.iter_mut().filter(|w| w.identity.guid.contains("WPW")).for_each(|w| w.sort = WeldSort::FullButt);
    assert_eq!(layout(&steel).strengthening.web_plates[0].weld.as_ref().unwrap().value, EdgeWeld::Butt);
}

#[test]
fn a_stiffener_stands_on_a_web_plate_as_on_the_web() {
    let mut steel = web_plate(Some(7.0));
    for side in [-1.0, 1.0] {
        let (inner, outer) = (if side > 0.0 { 16.9 } else { 6.9 }, 140.0);
        let middle = DVec3::new(0.0, side * (inner + outer) / 2.0, 4006.4);
        steel.plates.push(plate("ST", middle, DVec3::X, DVec3::Y, (277.1, outer - inner), 12.0));
    }
    let layout = layout(&steel);
    assert_eq!(layout.stiffeners.len(), 1);
    assert!(layout.stiffeners[0].both_sides && layout.stiffeners[0].full_depth);
    assert_eq!(layout.strengthening.web_plates.len(), 1);
}

/// A plate in the column's chamber that lies off its web, and one that is no rectangle.
#[test]
fn what_does_not_lie_flat_on_the_web_is_named() {
    let mut off = web_plate(None);
    off.plates.last_mut().unwrap().centre.y += 60.0;
    // It touches the column's flange.
    off.plates.last_mut().unwrap().centre.x += 160.25 - 21.7 - 123.0;
    let mut cut = web_plate(None);
    cut.plates.last_mut().unwrap().outline[0].y += 40.0;
    for steel in [off, cut] {
        let layout = layout(&steel);
        assert!(layout.strengthening.web_plates.is_empty());
        assert_eq!(layout.not_credited, ["a web plate is not credited"]);
    }
}

/// The plates of a diagonal between two heights above the soffit at the flanges' inner faces.
fn diagonal(steel: &mut Steelwork, at_joint: f64, at_far: f64, sides: &[f64]) {
    let clear = 160.25 - 21.7;
    let (a, b) = (DVec3::new(clear, 0.0, 4000.0 + at_joint), DVec3::new(-clear, 0.0, 4000.0 + at_far));
    for side in sides {
        let middle = (a + b) / 2.0 + DVec3::Y * side * (6.9 + 60.0);
        let along = (a - b).normalize();
        let half = (a - b).length() / 2.0;
        let mut half_plate = plate("DI", middle, along, DVec3::Y, (2.0 * half, 120.0), 15.0);
        half_plate.grade = known(faying::rulebook::Grade("S355".into()));
        steel.plates.push(half_plate);
    }
}

#[test]
fn diagonals_by_the_heights_at_which_they_meet_the_flanges() {
    for degrees in [0.0, 37.0] {
        let mut steel = frame(&[Detail::default()]);
        diagonal(&mut steel, 400.0, 6.4, &[-1.0, 1.0]);
        diagonal(&mut steel, 6.4, 203.0, &[-1.0]);
        let steel = moved(steel, degrees, DVec3::new(5e4, -2e4, 100.0));
        let joint = only(&steel);
        assert_eq!(joint.plates.iter().filter(|(_, role)| *role == "diagonal").count(), 3);
        let layout = layout(&steel);
        let [n, one] = &layout.strengthening.diagonals[..] else { panic!("{:?}", layout.strengthening) };
        for (height, expected) in [(n.near, 400.0), (n.far, 6.4), (one.near, 6.4), (one.far, 203.0)] {
            close(height.get(), expected);
        }
        close(n.outstand.get(), 120.0);
        assert!(n.both_sides && n.full_depth && !one.both_sides && one.full_depth);
        assert_eq!(n.weld.as_ref().unwrap_err().reason, "no weld is modelled there");
        assert_eq!(layout.not_credited, Vec::<String>::new());
    }
}

#[test]
fn a_diagonal_behind_the_end_plate_is_no_other_beams_end_plate() {
    let mut steel = frame(&[Detail::default()]);
    // Its normal is 37° from the beam's axis, and the beam's end is near.
    let (along, middle) = (DVec3::new(-0.606, 0.0, 0.795), DVec3::new(0.0, 78.0, 4203.2));
    steel.plates.push(plate("DI", middle, along, DVec3::Y, (438.0, 142.0), 15.0));
    let layout = layout(&steel);
    assert!(layout.strengthening.diagonals.len() == 1 && !layout.strengthening.diagonals[0].both_sides);
}

#[test]
fn a_diagonal_that_ends_in_the_web_reaches_no_flange() {
    let mut steel = frame(&[Detail::default()]);
    diagonal(&mut steel, 400.0, 6.4, &[-1.0, 1.0]);
    for plate in steel.plates.iter_mut().filter(|p| p.identity.guid.contains("DI")) {
        plate.outline.iter_mut().for_each(|p| p.x = p.x.min(200.0));
    }
    assert!(!layout(&steel).strengthening.diagonals[0].full_depth);
}

#[test]
fn backing_plates_lie_behind_the_flange_under_the_bolts() {
    let mut steel = frame(&[Detail::default()]);
    let x = 160.25 - 21.7 - 5.0;
    for side in [-1.0, 1.0] {
        let (inner, outer) = (6.9 + 17.0, 309.2 / 2.0);
        let middle = DVec3::new(x, side * (inner + outer) / 2.0, 4390.0);
        steel.plates.push(plate("BP", middle, DVec3::Y, DVec3::Z, (outer - inner, 210.0), 10.0));
    }
    steel.bolts.iter_mut().for_each(|bolt| bolt.start.x -= 10.0);
    let joint = only(&steel);
    assert_eq!(joint.plates.iter().filter(|(_, role)| *role == "backing-plate").count(), 2);
    let layout = layout(&steel);
    let [backing] = &layout.strengthening.backing[..] else { panic!("{:?}", layout.strengthening) };
    for (size, expected) in [
        (backing.thickness, 10.0),
        (backing.bottom, 285.0),
        (backing.top, 495.0),
        (backing.from_web, 17.0),
        (backing.short_of_edge, 0.0),
    ] {
        close(size.get(), expected);
    }
    assert!(backing.both_sides);
    assert_eq!(layout.not_credited, Vec::<String>::new());
}

/// One plate across the web can't be there, but a drawing may hold it: it is named, not sorted.
#[test]
fn a_plate_behind_the_flange_across_the_web_is_named() {
    let mut steel = frame(&[Detail::default()]);
    let inside = DVec3::new(160.25 - 21.7 - 5.0, 0.0, 4397.7);
    steel.plates.push(plate("BP", inside, DVec3::Y, DVec3::Z, (150.0, 200.0), 10.0));
    steel.bolts.iter_mut().for_each(|bolt| bolt.start.x -= 10.0);
    let layout = layout(&steel);
    assert!(layout.strengthening.backing.is_empty());
    assert_eq!(layout.not_credited, ["a backing plate is not credited"]);
}
