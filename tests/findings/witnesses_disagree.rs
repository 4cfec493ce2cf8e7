use faying::joints::{Laid, SimpleLayout};
use faying::shop::Notch;

use super::bench::{Bench, check};
use crate::assess::flexible;

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

/// A notch is no disagreement, but where no check takes it into account the numbers are those of a whole beam.
#[test]
fn a_notch_that_no_check_takes_into_account() {
    let notch = || Notch { at_end: false, positive: true, length: 90.0, depth: 50.0, untaken: "cut by a block".into() };
    check(
        ID,
        |b| b.steelwork.members[1].notches = vec![notch()],
        &["unproven | supported member: cut by a block | - | -"],
    );
    let mut bench = Bench::good();
    bench.steelwork.members.iter_mut().for_each(|member| member.notches = vec![notch()]);
    let flexible = flexible::PLAIN.layout(&flexible::RULES);
    bench.joint().layout = Ok(Laid::Simple(SimpleLayout::FlexibleEndPlate(Box::new(flexible))));
    assert_eq!(bench.lines(ID), ["unproven | supporting member: cut by a block | - | -"]);
}
