use super::bench::{Bench, check, missing};

const ID: &str = "plate-grade-unknown";

#[test]
fn an_unknown_grade_is_unproven_with_or_without_an_intention() {
    let expected = "unproven | the steel grade of the end plate is not known: no property states it | - | -";
    let spoil = |b: &mut Bench| b.layout().plate.grade = Err(missing("steel grade"));
    check(ID, spoil, &[expected]);
    check(ID, |b| (spoil(b), b.intended = None).1, &[expected]);
    check(ID, |_| (), &[]);
}
