use super::bench::{Bench, check};

const ID: &str = "joint-not-found";

#[test]
fn a_scheduled_joint_without_steel_is_a_hold() {
    let expected = "hold | the schedule names a joint for which the shop model holds no steel | - | -";
    check(ID, |b| b.joint = None, &[expected]);
    let mut bench = Bench::good();
    bench.joint = None;
    assert_eq!(bench.find(ID)[0].at, bench.scheduled.as_ref().map(|scheduled| scheduled.at.clone()));
}

#[test]
fn a_joint_with_steel_is_found() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.joint().layout = Err("a haunch".into()), &[]);
    check(ID, |b| b.scheduled = None, &[]);
}
