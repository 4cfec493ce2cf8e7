use faying::units::mm;

use super::bench::{Bench, check, known, missing};

const ID: &str = "bolt-too-short";

/// 25 of plate and 19 of the flange of HEB 300; M24: nut 21.5 (ISO 4032), pitch 3 (ISO 261), washer 4 (ISO 7089).
#[test]
fn a_nut_that_is_not_full_is_a_hold_and_a_washer_too_many_a_comment() {
    let long = |l: f64| move |b: &mut Bench| b.steelwork.bolts[1].length = known(mm(l));
    check(
        ID,
        long(60.0),
        &[
            "hold | the bolts are 60 mm long; a grip of 44 mm, a nut of 21.5 mm and 3 mm past it need 68.5 mm, without any \
           washer | at least 68.5 mm | 60 mm",
        ],
    );
    check(
        ID,
        long(70.0),
        &[
            "comment | the bolts are 70 mm long; a grip of 44 mm, washers of 4 mm, a nut of 21.5 mm and 3 mm past it need \
           72.5 mm | at least 72.5 mm | 70 mm",
        ],
    );
    check(ID, long(75.0), &[]);
}

#[test]
fn a_length_that_is_the_grip_is_no_bolts_length() {
    for length in [44.0, 48.0, 52.0] {
        let mut bench = Bench::good();
        bench.steelwork.bolts.iter_mut().for_each(|bolt| bolt.length = known(mm(length)));
        let found = bench.lines(ID);
        assert_eq!(found.len(), 1);
        assert!(found[0].starts_with("comment | the bolts' length is given as"), "{found:?}");
    }
}

#[test]
fn a_length_that_nobody_states_makes_no_finding() {
    check(ID, |b| b.steelwork.bolts.iter_mut().for_each(|bolt| bolt.length = Err(missing("bolt length"))), &[]);
    check(ID, |b| b.layout().bolts.diameter = Err(missing("bolt diameter")), &[]);
    // One of two states it.
    let mut bench = Bench::good();
    bench.steelwork.bolts[0].length = Err(missing("bolt length"));
    bench.steelwork.bolts[1].length = known(mm(60.0));
    assert_eq!(bench.find(ID).len(), 1);
}

/// EN 14399-4: the nut of an M24 is 20 mm high (from memory).
#[test]
fn class_10_9_may_have_the_lower_nut() {
    let mut bench = Bench::good();
    bench.layout().bolts.class = known("10.9".into());
    bench.steelwork.bolts[0].length = known(mm(65.2));
    assert!(bench.lines(ID)[0].starts_with("comment"), "{:?}", bench.lines(ID));
    bench.layout().bolts.class = known("8.8".into());
    assert!(bench.lines(ID)[0].starts_with("hold"));
}
