use std::sync::Arc;

use faying::assess::{JointStiffness, MomentResistance, Sense};
use faying::intent::{InFrame, JointClass};
use faying::units::{SecondMoment, Stiffness, knm, mm};
use faying::working::Working;

use super::bench::{Bench, check, moment};

const ID: &str = "stiffness-differs";

/// An IPE 400 (23 130 cm⁴) of 7.2 m: EI/L = 6746 kNm, rigid from 53 970 kNm/rad in a braced frame.
fn stiff(bench: &mut Bench, knm_per_rad: f64, class: Option<JointClass>, span: Option<f64>, braced: Option<bool>) {
    bench.scheduled.as_mut().unwrap().frame = InFrame { span: span.map(mm), braced, class };
    let stiffness = JointStiffness {
        initial: Stiffness(knm_per_rad * 1e6),
        lever_arm: mm(400.0),
        springs: Vec::new(),
        to_column: true,
        I_b: SecondMoment(23_130e4),
        full_strength: knm(460.0),
        rotation: String::new(),
        working: Arc::new(Working::default()),
    };
    let own = MomentResistance { stiffness: Some(Arc::new(stiffness)), ..(*moment(Sense::Hogging, 400.0)).clone() };
    bench.assessment.as_mut().unwrap().cases[0].moment = Some(Arc::new(own));
}

#[test]
fn a_joint_that_is_not_what_the_analysis_takes_it_for_is_unproven() {
    use JointClass::{Pinned, Rigid};
    let line = "unproven | the analysis takes the joint as rigid; in load case W1 it is semi-rigid (Sj,ini = 24000 kNm/rad, \
                rigid from 53970 kNm/rad on), so the required actions are not those of this joint | rigid | semi-rigid";
    check(ID, |b| stiff(b, 24_000.0, Some(Rigid), Some(7200.0), Some(true)), &[line]);
    let line = "unproven | the analysis takes the joint as pinned; in load case W1 it is semi-rigid (Sj,ini = 24000 kNm/rad, \
                pinned up to 3373 kNm/rad), so the required actions are not those of this joint | pinned | semi-rigid";
    check(ID, |b| stiff(b, 24_000.0, Some(Pinned), Some(7200.0), Some(true)), &[line]);
}

#[test]
fn what_is_as_assumed_or_not_stated_is_not_told() {
    use JointClass::{Pinned, Rigid, SemiRigid};
    check(ID, |b| stiff(b, 60_000.0, Some(Rigid), Some(7200.0), Some(true)), &[]);
    check(ID, |b| stiff(b, 3_000.0, Some(Pinned), Some(7200.0), Some(false)), &[]);
    check(ID, |b| stiff(b, 60_000.0, Some(SemiRigid), Some(7200.0), Some(true)), &[]);
    check(ID, |b| stiff(b, 24_000.0, Some(Rigid), None, Some(true)), &[]);
    check(ID, |b| stiff(b, 60_000.0, Some(Rigid), Some(7200.0), None), &[]);
    check(ID, |b| stiff(b, 24_000.0, None, Some(7200.0), Some(true)), &[]);
}
