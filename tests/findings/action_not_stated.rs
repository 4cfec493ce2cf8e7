use faying::units::kn;

use super::bench::{Bench, check, load_case};

const ID: &str = "action-not-stated";

#[test]
fn each_blank_cell_is_told() {
    check(
        ID,
        |b| b.cases()[0].moment = None,
        &["unproven | the moment M is not stated in load case W1; a blank cell is not zero | - | -"],
    );
    check(
        ID,
        |b| (b.cases()[0].shear, b.cases()[0].axial) = (None, None),
        &[
            "unproven | the shear V is not stated in load case W1; a blank cell is not zero | - | -",
            "unproven | the axial force N is not stated in load case W1; a blank cell is not zero | - | -",
        ],
    );
}

#[test]
fn many_cases_are_counted() {
    check(
        ID,
        |b| *b.cases() = (1..=6).map(|i| load_case(&format!("W{i}"), Some(1.0), Some(1.0), None, i)).collect(),
        &[
            "unproven | the axial force N is not stated in load case W1, load case W2, load case W3 and 3 more; a blank \
           cell is not zero | - | -",
        ],
    );
}

#[test]
fn it_looks_at_the_line_of_the_schedule() {
    let mut bench = Bench::good();
    bench.cases().push(load_case("W2", Some(1.0), None, Some(0.0), 9));
    let found = bench.find(ID);
    assert_eq!(found[0].at.as_ref().map(|at| (&*at.file, at.line)), Some(("schedule.csv", 9)));
    assert_eq!(found[0].elements, ["0guidB", "0guidC"]);
}

#[test]
fn a_stated_zero_is_stated() {
    check(ID, |b| b.cases()[0].shear = Some(kn(0.0)), &[]);
}

#[test]
fn no_load_case_at_all_is_told() {
    let expected = "unproven | the schedule names the joint and states no load case for it | - | -";
    check(ID, |b| b.cases().clear(), &[expected]);
}

#[test]
fn of_a_joint_that_is_not_assessed_no_check_depends_on_a_cell() {
    let spoil = |b: &mut Bench| b.cases()[0].moment = None;
    check(ID, |b| (spoil(b), b.joint = None).1, &[]);
    check(ID, |b| (spoil(b), b.joint().layout = Err("a haunch".into())).1, &[]);
    check(ID, |b| b.scheduled = None, &[]);
}
