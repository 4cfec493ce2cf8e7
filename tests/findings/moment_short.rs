use faying::assess::{About, CaseResult, State};

use super::bench::{Bench, check, load_case, verdict};

/// A second case, and moments of both: required, state.
fn cases(bench: &mut Bench, first: (f64, State), second: (f64, State)) {
    bench.cases().push(load_case("W2", Some(-420.0), Some(100.0), Some(0.0), 3));
    let case = |case, (required, state)| {
        let verdicts = vec![verdict(About::Moment, state, required, "kNm")];
        CaseResult { case, verdicts, moment: None, shear: None, axial: None }
    };
    bench.assessment.as_mut().unwrap().cases = vec![case(0, first), case(1, second)];
}

#[test]
fn the_worst_case_is_told() {
    check(
        "moment-short",
        |b| cases(b, (452.0, State::NotMet), (-420.0, State::NotMet)),
        &["hold | the joint does not carry the moment of load case W1: 452.0 kNm required, resistance 400.0 kNm, \
           utilisation 1.13, governed by column web in compression | 452.0 kNm | 400.0 kNm"],
    );
}

#[test]
fn only_what_is_not_met_is_told() {
    let words = |state| {
        let mut bench = Bench::good();
        cases(&mut bench, (900.0, state), (401.0, State::NotMet));
        bench.lines("moment-short")
    };
    let second = "hold | the joint does not carry the moment of load case W2: 401.0 kNm required, resistance 400.0 kNm, \
                  utilisation just above 1.00, governed by column web in compression | 401.0 kNm | 400.0 kNm";
    assert_eq!(words(State::Unproven), [second]);
    assert_eq!(words(State::Met), [second]);
    check("moment-short", |b| cases(b, (900.0, State::Unproven), (200.0, State::Met)), &[]);
}

#[test]
fn it_stands_on_plate_and_members() {
    let mut bench = Bench::good();
    bench.carries(State::NotMet);
    let found = bench.find("moment-short");
    assert_eq!(found[0].elements, ["0guidP", "0guidB", "0guidC"]);
    assert_eq!(found[0].at.as_ref().map(|at| at.line), Some(31));
}

#[test]
fn a_shortfall_without_numbers_is_still_told() {
    check(
        "moment-short",
        |b| {
            b.carries(State::NotMet);
            let verdict = b.verdict(About::Moment);
            (verdict.resistance, verdict.utilisation) = (None, None);
        },
        &["hold | the joint does not carry the moment of load case W1: 300.0 kNm required, resistance not known, \
           utilisation not known, governed by column web in compression | 300.0 kNm | not known"],
    );
}
