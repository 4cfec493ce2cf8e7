use faying::units::{knm, mm};

use super::bench::{Bench, check, check_deviation, known, missing};

const ID: &str = "weld-thinner";
const TOP: &str = "comment | the weld of the beam's top flange is thinner than intended: throat 5 mm instead of 8.5 mm | 8.5 mm | 5 mm";
const BOTTOM: &str = "comment | the weld of the beam's bottom flange is thinner than intended: throat 5 mm instead of \
                      8.5 mm | 8.5 mm | 5 mm";

fn flanges(bench: &mut Bench) {
    (bench.layout().welds.flange_top, bench.layout().welds.flange_bottom) = (known(mm(5.0)), known(mm(5.0)));
}

#[test]
fn the_flange_in_tension_under_the_leading_moment_is_compared() {
    let leading = |moment: Option<f64>| {
        move |b: &mut Bench| {
            flanges(b);
            b.cases()[0].moment = moment.map(knm);
        }
    };
    check(ID, leading(Some(300.0)), &[TOP]);
    check(ID, leading(Some(-300.0)), &[BOTTOM]);
    check(ID, leading(Some(0.0)), &[TOP, BOTTOM]);
    check(ID, leading(None), &[TOP, BOTTOM]);
    check(ID, |b| (flanges(b), b.scheduled = None).1, &[TOP, BOTTOM]);
}

#[test]
fn the_web_is_compared_too() {
    check(
        ID,
        |b| b.layout().welds.web = known(mm(3.0)),
        &["comment | the weld of the beam's web is thinner than intended: throat 3 mm instead of 5 mm | 5 mm | 3 mm"],
    );
}

#[test]
fn it_goes_by_what_the_joint_carries_and_stands_on_the_weld() {
    check_deviation(ID, |b| b.layout().welds.flange_top = known(mm(5.0)), &["0guidWF"]);
    check_deviation(ID, |b| b.layout().welds.web = known(mm(3.0)), &["0guidWW"]);
    let without = |b: &mut Bench| {
        b.joint().welds.clear();
        b.layout().welds.web = known(mm(3.0));
    };
    check_deviation(ID, without, &["0guidP"]);
}

#[test]
fn thicker_unknown_or_not_stated() {
    check(ID, |_| (), &[]);
    check(ID, |b| b.layout().welds.web = known(mm(8.0)), &[]);
    check(ID, |b| b.layout().welds.web = Err(missing("throat")), &[]);
    check(ID, |b| (b.layout().welds.web, b.intended().web_weld) = (known(mm(3.0)), None), &[]);
}
