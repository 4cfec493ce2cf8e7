//! Ways of writing the same thing.

use super::*;

/// A beam, its plate and its property set, nested.
const NESTED: &str = r#"
<IfcBeam id="b" GlobalId="0000000000000000000001" Name="B1">
  <IsDecomposedBy><IfcRelAggregates><RelatedObjects>
    <IfcPlate id="p" GlobalId="0000000000000000000002" Name="P1"/>
  </RelatedObjects></IfcRelAggregates></IsDecomposedBy>
  <IsTypedBy><RelatingType xsi:type="IfcBeamType" Name="T" PredefinedType="beam"/></IsTypedBy>
  <IsDefinedBy><IfcRelDefinesByProperties><RelatingPropertyDefinition>
    <IfcPropertySet Name="S"><HasProperties>
      <IfcPropertySingleValue Name="a"><NominalValue><IfcLengthMeasure-wrapper>6</IfcLengthMeasure-wrapper></NominalValue></IfcPropertySingleValue>
    </HasProperties></IfcPropertySet>
  </RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>
  <ObjectPlacement xsi:type="IfcLocalPlacement"><RelativePlacement><IfcAxis2Placement3D>
    <Location Coordinates="0 0 3500"/><RefDirection DirectionRatios="0. 1. 0."/>
  </IfcAxis2Placement3D></RelativePlacement></ObjectPlacement>
</IfcBeam>"#;

/// Other ways of writing it. Each has one of its own besides the order of children and of definitions.
const OTHERS: &[(&str, &str)] = &[
    (
        "by reference, forward and backward, with and without nil",
        r##"
<IfcRelAggregates id="ra"><RelatedObjects><IfcPlate ref="p" xsi:nil="true"/></RelatedObjects></IfcRelAggregates>
<IfcBeam id="b" GlobalId="0000000000000000000001" Name="B1">
  <ObjectPlacement xsi:type="IfcLocalPlacement" ref="lp"/>
  <IsDefinedBy><IfcRelDefinesByProperties ref="rp"/></IsDefinedBy>
  <IsTypedBy ref="rt" xsi:nil="true"/>
  <IsDecomposedBy><IfcRelAggregates href="#ra"/></IsDecomposedBy>
</IfcBeam>
<IfcPlate id="p" GlobalId="0000000000000000000002" Name="P1"/>
<IfcRelDefinesByType id="rt"><RelatingType xsi:type="IfcBeamType" ref="ty"/></IfcRelDefinesByType>
<IfcBeamType id="ty" Name="T" PredefinedType="beam"/>
<IfcRelDefinesByProperties id="rp"><RelatingPropertyDefinition><IfcPropertySet ref="ps"/></RelatingPropertyDefinition></IfcRelDefinesByProperties>
<IfcPropertySet id="ps" Name="S"><HasProperties><IfcPropertySingleValue ref="pv"/></HasProperties></IfcPropertySet>
<IfcPropertySingleValue id="pv" Name="a"><NominalValue><IfcLengthMeasure-wrapper>6</IfcLengthMeasure-wrapper></NominalValue></IfcPropertySingleValue>
<IfcCartesianPoint id="pt" Coordinates="0 0 3500"/>
<IfcDirection id="d" DirectionRatios="0. 1. 0."/>
<IfcAxis2Placement3D id="ax"><RefDirection ref="d"/><Location ref="pt"/></IfcAxis2Placement3D>
<IfcLocalPlacement id="lp"><RelativePlacement><IfcAxis2Placement3D ref="ax"/></RelativePlacement></IfcLocalPlacement>"##,
    ),
    (
        "relations at the top with both ends, one relation at both",
        r#"
<IfcRelAggregates><RelatingObject xsi:type="IfcBeam" ref="b"/><RelatedObjects><IfcPlate ref="p"/></RelatedObjects></IfcRelAggregates>
<IfcRelDefinesByType><RelatedObjects><IfcBeam ref="b"/></RelatedObjects><RelatingType xsi:type="IfcBeamType" Name="T" PredefinedType="BEAM"/></IfcRelDefinesByType>
<IfcPlate id="p" GlobalId="0000000000000000000002" Name="P1"/>
<IfcBeam id="b" Name="B1" GlobalId="0000000000000000000001">
  <ObjectPlacement xsi:type="IfcLocalPlacement"><RelativePlacement><IfcAxis2Placement3D>
    <RefDirection DirectionRatios="0 1 0"/><Location Coordinates="0. 0. 3.5e3"/>
  </IfcAxis2Placement3D></RelativePlacement></ObjectPlacement>
  <IsDefinedBy><IfcRelDefinesByProperties ref="rp"/></IsDefinedBy>
</IfcBeam>
<IfcRelDefinesByProperties id="rp"><RelatedObjects xsi:type="IfcBeam" ref="b"/><RelatingPropertyDefinition xsi:type="IfcPropertySet" Name="S">
  <HasProperties><IfcPropertySingleValue Name="a"><NominalValue xsi:type="IfcLengthMeasure">6</NominalValue></IfcPropertySingleValue></HasProperties>
</RelatingPropertyDefinition></IfcRelDefinesByProperties>"#,
    ),
    (
        "prefixed",
        r#"
<ifc:IfcBeam id="b" GlobalId="0000000000000000000001" ifc:Name="B1">
  <ifc:IsDecomposedBy ifc:cType="set"><ifc:IfcRelAggregates><ifc:RelatedObjects ifc:itemType="ifc:IfcObjectDefinition" ifc:cType="set">
    <ifc:IfcPlate id="p" GlobalId="0000000000000000000002" Name="P1"/>
  </ifc:RelatedObjects></ifc:IfcRelAggregates></ifc:IsDecomposedBy>
  <ifc:IsTypedBy xsi:type="ifc:IfcRelDefinesByType"><ifc:RelatingType xsi:type="ifc:IfcBeamType" Name="T" PredefinedType="beam"/></ifc:IsTypedBy>
  <ifc:IsDefinedBy><ifc:IfcRelDefinesByProperties><ifc:RelatingPropertyDefinition>
    <ifc:IfcPropertySet Name="S"><ifc:HasProperties>
      <ifc:IfcPropertySingleValue Name="a"><ifc:NominalValue><ifc:IfcLengthMeasure-wrapper>6</ifc:IfcLengthMeasure-wrapper></ifc:NominalValue></ifc:IfcPropertySingleValue>
    </ifc:HasProperties></ifc:IfcPropertySet>
  </ifc:RelatingPropertyDefinition></ifc:IfcRelDefinesByProperties></ifc:IsDefinedBy>
  <ifc:ObjectPlacement xsi:type="ifc:IfcLocalPlacement"><ifc:RelativePlacement><ifc:IfcAxis2Placement3D>
    <ifc:Location Coordinates="0 0 3500"/><ifc:RefDirection DirectionRatios="0. 1. 0."/>
  </ifc:IfcAxis2Placement3D></ifc:RelativePlacement></ifc:ObjectPlacement>
</ifc:IfcBeam>"#,
    ),
    (
        "attributes as elements, entities within the attribute's element",
        r#"
<IfcBeam id="b"><GlobalId>0000000000000000000001</GlobalId><Name><![CDATA[B1]]></Name>
  <ObjectPlacement><IfcLocalPlacement><RelativePlacement><IfcAxis2Placement3D>
    <Location><IfcCartesianPoint><Coordinates><IfcLengthMeasure>0</IfcLengthMeasure><IfcLengthMeasure-wrapper>0</IfcLengthMeasure-wrapper><IfcLengthMeasure pos="2">3500</IfcLengthMeasure></Coordinates></IfcCartesianPoint></Location>
    <RefDirection><DirectionRatios>0 1 0</DirectionRatios></RefDirection>
  </IfcAxis2Placement3D></RelativePlacement></IfcLocalPlacement></ObjectPlacement>
  <IsTypedBy><IfcRelDefinesByType><RelatingType><IfcBeamType><Name>T</Name><PredefinedType>.BEAM.</PredefinedType></IfcBeamType></RelatingType></IfcRelDefinesByType></IsTypedBy>
  <IsDecomposedBy><RelatedObjects><IfcPlate id="p"><GlobalId>0000000000000000000002</GlobalId><Name><IfcLabel-wrapper>P1</IfcLabel-wrapper></Name></IfcPlate></RelatedObjects></IsDecomposedBy>
  <IsDefinedBy><IfcRelDefinesByProperties><RelatingPropertyDefinition>
    <IfcPropertySet><Name>S</Name><HasProperties>
      <IfcPropertySingleValue><Name>a</Name><NominalValue><IfcLengthMeasure>6.</IfcLengthMeasure></NominalValue></IfcPropertySingleValue>
    </HasProperties></IfcPropertySet>
  </RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>
</IfcBeam>"#,
    ),
];

#[test]
fn every_way_of_writing_gives_the_same_graph() {
    let nested = graph(&read_clean(NESTED));
    assert_eq!(nested.len(), 12);
    for (way, body) in OTHERS {
        assert_eq!(graph(&read_clean(body)), nested, "{way}");
    }
}

#[test]
fn the_prefix_and_the_namespace_do_not_matter() {
    let with_default = graph(&read_clean(NESTED));
    let prefixed = document(OTHERS[2].1).replace("ifcXML ", "ifc:ifcXML ").replace("/ifcXML", "/ifc:ifcXML");
    let prefixed = prefixed.replace("xmlns=", "xmlns:other=").replace("ifc:", "x:").replace("xmlns:ifc=", "xmlns:x=");
    let exchange = read(prefixed.as_bytes(), "t").unwrap();
    assert_eq!((exchange.form.as_str(), &*exchange.problems), ("IFC4 ifcXML", &[][..]));
    assert_eq!(graph(&exchange), with_default);
}

/// Namespaces of the published XSD files, and of later releases by the same pattern.
#[test]
fn the_namespace_tells_the_version() {
    for (namespace, form) in [
        ("http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1", "IFC4 ifcXML"),
        ("http://www.buildingsmart-tech.org/ifcXML/IFC4/Add2", "IFC4 ifcXML"),
        ("https://standards.buildingsmart.org/IFC/RELEASE/IFC4/ADD2_TC1/XML", "IFC4 ifcXML"),
        ("http://www.buildingsmart-tech.org/ifcXML/IFC4/Add1", "IFC4 ADD1 ifcXML"),
        ("http://www.buildingsmart-tech.org/ifcXML/IFC4/final", "IFC4 (first edition) ifcXML"),
        ("https://standards.buildingsmart.org/IFC/RELEASE/IFC4_3/XML", "IFC4X3 ifcXML"),
    ] {
        for root in
            [format!("<ifcXML xmlns=\"{namespace}\"/>"), format!("<i:ifcXML xmlns=\"urn:x\" xmlns:i=\"{namespace}\"/>")]
        {
            let exchange = read(root.as_bytes(), "t.ifcxml").unwrap();
            assert_eq!((exchange.form.as_str(), &*exchange.problems), (form, &[][..]), "{root}");
        }
    }
    for (root, given) in [("<ifcXML/>", ""), ("<ifcXML xmlns=\"urn:else\"/>", "urn:else")] {
        let exchange = read(root.as_bytes(), "t.ifcxml").unwrap();
        assert_eq!(exchange.form, "IFC4 ifcXML");
        let said = format!("1:1 the namespace \"{given}\" names no version of IFC that is known: read as IFC4");
        assert_eq!(problems_of(&exchange), [said]);
    }
}

/// The inverse attributes that the XSD of IFC4 ADD2 TC1 writes inside the object: parent, inverse, relation (or whatever
/// points back), the attribute that is implied.
const INVERSES: &[(&str, &str, &str, &str)] = &[
    ("IfcClassification", "HasReferences", "IfcClassificationReference", "ReferencedSource"),
    ("IfcClassificationReference", "HasReferences", "IfcClassificationReference", "ReferencedSource"),
    ("IfcProject", "IsDefinedBy", "IfcRelDefinesByProperties", "RelatedObjects"),
    ("IfcProject", "Declares", "IfcRelDeclares", "RelatingContext"),
    ("IfcPlate", "HasProjections", "IfcRelProjectsElement", "RelatingElement"),
    ("IfcPlate", "HasOpenings", "IfcRelVoidsElement", "RelatingBuildingElement"),
    ("IfcGeometricRepresentationContext", "HasSubContexts", "IfcGeometricRepresentationSubContext", "ParentContext"),
    ("IfcGeometricRepresentationContext", "HasCoordinateOperation", "IfcMapConversion", "SourceCRS"),
    ("IfcMaterial", "HasRepresentation", "IfcMaterialDefinitionRepresentation", "RepresentedMaterial"),
    ("IfcMaterial", "HasProperties", "IfcMaterialProperties", "Material"),
    ("IfcBeam", "IsDeclaredBy", "IfcRelDefinesByObject", "RelatedObjects"),
    ("IfcBeam", "IsTypedBy", "IfcRelDefinesByType", "RelatedObjects"),
    ("IfcBeam", "IsDefinedBy", "IfcRelDefinesByProperties", "RelatedObjects"),
    ("IfcBeam", "IsNestedBy", "IfcRelNests", "RelatingObject"),
    ("IfcBeam", "IsDecomposedBy", "IfcRelAggregates", "RelatingObject"),
    ("IfcOpeningElement", "HasFillings", "IfcRelFillsElement", "RelatingOpeningElement"),
    ("IfcProductDefinitionShape", "HasShapeAspects", "IfcShapeAspect", "PartOfProductDefinitionShape"),
    ("IfcIShapeProfileDef", "HasProperties", "IfcProfileProperties", "ProfileDefinition"),
    ("IfcExtrudedAreaSolid", "StyledByItem", "IfcStyledItem", "Item"),
    ("IfcBuildingStorey", "ContainsElements", "IfcRelContainedInSpatialStructure", "RelatingStructure"),
    ("IfcBuildingStorey", "ReferencesElements", "IfcRelReferencedInSpatialStructure", "RelatingStructure"),
    ("IfcTriangulatedFaceSet", "HasColours", "IfcIndexedColourMap", "MappedTo"),
    ("IfcTriangulatedFaceSet", "HasTextures", "IfcIndexedTriangleTextureMap", "MappedTo"),
];

#[test]
fn an_inverse_implies_the_end_that_its_relation_lacks() {
    for (parent, inverse, relation, end) in INVERSES {
        let ways = [
            format!("<{parent} id='p'><{inverse}><{relation} id='r'/></{inverse}></{parent}>"),
            format!("<{parent} id='p'><{inverse} xsi:type='ifc:{relation}' id='r'/></{parent}>"),
            format!(
                "<{parent} id='p'><{inverse}><{relation} ref='r' xsi:nil='true'/></{inverse}></{parent}><{relation} id='r'/>"
            ),
            format!("<{relation} id='r'/><{parent} id='p'><{inverse} xsi:type='{relation}' ref='r'/></{parent}>"),
        ];
        for body in ways {
            let exchange = read_body(&body);
            let relation = labelled(&exchange, "r");
            let ends: Vec<&str> = relation.entities(end).iter().map(|e| e.label()).collect();
            assert_eq!(ends, ["p"], "{body}");
            let referring: Vec<&str> =
                labelled(&exchange, "p").referring_by(relation.class(), end).iter().map(|e| e.label()).collect();
            assert_eq!(referring, ["r"], "{body}");
        }
    }
}

#[test]
fn a_relation_in_several_parents_relates_them_all() {
    let exchange = read_body(
        "<IfcBeam id='b1'><IsDefinedBy><IfcRelDefinesByProperties ref='r'/></IsDefinedBy><IsTypedBy ref='t'/></IfcBeam>
         <IfcBeam id='b2'><IsDefinedBy><IfcRelDefinesByProperties id='r'><RelatedObjects><IfcBeam ref='b4'/><IfcBeam ref='b2'/></RelatedObjects></IfcRelDefinesByProperties></IsDefinedBy><IsTypedBy id='t'/></IfcBeam>
         <IfcBeam id='b3'><IsDefinedBy><IfcRelDefinesByProperties ref='r' xsi:nil='true'/></IsDefinedBy><IsTypedBy ref='t' xsi:nil='true'/></IfcBeam>
         <IfcBeam id='b4'/>",
    );
    let related = |label: &str| {
        labelled(&exchange, label).entities("RelatedObjects").iter().map(|e| e.label().to_owned()).collect::<Vec<_>>()
    };
    assert_eq!(related("r"), ["b4", "b2", "b1", "b3"]);
    assert_eq!(related("t"), ["b1", "b2", "b3"]);
}

/// IFC4 allows one HasOpenings only, so several holes are written in ways of their own.
#[test]
fn several_openings_of_one_plate_are_all_read() {
    for body in [
        "<IfcPlate id='p'><HasOpenings id='r1'/><HasOpenings id='r2'/></IfcPlate>",
        "<IfcPlate id='p'><HasOpenings><IfcRelVoidsElement id='r1'/><IfcRelVoidsElement id='r2'/></HasOpenings></IfcPlate>",
        "<IfcRelVoidsElement id='r1'><RelatingBuildingElement xsi:type='IfcPlate' ref='p'/></IfcRelVoidsElement>
         <IfcPlate id='p'><HasOpenings id='r2'/></IfcPlate>",
    ] {
        let exchange = read_body(body);
        let relations = labelled(&exchange, "p").referring_by("IfcRelVoidsElement", "RelatingBuildingElement");
        assert_eq!(relations.iter().map(|e| e.label()).collect::<Vec<_>>(), ["r1", "r2"], "{body}");
    }
}

#[test]
fn an_element_with_ref_is_a_reference_whatever_it_holds() {
    let exchange = read_body(
        "<IfcMaterial id='m' Name='S355'/><IfcMaterialList><Materials><IfcMaterial ref='m' Name='S235'><Category>x</Category></IfcMaterial></Materials></IfcMaterialList>",
    );
    assert_eq!(exchange.entities.of_class("IfcMaterial").count(), 1);
    let materials = exchange.entities.of_class("IfcMaterialList").next().unwrap().entities("Materials");
    assert_eq!(materials[0].text("Name"), Some("S355"));
}

#[test]
fn nil_without_ref_is_absent() {
    let exchange = read_clean(
        "<IfcMaterial id='m'><Name xsi:nil='true'/><Category xsi:nil='1'>x</Category></IfcMaterial><IfcLocalPlacement id='l'><PlacementRelTo xsi:type='IfcLocalPlacement' xsi:nil='true'/></IfcLocalPlacement>",
    );
    assert!(labelled(&exchange, "m").values().all(|(_, value)| value.is_absent()));
    assert!(labelled(&exchange, "l").entity("PlacementRelTo").is_none());
    assert_eq!(exchange.entities.len(), 2);
}

#[test]
fn the_graph_knows_classes_and_supertypes() {
    let exchange =
        read_body("<IfcBeam id='b'/><IfcIShapeProfileDef id='i'/><IfcPolyline id='c'/><IfcMechanicalFastener id='f'/>");
    for (label, classes) in [
        ("b", &["IfcBeam", "IfcBuildingElement", "IfcElement", "IfcProduct", "IfcObject", "IfcRoot"][..]),
        ("i", &["IfcIShapeProfileDef", "IfcParameterizedProfileDef", "IfcProfileDef"]),
        ("c", &["IfcBoundedCurve", "IfcCurve", "IfcRepresentationItem"]),
        ("f", &["IfcElementComponent", "IfcElement"]),
    ] {
        classes.iter().for_each(|class| assert!(labelled(&exchange, label).is_a(class), "{label} {class}"));
        assert!(!labelled(&exchange, label).is_a("IfcColumn"));
    }
    let elements: Vec<&str> = exchange.entities.of_class("IfcElement").map(|e| e.label()).collect();
    assert_eq!(elements, ["b", "f"]);
}

#[test]
fn a_graph_can_be_built_by_hand() {
    let mut entities = faying::exchange::Entities::default();
    let point =
        entities.add("IfcCartesianPoint", [("Coordinates", Value::List(vec![Value::Number(1.0), Value::Integer(2)]))]);
    let placement = entities.add("IfcAxis2Placement2D", [("Location", Value::Entity(point))]);
    assert_eq!(entities.get(placement).entity("Location").unwrap().numbers("Coordinates"), Some(vec![1.0, 2.0]));
    assert_eq!(entities.get(point).referring().map(|e| e.id).collect::<Vec<_>>(), [placement]);
}
