use faying::shop::Part;

use super::model::*;

fn beam(id: &str, tag: &str) -> String {
    let sizes = r#"OverallWidth="200" OverallDepth="500" WebThickness="10.2" FlangeThickness="16" FilletRadius="21""#;
    let solid = extruded(&profile("IfcIShapeProfileDef", sizes, ""), 6000.0, "0 0 1");
    element("IfcBeam", &format!(r#"id="{id}" Name="IPE 500" Tag="{tag}""#), "", &solid, "")
}

fn plate(id: &str) -> String {
    element(
        "IfcPlate",
        &format!(r#"id="{id}" Name="End plate""#),
        "",
        &extruded(&rectangle(200.0, 500.0), 20.0, "0 0 1"),
        "",
    )
}

fn assembly(id: &str, parts: &[(&str, &str)]) -> String {
    let parts: String = parts.iter().map(|(class, id)| format!(r#"<{class} ref="{id}" xsi:nil="true"/>"#)).collect();
    format!(
        r#"<IfcElementAssembly id="{id}" GlobalId="0{id:0<21}" Name="A"><IsDecomposedBy><IfcRelAggregates GlobalId="1{id:0<21}"><RelatedObjects>{parts}</RelatedObjects></IfcRelAggregates></IsDecomposedBy></IfcElementAssembly>"#
    )
}

fn told(name: &str, ends: [(&str, &str); 2], by: &[(&str, &str)]) -> String {
    let end =
        |tag: &str, (class, id): (&str, &str)| format!(r#"<{tag} xsi:type="{class}" ref="{id}" xsi:nil="true"/>"#);
    let by: String = by.iter().map(|(class, id)| format!(r#"<{class} ref="{id}" xsi:nil="true"/>"#)).collect();
    format!(
        r#"<IfcRelConnectsWithRealizingElements GlobalId="0Rel000000000000000009" Name="{name}">{}{}<RealizingElements>{by}</RealizingElements></IfcRelConnectsWithRealizingElements>"#,
        end("RelatingElement", ends[0]),
        end("RelatedElement", ends[1])
    )
}

#[test]
fn assemblies_are_pieces_also_nested() {
    let body = beam("b", "B1")
        + &plate("p")
        + &assembly("inner", &[("IfcPlate", "p")])
        + &assembly("outer", &[("IfcBeam", "b"), ("IfcElementAssembly", "inner")]);
    let steelwork = taken(&body);
    assert_eq!(steelwork.pieces[0].parts, [Part::Plate(0)]);
    assert_eq!(steelwork.pieces[1].parts, [Part::Member(0), Part::Plate(0)]);
    // One that holds itself ends.
    let looped = taken(&(plate("p") + &assembly("a", &[("IfcPlate", "p"), ("IfcElementAssembly", "a")])));
    assert_eq!(looped.pieces[0].parts, [Part::Plate(0)]);
}

#[test]
fn an_assembly_of_nothing_is_rejected() {
    // Its only part has no body.
    let body = element("IfcBeam", r#"id="b""#, "", "", "") + &assembly("a", &[("IfcBeam", "b")]);
    let steelwork = taken(&body);
    assert_eq!(steelwork.pieces.len(), 0);
    assert!(steelwork.rejected[1].reason.contains("no part"), "{}", steelwork.rejected[1].reason);
}

#[test]
fn a_told_connection_names_its_ends_and_what_realises_it() {
    let shank = extruded(&circle(10.0), 80.0, "0 0 1");
    let two = shank.clone()
        + &shank.replace(
            "<ExtrudedDirection",
            r#"<Position><Location Coordinates="90 0 0"/></Position><ExtrudedDirection"#,
        );
    let group = element("IfcMechanicalFastener", r#"id="f" Name="M20""#, "", &two, "");
    let body = beam("b1", "B1")
        + &beam("b2", "B2")
        + &plate("p")
        + &group
        + &told("J1", [("IfcBeam", "b1"), ("IfcBeam", "b2")], &[("IfcPlate", "p"), ("IfcMechanicalFastener", "f")]);
    let steelwork = taken(&body);
    let told = &steelwork.told[0];
    assert_eq!(told.name.as_deref(), Some("J1"));
    assert_eq!(told.between, [Part::Member(0), Part::Member(1)]);
    // Every bolt of the group realises it.
    assert_eq!(told.by, [Part::Plate(0), Part::Bolt(0), Part::Bolt(1)]);
}

#[test]
fn an_end_that_was_not_taken_up_is_left_out_and_told() {
    let footing = element("IfcFooting", r#"id="x" Name="Pad""#, "", "", "");
    let body = beam("b1", "B1")
        + &plate("p")
        + &footing
        + &told("J1", [("IfcBeam", "b1"), ("IfcFooting", "x")], &[("IfcPlate", "p")]);
    let steelwork = taken(&body);
    assert_eq!(steelwork.told[0].between, [Part::Member(0)]);
    assert!(steelwork.problems[0].message.contains("Pad"), "{}", steelwork.problems[0].message);
}

#[test]
fn the_mark_is_the_tag_or_a_property_that_means_one() {
    assert_eq!(taken(&beam("b", "B7")).members[0].identity.mark.as_deref(), Some("B7"));
    let plate = |inside: &str| {
        let solid = extruded(&rectangle(200.0, 500.0), 20.0, "0 0 1");
        taken(&element("IfcPlate", r#"id="p""#, "", &solid, inside)).plates[0].identity.mark.clone()
    };
    assert_eq!(plate(&properties("Shop", &[("Part mark", "IfcLabel", "p12")])).as_deref(), Some("p12"));
    assert_eq!(
        plate(&properties("Pset_PlateCommon", &[("Reference", "IfcIdentifier", "p13")])).as_deref(),
        Some("p13")
    );
    assert_eq!(plate(""), None);
}
