use faying::assess::State;
use faying::units::mm;

use super::bench::check;

const ID: &str = "plate-thicker";

#[test]
fn a_thicker_plate_is_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        check(
            ID,
            |b| (b.layout().plate.thickness = mm(30.0), b.carries(state)).1,
            &[
                "comment | the end plate is thicker than intended: 30 mm instead of 25 mm; the bolts may become the weak \
               link | 25 mm | 30 mm",
            ],
        );
    }
}

#[test]
fn as_thick_thinner_or_not_stated() {
    check(ID, |b| b.layout().plate.thickness = mm(25.001), &[]);
    check(ID, |b| b.layout().plate.thickness = mm(20.0), &[]);
    check(ID, |b| (b.layout().plate.thickness, b.intended().plate_thickness) = (mm(30.0), None), &[]);
}
