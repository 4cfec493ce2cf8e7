use faying::shop::{Plate, Steelwork};

use super::model::*;
use crate::close;

/// A plate 10 x 200 x 300 mm and its placement, in a project whose unit is `mm` millimetres long.
fn plate_in(units: &str, mm: f64) -> Steelwork {
    let solid = extruded(&rectangle(200.0 / mm, 300.0 / mm), 10.0 / mm, "0 0 1");
    let place = axes(&format!("{} 0 0", 1000.0 / mm), "", "");
    taken_in(units, &element("IfcPlate", r#"id="i1" Name="P""#, &place, &solid, ""))
}

#[track_caller]
fn is_the_plate(plate: &Plate) {
    close(plate.thickness.get(), 10.0, 1e-9);
    near(plate.centre, [1000.0, 0.0, 5.0], 1e-9);
}

const INCH: &str = r#"<IfcConversionBasedUnit UnitType="lengthunit" Name="INCH"><Dimensions LengthExponent="1" MassExponent="0" TimeExponent="0" ElectricCurrentExponent="0" ThermodynamicTemperatureExponent="0" AmountOfSubstanceExponent="0" LuminousIntensityExponent="0"/><ConversionFactor><ValueComponent><IfcLengthMeasure-wrapper>25.4</IfcLengthMeasure-wrapper></ValueComponent><UnitComponent><IfcSIUnit UnitType="lengthunit" Prefix="milli" Name="metre"/></UnitComponent></ConversionFactor></IfcConversionBasedUnit>"#;

#[test]
fn lengths_come_out_in_mm_whatever_the_project_counts_in() {
    for (units, mm) in [
        (MM, 1.0),
        (r#"<IfcSIUnit UnitType="lengthunit" Name="metre"/>"#, 1000.0),
        (r#"<IfcSIUnit UnitType="lengthunit" Prefix="centi" Name="metre"/>"#, 10.0),
        // An export that leaves UnitType out still names the metre.
        (r#"<IfcSIUnit Prefix="milli" Name="metre"/>"#, 1.0),
        // 1 inch = 25.4 mm, exact by definition.
        (INCH, 25.4),
    ] {
        let steelwork = plate_in(units, mm);
        assert_eq!(steelwork.problems, [], "{units}");
        is_the_plate(&steelwork.plates[0]);
    }
}

#[test]
fn a_project_without_a_length_unit_is_read_in_metres_and_says_so() {
    let steelwork = plate_in(r#"<IfcSIUnit UnitType="planeangleunit" Name="radian"/>"#, 1000.0);
    is_the_plate(&steelwork.plates[0]);
    assert_eq!(steelwork.problems.len(), 1);
    assert!(steelwork.problems[0].message.contains("metre is assumed"), "{}", steelwork.problems[0].message);
}

#[test]
fn coordinates_of_a_map_grid_get_a_local_origin() {
    let solid = extruded(&rectangle(200.0, 300.0), 10.0, "0 0 1");
    let far = axes("691234567.25 5334567890.5 0", "", "");
    let steelwork = taken(&element("IfcPlate", r#"id="i1""#, &far, &solid, ""));
    // Rounded to whole metres; what is left keeps its quarter millimetre.
    near(steelwork.origin, [691_235_000.0, 5_334_568_000.0, 0.0], 0.0);
    near(steelwork.plates[0].centre, [-432.75, -109.5, 5.0], 1e-5);
}

#[test]
fn a_placement_chain_is_followed_to_the_world() {
    // Parent turned by 90° about z at (1000, 0, 0); child 500 along the parent's x, which is the world's y.
    let parent = r#"<IfcLocalPlacement id="l1"><RelativePlacement><IfcAxis2Placement3D><Location Coordinates="1000 0 0"/><Axis DirectionRatios="0 0 1"/><RefDirection DirectionRatios="0 1 0"/></IfcAxis2Placement3D></RelativePlacement></IfcLocalPlacement>"#;
    let plate = format!(
        r#"<IfcPlate id="i1" GlobalId="0Pla000000000000000001"><ObjectPlacement xsi:type="IfcLocalPlacement"><PlacementRelTo xsi:type="IfcLocalPlacement" ref="l1" xsi:nil="true"/><RelativePlacement>{}</RelativePlacement></ObjectPlacement><Representation xsi:type="IfcProductDefinitionShape"><Representations><IfcShapeRepresentation RepresentationIdentifier="Body"><Items>{}</Items></IfcShapeRepresentation></Representations></Representation></IfcPlate>"#,
        axes("500 0 0", "", ""),
        extruded(&rectangle(200.0, 300.0), 10.0, "0 0 1")
    );
    let steelwork = taken(&format!("{parent}{plate}"));
    near(steelwork.plates[0].centre, [1000.0, 500.0, 5.0], 1e-9);
}

#[test]
fn a_placement_that_leads_nowhere_is_a_rejection_with_its_reason() {
    let solid = extruded(&rectangle(200.0, 300.0), 10.0, "0 0 1");
    for (placement, reason) in
        [(axes("0 0 0", "0 0 1", "0 0 2"), "parallel"), (axes("0 0 0", "0 0 0", ""), "no direction")]
    {
        let steelwork = taken(&element("IfcPlate", r#"id="i1""#, &placement, &solid, ""));
        assert_eq!(steelwork.plates.len(), 0);
        assert!(steelwork.rejected[0].reason.contains(reason), "{}", steelwork.rejected[0].reason);
    }
    let looped = r#"<IfcLocalPlacement id="l1"><PlacementRelTo xsi:type="IfcLocalPlacement" ref="l2" xsi:nil="true"/><RelativePlacement><IfcAxis2Placement3D><Location Coordinates="0 0 0"/></IfcAxis2Placement3D></RelativePlacement></IfcLocalPlacement>
<IfcLocalPlacement id="l2"><PlacementRelTo xsi:type="IfcLocalPlacement" ref="l1" xsi:nil="true"/><RelativePlacement><IfcAxis2Placement3D><Location Coordinates="0 0 0"/></IfcAxis2Placement3D></RelativePlacement></IfcLocalPlacement>"#;
    let plate = element(
        "IfcPlate",
        r#"id="i1""#,
        "",
        &solid,
        r#"<ObjectPlacement xsi:type="IfcLocalPlacement" ref="l1" xsi:nil="true"/>"#,
    );
    let steelwork = taken(&format!("{looped}{plate}"));
    assert!(steelwork.rejected[0].reason.contains("loop"), "{}", steelwork.rejected[0].reason);
}

#[test]
fn a_reference_direction_that_is_not_square_is_made_so_by_the_schemas_rule() {
    // RefDirection (1, 0, 1) less its part along Axis (0, 0, 1) is (1, 0, 0).
    let solid = extruded(&rectangle(200.0, 300.0), 10.0, "0 0 1");
    let steelwork = taken(&element("IfcPlate", r#"id="i1""#, &axes("0 0 0", "0 0 1", "1 0 1"), &solid, ""));
    near(steelwork.plates[0].u, [1.0, 0.0, 0.0], 1e-12);
    near(steelwork.plates[0].normal, [0.0, 0.0, 1.0], 1e-12);
}
