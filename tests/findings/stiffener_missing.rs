use faying::units::mm;

use super::bench::{Bench, check, check_deviation, grade, missing, stiffener};

const ID: &str = "stiffener-missing";
const GONE: &str = "comment | the intended column stiffeners level with the beam's bottom flange are missing | a pair, 12 mm, S355 | none";

#[test]
fn absent_or_at_another_level() {
    check(ID, |b| b.layout().stiffeners.clear(), &[GONE]);
    check(ID, |b| b.layout().stiffeners[0].height = mm(250.0), &[GONE]);
    check(ID, |b| b.layout().stiffeners[0].height = mm(492.0), &[GONE]);
    check_deviation(ID, |b| b.layout().stiffeners.clear(), &["0guidC"]);
}

#[test]
fn level_means_that_it_overlaps_the_flange_within_the_tolerance() {
    // IPE 500: flange 16, its middle at 8; stiffener 12: they overlap to (16 + 12) / 2 = 14 either way.
    let found = |height: f64| {
        let mut bench = Bench::good();
        bench.rulebook.tolerances.position = mm(2.0);
        bench.layout().stiffeners[0].height = mm(height);
        bench.find(ID).len()
    };
    assert_eq!([8.0, 24.0, -8.0, 24.1, -8.1].map(found), [0, 0, 0, 1, 1]);
}

#[test]
fn every_fault_of_a_pair_is_told_in_one_finding() {
    check(
        ID,
        |b| {
            let stiffener = &mut b.layout().stiffeners[0];
            (stiffener.both_sides, stiffener.full_depth) = (false, false);
            (stiffener.thickness, stiffener.grade) = (mm(10.0), grade("S275"));
        },
        &[
            "comment | the column stiffeners level with the beam's bottom flange are less than intended: on one side of the \
           web only, not reaching from flange to flange, 10 mm thick instead of 12 mm and of a grade lower than intended, \
           S275 instead of S355 | a pair, 12 mm, S355 | one plate, 10 mm, S275",
        ],
    );
}

#[test]
fn each_fault_alone_goes_by_what_the_joint_carries() {
    let faults: [fn(&mut Bench); 4] = [
        |b| b.layout().stiffeners[0].both_sides = false,
        |b| b.layout().stiffeners[0].full_depth = false,
        |b| b.layout().stiffeners[0].thickness = mm(10.0),
        |b| b.layout().stiffeners[0].grade = grade("S275"),
    ];
    for fault in faults {
        check_deviation(ID, fault, &["0guidS1", "0guidS2"]);
    }
}

#[test]
fn thicker_unstated_or_none_intended() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().stiffeners[0].thickness = mm(15.0), &[]);
    check(ID, |b| (b.layout().stiffeners.clear(), b.intended().stiffener_bottom = None).1, &[]);
    check(ID, |b| (b.layout().stiffeners.clear(), b.intended().stiffener_bottom = Some(None)).1, &[]);
    check(ID, |b| b.layout().stiffeners.insert(0, stiffener(492.0)), &[]);
}

#[test]
fn without_the_beams_depth_only_their_absence_can_be_told() {
    check(ID, |b| b.layout().beam.section = Err(missing("section")), &[]);
    let both = |b: &mut Bench| (b.layout().beam.section = Err(missing("section")), b.layout().stiffeners.clear()).1;
    check(ID, both, &[GONE]);
}

/// A pair that need not reach the far flange is held to its length; a throat to the one intended.
#[test]
fn length_and_throat() {
    let partial = |b: &mut Bench, length: f64| {
        let intended = b.intended().stiffener_bottom.as_mut().unwrap().as_mut().unwrap();
        (intended.length, intended.throat) = (Some(mm(160.0)), Some(mm(5.0)));
        let stiffener = &mut b.layout().stiffeners[0];
        (stiffener.full_depth, stiffener.reach) = (false, mm(length));
        stiffener.weld = super::bench::known(mm(if length < 160.0 { 3.0 } else { 5.0 }));
    };
    check(ID, |b| partial(b, 160.0), &[]);
    check(
        ID,
        |b| partial(b, 120.0),
        &[
            "comment | the column stiffeners level with the beam's bottom flange are less than intended: 120 mm long instead of \
           160 mm and welded with a throat of 3 mm instead of 5 mm | a pair, 12 mm, S355, throat 5 mm, 160 mm long | a \
           pair, 12 mm, S355, throat 3 mm, 120 mm long",
        ],
    );
    // One from flange to flange is more than was asked for.
    check(ID, |b| (partial(b, 160.0), b.layout().stiffeners[0].full_depth = true).1, &[]);
}
