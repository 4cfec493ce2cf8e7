use faying::assess::State;

use super::bench::{Bench, check};

const ID: &str = "not-credited";

#[test]
fn each_part_is_a_comment_whatever_the_joint_carries() {
    for state in [State::Met, State::NotMet, State::Unproven] {
        let spoil = |b: &mut Bench| b.layout().not_credited = vec!["a web plate".into(), "a diagonal".into()];
        check(
            ID,
            |b| (spoil(b), b.carries(state)).1,
            &["comment | a web plate | - | -", "comment | a diagonal | - | -"],
        );
    }
    check(ID, |_| (), &[]);
}

/// What the clauses exclude only the assessment knows; what both name is told once.
#[test]
fn what_the_assessment_excludes() {
    let spoil = |b: &mut Bench| {
        b.layout().not_credited = vec!["a plate is not credited".into()];
        let assessment = b.assessment.as_mut().unwrap();
        assessment.not_credited = vec!["a plate is not credited".into(), "web plate is not credited: too thin".into()];
    };
    check(
        ID,
        spoil,
        &["comment | a plate is not credited | - | -", "comment | web plate is not credited: too thin | - | -"],
    );
}
