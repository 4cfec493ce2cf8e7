//! Facts of the tables, each with its source.

use faying::origin::Origin;
use faying::rulebook::{Grade, RowForces, Rulebook};
use faying::units::mm;
use proptest::prelude::*;

/// Sizes and the resistances that follow from them.
#[test]
fn bolts() {
    let rules = Rulebook::embedded();
    // d, A_s, d_0, across flats, across flats EN 14399, washer, F_t,Rd and F_v,Rd (thread) of 8.8 and 10.9 in kN.
    // A_s: ISO 898-1; d_0: EN 1090-2; across flats: ISO 4014, EN 14399; washer: ISO 7089; resistances: published bolt
    // tables to EN 1993-1-8 with gamma_M2 = 1.25, for M22, M27, M30 and M36 own arithmetic.
    #[rustfmt::skip]
    let published = [
        (12.0,  84.3, 13.0, 18.0, 22.0, (24.0, 2.5),  48.6,  32.4,  60.7,  33.7),
        (16.0, 157.0, 18.0, 24.0, 27.0, (30.0, 3.0),  90.4,  60.3, 113.0,  62.8),
        (20.0, 245.0, 22.0, 30.0, 32.0, (37.0, 3.0), 141.0,  94.1, 176.0,  98.0),
        (22.0, 303.0, 24.0, 34.0, 36.0, (39.0, 3.0), 174.5, 116.4, 218.0, 121.0),
        (24.0, 353.0, 26.0, 36.0, 41.0, (44.0, 4.0), 203.0, 136.0, 254.0, 141.0),
        (27.0, 459.0, 30.0, 41.0, 46.0, (50.0, 4.0), 264.0, 176.0, 330.0, 184.0),
        (30.0, 561.0, 33.0, 46.0, 50.0, (56.0, 4.0), 323.0, 215.0, 404.0, 224.0),
        (36.0, 817.0, 39.0, 55.0, 60.0, (66.0, 5.0), 471.0, 314.0, 588.0, 327.0),
    ];
    assert_eq!(rules.bolt_sizes.len(), published.len());
    for (d, a_s, d_0, flats, flats_preloaded, washer, f_t_88, f_v_88, f_t_109, f_v_109) in published {
        let bolt = rules.bolt_size(mm(d)).unwrap();
        assert_eq!((bolt.a_s.get(), bolt.d_0.get()), (a_s, d_0), "M{d}");
        assert_eq!((bolt.across_flats.get(), bolt.across_flats_preloaded.get()), (flats, flats_preloaded), "M{d}");
        assert_eq!((bolt.washer.get(), bolt.washer_thickness.get()), washer, "M{d}");
        for (class, f_t, f_v) in [("8.8", f_t_88, f_v_88), ("10.9", f_t_109, f_v_109)] {
            let class = rules.bolt_class(class).unwrap();
            let of = |k: f64| k * class.f_ub.get() * bolt.a_s.get() / 1.25 / 1e3;
            // three printed digits; the tables cut some and round others
            let digit = |x: f64| if x < 100.0 { 0.1 } else { 1.0 };
            assert!((of(0.9) - f_t).abs() < digit(f_t), "M{d} {}: {} against {f_t}", class.name, of(0.9));
            assert!(
                (of(class.alpha_v) - f_v).abs() < digit(f_v),
                "M{d} {}: {} against {f_v}",
                class.name,
                of(class.alpha_v)
            );
        }
        // A hexagon's corners lie at most 2/sqrt(3) flats apart.
        let across = bolt.across_corners.get() / flats;
        assert!(across > 1.08 && across < 2.0 / 3.0_f64.sqrt(), "M{d}: {across}");
        // own arithmetic
        assert!((bolt.a.get() - std::f64::consts::FRAC_PI_4 * d * d).abs() < 1e-9, "M{d}");
        assert!(bolt.a_s < bolt.a && bolt.head.get() < d && bolt.nut.get() < d, "M{d}");
    }
    assert_eq!(rules.bolt_size(mm(21.0)), None);
    assert_eq!(rules.bolt_size(mm(f64::NAN)), None);
}

#[test]
fn bolt_classes() {
    let rules = Rulebook::embedded();
    // f_yb, f_ub: EN 1993-1-8:2005 Table 3.1; alpha_v in the thread: Table 3.4
    let published = [
        ("4.6", 240.0, 400.0, 0.6),
        ("4.8", 320.0, 400.0, 0.5),
        ("5.6", 300.0, 500.0, 0.6),
        ("5.8", 400.0, 500.0, 0.5),
        ("6.8", 480.0, 600.0, 0.5),
        ("8.8", 640.0, 800.0, 0.6),
        ("10.9", 900.0, 1000.0, 0.5),
    ];
    let found: Vec<_> =
        rules.bolt_classes.iter().map(|c| (c.name.as_str(), c.f_yb.get(), c.f_ub.get(), c.alpha_v)).collect();
    assert_eq!(found, published);
    assert_eq!(rules.alpha_v_shank, 0.6);
}

/// EN 1090-2: round 1 mm for M12 and M14, 2 mm for M16 to M24, 3 mm from M27; oversize 3/4/6/8; short slots 4/6/8/10.
#[test]
fn hole_clearances() {
    let rules = Rulebook::embedded();
    for (d, round, oversize, short) in [
        (12.0, 1.0, 3.0, 4.0),
        (14.0, 1.0, 3.0, 4.0),
        (16.0, 2.0, 4.0, 6.0),
        (22.0, 2.0, 4.0, 6.0),
        (24.0, 2.0, 6.0, 8.0),
        (27.0, 3.0, 8.0, 10.0),
        (36.0, 3.0, 8.0, 10.0),
    ] {
        let gap = rules.clearance(mm(d)).unwrap();
        assert_eq!((gap.round.get(), gap.oversize.get(), gap.short_slot.get()), (round, oversize, short), "M{d}");
        assert_eq!(gap.long_slot, 1.5);
    }
    assert_eq!(rules.clearance(mm(f64::NAN)), None);
}

/// EN 10025-2: f_y to 16, 40, 63, 80 and 100 mm; f_u from 3 to 100 mm.
#[test]
fn strengths_at_the_edges_of_the_bands() {
    let rules = Rulebook::embedded();
    assert_eq!(rules.steel_table(), "EN 10025-2");
    let edges = [3.0, 16.0, 16.1, 40.0, 40.1, 63.0, 63.1, 80.0, 80.1, 100.0];
    for (grade, f_y, f_u) in [
        ("S235", [235.0, 225.0, 215.0, 215.0, 215.0], 360.0),
        ("S275", [275.0, 265.0, 255.0, 245.0, 235.0], 410.0),
        ("S355", [355.0, 345.0, 335.0, 325.0, 315.0], 470.0),
        ("S460", [460.0, 440.0, 420.0, 400.0, 390.0], 550.0),
    ] {
        let grade = Grade(grade.into());
        for (i, t) in edges.into_iter().enumerate() {
            let found = rules.strength(&grade, mm(t)).unwrap();
            assert_eq!((found.value.f_y.get(), found.value.f_u.get()), (f_y[i / 2], f_u), "{} at {t}", grade.0);
        }
        for t in [2.9, 0.0, -1.0, 100.1, f64::NAN, f64::INFINITY] {
            let missing = rules.strength(&grade, mm(t)).unwrap_err();
            assert!(missing.reason.contains("3 to 100 mm"), "{missing}");
        }
    }
    let origin = rules.strength(&Grade("S355".into()), mm(25.0)).unwrap().origin;
    assert_eq!(origin, Origin::LookedUp("EN 10025-2: S355, over 16 up to 40 mm".into()));
    for unknown in ["S690Q", "S420", "S355MC", "steel", ""] {
        let missing = rules.strength(&Grade(unknown.into()), mm(10.0)).unwrap_err();
        assert!(missing.what == "steel strength" && missing.reason.contains("EN 10025-2"), "{missing}");
    }
}

/// EN 1993-1-1:2005 Table 3.1 for t up to 40 and up to 80 mm, S355 with f_u by the corrigendum.
#[test]
fn the_other_strength_table_is_one_line_away() {
    let steel = include_str!("../../rules/steel.toml")
        .replace("table = \"EN 10025-2\"", "table = \"EN 1993-1-1:2005 Table 3.1\"");
    let rules = Rulebook::with_overrides(&[("steel.toml", steel)]).unwrap();
    assert_eq!(rules.steel_table(), "EN 1993-1-1:2005 Table 3.1");
    for (grade, thin, thick) in [
        ("S235", (235.0, 360.0), (215.0, 360.0)),
        ("S275", (275.0, 430.0), (255.0, 410.0)),
        ("S355", (355.0, 490.0), (335.0, 470.0)),
        ("S450", (440.0, 550.0), (410.0, 550.0)),
    ] {
        for (t, expected) in [(16.1, thin), (40.0, thin), (40.1, thick), (80.0, thick)] {
            let found = rules.strength(&Grade(grade.into()), mm(t)).unwrap().value;
            assert_eq!((found.f_y.get(), found.f_u.get()), expected, "{grade} at {t}");
        }
        assert!(rules.strength(&Grade(grade.into()), mm(80.1)).is_err());
    }
}

/// EN 1993-1-8:2005 Table 4.1, 4.5.1 and 4.5.2.
#[test]
fn welds() {
    let rules = Rulebook::embedded();
    for (grade, beta_w) in [
        ("S235", Some(0.8)),
        ("Fe360", Some(0.8)),
        ("S275", Some(0.85)),
        ("S275N", Some(0.85)),
        ("S355", Some(0.9)),
        ("S460", Some(1.0)),
        ("S460M", Some(1.0)),
        ("S690Q", None),
    ] {
        assert_eq!(rules.beta_w(&Grade(grade.into())), beta_w, "{grade}");
    }
    assert_eq!(rules.welds.min_throat, mm(3.0));
    assert_eq!((rules.welds.min_length, rules.welds.min_length_in_throats), (mm(30.0), 6.0));
}

/// The recommended factors of EN 1993-1-1:2005 6.1 and EN 1993-1-8:2005 Table 2.1.
#[test]
fn annexes() {
    let mut rules = Rulebook::embedded();
    let annex = &rules.annex;
    assert_eq!((annex.gamma_m0, annex.gamma_m1, annex.gamma_m2), (1.0, 1.0, 1.25));
    assert!(annex.source.contains("γ_M2: EN 1993-1-8:2005 Table 2.1"), "{}", annex.source);
    assert_eq!(rules.annexes().collect::<Vec<_>>(), ["de", "es", "fr", "it", "nl", "recommended", "uk"]);
    assert_eq!(rules.settings.row_forces, RowForces::LinearBeyond19);
    rules.use_annex("uk").unwrap();
    assert!(rules.annex.source.contains("from memory, confirm with the annex"));
    assert_eq!(rules.use_annex("xx").unwrap_err(), "annex \"xx\"; allowed is de, es, fr, it, nl, recommended, uk");
    assert_eq!((rules.annex.gamma_mu, rules.settings.row_forces), (Some(1.1), RowForces::ThinPlateOrLinear));
    // From memory, confirm with the annexes.
    for (id, gamma_m0, gamma_m1) in
        [("de", 1.0, 1.1), ("fr", 1.0, 1.0), ("nl", 1.0, 1.0), ("it", 1.05, 1.05), ("es", 1.05, 1.05)]
    {
        rules.use_annex(id).unwrap();
        let annex = &rules.annex;
        assert_eq!((annex.gamma_m0, annex.gamma_m1, annex.gamma_m2), (gamma_m0, gamma_m1, 1.25), "{id}");
        assert_eq!(annex.gamma_m3, Some((1.25, 1.10)), "{id}");
        assert_eq!(annex.source.matches("from memory").count(), 6, "{id}");
        assert_eq!(rules.settings.row_forces, RowForces::LinearBeyond19, "{id}");
    }
    // A choice in the settings stands whatever the annex.
    let detailing = include_str!("../../rules/detailing.toml").replace("\"by-annex\"\n", "\"linear-beyond-1.9\"\n");
    let mut own = Rulebook::with_overrides(&[("detailing.toml", &detailing)]).unwrap();
    own.use_annex("uk").unwrap();
    assert_eq!(own.settings.row_forces, RowForces::LinearBeyond19);
}

proptest! {
    /// No text makes a look-up panic.
    #[test]
    fn any_text_is_answered(text in "([A-Za-z0-9 .,x×*/:_é-]{0,40}|.{0,20}(UKB|HE|S|IPE|8[.,]).{0,20})") {
        let rules = Rulebook::embedded();
        let _ = (rules.section(&text), rules.grade(&text), rules.class_in(&text), rules.means("mark", &text));
    }

    /// Thicker steel is never stronger.
    #[test]
    fn strength_falls_with_thickness(a in 3.0..100.0_f64, b in 3.0..100.0_f64) {
        let rules = Rulebook::embedded();
        let (thin, thick) = (a.min(b), a.max(b));
        for grade in ["S235", "S275", "S355", "Fe360", "S450", "S460", "S275N", "S355M", "S420M", "S460M", "S460N"] {
            let at = |t| rules.strength(&Grade(grade.into()), mm(t)).unwrap().value;
            prop_assert!(at(thick).f_y <= at(thin).f_y && at(thick).f_u <= at(thin).f_u, "{}", grade);
        }
    }
}
