use faying::assess::{About, State};

use super::bench::check;

#[test]
fn what_is_not_met_is_told() {
    check(
        "weld-short",
        |b| {
            let verdict = b.verdict(About::Weld);
            verdict.state = State::NotMet;
            (verdict.resistance, verdict.utilisation) = (Some(80.0), Some(300.0 / 80.0));
            verdict.governed_by = "component X".into();
        },
        &[
            "hold | the welds between beam and end plate do not carry load case W1: 300.0 kNm required, resistance 80.0 kNm, \
           utilisation 3.75, governed by component X | 300.0 kNm | 80.0 kNm",
        ],
    );
}

#[test]
fn what_is_met_or_unproven_or_of_another_sort_is_not() {
    check("weld-short", |_| (), &[]);
    check("weld-short", |b| b.verdict(About::Weld).state = State::Unproven, &[]);
    check("weld-short", |b| b.verdict(About::Moment).state = State::NotMet, &[]);
    check("weld-short", |b| b.assessment = None, &[]);
}
