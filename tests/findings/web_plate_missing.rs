use faying::joints::EdgeWeld;
use faying::units::mm;

use super::bench::{Bench, check, check_deviation, grade, known, plates, web_plate};

const ID: &str = "web-plate-missing";

fn wanted(b: &mut Bench, sides: Option<u8>) {
    b.intended().web_plates = plates(12.0, Some(7.0));
    b.intended().web_plate_sides = sides;
    b.layout().strengthening.web_plates = vec![web_plate(true), web_plate(false)];
}

#[test]
fn absent() {
    let gone = |b: &mut Bench| {
        wanted(b, Some(2));
        b.layout().strengthening.web_plates.clear();
    };
    const TOLD: &str = "comment | the intended supplementary plates on the column's web are missing | on both sides, 12 mm, \
        S355, throat 7 mm | none";
    check(ID, gone, &[TOLD]);
    check_deviation(ID, gone, &["0guidC"]);
}

#[test]
fn every_fault_is_told_in_one_finding() {
    let poor = |b: &mut Bench| {
        wanted(b, Some(2));
        b.layout().strengthening.web_plates.pop();
        let plate = &mut b.layout().strengthening.web_plates[0];
        (plate.thickness, plate.grade, plate.weld) = (mm(10.0), grade("S275"), known(EdgeWeld::Fillet(mm(4.0))));
    };
    check(
        ID,
        poor,
        &[
            "comment | the supplementary plates on the column's web are less than intended: on one side of the web only, \
           10 mm thick instead of 12 mm, of a grade lower than intended, S275 instead of S355 and welded with a throat of \
           4 mm instead of 7 mm | on both sides, 12 mm, S355, throat 7 mm | on one side, 10 mm, S275, throat 4 mm",
        ],
    );
    check_deviation(ID, poor, &["0guidS1"]);
}

#[test]
fn as_intended_better_or_not_stated() {
    check(ID, |_| (), &[]);
    check(ID, |b| wanted(b, Some(2)), &[]);
    check(ID, |b| wanted(b, Some(1)), &[]);
    check(ID, |b| wanted(b, None), &[]);
    let butt = |b: &mut Bench| {
        wanted(b, None);
        b.layout().strengthening.web_plates.iter_mut().for_each(|p| p.weld = known(EdgeWeld::Butt));
    };
    check(ID, butt, &[]);
    check(ID, |b| b.intended().web_plates = Some(None), &[]);
}
