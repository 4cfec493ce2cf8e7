//! Small ifcXML models from fragments.

use faying::exchange::read;
use faying::rulebook::Rulebook;
use faying::shop::{Steelwork, take_up};
use glam::DVec3;

/// The project counts in mm.
pub const MM: &str = r#"<IfcSIUnit UnitType="lengthunit" Prefix="milli" Name="metre"/>"#;

/// An exchange of units and the rest.
pub fn exchange(units: &str, body: &str) -> String {
    format!(
        r#"<?xml version="1.0" encoding="UTF-8"?>
<ifcXML xmlns="http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance" id="uos">
<IfcProject id="project" GlobalId="0Prj000000000000000001"><UnitsInContext><Units>{units}</Units></UnitsInContext></IfcProject>
{body}
</ifcXML>"#
    )
}

/// Takes up a model in other units than mm.
#[track_caller]
pub fn taken_in(units: &str, body: &str) -> Steelwork {
    let xml = exchange(units, body);
    let exchange = read(xml.as_bytes(), "model.ifcxml").unwrap();
    assert_eq!(exchange.problems, [], "the model of a test is itself at fault");
    take_up(&exchange, &Rulebook::embedded())
}

/// Takes up a model in mm.
#[track_caller]
pub fn taken(body: &str) -> Steelwork {
    taken_in(MM, body)
}

/// An element with attributes, a placement and solids (each may be empty), and what else stands inside it.
pub fn element(class: &str, attributes: &str, placement: &str, solids: &str, inside: &str) -> String {
    let id = attributes.split('"').nth(1).unwrap_or("x");
    let placement = if placement.is_empty() {
        String::new()
    } else {
        format!(
            r#"<ObjectPlacement xsi:type="IfcLocalPlacement"><RelativePlacement>{placement}</RelativePlacement></ObjectPlacement>"#
        )
    };
    let body = if solids.is_empty() {
        String::new()
    } else {
        format!(
            r#"<Representation xsi:type="IfcProductDefinitionShape"><Representations><IfcShapeRepresentation RepresentationIdentifier="Body" RepresentationType="SweptSolid"><Items>{solids}</Items></IfcShapeRepresentation></Representations></Representation>"#
        )
    };
    // `id` comes first among the attributes by agreement of these tests.
    assert!(attributes.starts_with("id="), "{id}");
    format!("<{class} GlobalId=\"0{id:0<21}\" {attributes}>{inside}{placement}{body}</{class}>\n")
}

/// An `IfcAxis2Placement3D`; axes may be empty.
pub fn axes(location: &str, axis: &str, reference: &str) -> String {
    let direction = |name: &str, ratios: &str| {
        if ratios.is_empty() { String::new() } else { format!(r#"<{name} DirectionRatios="{ratios}"/>"#) }
    };
    format!(
        r#"<IfcAxis2Placement3D><Location Coordinates="{location}"/>{}{}</IfcAxis2Placement3D>"#,
        direction("Axis", axis),
        direction("RefDirection", reference)
    )
}

/// An extrusion of a profile along a direction of its own axes.
pub fn extruded(profile: &str, depth: f64, direction: &str) -> String {
    format!(
        r#"<IfcExtrudedAreaSolid Depth="{depth}">{profile}<ExtrudedDirection DirectionRatios="{direction}"/></IfcExtrudedAreaSolid>"#
    )
}

/// A profile of a class with its attributes and what stands inside (a position, say).
pub fn profile(class: &str, attributes: &str, inside: &str) -> String {
    format!(r#"<SweptArea xsi:type="{class}" ProfileType="area" {attributes}>{inside}</SweptArea>"#)
}

/// A rectangle.
pub fn rectangle(x: f64, y: f64) -> String {
    profile("IfcRectangleProfileDef", &format!(r#"XDim="{x}" YDim="{y}""#), "")
}

/// A circle.
pub fn circle(radius: f64) -> String {
    profile("IfcCircleProfileDef", &format!(r#"Radius="{radius}""#), "")
}

/// A polyline as the points of a curve element.
pub fn points(all: &[(f64, f64)]) -> String {
    let points: String = all.iter().map(|(x, y)| format!(r#"<IfcCartesianPoint Coordinates="{x} {y}"/>"#)).collect();
    format!("<Points>{points}</Points>")
}

/// An outline by its corners.
pub fn outline(name: &str, corners: &[(f64, f64)]) -> String {
    let name = if name.is_empty() { String::new() } else { format!(r#"ProfileName="{name}""#) };
    let curve = format!(r#"<OuterCurve xsi:type="IfcPolyline">{}</OuterCurve>"#, points(corners));
    profile("IfcArbitraryClosedProfileDef", &name, &curve)
}

/// The corners of a sharp I about the origin.
pub fn sharp_i(h: f64, b: f64, t_w: f64, t_f: f64) -> Vec<(f64, f64)> {
    let (y, x, w, f) = (h / 2.0, b / 2.0, t_w / 2.0, h / 2.0 - t_f);
    vec![
        (-x, -y),
        (x, -y),
        (x, -f),
        (w, -f),
        (w, f),
        (x, f),
        (x, y),
        (-x, y),
        (-x, f),
        (-w, f),
        (-w, -f),
        (-x, -f),
        (-x, -y),
    ]
}

/// A property set of an element, to stand inside it: name, type of the value, value.
pub fn properties(set: &str, all: &[(&str, &str, &str)]) -> String {
    let single: String = all
        .iter()
        .map(|(name, of, value)| {
            format!(
                r#"<IfcPropertySingleValue Name="{name}"><NominalValue><{of}-wrapper>{value}</{of}-wrapper></NominalValue></IfcPropertySingleValue>"#
            )
        })
        .collect();
    format!(
        r#"<IsDefinedBy><IfcRelDefinesByProperties GlobalId="0Rel000000000000000077"><RelatingPropertyDefinition><IfcPropertySet GlobalId="0Pse000000000000000077" Name="{set}"><HasProperties>{single}</HasProperties></IfcPropertySet></RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>"#
    )
}

/// A material of some elements.
pub fn material(name: &str, of: &[(&str, &str)]) -> String {
    let related: String = of.iter().map(|(class, id)| format!(r#"<{class} ref="{id}" xsi:nil="true"/>"#)).collect();
    format!(
        r#"<IfcRelAssociatesMaterial GlobalId="0Rel000000000000000099"><RelatedObjects>{related}</RelatedObjects><RelatingMaterial><IfcMaterial Name="{name}"/></RelatingMaterial></IfcRelAssociatesMaterial>"#
    )
}

/// Two vectors within a tolerance.
#[track_caller]
pub fn near(got: DVec3, expected: [f64; 3], tolerance: f64) {
    assert!(got.abs_diff_eq(DVec3::from(expected), tolerance), "got {got}, expected {expected:?} ± {tolerance}");
}
