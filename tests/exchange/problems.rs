//! What is not understood is said, with its place, and does not stop the reading.

use super::*;

/// Entities, starting on line 2, and the problems they give.
const PROBLEMS: &[(&str, &[&str])] = &[
    (
        "<IfcAxis2Placement3D><Location ref='x'/></IfcAxis2Placement3D>",
        &["2:22 refers to x, but no entity has that id"],
    ),
    (
        "<IfcPolyline><Points><IfcCartesianPoint/>\n<IfcCartesianPoint ref='é'/></Points></IfcPolyline>",
        &["3:1 refers to é, but no entity has that id"],
    ),
    (
        "<IfcPlate GlobalId='0000000000000000000001'><HasOpenings ref='x'/></IfcPlate>",
        &["2:45 refers to x, but no entity has that id"],
    ),
    (
        "<IfcMaterial id='a'/>\n <IfcMaterial id='a'/>",
        &["3:2 the id a is given a second time; references to it mean the one at t.ifcxml:2:1"],
    ),
    (
        "<IfcExtrudedAreaSolid Depth='NaN'/>",
        &["2:1 Depth of IfcExtrudedAreaSolid is \"NaN\", a finite number is required"],
    ),
    (
        "<IfcCartesianPoint Coordinates='0 INF 0'/>",
        &["2:1 Coordinates of IfcCartesianPoint is \"INF\", a finite number is required"],
    ),
    (
        "<IfcExtrudedAreaSolid Depth='1e999'/>",
        &["2:1 Depth of IfcExtrudedAreaSolid is \"1e999\", a finite number is required"],
    ),
    (
        "<IfcExtrudedAreaSolid><Depth>12,5</Depth></IfcExtrudedAreaSolid>",
        &["2:23 Depth is \"12,5\", a number is required"],
    ),
    ("<IfcExtrudedAreaSolid Depth=''/>", &["2:1 Depth of IfcExtrudedAreaSolid is \"\", a number is required"]),
    (
        "<IfcPropertySingleValue><NominalValue><IfcInteger-wrapper>2.5</IfcInteger-wrapper></NominalValue></IfcPropertySingleValue>",
        &["2:39 IfcInteger-wrapper is \"2.5\", an integer is required"],
    ),
    (
        "<IfcHalfSpaceSolid AgreementFlag='yes'/>",
        &["2:1 AgreementFlag of IfcHalfSpaceSolid is \"yes\", true or false is required"],
    ),
    (
        "<IfcCartesianPointList3D CoordList='0 0 0 1'/>",
        &["2:1 CoordList of IfcCartesianPointList3D has 4 values, but rows of 3 are required"],
    ),
    ("<IfcMaterial Grade='S355'/>", &["2:1 IfcMaterial has no attribute Grade"]),
    ("<IfcMaterial><Grade>S355</Grade></IfcMaterial>", &["2:14 IfcMaterial has no attribute Grade"]),
    (
        "<IfcMaterial Name='a'><Name>b</Name></IfcMaterial>",
        &["2:23 Name of IfcMaterial is given more than once; the first is kept"],
    ),
    (
        "<IfcCartesianPoint Coordinates='1 2'><Coordinates>3 4</Coordinates></IfcCartesianPoint>",
        &["2:38 Coordinates of IfcCartesianPoint is given more than once; the first is kept"],
    ),
    ("<IfcMaterial Name='a' Name='b'/>", &["2:1 Name of IfcMaterial is given more than once; the first is kept"]),
    ("<IfcBolt Name='x'/>", &["2:1 IfcBolt is no entity of the schema; it is kept, but nothing of it is understood"]),
    (
        "<IfcProfileDefs/>",
        &["2:1 IfcProfileDefs is no entity of the schema; it is kept, but nothing of it is understood"],
    ),
    ("<IfcCurve/>", &["2:1 IfcCurve is abstract: one of its subtypes is required"]),
    (
        "<IfcExtrudedAreaSolid><Position><Location xsi:type='IfcBeam' GlobalId='0000000000000000000001'/></Position></IfcExtrudedAreaSolid>",
        &["2:23 Location of IfcAxis2Placement3D is IfcBeam, IfcCartesianPoint is required"],
    ),
    (
        "<IfcMaterial><Name><IfcMaterial/></Name></IfcMaterial>",
        &["2:1 Name of IfcMaterial is IfcMaterial, a plain value is required"],
    ),
    (
        "<IfcProduct><ObjectPlacement id='x'/></IfcProduct>",
        &[
            "2:1 IfcProduct is abstract: one of its subtypes is required",
            "2:13 ObjectPlacement does not say by xsi:type which entity it is",
        ],
    ),
    (
        "<IfcPropertySingleValue NominalValue='8.8'/>",
        &["2:1 NominalValue holds a bare value; an element such as IfcLabel-wrapper is required around it"],
    ),
    (
        "<IfcPropertySingleValue><NominalValue>8.8</NominalValue></IfcPropertySingleValue>",
        &["2:25 NominalValue holds a bare value; an element such as IfcLabel-wrapper is required around it"],
    ),
    (
        "<IfcPropertySingleValue><NominalValue><IfcGrade-wrapper>8.8</IfcGrade-wrapper></NominalValue></IfcPropertySingleValue>",
        &["2:39 IfcGrade is no type of the schema"],
    ),
    (
        "<IfcPropertySingleValue><NominalValue><IfcReal-wrapper>1</IfcReal-wrapper><IfcReal-wrapper>2</IfcReal-wrapper></NominalValue></IfcPropertySingleValue>",
        &["2:25 NominalValue holds 2 values where one is allowed; the first is read"],
    ),
    (
        "<IfcPolyline><Points><IfcCartesianPoint pos='first'/></Points></IfcPolyline>",
        &["2:22 pos=\"first\" of IfcCartesianPoint is no position: one or two whole numbers from 0 are allowed"],
    ),
    (
        "<IfcMaterialList><Materials><IfcMaterial href='other.ifcxml#m'/></Materials></IfcMaterialList>",
        &["2:29 IfcMaterial refers to \"other.ifcxml#m\": other documents are not read"],
    ),
    ("<beam/>", &["2:1 beam is not read: entities and one header are allowed here"]),
    (
        "<IfcPolyline><Points><IfcCartesianPoint/><point/></Points></IfcPolyline>",
        &["2:42 point is not read: an entity or a wrapped value is required here"],
    ),
    ("<IfcMaterial>S355</IfcMaterial>", &["2:14 IfcMaterial holds the text \"S355\", which is not read"]),
    ("<IfcMaterial Name='a &nbsp; b'/>", &["2:1 a text is kept as it stands: at 3..7: unrecognized entity `nbsp`"]),
    (
        "<IfcBeam id='b'/>\n<IfcColumn id='c' GlobalId='4000000000000000000000'/>",
        &[
            "2:1 IfcBeam b has no GlobalId",
            "3:1 the GlobalId \"4000000000000000000000\" of IfcColumn c is not 22 characters of 0-9 A-Z a-z _ $ from 0 to 3",
        ],
    ),
    (
        "<IfcBeam id='b' GlobalId='0000000000000000000001'/>\n<IfcBeam id='c' GlobalId='0000000000000000000001'/>",
        &["3:1 the GlobalId 0000000000000000000001 of IfcBeam c is also that of IfcBeam b"],
    ),
    (
        "<IfcRelDefinesByProperties id='r'><RelatingPropertyDefinition><IfcPropertySet/></RelatingPropertyDefinition></IfcRelDefinesByProperties>",
        &["2:1 IfcRelDefinesByProperties r has no RelatedObjects and relates nothing"],
    ),
    (
        "<IfcSite><IsDecomposedBy><IfcRelAggregates id='r'><RelatedObjects><IfcSite/></RelatedObjects></IfcRelAggregates></IsDecomposedBy></IfcSite>\n\
         <IfcBuilding><IsDecomposedBy><IfcRelAggregates ref='r'/></IsDecomposedBy></IfcBuilding>",
        &["3:14 this IfcRelAggregates has one RelatingObject already; this second one is not read"],
    ),
    (
        "<IfcSite><IsDecomposedBy><IfcMaterial/></IsDecomposedBy></IfcSite>",
        &["2:10 IfcMaterial has no RelatingObject and cannot stand here"],
    ),
];

#[test]
fn what_is_not_understood_is_said_with_its_place() {
    for (body, expected) in PROBLEMS {
        assert_eq!(problems_of(&read_body(body)), *expected, "{body}");
    }
}

#[test]
fn the_rest_of_the_entity_survives() {
    let exchange = read_body(
        "<IfcExtrudedAreaSolid id='s' Depth='NaN'><SweptArea xsi:type='IfcCircleProfileDef' Radius='12' ProfileName='&bad;'/><Position ref='no'/></IfcExtrudedAreaSolid>",
    );
    let solid = labelled(&exchange, "s");
    assert_eq!(solid.value("Depth"), Value::Absent);
    assert_eq!(solid.value("Position"), Value::Absent);
    let profile = solid.entity("SweptArea").unwrap();
    assert_eq!((profile.number("Radius"), profile.text("ProfileName")), (Some(12.0), Some("&bad;")));
    assert_eq!(exchange.problems.len(), 3);
}

#[test]
fn a_reference_to_nothing_leaves_its_list() {
    let exchange = read_body(
        "<IfcPolyline id='l'><Points><IfcCartesianPoint ref='no'/><IfcCartesianPoint id='p'/></Points></IfcPolyline>",
    );
    assert_eq!(labelled(&exchange, "l").entities("Points").iter().map(|e| e.label()).collect::<Vec<_>>(), ["p"]);
}

#[test]
fn unknown_entities_and_attributes_are_kept_as_they_are_written() {
    let exchange = read_body(
        "<IfcBuiltElement id='u' GlobalId='x' Thing='7'><Place><IfcCartesianPoint id='p' Coordinates='1 2'/></Place>
           <Inline Size='3'/><Several><IfcMaterial id='m1'/><IfcMaterial id='m2'/></Several><Words>a b</Words>
           <IsDefinedBy><IfcRelDefinesByProperties id='r'/></IsDefinedBy></IfcBuiltElement>
         <IfcMaterial id='m' Grade='S355'/>",
    );
    let unknown = labelled(&exchange, "u");
    assert_eq!(unknown.class(), "IfcBuiltElement");
    assert!(unknown.is_a("IfcBuiltElement") && !unknown.is_a("IfcElement"));
    assert_eq!((unknown.text("Thing"), unknown.text("Words")), (Some("7"), Some("a b")));
    assert_eq!(unknown.entity("Place").map(|e| e.numbers("Coordinates")), Some(Some(vec![1.0, 2.0])));
    assert_eq!(unknown.entity("Inline").map(|e| (e.class(), e.text("Size"))), Some(("", Some("3"))));
    assert_eq!(unknown.entities("Several").len(), 2);
    assert_eq!(labelled(&exchange, "r").entities("RelatedObjects")[0].label(), "u");
    assert_eq!(labelled(&exchange, "m").text("Grade"), Some("S355"));
}

#[test]
fn bytes_that_are_not_utf8_cost_one_character_only() {
    let text = document(
        "<IfcMaterial id='m' Name='Tr?ger'><Category>st?hlern</Category><Description><![CDATA[?]]></Description></IfcMaterial>",
    );
    let bytes: Vec<u8> = text.bytes().map(|b| if b == b'?' { 0xE4 } else { b }).collect();
    let exchange = read(&bytes, "t.ifcxml").unwrap();
    assert_eq!(labelled(&exchange, "m").text("Name"), Some("Tr\u{fffd}ger"));
    assert_eq!(labelled(&exchange, "m").text("Category"), Some("st\u{fffd}hlern"));
    let said = "a text holds bytes that are not UTF-8; they are read as the replacement character";
    assert_eq!(problems_of(&exchange), [format!("2:1 {said}"), format!("2:45 {said}"), format!("2:77 {said}")]);
}

#[test]
fn one_sort_of_problem_does_not_flood_the_list() {
    let point = "<IfcCartesianPoint Coordinates='NaN 0 0'/>\n";
    let exchange = read_body(&format!("{}<IfcMaterial Grade='x'/>", point.repeat(1000)));
    let problems = problems_of(&exchange);
    assert_eq!(problems.len(), 22);
    assert!(problems[19].starts_with("21:1 Coordinates"));
    assert_eq!(problems[20], "1002:1 IfcMaterial has no attribute Grade");
    assert_eq!(problems[21], "and 980 more of this kind: value that is not understood");
}

#[test]
fn problems_come_in_the_order_of_the_file() {
    let exchange = read_body(
        "<IfcAxis2Placement3D><Location ref='x'/></IfcAxis2Placement3D>\n<IfcMaterial Grade='x'/>\n<IfcAxis2Placement3D><Location ref='y'/></IfcAxis2Placement3D>",
    );
    let lines: Vec<u32> = exchange.problems.iter().map(|p| p.at.as_ref().unwrap().line).collect();
    assert_eq!(lines, [2, 3, 4]);
}
