//! Butt welds of full penetration are as strong as the weaker part, EN 1993-1-8:2005 4.7.1.

use faying::assess::end_plate::Opposite;
use faying::assess::{About, MomentResistance, Sense, State};
use faying::joints::{EndPlateLayout, FullButts};
use faying::units::mm;

use super::joint::{PLAIN, RULES, Sketch, asked, case, known, resistance, state, unknown, verdict};

const ALL: FullButts = FullButts { flange_top: true, flange_bottom: true, web: true };

/// A joint whose fillets are too thin, with butt welds instead.
fn butt(full: FullButts) -> EndPlateLayout {
    let mut layout = Sketch { flange_weld: 3.0, ..PLAIN }.layout(&RULES);
    let thickness = mm(10.0);
    for (weld, is) in [
        (&mut layout.welds.flange_top, full.flange_top),
        (&mut layout.welds.flange_bottom, full.flange_bottom),
        (&mut layout.welds.web, full.web),
    ] {
        if is {
            *weld = known(thickness);
        }
    }
    layout.welds.full = full;
    layout
}

#[test]
fn a_butt_weld_never_limits_and_has_no_fillet() {
    let thin = resistance(&butt(FullButts::default()), Sense::Hogging, 1.0, &RULES).unwrap();
    assert!(thin.moment < thin.without_welds, "the fillet of 3 mm governs");
    let through = resistance(&butt(ALL), Sense::Hogging, 1.0, &RULES).unwrap();
    assert_eq!(through.moment, through.without_welds);
    assert!(through.components.iter().all(|c| !c.id.contains("-weld")));
    // Without a fillet beside them the T-stubs are those of an unknown weld.
    let mut none = PLAIN.layout(&RULES);
    for weld in [&mut none.welds.flange_top, &mut none.welds.flange_bottom, &mut none.welds.web] {
        *weld = unknown("weld");
    }
    let none = resistance(&none, Sense::Hogging, 1.0, &RULES).unwrap();
    let parts = |moment: &MomentResistance| {
        let all = moment.components.iter().map(|c| (c.title.clone(), c.resistance));
        all.collect::<Vec<_>>()
    };
    assert_eq!(parts(&through), parts(&none));
}

#[test]
fn the_welds_are_proven_by_it_and_it_is_said() {
    let layout = butt(ALL);
    let limit = resistance(&layout, Sense::Hogging, 1.0, &RULES).unwrap().moment.knm();
    for (m, expected) in [(0.99 * limit, State::Met), (1.01 * limit, State::NotMet)] {
        let assessment = asked(&layout, &case(Some(m), Some(1.0), Some(0.0)), Opposite::None, &RULES);
        assert_eq!(state(&assessment, About::Weld), expected);
        assert_eq!(verdict(&assessment, About::Weld).governed_by, "butt weld as strong as the weaker part");
        assert!(assessment.assumptions.iter().any(|said| said.contains("(4.7.1)")));
        assert_eq!(assessment.gaps, []);
    }
}

#[test]
fn beside_a_butt_weld_at_the_flange_the_webs_fillet_is_checked() {
    let layout = butt(FullButts { web: false, ..ALL });
    let assessment = asked(&layout, &case(Some(1.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
    assert_eq!(state(&assessment, About::Weld), State::Met);
    let moment = resistance(&layout, Sense::Hogging, 1.0, &RULES).unwrap();
    assert!(moment.components.iter().all(|c| c.id != "flange-weld"));
    let shear = assessment.shear.unwrap();
    assert!(shear.components.iter().any(|c| c.id == "web-weld-in-shear"));
}

/// Upside down the other flange's weld is in tension.
#[test]
fn each_flange_has_its_own() {
    let layout = butt(FullButts { flange_top: true, ..FullButts::default() });
    let limited = |sense| {
        let moment = resistance(&layout, sense, 1.0, &RULES).unwrap();
        moment.components.iter().any(|c| c.id == "flange-weld")
    };
    assert!(!limited(Sense::Hogging) && limited(Sense::Sagging));
}

#[test]
fn on_a_plate_narrower_than_the_flange_it_proves_nothing() {
    let mut layout = butt(ALL);
    let b = layout.beam.section.as_ref().unwrap().value.b;
    layout.plate.width = b - mm(20.0);
    let assessment = asked(&layout, &case(Some(1.0), Some(1.0), Some(0.0)), Opposite::None, &RULES);
    assert_eq!(assessment.carries(), State::Unproven);
}
