use faying::assess::{About, State};

use super::bench::check;

const ID: &str = "axial-force-beyond-limit";

#[test]
fn beyond_the_limit_is_unproven() {
    check(
        ID,
        |b| {
            let verdict = b.verdict(About::Axial);
            verdict.state = State::NotMet;
            (verdict.required, verdict.resistance, verdict.utilisation) = (Some(-260.0), Some(200.0), Some(1.3));
        },
        &[
            "unproven | the axial force of load case W1 is -260.0 kN and passes the limit of 200.0 kN below which moment \
           and shear may be checked without it (1.30 times) | -260.0 kN | 200.0 kN",
        ],
    );
}

#[test]
fn within_the_limit_or_not_stated_is_not_told_here() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.verdict(About::Axial).state = State::Unproven, &[]);
    check(ID, |b| b.verdict(About::Moment).state = State::NotMet, &[]);
}
