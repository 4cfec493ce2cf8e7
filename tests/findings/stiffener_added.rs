use faying::assess::State;

use super::bench::{Bench, check, stiffener};

const ID: &str = "stiffener-added";

#[test]
fn a_pair_where_none_was_intended_is_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        check(
            ID,
            |b| (b.layout().stiffeners.push(stiffener(492.0)), b.carries(state)).1,
            &[
                "comment | there are column stiffeners level with the beam's top flange that were not intended | none | \
               12 mm",
            ],
        );
    }
}

#[test]
fn where_nothing_is_stated_nothing_is_compared() {
    let add = |b: &mut Bench| b.layout().stiffeners.push(stiffener(492.0));
    check(ID, |_| (), &[]);
    check(ID, |b| (add(b), b.intended().stiffener_top = None).1, &[]);
    check(ID, |b| b.layout().stiffeners.push(stiffener(250.0)), &[]);
}
