use faying::units::mm;

use super::bench::{Bench, check, missing};

const ID: &str = "tool-without-room";

/// M24: a socket of 1.5 x 36 = 54 mm; from the axis 27 mm (common practice without a source), 2 mm of tolerance.
#[test]
fn a_socket_beside_a_weld() {
    // 536 - 500 - 12.02 = 23.98
    check(
        ID,
        |b| b.layout().bolts.rows[0].height = mm(536.0),
        &[
            "comment | a socket hardly fits on the bolts in the row at 536 mm beside the beam's top flange or its weld: \
           24 mm from the bolt's axis, 27 mm are wanted (common practice without a source) | at least 27 mm | 24 mm",
        ],
    );
    check(ID, |b| b.layout().bolts.rows[0].height = mm(540.0), &[]);
}

#[test]
fn what_the_head_clashes_with_is_not_told_twice() {
    check(ID, |b| b.layout().bolts.rows[0].height = mm(525.0), &[]);
    check(ID, |b| b.layout().bolts.diameter = Err(missing("bolt diameter")), &[]);
}

#[test]
fn the_socket_is_a_number_of_the_rules() {
    let mut bench = Bench::good();
    bench.layout().bolts.rows[0].height = mm(536.0);
    bench.rulebook.distances.socket = 1.4;
    assert_eq!(bench.find(ID).len(), 0);
}
