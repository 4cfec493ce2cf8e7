//! What the message of a deviation says of the capacity that the joint has lost.

use faying::assess::{Assessment, CaseResult, Sense};
use faying::findings::lost_capacity;
use faying::units::{knm, mm};

use super::bench::{Bench, load_case, moment};

/// Both details' resistances in both senses.
fn assess(bench: &mut Bench, detailed: (f64, f64), intended: (f64, f64)) {
    let set = |assessment: &mut Assessment, (hogging, sagging): (f64, f64)| {
        assessment.hogging = Some(moment(Sense::Hogging, hogging));
        assessment.sagging = Some(moment(Sense::Sagging, sagging));
    };
    set(bench.assessment.as_mut().unwrap(), detailed);
    set(bench.intended_assessment.insert(Assessment::default()), intended);
}

fn message(detailed: (f64, f64), intended: (f64, f64)) -> String {
    let mut bench = Bench::good();
    bench.layout().plate.thickness = mm(20.0);
    assess(&mut bench, detailed, intended);
    bench.find("plate-thinner")[0].message.clone()
}

#[test]
fn the_message_says_what_the_joint_has_lost_in_the_sense_that_is_asked_for() {
    let thinner = "the end plate is thinner than intended: 20 mm instead of 25 mm; as detailed the joint has ";
    for (detailed, words) in [
        (352.0, "12 % less moment resistance than intended"),
        (399.0, "the intended moment resistance within 1 %"),
        (400.0, "the intended moment resistance within 1 %"),
        (420.0, "5 % more moment resistance than intended"),
    ] {
        assert_eq!(message((detailed, 100.0), (400.0, 400.0)), format!("{thinner}{words}"));
    }
}

#[test]
fn the_largest_loss_over_the_senses_that_are_asked_for() {
    let mut bench = Bench::good();
    assess(&mut bench, (300.0, 100.0), (400.0, 400.0));
    assert_eq!(lost_capacity(&bench.context()), Some(0.25));
    bench.cases().push(load_case("W2", Some(-1.0), None, None, 3));
    assert_eq!(lost_capacity(&bench.context()), Some(0.75));
    bench.cases().iter_mut().for_each(|case| case.moment = Some(knm(0.0)));
    assert_eq!(lost_capacity(&bench.context()), None);
}

#[test]
fn the_resistance_of_the_very_case_comes_first() {
    let mut bench = Bench::good();
    assess(&mut bench, (300.0, 300.0), (400.0, 400.0));
    bench.assessment.as_mut().unwrap().cases[0].moment = Some(moment(Sense::Hogging, 360.0));
    assert_eq!(lost_capacity(&bench.context()), Some(0.25), "only one of the two has it");
    let moment = Some(moment(Sense::Hogging, 480.0));
    let case = CaseResult { case: 0, verdicts: Vec::new(), moment, shear: None, axial: None };
    bench.intended_assessment.as_mut().unwrap().cases.push(case);
    assert_eq!(lost_capacity(&bench.context()), Some(0.25), "1 - 360 / 480");
    bench.intended_assessment.as_mut().unwrap().cases[0].moment = Some(super::bench::moment(Sense::Hogging, 720.0));
    assert_eq!(lost_capacity(&bench.context()), Some(0.5), "1 - 360 / 720");
}

#[test]
fn without_both_resistances_nothing_is_said() {
    let mut bench = Bench::good();
    assert_eq!(lost_capacity(&bench.context()), None);
    assess(&mut bench, (300.0, 300.0), (0.0, 0.0));
    assert_eq!(lost_capacity(&bench.context()), None, "an intended resistance of nought");
    assess(&mut bench, (300.0, 300.0), (400.0, 400.0));
    bench.scheduled = None;
    assert_eq!(lost_capacity(&bench.context()), None);
}
