use faying::units::mm;

use super::bench::{Bench, backing, check, check_deviation, plates};

const ID: &str = "backing-plate-missing";

fn wanted(b: &mut Bench) {
    b.intended().backing_plates = plates(10.0, None);
    b.layout().strengthening.backing = vec![backing()];
}

#[test]
fn absent() {
    let gone = |b: &mut Bench| b.intended().backing_plates = plates(10.0, None);
    const TOLD: &str =
        "comment | the intended backing plates behind the column's flange are missing | a pair, 10 mm, S355 | none";
    check(ID, gone, &[TOLD]);
    check_deviation(ID, gone, &["0guidC"]);
}

#[test]
fn every_fault_is_told_in_one_finding() {
    let poor = |b: &mut Bench| {
        wanted(b);
        let pair = &mut b.layout().strengthening.backing[0];
        (pair.both_sides, pair.thickness) = (false, mm(8.0));
    };
    check(
        ID,
        poor,
        &[
            "comment | the backing plates behind the column's flange are less than intended: on one side of the web only and 8 \
           mm thick instead of 10 mm | a pair, 10 mm, S355 | one side, 8 mm, S355",
        ],
    );
    check_deviation(ID, poor, &["0guidS1", "0guidS2"]);
}

#[test]
fn as_intended_or_not_stated() {
    check(ID, |_| (), &[]);
    check(ID, wanted, &[]);
    check(ID, |b| b.intended().backing_plates = Some(None), &[]);
}
