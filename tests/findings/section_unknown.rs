use super::bench::{Bench, check, missing, place};

const ID: &str = "section-unknown";

#[test]
fn either_member() {
    let column = "unproven | the section of the supporting member is not known: no property states it | - | -";
    let beam = "unproven | the section of the supported member is not known: no property states it | - | -";
    check(ID, |b| b.layout().column.section = Err(missing("section")), &[column]);
    check(
        ID,
        |b| {
            b.layout().column.section = Err(missing("section"));
            b.layout().beam.section = Err(missing("section"));
        },
        &[column, beam],
    );
    check(ID, |_| (), &[]);
}

#[test]
fn the_place_of_what_is_missing_comes_first() {
    let mut bench = Bench::good();
    bench.layout().beam.section = Err(missing("section"));
    assert_eq!(bench.find(ID)[0].at, Some(place(21)));
    assert_eq!(bench.find(ID)[0].elements, ["0guidB"]);
    let mut missing = missing("section");
    missing.at = Some(place(77));
    bench.layout().beam.section = Err(missing);
    assert_eq!(bench.find(ID)[0].at, Some(place(77)));
}
