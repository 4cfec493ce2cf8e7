//! Geometry that means harm: it is rejected with a reason, soon, and nothing else happens.

use faying::exchange::{Entities, Exchange, Id, Value, read};
use faying::rulebook::Rulebook;
use faying::shop::{Steelwork, take_up};
use proptest::prelude::*;

use super::model::*;
use super::polyhedra::{Body, ring};

/// A graph by hand, for what no file could hold.
#[derive(Default)]
struct Graph(Entities);

impl Graph {
    fn add<'n>(&mut self, class: &str, attributes: impl IntoIterator<Item = (&'n str, Value)>) -> Value {
        Value::Entity(self.0.add(class, attributes))
    }

    fn point(&mut self, xyz: [f64; 3]) -> Value {
        self.add("IfcCartesianPoint", [("Coordinates", Value::List(xyz.map(Value::Number).to_vec()))])
    }

    fn element(&mut self, items: Vec<Value>) {
        let body = self.add(
            "IfcShapeRepresentation",
            [("RepresentationIdentifier", Value::Text("Body".into())), ("Items", Value::List(items))],
        );
        let shape = self.add("IfcProductDefinitionShape", [("Representations", Value::List(vec![body]))]);
        self.add("IfcBuildingElementProxy", [("Representation", shape)]);
    }

    fn taken(mut self) -> Steelwork {
        let unit = self.add(
            "IfcSIUnit",
            [
                ("UnitType", Value::Token("LENGTHUNIT".into())),
                ("Prefix", Value::Token("MILLI".into())),
                ("Name", Value::Token("METRE".into())),
            ],
        );
        let units = self.add("IfcUnitAssignment", [("Units", Value::List(vec![unit]))]);
        self.add("IfcProject", [("UnitsInContext", units)]);
        let exchange = Exchange { form: String::new(), entities: self.0, problems: Vec::new() };
        take_up(&exchange, &Rulebook::embedded())
    }
}

#[track_caller]
fn rejected(steelwork: &Steelwork, word: &str) {
    let reasons: Vec<&str> = steelwork.rejected.iter().map(|r| r.reason.as_str()).collect();
    assert!(reasons.iter().any(|r| r.contains(word)), "{word}: {reasons:?}");
    assert!(steelwork.members.is_empty() && steelwork.plates.is_empty() && steelwork.bolts.is_empty());
}

#[test]
fn coordinates_out_of_reach_are_rejected() {
    for far in ["1e308", "1e200", "1e15"] {
        let mut body = Body::prism(&ring((0.0, 0.0), 10.0, 12), &[], 0.0, 70.0).faceted();
        body = body.replacen("Coordinates=\"10 0 0\"", &format!("Coordinates=\"{far} 0 0\""), 1);
        assert!(body.contains(far));
        rejected(&taken(&element("IfcPlate", r#"id="i1""#, "", &body, "")), "out of all reach");
    }
    let mut graph = Graph::default();
    let list = Value::List(vec![Value::List(vec![Value::Number(f64::NAN); 3]); 4]);
    let points = graph.add("IfcCartesianPointList3D", [("CoordList", list)]);
    let triangle = Value::List([1, 2, 3].map(Value::Integer).to_vec());
    let set =
        graph.add("IfcTriangulatedFaceSet", [("Coordinates", points), ("CoordIndex", Value::List(vec![triangle]))]);
    graph.element(vec![set]);
    rejected(&graph.taken(), "not finite");
}

#[test]
fn indices_that_lead_nowhere_are_rejected() {
    for index in ["1 2 9", "0 1 2", "-1 2 3", "1 2 1000000000000"] {
        let solid = format!(
            r#"<IfcTriangulatedFaceSet CoordIndex="{index}"><Coordinates CoordList="0 0 0 1 0 0 0 1 0"/></IfcTriangulatedFaceSet>"#
        );
        rejected(&taken(&element("IfcPlate", r#"id="i1""#, "", &solid, "")), "can't be followed");
    }
}

#[test]
fn faces_without_extent_are_rejected() {
    let flat = Body::prism(&[(0.0, 0.0), (100.0, 0.0), (100.0, 100.0)], &[], 0.0, 0.0);
    let line = Body::prism(&[(0.0, 0.0), (100.0, 0.0), (200.0, 0.0)], &[], 0.0, 100.0);
    for body in [flat, line, Body::default()] {
        let steelwork = taken(&element("IfcPlate", r#"id="i1""#, "", &body.faceted(), ""));
        assert_eq!(steelwork.rejected.len(), 1);
    }
}

#[test]
fn a_body_that_does_not_close_is_no_prism() {
    let mut open = Body::prism(&ring((0.0, 0.0), 50.0, 8), &[], 0.0, 10.0);
    open.faces.truncate(3);
    let steelwork = taken(&element("IfcPlate", r#"id="i1""#, "", &open.faceted(), ""));
    assert!(steelwork.plates.is_empty() && steelwork.members.iter().all(|m| m.not_assessed.is_some()));
    assert_eq!(steelwork.members.len() + steelwork.rejected.len(), 1);
}

#[test]
fn a_scan_is_no_part() {
    let mut graph = Graph::default();
    let row = |i: usize| Value::List([i as f64, (i * i % 97) as f64, (i % 89) as f64].map(Value::Number).to_vec());
    let points = graph.add("IfcCartesianPointList3D", [("CoordList", Value::List((0..250_000).map(row).collect()))]);
    let set = graph.add("IfcTriangulatedFaceSet", [("Coordinates", points)]);
    graph.element(vec![set]);
    rejected(&graph.taken(), "more than 200000 points");
}

#[test]
fn maps_of_maps_end() {
    // Each level maps the one below ten times: 10^12 solids.
    let mut graph = Graph::default();
    let origin = graph.point([0.0; 3]);
    let axes = graph.add("IfcAxis2Placement3D", [("Location", origin.clone())]);
    let operator = graph.add("IfcCartesianTransformationOperator3D", [("LocalOrigin", origin)]);
    let mut item = graph.add("IfcBlock", ["XLength", "YLength", "ZLength"].map(|side| (side, Value::Number(10.0))));
    for _ in 0..12 {
        let shown = graph.add("IfcShapeRepresentation", [("Items", Value::List(vec![item; 10]))]);
        let map = graph.add("IfcRepresentationMap", [("MappingOrigin", axes.clone()), ("MappedRepresentation", shown)]);
        item = graph.add("IfcMappedItem", [("MappingSource", map), ("MappingTarget", operator.clone())]);
    }
    graph.element(vec![item.clone()]);
    graph.element(vec![item]);
    rejected(&graph.taken(), "more than 10000");
}

#[test]
fn boolean_trees_that_fan_out_or_run_in_circles_end() {
    let mut graph = Graph::default();
    let mut item = graph.add("IfcBlock", ["XLength", "YLength", "ZLength"].map(|side| (side, Value::Number(10.0))));
    for _ in 0..60 {
        let both =
            [("Operator", Value::Token("UNION".into())), ("FirstOperand", item.clone()), ("SecondOperand", item)];
        item = graph.add("IfcBooleanResult", both);
    }
    graph.element(vec![item]);
    rejected(&graph.taken(), "");

    let mut graph = Graph::default();
    // The entity that comes next is the graph's third.
    let own = Value::Entity(Id(0));
    for operator in ["DIFFERENCE", "UNION"] {
        graph.add(
            "IfcBooleanResult",
            [
                ("Operator", Value::Token(operator.into())),
                ("FirstOperand", own.clone()),
                ("SecondOperand", own.clone()),
            ],
        );
    }
    graph.element(vec![own]);
    rejected(&graph.taken(), "more than 128 times");
}

#[test]
fn profiles_of_profiles_end() {
    let mut graph = Graph::default();
    let mut profile = graph.add("IfcCircleProfileDef", [("Radius", Value::Number(10.0))]);
    for _ in 0..40 {
        profile = graph.add("IfcCompositeProfileDef", [("Profiles", Value::List(vec![profile; 16]))]);
    }
    let solid = graph.add("IfcExtrudedAreaSolid", [("SweptArea", profile), ("Depth", Value::Number(100.0))]);
    graph.element(vec![solid]);
    rejected(&graph.taken(), "made of profiles");
}

#[test]
fn a_group_of_very_many_bolts_is_read() {
    let solids: String = (0..3000)
        .map(|i| {
            let at = format!("{} {} 0", i % 50 * 60, i / 50 * 60);
            format!(
                r#"<IfcExtrudedAreaSolid Depth="70">{}<Position><Location Coordinates="{at}"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
                circle(10.0)
            )
        })
        .collect();
    assert_eq!(taken(&element("IfcMechanicalFastener", r#"id="i1" Name="M20""#, "", &solids, "")).bolts.len(), 3000);
}

proptest! {
    /// Points and faces of any numbers: every element still ends somewhere, and no number that is no number gets out.
    #[test]
    fn any_faces_end_somewhere(
        points in proptest::collection::vec(
            (prop_oneof![-200.0..200.0f64, Just(0.0), Just(1e9), -1e-9..1e-9], -200.0..200.0f64, prop_oneof![Just(0.0), Just(50.0)]), 3..24),
        faces in proptest::collection::vec(proptest::collection::vec(1usize..26, 3..8), 1..20),
    ) {
        let list: Vec<String> = points.iter().map(|(x, y, z)| format!("{x} {y} {z}")).collect();
        let faces: String = faces
            .iter()
            .map(|face| {
                let face: Vec<String> = face.iter().map(ToString::to_string).collect();
                format!(r#"<IfcIndexedPolygonalFace CoordIndex="{}"/>"#, face.join(" "))
            })
            .collect();
        let solid = format!(r#"<IfcPolygonalFaceSet><Coordinates CoordList="{}"/><Faces>{faces}</Faces></IfcPolygonalFaceSet>"#, list.join(" "));
        let xml = exchange(MM, &element("IfcBuildingElementProxy", r#"id="i1" Name="X""#, "", &solid, ""));
        let steelwork = take_up(&read(xml.as_bytes(), "model.ifcxml").unwrap(), &Rulebook::embedded());
        let ends = steelwork.members.len() + steelwork.plates.len() + steelwork.bolts.len() + steelwork.rejected.len();
        prop_assert!(ends >= 1);
        prop_assert!(steelwork.members.iter().all(|m| m.start.is_finite() && m.end.is_finite() && m.extents.is_finite()));
        prop_assert!(steelwork.plates.iter().all(|p| p.centre.is_finite() && p.thickness.get() > 0.0));
    }
}
