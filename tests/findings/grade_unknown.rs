use faying::assess::State;

use super::bench::{check, missing};

const ID: &str = "grade-unknown";

#[test]
fn either_member() {
    check(
        ID,
        |b| {
            b.layout().column.grade = Err(missing("steel grade"));
            b.layout().beam.grade = Err(missing("steel grade"));
        },
        &[
            "unproven | the steel grade of the supporting member is not known: no property states it | - | -",
            "unproven | the steel grade of the supported member is not known: no property states it | - | -",
        ],
    );
    check(ID, |_| (), &[]);
}

#[test]
fn a_stiffener_only_counts_where_the_joint_is_not_proven_without_it() {
    for (state, word) in [(State::Met, "comment"), (State::NotMet, "unproven"), (State::Unproven, "unproven")] {
        let line =
            format!("{word} | the steel grade of a column stiffener is not known: no property states it | - | -");
        check(
            ID,
            |b| {
                b.carries(state);
                b.layout().stiffeners[0].grade = Err(missing("steel grade"));
            },
            &[&line],
        );
    }
}
