//! Column bases: own arithmetic by hand, a published one, laws, and what must not be clear.

use std::sync::LazyLock;

use faying::assess::simple::assess;
use faying::assess::{About, Assessment, Gap, State, Verdict};
use faying::intent::LoadCase;
use faying::joints::{Anchor, ColumnBase, Foundation, MemberAt, SimpleLayout, Spread};
use faying::origin::{Origin, Place};
use faying::rulebook::{Grade, Rulebook};
use faying::units::{kn, knm, mm, mpa};
use proptest::prelude::*;

use super::joint::{RULES, known, section, unknown};

/// f_jd = 2/3 · 1.5 · 1.0 · 30 / 1.5 = 20 N/mm².
fn foundation() -> Foundation {
    Foundation {
        concrete: Some(("C30/37".into(), mpa(30.0))),
        gamma_c: Some(1.5),
        alpha_cc: Some(1.0),
        bed: Some(mm(30.0)),
        bed_strength: Some(mpa(30.0)),
        spread: Some(Spread::Ratio(1.5)),
        anchors_held: Some(true),
    }
}

/// HEB 240 on 440 x 300 x 25, four M24 8.8 at 170 and 80 mm from the axis.
pub fn base() -> ColumnBase {
    let rules: &Rulebook = &RULES;
    let anchor = |x: f64, y: f64| Anchor { along: mm(x), across: mm(y) };
    ColumnBase {
        column: MemberAt {
            guid: String::new(),
            mark: None,
            section: known(section(rules, "HEB 240")),
            grade: known(Grade("S355".into())),
        },
        plate: String::new(),
        thickness: mm(25.0),
        grade: known(Grade("S355".into())),
        half_depths: [mm(220.0); 2],
        half_widths: [mm(150.0); 2],
        diameter: known(mm(24.0)),
        class: known("8.8".into()),
        hole: known(mm(26.0)),
        anchors: vec![anchor(-170.0, -80.0), anchor(-170.0, 80.0), anchor(170.0, -80.0), anchor(170.0, 80.0)],
        flange_weld: known(mm(6.0)),
        web_weld: known(mm(5.0)),
        full: (false, false),
        beside: Vec::new(),
        foundation: Some((foundation(), Origin::Assumed("this test".into()))),
    }
}

/// N, M, V in kN and kNm.
pub fn asked(base: &ColumnBase, case: [Option<f64>; 3]) -> Assessment {
    let [n, m, v] = case;
    let at = Place { file: "s.csv".into(), line: 1, column: 1 };
    let case = LoadCase { axial: n.map(kn), moment: m.map(knm), shear: v.map(kn), ..LoadCase::blank("1", at) };
    assess(&SimpleLayout::ColumnBase(Box::new(base.clone())), &[&case], &RULES)
}

fn verdict(assessment: &Assessment, about: About) -> &Verdict {
    assessment.cases[0].verdicts.iter().find(|v| v.about == about).unwrap_or_else(|| panic!("{assessment:#?}"))
}

fn near(value: f64, expected: f64) {
    assert!((value / expected - 1.0).abs() < 1e-3, "{value} against {expected}");
}

/// Own arithmetic: c = 25 √(345/60) = 59.95, beyond the flange's tips only 30 mm of plate; flanges 2 · 20 · 136.9 · 300 =
/// 1642.7 kN, web 20 · 86.1 · 129.9 = 223.7 kN.
#[test]
fn compression_by_hand() {
    let assessment = asked(&base(), [Some(-1500.0), Some(0.0), Some(0.0)]);
    let by = verdict(&assessment, About::Force);
    near(by.resistance.unwrap(), 1866.4);
    assert_eq!((by.state, by.required), (State::Met, Some(-1500.0)));
    assert_eq!(assessment.carries(), State::Met, "{:#?}", assessment.gaps);
    let more = asked(&base(), [Some(-1900.0), Some(0.0), Some(0.0)]);
    assert_eq!(more.carries(), State::NotMet);
}

/// Own arithmetic: z = 170 + 111.5; F_C = 80/0.2815 + 300 · 170/281.5 = 465.4 kN on 20 · 136.9 · 300 = 821.4 kN; F_T = 80/0.2815
/// − 300 · 111.5/281.5 = 165.4 kN on two anchors over a plate of l_eff = 150: 2 · 0.25 · 150 · 25² · 345/43.21 = 374.2 kN.
#[test]
fn moment_with_compression_by_hand() {
    let assessment = asked(&base(), [Some(-300.0), Some(-80.0), Some(50.0)]);
    let by = verdict(&assessment, About::Moment);
    near(by.resistance.unwrap(), 141.2);
    near(by.utilisation.unwrap(), 465.36 / 821.37);
    let part = |id: &str| {
        let (part, force) = assessment.beside.iter().find(|(part, _)| part.id == id).unwrap();
        (part.resistance.kn(), force.unwrap().kn())
    };
    near(part("anchors-in-tension").0, 374.2);
    near(part("anchors-in-tension").1, 165.36);
    near(part("concrete-below-flange").1, 465.36);
    assert_eq!(assessment.carries(), State::Met, "{:#?}", assessment.gaps);
}

/// Own arithmetic: friction 0.2 · 300 = 60 kN and the two anchors without tension, each (0.44 − 0.0003 · 640) · 800 · 353/1.25 =
/// 56.03 kN; without a moment all four.
#[test]
fn shear_by_hand() {
    let bent = asked(&base(), [Some(-300.0), Some(80.0), Some(150.0)]);
    near(verdict(&bent, About::Shear).resistance.unwrap(), 60.0 + 2.0 * 56.03);
    let straight = asked(&base(), [Some(-300.0), Some(0.0), Some(150.0)]);
    near(verdict(&straight, About::Shear).resistance.unwrap(), 60.0 + 4.0 * 56.03);
    // Large holes: friction alone, and what it does not carry is unproven.
    let loose = ColumnBase { hole: known(mm(32.0)), ..base() };
    let shear = |v| verdict(&asked(&loose, [Some(-300.0), Some(0.0), Some(v)]), About::Shear).state;
    assert_eq!((shear(59.0), shear(61.0)), (State::Met, State::Unproven));
}

/// Both sides' anchors alike: 2 · 374.2 kN.
#[test]
fn uplift_by_hand() {
    let assessment = asked(&base(), [Some(700.0), Some(0.0), Some(0.0)]);
    near(verdict(&assessment, About::Force).resistance.unwrap(), 748.4);
    assert_eq!(assessment.carries(), State::Met);
}

/// Steel Buildings in Europe, Multi-Storey Steel Buildings, Part 5, 6.5: a column of the size of HEB 320, f_jd 20 N/mm², asks c = 93 mm for
/// 4300 kN. There the column's area and perimeter count with their root radii, 4c² + 1771c + 16130 = 215 000; three T-stubs
/// of plates leave the radii out: own arithmetic 4 · 93² + 1817 · 93 + 15508 = 219 085 mm².
#[test]
fn the_published_axial_example() {
    let mut big = base();
    big.column.section = known(section(&RULES, "HEB 320"));
    (big.half_depths, big.half_widths) = ([mm(300.0); 2], [mm(300.0); 2]);
    // c = t √(345/60) for a plate up to 40 mm.
    big.thickness = mm(93.0 / (345.0_f64 / 60.0).sqrt());
    let assessment = asked(&big, [Some(-1.0), Some(0.0), Some(0.0)]);
    let concrete = &assessment.beside.iter().find(|(part, _)| part.id == "concrete-in-compression").unwrap().0;
    near(concrete.resistance.kn(), 20.0 * 219.085);
    assert!((concrete.resistance.kn() / 4300.0 - 1.0).abs() < 0.02);
}

#[test]
fn what_is_not_known_is_never_met() {
    let met = |base: &ColumnBase, case| asked(base, case).carries() == State::Met;
    let plain = [Some(-300.0), Some(0.0), Some(10.0)];
    let bent = [Some(-300.0), Some(80.0), Some(10.0)];
    assert!(met(&base(), plain) && met(&base(), bent));
    for i in 0..3 {
        let mut case = bent;
        case[i] = None;
        assert!(!met(&base(), case), "{i}");
    }
    let spoil: [fn(&mut Foundation); 6] = [
        |f| f.concrete = None,
        |f| f.gamma_c = None,
        |f| f.alpha_cc = None,
        |f| f.bed = None,
        |f| f.bed_strength = Some(mpa(5.0)),
        |f| f.spread = None,
    ];
    for spoil in spoil {
        let mut stated = foundation();
        spoil(&mut stated);
        let spoilt = ColumnBase { foundation: Some((stated, Origin::Assumed(String::new()))), ..base() };
        assert!(!met(&spoilt, plain) && !met(&spoilt, bent));
    }
    assert!(!met(&ColumnBase { foundation: None, ..base() }, plain));
    // What only a tension needs is not asked of a base in compression.
    let held = Foundation { anchors_held: None, ..foundation() };
    for spoilt in [
        ColumnBase { class: unknown("anchor class"), ..base() },
        ColumnBase { flange_weld: unknown("weld"), ..base() },
        ColumnBase { foundation: Some((held, Origin::Assumed(String::new()))), ..base() },
        ColumnBase { anchors: base().anchors[..3].to_vec(), ..base() },
    ] {
        assert!(met(&spoilt, plain) && !met(&spoilt, bent));
    }
    assert!(!met(&ColumnBase { web_weld: unknown("weld"), ..base() }, plain));
}

#[test]
fn shear_keys_are_told_and_not_credited() {
    let beside = vec!["SK1: a shear key or the like below the plate, which no check credits".to_owned()];
    let assessment = asked(&ColumnBase { beside: beside.clone(), ..base() }, [Some(-300.0), Some(0.0), Some(500.0)]);
    assert_eq!(assessment.not_credited, beside);
    assert_eq!(assessment.carries(), State::NotMet);
}

static CLASSES: LazyLock<[f64; 4]> = LazyLock::new(|| [20.0, 25.0, 30.0, 50.0]);

/// Resistances in compression and beside a moment (0 where there is none).
fn carried(t: f64, f_ck: f64, half: [f64; 2], case: [Option<f64>; 3]) -> [f64; 2] {
    let stated = Foundation { concrete: Some(("C".into(), mpa(f_ck))), bed_strength: Some(mpa(60.0)), ..foundation() };
    let base = ColumnBase {
        thickness: mm(t),
        half_depths: [mm(half[0]); 2],
        half_widths: [mm(half[1]); 2],
        foundation: Some((stated, Origin::Assumed(String::new()))),
        ..base()
    };
    let assessment = asked(&base, case);
    assert!(!assessment.gaps.iter().any(|gap| matches!(gap, Gap::NotChecked(_))), "{:#?}", assessment.gaps);
    [verdict(&assessment, About::Force), verdict(&assessment, About::Moment)].map(|v| v.resistance.unwrap())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// Within one range of strengths; a plate past 40 mm has a lower f_y.
    #[test]
    fn neither_a_thicker_plate_nor_stronger_concrete_is_ever_weaker(
        t in 17.0..35.0_f64, more in 0.0..5.0_f64, a in 0..4usize, b in 0..4usize,
        along in 200.0..300.0_f64, across in 130.0..250.0_f64, n in -1500.0..-10.0_f64, m in 1.0..150.0_f64,
    ) {
        let (low, high) = (CLASSES[a.min(b)], CLASSES[a.max(b)]);
        let case = [Some(n), Some(m), Some(0.0)];
        let half = [along, across];
        let (less, thick, strong) =
            (carried(t, low, half, case), carried(t + more, low, half, case), carried(t, high, half, case));
        for (less, more) in less.iter().zip(&thick).chain(less.iter().zip(&strong)) {
            prop_assert!(*more >= less * (1.0 - 1e-9), "{less} {more}");
        }
    }

    /// Nothing jumps where a side passes from compression to tension: equilibrium holds on both sides of it.
    #[test]
    fn both_sides_are_in_equilibrium(n in -800.0..800.0_f64, m in 0.0..200.0_f64) {
        let (arm, anchors) = (mm(111.5), mm(170.0));
        let ((c, t), _) = faying::eurocode::column_base::sides(knm(m), kn(n), arm, Some(anchors)).unwrap();
        prop_assert!(c.kn() >= -1e-9 && t.kn() >= -1e-9);
        if c.kn() > 0.0 && t.kn() > 0.0 {
            prop_assert!((t.kn() - c.kn() - n).abs() < 1e-6);
            prop_assert!((t.kn() * 0.17 + c.kn() * 0.1115 - m).abs() < 1e-6);
        }
    }
}
