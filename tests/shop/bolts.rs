use faying::origin::Origin;
use faying::shop::Steelwork;

use super::model::*;
use crate::close;

fn fastener(attributes: &str, solids: &str, inside: &str) -> String {
    element("IfcMechanicalFastener", &format!(r#"id="i1" {attributes}"#), "", solids, inside)
}

fn bolt(attributes: &str, inside: &str, extra: &str) -> Steelwork {
    let solid = extruded(&circle(10.0), 80.0, "0 0 1");
    taken(&format!("{}{extra}", fastener(attributes, &solid, inside)))
}

#[test]
fn the_axis_is_the_solids() {
    let shank = |axis: &str| {
        format!(
            r#"<IfcExtrudedAreaSolid Depth="80">{}<Position><Location Coordinates="1 2 3"/>{}</Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
            circle(10.0),
            if axis.is_empty() { String::new() } else { format!(r#"<Axis DirectionRatios="{axis}"/>"#) }
        )
    };
    for (axis, end) in [("", [1.0, 2.0, 83.0]), ("1 0 0", [81.0, 2.0, 3.0]), ("0 -1 0", [1.0, -78.0, 3.0])] {
        let steelwork = taken(&fastener(r#"Name="M20" PredefinedType="bolt""#, &shank(axis), ""));
        near(steelwork.bolts[0].start, [1.0, 2.0, 3.0], 1e-9);
        near(steelwork.bolts[0].end, end, 1e-9);
    }
}

/// A cylinder with its base at a point, along z.
fn cylinder(at: &str, radius: f64, depth: f64) -> String {
    format!(
        r#"<IfcExtrudedAreaSolid Depth="{depth}">{}<Position><Location Coordinates="{at}"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
        circle(radius)
    )
}

#[test]
fn shank_head_and_nut_are_one_bolt_and_a_group_is_several() {
    let one = |at: f64| {
        [
            cylinder(&format!("{at} 0 -12"), 15.0, 12.0),
            cylinder(&format!("{at} 0 0"), 10.0, 80.0),
            cylinder(&format!("{at} 0 60"), 15.0, 16.0),
        ]
        .concat()
    };
    let steelwork = taken(&fastener(r#"Name="M20 x 80 8.8""#, &format!("{}{}", one(0.0), one(90.0)), ""));
    assert_eq!(steelwork.bolts.len(), 2);
    near(steelwork.bolts[1].start, [90.0, 0.0, 0.0], 1e-9);
    near(steelwork.bolts[1].end, [90.0, 0.0, 80.0], 1e-9);
    // Two on one axis with a gap between them, as through both flanges of a beam.
    let steelwork =
        taken(&fastener(r#"Name="M20""#, &(cylinder("0 0 0", 10.0, 60.0) + &cylinder("0 0 400", 10.0, 60.0)), ""));
    assert_eq!(steelwork.bolts.len(), 2);
}

#[test]
fn a_thread_drawn_thinner_is_still_the_shank() {
    // 50 mm of shank and 30 mm of thread at the core diameter of about 17 mm.
    let solids = cylinder("0 0 0", 10.0, 50.0) + &cylinder("0 0 50", 8.5, 30.0);
    let steelwork = taken(&fastener(r#"Name="M20""#, &solids, ""));
    assert_eq!((steelwork.bolts.len(), steelwork.problems.len()), (1, 0));
    near(steelwork.bolts[0].end, [0.0, 0.0, 80.0], 1e-9);
}

#[test]
fn a_type_states_what_its_bolts_leave_out() {
    let typed = r#"<IsTypedBy GlobalId="0Rel000000000000000003"><RelatingType xsi:type="IfcMechanicalFastenerType" id="t1" GlobalId="0Typ000000000000000001" Name="M20 x 80 8.8" NominalDiameter="20" NominalLength="80" PredefinedType="bolt"/></IsTypedBy>"#;
    let steelwork = taken(&fastener("", &cylinder("0 0 0", 10.0, 80.0), typed));
    let bolt = &steelwork.bolts[0];
    let origin = bolt.diameter.as_ref().unwrap().origin.to_string();
    assert!(origin.contains("NominalDiameter of the type"), "{origin}");
    assert_eq!(bolt.class.as_ref().unwrap().value, "8.8");
    // The name of a type is no mark.
    assert_eq!(bolt.identity.mark, None);
}

/// A mapped item of a shank of radius 1 and length 8, moved and scaled.
fn mapped(at: &str, scale: f64, first: bool) -> String {
    let source = if first {
        format!(
            r#"<MappingSource id="m1"><MappingOrigin xsi:type="IfcAxis2Placement3D"><Location Coordinates="0 0 0"/></MappingOrigin><MappedRepresentation xsi:type="IfcShapeRepresentation" RepresentationIdentifier="Body"><Items>{}</Items></MappedRepresentation></MappingSource>"#,
            extruded(&circle(1.0), 8.0, "0 0 1")
        )
    } else {
        r#"<MappingSource ref="m1" xsi:nil="true"/>"#.into()
    };
    format!(
        r#"<IfcMappedItem>{source}<MappingTarget xsi:type="IfcCartesianTransformationOperator3D" Scale="{scale}"><LocalOrigin Coordinates="{at}"/></MappingTarget></IfcMappedItem>"#
    )
}

#[test]
fn each_mapped_item_is_a_bolt() {
    let items = mapped("0 0 0", 10.0, true) + &mapped("90 0 0", 10.0, false) + &mapped("0 70 5", 10.0, false);
    let steelwork = taken(&fastener(r#"Name="M20""#, &items, ""));
    assert_eq!(steelwork.bolts.len(), 3);
    near(steelwork.bolts[2].start, [0.0, 70.0, 5.0], 1e-9);
    near(steelwork.bolts[2].end, [0.0, 70.0, 85.0], 1e-9);
    assert_eq!(steelwork.problems, []);
}

#[test]
fn the_diameter_is_stated_by_attribute_property_name_or_geometry() {
    for (attributes, inside, by) in [
        (r#"NominalDiameter="20""#, String::new(), "NominalDiameter"),
        (
            "",
            properties("Pset_MechanicalFastenerBolt", &[("ThreadDiameter", "IfcPositiveLengthMeasure", "20")]),
            "ThreadDiameter",
        ),
        ("", properties("Shop", &[("Bolt size", "IfcLabel", "M20")]), "Bolt size"),
        (r#"Name="M20 x 80""#, String::new(), "Name"),
    ] {
        let steelwork = bolt(attributes, &inside, "");
        let diameter = steelwork.bolts[0].diameter.as_ref().unwrap();
        close(diameter.value.get(), 20.0, 0.0);
        assert!(
            matches!(&diameter.origin, Origin::Modelled { by: words, .. } if words.contains(by)),
            "{}",
            diameter.origin
        );
        assert_eq!(steelwork.problems, []);
    }
    let steelwork = bolt(r#"Name="Bolt""#, "", "");
    assert!(matches!(steelwork.bolts[0].diameter.as_ref().unwrap().origin, Origin::Derived(_)));
}

#[test]
fn the_length_of_the_thread_is_read_where_it_is_stated_once() {
    const L: &str = "IfcPositiveLengthMeasure";
    let thread = |set: &str, all: &[(&str, &str, &str)]| {
        bolt(r#"Name="M20 x 80""#, &properties(set, all), "").bolts[0].thread.map(|l| l.get())
    };
    assert_eq!(thread("Pset_MechanicalFastenerBolt", &[("ThreadLength", L, "46")]), Some(46.0));
    assert_eq!(thread("Shop", &[("Gewindelänge", L, "46")]), Some(46.0));
    assert_eq!(thread("Shop", &[("Length", L, "80")]), None);
    assert_eq!(thread("Shop", &[("Thread length", L, "46"), ("Gewindelänge", L, "80")]), None);
}

#[test]
fn diameters_that_disagree_give_the_smaller_and_a_problem() {
    // The shank is drawn 20 mm thick.
    for (attributes, d) in [
        (r#"NominalDiameter="16""#, 16.0),
        (r#"NominalDiameter="24""#, 20.0),
        (r#"Name="M16" NominalDiameter="20""#, 16.0),
    ] {
        let steelwork = bolt(attributes, "", "");
        close(steelwork.bolts[0].diameter.as_ref().unwrap().value.get(), d, 0.0);
        assert_eq!(steelwork.problems.len(), 1);
        assert!(steelwork.problems[0].message.contains("smaller"), "{}", steelwork.problems[0].message);
    }
}

#[test]
fn the_class_comes_from_material_name_or_property() {
    let at = [("IfcMechanicalFastener", "i1")];
    for (attributes, inside, extra) in [
        (r#"Name="M20 x 80 8.8""#, String::new(), String::new()),
        (r#"Name="M20""#, properties("Shop", &[("Strength class", "IfcLabel", "8.8")]), String::new()),
        (r#"Name="M20""#, String::new(), material("8.8", &at)),
        (r#"Name="M20 8.8""#, String::new(), material("8.8", &at)),
        // A steel grade says nothing on the class.
        (r#"Name="M20 8.8""#, String::new(), material("S355", &at)),
    ] {
        assert_eq!(bolt(attributes, &inside, &extra).bolts[0].class.as_ref().unwrap().value, "8.8");
    }
}

#[test]
fn a_class_that_is_not_said_or_said_twice_is_missing() {
    let at = [("IfcMechanicalFastener", "i1")];
    let silent = bolt(r#"Name="M20 x 80""#, "", "").bolts[0].class.clone().unwrap_err();
    assert_eq!(silent.what, "bolt class");
    let both = bolt(r#"Name="M20 x 80 8.8""#, "", &material("10.9", &at)).bolts[0].class.clone().unwrap_err();
    assert!(both.reason.contains("8.8") && both.reason.contains("10.9"), "{both}");
}

#[test]
fn length_and_hole_are_taken_where_stated() {
    let steelwork = bolt(r#"Name="M20 x 80""#, &properties("Shop", &[("Hole diameter", "IfcLengthMeasure", "22")]), "");
    close(steelwork.bolts[0].length.as_ref().unwrap().value.get(), 80.0, 0.0);
    close(steelwork.bolts[0].hole.unwrap().get(), 22.0, 0.0);
    let steelwork = bolt(r#"Name="M20 8.8""#, "", "");
    assert!(steelwork.bolts[0].length.is_err() && steelwork.bolts[0].hole.is_none());
}

#[test]
fn fasteners_that_are_no_bolts_are_rejected_with_a_reason() {
    let shank = extruded(&circle(10.0), 80.0, "0 0 1");
    let hexagon: Vec<(f64, f64)> = (0..7)
        .map(|i| (15.0 * (f64::from(i) * 60f64.to_radians()).cos(), 15.0 * (f64::from(i) * 60f64.to_radians()).sin()))
        .collect();
    for (attributes, solid, word) in [
        (r#"Name="S19" PredefinedType="studshearconnector""#, shank.clone(), "STUDSHEARCONNECTOR"),
        (r#"Name="Nut M20""#, shank.clone(), "nut"),
        (r#"Name="Washer M20""#, shank.clone(), "washer"),
        (r#"Name="M20" NominalDiameter="20""#, extruded(&circle(25.0), 80.0, "0 0 1"), "hole pattern"),
        (r#"Name="F1" NominalDiameter="4""#, extruded(&circle(2.0), 30.0, "0 0 1"), "no bolt diameter"),
        (r#"Name="M20""#, extruded(&circle(10.0), 12.0, "0 0 1"), "shorter"),
        (r#"Name="M20""#, extruded(&outline("", &hexagon), 16.0, "0 0 1"), "nut or bolt head"),
        (r#"Name="M20""#, String::new(), "no body"),
    ] {
        let steelwork = taken(&fastener(attributes, &solid, ""));
        assert_eq!((steelwork.bolts.len(), steelwork.rejected.len()), (0, 1), "{attributes}");
        assert!(steelwork.rejected[0].reason.contains(word), "{}", steelwork.rejected[0].reason);
    }
}

#[test]
fn a_bolt_of_another_class_is_told_by_name_and_shank() {
    let shank = extruded(&circle(10.0), 80.0, "0 0 1");
    let steelwork = taken(&element("IfcBuildingElementProxy", r#"id="i1" Name="Bolt M20 x 80""#, "", &shank, ""));
    assert_eq!(steelwork.bolts.len(), 1);
    let rod = extruded(&circle(10.0), 3000.0, "0 0 1");
    let steelwork = taken(&element("IfcMember", r#"id="i1" Name="Tie rod""#, "", &rod, ""));
    assert_eq!((steelwork.bolts.len(), steelwork.members.len()), (0, 1));
}

#[test]
fn a_number_without_a_unit_is_read_only_where_it_can_mean_one_thing() {
    let metre = r#"<IfcSIUnit UnitType="lengthunit" Name="metre"/>"#;
    let solid = extruded(&circle(0.01), 0.08, "0 0 1");
    // 20 m is no bolt, 20 mm is; the project counts in metres.
    let inside = properties("Shop", &[("Bolt size", "IfcReal", "20")]);
    let steelwork = taken_in(metre, &fastener(r#"Name="F""#, &solid, &inside));
    let diameter = steelwork.bolts[0].diameter.as_ref().unwrap();
    close(diameter.value.get(), 20.0, 0.0);
    assert!(diameter.origin.to_string().contains("read as mm"), "{}", diameter.origin);
}
