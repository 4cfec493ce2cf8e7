//! Web plates, diagonals, backing plates and partial-depth stiffeners in whole joints.

use faying::assess::end_plate::assess;
use faying::assess::{Assessment, Gap, MomentResistance, Sense, State};
use faying::joints::{Backing, Diagonal, EdgeWeld, EndPlateLayout, Stiffener, WebPlate};
use faying::units::mm;
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, Sketch, asked, case, known, mirrored, resistance, section, stiffener, unknown};
use crate::close;
use faying::assess::end_plate::Opposite;

/// A deep beam on a slight column: panel and web in compression govern.
fn weak() -> EndPlateLayout {
    Sketch { column: "HEB 240", beam: "IPE 400", inner: 3, d: 24.0, gauge: 100.0, t_p: 25.0, ..PLAIN }.layout(&RULES)
}

fn with(change: impl Fn(&mut EndPlateLayout)) -> EndPlateLayout {
    let mut layout = weak();
    change(&mut layout);
    layout
}

fn grade(name: &str) -> faying::origin::Known<faying::rulebook::Grade> {
    known(RULES.grade(name).unwrap())
}

/// HEB 240: d_wc = 164 mm, t_wc = 10 mm.
fn web_plate(positive: bool, throat: f64) -> WebPlate {
    WebPlate {
        guid: String::new(),
        positive,
        thickness: mm(10.0),
        width: mm(164.0),
        half_width: mm(82.0),
        bottom: mm(-300.0),
        top: mm(800.0),
        grade: grade("S355"),
        weld: known(EdgeWeld::Fillet(mm(throat))),
    }
}

/// IPE 400: the flanges' middles are at 6.75 and 393.25.
fn diagonal(near: f64, far: f64) -> Diagonal {
    Diagonal {
        guids: Vec::new(),
        near: mm(near),
        far: mm(far),
        thickness: mm(12.0),
        outstand: mm(110.0),
        both_sides: true,
        full_depth: true,
        grade: grade("S355"),
        weld: known(mm(6.0)),
    }
}

fn n_form() -> Vec<Diagonal> {
    vec![diagonal(393.0, 7.0)]
}

fn k_form() -> Vec<Diagonal> {
    vec![diagonal(390.0, 203.0), diagonal(10.0, 197.0)]
}

fn both(layout: &EndPlateLayout) -> [f64; 2] {
    [Sense::Hogging, Sense::Sagging].map(|sense| resistance(layout, sense, 1.0, &RULES).unwrap().without_welds.knm())
}

fn hogging(layout: &EndPlateLayout) -> std::sync::Arc<MomentResistance> {
    resistance(layout, Sense::Hogging, 1.0, &RULES).unwrap()
}

fn kn(layout: &EndPlateLayout, id: &str) -> f64 {
    let joint = hogging(layout);
    joint.components.iter().find(|c| c.id == id).unwrap().resistance.kn()
}

const PANEL: &str = "column-web-panel-in-shear";
const COMPRESSION: &str = "column-web-in-compression";

fn alone(layout: &EndPlateLayout) -> Assessment {
    assess(layout, &[], false, &RULES)
}

/// 0.9 f_y/√3 on 164 · 10 mm² more: 0.9 · 345/√3 · 1640 = 294.0 kN with butt welds (S355 above 16 mm, by the flange). A second
/// plate adds nothing.
#[test]
fn a_web_plate_and_the_panel() {
    let butt = |sides: &[bool]| {
        let plates: Vec<WebPlate> =
            sides.iter().map(|side| WebPlate { weld: known(EdgeWeld::Butt), ..web_plate(*side, 0.0) }).collect();
        with(|l| l.strengthening.web_plates = plates.clone())
    };
    let plain = kn(&weak(), PANEL);
    close(kn(&butt(&[true]), PANEL) - plain, 294.0, 0.1);
    close(kn(&butt(&[true, false]), PANEL) - plain, 294.0, 0.1);
    // t_w,eff is 1.5 and 2 times the web in compression; ω has the larger area for the first and the same one for the second.
    let [none, one, two] = [weak(), butt(&[true]), butt(&[true, false])].map(|l| kn(&l, COMPRESSION));
    assert!(one > 1.5 * none && two > one && two < 2.0 / 1.5 * one, "{none} {one} {two}");
    assert!(both(&butt(&[true]))[0] > both(&weak())[0] * 1.1);
}

/// With fillets of 3 mm less than half of the plate comes in: 3 · f_u/(0.9 · 1.25) of √(2 · 1725² + 3 · 1792.7²) N/mm, with
/// f = 0.5 · 345 · 10, q = 0.9 · 345 · 10/√3, f_u of S355 by the rulebook.
#[test]
fn a_web_plate_counts_as_far_as_its_weld_holds() {
    let f_u = RULES.strength(&RULES.grade("S355").unwrap(), mm(10.0)).unwrap().value.f_u.get();
    let layout = with(|l| l.strengthening.web_plates = vec![web_plate(true, 3.0)]);
    let share = 3.0 * f_u / (0.9 * 1.25) / (2.0 * 1725.0_f64.powi(2) + 3.0 * 1792.7_f64.powi(2)).sqrt();
    close(kn(&layout, PANEL) - kn(&weak(), PANEL), share * 294.0, 0.1);
}

/// 6.2.6.1: each condition in turn is not kept, and the plate is none; the reason is told.
#[test]
fn a_web_plate_that_does_not_count_is_none() {
    let plain = both(&weak());
    for (spoil, why) in [
        ((|p| p.thickness = mm(9.0)) as fn(&mut WebPlate), "6.2.6.1(11)"),
        (|p| p.half_width = mm(70.0), "6.2.6.1(9)"),
        (|p| p.width = mm(400.0), "6.2.6.1(13)"),
        (|p| p.grade = grade("S235"), "6.2.6.1(8)"),
        (|p| p.weld = known(EdgeWeld::Fillet(mm(2.0))), "4.5.2(2)"),
        (|p| p.weld = unknown("weld"), "nobody states it"),
        (|p| p.grade = unknown("grade"), "nobody states it"),
        (|p| p.width = mm(f64::NAN), "no number"),
    ] {
        let mut plate = web_plate(true, 7.0);
        spoil(&mut plate);
        let layout = with(|l| l.strengthening.web_plates = vec![plate.clone()]);
        assert_eq!(both(&layout), plain, "{why}");
        let assessment = alone(&layout);
        let [sentence] = &assessment.not_credited[..] else { panic!("{:?}", assessment.not_credited) };
        assert!(sentence.contains("is not credited: ") && sentence.contains(why), "{sentence}");
        let open = assessment.gaps.iter().any(|gap| matches!(gap, Gap::LowerBound(m) if m.reason == *sentence));
        assert_eq!(open, why.starts_with("no"), "{sentence}");
    }
    let zero = with(|l| l.strengthening.web_plates = vec![WebPlate { thickness: mm(0.0), ..web_plate(true, 7.0) }]);
    assert_eq!(both(&zero), plain);
}

/// One that ends at the beam's flanges reaches over neither web: nothing for panel and compression.
#[test]
fn a_short_web_plate_adds_nothing_to_the_panel() {
    let short = |l: &mut EndPlateLayout| {
        l.strengthening.web_plates = vec![WebPlate { bottom: mm(0.0), top: mm(400.0), ..web_plate(true, 7.0) }];
    };
    assert_eq!(kn(&with(short), PANEL), kn(&weak(), PANEL));
    assert_eq!(kn(&with(short), COMPRESSION), kn(&weak(), COMPRESSION));
    assert!(hogging(&with(short)).notes.iter().any(|note| note.contains("6.2.6.1(10)")));
}

/// The N: run 206, rise 386, cos θ = 0.471. Net section 2 · (110 − 21) · 12 · 355 = 758 kN; four fillets of 6 mm over 89 mm by
/// the simplified method: f_u/(√3 · 0.9 · 1.25) · 6 · 4 · 89. The lesser, its horizontal part.
#[test]
fn diagonals_and_the_panel() {
    let f_u = RULES.strength(&RULES.grade("S355").unwrap(), mm(12.0)).unwrap().value.f_u.get();
    let weld = f_u / (3.0_f64.sqrt() * 0.9 * 1.25) * 6.0 * 4.0 * 89.0 / 1e3;
    let horizontal = |rise: f64| 206.0 / (206.0_f64.powi(2) + rise.powi(2)).sqrt();
    let plain = kn(&weak(), PANEL);
    let n = with(|l| l.strengthening.diagonals = n_form());
    close(kn(&n, PANEL) - plain, weld * horizontal(386.0), 0.1);
    let k = with(|l| l.strengthening.diagonals = k_form());
    close(kn(&k, PANEL) - plain, weld * horizontal(187.0), 0.1);
    // They count for nothing else.
    assert_eq!(kn(&n, COMPRESSION), kn(&weak(), COMPRESSION));
    // The other way up, in compression where the first is in tension, they are as good.
    let other = with(|l| l.strengthening.diagonals = vec![diagonal(7.0, 393.0)]);
    close(kn(&other, PANEL), kn(&n, PANEL), 1e-9);
}

/// Table 6.11: k_1 is infinite with diagonals.
#[test]
fn diagonals_take_the_panel_out_of_the_stiffness() {
    let panel = |layout: &EndPlateLayout| {
        let stiffness = hogging(layout).stiffness.clone().unwrap();
        stiffness.springs.iter().find(|spring| spring.title.contains("k1")).unwrap().k
    };
    assert!(panel(&weak()).is_some());
    assert!(panel(&with(|l| l.strengthening.diagonals = n_form())).is_none());
}

#[test]
fn diagonals_that_do_not_count_are_none() {
    let plain = both(&weak());
    for (diagonals, why) in [
        (vec![diagonal(393.0, 60.0)], "(N form)"),
        (vec![diagonal(350.0, 7.0)], "(N form)"),
        (vec![diagonal(393.0, 393.0)], "(N form)"),
        (vec![diagonal(390.0, 240.0), diagonal(10.0, 160.0)], "(K form)"),
        (vec![diagonal(393.0, 7.0), diagonal(7.0, 393.0)], "(K form)"),
        ([k_form(), n_form()].concat(), "neither an N nor a K"),
        (vec![Diagonal { both_sides: false, ..diagonal(393.0, 7.0) }], "one side of the web only"),
        (vec![Diagonal { full_depth: false, ..diagonal(393.0, 7.0) }], "from flange to flange"),
        (vec![Diagonal { thickness: mm(5.0), ..diagonal(393.0, 7.0) }], "14ε t"),
        (vec![Diagonal { thickness: mm(0.0), ..diagonal(393.0, 7.0) }], "S355 at 0 mm"),
        (vec![Diagonal { weld: unknown("weld"), ..diagonal(393.0, 7.0) }], "nobody states it"),
        (vec![Diagonal { grade: unknown("grade"), ..diagonal(393.0, 7.0) }], "nobody states it"),
        (vec![Diagonal { near: mm(f64::NAN), ..diagonal(393.0, 7.0) }], "no number"),
    ] {
        let layout = with(|l| l.strengthening.diagonals = diagonals.clone());
        assert_eq!(both(&layout), plain, "{why}");
        let assessment = alone(&layout);
        assert_eq!(assessment.not_credited.len(), diagonals.len(), "{why}");
        assert!(assessment.not_credited[0].contains(why), "{why}: {:?}", assessment.not_credited);
    }
}

/// Far end without a pair: the web over 5 (17 + 21) = 190 mm with ω bears more than these diagonals bring; a thick diagonal
/// with large welds is held to it, and a pair of stiffeners at its far end gives it more.
#[test]
fn a_diagonal_is_held_at_its_far_end() {
    let thick = Diagonal { thickness: mm(40.0), weld: known(mm(25.0)), ..diagonal(393.0, 7.0) };
    let alone = with(|l| l.strengthening.diagonals = vec![thick.clone()]);
    let held = with(|l| {
        l.strengthening.diagonals = vec![thick.clone()];
        l.stiffeners = vec![stiffener(&RULES, "S355", 6.75, 12.0, 110.0, mm(206.0))];
    });
    let stiffened = with(|l| l.stiffeners = held.stiffeners.clone());
    assert!(kn(&held, PANEL) - kn(&stiffened, PANEL) > 1.2 * (kn(&alone, PANEL) - kn(&weak(), PANEL)));
}

/// HEB 240, a thin flange beside strong bolts: mode 1. Rows at 445, 331.5, 241.5, 151.5 and 60.
fn backing() -> Backing {
    Backing {
        guids: Vec::new(),
        thickness: mm(10.0),
        bottom: mm(180.0),
        top: mm(510.0),
        from_web: mm(23.0),
        short_of_edge: mm(0.0),
        both_sides: true,
        grade: grade("S355"),
    }
}

fn thin_flange() -> EndPlateLayout {
    Sketch { column: "HEA 300", d: 30.0, class: "10.9", gauge: 150.0, t_p: 40.0, ..PLAIN }.layout(&RULES)
}

#[test]
fn backing_plates_help_the_rows_that_they_hold() {
    let flange = |layout: &EndPlateLayout, row: &str| {
        let joint = hogging(layout);
        let own = joint.components.iter().find(|c| {
            c.id == "column-flange-in-bending" && c.title.starts_with(&format!("column flange in bending, {row} ("))
        });
        (own.unwrap().resistance.kn(), own.unwrap().title.clone())
    };
    let plain = thin_flange();
    let mut backed = plain.clone();
    backed.strengthening.backing = vec![backing()];
    assert!(flange(&plain, "row 1").1.ends_with("(mode 1)"), "{}", flange(&plain, "row 1").1);
    for row in ["row 1", "row 2", "rows 1-2"] {
        assert!(flange(&backed, row).0 > flange(&plain, row).0, "{row}");
    }
    // Rows 1 to 2 lie at 445 and 331.5, and 2d is 60 mm.
    backed.strengthening.backing[0].bottom = mm(280.0);
    assert!(flange(&backed, "row 1").0 > flange(&plain, "row 1").0);
    assert_eq!(flange(&backed, "row 2").0, flange(&plain, "row 2").0);
    // A radius of 27 mm and 3 mm more; the flange's edge; one side; one row.
    for (spoil, why) in [
        ((|b| b.from_web = mm(31.0)) as fn(&mut Backing), "6.2.4.3(1)"),
        (|b| b.short_of_edge = mm(5.0), "6.2.4.3(1)"),
        (|b| b.both_sides = false, "one side"),
        (|b| b.bottom = mm(420.0), "washer"),
        (|b| b.grade = unknown("grade"), "nobody states it"),
        (|b| b.thickness = mm(f64::NAN), "no number"),
    ] {
        let mut none = plain.clone();
        none.strengthening.backing = vec![backing()];
        spoil(&mut none.strengthening.backing[0]);
        assert_eq!(both(&none), both(&plain), "{why}");
        assert!(alone(&none).not_credited[0].contains(why), "{why}");
    }
    let mut zero = plain.clone();
    zero.strengthening.backing = vec![Backing { thickness: mm(0.0), ..backing() }];
    assert_eq!(both(&zero), both(&plain));
}

fn partial(height: f64, reach: f64, t: f64) -> Stiffener {
    Stiffener { full_depth: false, ..stiffener(&RULES, "S355", height, t, 110.0, mm(reach)) }
}

/// It holds the flange as far as its length lets it: none, short, long, full depth, each no weaker.
#[test]
fn partial_depth_stiffeners_hold_the_flange() {
    let top = 393.25;
    let joint = |pair: Option<Stiffener>| {
        let mut layout = thin_flange();
        layout.stiffeners = pair.into_iter().collect();
        hogging(&layout).without_welds.knm()
    };
    let none = joint(None);
    let [nothing, short, long] = [30.0, 60.0, 180.0].map(|reach| joint(Some(partial(top, reach, 12.0))));
    let full = joint(Some(stiffener(&RULES, "S355", top, 12.0, 110.0, mm(262.0))));
    close(nothing, none, 1e-9 * none);
    assert!(short >= none && long > 1.01 * none && long >= short && full >= long, "{none} {short} {long} {full}");
    // The web in tension has nothing of it.
    let web = |layout: &EndPlateLayout| {
        let joint = hogging(layout);
        joint.components.iter().find(|c| c.id == "column-web-in-tension").unwrap().resistance
    };
    let mut with = thin_flange();
    with.stiffeners = vec![partial(top, 180.0, 12.0)];
    assert_eq!(web(&with), web(&thin_flange()));
}

/// A stiffener's weak fillets make it weak; unknown ones leave the joint unproven though it would carry.
#[test]
fn a_stiffeners_weld_is_checked() {
    let pair = |throat: Option<f64>| {
        with(|l| {
            let own = stiffener(&RULES, "S355", 6.75, 15.0, 110.0, mm(206.0));
            let weld = throat.map_or_else(|| unknown("weld"), |a| known(mm(a)));
            l.stiffeners = vec![Stiffener { weld, ..own }];
        })
    };
    let [slight, fair, strong, unknown] = [Some(3.0), Some(5.0), Some(12.0), None].map(|a| kn(&pair(a), COMPRESSION));
    assert!(kn(&weak(), COMPRESSION) < slight && slight < fair && fair <= strong && strong == unknown);
    let small = case(Some(20.0), Some(20.0), Some(0.0));
    let state = |throat| asked(&pair(throat), &small, Opposite::None, &RULES).carries();
    assert_eq!((state(Some(3.0)), state(None), state(Some(2.0))), (State::Met, State::Unproven, State::Unproven));
}

/// A joint with each sort of strengthening.
pub fn each() -> Vec<EndPlateLayout> {
    let pairs = vec![partial(393.25, 150.0, 12.0), stiffener(&RULES, "S355", 6.75, 12.0, 110.0, mm(206.0))];
    vec![
        with(|l| l.strengthening.web_plates = vec![WebPlate { bottom: mm(-120.0), ..web_plate(true, 5.0) }]),
        with(|l| l.strengthening.diagonals = n_form()),
        with(|l| l.strengthening.diagonals = k_form()),
        with(|l| l.strengthening.backing = vec![backing()]),
        with(|l| l.stiffeners = pairs.clone()),
    ]
}

/// Upside down the same strengthening gives the same resistance in the other sense.
#[test]
fn turned_upside_down_it_is_as_strong() {
    for layout in each() {
        let ([a, b], [c, d]) = (both(&layout), both(&mirrored(&layout)));
        close(a, d, 1e-9 * a);
        close(b, c, 1e-9 * b);
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]
    /// More strengthening never weakens, but beyond the cliff of 6.2.7.2(9), which a note then names.
    #[test]
    fn more_is_never_weaker(a in 3.0..9.0f64, more in 0.0..3.0f64, t in 8.0..14.0f64, which in 0..4usize) {
        let make = |a: f64, t: f64| with(|l| match which {
            0 => l.strengthening.web_plates = vec![WebPlate { thickness: mm(t + 2.0), ..web_plate(true, a) }],
            1 => l.strengthening.diagonals = vec![Diagonal { thickness: mm(t), weld: known(mm(a)), ..diagonal(393.0, 7.0) }],
            2 => l.stiffeners = vec![Stiffener { weld: known(mm(a)), ..partial(393.25, 20.0 * t, t) }],
            _ => l.strengthening.backing = vec![Backing { thickness: mm(t), ..backing() }],
        });
        let [none, one, two] = [weak(), make(a, t), make(a + more, t + more)].map(|l| hogging(&l));
        for (weaker, stronger) in [(&none, &one), (&one, &two)] {
            let cliff = stronger.notes.iter().any(|note| note.contains("1.9 Ft,Rd"));
            prop_assert!(stronger.without_welds >= weaker.without_welds * (1.0 - 1e-9) || cliff);
        }
    }
}

#[test]
fn the_sections_are_what_the_tests_count_with() {
    let column = section(&RULES, "HEB 240");
    assert_eq!((column.h, column.t_w, column.t_f, column.r), (mm(240.0), mm(10.0), mm(17.0), Some(mm(21.0))));
}
