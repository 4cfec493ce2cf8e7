use faying::assess::{About, State};

use super::bench::check;

#[test]
fn what_is_not_met_is_told() {
    check(
        "shear-short",
        |b| {
            let verdict = b.verdict(About::Shear);
            verdict.state = State::NotMet;
            (verdict.resistance, verdict.utilisation) = (Some(80.0), Some(100.0 / 80.0));
            verdict.governed_by = "component X".into();
        },
        &["hold | the joint does not carry the shear of load case W1: 100.0 kN required, resistance 80.0 kN, \
           utilisation 1.25, governed by component X | 100.0 kN | 80.0 kN"],
    );
}

#[test]
fn what_is_met_or_unproven_or_of_another_sort_is_not() {
    check("shear-short", |_| (), &[]);
    check("shear-short", |b| b.verdict(About::Shear).state = State::Unproven, &[]);
    check("shear-short", |b| b.verdict(About::Moment).state = State::NotMet, &[]);
    check("shear-short", |b| b.assessment = None, &[]);
}
