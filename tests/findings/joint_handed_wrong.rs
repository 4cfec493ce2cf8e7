use super::bench::{Bench, check, check_deviation, lengths, rows};
use faying::units::mm;

const ID: &str = "joint-handed-wrong";

/// The joint of the bench, 500 deep, turned over.
fn turn(bench: &mut Bench) {
    bench.layout().bolts.rows = rows(&[440.0, 150.0, 60.0, -60.0]);
    (bench.layout().plate.top, bench.layout().plate.bottom) = (mm(525.0), mm(-110.0));
}

#[test]
fn rows_that_are_the_mirror_image_are_told_once() {
    let expected = "comment | the joint is detailed upside down: what was intended at one flange stands at the other | \
                    rows at 560, 440, 350, 60 mm | rows at 440, 150, 60, -60 mm";
    check(ID, turn, &[expected]);
    for silent in ["row-moved", "row-missing", "bolt-count-differs", "plate-size-differs"] {
        check(silent, turn, &[]);
    }
}

#[test]
fn it_goes_by_what_the_joint_carries() {
    check_deviation(ID, turn, &["0guidP"]);
}

#[test]
fn the_row_in_the_extension_decides_even_if_others_moved() {
    let mut bench = Bench::good();
    bench.layout().bolts.rows = rows(&[430.0, 160.0, -60.0]);
    assert_eq!(bench.find(ID).len(), 1);
    // What lacks besides is still told, of the rows as they would stand turned back.
    assert_eq!(
        bench.lines("row-missing"),
        ["comment | an intended bolt row is missing: row 2 (440 mm above the soffit) | \
          8 bolts, rows at 560, 440, 350, 60 mm | 6 bolts, rows at 430, 160, -60 mm"]
    );
}

#[test]
fn a_flush_plate_is_turned_if_its_mirror_image_fits() {
    let flush = |b: &mut Bench, heights: &[f64]| {
        b.intended().rows = Some(lengths(&[440.0, 350.0, 60.0]));
        b.layout().bolts.rows = rows(heights);
    };
    let mut bench = Bench::good();
    flush(&mut bench, &[440.0, 150.0, 60.0]);
    assert_eq!(bench.find(ID).len(), 1);
    check(ID, |b| flush(b, &[440.0, 350.0, 60.0]), &[]);
    // One moved row is not a turned joint.
    check(ID, |b| flush(b, &[440.0, 200.0, 60.0]), &[]);
    // A symmetrical joint can't be turned.
    check(
        ID,
        |b| {
            b.intended().rows = Some(lengths(&[440.0, 60.0]));
            b.layout().bolts.rows = rows(&[440.0, 60.0]);
        },
        &[],
    );
}

#[test]
fn without_rows_the_plate_decides() {
    let plate = |top: f64, bottom: f64| {
        let mut bench = Bench::good();
        bench.intended().rows = None;
        (bench.layout().plate.top, bench.layout().plate.bottom) = (mm(top), mm(bottom));
        bench.lines(ID)
    };
    assert_eq!(
        plate(525.0, -110.0),
        ["comment | the joint is detailed upside down: what was intended at one flange stands at the other | \
          plate edges at 610, -25 mm | plate edges at 525, -110 mm"]
    );
    assert_eq!(plate(610.0, -25.0), [""; 0]);
    assert_eq!(plate(560.0, -25.0), [""; 0], "a shorter extension is still an extension at the top");
    assert_eq!(plate(505.0, -15.0), [""; 0], "an extension that is gone is not at the other flange");
    assert_eq!(plate(566.5, -68.0), [""; 0], "a plate that reaches past both flanges by the same is not turned");
    assert_eq!(plate(610.0, -110.0), [""; 0], "extended at both flanges is not turned");
}

#[test]
fn nothing_to_compare_with_or_no_depth_to_turn_about() {
    check(ID, |b| (turn(b), b.intended = None).1, &[]);
    check(ID, |b| (turn(b), b.layout().beam.section = Err(super::bench::missing("section"))).1, &[]);
}
