//! Rotational stiffness, classes and rotation capacity: EN 1993-1-8:2005 6.3, 5.2, 6.4.

use std::f64::consts::PI;

use faying::assess::classification::classify;
use faying::assess::{JointStiffness, Sense};
use faying::eurocode::alpha::alpha;
use faying::eurocode::stiffness::{beside_moment, equivalent, in_series, initial};
use faying::intent::{InFrame, JointClass};
use faying::units::{Stiffness, knm, mm};
use faying::working::Working;
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, Sketch, resistance, sketches};

fn close(a: f64, b: f64, within: f64) {
    assert!((a - b).abs() <= within * b.abs(), "{a} {b}");
}

fn stiffness(sketch: &Sketch, beta: f64) -> JointStiffness {
    let moment = resistance(&sketch.layout(&RULES), Sense::Hogging, beta, &RULES).unwrap();
    JointStiffness::clone(moment.stiffness.as_ref().unwrap())
}

fn spring(of: &JointStiffness, name: &str) -> Option<f64> {
    of.springs.iter().find(|spring| spring.title.contains(name)).unwrap().k.map(|k| k.get())
}

/// Table 6.11 for a flush joint with one row in tension: own arithmetic from the sizes of HEB 300 (300x300x11x19, r 27)
/// and IPE 400 (400x180x8.6x13.5), plate 200x20, M20 at a gauge of 110, 55 mm below the flange.
#[test]
fn one_row_by_hand() {
    let got = stiffness(&Sketch { extended: false, inner: 1, ..PLAIN }, 1.0);
    let z = 400.0 - 13.5 - 55.0 - 0.5 * 13.5;
    let d_c = 300.0 - 2.0 * (19.0 + 27.0);
    let fillet = |a: f64| 0.8 * 2.0_f64.sqrt() * a;
    // The column's flange: circular pattern, which is less than 4m + 1.25e.
    let m_c = 0.5 * (110.0 - 11.0 - 2.0 * 0.8 * 27.0);
    let l_c = 2.0 * PI * m_c;
    assert!(l_c < 4.0 * m_c + 1.25 * 95.0);
    let (k_3, k_4) = (0.7 * l_c * 11.0 / d_c, 0.9 * l_c * (19.0 / m_c).powi(3));
    // The plate: next to the flange, less than 2πm.
    let (m_p, m_2) = (0.5 * (110.0 - 8.6 - 2.0 * fillet(5.0)), 55.0 - fillet(7.0));
    let l_p = (alpha(m_p / (m_p + 45.0), m_2 / (m_p + 45.0), 8.0) * m_p).min(2.0 * PI * m_p);
    let k_5 = 0.9 * l_p * (20.0_f64 / m_p).powi(3);
    // M20: head 12.5, nut 18 (ISO 4014, ISO 4032), washers 3 each.
    let k_10 = 1.6 * 245.0 / (19.0 + 20.0 + 2.0 * 3.0 + 0.5 * (12.5 + 18.0));
    let rows = 1.0 / (1.0 / k_3 + 1.0 / k_4 + 1.0 / k_5 + 1.0 / k_10);
    let leg = 2.0_f64.sqrt() * 7.0;
    // The plate ends 25 mm below the flange: fillet and spread find no more room than that.
    let b_eff = 13.5 + (leg + 20.0) + (leg + 20.0_f64).min(25.0) + 5.0 * (19.0 + 27.0);
    let k_2 = 0.7 * b_eff * 11.0 / d_c;
    // A_vc: 14908 - 2*300*19 + (11 + 2*27)*19, the section's table (EN 10365) to its last digit.
    let k_1 = 0.38 * 4743.0 / z;
    close(got.lever_arm.get(), z, 1e-9);
    close(spring(&got, "k1").unwrap(), k_1, 1e-3);
    close(spring(&got, "k2").unwrap(), k_2, 1e-9);
    close(spring(&got, "keq").unwrap(), rows, 1e-6);
    let s = 210_000.0 * z * z / (1.0 / k_1 + 1.0 / k_2 + 1.0 / rows);
    close(got.initial.get(), s, 1e-3);
    // Of the order that such joints have: some 10 to 100 MNm/rad (common knowledge, from memory).
    assert!((1e4..1e5).contains(&got.initial.knm_per_rad()), "{}", got.initial);
}

/// (6.29)–(6.31) for two like rows at 1 and 3: z = (1 + 9)/(1 + 3), k_eq = 4k/2.5. Own arithmetic.
#[test]
fn several_rows_as_one() {
    let mut w = Working::default();
    let (k_eq, z_eq) = equivalent(&mut w, &[(mm(2.0), mm(100.0)), (mm(2.0), mm(300.0))]);
    close(z_eq.get(), 250.0, 1e-12);
    close(k_eq.get(), 2.0 * 400.0 / 250.0, 1e-12);
    close(in_series(&[mm(2.0), mm(2.0)]).get(), 1.0, 1e-12);
}

/// μ of (6.28): 1 up to two thirds of M_j,Rd, 1.5^2.7 = 2.99 at M_j,Rd (the well-known "a third"), nothing beyond.
#[test]
fn the_stiffness_falls_as_the_moment_rises() {
    let of = |m: f64| beside_moment(&mut Working::default(), Stiffness(3e10), knm(m), knm(300.0)).map(|s| s.get());
    for m in [0.0, 100.0, 200.0, -200.0] {
        assert_eq!(of(m), Some(3e10), "{m}");
    }
    close(of(200.001).unwrap(), 3e10, 1e-4);
    close(of(300.0).unwrap(), 3e10 / 2.99, 1e-3);
    assert_eq!(of(300.0), of(-300.0));
    assert_eq!((of(300.1), of(f64::NAN)), (None, None));
}

#[test]
fn stiffeners_and_equal_moments_take_springs_away() {
    assert_eq!(spring(&stiffness(&PLAIN, 0.0), "k1"), None);
    assert!(spring(&stiffness(&PLAIN, 1.0), "k1").unwrap() > spring(&stiffness(&PLAIN, 2.0), "k1").unwrap());
    assert!(spring(&stiffness(&PLAIN, 1.0), "k2").is_some());
    assert_eq!(spring(&stiffness(&Sketch { bottom: Some(15.0), ..PLAIN }, 1.0), "k2"), None);
    // A pair too slight to be credited holds nothing.
    assert!(spring(&stiffness(&Sketch { bottom: Some(3.0), ..PLAIN }, 1.0), "k2").is_some());
}

/// 5.2.2.5 for a beam IPE 400 (I 23 130 cm⁴, EN 10365) of 7.2 m: EI/L = 6746 kNm. Own arithmetic.
#[test]
fn a_joint_is_rigid_semi_rigid_or_pinned_by_its_frame() {
    let moment = resistance(&PLAIN.layout(&RULES), Sense::Hogging, 1.0, &RULES).unwrap();
    let own = moment.stiffness.as_ref().unwrap();
    let per_length = 2.1e5 * 23_130e4 / 7200.0;
    let of = |times: f64, span: Option<f64>, braced: Option<bool>| {
        let joint = JointStiffness { initial: Stiffness(times * per_length), ..JointStiffness::clone(own) };
        let frame = InFrame { span: span.map(mm), braced, class: None };
        classify(&moment, &joint, &frame, None)
    };
    use JointClass::{Pinned, Rigid, SemiRigid};
    for (times, braced, class) in [
        (0.49, true, Pinned),
        (0.51, true, SemiRigid),
        (7.95, true, SemiRigid),
        (8.05, true, Rigid),
        (0.49, false, Pinned),
        (8.05, false, SemiRigid),
        (24.9, false, SemiRigid),
        (25.1, false, Rigid),
    ] {
        let classified = of(times, Some(7200.0), Some(braced));
        assert_eq!(classified.by_stiffness, Ok(class), "{times} {braced}");
        let (rigid, pinned) = classified.limits.unwrap();
        close(rigid.get(), if braced { 8.0 } else { 25.0 } * per_length, 1e-3);
        close(pinned.get(), 0.5 * per_length, 1e-3);
        let said = classified.notes.iter().any(|note| note.contains("K_b/K_c"));
        assert_eq!(said, class == Rigid && !braced, "{times} {braced}");
    }
    assert_eq!(of(1.0, None, Some(true)).by_stiffness, Err("the span is not stated"));
    assert_eq!(of(1.0, Some(7200.0), None).by_stiffness, Ok(SemiRigid));
    assert_eq!(of(10.0, Some(7200.0), None).by_stiffness, Err("whether the frame is braced is not stated"));
    assert_eq!(of(30.0, Some(7200.0), None).by_stiffness, Ok(Rigid));
}

/// 5.2.3: the least of the beam's plastic moment (1307 cm³ · 355 = 464 kNm) and twice the column's (1869 cm³ · 345).
#[test]
fn a_joint_is_of_full_or_partial_strength() {
    let moment = resistance(&PLAIN.layout(&RULES), Sense::Hogging, 1.0, &RULES).unwrap();
    let own = moment.stiffness.as_ref().unwrap();
    close(own.full_strength.knm(), 464.0, 2e-3);
    let of = |share: f64| {
        let strong = faying::assess::MomentResistance { moment: own.full_strength * share, ..(*moment).clone() };
        classify(&strong, own, &InFrame::default(), None).by_strength
    };
    assert_eq!((of(1.0), of(0.99), of(0.26)), ("full-strength", "partial-strength", "partial-strength"));
    assert_eq!(of(0.25), "nominally pinned by strength");
    // At the column's top its own moment counts once.
    let weak = Sketch { column: "HEB 240", beam: "UKB 533x210x92", ..PLAIN };
    let (on, top) = (stiffness(&weak, 1.0), stiffness(&Sketch { column_above: Some(50.0), ..weak }, 1.0));
    assert!(top.full_strength < on.full_strength);
}

/// 6.4.2: what governs decides; a plate of 0.36 d √(f_ub/f_y) is ductile, a thicker one is not shown to be.
#[test]
fn the_rotation_capacity_follows_what_governs() {
    let strong = Sketch { column: "UKC 305x305x137", top: Some(20.0), bottom: Some(20.0), ..PLAIN };
    let of = |t_p: f64| stiffness(&Sketch { t_p, d: 24.0, ..strong.clone() }, 0.0).rotation;
    // M24 8.8 on S355: 0.36 · 24 · √(800/355) = 12.97 mm.
    assert!(of(12.0).starts_with("enough for plastic analysis: end plate in bending"), "{}", of(12.0));
    assert!(of(15.0).starts_with("not shown: end plate in bending"), "{}", of(15.0));
    let panel = stiffness(&PLAIN, 2.0).rotation;
    assert!(panel.contains("web panel in shear governs"), "{panel}");
}

proptest! {
    /// S_j,ini is that of its springs, finite, and none of them is softer than the whole.
    #[test]
    fn the_whole_is_softer_than_each_spring(sketch in sketches(), beta in 0.0..2.0f64) {
        let Ok(moment) = resistance(&sketch.layout(&RULES), Sense::Hogging, beta, &RULES) else { return Ok(()) };
        let Some(own) = &moment.stiffness else { return Ok(()) };
        let z = own.lever_arm;
        prop_assert!(own.initial.get().is_finite() && own.initial.get() > 0.0);
        for k in own.springs.iter().filter_map(|spring| spring.k) {
            prop_assert!(own.initial <= initial(&mut Working::default(), z, &[k]) * (1.0 + 1e-12));
        }
        let beside = beside_moment(&mut Working::default(), own.initial, moment.moment, moment.moment);
        prop_assert!(beside.is_some_and(|s| s <= own.initial));
    }

    /// Less shear in the panel never makes the joint softer, nor does a pair of stiffeners at the compression flange. (A
    /// thicker plate may: it lengthens the bolts.)
    #[test]
    fn what_stiffens_never_softens(sketch in sketches(), beta in 0.0..2.0f64, less in 0.0..1.0f64) {
        let of = |sketch: &Sketch, beta: f64| {
            let moment = resistance(&sketch.layout(&RULES), Sense::Hogging, beta, &RULES).ok()?;
            Some(moment.stiffness.as_ref()?.initial.get())
        };
        let Some(plain) = of(&sketch, beta) else { return Ok(()) };
        if let Some(smaller) = of(&sketch, beta * less) {
            prop_assert!(smaller >= plain * (1.0 - 1e-12), "β: {smaller} {plain}");
        }
        let (with, without) = (Sketch { bottom: Some(20.0), ..sketch.clone() }, Sketch { bottom: None, ..sketch });
        if let (Some(with), Some(without)) = (of(&with, beta), of(&without, beta)) {
            prop_assert!(with >= without * (1.0 - 1e-12), "pair: {with} {without}");
        }
    }
}
