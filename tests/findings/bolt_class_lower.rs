use super::bench::{check, check_deviation, known, missing};

const ID: &str = "bolt-class-lower";

#[test]
fn a_lower_class_is_told() {
    check(
        ID,
        |b| b.layout().bolts.class = known("5.6".into()),
        &["comment | the bolt class is lower than intended: 5.6 instead of 8.8 | 8.8 | 5.6"],
    );
    check_deviation(ID, |b| b.layout().bolts.class = known("5.6".into()), &["0guidG"]);
}

#[test]
fn a_class_that_no_table_ranks_is_told() {
    check(
        ID,
        |b| b.layout().bolts.class = known("A4-80".into()),
        &[
            "comment | the bolt class is another than intended, and no table ranks the two: A4-80 instead of 8.8 | 8.8 | \
           A4-80",
        ],
    );
}

#[test]
fn higher_the_same_unknown_or_not_stated() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().bolts.class = known("10.9".into()), &[]);
    check(ID, |b| b.layout().bolts.class = Err(missing("bolt class")), &[]);
    check(ID, |b| b.intended().bolt_class = Some("M24 8.8".into()), &[]);
    check(ID, |b| (b.layout().bolts.class, b.intended().bolt_class) = (known("4.6".into()), None), &[]);
    let unlisted = |b: &mut super::Bench| {
        (b.layout().bolts.class, b.intended().bolt_class) = (known("A4-80".into()), Some("a4 - 80".into()));
    };
    check(ID, unlisted, &[]);
}
