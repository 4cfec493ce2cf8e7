//! End-plate splices in their own frame.

use faying::joints::{Kind, Layout, SpliceLayout};
use faying::shop::Steelwork;
use glam::{DQuat, DVec3};

use super::build::{DEEP, Detail, Sizes, length, member, move_all, moved, plate, spliced};
use super::layouts::only;

const IPE_400: Sizes = ("IPE 400", 400.0, 180.0, 8.6, 13.5);

/// A half with its own mark.
fn half(mark: &'static str) -> Detail {
    Detail {
        beam: IPE_400,
        beam_mark: mark,
        rows: vec![329.0, 229.0, 71.0],
        bottom: -15.0,
        top: 415.0,
        thickness: 15.0,
        ..Detail::default()
    }
}

fn splice(steel: &Steelwork) -> SpliceLayout {
    let joint = only(steel);
    assert_eq!(joint.kind, Kind::EndPlateSplice);
    match joint.layout.expect("laid out").plates() {
        Some(Layout::Splice(layout)) => layout.clone(),
        other => panic!("{other:?}"),
    }
}

fn refused(steel: &Steelwork) -> String {
    let joint = only(steel);
    assert_eq!(joint.kind, Kind::EndPlateSplice);
    joint.layout.expect_err("laid out")
}

fn close(a: f64, b: f64) {
    assert!((a - b).abs() < 1e-6, "{a} is not {b}");
}

/// Both halves as they were built; the first by mark is the supporting one. Turned and moved it is the same.
#[test]
fn both_halves_are_laid_out() {
    let two = Detail { thickness: 20.0, width: 180.0, top: 430.0, throats: Some((8.0, 5.0)), ..half("B2") };
    for steel in [spliced(&half("B1"), &two), moved(spliced(&half("B1"), &two), 17.0, DVec3::new(3e4, -2e4, 500.0))] {
        let layout = splice(&steel);
        let (supported, supporting) = (&layout.supported, &layout.supporting);
        assert_eq!((supported.beam.guid.as_str(), supporting.beam.guid.as_str()), ("-B2", "-B1"));
        close(supported.plate.thickness.get(), 20.0);
        close(supported.plate.top.get(), 430.0);
        close(supported.plate.width.get(), 180.0);
        close(supporting.plate.thickness.get(), 15.0);
        close(supporting.plate.top.get(), 415.0);
        close(supporting.plate.bottom.get(), -15.0);
        close(supporting.soffit.get(), 0.0);
        assert_eq!(length(&supported.welds.flange_top), Some(8.0));
        assert_eq!(length(&supporting.welds.flange_top), Some(7.0));
        assert_eq!(length(&supporting.welds.web), Some(4.0));
        let rows = &layout.bolts.rows;
        assert_eq!(rows.len(), 3);
        for (row, height) in rows.iter().zip([329.0, 229.0, 71.0]) {
            close(row.height.get(), height);
            close(row.gauge.get(), 90.0);
            close(row.edge_plate.get(), (180.0 - 90.0) / 2.0);
            close(row.edge_column.get(), (200.0 - 90.0) / 2.0);
        }
    }
}

/// Heights are from the supported beam's soffit; the other beam's own soffit is said.
#[test]
fn a_deeper_beam_hangs_lower() {
    let deep = Detail { beam: DEEP, soffit: 4000.0 - 133.1, bottom: -15.0, top: 548.1, ..half("B1") };
    let steel = spliced(&Detail { ..half("B2") }, &deep);
    let layout = splice(&steel);
    assert_eq!(layout.supported.beam.guid, "-B2");
    close(layout.supporting.soffit.get(), -133.1);
    close(layout.supporting.plate.bottom.get(), -148.1);
    close(layout.supporting.plate.top.get(), 415.0);
    close(layout.bolts.rows[0].height.get(), 329.0);
}

#[test]
fn what_is_not_laid_out_says_why() {
    let plain = || spliced(&half("B1"), &half("B2"));
    assert!(only(&plain()).layout.is_ok());
    let mut apart = plain();
    apart.plates[1].centre.x -= 4.0;
    apart.members[1].start.x -= 4.0;
    apart.members[1].end.x -= 4.0;
    assert_eq!(refused(&apart), "the end plates stand off each other by 4.0 mm: not assessed");

    let mut aside = plain();
    aside.members[1].start.y += 12.0;
    aside.members[1].end.y += 12.0;
    assert_eq!(refused(&aside), "the beams' webs are 12.0 mm out of one plane: not assessed");

    let mut sloping = plain();
    let beam = &sloping.members[1];
    let far = beam.start - DVec3::new(6000.0, 0.0, -600.0);
    sloping.members[1] = member("B2", IPE_400, beam.start, far, DVec3::Z);
    assert!(refused(&sloping).contains("slopes 5.7° to the end plate's normal"), "{}", refused(&sloping));

    let mut upright = plain();
    let turn = DQuat::from_rotation_y(-std::f64::consts::FRAC_PI_2);
    move_all(&mut upright, |p| turn * p, |d| turn * d);
    assert!(refused(&upright).starts_with("the members are vertical"), "{}", refused(&upright));

    let mut ribbed = plain();
    let middle = DVec3::new(15.0 + 60.0, 0.0, 4000.0 + 415.0 + 40.0);
    ribbed.plates[0] = plate("P", DVec3::new(7.5, 0.0, 4240.0), DVec3::Y, DVec3::Z, (200.0, 510.0), 15.0);
    ribbed.plates.push(plate("RIB", middle, DVec3::X, DVec3::Z, (120.0, 80.0), 10.0));
    assert!(refused(&ribbed).contains("a haunch or a rib"), "{}", refused(&ribbed));

    let mut single = plain();
    single.bolts[0].start.x = 5.0;
    assert!(refused(&single).contains("1 of 6 bolts do not pass through both end plates"), "{}", refused(&single));
}
