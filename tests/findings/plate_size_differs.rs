use faying::assess::State;
use faying::units::mm;

use super::bench::{check, check_deviation};

const ID: &str = "plate-size-differs";

#[test]
fn every_side_that_differs_is_told() {
    check(
        ID,
        |b| (b.layout().plate.width, b.layout().plate.top) = (mm(200.0), mm(600.0)),
        &[
            "comment | the end plate has another size than intended: width 200 mm instead of 220 mm and upper edge 600 mm \
           instead of 610 mm | width 220 mm, upper edge 610 mm | width 200 mm, upper edge 600 mm",
        ],
    );
}

#[test]
fn a_smaller_plate_goes_by_what_the_joint_carries() {
    check_deviation(ID, |b| b.layout().plate.width = mm(200.0), &["0guidP"]);
    check_deviation(ID, |b| b.layout().plate.top = mm(590.0), &["0guidP"]);
    check_deviation(ID, |b| b.layout().plate.bottom = mm(-5.0), &["0guidP"]);
    check_deviation(ID, |b| (b.layout().plate.bottom, b.layout().plate.width) = (mm(-5.0), mm(240.0)), &["0guidP"]);
}

#[test]
fn a_larger_plate_is_a_comment() {
    check(
        ID,
        |b| {
            b.carries(State::NotMet);
            b.layout().plate.bottom = mm(-60.0);
        },
        &["comment | the end plate has another size than intended: lower edge -60 mm instead of -25 mm | \
           lower edge -25 mm | lower edge -60 mm"],
    );
}

#[test]
fn within_the_tolerance_or_not_stated() {
    check(ID, |b| b.layout().plate.top = mm(610.5), &[]);
    check(ID, |b| (b.layout().plate.width, b.intended().plate_width) = (mm(200.0), None), &[]);
}
