use faying::assess::{About, State};

use super::bench::{check, verdict};

const ID: &str = "tying-short";

#[test]
fn what_is_not_met_is_told() {
    check(
        ID,
        |b| {
            let mut short = verdict(About::Tying, State::NotMet, 100.0, "kN");
            (short.resistance, short.utilisation) = (Some(80.0), Some(100.0 / 80.0));
            short.governed_by = "component X".into();
            b.assessment.as_mut().unwrap().cases[0].verdicts.push(short);
        },
        &["hold | the joint does not carry the tying force of load case W1: 100.0 kN required, resistance 80.0 kN, \
           utilisation 1.25, governed by component X | 100.0 kN | 80.0 kN"],
    );
}

#[test]
fn what_is_met_or_unproven_or_of_another_sort_is_not() {
    check(ID, |_| (), &[]);
    for state in [State::Met, State::Unproven] {
        check(
            ID,
            |b| {
                let tying = verdict(About::Tying, state, 100.0, "kN");
                b.assessment.as_mut().unwrap().cases[0].verdicts.push(tying);
            },
            &[],
        );
    }
    check(ID, |b| b.verdict(About::Shear).state = State::NotMet, &[]);
    check(ID, |b| b.assessment = None, &[]);
}
