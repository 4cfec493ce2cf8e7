use faying::intent::DiagonalForm;
use faying::units::mm;

use super::bench::{Bench, check, check_deviation, diagonal, grade, plates};

const ID: &str = "diagonal-missing";

fn wanted(b: &mut Bench, form: Option<DiagonalForm>) {
    b.intended().diagonals = plates(12.0, Some(6.0));
    b.intended().diagonal_form = form;
    b.layout().strengthening.diagonals = match form {
        Some(DiagonalForm::K) => vec![diagonal(490.0, 255.0), diagonal(10.0, 245.0)],
        _ => vec![diagonal(492.0, 8.0)],
    };
}

#[test]
fn absent() {
    let gone = |b: &mut Bench| {
        wanted(b, Some(DiagonalForm::N));
        b.layout().strengthening.diagonals.clear();
    };
    const TOLD: &str = "comment | the intended diagonal stiffeners of the column are missing | N form, 12 mm, S355, throat 6 mm \
        | none";
    check(ID, gone, &[TOLD]);
    check_deviation(ID, gone, &["0guidC"]);
}

#[test]
fn every_fault_is_told_in_one_finding() {
    let poor = |b: &mut Bench| {
        wanted(b, Some(DiagonalForm::K));
        b.layout().strengthening.diagonals.pop();
        let pair = &mut b.layout().strengthening.diagonals[0];
        (pair.both_sides, pair.full_depth, pair.grade) = (false, false, grade("S275"));
    };
    check(
        ID,
        poor,
        &[
            "comment | the diagonal stiffeners of the column are not as intended: one pair instead of a K of two, on one side \
           of the web only, not reaching from flange to flange and of a grade lower than intended, S275 instead of S355 | K \
           form, 12 mm, S355, throat 6 mm | one pair, 12 mm, S275, throat 6 mm",
        ],
    );
    check_deviation(ID, poor, &["0guidS1", "0guidS2"]);
}

#[test]
fn a_k_where_an_n_was_intended() {
    let other = |b: &mut Bench| {
        wanted(b, Some(DiagonalForm::K));
        b.intended().diagonal_form = Some(DiagonalForm::N);
    };
    check(
        ID,
        other,
        &[
            "comment | the diagonal stiffeners of the column are not as intended: 2 pairs instead of an N of one | N form, 12 \
           mm, S355, throat 6 mm | two pairs, 12 mm, S355, throat 6 mm",
        ],
    );
}

#[test]
fn as_intended_better_or_not_stated() {
    check(ID, |_| (), &[]);
    for form in [None, Some(DiagonalForm::N), Some(DiagonalForm::K)] {
        check(ID, |b| wanted(b, form), &[]);
    }
    let thicker = |b: &mut Bench| {
        wanted(b, None);
        b.layout().strengthening.diagonals[0].thickness = mm(15.0);
    };
    check(ID, thicker, &[]);
    check(ID, |b| b.intended().diagonals = Some(None), &[]);
}
