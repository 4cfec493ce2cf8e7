use faying::units::mm;

use super::bench::{check, check_deviation};

const ID: &str = "gauge-differs";

#[test]
fn the_row_that_differs_most_is_told() {
    check(
        ID,
        |b| {
            b.layout().bolts.rows[1].gauge = mm(110.0);
            b.layout().bolts.rows[2].gauge = mm(140.0);
        },
        &["comment | the gauge of the bolts is wider than intended: 140 mm instead of 120 mm | 120 mm | 140 mm"],
    );
    check(
        ID,
        |b| b.layout().bolts.rows.iter_mut().for_each(|row| row.gauge = mm(90.0)),
        &["comment | the gauge of the bolts is narrower than intended: 90 mm instead of 120 mm | 120 mm | 90 mm"],
    );
}

#[test]
fn it_goes_by_what_the_joint_carries() {
    check_deviation(ID, |b| b.layout().bolts.rows[0].gauge = mm(140.0), &["0guidG"]);
}

#[test]
fn within_the_tolerance_or_not_stated() {
    check(ID, |b| b.layout().bolts.rows[0].gauge = mm(120.5), &[]);
    check(ID, |b| (b.layout().bolts.rows[0].gauge, b.intended().gauge) = (mm(140.0), None), &[]);
}
