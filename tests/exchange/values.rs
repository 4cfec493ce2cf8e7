//! Values of every kind.

use super::*;

fn property(wrapped: &str) -> Value {
    let exchange = read_clean(&format!(
        "<IfcPropertySingleValue id='p'><NominalValue>{wrapped}</NominalValue></IfcPropertySingleValue>"
    ));
    labelled(&exchange, "p").value("NominalValue").to_value()
}

fn typed(name: &str, value: Value) -> Value {
    Value::Typed(name.into(), value.into())
}

#[test]
fn a_wrapped_value_keeps_its_type() {
    for (wrapped, expected) in [
        ("<IfcLabel-wrapper> 8.8 </IfcLabel-wrapper>", typed("IfcLabel", Value::Text(" 8.8 ".into()))),
        ("<IfcText-wrapper/>", typed("IfcText", Value::Text("".into()))),
        ("<IfcIdentifier>B1</IfcIdentifier>", typed("IfcIdentifier", Value::Text("B1".into()))),
        (
            "<IfcPressureMeasure-wrapper>\n 3.55E+02\n</IfcPressureMeasure-wrapper>",
            typed("IfcPressureMeasure", Value::Number(355.0)),
        ),
        (
            "<IfcPositiveLengthMeasure-wrapper>1.E-005</IfcPositiveLengthMeasure-wrapper>",
            typed("IfcPositiveLengthMeasure", Value::Number(1e-5)),
        ),
        ("<IfcCountMeasure-wrapper>2</IfcCountMeasure-wrapper>", typed("IfcCountMeasure", Value::Number(2.0))), // NUMBER
        ("<IfcInteger-wrapper>3.</IfcInteger-wrapper>", typed("IfcInteger", Value::Integer(3))),
        ("<IfcBoolean-wrapper>1</IfcBoolean-wrapper>", typed("IfcBoolean", Value::Truth(true))),
        ("<IfcBoolean-wrapper>FALSE</IfcBoolean-wrapper>", typed("IfcBoolean", Value::Truth(false))),
        ("<IfcLogical-wrapper>unknown</IfcLogical-wrapper>", typed("IfcLogical", Value::Token("UNKNOWN".into()))),
        (
            "<IfcCompoundPlaneAngleMeasure-wrapper>51 30 0</IfcCompoundPlaneAngleMeasure-wrapper>",
            typed("IfcCompoundPlaneAngleMeasure", Value::List([51, 30, 0].map(Value::Integer).into())),
        ),
    ] {
        assert_eq!(property(wrapped), expected, "{wrapped}");
    }
}

#[test]
fn a_list_chosen_in_a_select_is_read() {
    let exchange = read_clean(
        "<IfcIndexedPolyCurve id='c'><Segments><IfcLineIndex-wrapper>1 2</IfcLineIndex-wrapper><IfcArcIndex-wrapper>2 3 4</IfcArcIndex-wrapper></Segments></IfcIndexedPolyCurve>",
    );
    let list = |items: &[i64]| Value::List(items.iter().copied().map(Value::Integer).collect());
    let expected = vec![typed("IfcLineIndex", list(&[1, 2])), typed("IfcArcIndex", list(&[2, 3, 4]))];
    assert_eq!(labelled(&exchange, "c").value("Segments"), Value::List(expected));
}

#[test]
fn a_set_of_property_sets_is_read() {
    let exchange = read_body(
        "<IfcRelDefinesByProperties id='r'><RelatingPropertyDefinition><IfcPropertySetDefinitionSet-wrapper><IfcPropertySet id='s1'/><IfcPropertySet ref='s2'/></IfcPropertySetDefinitionSet-wrapper></RelatingPropertyDefinition></IfcRelDefinesByProperties><IfcPropertySet id='s2'/>",
    );
    let sets = labelled(&exchange, "r").entities("RelatingPropertyDefinition");
    assert_eq!(sets.iter().map(|e| e.label()).collect::<Vec<_>>(), ["s1", "s2"]);
}

#[test]
fn pos_orders_a_list() {
    let points = |a: &str, b: &str, c: &str| {
        let body = format!(
            "<IfcPolyline id='l'><Points><IfcCartesianPoint id='a' {a}/><IfcCartesianPoint ref='b' {b}/><IfcCartesianPoint id='c' {c}/></Points></IfcPolyline><IfcCartesianPoint id='b'/>"
        );
        let exchange = read_clean(&body);
        labelled(&exchange, "l").entities("Points").iter().map(|e| e.label()).collect::<String>()
    };
    assert_eq!(points("", "", ""), "abc");
    assert_eq!(points("pos='2'", "pos='0'", "pos='1'"), "bca");
    assert_eq!(points("pos='10'", "pos='9'", "pos='8'"), "cba");
}

#[test]
fn lists_of_lists_are_nested_again() {
    let rows = |rows: &[&[f64]]| {
        Value::List(rows.iter().map(|row| Value::List(row.iter().copied().map(Value::Number).collect())).collect())
    };
    let exchange = read_clean(
        "<IfcCartesianPointList2D id='two' CoordList='0 0 200 0 200 450'/>
         <IfcCartesianPointList3D id='three'><CoordList>0 0 1
            2 0 1</CoordList></IfcCartesianPointList3D>
         <IfcTriangulatedFaceSet id='t' CoordIndex='1 2 3 3 2 4' Closed='true'/>
         <IfcIndexedPolygonalFaceWithVoids id='v' CoordIndex='1 2 3'><InnerCoordIndices><Seq-IfcPositiveInteger-wrapper>4 5 6</Seq-IfcPositiveInteger-wrapper><Seq-IfcPositiveInteger-wrapper>7 8 9 10</Seq-IfcPositiveInteger-wrapper></InnerCoordIndices></IfcIndexedPolygonalFaceWithVoids>
         <IfcStructuralLoadConfiguration id='s'><Locations><IfcLengthMeasure-wrapper pos='1 0'>6000</IfcLengthMeasure-wrapper><IfcLengthMeasure-wrapper pos='0 0'>0</IfcLengthMeasure-wrapper><IfcLengthMeasure-wrapper pos='1 1'>5</IfcLengthMeasure-wrapper></Locations></IfcStructuralLoadConfiguration>",
    );
    assert_eq!(labelled(&exchange, "two").value("CoordList"), rows(&[&[0.0, 0.0], &[200.0, 0.0], &[200.0, 450.0]]));
    assert_eq!(labelled(&exchange, "three").value("CoordList"), rows(&[&[0.0, 0.0, 1.0], &[2.0, 0.0, 1.0]]));
    assert_eq!(labelled(&exchange, "s").value("Locations"), rows(&[&[0.0], &[6000.0, 5.0]]));
    let integers = |rows: &[&[i64]]| {
        Value::List(rows.iter().map(|row| Value::List(row.iter().copied().map(Value::Integer).collect())).collect())
    };
    assert_eq!(labelled(&exchange, "t").value("CoordIndex"), integers(&[&[1, 2, 3], &[3, 2, 4]]));
    assert_eq!(labelled(&exchange, "v").value("InnerCoordIndices"), integers(&[&[4, 5, 6], &[7, 8, 9, 10]]));
}

#[test]
fn enumerations_are_upper_case() {
    for given in ["milli", "MILLI", ".Milli."] {
        let exchange = read_clean(&format!("<IfcSIUnit id='u' UnitType='lengthunit' Prefix='{given}' Name='metre'/>"));
        assert_eq!(labelled(&exchange, "u").token("Prefix"), Some("MILLI"));
    }
}

#[test]
fn text_is_unescaped_wherever_it_stands() {
    let exchange = read_clean(
        "<IfcMaterial id='m' Name='&lt;S&#x33;55&gt; &amp; &quot;x&quot;'><Description>a&lt;b &amp; c&#65;<!-- no --> d</Description><Category><![CDATA[<&>]]></Category></IfcMaterial>",
    );
    let material = labelled(&exchange, "m");
    assert_eq!(material.text("Name"), Some("<S355> & \"x\""));
    assert_eq!(material.text("Description"), Some("a<b & cA d"));
    assert_eq!(material.text("Category"), Some("<&>"));
}

#[test]
fn other_encodings_are_read() {
    let plain = "<ifcXML xmlns='ifc4/add2'><IfcMaterial id='m' Name='Stahl für Träger'/></ifcXML>";
    let name = |bytes: Vec<u8>| {
        let exchange = read(&bytes, "t.ifcxml").unwrap();
        assert_eq!(exchange.problems, []);
        (labelled(&exchange, "m").text("Name").unwrap().to_owned(), labelled(&exchange, "m").place().column)
    };
    let expected = ("Stahl für Träger".to_owned(), 27);
    assert_eq!(name(plain.into()), expected);
    assert_eq!(name(format!("\u{feff}{plain}").into()), expected);
    assert_eq!(name(format!("\u{feff}{plain}").encode_utf16().flat_map(u16::to_le_bytes).collect()), expected);
    assert_eq!(name(format!("\u{feff}{plain}").encode_utf16().flat_map(u16::to_be_bytes).collect()), expected);
    let declared = format!("<?xml version='1.0' encoding='ISO-8859-1'?>\n{plain}");
    assert_eq!(name(declared.chars().map(|c| c as u8).collect()), expected);
}

#[test]
fn places_count_lines_and_characters_from_one() {
    let text = "<ifcXML xmlns='ifc4/add2'>\r\n\t<IfcMaterial\n id='m1' Name='äöü€'/><!-- ü\n --> é<IfcMaterial id='m2'/>\n<IfcMaterialList id='l'><Materials>\n  <IfcMaterial id='m3'/></Materials></IfcMaterialList></ifcXML>";
    let exchange = read(text.as_bytes(), "dir/model.ifcxml").unwrap();
    let place = |label: &str| labelled(&exchange, label).place().to_string();
    assert_eq!(place("m1"), "dir/model.ifcxml:2:2");
    assert_eq!(place("m2"), "dir/model.ifcxml:4:7");
    assert_eq!(place("l"), "dir/model.ifcxml:5:1");
    assert_eq!(place("m3"), "dir/model.ifcxml:6:3");
}
