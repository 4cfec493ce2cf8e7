//! Column bases laid out in the column's frame. Expected values are the sizes with which the steel was built.

use faying::joints::{ColumnBase, SimpleLayout, recognise};
use faying::shop::{Shape, Steelwork};
use faying::units::mm;
use glam::{DVec2, DVec3};

use super::build::{COLUMN, bolt, hole, member, moved, plate, rulebook, weld};

/// A column with its depth along x on a plate whose middle lies `off` beside its axis.
fn steel(off: f64) -> Steelwork {
    let mut steel = Steelwork::default();
    steel.members.push(member("C1", COLUMN, DVec3::ZERO, DVec3::Z * 6000.0, DVec3::X));
    let mut base = plate("BP", DVec3::new(off, 0.0, -15.0), DVec3::X, DVec3::Y, (520.0, 400.0), 30.0);
    for (x, y) in [(-210.0, -100.0), (-210.0, 100.0), (210.0, -100.0), (210.0, 100.0)] {
        steel.bolts.push(bolt("N", DVec3::new(x, y, -400.0), DVec3::new(x, y, 50.0), 24.0));
        base.holes.push(hole(x - off, y, 30.0, 30.0));
    }
    steel.plates.push(base);
    let (h, b, t_w, t_f) = (COLUMN.1 / 2.0, COLUMN.2 / 2.0, COLUMN.3 / 2.0, COLUMN.4);
    for (i, side) in [-1.0, 1.0].into_iter().enumerate() {
        for (j, x) in [h, h - t_f].into_iter().enumerate() {
            let out = if j == 0 { 6.0 } else { -6.0 };
            let (lo, hi) = (side * x, side * (x + out));
            let (lo, hi) = (DVec3::new(lo.min(hi), -b, 0.0), DVec3::new(lo.max(hi), b, 6.0));
            steel.welds.push(weld(&format!("WF{i}{j}"), lo, hi, 6.0));
        }
        let (lo, hi) = (side * t_w, side * (t_w + 5.0));
        steel.welds.push(weld("WW", DVec3::new(t_f - h, lo.min(hi), 0.0), DVec3::new(h - t_f, lo.max(hi), 5.0), 5.0));
    }
    steel
}

fn laid(steel: &Steelwork) -> Result<ColumnBase, String> {
    let joints = recognise(steel, &rulebook()).joints;
    let [joint] = &joints[..] else { panic!("{} joints", joints.len()) };
    let laid = joint.layout.as_ref().map_err(Clone::clone)?;
    let Some(SimpleLayout::ColumnBase(base)) = laid.simple() else { panic!("{laid:?}") };
    Ok((**base).clone())
}

#[test]
fn a_base_in_its_columns_frame() {
    for steel in [steel(0.0), moved(steel(0.0), 33.0, DVec3::new(4e4, -7e3, 1e3))] {
        let base = laid(&steel).unwrap();
        let near = |a: faying::units::Length, b: f64| assert!((a - mm(b)).abs().get() < 1e-6, "{a} {b}");
        base.half_depths.iter().for_each(|half| near(*half, 260.0));
        base.half_widths.iter().for_each(|half| near(*half, 200.0));
        near(base.thickness, 30.0);
        assert_eq!(base.anchors.len(), 4);
        for anchor in &base.anchors {
            near(anchor.along.abs(), 210.0);
            near(anchor.across.abs(), 100.0);
        }
        assert_eq!(base.hole.as_ref().map(|hole| hole.value), Ok(mm(30.0)));
        assert_eq!(base.diameter.as_ref().map(|d| d.value), Ok(mm(24.0)));
        let throats = [&base.flange_weld, &base.web_weld].map(|weld| weld.as_ref().map(|a| a.value));
        assert_eq!(throats, [Ok(mm(6.0)), Ok(mm(5.0))]);
        assert!(base.beside.is_empty() && base.foundation.is_none());
    }
}

#[test]
fn the_lesser_side_of_a_plate_beside_its_column() {
    let base = laid(&steel(20.0)).unwrap();
    assert_eq!(base.half_depths.map(|half| half.get().round()), [240.0, 280.0]);
}

#[test]
fn holes_that_nobody_models_are_not_taken_for_normal_ones() {
    let mut steel = steel(0.0);
    steel.plates[0].holes.clear();
    assert!(laid(&steel).unwrap().hole.unwrap_err().reason.contains("seldom normal"));
}

#[test]
fn a_shear_key_and_a_stiffener_are_told_apart() {
    let mut steel = steel(0.0);
    steel.plates.push(plate("SK", DVec3::Z * -80.0, DVec3::X, DVec3::Z, (100.0, 100.0), 20.0));
    steel.plates.push(plate("ST", DVec3::new(210.0, 0.0, 50.0), DVec3::X, DVec3::Z, (80.0, 100.0), 10.0));
    let said = laid(&steel).unwrap().beside;
    assert!(said[0].starts_with("SK: a shear key") && said[1].starts_with("ST: beside the column"), "{said:?}");
}

#[test]
fn what_is_not_covered_is_refused_with_a_reason() {
    let refused = |spoil: fn(&mut Steelwork), words: &str| {
        let mut steel = steel(0.0);
        spoil(&mut steel);
        let why = laid(&steel).unwrap_err();
        assert!(why.starts_with("kind not assessed yet: column-base") && why.contains(words), "{why}");
    };
    refused(|s| s.members[0].shape = Shape::Hollow, "no I section");
    refused(|s| s.members[0].not_assessed = Some("tapered".into()), "can't be assessed");
    refused(|s| s.plates[0].outline[0] += DVec2::splat(60.0), "no rectangle");
    refused(
        |s| {
            s.plates[0].outline.iter_mut().for_each(|p| *p *= 0.58);
            s.bolts.iter_mut().for_each(|b| {
                (b.start.x, b.end.x) = (b.start.x * 0.5, b.end.x * 0.5);
            });
        },
        "beyond the column",
    );
}
