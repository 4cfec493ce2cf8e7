use faying::assess::State;

use super::bench::{Bench, backing, check, diagonal, web_plate};

const ID: &str = "strengthening-added";

fn all(b: &mut Bench) {
    let strengthening = &mut b.layout().strengthening;
    strengthening.web_plates = vec![web_plate(true)];
    strengthening.diagonals = vec![diagonal(492.0, 8.0)];
    strengthening.backing = vec![backing()];
}

#[test]
fn where_none_was_intended_is_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        let added = |b: &mut Bench| {
            all(b);
            let intended = b.intended();
            (intended.web_plates, intended.diagonals, intended.backing_plates) = (Some(None), Some(None), Some(None));
            b.carries(state);
        };
        check(
            ID,
            added,
            &[
                "comment | there are supplementary plates on the column's web that were not intended | none | some",
                "comment | there are diagonal stiffeners in the column that were not intended | none | some",
                "comment | there are backing plates behind the column's flange that were not intended | none | some",
            ],
        );
    }
}

#[test]
fn where_nothing_is_stated_nothing_is_compared() {
    check(ID, |_| (), &[]);
    check(ID, all, &[]);
    let none = |b: &mut Bench| b.intended().diagonals = Some(None);
    check(ID, none, &[]);
}
