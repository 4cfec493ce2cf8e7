use glam::{DVec2, DVec3};

use super::bench::{Bench, known, missing, section};

const ID: &str = "stiffener-in-root";

/// A stiffener on the positive side of the web of HEB 300 (h 300, t_w 11, t_f 19, r 27), its inner corners cut by `cut`.
fn with_cut(cut: f64) -> Bench {
    let mut bench = Bench::good();
    let column = &mut bench.steelwork.members[0];
    (column.along, column.across, column.depth) = (DVec3::Z, DVec3::X, DVec3::Y);
    let plate = &mut bench.steelwork.plates[1];
    (plate.centre, plate.u, plate.v, plate.normal) = (DVec3::new(5.5, 0.0, 8.0), DVec3::X, DVec3::Y, DVec3::Z);
    let corners =
        [(cut, -131.0), (140.0, -131.0), (140.0, 131.0), (cut, 131.0), (0.0, 131.0 - cut), (0.0, cut - 131.0)];
    plate.outline = corners.iter().map(|(x, y)| DVec2::new(*x, *y)).collect();
    bench
}

/// A square corner lies (√2 - 1) r = 11.2 deep, by geometry.
#[test]
fn a_square_corner_is_a_comment_and_a_cut_one_is_not() {
    let bench = with_cut(0.0);
    let message = "comment | a corner of a column stiffener lies 11.2 mm deep in the column's root radius | - | -";
    assert_eq!(bench.lines(ID), [message]);
    assert_eq!(bench.find(ID)[0].elements, ["0guidS1"]);
    assert_eq!(with_cut(27.0).find(ID).len(), 0);
    assert_eq!(with_cut(30.0).find(ID).len(), 0);
    // √(27² + 17²) - 27 = 4.9 with a cut of 10.
    assert!(with_cut(10.0).lines(ID)[0].contains("lies 4.9 mm deep"));
}

#[test]
fn without_a_radius_nothing_is_told() {
    let mut bench = with_cut(0.0);
    let mut welded = section(&bench.rulebook, "HEB 300");
    welded.r = None;
    bench.steelwork.members[0].section = known(welded);
    assert_eq!(bench.find(ID).len(), 0);
    bench.steelwork.members[0].section = Err(missing("section"));
    assert_eq!(bench.find(ID).len(), 0);
}
