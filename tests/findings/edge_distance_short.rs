use faying::joints::{Laid, SimpleLayout};
use faying::units::mm;

use super::bench::{Bench, check, known, missing, rows};
use crate::assess::flexible;

const ID: &str = "edge-distance-short";

/// EN 1993-1-8:2005 Table 3.3 for d0 = 26: e 31.2, p1 57.2, p2 62.4 (own arithmetic).
#[test]
fn each_distance_has_its_least() {
    let e1 = "hold | the end distance e1 of the bolts in the end plate is 30 mm, the least allowed is 31.2 mm (1.2 d0) | \
              at least 31.2 mm | 30 mm";
    check(ID, |b| b.layout().plate.top = mm(590.0), &[e1]);
    check(ID, |b| b.layout().plate.bottom = mm(30.0), &[e1]);
    check(
        ID,
        |b| b.layout().column_above = Some(mm(30.0)),
        &["hold | the end distance e1 of the bolts in the column is 30 mm, the least allowed is 31.2 mm (1.2 d0) | \
           at least 31.2 mm | 30 mm"],
    );
    check(
        ID,
        |b| b.layout().bolts.rows[2].edge_plate = mm(30.0),
        &[
            "hold | the edge distance e2 of the bolts in the end plate is 30 mm, the least allowed is 31.2 mm (1.2 d0) | \
           at least 31.2 mm | 30 mm",
        ],
    );
    check(
        ID,
        |b| b.layout().bolts.rows[2].edge_column = mm(30.0),
        &["hold | the edge distance e2 of the bolts in the column flange is 30 mm, the least allowed is 31.2 mm \
           (1.2 d0) | at least 31.2 mm | 30 mm"],
    );
    check(
        ID,
        |b| b.layout().bolts.rows = rows(&[560.0, 440.0, 390.0, 60.0]),
        &["hold | the spacing p1 of the bolt rows is 50 mm, the least allowed is 57.2 mm (2.2 d0) | \
           at least 57.2 mm | 50 mm"],
    );
    check(
        ID,
        |b| b.layout().bolts.rows[0].gauge = mm(60.0),
        &[
            "hold | the gauge p2 of the bolts is 60 mm, the least allowed is 62.4 mm (2.4 d0) | at least 62.4 mm | 60 mm",
        ],
    );
}

#[test]
fn the_shortest_of_a_sort_is_told() {
    let mut bench = Bench::good();
    (bench.layout().plate.top, bench.layout().plate.bottom) = (mm(590.0), mm(32.0));
    assert_eq!(bench.find(ID).len(), 1);
    assert_eq!(bench.find(ID)[0].detailed.as_deref(), Some("28 mm"));
}

#[test]
fn it_needs_neither_intention_nor_action_and_a_met_joint_is_on_hold_all_the_same() {
    let mut bench = Bench::good();
    bench.layout().plate.top = mm(590.0);
    let with = bench.lines(ID);
    (bench.intended, bench.scheduled, bench.assessment) = (None, None, None);
    assert_eq!(bench.lines(ID), with);
}

#[test]
fn enough_is_enough_and_larger_holes_need_more() {
    let found = |above: f64, hole: f64| {
        let mut bench = Bench::good();
        bench.layout().plate.top = mm(560.0 + above);
        bench.layout().bolts.hole = known(mm(hole));
        bench.find(ID).len()
    };
    assert_eq!(found(31.2, 26.0), 0);
    assert_eq!(found(31.2, 30.0), 1);
    assert_eq!(found(f64::NAN, 26.0), 1, "what is no number is not enough");
    check(ID, |b| (b.layout().plate.top, b.layout().bolts.hole) = (mm(590.0), Err(missing("hole"))), &[]);
}

/// Own arithmetic on a hole of 22: the plate of a flexible joint, whose sides are 26.4 away at least.
#[test]
fn of_a_flexible_end_plate() {
    let mut layout = flexible::PLAIN.layout(&flexible::RULES);
    layout.bolts.rows.iter_mut().for_each(|row| row.edge_plate = mm(20.0));
    let mut bench = Bench::good();
    bench.joint().layout = Ok(Laid::Simple(SimpleLayout::FlexibleEndPlate(Box::new(layout))));
    let [line] = &bench.lines(ID)[..] else { panic!("{:?}", bench.lines(ID)) };
    assert!(line.starts_with("hold | the edge distance e2 of the bolts in the end plate is 20 mm"), "{line}");
}
