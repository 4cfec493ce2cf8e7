use faying::assess::State;
use faying::units::mm;

use super::bench::{check, known};

const ID: &str = "bolt-larger";

#[test]
fn larger_bolts_are_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        check(
            ID,
            |b| (b.layout().bolts.diameter = known(mm(27.0)), b.carries(state)).1,
            &["comment | the bolts are larger than intended: M27 instead of M24 | M24 | M27"],
        );
    }
}

#[test]
fn as_intended_or_smaller() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().bolts.diameter = known(mm(20.0)), &[]);
}
