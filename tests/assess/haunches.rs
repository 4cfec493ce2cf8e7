//! Haunched beams: laws on invented ones, and own arithmetic.
#![allow(non_snake_case)]

use faying::assess::end_plate::{Opposite, intended};
use faying::assess::{About, Gap, MomentResistance, Sense, State};
use faying::eurocode::haunch::{AtEnd, Compression, compression, web_at_end};
use faying::intent::{IntendedDetail, IntendedHaunch};
use faying::joints::{EndPlateLayout, Haunch};
use faying::units::{Area, Length, mm, mpa};
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, Sketch, asked, case, known, resistance, section, sketches, state, unknown, verdict};

/// The sketch with a haunch of its beam's own flange and web, and a plate that reaches 25 mm below it.
fn haunched(sketch: &Sketch, depth: f64, length: f64) -> EndPlateLayout {
    let mut layout = sketch.layout(&RULES);
    let beam = section(&RULES, sketch.beam);
    layout.plate.bottom = mm(-depth - 25.0);
    layout.haunch = Some(Haunch {
        guids: Vec::new(),
        depth: mm(depth),
        length: mm(length),
        angle: (depth / length).atan().to_degrees(),
        flange_thickness: beam.t_f,
        flange_width: beam.b,
        web_thickness: beam.t_w,
        flange_grade: known(RULES.grade(sketch.grade).unwrap()),
        web_grade: known(RULES.grade(sketch.grade).unwrap()),
        flange_weld: known(mm(6.0)),
        web_weld: known(mm(5.0)),
        stiffened: false,
    });
    layout
}

/// A column that never gives, so that the beam's side is looked at alone.
fn strong(mut layout: EndPlateLayout) -> EndPlateLayout {
    let mut column = section(&RULES, "HEB 300");
    (column.t_f, column.t_w, column.h, column.a_v_z) = (mm(100.0), mm(40.0), mm(1500.0), Area(200_000.0));
    layout.column.section = known(column);
    layout.stiffeners.clear();
    layout
}

fn hogging(layout: &EndPlateLayout) -> std::sync::Arc<MomentResistance> {
    resistance(layout, Sense::Hogging, 0.0, &RULES).unwrap()
}

fn potentials(moment: &MomentResistance) -> Vec<f64> {
    moment.rows.iter().map(|row| row.force.kn()).collect()
}

/// What the bolts can do stays, and only the lever arms grow, by the haunch's depth less half the difference of the flanges'
/// heights: a flat haunch differs from the plain joint by nothing else.
#[test]
fn a_flat_haunch_lengthens_the_lever_arms() {
    let sketch = Sketch { inner: 1, extended: false, t_p: 12.0, ..PLAIN };
    let plain = hogging(&strong(sketch.layout(&RULES)));
    for depth in [30.0, 60.0, 120.0] {
        let own = hogging(&strong(haunched(&sketch, depth, 3000.0)));
        let upright = 13.5 / (depth / 3000.0_f64).atan().cos();
        assert_eq!(potentials(&plain), potentials(&own));
        let longer = depth - 0.5 * (upright - 13.5);
        for (a, b) in plain.rows.iter().zip(&own.rows) {
            assert!((b.lever_arm - a.lever_arm - mm(longer)).abs() < mm(1e-9));
        }
    }
}

/// Nothing is credited to a haunch with tension at the bottom: the plain joint, as a lower bound.
#[test]
fn with_tension_at_the_bottom_the_haunch_is_left_out() {
    let sketch = Sketch { inner: 2, ..PLAIN };
    let (mut plain, mut own) = (sketch.layout(&RULES), haunched(&sketch, 300.0, 700.0));
    // Rows beside the haunch change nothing in that sense.
    let low = own.bolts.rows.last().cloned().unwrap();
    own.bolts.rows.push(faying::joints::BoltRow { height: mm(-220.0), ..low });
    for layout in [&mut plain, &mut own] {
        layout.column_below = None;
        layout.column_above = None;
    }
    let moments = [&plain, &own].map(|layout| resistance(layout, Sense::Sagging, 1.0, &RULES).unwrap().without_welds);
    assert_eq!(moments[0], moments[1]);
    let short = case(Some(-1.05 * moments[1].knm()), Some(0.0), Some(0.0));
    let joint = asked(&own, &short, Opposite::None, &RULES);
    assert_eq!(state(&joint, About::Moment), State::Unproven);
    assert!(verdict(&joint, About::Moment).reason.as_ref().unwrap().contains("the haunch is not credited"));
    let carried = case(Some(-0.5 * moments[1].knm()), Some(0.0), Some(0.0));
    assert_eq!(state(&asked(&own, &carried, Opposite::None, &RULES), About::Moment), State::Met);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(48))]

    /// A deeper haunch at the same slope never lowers the resistance while the column holds and no row gets too low.
    #[test]
    fn a_deeper_haunch_carries_no_less(sketch in sketches(), slope in 1.2..5.0f64, depth in 80.0..200.0f64) {
        let sketch = Sketch { inner: 1, extended: false, column_above: None, ..sketch };
        let of = |depth: f64| resistance(&strong(haunched(&sketch, depth, slope * depth)), Sense::Hogging, 0.0, &RULES);
        if let (Ok(flat), Ok(deep)) = (of(depth), of(1.2 * depth)) {
            // Above 600 mm the web's share is cut, and a slender web of the haunch helps nothing.
            let governed = |m: &MomentResistance| m.rows.iter().any(|row| row.governed_by.contains("haunch"));
            prop_assume!(!governed(&flat) && !governed(&deep));
            prop_assert!(deep.without_welds >= flat.without_welds);
        }
    }

    /// A steeper haunch of the same depth never carries more in compression.
    #[test]
    fn a_steeper_haunch_carries_no_more(depth in 100.0..500.0f64, a in 1.0..45.0f64, b in 1.0..45.0f64) {
        let (flat, steep) = (a.min(b), a.max(b));
        let of = |theta: f64| {
            let c = Compression {
                h: mm(400.0 + depth), h_h: mm(depth), b_fh: mm(180.0), t_fh: mm(13.5), theta, t_wh: mm(8.6),
                b_fb: mm(180.0), t_fb: mm(13.5), t_wb: mm(8.6), f_y: mpa(355.0), little_shear: true,
            };
            compression(&c, 1.0).unwrap().value
        };
        prop_assert!(of(steep) <= of(flat));
        let at = |theta: f64| {
            let c = AtEnd {
                t_fh: mm(13.5), theta, t_fb: mm(13.5), r: mm(21.0), t_wb: mm(8.6), d_wb: mm(331.0), f_y: mpa(355.0),
                A_v: Area(4269.0),
            };
            web_at_end(&c, 1.0, 1.0).value / theta.to_radians().tan()
        };
        prop_assert!(at(steep) <= at(flat));
    }
}

/// Own arithmetic: 180 × 15 flange at atan(0.5), f_y 355: 180 · 15 · 355 · cos 26.565° = 857.3 kN; with the web of a section
/// 180 × 13.416 (15 cos θ = 13.416), h = 500, t_w = 9:
/// W_el = 180 · 13.416 · 486.584² / 500 + 9 · 473.168³ / (6 · 500) = 1 143 505 + 317 808 = 1 461 313 mm³,
/// M = 518.77 kNm, over 486.584 mm: 1066.1 kN.
#[test]
fn compression_by_hand() {
    let c = Compression {
        h: mm(500.0),
        h_h: mm(150.0),
        b_fh: mm(180.0),
        t_fh: mm(15.0),
        theta: 0.5_f64.atan().to_degrees(),
        t_wh: mm(9.0),
        b_fb: mm(180.0),
        t_fb: mm(15.0),
        t_wb: mm(9.0),
        f_y: mpa(355.0),
        little_shear: true,
    };
    let of = |c: Compression| compression(&c, 1.0).unwrap().value.kn();
    assert!((of(c) - 1066.1).abs() < 0.1, "{}", of(c));
    assert!((of(Compression { little_shear: false, ..c }) - 857.3).abs() < 0.1);
    // A web of 3 mm is of class 4 and helps nothing: 150/3 = 50, more than 42 · 0.814 / (0.67 + 0.33 · 0.4) = 42.6.
    assert!((of(Compression { t_wh: mm(3.0), ..c }) - 857.3).abs() < 0.1);
    // Above 600 mm the web has at most a fifth.
    let deep = Compression { h: mm(700.0), h_h: mm(300.0), ..c };
    assert!(of(deep) <= 857.3 / 0.8 + 0.1);
    assert!(compression(&Compression { t_fh: mm(7.0), ..c }, 1.0).unwrap_err().contains("class 4"));
}

/// What 6.2.6.7(3) asks of a haunch: no lower grade, no smaller flange and web, at most 45°.
#[test]
fn a_haunch_that_the_clause_does_not_allow_is_unproven() {
    let gaps = |change: &dyn Fn(&mut Haunch)| {
        let mut layout = haunched(&PLAIN, 300.0, 700.0);
        change(layout.haunch.as_mut().unwrap());
        let joint = asked(&layout, &case(Some(1.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
        let gaps = joint.gaps.iter().filter(|gap| matches!(gap, Gap::NotChecked(_)));
        (joint.hogging.is_some(), gaps.map(|gap| format!("{gap:?}")).collect::<String>())
    };
    assert_eq!(gaps(&|_| ()), (true, String::new()));
    let says = |change: &dyn Fn(&mut Haunch), what: &str| {
        let (assessed, gaps) = gaps(change);
        assert!(!assessed && gaps.contains(what), "{gaps}");
    };
    says(&|h| h.flange_grade = known(RULES.grade("S235").unwrap()), "below the beam's");
    says(&|h| h.flange_thickness = mm(12.0), "flange's thickness 12.00 mm is below");
    says(&|h| h.flange_width = mm(150.0), "flange's width");
    says(&|h| h.web_thickness = mm(6.0), "web's thickness");
    says(&|h| h.angle = 50.0, "above 45°");
    says(&|h| h.angle = f64::NAN, "above 45°");
    says(&|h| h.depth = Length::ZERO, "its depth is");
    says(&|h| h.web_grade = unknown("grade"), "nobody states it");
    // A weld that nobody states leaves the moment, and keeps the proof back.
    let (assessed, said) = gaps(&|h| h.flange_weld = unknown("weld at the haunch's flange"));
    assert!(assessed && said.contains("weld at the haunch's flange"), "{said}");
}

/// What the schedule states of a haunch is laid over the detailed one; what it doesn't state stays.
#[test]
fn the_intended_haunch() {
    let meant = |detailed: &EndPlateLayout, haunch: Option<IntendedHaunch>| {
        intended(detailed, &IntendedDetail { haunch: Some(haunch), ..IntendedDetail::default() }, &RULES)
    };
    let detailed = haunched(&PLAIN, 240.0, 700.0);
    let deeper = IntendedHaunch { depth: Some(mm(300.0)), ..IntendedHaunch::default() };
    let haunch = meant(&detailed, Some(deeper.clone())).unwrap().haunch.unwrap();
    let wanted = haunched(&PLAIN, 300.0, 700.0).haunch.unwrap();
    assert_eq!((haunch.depth, haunch.length), (wanted.depth, wanted.length));
    assert!((haunch.angle - wanted.angle).abs() < 1e-9);
    assert_eq!(haunch.flange_thickness, wanted.flange_thickness);
    assert!(meant(&detailed, None).unwrap().haunch.is_none());
    // Where none is detailed nothing of it is known but what is stated: not computed, and said.
    let why = meant(&PLAIN.layout(&RULES), Some(deeper)).unwrap_err();
    assert!(why.reason.contains("a haunch is intended where none is detailed"), "{}", why.reason);
}
