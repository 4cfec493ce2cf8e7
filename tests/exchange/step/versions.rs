//! Each version of the schema by its own positions and supertypes.

use super::*;

fn of(schema: &str, records: &str) -> Exchange {
    let exchange = read(file_of(schema, records).as_bytes(), "t.ifc").unwrap();
    assert_eq!(exchange.problems, [], "{schema}");
    exchange
}

#[test]
fn the_schema_that_the_file_names_is_the_one_it_is_read_by() {
    for (schema, form) in [
        ("IFC2X3", "IFC2X3 STEP"),
        ("IFC4", "IFC4 STEP"),
        ("IFC4_ADD2", "IFC4 STEP"),
        ("IFC4X3", "IFC4X3 STEP"),
        ("IFC4X3_ADD2", "IFC4X3 STEP"),
    ] {
        assert_eq!(of(schema, "").form, form);
    }
}

#[test]
fn positions_differ_between_the_versions() {
    // IFC2X3 TC1: IfcBeam ends with Tag, IfcMaterial has a name only; IFC4 added PredefinedType, Description, Category
    let old = of("IFC2X3", "#1=IFCBEAM('0000000000000000000001',$,'b',$,$,$,$,'t');#2=IFCMATERIAL('S355');");
    assert_eq!(labelled(&old, "#1").text("Tag"), Some("t"));
    let new =
        of("IFC4X3", "#1=IFCBEAM('0000000000000000000001',$,'b',$,$,$,$,'t',.BEAM.);#2=IFCMATERIAL('S355',$,'c');");
    assert_eq!(labelled(&new, "#1").token("PredefinedType"), Some("BEAM"));
    assert_eq!(labelled(&new, "#2").text("Category"), Some("c"));
    // IFC2X3 TC1: IfcRelAssociates has its RelatedObjects before RelatingMaterial, IfcRelDecomposes the reverse
    let old = of(
        "IFC2X3",
        "#1=IFCBEAM('0000000000000000000001',$,$,$,$,$,$,$);#2=IFCELEMENTASSEMBLY('0000000000000000000002',$,$,$,$,$,$,$,$,$);\n\
         #3=IFCRELAGGREGATES('0000000000000000000003',$,$,$,#2,(#1));#4=IFCMATERIAL('S355');\n\
         #5=IFCRELASSOCIATESMATERIAL('0000000000000000000004',$,$,$,(#1),#4);",
    );
    assert_eq!(labelled(&old, "#1").referring_by("IfcRelAggregates", "RelatedObjects").len(), 1);
    assert_eq!(labelled(&old, "#5").entity("RelatingMaterial").unwrap().text("Name"), Some("S355"));
}

#[test]
fn supertypes_differ_between_the_versions() {
    let beam = |schema, attributes| {
        of(schema, &format!("#1=IFCBEAM('0000000000000000000001'{attributes});"))
            .entities
            .all()
            .next()
            .unwrap()
            .is_a("IfcBuildingElement")
    };
    assert!(beam("IFC2X3", ",$,$,$,$,$,$,$"));
    assert!(beam("IFC4", ",$,$,$,$,$,$,$,$"));
    assert!(beam("IFC4X3", ",$,$,$,$,$,$,$,$"), "IfcBuiltElement is the later name");
    let bolt = |schema, attributes| {
        let exchange = of(schema, &format!("#1=IFCMECHANICALFASTENER('0000000000000000000001'{attributes});"));
        let bolt = exchange.entities.all().next().unwrap();
        (bolt.is_a("IfcFastener"), bolt.is_a("IfcBuildingElement"), bolt.number("NominalDiameter"))
    };
    // IFC2X3 TC1: SUBTYPE OF (IfcFastener); IFC4: of IfcElementComponent
    assert_eq!(bolt("IFC2X3", ",$,$,$,$,$,$,$,20.,80."), (true, false, Some(20.0)));
    assert_eq!(bolt("IFC4", ",$,$,$,$,$,$,$,20.,80.,.BOLT."), (false, false, Some(20.0)));
    assert_eq!(bolt("IFC4X3", ",$,$,$,$,$,$,$,20.,80.,.BOLT."), (false, false, Some(20.0)));
}

#[test]
fn classes_of_another_version_are_unknown() {
    let exchange = read(file_of("IFC2X3", "#1=IFCVOIDINGFEATURE('x');").as_bytes(), "t.ifc").unwrap();
    assert_eq!(
        problems_of(&exchange),
        ["2:1 IFCVOIDINGFEATURE is no entity of the schema; it is kept, but nothing of it is understood"]
    );
}
