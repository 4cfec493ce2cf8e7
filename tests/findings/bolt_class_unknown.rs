use super::bench::{Bench, check, missing};

const ID: &str = "bolt-class-unknown";

#[test]
fn an_unknown_class_is_unproven_with_or_without_an_intention() {
    let expected = "unproven | the strength class of the bolts is not known: no property states it | - | -";
    let spoil = |b: &mut Bench| b.layout().bolts.class = Err(missing("bolt class"));
    check(ID, spoil, &[expected]);
    check(ID, |b| (spoil(b), b.intended = None).1, &[expected]);
    check(ID, |_| (), &[]);
}

#[test]
fn a_group_of_bolts_is_named_once() {
    let mut bench = Bench::good();
    bench.layout().bolts.class = Err(missing("bolt class"));
    let found = bench.find(ID);
    assert_eq!(found[0].elements, ["0guidG"]);
    assert_eq!(found[0].at.as_ref().map(|at| at.line), Some(41));
}
