//! Moment with axial force, EN 1993-1-8:2005 6.2.7.1(2) and (3), and k_wc of 6.2.6.2(2).

use faying::assess::end_plate::{Demand, Opposite, assess};
use faying::assess::{About, Assessment, Component, State};
use faying::eurocode::column_web;
use faying::intent::LoadCase;
use faying::joints::{BoltRow, EndPlateLayout};
use faying::units::{Area, SecondMoment, kn, knm, mm, mpa};
use faying::working::Working;
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, Sketch, asked, case, mirrored, sketches, verdict};

fn at(layout: &EndPlateLayout, m: f64, n: f64) -> Assessment {
    asked(layout, &case(Some(m), Some(0.0), Some(n)), Opposite::None, &RULES)
}

fn together(assessment: &Assessment) -> &Component {
    assessment.cases[0].axial.as_ref().unwrap_or_else(|| panic!("{:?}", verdict(assessment, About::Axial).reason))
}

fn step(component: &Component, symbol: &str) -> f64 {
    component.working.steps.iter().rfind(|step| step.symbol == symbol).unwrap().value.value
}

/// Extended and fastened alike at both flanges.
fn symmetrical() -> EndPlateLayout {
    let mut layout = PLAIN.layout(&RULES);
    let rows = [445.0, 331.5, 68.5, -45.0];
    let like = layout.bolts.rows[0].clone();
    layout.bolts.rows = rows.map(|height| BoltRow { height: mm(height), ..like.clone() }).to_vec();
    (layout.plate.top, layout.plate.bottom) = (mm(490.0), mm(-90.0));
    layout
}

/// 5 % of N_pl,Rd of an IPE 400 in S355: 0.05 · 8446 · 355 = 149.9 kN. Own arithmetic.
#[test]
fn up_to_the_limit_the_force_is_neglected_and_beyond_it_counts_at_once() {
    let layout = symmetrical();
    for sign in [-1.0, 1.0] {
        let (under, over) = (at(&layout, 100.0, sign * 149.0), at(&layout, 100.0, sign * 151.0));
        let own = verdict(&under, About::Axial);
        assert_eq!((own.state, own.utilisation), (State::Met, None));
        assert!(under.cases[0].axial.is_none());
        // The literal reading of (2) and (3): N's whole share comes in as the limit is passed.
        let used = verdict(&over, About::Axial).utilisation.unwrap();
        let moment = 100.0 / over.cases[0].moment.as_ref().unwrap().moment.knm();
        let share = 151.0 / together(&over).resistance.kn();
        assert!((used - moment - share).abs() < 1e-12, "{used} {moment} {share}");
        assert!(share > 0.0 && share < 1.0, "{share}");
        assert_eq!(verdict(&over, About::Axial).state, State::Met);
    }
}

#[test]
fn too_much_together_is_unproven_and_says_so() {
    let layout = symmetrical();
    let m_rd = at(&layout, 1.0, 0.0).cases[0].moment.as_ref().unwrap().moment.knm();
    let assessment = at(&layout, 0.95 * m_rd, -400.0);
    let axial = verdict(&assessment, About::Axial);
    assert_eq!((axial.state, verdict(&assessment, About::Moment).state), (State::Unproven, State::Met));
    assert!(axial.utilisation.unwrap() > 1.0);
    assert!(axial.reason.as_ref().unwrap().contains("by the conservative method of 6.2.7.1(3)"), "{:?}", axial.reason);
    // Without the moment there is nothing to add to.
    let blank = asked(&layout, &case(None, Some(0.0), Some(-400.0)), Opposite::None, &RULES);
    assert_eq!(verdict(&blank, About::Axial).state, State::Unproven);
    // Not a number is never met.
    let nan = at(&layout, 10.0, f64::NAN);
    assert_eq!(verdict(&nan, About::Axial).state, State::Unproven);
}

/// In compression: twice the weaker flange, by the components of the moment resistance. For HEB 300 S355 the web governs,
/// and the two spread lengths meet if the beam is shallow.
#[test]
fn compression_goes_through_both_flanges() {
    let layout = symmetrical();
    let assessment = at(&layout, 10.0, -400.0);
    let moment = assessment.cases[0].moment.as_ref().unwrap();
    let least = (moment.components.iter())
        .filter(|c| ["column-web-in-compression", "beam-flange-in-compression"].contains(&c.id.as_str()))
        .map(|c| c.resistance.kn())
        .fold(f64::INFINITY, f64::min);
    let axial = together(&assessment);
    assert!((axial.resistance.kn() - 2.0 * least).abs() < 1e-9, "{} {least}", axial.resistance);
    assert_eq!(step(axial, "shared"), 1.0);
    // A shallow beam on a thick column: b_eff is longer than the flanges are apart.
    let shallow = Sketch { beam: "IPE 300", ..PLAIN }.layout(&RULES);
    let shared = step(together(&at(&shallow, 10.0, -400.0)), "shared");
    assert!(shared < 1.0 && shared > 0.5, "{shared}");
}

/// In tension a symmetrical joint has all its rows; one that is strong at one flange only has the balance of its halves.
#[test]
fn tension_is_balanced_about_the_beams_axis() {
    let both = together(&at(&symmetrical(), 10.0, 400.0)).clone();
    assert!((step(&both, "F_upper") - step(&both, "F_lower")).abs() < 1e-9);
    let balanced = step(&both, "F_balanced");
    assert!((balanced - 2.0 * step(&both, "F_upper")).abs() < 1e-9);
    assert!((step(&both, "N_j_Rd") - balanced * step(&both, "share")).abs() < 1e-9);
    assert!(step(&both, "share") <= 1.0);
    // One low row, 60 mm above the soffit, against three at the top.
    let top = together(&at(&PLAIN.layout(&RULES), 10.0, 400.0)).clone();
    assert!(step(&top, "F_balanced") < step(&top, "F_upper") + step(&top, "F_lower"));
    assert!(top.resistance < both.resistance);
    // With every row at one flange nothing balances.
    let mut one = PLAIN.layout(&RULES);
    one.bolts.rows.pop();
    let alone = at(&one, 10.0, 400.0);
    let reason = verdict(&alone, About::Axial).reason.clone().unwrap();
    assert!(reason.contains("needs bolt rows on both sides of the beam's axis"), "{reason}");
}

/// Beside an axial tension that counts, the bolts are fully in tension for the shear; compression takes nothing.
#[test]
fn axial_tension_pulls_at_the_bolts_that_carry_the_shear() {
    let of = |n: f64| {
        let case = case(Some(10.0), Some(50.0), Some(n));
        asked(&symmetrical(), &case, Opposite::None, &RULES).cases[0].shear.as_ref().unwrap().shear
    };
    assert!(of(400.0) < of(0.0));
    assert_eq!(of(-400.0), of(0.0));
}

/// k_wc by (6.14): 1 up to 0.7 f_y, 1.7 − σ/f_y beyond. HEB 300 (149.1 cm², 25 170 cm⁴), d 208: own arithmetic.
#[test]
fn the_columns_own_stress_lowers_its_web() {
    let of = |n: f64, m: f64| {
        let (area, inertia) = (Area(14_910.0), SecondMoment(25_170e4));
        column_web::k_wc(&mut Working::default(), (kn(n), knm(m)), (area, inertia), mm(208.0), mpa(355.0))
    };
    for (n, m, k) in [
        (0.0, 0.0, 1.0),
        (1000.0, 0.0, 1.0),
        (-3700.0, 0.0, 1.0),
        // 4 473 000/14 910 = 300 N/mm²
        (-4473.0, 0.0, 1.7 - 300.0 / 355.0),
        // and 100 kNm · 104 mm / 25 170 cm⁴ = 41.32 N/mm²
        (-4473.0, 100.0, 1.7 - 341.32 / 355.0),
        (-4473.0, -100.0, 1.7 - 341.32 / 355.0),
        (-1e6, 0.0, 0.0),
    ] {
        assert!((of(n, m) - k).abs() < 1e-4, "{n} {m}: {} {k}", of(n, m));
    }
    assert!(of(f64::NAN, 0.0).is_nan());

    let layout = PLAIN.layout(&RULES);
    let web = |column: Option<(f64, f64)>| {
        let stated = LoadCase {
            column_axial: column.map(|(n, _)| kn(n)),
            column_moment: column.map(|(_, m)| knm(m)),
            ..case(Some(10.0), Some(0.0), Some(0.0))
        };
        let assessment = assess(&layout, &[Demand { case: &stated, opposite: Opposite::None }], false, &RULES);
        let moment = assessment.cases[0].moment.clone().unwrap();
        let web = moment.components.iter().find(|c| c.id == "column-web-in-compression").unwrap().resistance.kn();
        (web, assessment.assumptions.iter().any(|text| text.contains("k_wc = 1: the column's axial stress")))
    };
    let (plain, assumed) = web(None);
    let (loaded, stated) = web(Some((-4473.0, 0.0)));
    assert!(assumed && !stated);
    // The strength of a flange of 19 mm: 345.
    assert!((loaded / plain - (1.7 - 300.0 / 345.0)).abs() < 1e-3, "{}", loaded / plain);
    assert_eq!(web(Some((-100.0, 0.0))).0, plain);
    // A column that yields by its own forces: nothing is said of the joint.
    let stated = LoadCase {
        column_axial: Some(kn(-5200.0)),
        column_moment: Some(knm(0.0)),
        ..case(Some(10.0), Some(0.0), Some(0.0))
    };
    let beyond = assess(&layout, &[Demand { case: &stated, opposite: Opposite::None }], false, &RULES);
    let moment = verdict(&beyond, About::Moment);
    assert_eq!(moment.state, State::Unproven);
    assert!(moment.reason.as_ref().unwrap().contains("above f_y"), "{:?}", moment.reason);
}

proptest! {
    /// Upside down, with the moment turned, it is the same joint.
    #[test]
    fn a_mirrored_joint_carries_the_same_force(sketch in sketches(), n in 600.0..1500.0f64, pull in any::<bool>()) {
        let n = if pull { n } else { -n };
        let (a, b) = (sketch.layout(&RULES), mirrored(&sketch.layout(&RULES)));
        let of = |layout: &EndPlateLayout, m: f64| at(layout, m, n).cases[0].axial.clone().map(|axial| axial.resistance.get());
        match (of(&a, 10.0), of(&b, -10.0)) {
            (Some(a), Some(b)) if !pull => prop_assert!((a - b).abs() <= 1e-9 * a.abs(), "{a} {b}"),
            // Groups across the axis lean on the upper flange only, so a turned joint may lose or gain there.
            (Some(a), Some(b)) => prop_assert!(a > 0.0 && b > 0.0 && (a / b - 1.0).abs() < 0.25, "{a} {b}"),
            (a, b) => prop_assert_eq!(a.is_some(), b.is_some()),
        }
    }

    /// The sum rises with N from the limit on, and is never less than the moment's own share.
    #[test]
    fn more_force_never_uses_less(sketch in sketches(), n in 500.0..1500.0f64, more in 1.0..2.0f64, pull in any::<bool>()) {
        let n = if pull { n } else { -n };
        let layout = sketch.layout(&RULES);
        let used = |n: f64| verdict(&at(&layout, 50.0, n), About::Axial).utilisation;
        if let (Some(less), Some(greater)) = (used(n), used(n * more)) {
            prop_assert!(greater >= less * (1.0 - 1e-12), "{less} {greater}");
            let own = at(&layout, 50.0, n).cases[0].moment.as_ref().map_or(0.0, |m| 50.0 / m.moment.knm());
            prop_assert!(less >= own);
        }
    }
}
