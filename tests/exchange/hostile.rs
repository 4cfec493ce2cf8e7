//! Laws that hold for any bytes.

use proptest::prelude::*;

use super::*;

const SMALL: &str = r##"<?xml version="1.0" encoding="UTF-8"?>
<ifcXML xmlns="http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance"><header><name>n</name></header>
<IfcPlate id="p" GlobalId="0000000000000000000001"><HasOpenings ref="v"/><IsTypedBy><RelatingType xsi:type="IfcPlateType" ref="t"/></IsTypedBy>
<ObjectPlacement xsi:type="IfcLocalPlacement"><RelativePlacement><IfcAxis2Placement3D><Location Coordinates="1 2. 3e1"/></IfcAxis2Placement3D></RelativePlacement></ObjectPlacement></IfcPlate>
<IfcPropertySingleValue Name="a&amp;b"><NominalValue><IfcBoolean-wrapper pos="0">true</IfcBoolean-wrapper></NominalValue></IfcPropertySingleValue>
<IfcIndexedPolyCurve><Segments><IfcLineIndex-wrapper>1 2 3</IfcLineIndex-wrapper></Segments></IfcIndexedPolyCurve><IfcCartesianPointList2D CoordList="1 2 3 4"/></ifcXML>"##;

#[test]
fn every_proper_beginning_of_a_document_is_unreadable() {
    assert!(read(SMALL.as_bytes(), "t").is_ok());
    for end in 0..SMALL.len() {
        assert!(read(&SMALL.as_bytes()[..end], "t").is_err(), "{end}");
    }
}

#[test]
fn many_unknown_names_and_attributes_take_linear_time() {
    let entities: String = (0..70_000).map(|i| format!("<IfcNew{i}/>")).collect();
    let attributes: String = (0..70_000).map(|i| format!(" A{i}='x'")).collect();
    let exchange = read_body(&format!("{entities}<IfcMaterial{attributes}/>"));
    assert_eq!(exchange.entities.len(), 70_001);
}

proptest! {
    #[test]
    fn no_damage_panics(position in 0..SMALL.len(), damage in proptest::collection::vec(any::<u8>(), 0..8), cut in 0usize..40) {
        let mut bytes = SMALL.as_bytes().to_vec();
        let end = (position + cut).min(bytes.len());
        bytes.splice(position..end, damage);
        if let Ok(exchange) = read(&bytes, "t") {
            graph(&exchange);
        }
    }

    #[test]
    fn any_elements_in_any_order_are_survived(body in elements()) {
        let exchange = read_body(&body);
        for entity in exchange.entities.all() {
            prop_assert!(entity.values().all(|(_, value)| is_settled(value, &exchange)), "{body}");
            entity.referring().for_each(drop);
        }
    }

    #[test]
    fn any_text_comes_back(text in "[ -~äß€😀]{0,30}") {
        let escaped = text.replace('&', "&amp;").replace('<', "&lt;").replace('"', "&quot;");
        let body = format!("<IfcMaterial id='m' Name=\"{escaped}\"><Category>{escaped}</Category></IfcMaterial>");
        let exchange = read_clean(&body);
        let expected = Some(text.trim()).filter(|t| !t.is_empty());
        prop_assert_eq!(labelled(&exchange, "m").text("Name"), expected);
        prop_assert_eq!(labelled(&exchange, "m").text("Category"), expected);
    }

    #[test]
    fn any_number_comes_back_exactly(number in proptest::num::f64::NORMAL | proptest::num::f64::ZERO) {
        let exchange = read_clean(&format!("<IfcCartesianPoint id='p' Coordinates='{number:e} {number}'/>"));
        prop_assert_eq!(labelled(&exchange, "p").numbers("Coordinates"), Some(vec![number, number]));
    }
}

/// Well-formed elements of what the reader gives a meaning, nested in any order.
fn elements() -> impl Strategy<Value = String> {
    let names = "IfcPlate|IfcFoo|IfcRelDefinesByProperties|IfcRelAggregates|IfcLocalPlacement|IfcBSplineSurfaceWithKnots|\
                 IfcLabel-wrapper|IfcLineIndex-wrapper|Foo-wrapper|IfcPropertySetDefinitionSet|IfcCartesianPoint|\
                 IsDefinedBy|IsDecomposedBy|HasOpenings|RelatedObjects|RelatingObject|RelatingPropertyDefinition|\
                 Name|ObjectPlacement|Coordinates|ControlPointsList|Foo|header";
    let marks = "|id='a'|ref='a'|id='b'|ref='b'|href='#c'|href='x'|xsi:nil='1'|xsi:type='IfcPlate'|xsi:type='IfcLabel'|\
                 xsi:type='IfcFoo'|pos='1'|pos='0 1'|Name='n'|Coordinates='1 x'|Foo='f'";
    let pick = |words: &'static str| proptest::sample::select(words.split('|').collect::<Vec<_>>());
    let texts = proptest::sample::select(vec!["", " ", "x", "1 2 3", "&amp;", "<![CDATA[]]>"]).prop_map(str::to_owned);
    texts.prop_recursive(8, 60, 5, move |inner| {
        let content = proptest::collection::vec(inner, 0..5).prop_map(|parts| parts.concat());
        (pick(names), pick(marks), content)
            .prop_map(|(name, mark, content)| format!("<{name} {mark}>{content}</{name}>"))
    })
}

/// Whether every entity that a value points to is one of the graph.
fn is_settled(value: View, exchange: &Exchange) -> bool {
    match value {
        View::Entity(id) => (id.0 as usize) < exchange.entities.len(),
        View::List(items) => items.iter().all(|item| is_settled(item, exchange)),
        View::Typed(_, inner) => is_settled(inner.view(), exchange),
        _ => true,
    }
}
