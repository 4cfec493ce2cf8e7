//! Haunches welded from plates, found in the geometry.

use faying::joints::{Haunch, Kind};
use faying::shop::Steelwork;
use glam::DVec3;

use super::build::{
    BEAM, DEEP, Detail, HAUNCH, Haunched, add_cut_haunch, add_haunch, frame, length, mirrored, moved, shuffled,
};
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

fn cut(sizes: super::build::Sizes) -> Steelwork {
    let mut steel = frame(&[detail()]);
    add_cut_haunch(&mut steel, &detail(), sizes, (300.0, 700.0), 6.0);
    steel
}

/// One half of a rolled section below the beam: web and flange by its own tables, all the rest as of one of plates.
#[test]
fn a_haunch_cut_from_a_section_is_found_with_its_sizes() {
    let plain = cut(BEAM);
    let turned = moved(cut(BEAM), 31.0, DVec3::new(-2e4, 5e3, 1e3));
    for steel in [plain, turned, mirrored(cut(BEAM)), shuffled(cut(BEAM), |i| (i as u64 + 3) * 7 % 5)] {
        let joint = only(&steel);
        assert_eq!(joint.kind, Kind::EndPlateMoment);
        assert_eq!(steel.members[joint.supported.unwrap()].identity.mark.as_deref(), Some("B1"));
        let haunch = found(&steel);
        assert_eq!(haunch.guids, ["-H1"]);
        close(haunch.depth.get(), 300.0);
        close(haunch.length.get(), 700.0);
        close(haunch.angle, (300.0_f64 / 700.0).atan().to_degrees());
        close(haunch.flange_thickness.get(), BEAM.4);
        close(haunch.flange_width.get(), BEAM.2);
        close(haunch.web_thickness.get(), BEAM.3);
        assert_eq!(haunch.flange_grade.as_ref().unwrap().value.0, "S355");
        assert_eq!(length(&haunch.flange_weld), Some(6.0));
        assert_eq!(length(&haunch.web_weld), Some(6.0));
    }
    // One of a deeper section, and one that runs on into the beam, where it is taken as cut away.
    assert!(found(&cut(DEEP)).flange_thickness.get() > BEAM.4);
    let mut long = cut(BEAM);
    let haunch = long.members.len() - 1;
    let along = long.members[haunch].along;
    long.members[haunch].end += along * 80.0;
    close(found(&long).length.get(), 700.0);
}

#[test]
fn a_haunch_cut_from_a_section_that_is_not_whole_is_refused() {
    let refused = |change: &dyn Fn(&mut faying::shop::Member), why: &str| {
        let mut steel = cut(BEAM);
        change(steel.members.last_mut().unwrap());
        let reason = only(&steel).layout.map(|_| ()).unwrap_err();
        assert!(reason.contains(why), "{reason}");
    };
    refused(&|haunch| haunch.end -= haunch.along * 150.0, "off the beam's soffit");
    refused(&|haunch| haunch.section = super::build::missing("section"), "(a haunch?)");
    refused(&|haunch| haunch.not_assessed = Some("tapered member".into()), "tapered member");
    refused(
        &|haunch| {
            haunch.start.y += 12.0;
            haunch.end.y += 12.0;
        },
        "eccentric to the beam's web by 12.0 mm",
    );
    // A section too shallow to fill the room below the beam leaves a gap between its own flange and the soffit.
    refused(
        &|haunch| {
            let lower = haunch.depth * haunch.extents.y / 2.0;
            haunch.extents.y = 150.0;
            let by = haunch.depth * haunch.extents.y / 2.0 - lower;
            haunch.start += by;
            haunch.end += by;
        },
        "does not fill it",
    );
    // Neither weld nor piece holds it to the plate: it is seen all the same.
    let mut loose = cut(BEAM);
    loose.pieces[0].parts.pop();
    loose.welds.retain(|weld| !weld.identity.mark.as_deref().unwrap_or("").starts_with("H-"));
    assert!(found(&loose).flange_weld.is_err());
}
