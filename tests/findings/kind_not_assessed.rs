use faying::joints::Kind;

use super::bench::check;

const ID: &str = "kind-not-assessed";

#[test]
fn the_reason_is_the_message() {
    check(
        ID,
        |b| {
            b.joint().kind = Kind::FinPlate;
            b.joint().layout = Err("fin plates are not assessed yet".into());
        },
        &["unproven | fin plates are not assessed yet | - | fin-plate"],
    );
}

#[test]
fn a_joint_that_was_laid_out_or_is_not_there_has_none() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.joint = None, &[]);
}
