use faying::shop::{Plate, Steelwork};

use super::model::*;
use super::polyhedra::{Body, ring};
use crate::close;

#[track_caller]
fn only(steelwork: &Steelwork) -> &Plate {
    assert_eq!(steelwork.plates.len(), 1, "{:?}", steelwork.rejected);
    &steelwork.plates[0]
}

#[test]
fn the_thickness_may_be_the_sweep_or_either_side_of_the_profile() {
    // A plate 15 x 200 x 450 with its middle 1000 above the origin, drawn three ways, under four classes.
    for (profile, depth, normal) in [
        (rectangle(200.0, 450.0), 15.0, [0.0, 0.0, 1.0]),
        (rectangle(15.0, 450.0), 200.0, [1.0, 0.0, 0.0]),
        (rectangle(200.0, 15.0), 450.0, [0.0, 1.0, 0.0]),
        (outline("", &[(-7.5, -225.0), (7.5, -225.0), (7.5, 225.0), (-7.5, 225.0)]), 200.0, [1.0, 0.0, 0.0]),
    ] {
        for class in ["IfcPlate", "IfcBeam", "IfcColumn", "IfcBuildingElementProxy"] {
            let place = axes(&format!("0 0 {}", 1000.0 - depth / 2.0), "", "");
            let steelwork =
                taken(&element(class, r#"id="i1" Name="E""#, &place, &extruded(&profile, depth, "0 0 1"), ""));
            let plate = only(&steelwork);
            close(plate.thickness.get(), 15.0, 1e-9);
            near(plate.centre, [0.0, 0.0, 1000.0], 1e-9);
            near(plate.u.cross(plate.v), plate.normal.to_array(), 1e-12);
            assert!((plate.normal.dot(normal.into()).abs() - 1.0).abs() < 1e-12, "{}", plate.normal);
            let mut sizes = [0.0, 1.0].map(|y| {
                let along = |p: &glam::DVec2| if y == 0.0 { p.x } else { p.y };
                plate.outline.iter().map(along).fold(f64::NEG_INFINITY, f64::max) * 2.0
            });
            sizes.sort_by(f64::total_cmp);
            // The two sides that are not the thickness.
            assert_eq!(plate.outline.len(), 4);
            close(sizes[0], 200.0, 1e-9);
            close(sizes[1], 450.0, 1e-9);
        }
    }
}

#[test]
fn a_cut_corner_stays_in_the_outline() {
    let corners = [(0.0, 0.0), (200.0, 0.0), (200.0, 400.0), (30.0, 400.0), (0.0, 370.0), (0.0, 0.0)];
    let steelwork =
        taken(&element("IfcPlate", r#"id="i1""#, "", &extruded(&outline("", &corners), 10.0, "0 0 -1"), ""));
    let plate = only(&steelwork);
    near(plate.centre, [100.0, 200.0, -5.0], 1e-9);
    assert_eq!(plate.outline.len(), 5);
    // Counter-clockwise seen against the normal: area 200·400 − 30²/2 = 79 550.
    let n = plate.outline.len();
    let area: f64 = (0..n).map(|i| plate.outline[i].perp_dot(plate.outline[(i + 1) % n])).sum::<f64>() / 2.0;
    close(area, 79_550.0, 1e-6);
    // The cut corner is at the world's (15, 385): it must be where u and v say.
    let at = |x: f64, y: f64| {
        plate
            .outline
            .iter()
            .any(|p| (plate.centre + p.x * plate.u + p.y * plate.v).truncate().distance(glam::DVec2::new(x, y)) < 1e-9)
    };
    assert!(at(30.0, 400.0) && at(0.0, 370.0) && !at(0.0, 400.0));
}

/// An opening in an element.
fn opening(location: &str, solid: &str) -> String {
    let open = element("RelatedOpeningElement", r#"id="o1""#, &axes(location, "", ""), solid, "")
        .replace("<RelatedOpeningElement", r#"<RelatedOpeningElement xsi:type="IfcOpeningElement""#);
    format!(r#"<HasOpenings GlobalId="0Rel000000000000000005">{open}</HasOpenings>"#)
}

fn pierced(location: &str, solid: &str) -> Steelwork {
    let plate = extruded(&rectangle(200.0, 400.0), 20.0, "0 0 1");
    taken(&element("IfcPlate", r#"id="i1""#, "", &plate, &opening(location, solid)))
}

#[test]
fn openings_through_a_plate_are_holes() {
    let steelwork = pierced("45 -60 -10", &extruded(&circle(11.0), 40.0, "0 0 1"));
    let plate = only(&steelwork);
    let hole = plate.holes[0];
    close(hole.diameter, 22.0, 1e-9);
    close(hole.length, 22.0, 1e-9);
    near(plate.centre + hole.centre.x * plate.u + hole.centre.y * plate.v, [45.0, -60.0, 10.0], 1e-9);
    // A slot drawn as a rectangle.
    let steelwork = pierced("0 0 30", &extruded(&rectangle(22.0, 50.0), 40.0, "0 0 -1"));
    let hole = only(&steelwork).holes[0];
    close(hole.diameter, 22.0, 1e-9);
    close(hole.length, 50.0, 1e-9);
}

#[test]
fn openings_by_their_faces_and_voiding_features_are_holes() {
    let round = Body::prism(&ring((45.0, -60.0), 11.0, 16), &[], -10.0, 40.0);
    for solid in [round.faceted(), round.polygonal()] {
        let steelwork = pierced("0 0 0", &solid);
        let hole = only(&steelwork).holes[0];
        close(hole.diameter, 22.0, 1e-6);
    }
    let plate = extruded(&rectangle(200.0, 400.0), 20.0, "0 0 1");
    let feature = opening("45 -60 -10", &extruded(&circle(11.0), 40.0, "0 0 1"))
        .replace("IfcOpeningElement", "IfcVoidingFeature");
    let steelwork = taken(&element("IfcPlate", r#"id="i1""#, "", &plate, &feature));
    close(only(&steelwork).holes[0].diameter, 22.0, 1e-9);
}

#[test]
fn openings_that_are_no_holes_are_told() {
    let round = extruded(&circle(11.0), 40.0, "0 0 1");
    for (location, solid, word) in [
        ("300 0 -10", round.clone(), "beside"),
        ("100 0 -10", round.clone(), "edge"),
        ("0 0 10", round, "does not pass through"),
        ("0 0 0", extruded(&circle(11.0), 40.0, "1 0 1"), "slant"),
    ] {
        let steelwork = pierced(location, &solid);
        let plate = only(&steelwork);
        assert!(plate.holes.is_empty());
        assert!(plate.disagreements.iter().any(|d| d.contains(word)), "{:?}", plate.disagreements);
    }
}

#[test]
fn inner_curves_of_the_profile_are_holes() {
    let inner = r#"<IfcCircle Radius="13"><Position xsi:type="IfcAxis2Placement2D"><Location Coordinates="50 60"/></Position></IfcCircle>"#;
    let curve = format!(
        r#"<OuterCurve xsi:type="IfcPolyline">{}</OuterCurve><InnerCurves>{inner}</InnerCurves>"#,
        points(&[(0.0, 0.0), (200.0, 0.0), (200.0, 400.0), (0.0, 400.0), (0.0, 0.0)])
    );
    let profile = profile("IfcArbitraryProfileDefWithVoids", "", &curve);
    let steelwork = taken(&element("IfcPlate", r#"id="i1""#, "", &extruded(&profile, 12.0, "0 0 1"), ""));
    let plate = only(&steelwork);
    let hole = plate.holes[0];
    close(hole.diameter, 26.0, 1e-9);
    near(plate.centre + hole.centre.x * plate.u + hole.centre.y * plate.v, [50.0, 60.0, 6.0], 1e-9);
}

#[test]
fn a_name_with_other_sizes_is_a_disagreement() {
    let solid = extruded(&rectangle(200.0, 400.0), 20.0, "0 0 1");
    for (name, disagrees) in
        [("PL20*200", false), ("FL 20x400", false), ("End plate", false), ("PL25*200", true), ("PL20*220", true)]
    {
        let steelwork = taken(&element("IfcPlate", &format!(r#"id="i1" Name="{name}""#), "", &solid, ""));
        assert_eq!(!only(&steelwork).disagreements.is_empty(), disagrees, "{name}");
    }
}
