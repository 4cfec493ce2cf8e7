use super::bench::{Bench, check};

const ID: &str = "witnesses-disagree";

#[test]
fn of_a_member_it_is_unproven_elsewhere_a_comment() {
    check(
        ID,
        |b| {
            b.steelwork.members[0].disagreements = vec!["named HEB 300, 280 mm deep".into()];
            b.steelwork.plates[0].disagreements = vec!["named PL20, 25 mm thick".into()];
            b.joint().disagreements = vec!["a relation ties other parts together than those that touch".into()];
        },
        &[
            "unproven | supporting member: named HEB 300, 280 mm deep | - | -",
            "comment | end plate: named PL20, 25 mm thick | - | -",
            "comment | a relation ties other parts together than those that touch | - | -",
        ],
    );
    check(ID, |_| (), &[]);
}

#[test]
fn it_stands_on_the_part() {
    let mut bench = Bench::good();
    bench.steelwork.members[1].disagreements = vec!["named IPE 500, 450 mm deep".into()];
    let found = bench.find(ID);
    assert_eq!(found[0].elements, ["0guidB"]);
    assert_eq!(found[0].at.as_ref().map(|at| at.line), Some(21));
}
