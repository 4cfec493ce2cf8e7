//! Slip-resistant bolts by category, and bolts through packing.

use faying::assess::end_plate::{Opposite, assess};
use faying::assess::{About, Assessment, Component, Gap, State};
use faying::joints::EndPlateLayout;
use faying::origin::{Datum, Origin};
use faying::rulebook::{Category, Rulebook};
use faying::units::{Length, mm};
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, asked, case, known, sketches, state, verdict};

fn stated<T>(value: T) -> Datum<T> {
    Datum::new(value, Origin::Assumed("test".into()))
}

/// The joint with its bolts of a category, and a slip factor if one is stated.
fn of(category: Category, mu: Option<f64>) -> EndPlateLayout {
    let mut layout = PLAIN.layout(&RULES);
    layout.bolts.held.category = Some(stated(category));
    layout.bolts.held.slip_factor = mu.map(stated);
    layout
}

fn component<'a>(assessment: &'a Assessment, id: &str) -> Option<&'a Component> {
    assessment.shear.as_ref()?.components.iter().find(|component| component.id == id)
}

fn said(assessment: &Assessment, what: &str) -> bool {
    assessment.assumptions.iter().any(|sentence| sentence.contains(what))
}

fn not_checked(assessment: &Assessment) -> Vec<&str> {
    let gaps = assessment.gaps.iter();
    gaps.filter_map(|gap| if let Gap::NotChecked(missing) = gap { Some(missing.reason.as_str()) } else { None })
        .collect()
}

#[test]
fn without_a_category_bolts_are_of_bearing_type_and_it_is_said() {
    let plain = assess(&PLAIN.layout(&RULES), &[], false, &RULES);
    assert!(said(&plain, "bolts of category A, bearing type (Table 3.2): the schedule states no category"));
    for category in [Category::A, Category::D, Category::E] {
        let assessment = assess(&of(category, Some(0.5)), &[], false, &RULES);
        assert!(component(&assessment, "bolts-in-slip").is_none() && not_checked(&assessment).is_empty());
        assert_eq!(assessment.shear.unwrap().shear, plain.shear.as_ref().unwrap().shear);
        assert!(assessment.inputs.iter().any(|input| input.value == format!("{category:?}")));
    }
}

/// F_s,Rd without tension: μ · 0.7 f_ub A_s / 1.25 a bolt (own arithmetic).
#[test]
fn category_c_limits_the_shear() {
    let layout = of(Category::C, Some(0.2));
    let bolts = 2.0 * layout.bolts.rows.len() as f64;
    let free = asked(&layout, &case(Some(0.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
    let slip = free.cases[0].shear.as_ref().unwrap();
    let group = slip.components.iter().find(|c| c.id == "bolts-in-slip").unwrap();
    let preload = 0.7 * 0.8 * RULES.bolt_size(mm(PLAIN.d)).unwrap().a_s.get();
    assert!((group.resistance.kn() - bolts * 0.2 * preload / 1.25).abs() < 1e-6, "{}", group.resistance);
    assert_eq!(slip.governed_by, "bolts in slip with their tension");
    let limit = slip.shear.kn();
    for (v, expected) in [(0.99 * limit, State::Met), (1.01 * limit, State::NotMet)] {
        let assessment = asked(&layout, &case(Some(0.0), Some(v), Some(0.0)), Opposite::None, &RULES);
        assert_eq!(state(&assessment, About::Shear), expected);
        let bearing = asked(&PLAIN.layout(&RULES), &case(Some(0.0), Some(v), Some(0.0)), Opposite::None, &RULES);
        assert_eq!(state(&bearing, About::Shear), State::Met);
    }
}

#[test]
fn what_slip_needs_and_nobody_states_is_unproven() {
    let one = |layout: &EndPlateLayout, reason: &str| {
        let assessment = asked(layout, &case(Some(1.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
        assert!(not_checked(&assessment).iter().any(|said| said.contains(reason)), "{:?}", not_checked(&assessment));
        assert_eq!(assessment.carries(), State::Unproven);
        assert_eq!(verdict(&assessment, About::Shear).state, State::Met, "what could be checked");
    };
    one(&of(Category::C, None), "states neither friction class nor slip factor");
    one(&of(Category::B, Some(0.5)), "category B asks for it at serviceability");
    let mut weak = of(Category::C, Some(0.5));
    weak.bolts.class = known("5.6".into());
    one(&weak, "category C asks for preloaded bolts of class 8.8 and 10.9, these are 5.6");
    let mut rules = RULES.clone();
    rules.annex.gamma_m3 = None;
    let assessment = assess(&of(Category::C, Some(0.5)), &[], false, &rules);
    assert!(not_checked(&assessment)[0].contains("no gamma_M3"));
}

/// 3.9.2(3): the other reading takes nothing off.
#[test]
fn the_tension_of_a_moment_may_be_taken_as_counterbalanced() {
    let layout = of(Category::C, Some(0.4));
    let mut rules = RULES.clone();
    rules.slip.reduced_by_tension = false;
    let group = |m: f64, rules| {
        let assessment = asked(&layout, &case(Some(m), Some(1.0), Some(0.0)), Opposite::None, rules);
        let shear = assessment.cases[0].shear.clone().unwrap();
        shear.components.iter().find(|c| c.id == "bolts-in-slip").unwrap().resistance
    };
    assert!(group(80.0, &RULES) < group(0.0, &RULES));
    assert_eq!(group(80.0, &rules), group(0.0, &rules));
    assert_eq!(group(0.0, &rules), group(0.0, &RULES));
}

#[test]
fn packing_reduces_the_bolts_shear_and_is_said() {
    let shear = |packing: &[f64]| {
        let mut layout = PLAIN.layout(&RULES);
        layout.bolts.held.packing = packing.iter().map(|t| mm(*t)).collect();
        let assessment = asked(&layout, &case(Some(0.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
        assert_eq!(said(&assessment, "3.6.1(12)"), !packing.is_empty());
        let shear = assessment.cases[0].shear.clone().unwrap();
        shear.components.iter().find(|c| c.id == "bolts-in-shear").unwrap().resistance
    };
    let d = PLAIN.d;
    assert_eq!(shear(&[d / 4.0]), shear(&[]));
    // Two plates count together; (3.3), own arithmetic.
    let t_p = 0.6 * d;
    let beta_p = 9.0 * d / (8.0 * d + 3.0 * t_p);
    assert!((shear(&[0.3 * d, 0.3 * d]) / shear(&[]) - beta_p).abs() < 1e-12);
}

/// α_v 0.6 with A in the shank, and with A_s (0.5 for 10.9) in the thread: EN 1993-1-8:2005 Table 3.4. The head may be on
/// either side, so the shank must reach through the thicker ply and a washer.
#[test]
fn where_the_thread_ends_the_model_may_show() {
    let plain = PLAIN.layout(&RULES);
    let size = RULES.bolt_size(mm(PLAIN.d)).unwrap();
    let [t_p, t_fc] = faying::joints::BoltedPlate::from(&plain).plies().unwrap();
    let plane = t_p.max(t_fc) + size.washer_thickness;
    let shear = |shank: Option<Length>, rules: &Rulebook| {
        let mut layout = plain.clone();
        layout.bolts.held.shank = shank;
        let assessment = asked(&layout, &case(Some(0.0), Some(1.0), Some(0.0)), Opposite::None, rules);
        let shear = assessment.cases[0].shear.clone().unwrap();
        let words: Vec<String> =
            assessment.assumptions.into_iter().filter(|said| said.contains("shear plane")).collect();
        (shear.components.iter().find(|c| c.id == "bolts-in-shear").unwrap().resistance, words)
    };
    let (thread, words) = shear(None, &RULES);
    assert_eq!(words, ["thread in the shear plane: no model says where it ends"]);
    let (shank, words) = shear(Some(plane), &RULES);
    assert_eq!(words, ["shank in the shear plane, by the bolts' length and thread"]);
    assert!((shank / thread - size.a / size.a_s).abs() < 1e-12, "8.8: the same α_v");
    assert_eq!(shear(Some(plane - mm(0.1)), &RULES).0, thread);
    // What the model shows counts, whatever the rule file takes where it shows nothing.
    let mut rules = RULES.clone();
    rules.settings.thread_in_shear_plane = false;
    assert_eq!(shear(None, &rules).0, shank);
    assert_eq!(shear(Some(plane - mm(0.1)), &rules).0, thread);
    assert_eq!(shear(Some(mm(f64::NAN)), &rules).0, thread);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(40))]
    #[test]
    fn slip_resistance_falls_with_the_moment_and_never_raises_the_shear(
        sketch in sketches(), mu in 0.2..0.5f64, m in 5.0..100.0f64, more in 1.0..2.0f64,
    ) {
        let bearing = sketch.layout(&RULES);
        let mut layout = bearing.clone();
        layout.bolts.held.category = Some(stated(Category::C));
        layout.bolts.held.slip_factor = Some(stated(mu));
        let shear = |layout: &EndPlateLayout, m: f64| {
            let assessment = asked(layout, &case(Some(m), Some(1.0), Some(0.0)), Opposite::None, &RULES);
            assessment.cases[0].shear.as_ref().map(|shear| shear.shear)
        };
        if let (Some(less), Some(greater), Some(plain)) = (shear(&layout, m), shear(&layout, m * more), shear(&bearing, m)) {
            prop_assert!(greater <= less * (1.0 + 1e-12), "{greater} {less}");
            prop_assert!(less <= plain);
        }
    }
}
