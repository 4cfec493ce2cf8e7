use faying::units::mm;

use super::bench::{check, check_deviation, known, missing};

const ID: &str = "bolt-smaller";

#[test]
fn smaller_bolts_are_told() {
    check(
        ID,
        |b| b.layout().bolts.diameter = known(mm(20.0)),
        &["comment | the bolts are smaller than intended: M20 instead of M24 | M24 | M20"],
    );
    check_deviation(ID, |b| b.layout().bolts.diameter = known(mm(20.0)), &["0guidG"]);
}

#[test]
fn larger_unknown_or_not_stated() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().bolts.diameter = known(mm(27.0)), &[]);
    check(ID, |b| b.layout().bolts.diameter = Err(missing("bolt diameter")), &[]);
    check(ID, |b| (b.layout().bolts.diameter, b.intended().bolt_diameter) = (known(mm(20.0)), None), &[]);
}
