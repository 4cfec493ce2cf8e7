use super::bench::{Bench, check};

const ID: &str = "joint-not-scheduled";

#[test]
fn steel_without_a_line_is_unproven() {
    let expected =
        "unproven | no line of the schedule names this joint, so nothing is known of what it has to carry | - | -";
    check(ID, |b| b.scheduled = None, &[expected]);
    let mut bench = Bench::good();
    bench.scheduled = None;
    assert_eq!(bench.find(ID)[0].elements, ["0guidB", "0guidC"]);
}

#[test]
fn without_a_schedule_no_joint_lacks_a_line() {
    check(ID, |_| (), &[]);
    check(ID, |b| (b.schedule_given, b.scheduled) = (false, None), &[]);
    check(ID, |b| (b.joint, b.scheduled) = (None, None), &[]);
}
