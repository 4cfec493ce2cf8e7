//! Haunches welded from plates, found in the geometry.

use faying::joints::{Haunch, Kind};
use faying::shop::Steelwork;
use glam::DVec3;

use super::build::{Detail, HAUNCH, Haunched, add_haunch, frame, length, moved};
use super::layouts::{on_column, only};

fn detail() -> Detail {
    Detail { bottom: -340.0, rows: vec![450.4, 345.0, 265.0, 73.0, -200.0], ..Detail::default() }
}

fn haunched(haunch: Haunched) -> Steelwork {
    let mut steel = frame(&[detail()]);
    add_haunch(&mut steel, &detail(), haunch);
    steel
}

fn found(steel: &Steelwork) -> Haunch {
    on_column(&only(steel)).haunch.expect("no haunch")
}

fn close(a: f64, b: f64) {
    assert!((a - b).abs() < 1e-3, "{a} is not {b}");
}

#[test]
fn a_haunch_is_found_with_its_sizes() {
    for steel in [haunched(HAUNCH), moved(haunched(HAUNCH), 31.0, DVec3::new(-2e4, 5e3, 1e3))] {
        let joint = only(&steel);
        assert_eq!(joint.kind, Kind::EndPlateMoment);
        let roles: Vec<_> = joint.plates.iter().map(|(_, role)| *role).collect();
        assert_eq!(roles, ["end-plate", "haunch", "haunch"]);
        let haunch = found(&steel);
        close(haunch.depth.get(), 300.0);
        close(haunch.length.get(), 700.0);
        close(haunch.angle, (300.0_f64 / 700.0).atan().to_degrees());
        close(haunch.flange_thickness.get(), 15.0);
        close(haunch.flange_width.get(), 180.0);
        close(haunch.web_thickness.get(), 10.0);
        assert_eq!(length(&haunch.flange_weld), Some(6.0));
        assert_eq!(length(&haunch.web_weld), Some(6.0));
        assert!(!haunch.stiffened);
        // Without welds their throats are not known.
        assert!(found(&haunched(Haunched { throat: None, ..HAUNCH })).flange_weld.is_err());
    }
}

#[test]
fn what_is_no_whole_haunch_is_refused() {
    let mut aside = haunched(HAUNCH);
    aside.plates[1].centre.y += 15.0;
    assert!(only(&aside).layout.unwrap_err().contains("eccentric to the beam's web by 15.0 mm"));

    let mut short = haunched(HAUNCH);
    let flange = &mut short.plates[1];
    flange.outline.iter_mut().filter(|p| p.x > 0.0).for_each(|p| p.x -= 150.0);
    assert!(only(&short).layout.unwrap_err().contains("off the beam's soffit"));

    let mut thin = haunched(HAUNCH);
    thin.plates[2].outline[2].x = 300.0;
    assert!(only(&thin).layout.unwrap_err().contains("does not fill it"));

    let mut web_only = haunched(HAUNCH);
    web_only.plates.remove(1);
    assert!(only(&web_only).layout.unwrap_err().contains("a haunch or a rib"));
}
