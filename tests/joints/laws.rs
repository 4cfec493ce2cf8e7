//! Laws: the same steel is the same joint however it is turned, mirrored, moved or listed.

use faying::joints::{EndPlateLayout, Joint, recognise};
use faying::shop::Steelwork;
use glam::DVec3;
use proptest::prelude::*;

use super::build::*;

/// What must not change, as text: guids for indices, numbers to a thousandth of a mm.
fn essence(steel: &Steelwork) -> Vec<String> {
    let found = recognise(steel, &rulebook());
    let guid = |i: Option<usize>| i.map(|i| steel.members[i].identity.guid.clone());
    let sorted = |mut guids: Vec<String>| {
        guids.sort();
        guids
    };
    let one = |joint: &Joint| {
        let bolts = sorted(joint.bolts.iter().map(|i| steel.bolts[*i].identity.guid.clone()).collect());
        let plates =
            sorted(joint.plates.iter().map(|(i, r)| format!("{} {r}", steel.plates[*i].identity.guid)).collect());
        let welds = sorted(joint.welds.iter().map(|(i, r)| format!("{} {r}", steel.welds[*i].identity.guid)).collect());
        format!(
            "{} {:?} {:?} {:?} {:?} {bolts:?} {plates:?} {welds:?} {:?} {:?} {:?}",
            joint.mark,
            joint.kind,
            guid(joint.supporting),
            guid(joint.supported),
            joint.at_end,
            joint.opposite.map(|i| found.joints[i].mark.clone()),
            joint.disagreements,
            joint.layout.as_ref().map(|layout| numbers(layout.plates().unwrap().on_column().unwrap())),
        )
    };
    found.joints.iter().map(one).collect()
}

fn numbers(layout: &EndPlateLayout) -> String {
    let round = |x: f64| (x * 1000.0).round() / 1000.0 + 0.0;
    let rows: Vec<_> = layout
        .bolts
        .rows
        .iter()
        .map(|r| [r.height, r.gauge, r.edge_plate, r.edge_column].map(|l| round(l.get())))
        .collect();
    let stiffeners: Vec<_> = layout
        .stiffeners
        .iter()
        .map(|s| {
            (
                [s.height, s.thickness, s.outstand, s.reach].map(|l| round(l.get())),
                s.both_sides,
                s.full_depth,
                length(&s.weld),
            )
        })
        .collect();
    let plate =
        [layout.plate.bottom, layout.plate.top, layout.plate.width, layout.plate.thickness].map(|l| round(l.get()));
    let welds = [&layout.welds.flange_top, &layout.welds.flange_bottom, &layout.welds.web].map(length);
    let column = [layout.column_above, layout.column_below].map(|l| l.map(|l| round(l.get())));
    format!("{rows:?} {stiffeners:?} {plate:?} {welds:?} {column:?} {:?}", layout.not_credited)
}

/// Beams on both flanges at different levels, one with stiffeners on one side, and a third further up.
fn building(gauge: f64, thickness: f64) -> Steelwork {
    let ribs = vec![
        Rib { height: 399.0, thickness: 12.0, outstand: 120.0, reach: 277.1, both_sides: true, weld: Some(5.0) },
        Rib { height: 6.4, thickness: 15.0, outstand: 110.0, reach: 180.0, both_sides: false, weld: None },
    ];
    frame(&[
        Detail { gauge, thickness, ribs, ..Detail::default() },
        Detail {
            beam_mark: "B2",
            beam: DEEP,
            top: 600.0,
            turned: true,
            at_end: true,
            soffit: 3900.0,
            ..Detail::default()
        },
        Detail {
            beam_mark: "B3",
            soffit: 6000.0,
            rows: vec![460.0, 345.0, 73.0, -50.0],
            bottom: -90.0,
            ..Detail::default()
        },
    ])
}

/// Marks without coordinates, so that a moved building can be compared.
fn assert_same(a: &Steelwork, b: &Steelwork) -> Result<(), TestCaseError> {
    prop_assert_eq!(essence(a), essence(b));
    Ok(())
}

#[test]
fn the_building_has_three_joints_that_are_laid_out() {
    let found = recognise(&building(90.0, 15.0), &rulebook());
    assert_eq!(found.joints.iter().filter(|joint| joint.layout.is_ok()).count(), 3);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(40))]

    #[test]
    fn a_turned_and_moved_building_has_the_same_joints(
        degrees in 0.0..360.0_f64, x in -1e5..1e5_f64, y in -1e5..1e5_f64, z in -1e4..1e4_f64,
        gauge in 80.0..130.0_f64, thickness in 10.0..40.0_f64,
    ) {
        let steel = building(gauge, thickness);
        assert_same(&steel, &moved(building(gauge, thickness), degrees, DVec3::new(x, y, z)))?;
    }

    #[test]
    fn a_mirrored_building_has_the_same_joints(degrees in 0.0..360.0_f64) {
        assert_same(&building(90.0, 15.0), &mirrored(moved(building(90.0, 15.0), degrees, DVec3::ZERO)))?;
    }

    #[test]
    fn the_order_of_the_parts_does_not_matter(seed in any::<u64>()) {
        let rank = |i: usize| (i as u64 + 1).wrapping_mul(seed | 1).rotate_left(17).wrapping_mul(0x9E37_79B9_7F4A_7C15);
        assert_same(&building(90.0, 15.0), &shuffled(building(90.0, 15.0), rank))?;
    }

    #[test]
    fn the_ends_of_members_and_bolts_and_the_signs_of_axes_do_not_matter(mask in any::<u8>()) {
        let bit = |i: u8| mask >> i & 1 == 1;
        let mut steel = building(90.0, 15.0);
        for bolt in steel.bolts.iter_mut().filter(|_| bit(0)) {
            std::mem::swap(&mut bolt.start, &mut bolt.end);
        }
        for member in &mut steel.members {
            if bit(1) {
                member.depth = -member.depth;
                member.across = -member.across;
            }
        }
        let column = &mut steel.members[0];
        if bit(2) {
            std::mem::swap(&mut column.start, &mut column.end);
            column.along = -column.along;
            column.across = -column.across;
        }
        for plate in steel.plates.iter_mut().filter(|_| bit(3)) {
            std::mem::swap(&mut plate.u, &mut plate.v);
            plate.normal = -plate.normal;
            plate.outline = plate.outline.iter().rev().map(|p| glam::DVec2::new(p.y, p.x)).collect();
        }
        assert_same(&building(90.0, 15.0), &steel)?;
    }
}
