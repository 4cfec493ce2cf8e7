use super::bench::{check, check_deviation, grade, missing};

const ID: &str = "plate-grade-lower";

#[test]
fn a_lower_grade_is_told() {
    check(
        ID,
        |b| b.layout().plate.grade = grade("S275"),
        &["comment | the grade of the end plate is lower than intended: S275 instead of S355 | S355 | S275"],
    );
    check_deviation(ID, |b| b.layout().plate.grade = grade("S275"), &["0guidP"]);
}

#[test]
fn a_grade_that_no_table_ranks_is_told() {
    check(
        ID,
        |b| b.intended().plate_grade = Some("Special 1".into()),
        &[
            "comment | the grade of the end plate is another than intended, and no table ranks the two: S355 instead of \
           Special 1 | Special 1 | S355",
        ],
    );
}

#[test]
fn spellings_and_toughness_do_not_count() {
    for intended in ["S355", "S355JR", "S 355 J2", "STEEL/S355J0"] {
        check(ID, |b| b.intended().plate_grade = Some(intended.into()), &[]);
    }
}

#[test]
fn higher_unknown_or_not_stated() {
    check(ID, |b| b.layout().plate.grade = grade("S460"), &[]);
    check(ID, |b| b.layout().plate.grade = Err(missing("steel grade")), &[]);
    check(ID, |b| (b.layout().plate.grade, b.intended().plate_grade) = (grade("S235"), None), &[]);
}
