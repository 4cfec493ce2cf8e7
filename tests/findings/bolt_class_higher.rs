use faying::assess::State;

use super::bench::{check, known};

const ID: &str = "bolt-class-higher";

#[test]
fn a_higher_class_is_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        check(
            ID,
            |b| (b.layout().bolts.class = known("10.9".into()), b.carries(state)).1,
            &["comment | the bolt class is higher than intended: 10.9 instead of 8.8 | 8.8 | 10.9"],
        );
    }
}

#[test]
fn as_intended_lower_or_unranked() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().bolts.class = known("5.6".into()), &[]);
    check(ID, |b| b.layout().bolts.class = known("A4-80".into()), &[]);
}
