use super::bench::check;

const ID: &str = "joint-not-paired";

#[test]
fn a_line_that_fits_no_single_joint_is_unproven() {
    let expected = "unproven | the schedule's line fits no single joint of the steel (the problems say why) | - | -";
    check(ID, |b| (b.joint, b.unclear) = (None, true), &[expected]);
    check("joint-not-found", |b| (b.joint, b.unclear) = (None, true), &[]);
}

#[test]
fn a_joint_without_steel_is_another_matter() {
    check(ID, |b| b.joint = None, &[]);
    check(ID, |_| (), &[]);
}
