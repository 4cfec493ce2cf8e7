use super::bench::{Bench, check, missing};

const ID: &str = "bolt-size-unknown";

#[test]
fn diameter_and_hole() {
    let diameter = |b: &mut Bench| b.layout().bolts.diameter = Err(missing("bolt diameter"));
    let hole = |b: &mut Bench| b.layout().bolts.hole = Err(missing("hole"));
    let no_diameter = "unproven | the diameter of the bolts is not known: no property states it | - | -";
    let no_hole = "unproven | the diameter of the bolts' holes is not known: no property states it | - | -";
    check(ID, diameter, &[no_diameter]);
    check(ID, hole, &[no_hole]);
    check(ID, |b| (diameter(b), hole(b)).1, &[no_diameter]);
    check(ID, |_| (), &[]);
}
