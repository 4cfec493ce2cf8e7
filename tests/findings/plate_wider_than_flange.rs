use faying::units::mm;

use super::bench::{check, missing};

const ID: &str = "plate-wider-than-flange";

/// HEB 300 is 300 wide.
#[test]
fn a_plate_that_stands_over_is_a_comment() {
    check(
        ID,
        |b| b.layout().plate.width = mm(320.0),
        &["comment | the end plate is 320 mm wide and the column's flange 300 mm: it stands over by 20 mm in all | \
           at most 300 mm | 320 mm"],
    );
    check(ID, |b| b.layout().plate.width = mm(302.0), &[]);
    check(ID, |b| (b.layout().plate.width, b.layout().column.section) = (mm(320.0), Err(missing("section"))), &[]);
}
