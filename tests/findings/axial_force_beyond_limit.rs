use faying::assess::{About, CaseResult, State};

use super::bench::{Bench, check, load_case, verdict};

const ID: &str = "axial-force-beyond-limit";
const LINE: &str = "unproven | the axial force of load case W1 is -260.0 kN and passes the limit of 200.0 kN below which \
                    moment and shear may be checked without it | at most 200.0 kN | -260.0 kN";

fn axial(bench: &mut Bench, state: State, required: Option<f64>, limit: Option<f64>) {
    let verdict = bench.verdict(About::Axial);
    (verdict.state, verdict.required, verdict.resistance, verdict.utilisation) = (state, required, limit, None);
}

#[test]
fn beyond_the_limit_is_unproven_whichever_way_the_assessment_says_it() {
    check(ID, |b| axial(b, State::NotMet, Some(-260.0), Some(200.0)), &[LINE]);
    check(ID, |b| axial(b, State::Unproven, Some(-260.0), Some(200.0)), &[LINE]);
}

#[test]
fn the_largest_force_is_told() {
    let mut bench = Bench::good();
    bench.cases().push(load_case("W2", Some(300.0), Some(100.0), Some(900.0), 3));
    axial(&mut bench, State::Unproven, Some(-260.0), Some(200.0));
    let mut beyond = verdict(About::Axial, State::Unproven, 900.0, "kN");
    (beyond.resistance, beyond.utilisation) = (Some(200.0), None);
    let case = CaseResult { case: 1, verdicts: vec![beyond], moment: None, shear: None, axial: None };
    bench.assessment.as_mut().unwrap().cases.push(case);
    let found = bench.find(ID);
    assert_eq!(found.len(), 1);
    assert_eq!(found[0].detailed.as_deref(), Some("900.0 kN"));
}

#[test]
fn within_the_limit_or_not_known_is_not_told_here() {
    check(ID, |_| (), &[]);
    check(ID, |b| axial(b, State::Unproven, None, Some(200.0)), &[]);
    check(ID, |b| axial(b, State::Unproven, Some(-260.0), None), &[]);
    check(ID, |b| b.verdict(About::Moment).state = State::NotMet, &[]);
}

#[test]
fn too_much_together_is_told_by_its_sum() {
    let spoil = |b: &mut Bench, state: State, used: f64| {
        axial(b, state, Some(-260.0), Some(900.0));
        b.verdict(About::Axial).utilisation = Some(used);
    };
    let line = "unproven | moment and axial force of load case W1 (-260.0 kN) come to 1.23 together by the conservative \
                method of 6.2.7.1(3) | at most 1.00 | 1.23";
    check(ID, |b| spoil(b, State::Unproven, 1.23), &[line]);
    check(ID, |b| spoil(b, State::Met, 0.98), &[]);
}
