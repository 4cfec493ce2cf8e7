//! The throat that a weld needs stands in its working, in the check and in the finding.

use faying::assess::Sense;
use faying::units::{Force, Length, mm};

use super::joint::{PLAIN, RULES, Sketch, known, resistance};

/// The resistance of a fillet is in proportion to its throat, so what it needs is the throat times its use.
#[test]
fn a_weld_needs_its_throat_times_its_use_and_three_at_least() {
    for flange in [3.5, 5.0, 9.0] {
        let layout = Sketch { flange_weld: flange, ..PLAIN }.layout(&RULES);
        let moment = resistance(&layout, Sense::Hogging, 1.0, &RULES).unwrap();
        let weld = moment.components.iter().find(|c| c.id == "flange-weld").unwrap();
        let needed = weld.working.steps.iter().find(|step| step.symbol == "a_needed").unwrap().value.value;
        let by_use = flange * (weld.at_full / weld.resistance);
        assert!((needed - by_use.max(3.0)).abs() < 1e-9, "{needed} {by_use}");
        assert_eq!(weld.needed_throat(weld.at_full, mm(3.0)).map(Length::get), Some(needed));
        assert_eq!(weld.needed_throat(Force::ZERO, mm(3.0)), Some(mm(3.0)));
        let others = moment.components.iter().filter(|c| !c.id.contains("-weld"));
        assert!(others.into_iter().all(|c| c.needed_throat(c.at_full, mm(3.0)).is_none()));
    }
}

/// Where the weld governs, the throat that it says it needs takes it out of the way, but for what the larger fillet gives
/// the T-stubs beside it.
#[test]
fn with_the_needed_throat_the_weld_governs_no_more() {
    let mut layout = Sketch { flange_weld: 3.0, web_weld: 8.0, ..PLAIN }.layout(&RULES);
    let weak = resistance(&layout, Sense::Hogging, 1.0, &RULES).unwrap();
    assert!(weak.moment < weak.without_welds, "the flange's weld governs");
    let of = |moment: &faying::assess::MomentResistance| {
        let weld = moment.components.iter().find(|c| c.id == "flange-weld").unwrap();
        weld.needed_throat(weld.at_full, mm(3.0)).unwrap()
    };
    let needed = of(&weak);
    assert!(needed > mm(3.0));
    layout.welds.flange_top = known(1.1 * needed);
    let strong = resistance(&layout, Sense::Hogging, 1.0, &RULES).unwrap();
    assert_eq!(strong.moment, strong.without_welds);
}
