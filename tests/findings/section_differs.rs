use faying::assess::State;

use super::bench::{Bench, check, check_deviation, grade, known, missing, section};

const ID: &str = "section-differs";

fn column(bench: &mut Bench, name: &str) {
    bench.layout().column.section = known(section(&bench.rulebook, name));
}

#[test]
fn lighter_heavier_or_another() {
    // h, b, t_f, t_w of HEA 300 are 290, 300, 14, 8.5, of HEB 300 300, 300, 19, 11 (EN 10365).
    for (name, how) in [
        ("HEA 300", "a lighter section than intended"),
        ("HEB 320", "a heavier section than intended"),
        ("IPE 500", "another section than intended"),
    ] {
        let mut bench = Bench::good();
        let designation = section(&bench.rulebook, name).designation;
        column(&mut bench, name);
        let line = format!(
            "comment | the supporting member is {how}: {designation} instead of HE 300 B | HE 300 B | {designation}"
        );
        assert_eq!(bench.lines(ID), [line]);
    }
}

#[test]
fn a_lighter_section_goes_by_what_the_joint_carries_and_a_heavier_is_a_comment() {
    check_deviation(ID, |b| b.layout().column.section = known(section(&b.rulebook, "HEA 300")), &["0guidC"]);
    check_deviation(ID, |b| b.layout().beam.section = known(section(&b.rulebook, "IPE 450")), &["0guidB"]);
    let mut bench = Bench::good();
    bench.carries(State::NotMet);
    column(&mut bench, "HEB 320");
    assert_eq!(bench.find(ID)[0].severity.word(), "comment");
}

#[test]
fn spellings_do_not_count() {
    for intended in ["HEB 300", "HEB300", "heb 300", "HE 300 B"] {
        check(ID, |b| b.intended().supporting_section = Some(intended.into()), &[]);
    }
}

#[test]
fn a_section_with_a_name_of_its_own_is_compared_by_its_sizes() {
    let own = |b: &mut Bench, thinner: f64| {
        let mut own = section(&b.rulebook, "HEB 300");
        own.designation = "COLUMN-A".into();
        own.t_f -= faying::units::mm(thinner);
        b.layout().column.section = known(own);
    };
    check(ID, |b| own(b, 0.0), &[]);
    // The name alone with other sizes is for witnesses-disagree.
    let named = |b: &mut Bench| {
        own(b, 2.0);
        b.layout().column.section.as_mut().unwrap().value.designation = "HE 300 B".into();
    };
    check(ID, named, &[]);
    check(
        ID,
        |b| own(b, 2.0),
        &[
            "comment | the supporting member is a lighter section than intended: COLUMN-A instead of HE 300 B | HE 300 B | \
           COLUMN-A",
        ],
    );
}

#[test]
fn what_no_catalogue_knows_is_compared_by_its_text() {
    let texts = |b: &mut Bench, detailed: &str, intended: &str| {
        let mut own = section(&b.rulebook, "HEB 300");
        own.designation = detailed.into();
        b.layout().column.section = known(own);
        b.intended().supporting_section = Some(intended.into());
    };
    check(ID, |b| texts(b, "WI 400*12", "wi400×12"), &[]);
    check(
        ID,
        |b| texts(b, "WI 400*12", "WI 400*15"),
        &["comment | the supporting member is another section than intended: WI 400*12 instead of WI 400*15 | \
           WI 400*15 | WI 400*12"],
    );
}

#[test]
fn a_lower_grade_of_a_member_is_told_and_a_higher_is_not() {
    check(
        ID,
        |b| b.layout().beam.grade = grade("S235"),
        &["comment | the grade of the supported member is lower than intended: S235 instead of S355 | S355 | S235"],
    );
    check_deviation(ID, |b| b.layout().column.grade = grade("S275"), &["0guidC"]);
    check(ID, |b| b.layout().column.grade = grade("S460"), &[]);
}

#[test]
fn what_is_unknown_or_not_stated_is_not_compared() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().column.section = Err(missing("section")), &[]);
    check(ID, |b| (column(b, "HEA 300"), b.intended().supporting_section = None).1, &[]);
}
