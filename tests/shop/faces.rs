use faying::shop::{Hole, Member, Plate, Shape, Steelwork};
use glam::{DAffine3, DQuat, DVec3};
use proptest::prelude::*;

use super::model::*;
use super::polyhedra::{Body, fan, ring};
use crate::close;

fn part(name: &str, solids: &str) -> Steelwork {
    taken(&element("IfcBuildingElementProxy", &format!(r#"id="i1" Name="{name}""#), "", solids, ""))
}

#[track_caller]
fn member(steelwork: &Steelwork) -> &Member {
    assert_eq!(steelwork.members.len(), 1, "{:?}", steelwork.rejected);
    &steelwork.members[0]
}

#[track_caller]
fn plate(steelwork: &Steelwork) -> &Plate {
    assert_eq!(steelwork.plates.len(), 1, "{:?}", steelwork.rejected);
    &steelwork.plates[0]
}

/// The corners of a sharp I without the repeated last one.
fn i_outline(h: f64, b: f64, t_w: f64, t_f: f64) -> Vec<(f64, f64)> {
    let mut corners = sharp_i(h, b, t_w, t_f);
    corners.pop();
    corners
}

/// Triangles of the caps of [`i_outline`] and of quadrilaterals.
fn i_triangles(face: &[Vec<usize>]) -> Vec<[usize; 3]> {
    const I: [[usize; 3]; 10] = [
        [0, 1, 2],
        [0, 2, 3],
        [0, 3, 10],
        [0, 10, 11],
        [3, 4, 9],
        [3, 9, 10],
        [6, 7, 8],
        [6, 8, 9],
        [6, 9, 4],
        [6, 4, 5],
    ];
    let mut corners = face[0].clone();
    if corners.len() == 4 {
        return fan(face);
    }
    corners.sort_unstable();
    I.map(|triangle| triangle.map(|i| corners[i])).to_vec()
}

/// UKB 457x191x67 of BS 4-1:2005: h 453.4, b 189.9, t_w 8.5, t_f 12.7, r 10.2.
fn beam() -> Body {
    Body::prism(&i_outline(453.4, 189.9, 8.5, 12.7), &[], 0.0, 6000.0)
}

#[test]
fn a_sharp_i_by_its_faces_is_the_section_of_its_name() {
    let body = beam();
    for solids in
        [body.faceted(), body.face_based(), body.shell_based(), body.polygonal(), body.triangulated(i_triangles)]
    {
        let steelwork = part("UKB 457x191x67", &solids);
        let member = member(&steelwork);
        assert_eq!((member.shape, member.not_assessed.as_deref()), (Shape::I, None));
        near(member.start, [0.0, 0.0, 0.0], 1e-6);
        near(member.end, [0.0, 0.0, 6000.0], 1e-6);
        close(member.extents.x, 189.9, 1e-6);
        close(member.extents.y, 453.4, 1e-6);
        close(member.depth.y.abs(), 1.0, 1e-9);
        assert_eq!(member.section.as_ref().unwrap().value.r.unwrap().get(), 10.2);
        assert!(member.disagreements.is_empty(), "{:?}", member.disagreements);
    }
}

/// Turned about its own axis by so little that the box along the axes of the world is hardly larger.
#[test]
fn a_slight_turn_is_not_lost() {
    for angle in [1e-4, 5e-4, 2e-3] {
        let steelwork = part("UKB 457x191x67", &beam().moved(DAffine3::from_rotation_z(angle)).faceted());
        close(member(&steelwork).depth.x.abs(), f64::sin(angle), 1e-9);
    }
}

#[test]
fn a_faceted_i_of_another_size_than_its_name_has_no_section() {
    // UKB 457x191x74: 457.0 x 190.4 x 9.0 x 14.5.
    let steelwork =
        part("UKB 457x191x67", &Body::prism(&i_outline(457.0, 190.4, 9.0, 14.5), &[], 0.0, 6000.0).faceted());
    let member = member(&steelwork);
    assert!(member.section.as_ref().unwrap_err().reason.contains("457.0 x 190.4"));
    // The web alone is thinner.
    let steelwork =
        part("UKB 457x191x67", &Body::prism(&i_outline(453.4, 189.9, 7.0, 12.7), &[], 0.0, 6000.0).faceted());
    assert!(self::member(&steelwork).section.as_ref().unwrap_err().reason.contains("web 7.0"));
}

#[test]
fn a_mitred_end_and_a_cope_leave_the_section_and_are_told() {
    // A mitre: the upper end leans over the depth. Vertices 12.. are those of the upper end.
    let mut mitred = beam();
    for point in &mut mitred.points[12..] {
        point.z += point.y * 0.5;
    }
    let steelwork = part("UKB 457x191x67", &mitred.faceted());
    let cut = member(&steelwork);
    // The longest corner stays: half the depth of 453.4 at a slope of 0.5.
    near(cut.end, [0.0, 0.0, 6000.0 + 453.4 / 4.0], 1e-6);
    assert!(cut.section.is_ok() && cut.not_assessed.is_none());
    assert!(cut.disagreements.iter().any(|d| d.contains("mitre")), "{:?}", cut.disagreements);

    // A cope: the upper flange and 50 mm of the web are gone over the last 100 mm. The piece with the whole section
    // and the coped one share a face, whose inner edges no export writes: sections are asked, not faces.
    let whole = i_outline(453.4, 189.9, 8.5, 12.7);
    let mut coped = Body::prism(&whole, &[], 0.0, 5900.0);
    let (w, x, y, f) = (4.25, 94.95, 226.7, 214.0);
    let cut = [(-x, -y), (x, -y), (x, -f), (w, -f), (w, 176.7), (-w, 176.7), (-w, -f), (-x, -f)];
    let end = Body::prism(&cut, &[], 5900.0, 100.0);
    // Drop both caps between the pieces and close the step with one face.
    coped.faces.pop();
    let mut end = end;
    let last = end.faces.len() - 2;
    end.faces.remove(last);
    let mut body = coped.and(end);
    let at = |body: &Body, x: f64, y: f64| {
        body.points.iter().position(|p| (p.x - x).abs() < 1e-9 && (p.y - y).abs() < 1e-9 && (p.z - 5900.0).abs() < 1e-9)
    };
    let step: Vec<usize> = [(w, 176.7), (w, f), (x, f), (x, y), (-x, y), (-x, f), (-w, f), (-w, 176.7)]
        .into_iter()
        .map(|(x, y)| at(&body, x, y).unwrap())
        .collect();
    body.faces.push(vec![step]);
    // An export would run the web's faces past the step: split edges are where two loops meet.
    let steelwork = part("UKB 457x191x67", &body.faceted());
    let coped = member(&steelwork);
    near(coped.end, [0.0, 0.0, 6000.0], 1e-6);
    assert!(coped.section.is_ok(), "{:?}", coped.section);
    assert!(
        coped.disagreements.iter().any(|d| d.contains("100.0 mm") && d.contains("cope")),
        "{:?}",
        coped.disagreements
    );
}

#[test]
fn a_plate_by_its_faces_has_its_holes() {
    let outline = [(0.0, 0.0), (200.0, 0.0), (200.0, 400.0), (0.0, 400.0)];
    let holes = [ring((50.0, 60.0), 11.0, 16), ring((150.0, 340.0), 11.0, 24)];
    let body = Body::prism(&outline, &holes, 0.0, 15.0);
    for solids in [body.faceted(), body.polygonal(), body.shell_based()] {
        let steelwork = part("PL15*200", &solids);
        let plate = plate(&steelwork);
        close(plate.thickness.get(), 15.0, 1e-6);
        assert_eq!(plate.holes.len(), 2);
        let place = |hole: &Hole| plate.centre + hole.centre.x * plate.u + hole.centre.y * plate.v;
        let mut holes: Vec<DVec3> = plate.holes.iter().map(place).collect();
        holes.sort_by(|a, b| a.x.total_cmp(&b.x));
        near(holes[0], [50.0, 60.0, 7.5], 1e-6);
        near(holes[1], [150.0, 340.0, 7.5], 1e-6);
        plate.holes.iter().for_each(|hole| close(hole.diameter, 22.0, 1e-6));
        assert!(plate.disagreements.is_empty(), "{:?}", plate.disagreements);
    }
}

#[test]
fn a_triangulated_ring_is_a_plate_with_a_hole() {
    let (outer, inner) = (ring((0.0, 0.0), 150.0, 32), ring((0.0, 0.0), 50.0, 32));
    let body = Body::prism(&outer, &[inner], 0.0, 20.0);
    let strip = |face: &[Vec<usize>]| match face {
        [outer, hole] => (0..32)
            .flat_map(|i| {
                let j = (i + 1) % 32;
                [[outer[i], outer[j], hole[j]], [outer[i], hole[j], hole[i]]]
            })
            .collect(),
        _ => fan(face),
    };
    let steelwork = part("", &body.triangulated(strip));
    close(plate(&steelwork).thickness.get(), 20.0, 1e-6);
    close(plate(&steelwork).holes[0].diameter, 100.0, 1e-6);
}

#[test]
fn bevelled_edges_leave_a_plate_and_are_told() {
    let mut body = Body::prism(&[(0.0, 0.0), (200.0, 0.0), (200.0, 400.0), (0.0, 400.0)], &[], 0.0, 20.0);
    // Two edges that meet, so that it is no bar either.
    for point in body.points.iter_mut().skip(4) {
        point.x -= if point.x > 0.0 { 6.0 } else { 0.0 };
        point.y -= if point.y > 0.0 { 8.0 } else { 0.0 };
    }
    let steelwork = part("", &body.faceted());
    close(plate(&steelwork).thickness.get(), 20.0, 1e-6);
    assert_eq!(plate(&steelwork).disagreements.len(), 1);
}

/// A bolt in one body: hexagonal head, round shank.
fn bolt_body(facets: usize) -> Body {
    let (hexagon, circle) = (ring((0.0, 0.0), 17.3, 6), ring((0.0, 0.0), 10.0, facets));
    // Caps with a ring where the shank passes: only sections are asked of them.
    let mut head = Body::prism(&hexagon, &[], -13.0, 13.0);
    let mut shank = Body::prism(&circle, &[], 0.0, 60.0);
    let tip = Body::prism(&circle, &[], 60.0, 10.0);
    head.faces.pop();
    let caps = shank.faces.len();
    shank.faces.truncate(caps - 2);
    let mut body = head.and(shank).and(tip);
    let upper: Vec<usize> = (6..12).collect();
    let foot: Vec<usize> = (12..12 + facets).collect();
    body.faces.push(vec![upper, foot]);
    body
}

#[test]
fn a_bolt_by_its_faces_is_one_bolt_of_its_shank() {
    for facets in [8, 12, 24] {
        let steelwork = part("Bolt M20 x 70 8.8", &bolt_body(facets).faceted());
        assert_eq!(steelwork.bolts.len(), 1, "{facets}: {:?}", steelwork.rejected);
        let bolt = &steelwork.bolts[0];
        close(bolt.diameter.as_ref().unwrap().value.get(), 20.0, 1e-9);
        let (low, high) = if bolt.start.z < bolt.end.z { (bolt.start, bolt.end) } else { (bolt.end, bolt.start) };
        near(low, [0.0, 0.0, 0.0], 1e-6);
        near(high, [0.0, 0.0, 70.0], 1e-6);
        assert_eq!(steelwork.problems, []);
    }
    // Nothing calls it a bolt, and its head does.
    assert_eq!(part("Part 7", &bolt_body(16).faceted()).bolts.len(), 1);
}

#[test]
fn a_thread_and_a_cone_do_not_hide_a_bolt() {
    // Rings of 16 points along a shank of 70 mm: a thread of 2 mm pitch over the last 30 mm, a cone at its tip.
    let mut points = Vec::new();
    let mut levels: Vec<(f64, f64)> = vec![(-13.0, 16.0), (-1.0, 16.0), (0.0, 10.0), (40.0, 10.0)];
    levels.extend((0..14).flat_map(|i| [(41.0 + 2.0 * f64::from(i), 8.8), (42.0 + 2.0 * f64::from(i), 10.0)]));
    levels.push((70.0, 8.5));
    for (z, radius) in &levels {
        points.extend(ring((0.0, 0.0), *radius, 16).into_iter().map(|(x, y)| DVec3::new(x, y, *z)));
    }
    let n = levels.len();
    let mut faces = vec![vec![(0..16).rev().collect()], vec![(16 * (n - 1)..16 * n).collect()]];
    for level in 0..n - 1 {
        for i in 0..16 {
            let (a, b) = (16 * level + i, 16 * level + (i + 1) % 16);
            faces.push(vec![vec![a, b, b + 16, a + 16]]);
        }
    }
    let steelwork = part("Bolt M20 x 70", &Body { points, faces }.faceted());
    assert_eq!(steelwork.bolts.len(), 1, "{:?}", steelwork.rejected);
    let bolt = &steelwork.bolts[0];
    close(bolt.diameter.as_ref().unwrap().value.get(), 20.0, 1e-9);
    // Lengths to a thirty-second of the whole of 83 mm.
    let (low, high) = (bolt.start.z.min(bolt.end.z), bolt.start.z.max(bolt.end.z));
    assert!(low.abs() <= 2.6 && (high - 70.0).abs() <= 2.6, "{low} {high}");
    assert_eq!(steelwork.problems, []);
}

#[test]
fn bodies_of_one_face_list_are_told_apart() {
    let shank = |x: f64| Body::prism(&ring((x, 0.0), 10.0, 16), &[], 0.0, 70.0);
    let group = shank(0.0).and(shank(90.0)).and(shank(180.0));
    for solids in [group.faceted(), group.polygonal(), group.shell_based()] {
        let steelwork = part("Bolts M20 x 70", &solids);
        assert_eq!(steelwork.bolts.len(), 3, "{:?}", steelwork.rejected);
        near(steelwork.bolts[1].start, [90.0, 0.0, 0.0], 1e-6);
    }
}

#[test]
fn a_tapered_or_curved_body_is_a_member_that_is_not_assessed() {
    let mut tapered = beam();
    for point in tapered.points.iter_mut().skip(12) {
        point.y *= 0.6;
    }
    let steelwork = part("Rafter", &tapered.faceted());
    let rafter = member(&steelwork);
    assert!(rafter.not_assessed.as_ref().unwrap().contains("tapered"), "{:?}", rafter.not_assessed);
    assert!(rafter.section.is_err());
    near(rafter.end - rafter.start, [0.0, 0.0, 6000.0], 1e-6);

    // An arc of 20 m radius in 40 straight lengths, of a solid box.
    let mut points = Vec::new();
    for i in 0..=40 {
        let (sin, cos) = (f64::from(i) * 0.01).sin_cos();
        for (r, z) in [(19_900.0, -75.0), (20_100.0, -75.0), (20_100.0, 75.0), (19_900.0, 75.0)] {
            points.push(DVec3::new(r * cos, r * sin, z));
        }
    }
    let mut faces = vec![vec![vec![0, 1, 2, 3]], vec![vec![160, 161, 162, 163]]];
    for i in (0..160).step_by(4) {
        faces.extend((0..4).map(|k| vec![vec![i + k, i + (k + 1) % 4, i + 4 + (k + 1) % 4, i + 4 + k]]));
    }
    let steelwork = part("Arch", &Body { points, faces }.faceted());
    let arch = member(&steelwork);
    assert!(arch.not_assessed.is_some() && arch.section.is_err());
}

#[test]
fn what_is_neither_prism_nor_long_is_rejected_with_its_faces() {
    // A pyramid on a square.
    let points = [(0.0, 0.0, 0.0), (100.0, 0.0, 0.0), (100.0, 100.0, 0.0), (0.0, 100.0, 0.0), (50.0, 50.0, 100.0)];
    let points = points.map(|(x, y, z)| DVec3::new(x, y, z)).to_vec();
    let faces = vec![
        vec![vec![0, 1, 2, 3]],
        vec![vec![0, 1, 4]],
        vec![vec![1, 2, 4]],
        vec![vec![2, 3, 4]],
        vec![vec![3, 0, 4]],
    ];
    let steelwork = part("Thing", &Body { points, faces }.faceted());
    assert!(steelwork.rejected[0].reason.contains("neither a prism nor long"), "{}", steelwork.rejected[0].reason);
}

#[test]
fn an_advanced_brep_is_told_by_its_edges() {
    // A round bar of radius 10 and length 70: two circles, one seam.
    let point = |id: &str, z: f64| {
        format!(
            r#"<IfcVertexPoint id="v{id}"><VertexGeometry xsi:type="IfcCartesianPoint" Coordinates="10 0 {z}"/></IfcVertexPoint>"#
        )
    };
    let circle = |id: &str, z: f64| {
        format!(
            r#"<IfcEdgeCurve id="e{id}" SameSense="true"><EdgeStart xsi:type="IfcVertexPoint" ref="v{id}" xsi:nil="true"/><EdgeEnd xsi:type="IfcVertexPoint" ref="v{id}" xsi:nil="true"/><EdgeGeometry xsi:type="IfcCircle" Radius="10"><Position xsi:type="IfcAxis2Placement3D"><Location Coordinates="0 0 {z}"/></Position></EdgeGeometry></IfcEdgeCurve>"#
        )
    };
    let seam = r#"<IfcEdgeCurve id="es" SameSense="true"><EdgeStart xsi:type="IfcVertexPoint" ref="va" xsi:nil="true"/><EdgeEnd xsi:type="IfcVertexPoint" ref="vb" xsi:nil="true"/><EdgeGeometry xsi:type="IfcLine"><Pnt Coordinates="10 0 0"/><Dir Magnitude="1"><Orientation DirectionRatios="0 0 1"/></Dir></EdgeGeometry></IfcEdgeCurve>"#;
    let oriented = |id: &str, sense: bool| {
        format!(
            r#"<IfcOrientedEdge Orientation="{sense}"><EdgeElement xsi:type="IfcEdgeCurve" ref="e{id}" xsi:nil="true"/></IfcOrientedEdge>"#
        )
    };
    let face = |edges: &str, surface: &str| {
        format!(
            r#"<IfcAdvancedFace SameSense="true"><Bounds><IfcFaceOuterBound Orientation="true"><Bound xsi:type="IfcEdgeLoop"><EdgeList>{edges}</EdgeList></Bound></IfcFaceOuterBound></Bounds>{surface}</IfcAdvancedFace>"#
        )
    };
    let plane =
        r#"<FaceSurface xsi:type="IfcPlane"><Position><Location Coordinates="0 0 0"/></Position></FaceSurface>"#;
    let round = r#"<FaceSurface xsi:type="IfcCylindricalSurface" Radius="10"><Position><Location Coordinates="0 0 0"/></Position></FaceSurface>"#;
    let side = [oriented("a", true), oriented("s", true), oriented("b", false), oriented("s", false)].concat();
    let faces = [face(&oriented("a", false), plane), face(&oriented("b", true), plane), face(&side, round)].concat();
    let solid = format!("<IfcAdvancedBrep><Outer><CfsFaces>{faces}</CfsFaces></Outer></IfcAdvancedBrep>");
    let extra = [point("a", 0.0), point("b", 70.0), circle("a", 0.0), circle("b", 70.0), seam.to_owned()].concat();
    let steelwork =
        taken(&(extra + &element("IfcBuildingElementProxy", r#"id="i1" Name="Bolt M20 x 70""#, "", &solid, "")));
    assert_eq!(steelwork.bolts.len(), 1, "{:?}", steelwork.rejected);
    let bolt = &steelwork.bolts[0];
    near(bolt.start, [0.0, 0.0, 0.0], 1e-6);
    near(bolt.end, [0.0, 0.0, 70.0], 1e-6);
    assert_eq!(steelwork.problems, []);
}

/// Exports in metres round to a tenth of a millimetre, after they have turned the building.
#[test]
fn rounded_coordinates_are_the_same_parts() {
    let map = DAffine3::from_rotation_translation(
        DQuat::from_axis_angle(DVec3::new(0.2, 0.3, 1.0).normalize(), 0.3),
        DVec3::new(12_345.0, -6_789.0, 3_210.0),
    );
    let rounded = |body: Body| {
        let mut body = body.moved(map);
        body.points.iter_mut().for_each(|p| *p = (*p * 10.0).round() / 10.0);
        body.faceted()
    };
    let steelwork = part("UKB 457x191x67", &rounded(beam()));
    let member = member(&steelwork);
    assert!(member.section.is_ok() && member.not_assessed.is_none(), "{:?} {:?}", member.section, member.not_assessed);
    close(member.start.distance(member.end), 6000.0, 0.2);
    assert!(member.disagreements.is_empty(), "{:?}", member.disagreements);

    let holes = [ring((50.0, 60.0), 11.0, 24), ring((150.0, 340.0), 11.0, 24)];
    let body = Body::prism(&[(0.0, 0.0), (200.0, 0.0), (200.0, 400.0), (0.0, 400.0)], &holes, 0.0, 15.0);
    let steelwork = part("PL15*200", &rounded(body));
    let plate = plate(&steelwork);
    close(plate.thickness.get(), 15.0, 0.2);
    assert_eq!(plate.holes.len(), 2);
    plate.holes.iter().for_each(|hole| close(hole.diameter, 22.0, 0.2));
    assert!(plate.disagreements.is_empty(), "{:?}", plate.disagreements);

    let steelwork = part("Bolt M20 x 70", &rounded(bolt_body(24)));
    assert_eq!(steelwork.bolts.len(), 1, "{:?}", steelwork.rejected);
    close(steelwork.bolts[0].diameter.as_ref().unwrap().value.get(), 20.0, 1e-9);
    assert_eq!(steelwork.problems, []);
}

proptest! {
    /// However a body lies in its own coordinates, and however its faces look, it is the same member.
    #[test]
    fn a_turned_body_is_the_same_member(
        axis in [-1.0..1.0f64, -1.0..1.0, -1.0..1.0],
        angle in 0.0..6.0f64,
        offset in [-1e5..1e5f64, -1e5..1e5, -1e5..1e5],
        flip in proptest::collection::vec(any::<bool>(), 14),
    ) {
        let axis = DVec3::from(axis);
        prop_assume!(axis.length() > 0.1);
        let map = DAffine3::from_rotation_translation(DQuat::from_axis_angle(axis.normalize(), angle), offset.into());
        let mut body = beam().moved(map);
        for (face, flip) in body.faces.iter_mut().zip(flip) {
            if flip {
                face[0].reverse();
            }
        }
        let steelwork = part("UKB 457x191x67", &body.faceted());
        prop_assert_eq!(steelwork.members.len(), 1);
        let member = &steelwork.members[0];
        prop_assert!(member.section.is_ok(), "{:?}", member.section);
        prop_assert!((member.start.distance(member.end) - 6000.0).abs() < 1e-3);
        prop_assert!(member.along.cross(map.matrix3.z_axis).length() < 1e-6);
        prop_assert!(member.depth.cross(map.matrix3.y_axis).length() < 1e-6);
        prop_assert!(member.across.cross(member.depth).abs_diff_eq(member.along, 1e-9));
        let ends = [map.transform_point3(DVec3::ZERO), map.transform_point3(DVec3::Z * 6000.0)];
        let start = member.start + steelwork.origin;
        prop_assert!(ends.iter().any(|end| end.distance(start) < 1e-3));
    }
}
