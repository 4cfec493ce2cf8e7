use faying::units::mm;

use super::bench::{Bench, check, known, missing, section};

const ID: &str = "head-without-room";

/// M24: half of 39.55 across corners is 19.8, half of the washer 22 (ISO 4014, ISO 7089). HEB 300: t_w 11, r 27.
#[test]
fn a_head_on_the_root_radius_is_a_hold_and_a_washer_a_comment() {
    let gauge = |w: f64| move |b: &mut Bench| b.layout().bolts.rows[1].gauge = mm(w);
    // 45 - 5.5 - 27 = 12.5
    check(
        ID,
        gauge(90.0),
        &["hold | head or nut of the bolts in the row at 440 mm does not fit beside the root radius of the column: \
           12.5 mm from the bolt's axis, it needs 19.8 mm | at least 19.8 mm | 12.5 mm"],
    );
    // 51.7 - 32.5 = 19.2: within the tolerance of 2 mm for the head, not for the washer.
    check(
        ID,
        gauge(103.4),
        &["comment | a washer of the bolts in the row at 440 mm does not fit beside the root radius of the column: \
           19.2 mm from the bolt's axis, it needs 22 mm | at least 22 mm | 19.2 mm"],
    );
    check(ID, gauge(105.2), &[]);
}

/// IPE 500: flange 16 thick, its middle at 492; throat 8.5, so a leg of 12.02.
#[test]
fn a_head_on_the_weld_of_a_flange_or_of_a_stiffener_is_a_hold() {
    check(
        ID,
        |b| b.layout().bolts.rows[0].height = mm(525.0),
        &[
            "hold | head or nut of the bolts in the row at 525 mm does not fit beside the beam's top flange or its weld: \
           13 mm from the bolt's axis, it needs 19.8 mm | at least 19.8 mm | 13 mm",
        ],
    );
    // The stiffener at 8, 12 thick, throat 5: 35 - 8 - 6 - 7.07; the flange's weld: 35 - 16 - 12.02.
    let mut bench = Bench::good();
    bench.layout().bolts.rows[3].height = mm(35.0);
    let found = bench.lines(ID);
    assert_eq!(found.len(), 2, "{found:#?}");
    assert!(found[0].contains("bottom flange or its weld: 7 mm"));
    assert!(found[1].contains("a stiffener of the column or its weld: 13.9 mm"));
    assert_eq!(bench.find(ID)[1].elements, ["0guidS1", "0guidS2"]);
}

#[test]
fn what_nobody_knows_is_left_out_and_the_steel_itself_stays() {
    let mut bench = Bench::good();
    bench.layout().bolts.rows[0].height = mm(525.0);
    bench.layout().welds.flange_top = Err(missing("weld"));
    assert_eq!(bench.lines(ID), [] as [String; 0], "25 mm to the flange");
    bench.layout().bolts.rows[0].height = mm(515.0);
    assert!(bench.lines(ID)[0].contains("beside the beam's top flange: 15 mm"));
    bench.layout().bolts.diameter = Err(missing("bolt diameter"));
    assert_eq!(bench.find(ID).len(), 0);

    let mut welded = section(&bench.rulebook, "HEB 300");
    welded.r = None;
    check(ID, |b| (b.layout().bolts.rows[1].gauge, b.layout().column.section) = (mm(90.0), known(welded.clone())), &[]);
}

#[test]
fn bolts_beside_a_narrow_flange_are_measured_to_its_corner() {
    // IPE 500 is 200 wide: 30 mm beside it, level with its top flange.
    let mut bench = Bench::good();
    bench.layout().bolts.rows[0].height = mm(492.0);
    bench.layout().bolts.rows[0].gauge = mm(260.0);
    assert_eq!(bench.find(ID).len(), 0);
    bench.layout().bolts.rows[0].gauge = mm(230.0);
    assert_eq!(bench.find(ID).len(), 1, "15 mm beside it");
}
