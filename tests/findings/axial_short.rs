use faying::assess::{About, State};

use super::bench::{check, verdict};

#[test]
fn a_force_that_is_not_carried_is_told() {
    let with = |state| {
        move |b: &mut super::bench::Bench| {
            let verdicts = &mut b.assessment.as_mut().unwrap().cases[0].verdicts;
            verdicts.push(verdict(About::Force, state, -500.0, "kN"));
        }
    };
    check(
        "axial-short",
        with(State::NotMet),
        &["hold | the joint does not carry the axial force of load case W1: -500.0 kN required, resistance 400.0 kN, \
           utilisation 1.25, governed by column web in compression | -500.0 kN | 400.0 kN"],
    );
    check("axial-short", with(State::Unproven), &[]);
    check("axial-short", with(State::Met), &[]);
}
