use std::f64::consts::SQRT_2;

use faying::shop::{Weld, WeldSort};

use super::model::*;
use crate::close;

fn weld(name: &str, set: &str, all: &[(&str, &str, &str)]) -> Weld {
    let solid = extruded(&rectangle(180.0, 8.0), 6.0, "0 0 1");
    let attributes = format!(r#"id="i1" Name="{name}" PredefinedType="weld""#);
    let steelwork =
        taken(&element("IfcFastener", &attributes, &axes("100 0 0", "", ""), &solid, &properties(set, all)));
    assert_eq!(steelwork.welds.len(), 1);
    steelwork.welds[0].clone()
}

const L: &str = "IfcPositiveLengthMeasure";
const SET: &str = "Pset_FastenerWeld";

#[test]
fn throat_is_a_or_z_over_root_two() {
    let throat = |set: &str, all: &[(&str, &str, &str)]| weld("Weld", set, all).throat.unwrap();
    close(throat(SET, &[("a", L, "6")]).value.get(), 6.0, 0.0);
    close(throat(SET, &[("NominalThroatThickness", L, "6")]).value.get(), 6.0, 0.0);
    close(throat("Shop", &[("Throat thickness", L, "6")]).value.get(), 6.0, 0.0);
    close(throat(SET, &[("z", L, "8")]).value.get(), 8.0 / SQRT_2, 1e-12);
    assert!(throat(SET, &[("z", L, "8")]).origin.to_string().contains("z/√2"));
    // 8.5 / √2 = 6.01: within 5 % of 6.
    close(throat(SET, &[("a", L, "6"), ("z", L, "8.5")]).value.get(), 6.0, 0.0);
    // A throat of zero with a leg beside it is a throat that nobody stated.
    close(throat(SET, &[("a", "IfcLengthMeasure", "0"), ("z", L, "10")]).value.get(), 10.0 / SQRT_2, 1e-12);
}

#[test]
fn throats_that_are_not_said_or_contradicted_are_missing() {
    for (all, word) in [
        (&[("a", "IfcLengthMeasure", "0")][..], "above zero"),
        (&[("Type1", "IfcLabel", "Fillet")][..], "above zero"),
        // The classic mistake: the leg written into the throat.
        (&[("a", L, "6"), ("z", L, "6")][..], "z/√2"),
    ] {
        let missing = weld("Weld", SET, all).throat.unwrap_err();
        assert_eq!(missing.what, "weld throat");
        assert!(missing.reason.contains(word), "{missing}");
    }
}

#[test]
fn sort_and_length_are_read() {
    let fillet = weld("Weld", SET, &[("Type1", "IfcLabel", "Fillet"), ("a", L, "6"), ("l", L, "180")]);
    assert_eq!(fillet.sort, WeldSort::Fillet);
    close(fillet.length.unwrap().value.get(), 180.0, 0.0);
    // A preparation without a depth goes through (ISO 2553, from memory); a broad root face never does.
    let sign = |letter: &str| weld("Weld", SET, &[("Type1", "IfcLabel", letter)]).sort;
    assert_eq!((sign("HV"), sign("K"), sign("HY")), (WeldSort::FullButt, WeldSort::FullButt, WeldSort::Butt));
    let deep = weld("Weld", SET, &[("Type1", "IfcLabel", "HV"), ("s", L, "12")]);
    assert_eq!(deep.sort, WeldSort::Butt);
    assert_eq!(weld("Butt weld, full penetration", SET, &[]).sort, WeldSort::FullButt);
    assert_eq!(weld("PJP weld", SET, &[]).sort, WeldSort::Butt);
    assert_eq!(weld("Butt weld", SET, &[]).sort, WeldSort::Butt);
    assert_eq!(weld("Weld", SET, &[]).sort, WeldSort::Unknown);
    assert!(weld("Weld", SET, &[("l", "IfcLengthMeasure", "0")]).length.is_err());
    // A butt weld's throat is its penetration; a leg says nothing of it.
    close(weld("Butt weld", SET, &[("s", L, "12")]).throat.unwrap().value.get(), 12.0, 0.0);
    assert!(weld("Butt weld", SET, &[("z", L, "8")]).throat.is_err());
}

#[test]
fn the_corners_of_its_body_are_in_the_world() {
    let points = weld("Weld", SET, &[]).points;
    assert_eq!(points.len(), 8);
    for corner in [[10.0, -4.0, 0.0], [190.0, 4.0, 6.0]] {
        assert!(points.iter().any(|p| p.abs_diff_eq(corner.into(), 1e-9)), "{points:?}");
    }
}

#[test]
fn an_axis_gives_ends_and_length_where_there_is_no_body() {
    let axis = r#"<Representation xsi:type="IfcProductDefinitionShape"><Representations><IfcShapeRepresentation RepresentationIdentifier="Axis" RepresentationType="Curve3D"><Items><IfcPolyline><Points><IfcCartesianPoint Coordinates="0 0 0"/><IfcCartesianPoint Coordinates="0 0 250"/></Points></IfcPolyline></Items></IfcShapeRepresentation></Representations></Representation>"#;
    let steelwork = taken(&element("IfcFastener", r#"id="i1" PredefinedType="weld""#, "", "", axis));
    near(steelwork.welds[0].points[1], [0.0, 0.0, 250.0], 1e-9);
    close(steelwork.welds[0].length.as_ref().unwrap().value.get(), 250.0, 1e-9);
}

#[test]
fn glue_is_no_weld() {
    let steelwork = taken(&element("IfcFastener", r#"id="i1" Name="Joint" PredefinedType="glue""#, "", "", ""));
    assert_eq!((steelwork.welds.len(), steelwork.rejected.len()), (0, 1));
}

#[test]
fn a_weld_plate_is_a_plate_and_a_proxy_called_weld_a_weld() {
    let solid = extruded(&rectangle(180.0, 80.0), 6.0, "0 0 1");
    let proxy = |name: &str| {
        let attributes = format!(r#"id="i1" Name="{name}""#);
        let steelwork = taken(&element("IfcBuildingElementProxy", &attributes, "", &solid, ""));
        (steelwork.welds.len(), steelwork.plates.len())
    };
    assert_eq!(proxy("Weld plate"), (0, 1));
    assert_eq!(proxy("Fillet weld 12"), (1, 0));
}
