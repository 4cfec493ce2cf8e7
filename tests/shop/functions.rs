//! What a part is, whatever its class: bolts, nuts, washers, anchors, plates.

use faying::shop::{Bolt, Part, Steelwork};
use proptest::prelude::*;

use super::model::*;
use super::polyhedra::{Body, ring};
use crate::close;

fn cylinder(at: &str, radius: f64, depth: f64) -> String {
    format!(
        r#"<IfcExtrudedAreaSolid Depth="{depth}">{}<Position><Location Coordinates="{at}"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
        circle(radius)
    )
}

fn hexagon(at: &str, corner: f64, depth: f64) -> String {
    let mut corners = ring((0.0, 0.0), corner, 6);
    corners.push(corners[0]);
    format!(
        r#"<IfcExtrudedAreaSolid Depth="{depth}">{}<Position><Location Coordinates="{at}"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
        outline("", &corners)
    )
}

fn washer(at: &str) -> String {
    format!(
        r#"<IfcExtrudedAreaSolid Depth="3">{}<Position><Location Coordinates="{at}"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
        profile("IfcCircleHollowProfileDef", r#"Radius="18.5" WallThickness="8""#, "")
    )
}

const AT: [(f64, f64); 4] = [(0.0, 0.0), (90.0, 0.0), (0.0, 70.0), (90.0, 70.0)];
const NAME: &str = "Bolt M20 x 70 8.8";

fn proxy(id: usize, class: &str, name: &str, solids: &str) -> String {
    element(class, &format!(r#"id="p{id:03}" Name="{name}""#), "", solids, "")
}

/// Bolts without who they are.
#[track_caller]
fn bare(steelwork: &Steelwork) -> Vec<([i64; 6], i64, String, bool)> {
    let micron = |x: f64| (x * 1e3).round() as i64;
    let one = |bolt: &Bolt| {
        let (a, b) = (bolt.start, bolt.end);
        let (a, b) = if a.z <= b.z { (a, b) } else { (b, a) };
        let ends = [a.x, a.y, a.z, b.x, b.y, b.z].map(micron);
        let class = bolt.class.as_ref().map_or("?".into(), |class| class.value.clone());
        (ends, micron(bolt.diameter.as_ref().unwrap().value.get()), class, bolt.anchor)
    };
    let mut all: Vec<_> = steelwork.bolts.iter().map(one).collect();
    all.sort();
    all
}

/// The same four bolts with nuts and washers in each of the ways in which exports write them.
fn ways() -> Vec<(&'static str, Steelwork)> {
    let at = |(x, y): (f64, f64), z: f64| format!("{x} {y} {z}");
    let whole = |p: (f64, f64)| {
        [
            cylinder(&at(p, 0.0), 10.0, 70.0),
            hexagon(&at(p, -13.0), 17.3, 13.0),
            washer(&at(p, 45.0)),
            hexagon(&at(p, 48.0), 17.3, 16.0),
        ]
    };
    let faces = |p: (f64, f64)| {
        let round = Body::prism(&ring(p, 10.0, 24), &[], 0.0, 70.0);
        let head = Body::prism(&ring(p, 17.3, 6), &[], -13.0, 13.0);
        [round.faceted(), head.polygonal()].concat()
    };
    let mapped = |i: usize, p: (f64, f64)| {
        let source = if i == 0 {
            format!(
                r#"<MappingSource id="m1"><MappingOrigin xsi:type="IfcAxis2Placement3D"><Location Coordinates="0 0 0"/></MappingOrigin><MappedRepresentation xsi:type="IfcShapeRepresentation" RepresentationIdentifier="Body"><Items>{}</Items></MappedRepresentation></MappingSource>"#,
                faces((0.0, 0.0))
            )
        } else {
            r#"<MappingSource ref="m1" xsi:nil="true"/>"#.into()
        };
        format!(
            r#"<IfcMappedItem>{source}<MappingTarget xsi:type="IfcCartesianTransformationOperator3D"><LocalOrigin Coordinates="{} {} 0"/></MappingTarget></IfcMappedItem>"#,
            p.0, p.1
        )
    };
    let all = |one: &dyn Fn((f64, f64)) -> String| AT.map(one).concat();
    let each = |class: &'static str| {
        let one = |(i, p): (usize, &(f64, f64))| {
            let [shank, head, ring, nut] = whole(*p);
            [
                proxy(4 * i, class, NAME, &shank),
                proxy(4 * i + 1, class, "", &head),
                proxy(4 * i + 2, class, "Washer M20", &ring),
                proxy(4 * i + 3, class, "Nut M20", &nut),
            ]
            .concat()
        };
        AT.iter().enumerate().map(one).collect::<String>()
    };
    let fastener = "IfcMechanicalFastener";
    let singly: String = AT.iter().enumerate().map(|(i, p)| proxy(i, fastener, NAME, &whole(*p).concat())).collect();
    let maps: String = AT.iter().enumerate().map(|(i, p)| mapped(i, *p)).collect();
    vec![
        ("one fastener a bolt", taken(&singly)),
        ("one fastener a group", taken(&proxy(0, fastener, NAME, &all(&|p| whole(p).concat())))),
        ("a group by faces", taken(&proxy(0, fastener, NAME, &all(&faces)))),
        ("a group by mapped items", taken(&proxy(0, fastener, NAME, &maps))),
        ("a proxy a piece", taken(&each("IfcBuildingElementProxy"))),
        ("a beam a piece", taken(&each("IfcBeam"))),
    ]
}

#[test]
fn bolts_are_the_same_in_whatever_way_they_are_written() {
    let ways = ways();
    let expected = bare(&ways[0].1);
    assert_eq!(expected.len(), 4);
    assert_eq!(expected[0], ([0, 0, 0, 0, 0, 70_000], 20_000, "8.8".into(), false));
    for (way, steelwork) in &ways {
        assert_eq!(bare(steelwork), expected, "{way}: {:?}", steelwork.rejected);
        assert_eq!((steelwork.members.len(), steelwork.plates.len()), (0, 0), "{way}");
        assert_eq!(steelwork.problems, [], "{way}");
    }
    // Nuts and washers of their own are counted, and lie on the axis of a bolt.
    let (_, proxies) = &ways[4];
    let reasons: Vec<&str> = proxies.rejected.iter().map(|r| r.reason.as_str()).collect();
    assert_eq!(reasons.iter().filter(|r| **r == "washer").count(), 4, "{reasons:?}");
    assert_eq!(reasons.iter().filter(|r| **r == "nut or bolt head").count(), 8, "{reasons:?}");
}

/// A joint of an end plate: column HEB 300, beam IPE 500, plate, eight bolts; each body by `form`, the bolts by `bolts`.
fn joint(form: impl Fn(&Body) -> String, bolts: &str) -> Steelwork {
    joint_of(form, bolts, |_| {})
}

/// The same with the beam changed, which lies along z until it is turned.
fn joint_of(form: impl Fn(&Body) -> String, bolts: &str, change: impl Fn(&mut Body)) -> Steelwork {
    let sharp = |h: f64, b: f64, w: f64, f: f64| {
        let mut corners = sharp_i(h, b, w, f);
        corners.pop();
        corners
    };
    let along_x = |body: Body, x: f64| {
        let turn = glam::DMat3::from_cols(glam::DVec3::Y, glam::DVec3::Z, glam::DVec3::X);
        body.moved(glam::DAffine3::from_mat3_translation(turn, glam::DVec3::new(x, 0.0, 3000.0)))
    };
    // The column's depth lies along x: its flange at x = 150, the plate from 150 to 170, the beam from 170.
    let column = Body::prism(&sharp(300.0, 300.0, 11.0, 19.0), &[], 0.0, 6000.0);
    let column = column.moved(glam::DAffine3::from_rotation_z(std::f64::consts::FRAC_PI_2));
    let mut beam = Body::prism(&sharp(500.0, 200.0, 10.2, 16.0), &[], 0.0, 4000.0);
    change(&mut beam);
    let beam = along_x(beam, 170.0);
    let plate = along_x(
        Body::prism(&[(-110.0, -280.0), (110.0, -280.0), (110.0, 280.0), (-110.0, 280.0)], &[], 0.0, 20.0),
        150.0,
    );
    taken(
        &[
            element("IfcColumn", r#"id="c" Name="HEB 300""#, "", &form(&column), ""),
            element("IfcBuildingElementProxy", r#"id="b" Name="IPE 500""#, "", &form(&beam), ""),
            element("IfcBeam", r#"id="e" Name="PL20*220""#, "", &form(&plate), ""),
            bolts.to_owned(),
        ]
        .concat(),
    )
}

#[test]
fn a_joint_is_the_same_in_whatever_way_it_is_written() {
    // Shanks along x through the flange and the plate, 19 + 20, with a nut on the far side.
    let heights = [2790.0, 2880.0, 3120.0, 3210.0];
    let at = |i: usize| (120.0, if i.is_multiple_of(2) { -50.0 } else { 50.0 }, heights[i / 2]);
    let round = |(x, y, z): (f64, f64, f64), solid: &str, depth: f64| {
        format!(
            r#"<IfcExtrudedAreaSolid Depth="{depth}">{solid}<Position><Location Coordinates="{x} {y} {z}"/><Axis DirectionRatios="1 0 0"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#
        )
    };
    let mut six = ring((0.0, 0.0), 17.3, 6);
    six.push(six[0]);
    let shank = |i: usize| round(at(i), &circle(10.0), 70.0);
    let nut = |i: usize| round((at(i).0 - 4.0, at(i).1, at(i).2), &outline("", &six), 13.0);
    let all = |one: &dyn Fn(usize) -> String| (0..8).map(one).collect::<String>();
    let singly = all(&|i| proxy(i, "IfcMechanicalFastener", NAME, &(shank(i) + &nut(i))));
    let grouped = proxy(0, "IfcMechanicalFastener", NAME, &all(&|i| shank(i) + &nut(i)));
    let proxies = all(&|i| {
        proxy(2 * i, "IfcBuildingElementProxy", NAME, &shank(i)) + &proxy(2 * i + 1, "IfcMember", "", &nut(i))
    });
    let rules = faying::rulebook::Rulebook::embedded();
    let forms: [fn(&Body) -> String; 3] = [Body::faceted, Body::polygonal, Body::face_based];
    let mut first: Option<String> = None;
    for form in forms {
        for bolts in [&singly, &grouped, &proxies] {
            let steelwork = joint(form, bolts);
            assert_eq!(
                (steelwork.members.len(), steelwork.plates.len(), steelwork.bolts.len()),
                (2, 1, 8),
                "{:?}",
                steelwork.rejected
            );
            let found = faying::joints::recognise(&steelwork, &rules);
            assert_eq!(found.joints.len(), 1);
            let layout = found.joints[0].layout.as_ref().unwrap_or_else(|why| panic!("{why}"));
            let layout = layout.plates().unwrap();
            // Places and identities differ with the way of writing; numbers must not.
            let rows: Vec<i64> =
                layout.bolts().rows.iter().map(|row| (row.height.get() * 1e3).round() as i64).collect();
            let numbers = format!(
                "{:?} {:?} {:?} {:.3} {:.3} {:.3} {:.3} {rows:?}",
                found.joints[0].kind,
                layout.supporting().section.as_ref().map(|s| s.value.designation.clone()),
                layout.side().beam.section.as_ref().map(|s| s.value.designation.clone()),
                layout.side().plate.thickness.get(),
                layout.side().plate.width.get(),
                layout.side().plate.bottom.get(),
                layout.side().plate.top.get(),
            );
            assert_eq!(first.get_or_insert_with(|| numbers.clone()), &numbers);
        }
    }
    let expected = "EndPlateMoment Ok(\"HE 300 B\") Ok(\"IPE 500\") 20.000 220.000 -30.000 530.000 [460000, 370000, 130000, 40000]";
    assert_eq!(first.as_deref(), Some(expected));
}

#[test]
fn a_joint_at_a_member_that_is_not_assessed_says_so() {
    let bolts: String = (0..8)
        .map(|i: usize| {
            let (y, z) = (if i.is_multiple_of(2) { -50.0 } else { 50.0 }, 2790.0 + 120.0 * (i / 2) as f64);
            let solid = format!(
                r#"<IfcExtrudedAreaSolid Depth="70">{}<Position><Location Coordinates="120 {y} {z}"/><Axis DirectionRatios="1 0 0"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
                circle(10.0)
            );
            proxy(i, "IfcMechanicalFastener", NAME, &solid)
        })
        .collect();
    let taper = |body: &mut Body| body.points.iter_mut().skip(12).for_each(|p| p.y *= 0.6);
    // Cranked: the far half of the flanges is pushed aside, so that no section is the same as the next.
    let bend = |body: &mut Body| {
        body.points.iter_mut().skip(12).for_each(|p| p.z += 400.0 * (p.x / 100.0) * (p.y / 250.0));
        body.points.iter_mut().skip(12).for_each(|p| p.y += 0.2 * p.x);
    };
    let rules = faying::rulebook::Rulebook::embedded();
    for (change, word) in [(&taper as &dyn Fn(&mut Body), "tapered"), (&bend, "no straight prism")] {
        let steelwork = joint_of(Body::faceted, &bolts, change);
        assert_eq!(steelwork.members.len(), 2, "{:?}", steelwork.rejected);
        let found = faying::joints::recognise(&steelwork, &rules);
        assert_eq!(found.joints.len(), 1, "{word}");
        assert_eq!(found.joints[0].bolts.len(), 8);
        let why = found.joints[0].layout.as_ref().unwrap_err();
        assert!(why.contains(word), "{why}");
    }
}

#[test]
fn a_nut_proves_a_bolt_that_nothing_names() {
    let shank = || proxy(0, "IfcDiscreteAccessory", "Part 12", &cylinder("0 0 0", 10.0, 70.0));
    let alone = taken(&shank());
    assert_eq!((alone.bolts.len(), alone.members.len()), (0, 0));
    assert!(alone.rejected[0].reason.contains("nothing calls a bolt"), "{}", alone.rejected[0].reason);
    let nutted = taken(&(shank() + &proxy(1, "IfcDiscreteAccessory", "", &hexagon("0 0 50", 17.3, 16.0))));
    assert_eq!(nutted.bolts.len(), 1);
    // A nut beside it proves nothing, and is told.
    let beside = taken(&(shank() + &proxy(1, "IfcDiscreteAccessory", "", &hexagon("30 0 50", 17.3, 16.0))));
    assert_eq!(beside.bolts.len(), 0);
    assert!(beside.rejected.iter().any(|r| r.reason.contains("no bolt was found")), "{:?}", beside.rejected);
}

#[test]
fn impossible_lengths_are_no_bolts_unless_a_nut_says_so() {
    let fastener = |name: &str, depth: f64, more: &str, inside: &str| {
        let solids = cylinder("0 0 0", 10.0, depth) + more;
        taken(&element("IfcMechanicalFastener", &format!(r#"id="i1" Name="{name}""#), "", &solids, inside))
    };
    let counted = properties("Shop", &[("Number of nuts", "IfcInteger", "1")]);
    for (name, depth, more, inside, bolts) in [
        ("M20", 15.0, "", "", 0),
        ("M20", 15.0, "", &*counted, 1),
        ("M20", 700.0, "", "", 0),
        ("M20", 700.0, &*hexagon("0 0 690", 17.3, 16.0), "", 1),
        ("Anchor bolt M20", 700.0, "", "", 1),
    ] {
        let steelwork = fastener(name, depth, more, inside);
        assert_eq!(steelwork.bolts.len(), bolts, "{name} {depth}: {:?}", steelwork.rejected);
        assert_eq!(steelwork.rejected.len(), 1 - bolts);
    }
}

#[test]
fn anchors_are_bolts_that_say_so() {
    let rod = cylinder("0 0 0", 12.0, 600.0);
    let hook = r#"<IfcSweptDiskSolid Radius="12"><Directrix xsi:type="IfcPolyline"><Points><IfcCartesianPoint Coordinates="0 0 0"/><IfcCartesianPoint Coordinates="0 0 600"/><IfcCartesianPoint Coordinates="100 0 600"/></Points></Directrix></IfcSweptDiskSolid>"#;
    for (class, attributes, solid) in [
        ("IfcMechanicalFastener", r#"Name="M24" PredefinedType="anchorbolt""#, &*rod),
        ("IfcColumn", r#"Name="Anchor rod M24""#, &*rod),
        ("IfcBuildingElementProxy", r#"Name="Ankerschraube M24""#, &*rod),
        ("IfcDiscreteAccessory", r#"Name="Holding-down bolt""#, hook),
    ] {
        let steelwork = taken(&element(class, &format!(r#"id="i1" {attributes}"#), "", solid, ""));
        assert_eq!(steelwork.bolts.len(), 1, "{class}: {:?}", steelwork.rejected);
        let bolt = &steelwork.bolts[0];
        assert!(bolt.anchor);
        close(bolt.start.distance(bolt.end), 600.0, 1e-6);
        close(bolt.diameter.as_ref().unwrap().value.get(), 24.0, 1e-6);
    }
}

#[test]
fn a_bent_bolt_and_a_rod_are_no_bolts() {
    let bent = r#"<IfcSweptDiskSolid Radius="10"><Directrix xsi:type="IfcPolyline"><Points><IfcCartesianPoint Coordinates="0 0 0"/><IfcCartesianPoint Coordinates="0 0 200"/><IfcCartesianPoint Coordinates="100 0 200"/></Points></Directrix></IfcSweptDiskSolid>"#;
    let steelwork = taken(&proxy(0, "IfcMechanicalFastener", "Hook bolt M20", bent));
    assert!(steelwork.rejected[0].reason.contains("no straight bolt"), "{}", steelwork.rejected[0].reason);
    let steelwork = taken(&proxy(0, "IfcMember", "Post", &cylinder("0 0 0", 24.0, 1000.0)));
    assert_eq!((steelwork.members.len(), steelwork.bolts.len()), (1, 0), "{:?}", steelwork.rejected);
}

#[test]
fn plates_are_plates_whatever_their_class() {
    let body = Body::prism(&[(0.0, 0.0), (200.0, 0.0), (200.0, 480.0), (0.0, 480.0)], &[], 0.0, 15.0);
    for class in ["IfcBeam", "IfcColumn", "IfcMember", "IfcPlate", "IfcDiscreteAccessory", "IfcBuildingElementProxy"] {
        let steelwork = taken(&element(class, r#"id="i1" Name="PL15*200""#, "", &body.faceted(), ""));
        assert_eq!((steelwork.plates.len(), steelwork.members.len()), (1, 0), "{class}");
        assert!(steelwork.plates[0].disagreements.is_empty());
    }
}

#[test]
fn a_round_plate_called_after_anchors_is_a_plate() {
    let steelwork = taken(&proxy(0, "IfcPlate", "Anchor plate", &cylinder("0 0 0", 200.0, 25.0)));
    assert_eq!((steelwork.plates.len(), steelwork.bolts.len()), (1, 0), "{:?}", steelwork.rejected);
}

#[test]
fn two_plates_of_one_element_are_two_plates() {
    let half = |x: f64| {
        format!(
            r#"<IfcExtrudedAreaSolid Depth="12">{}<Position><Location Coordinates="{x} 0 0"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
            rectangle(113.0, 225.0)
        )
    };
    let steelwork = taken(&element("IfcPlate", r#"id="i1" Name="Stiffener""#, "", &(half(-60.0) + &half(60.0)), ""));
    assert_eq!(steelwork.plates.len(), 2, "{:?}", steelwork.rejected);
}

#[test]
fn a_name_against_the_shape_is_shown() {
    let plate = extruded(&rectangle(200.0, 400.0), 15.0, "0 0 1");
    let steelwork = taken(&element("IfcBeam", r#"id="i1" Name="HEB 200""#, "", &plate, ""));
    assert!(
        steelwork.plates[0].disagreements[0].contains("shape of a plate"),
        "{:?}",
        steelwork.plates[0].disagreements
    );
    let bar = extruded(&outline("", &sharp_i(300.0, 150.0, 7.0, 11.0)), 3000.0, "0 0 1");
    let steelwork = taken(&element("IfcPlate", r#"id="i1" Name="Stiffener 4""#, "", &bar, ""));
    assert!(
        steelwork.members[0].disagreements[0].contains("shape of a member"),
        "{:?}",
        steelwork.members[0].disagreements
    );
}

#[test]
fn a_count_and_a_slot_are_heard() {
    let inside = properties("Shop", &[("Bolt count", "IfcInteger", "6"), ("Slotted hole x", "IfcLengthMeasure", "12")]);
    let steelwork =
        taken(&element("IfcMechanicalFastener", r#"id="i1" Name="M20""#, "", &cylinder("0 0 0", 10.0, 70.0), &inside));
    assert_eq!(steelwork.problems.len(), 1);
    assert!(steelwork.problems[0].message.contains("says 6 bolts, but 1 "), "{}", steelwork.problems[0].message);
    close(steelwork.bolts[0].slot.unwrap().get(), 12.0, 0.0);
    let inside = properties("Shop", &[("Bolt count", "IfcInteger", "1"), ("Slotted hole x", "IfcLengthMeasure", "0")]);
    let steelwork =
        taken(&element("IfcMechanicalFastener", r#"id="i1" Name="M20""#, "", &cylinder("0 0 0", 10.0, 70.0), &inside));
    assert_eq!((steelwork.problems.len(), steelwork.bolts[0].slot), (0, None));
}

#[test]
fn the_class_in_a_standards_name_counts() {
    let inside = properties("Shop", &[("Bolt standard", "IfcLabel", "ISO 4014-8.8")]);
    let steelwork =
        taken(&element("IfcMechanicalFastener", r#"id="i1" Name="M20""#, "", &cylinder("0 0 0", 10.0, 70.0), &inside));
    assert_eq!(steelwork.bolts[0].class.as_ref().unwrap().value, "8.8");
    // A product standard alone states none.
    let inside = properties("Shop", &[("Bolt standard", "IfcLabel", "EN 14399-4")]);
    let steelwork =
        taken(&element("IfcMechanicalFastener", r#"id="i1" Name="M20""#, "", &cylinder("0 0 0", 10.0, 70.0), &inside));
    assert!(steelwork.bolts[0].class.is_err());
}

#[test]
fn a_group_is_one_end_of_a_relation_with_all_its_bolts() {
    let group =
        proxy(0, "IfcMechanicalFastener", NAME, &(cylinder("0 0 0", 10.0, 70.0) + &cylinder("90 0 0", 10.0, 70.0)));
    let assembly = r#"<IfcElementAssembly id="a1" GlobalId="0Ass000000000000000001" Name="A"/><IfcRelAggregates GlobalId="0Agg000000000000000001"><RelatingObject xsi:type="IfcElementAssembly" ref="a1" xsi:nil="true"/><RelatedObjects><IfcMechanicalFastener ref="p000" xsi:nil="true"/></RelatedObjects></IfcRelAggregates>"#;
    let steelwork = taken(&(group + assembly));
    assert_eq!(steelwork.pieces[0].parts, [Part::Bolt(0), Part::Bolt(1)]);
}

proptest! {
    /// A group is the same bolts in whatever order its solids stand.
    #[test]
    fn the_order_of_solids_does_not_matter(order in Just((0..12usize).collect::<Vec<_>>()).prop_shuffle()) {
        let solids: Vec<String> = (0..4)
            .flat_map(|i| {
                let x = f64::from(i) * 60.0;
                [cylinder(&format!("{x} 0 0"), 10.0, 70.0), hexagon(&format!("{x} 0 -13"), 17.3, 13.0), hexagon(&format!("{x} 0 50"), 17.3, 16.0)]
            })
            .collect();
        let shuffled: String = order.into_iter().map(|i| solids[i].clone()).collect();
        let (a, b) = (taken(&proxy(0, "IfcMechanicalFastener", NAME, &solids.concat())), taken(&proxy(0, "IfcMechanicalFastener", NAME, &shuffled)));
        prop_assert_eq!(bare(&a), bare(&b));
    }
}
