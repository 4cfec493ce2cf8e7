//! What the versions of ifcXML from IFC4 on write differently: where relations stand, and what their schemas changed.

use super::*;

/// A building with a beam that has a hole, a type, properties and a material, as ADD2 nests its relations.
const ADD2: &str = "
<IfcProject id='pr' GlobalId='0000000000000000000001' Name='P'>
  <IsDecomposedBy><IfcRelAggregates><RelatedObjects><IfcBuilding ref='bu' xsi:nil='true'/></RelatedObjects></IfcRelAggregates></IsDecomposedBy>
  <RepresentationContexts><IfcGeometricRepresentationContext ContextType='Model'><HasSubContexts><IfcGeometricRepresentationSubContext ContextIdentifier='Body'/></HasSubContexts></IfcGeometricRepresentationContext></RepresentationContexts>
</IfcProject>
<IfcBuilding id='bu' GlobalId='0000000000000000000002'>
  <ContainsElements><IfcRelContainedInSpatialStructure><RelatedElements><IfcBeam ref='be' xsi:nil='true'/></RelatedElements></IfcRelContainedInSpatialStructure></ContainsElements>
</IfcBuilding>
<IfcBeam id='be' GlobalId='0000000000000000000003'>
  <IsTypedBy><RelatingType xsi:type='IfcBeamType' Name='T'/></IsTypedBy>
  <IsDefinedBy><IfcRelDefinesByProperties><RelatingPropertyDefinition><IfcPropertySet Name='S'/></RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>
  <HasOpenings><RelatedOpeningElement xsi:type='IfcOpeningElement' GlobalId='0000000000000000000004'/></HasOpenings>
</IfcBeam>
<IfcMaterial Name='S355'><HasProperties><IfcMaterialProperties Name='Pset_MaterialSteel'/></HasProperties></IfcMaterial>";

/// The same where types and openings are related from outside.
const ADD1: &str = "
<IfcProject id='pr' GlobalId='0000000000000000000001' Name='P'>
  <IsDecomposedBy><IfcRelAggregates><RelatedObjects><IfcBuilding ref='bu' xsi:nil='true'/></RelatedObjects></IfcRelAggregates></IsDecomposedBy>
  <RepresentationContexts><IfcGeometricRepresentationContext ContextType='Model'><HasSubContexts><IfcGeometricRepresentationSubContext ContextIdentifier='Body'/></HasSubContexts></IfcGeometricRepresentationContext></RepresentationContexts>
</IfcProject>
<IfcBuilding id='bu' GlobalId='0000000000000000000002'>
  <ContainsElements><IfcRelContainedInSpatialStructure><RelatedElements><IfcBeam ref='be' xsi:nil='true'/></RelatedElements></IfcRelContainedInSpatialStructure></ContainsElements>
</IfcBuilding>
<IfcBeam id='be' GlobalId='0000000000000000000003'>
  <IsDefinedBy><IfcRelDefinesByProperties><RelatingPropertyDefinition><IfcPropertySet Name='S'/></RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>
</IfcBeam>
<IfcRelDefinesByType><RelatedObjects><IfcBeam ref='be' xsi:nil='true'/></RelatedObjects><RelatingType xsi:type='IfcBeamType' Name='T'/></IfcRelDefinesByType>
<IfcRelVoidsElement><RelatingBuildingElement xsi:type='IfcBeam' ref='be' xsi:nil='true'/><RelatedOpeningElement xsi:type='IfcOpeningElement' GlobalId='0000000000000000000004'/></IfcRelVoidsElement>
<IfcMaterial Name='S355'><HasProperties><IfcMaterialProperties Name='Pset_MaterialSteel'/></HasProperties></IfcMaterial>";

/// The same with every relation outside and with both ends, the objects of a property set as one typed element.
const FIRST: &str = "
<IfcProject id='pr' GlobalId='0000000000000000000001' Name='P'>
  <RepresentationContexts><IfcGeometricRepresentationContext ContextType='Model'><HasSubContexts><IfcGeometricRepresentationSubContext ContextIdentifier='Body'/></HasSubContexts></IfcGeometricRepresentationContext></RepresentationContexts>
</IfcProject>
<IfcRelAggregates><RelatingObject xsi:type='IfcProject' ref='pr' xsi:nil='true'/><RelatedObjects><IfcBuilding id='bu' GlobalId='0000000000000000000002'/></RelatedObjects></IfcRelAggregates>
<IfcRelContainedInSpatialStructure><RelatedElements><IfcBeam ref='be' xsi:nil='true'/></RelatedElements><RelatingStructure xsi:type='IfcBuilding' ref='bu' xsi:nil='true'/></IfcRelContainedInSpatialStructure>
<IfcRelDefinesByProperties><RelatedObjects xsi:type='IfcBeam' id='be' GlobalId='0000000000000000000003'/><RelatingPropertyDefinition><IfcPropertySet Name='S'/></RelatingPropertyDefinition></IfcRelDefinesByProperties>
<IfcRelDefinesByType><RelatedObjects><IfcBeam ref='be' xsi:nil='true'/></RelatedObjects><RelatingType xsi:type='IfcBeamType' Name='T'/></IfcRelDefinesByType>
<IfcRelVoidsElement><RelatingBuildingElement xsi:type='IfcBeam' ref='be' xsi:nil='true'/><RelatedOpeningElement xsi:type='IfcOpeningElement' GlobalId='0000000000000000000004'/></IfcRelVoidsElement>
<IfcMaterial Name='S355'><HasProperties><IfcMaterialProperties Name='Pset_MaterialSteel'/></HasProperties></IfcMaterial>";

/// Namespaces as the XSD files have them.
const NAMESPACES: [(&str, &str); 4] = [
    ("http://www.buildingsmart-tech.org/ifcXML/IFC4/Add2", "IFC4 ifcXML"),
    ("http://www.buildingsmart-tech.org/ifcXML/IFC4/Add1", "IFC4 ADD1 ifcXML"),
    ("http://www.buildingsmart-tech.org/ifcXML/IFC4/final", "IFC4 (first edition) ifcXML"),
    ("https://standards.buildingsmart.org/IFC/RELEASE/IFC4/3/DEV/ef03d81", "IFC4X3 ifcXML"),
];

fn read_as(namespace: &str, body: &str) -> Exchange {
    let document = format!(
        "<ifcXML xmlns='{namespace}' xmlns:xsi='http://www.w3.org/2001/XMLSchema-instance'>\n{body}\n</ifcXML>"
    );
    read(document.as_bytes(), "t.ifcxml").unwrap()
}

/// Writers mix the forms of their versions, so every form is read in every version.
#[test]
fn relations_may_stand_where_any_version_puts_them() {
    let expected = graph(&read_as(NAMESPACES[0].0, ADD2));
    assert_eq!(expected.len(), 15);
    for (namespace, form) in NAMESPACES {
        for body in [ADD2, ADD1, FIRST] {
            let exchange = read_as(namespace, body);
            assert_eq!((exchange.form.as_str(), &*exchange.problems), (form, &[][..]), "{body}");
            assert_eq!(graph(&exchange), expected, "{form} {body}");
        }
    }
}

/// What IFC4X3 writes otherwise than IFC4, and what the same is by STEP.
#[test]
fn ifc4x3_is_read_by_its_own_schema() {
    let body = "
<IfcPropertySingleValue id='pv' Name='a' Specification='s'><NominalValue><IfcLabel-wrapper>x</IfcLabel-wrapper></NominalValue></IfcPropertySingleValue>
<IfcLocalPlacement id='lp'><PlacementRelTo xsi:type='IfcLocalPlacement'><RelativePlacement><IfcAxis2Placement3D><Location xsi:type='IfcCartesianPoint' Coordinates='0 0 1'/></IfcAxis2Placement3D></RelativePlacement></PlacementRelTo>
  <RelativePlacement><IfcAxis2Placement3D><Location xsi:type='IfcCartesianPoint' Coordinates='0 0 2'/></IfcAxis2Placement3D></RelativePlacement></LocalPlacement>
<IfcCartesianPointList2D id='pl' CoordList='0 0 200 0' TagList='a b'/>
<IfcPlate id='p' GlobalId='0000000000000000000001' PredefinedType='flange_plate'><HasOpenings GlobalId='0000000000000000000002'/><HasOpenings GlobalId='0000000000000000000003'/></IfcPlate>
<IfcDerivedUnit UnitType='torqueunit' Name='n'/>".replace("</LocalPlacement>", "</IfcLocalPlacement>");
    let step = "ISO-10303-21;HEADER;FILE_DESCRIPTION((''),'2;1');FILE_NAME('','',(''),(''),'','','');FILE_SCHEMA(('IFC4X3_ADD2'));ENDSEC;DATA;
#1=IFCPROPERTYSINGLEVALUE('a','s',IFCLABEL('x'),$);
#2=IFCLOCALPLACEMENT(#3,#4);
#3=IFCLOCALPLACEMENT($,#5);
#4=IFCAXIS2PLACEMENT3D(#6,$,$);
#5=IFCAXIS2PLACEMENT3D(#7,$,$);
#6=IFCCARTESIANPOINT((0.,0.,2.));
#7=IFCCARTESIANPOINT((0.,0.,1.));
#8=IFCCARTESIANPOINTLIST2D(((0.,0.),(200.,0.)),('a','b'));
#9=IFCPLATE('0000000000000000000001',$,$,$,$,$,$,$,.FLANGE_PLATE.);
#10=IFCRELVOIDSELEMENT('0000000000000000000002',$,$,$,#9,$);
#11=IFCRELVOIDSELEMENT('0000000000000000000003',$,$,$,#9,$);
#12=IFCDERIVEDUNIT($,.TORQUEUNIT.,$,'n');
ENDSEC;END-ISO-10303-21;";
    let step = read(step.as_bytes(), "t.ifc").unwrap();
    let exchange = read_as(NAMESPACES[3].0, &body);
    assert_eq!(graph(&exchange), graph(&step));
    let holes = labelled(&exchange, "p").referring_by("IfcRelVoidsElement", "RelatingBuildingElement");
    assert_eq!(holes.len(), 2);
    assert!(labelled(&exchange, "p").is_a("IfcBuiltElement"));
    let said: Vec<String> = exchange.problems.iter().map(|p| p.message.clone()).collect();
    assert_eq!(said, ["IfcRelVoidsElement has no RelatedOpeningElement and relates nothing"; 2]);
}

/// What one version renamed is no attribute of the others.
#[test]
fn an_attribute_of_another_version_is_kept_and_said() {
    for (namespace, has, has_not) in
        [(NAMESPACES[0].0, "Description", "Specification"), (NAMESPACES[3].0, "Specification", "Description")]
    {
        let exchange = read_as(
            namespace,
            &format!("<IfcPropertySingleValue id='a' {has}='x'/><IfcPropertySingleValue id='b' {has_not}='x'/>"),
        );
        assert_eq!(labelled(&exchange, "a").text(has), Some("x"));
        assert_eq!(labelled(&exchange, "b").text(has_not), Some("x"));
        assert_eq!(exchange.problems.len(), 1);
        assert_eq!(exchange.problems[0].message, format!("IfcPropertySingleValue has no attribute {has_not}"));
    }
}

/// The lists of lists of IFC4, as pos tells their rows.
#[test]
fn locations_of_a_load_are_rows() {
    let body = "<IfcStructuralLoadConfiguration id='s'><Locations><IfcLengthMeasure-wrapper pos='0 0'>0</IfcLengthMeasure-wrapper><IfcLengthMeasure-wrapper pos='1 0'>6</IfcLengthMeasure-wrapper></Locations></IfcStructuralLoadConfiguration>";
    for (namespace, form) in NAMESPACES {
        let exchange = read_as(namespace, body);
        assert_eq!(exchange.problems, [], "{form}");
        let rows = [0.0, 6.0].map(|at| Value::List(vec![Value::Number(at)]));
        assert_eq!(labelled(&exchange, "s").value("Locations"), Value::List(rows.into()));
    }
}

/// Versions between those of which there are tables are said to be read by another's.
#[test]
fn a_version_without_tables_says_by_which_it_is_read() {
    for version in ["IFC4X1", "IFC4X2"] {
        let exchange = read_as(&format!("x/{version}"), "<IfcMaterial/>");
        assert_eq!(exchange.form, format!("{version} ifcXML"));
        assert_eq!(problems_of(&exchange), [format!("1:1 the entities are of {version}, which is read as IFC4")]);
    }
}
