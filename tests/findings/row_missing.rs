use super::bench::{Bench, check, check_deviation, rows};

const ID: &str = "row-missing";

#[test]
fn the_missing_row_is_named() {
    for (heights, row, at) in [
        (&[440.0, 350.0, 60.0], 1, "560"),
        (&[560.0, 350.0, 60.0], 2, "440"),
        (&[560.0, 440.0, 60.0], 3, "350"),
        (&[560.0, 440.0, 350.0], 4, "60"),
    ] {
        let printed = heights.map(|height: f64| height.to_string()).join(", ");
        let line = format!(
            "comment | an intended bolt row is missing: row {row} ({at} mm above the soffit) | \
             8 bolts, rows at 560, 440, 350, 60 mm | 6 bolts, rows at {printed} mm"
        );
        check(ID, |b| b.layout().bolts.rows = rows(heights), &[&line]);
    }
}

#[test]
fn fewer_bolts_are_told_once() {
    let spoil = |b: &mut Bench| b.layout().bolts.rows = rows(&[560.0, 440.0, 60.0]);
    check("bolt-count-differs", spoil, &[]);
    check("row-moved", spoil, &[]);
}

#[test]
fn two_missing_rows_are_one_finding() {
    let bench = |heights: &[f64]| {
        let mut bench = Bench::good();
        bench.layout().bolts.rows = rows(heights);
        bench.find(ID).into_iter().map(|finding| finding.message).collect::<Vec<_>>()
    };
    assert_eq!(
        bench(&[560.0, 60.0]),
        ["intended bolt rows are missing: row 2 (440 mm above the soffit) and row 3 (350 mm above the soffit)"]
    );
    assert_eq!(bench(&[560.0, 440.0, 350.0, 60.0]), [""; 0]);
}

#[test]
fn a_row_that_was_left_out_at_the_top_and_added_below_is_missing_although_the_count_is_right() {
    let mut bench = Bench::good();
    bench.layout().bolts.rows = rows(&[440.0, 350.0, 260.0, 60.0]);
    assert_eq!(bench.find(ID)[0].message, "an intended bolt row is missing: row 1 (560 mm above the soffit)");
    assert_eq!(bench.find("row-moved").len(), 0);
}

#[test]
fn it_goes_by_what_the_joint_carries() {
    check_deviation(ID, |b| b.layout().bolts.rows = rows(&[440.0, 350.0, 60.0]), &["0guidP"]);
}

#[test]
fn rows_that_are_not_stated_are_not_compared() {
    check(
        ID,
        |b| {
            b.layout().bolts.rows = rows(&[560.0]);
            b.intended().rows = None;
        },
        &[],
    );
}
