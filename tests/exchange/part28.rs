//! ifcXML by ISO 10303-28, the form of IFC2X3.

use super::*;

/// Namespaces as the XSD of IFC2X3 has them.
fn published(body: &str) -> String {
    format!(
        "<ex:iso_10303_28 version='2.0' xmlns:ex='urn:iso.org:standard:10303:part(28):version(2):xmlschema:common' xmlns:xsi='http://www.w3.org/2001/XMLSchema-instance'>
<ex:iso_10303_28_header><ex:name>n</ex:name><ex:author/></ex:iso_10303_28_header>
<uos xmlns='http://www.iai-tech.org/ifcXML/IFC2x3/FINAL' id='uos_1' configuration='i-ifc2x3'>
{body}
</uos></ex:iso_10303_28>"
    )
}

/// Namespaces as an older edition of ISO 10303-28 has them.
fn older(body: &str) -> String {
    let body = body.replace("ex:", "exp:").replace("<Ifc", "<ifc:Ifc").replace("</Ifc", "</ifc:Ifc");
    format!(
        "<doc:iso_10303_28 xmlns:doc='urn:oid:1.0.10303.28.2.1.3' xmlns:exp='urn:oid:1.0.10303.28.2.1.1' xmlns:ifc='http://www.iai-international.org/ifcXML/IFC2x2/FINAL' xmlns:xsi='http://www.w3.org/2001/XMLSchema-instance'>
<doc:iso_10303_28_header/><doc:express id='e' schema_name='IFC2X3' external='x.exp'/><doc:schema_population governing_schema='e'/>
<ifc:uos id='u' edo='' description='' configuration='i-ifc2x3' express='e'>
{body}
</ifc:uos></doc:iso_10303_28>"
    )
}

/// One joint's worth of every way in which the form writes a value.
const BODY: &str = "
<IfcProject id='p'><GlobalId>0000000000000000000001</GlobalId><Name>a &amp; b</Name><Description/><LongName xsi:nil='true'/></IfcProject>
<IfcSite id='site'><GlobalId>0000000000000000000002</GlobalId><CompositionType>element</CompositionType><RefLatitude ex:cType='list'><ex:long-wrapper pos='0'>51</ex:long-wrapper><ex:long-wrapper pos='1'>30</ex:long-wrapper><ex:long-wrapper pos='2'>0</ex:long-wrapper></RefLatitude></IfcSite>
<IfcRelAggregates id='ra'><RelatingObject><IfcProject ref='p' xsi:nil='true'/></RelatingObject><RelatedObjects ex:cType='set' ex:itemType='ifc:IfcObjectDefinition'><IfcSite ref='site' xsi:nil='true' pos='0'/></RelatedObjects></IfcRelAggregates>
<IfcMechanicalFastener id='f'><GlobalId>0000000000000000000003</GlobalId><ObjectPlacement><IfcLocalPlacement ref='lp' xsi:nil='true'/></ObjectPlacement><NominalDiameter>24.</NominalDiameter><NominalLength>8.E1</NominalLength></IfcMechanicalFastener>
<IfcLocalPlacement id='lp'><RelativePlacement><IfcAxis2Placement3D><Location><IfcCartesianPoint><Coordinates ex:cType='list'><IfcLengthMeasure pos='2'>3.5</IfcLengthMeasure><IfcLengthMeasure pos='0'>1.</IfcLengthMeasure><IfcLengthMeasure pos='1'>2.</IfcLengthMeasure></Coordinates></IfcCartesianPoint></Location>
<Axis><IfcDirection><DirectionRatios ex:cType='list'><ex:double-wrapper pos='0'>0.</ex:double-wrapper><ex:double-wrapper pos='1'>0.</ex:double-wrapper><ex:double-wrapper pos='2'>1.</ex:double-wrapper></DirectionRatios></IfcDirection></Axis></IfcAxis2Placement3D></RelativePlacement></IfcLocalPlacement>
<IfcPropertySet id='ps'><GlobalId>0000000000000000000004</GlobalId><Name>S</Name><HasProperties ex:cType='set'>
<IfcPropertySingleValue pos='1'><Name>t</Name><NominalValue><IfcLengthMeasure>0.02</IfcLengthMeasure></NominalValue></IfcPropertySingleValue>
<IfcPropertySingleValue pos='0'><Name>b</Name><NominalValue><IfcBoolean>true</IfcBoolean></NominalValue><Unit><IfcSIUnit id='u'><UnitType>lengthunit</UnitType><Prefix>milli</Prefix><Name>metre</Name></IfcSIUnit></Unit></IfcPropertySingleValue>
</HasProperties></IfcPropertySet>
<IfcRelDefinesByProperties id='rp'><RelatedObjects ex:cType='set'><IfcMechanicalFastener pos='0' ref='f' xsi:nil='true'/></RelatedObjects><RelatingPropertyDefinition><IfcPropertySet ref='ps' xsi:nil='true'/></RelatingPropertyDefinition></IfcRelDefinesByProperties>
<IfcTrimmedCurve id='tc'><BasisCurve><IfcCircle><Radius>1.</Radius></IfcCircle></BasisCurve><Trim1 ex:cType='set'><IfcParameterValue pos='0'>0.</IfcParameterValue></Trim1><Trim2 ex:cType='set'><IfcParameterValue pos='0'>90.</IfcParameterValue></Trim2><SenseAgreement>true</SenseAgreement><MasterRepresentation>parameter</MasterRepresentation></IfcTrimmedCurve>
<IfcMechanicalSteelMaterialProperties id='m'><Material><IfcMaterial><Name>S355</Name></IfcMaterial></Material><YieldStress>3.55E8</YieldStress></IfcMechanicalSteelMaterialProperties>";

/// The same by STEP.
const STEP: &str = "ISO-10303-21;HEADER;FILE_DESCRIPTION((''),'2;1');FILE_NAME('','',(''),(''),'','','');FILE_SCHEMA(('IFC2X3'));ENDSEC;DATA;
#1=IFCPROJECT('0000000000000000000001',$,'a & b','',$,$,$,$,$);
#2=IFCSITE('0000000000000000000002',$,$,$,$,$,$,$,.ELEMENT.,(51,30,0),$,$,$,$);
#3=IFCRELAGGREGATES($,$,$,$,#1,(#2));
#4=IFCMECHANICALFASTENER('0000000000000000000003',$,$,$,$,#5,$,$,24.,80.);
#5=IFCLOCALPLACEMENT($,#6);
#6=IFCAXIS2PLACEMENT3D(#7,#8,$);
#7=IFCCARTESIANPOINT((1.,2.,3.5));
#8=IFCDIRECTION((0.,0.,1.));
#9=IFCPROPERTYSET('0000000000000000000004',$,'S',$,(#10,#11));
#10=IFCPROPERTYSINGLEVALUE('b',$,IFCBOOLEAN(.T.),#12);
#11=IFCPROPERTYSINGLEVALUE('t',$,IFCLENGTHMEASURE(0.02),$);
#12=IFCSIUNIT(*,.LENGTHUNIT.,.MILLI.,.METRE.);
#13=IFCRELDEFINESBYPROPERTIES($,$,$,$,(#4),#9);
#14=IFCTRIMMEDCURVE(#15,(IFCPARAMETERVALUE(0.)),(IFCPARAMETERVALUE(90.)),.T.,.PARAMETER.);
#15=IFCCIRCLE($,1.);
#16=IFCMECHANICALSTEELMATERIALPROPERTIES(#17,$,$,$,$,$,355.E6,$,$,$,$,$,$);
#17=IFCMATERIAL('S355');
ENDSEC;END-ISO-10303-21;";

#[test]
fn both_families_of_namespaces_give_the_graph_of_the_step_file() {
    let step = read(STEP.as_bytes(), "t.ifc").unwrap();
    assert_eq!(step.entities.len(), 17);
    for document in [published(BODY), older(BODY)] {
        let exchange = read(document.as_bytes(), "t.ifcxml").unwrap();
        assert_eq!((exchange.form.as_str(), &*exchange.problems), ("IFC2X3 ifcXML", &[][..]), "{document}");
        assert_eq!(graph(&exchange), graph(&step));
    }
}

#[test]
fn an_entity_knows_its_place_and_who_relates_it() {
    let exchange = read(published(BODY).as_bytes(), "t.ifcxml").unwrap();
    assert_eq!(labelled(&exchange, "p").place().to_string(), "t.ifcxml:5:1");
    let related = labelled(&exchange, "f").referring_by("IfcRelDefines", "RelatedObjects");
    assert_eq!(related.iter().map(|e| e.label()).collect::<Vec<_>>(), ["rp"]);
}

/// The namespace of the element that holds the entities counts first, then what else tells the schema.
#[test]
fn the_version_is_told_by_the_entities_own_element() {
    let form = |document: &str| {
        let exchange = read(document.as_bytes(), "t").unwrap();
        (exchange.form.clone(), problems_of(&exchange))
    };
    let plain = |version: &str| (format!("{version} ifcXML"), Vec::<String>::new());
    for (document, expected) in [
        ("<iso_10303_28 xmlns='x/IFC2x2'><uos xmlns='x/IFC2x3'/></iso_10303_28>", plain("IFC2X3")),
        ("<iso_10303_28 xmlns:i='x/IFC2x3'><i:uos/></iso_10303_28>", plain("IFC2X3")),
        ("<iso_10303_28 xmlns='x/IFC2x2'><uos configuration='i-ifc2x3'/></iso_10303_28>", plain("IFC2X3")),
        ("<iso_10303_28><express schema_name='IFC2X3'/><uos/></iso_10303_28>", plain("IFC2X3")),
        ("<uos xmlns:xsi='s' xsi:schemaLocation='x/IFC2x3 IFC2X3.xsd'/>", plain("IFC2X3")),
        ("<iso_10303_28><uos xmlns='x/IFC4/ADD2'/></iso_10303_28>", plain("IFC4")),
        ("<iso_10303_28><uos xmlns='x/IFC2x3'/><uos xmlns='x/IFC2x3'/></iso_10303_28>", plain("IFC2X3")),
        (
            "<iso_10303_28><uos xmlns='x/IFC2x2'/></iso_10303_28>",
            ("IFC2X2 ifcXML".into(), vec!["1:15 the entities are of IFC2X2, which is read as IFC2X3".into()]),
        ),
        (
            "<iso_10303_28><uos xmlns='x/IFC2x3'/><uos xmlns='x/IFC4/Add2'/></iso_10303_28>",
            ("IFC2X3 ifcXML".into(), vec!["1:38 the entities are of IFC4, which is read as IFC2X3".into()]),
        ),
        (
            "<uos xmlns='urn:x'/>",
            (
                "IFC2X3 ifcXML".into(),
                vec!["1:1 the namespace \"urn:x\" names no version of IFC that is known: read as IFC2X3".into()],
            ),
        ),
        (
            "<iso_10303_28><notes><IfcBeam/></notes><uos xmlns='x/IFC2x3'/></iso_10303_28>",
            ("IFC2X3 ifcXML".into(), vec!["1:15 notes is not read: a header and uos are allowed here".into()]),
        ),
    ] {
        assert_eq!(form(document), expected, "{document}");
    }
}

#[test]
fn entities_of_several_parts_of_a_document_are_one_graph() {
    let document = "<iso_10303_28><uos xmlns='IFC2x3'><IfcMaterialList id='l'><Materials><IfcMaterial ref='m'/></Materials></IfcMaterialList></uos><uos xmlns='IFC2x3'><IfcMaterial id='m'><Name>S355</Name></IfcMaterial></uos></iso_10303_28>";
    let exchange = read(document.as_bytes(), "t").unwrap();
    assert_eq!(exchange.problems, []);
    assert_eq!(labelled(&exchange, "l").entities("Materials")[0].text("Name"), Some("S355"));
}

/// Some writers put a value, or a reference to anything, where the schema derives one.
#[test]
fn a_derived_attribute_has_no_value() {
    let unit = "<IfcSIUnit id='u'><Dimensions><IfcDimensionalExponents ref='m' xsi:nil='true'/></Dimensions><UnitType>lengthunit</UnitType><Name>metre</Name></IfcSIUnit><IfcMaterial id='m'/>";
    let exchange = read(published(unit).as_bytes(), "t").unwrap();
    assert_eq!(exchange.problems, []);
    assert_eq!(labelled(&exchange, "u").value("Dimensions"), Value::Absent);
    assert_eq!(labelled(&exchange, "u").token("Name"), Some("METRE"));
}

/// The XSD of IFC2X3 knows no inverse attribute, and an attribute of a later version is none here.
#[test]
fn what_the_version_does_not_have_is_a_problem() {
    for (body, said) in [
        (
            "<IfcBeam><GlobalId>0000000000000000000001</GlobalId><PredefinedType>beam</PredefinedType></IfcBeam>",
            "4:53 IfcBeam has no attribute PredefinedType",
        ),
        (
            "<IfcMaterialProfileSet/>",
            "4:1 IfcMaterialProfileSet is no entity of the schema; it is kept, but nothing of it is understood",
        ),
        (
            "<IfcMaterial><Name>x</Name>text</IfcMaterial>",
            "4:28 IfcMaterial holds the text \"text\", which is not read",
        ),
        (
            "<IfcAxis2Placement3D><Location><IfcCartesianPoint ref='no' xsi:nil='true'/></Location></IfcAxis2Placement3D>",
            "4:32 refers to no, but no entity has that id",
        ),
        (
            "<IfcAxis2Placement3D><Location><IfcDirection/></Location></IfcAxis2Placement3D>",
            "4:1 Location of IfcAxis2Placement3D is IfcDirection, IfcCartesianPoint is required",
        ),
        ("<IfcCircle><Radius>NaN</Radius></IfcCircle>", "4:12 Radius is \"NaN\", a finite number is required"),
    ] {
        let exchange = read(published(body).as_bytes(), "t").unwrap();
        assert_eq!(problems_of(&exchange), [said], "{body}");
    }
}

#[test]
fn every_proper_beginning_of_a_document_is_unreadable() {
    let document = published("<IfcMaterial id='m'><Name>S355</Name></IfcMaterial>");
    assert!(read(document.as_bytes(), "t").is_ok());
    for end in 0..document.len() {
        assert!(read(&document.as_bytes()[..end], "t").is_err(), "{end}");
    }
}
