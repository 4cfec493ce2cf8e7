use faying::units::mm;

use super::bench::{Bench, check, check_deviation, rows};

const ID: &str = "row-moved";

#[test]
fn each_moved_row_is_told_with_its_way() {
    check(
        ID,
        |b| b.layout().bolts.rows = rows(&[560.0, 425.0, 350.0, 62.5]),
        &["comment | bolt rows are not at the intended height: row 2 15 mm lower and row 4 2.5 mm higher | \
           560, 440, 350, 60 mm | 560, 425, 350, 62.5 mm"],
    );
}

#[test]
fn the_tolerance_of_positions_decides() {
    let moved = |by: f64| {
        let mut bench = Bench::good();
        bench.rulebook.tolerances.position = mm(2.0);
        bench.layout().bolts.rows[1].height = mm(440.0 + by);
        bench.find(ID).len()
    };
    assert_eq!([0.0, 2.0, -2.0, 2.01, -2.01].map(moved), [0, 0, 0, 1, 1]);
}

#[test]
fn rows_that_all_moved_are_moved_and_not_missing() {
    let spoil = |b: &mut Bench| b.layout().bolts.rows = rows(&[570.0, 450.0, 360.0, 70.0]);
    let mut bench = Bench::good();
    spoil(&mut bench);
    assert_eq!(bench.find(ID).len(), 1);
    check("row-missing", spoil, &[]);
}

#[test]
fn it_goes_by_what_the_joint_carries() {
    check_deviation(ID, |b| b.layout().bolts.rows[0].height = mm(550.0), &["0guidG"]);
}

#[test]
fn a_height_that_is_no_number_does_not_pass() {
    let mut bench = Bench::good();
    bench.layout().bolts.rows[1].height = mm(f64::NAN);
    assert_eq!(bench.find(ID).len() + bench.find("row-missing").len(), 1);
}
