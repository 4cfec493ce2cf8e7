use faying::intent::IntendedHaunch;
use faying::joints::Haunch;
use faying::units::mm;

use super::bench::{check, check_deviation, known};

const ID: &str = "haunch-differs";

fn haunch() -> Haunch {
    Haunch {
        guids: vec!["0guidP".into()],
        depth: mm(240.0),
        length: mm(700.0),
        angle: 18.9,
        flange_thickness: mm(15.0),
        flange_width: mm(200.0),
        web_thickness: mm(10.0),
        flange_grade: known(faying::rulebook::Grade("S355".into())),
        web_grade: known(faying::rulebook::Grade("S355".into())),
        flange_weld: known(mm(6.0)),
        web_weld: known(mm(6.0)),
        stiffened: false,
    }
}

fn deep(depth: f64) -> Option<Option<IntendedHaunch>> {
    Some(Some(IntendedHaunch { depth: Some(mm(depth)), ..IntendedHaunch::default() }))
}

#[test]
fn a_shallower_haunch_is_told() {
    check(
        ID,
        |b| (b.layout().haunch, b.intended().haunch) = (Some(haunch()), deep(300.0)),
        &[
            "comment | the haunch has another size than intended: depth 240 mm instead of 300 mm | depth 300 mm | depth 240 mm",
        ],
    );
    check_deviation(ID, |b| (b.layout().haunch, b.intended().haunch) = (Some(haunch()), deep(300.0)), &["0guidP"]);
}

#[test]
fn a_missing_haunch_and_one_too_many() {
    check(
        ID,
        |b| b.intended().haunch = deep(300.0),
        &["comment | the intended haunch below the beam is missing | a haunch | none"],
    );
    check(
        ID,
        |b| (b.layout().haunch, b.intended().haunch) = (Some(haunch()), Some(None)),
        &["comment | there is a haunch below the beam that was not intended | none | 240 mm"],
    );
}

#[test]
fn as_intended_or_not_stated() {
    check(ID, |b| (b.layout().haunch, b.intended().haunch) = (Some(haunch()), deep(240.4)), &[]);
    check(ID, |b| b.layout().haunch = Some(haunch()), &[]);
    check(ID, |b| b.intended().haunch = Some(None), &[]);
}
