use faying::units::mm;

use super::bench::{check, check_deviation};

const ID: &str = "plate-thinner";

#[test]
fn a_thinner_plate_is_told() {
    check(
        ID,
        |b| b.layout().plate.thickness = mm(20.0),
        &["comment | the end plate is thinner than intended: 20 mm instead of 25 mm | 25 mm | 20 mm"],
    );
    check_deviation(ID, |b| b.layout().plate.thickness = mm(20.0), &["0guidP"]);
}

#[test]
fn as_thick_thicker_or_not_stated() {
    check(ID, |b| b.layout().plate.thickness = mm(24.999), &[]);
    check(ID, |b| b.layout().plate.thickness = mm(30.0), &[]);
    check(ID, |b| (b.layout().plate.thickness, b.intended().plate_thickness) = (mm(20.0), None), &[]);
}

#[test]
fn what_is_no_number_is_not_thick_enough() {
    check(
        ID,
        |b| b.layout().plate.thickness = mm(f64::NAN),
        &["comment | the end plate is thinner than intended: NaN mm instead of 25 mm | 25 mm | NaN mm"],
    );
}
