use std::f64::consts::FRAC_1_SQRT_2;

use faying::origin::Origin;
use faying::shop::{Member, Shape, Steelwork};
use proptest::prelude::*;

use super::model::*;
use crate::close;

const I: &str = "IfcIShapeProfileDef";
/// UKB 457x191x67 of BS 4-1:2005: h 453.4, b 189.9, t_w 8.5, t_f 12.7, r 10.2.
const UB457: &str =
    r#"OverallWidth="189.9" OverallDepth="453.4" WebThickness="8.5" FlangeThickness="12.7" FilletRadius="10.2""#;

fn beam(name: &str, solid: &str) -> String {
    element("IfcBeam", &format!(r#"id="i1" Name="{name}" Tag="B1""#), "", solid, "")
}

#[track_caller]
fn only(steelwork: &Steelwork) -> &Member {
    assert_eq!(steelwork.members.len(), 1, "{:?}", steelwork.rejected);
    &steelwork.members[0]
}

#[track_caller]
fn right_handed(member: &Member) {
    near(member.across.cross(member.depth), member.along.to_array(), 1e-9);
}

#[test]
fn axes_follow_the_profile_and_the_sweep() {
    // (position inside the profile, sweep) → along, across, depth; the profile lies in the world's xy plane.
    let position = |location: &str, reference: &str| {
        format!(
            r#"<Position><Location Coordinates="{location}"/><RefDirection DirectionRatios="{reference}"/></Position>"#
        )
    };
    let s = FRAC_1_SQRT_2;
    for (inside, sweep, start, along, across, depth) in [
        (String::new(), "0 0 1", [0.0, 0.0, 0.0], [0.0, 0.0, 1.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]),
        // Swept backwards: depth stays, across turns so that the axes stay right-handed.
        (String::new(), "0 0 -1", [0.0, 0.0, 0.0], [0.0, 0.0, -1.0], [-1.0, 0.0, 0.0], [0.0, 1.0, 0.0]),
        (position("0 226.7", "1 0"), "0 0 1", [0.0, 226.7, 0.0], [0.0, 0.0, 1.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]),
        (position("0 0", "0 1"), "0 0 1", [0.0, 0.0, 0.0], [0.0, 0.0, 1.0], [0.0, 1.0, 0.0], [-1.0, 0.0, 0.0]),
        (position("10 0", "1 1"), "0 0 -1", [10.0, 0.0, 0.0], [0.0, 0.0, -1.0], [-s, -s, 0.0], [-s, s, 0.0]),
    ] {
        let steelwork = taken(&beam("UKB 457x191x67", &extruded(&profile(I, UB457, &inside), 6000.0, sweep)));
        let member = only(&steelwork);
        right_handed(member);
        near(member.start, start, 1e-9);
        near(member.end - member.start, along.map(|a: f64| a * 6000.0), 1e-6);
        near(member.along, along, 1e-9);
        near(member.across, across, 1e-9);
        near(member.depth, depth, 1e-9);
        close(member.extents.x, 189.9, 1e-9);
        close(member.extents.y, 453.4, 1e-9);
    }
}

#[test]
fn a_solids_own_position_counts() {
    let solid = format!(
        r#"<IfcExtrudedAreaSolid Depth="5000">{}<Position><Location Coordinates="0 0 100"/><Axis DirectionRatios="1 0 0"/><RefDirection DirectionRatios="0 1 0"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
        profile(I, UB457, "")
    );
    let steelwork = taken(&beam("UKB 457x191x67", &solid));
    let member = only(&steelwork);
    near(member.start, [0.0, 0.0, 100.0], 1e-9);
    near(member.end, [5000.0, 0.0, 100.0], 1e-9);
    near(member.across, [0.0, 1.0, 0.0], 1e-9);
    near(member.depth, [0.0, 0.0, 1.0], 1e-9);
}

#[test]
fn a_slanted_extrusion_is_no_member_and_says_why() {
    let steelwork = taken(&beam("UKB 457x191x67", &extruded(&profile(I, UB457, ""), 6000.0, "1 0 1")));
    assert_eq!(steelwork.members.len(), 0);
    assert!(steelwork.rejected[0].reason.contains("slant"), "{}", steelwork.rejected[0].reason);
}

#[test]
fn a_name_and_its_geometry_that_agree_give_the_tables_section() {
    for solid in [
        extruded(&profile(I, UB457, ""), 6000.0, "0 0 1"),
        // A sharp outline without roots, half a millimetre off in depth and width.
        extruded(&outline("", &sharp_i(453.0, 190.2, 8.5, 12.7)), 6000.0, "0 0 1"),
    ] {
        let steelwork = taken(&beam("UKB 457x191x67", &solid));
        let member = only(&steelwork);
        let section = member.section.as_ref().unwrap();
        assert!(
            matches!(&section.origin, Origin::LookedUp(by) if by.contains("Name \"UKB 457x191x67\"")),
            "{section:?}"
        );
        close(section.value.h.get(), 453.4, 0.0);
        close(section.value.r.unwrap().get(), 10.2, 0.0);
        assert_eq!(member.shape, Shape::I);
        assert!(member.disagreements.is_empty());
    }
}

#[test]
fn a_name_and_its_geometry_that_disagree_give_no_section() {
    // UKB 406x178x60 of BS 4-1:2005 is 406.4 x 177.9 x 7.9 x 12.8, r 10.2; UKB 457x191x74 is 457.0 x 190.4 x 9.0 x 14.5.
    let other =
        r#"OverallWidth="177.9" OverallDepth="406.4" WebThickness="7.9" FlangeThickness="12.8" FilletRadius="10.2""#;
    let thin = UB457.replace("8.5", "7.5");
    for (solid, word) in [
        (extruded(&profile(I, other, ""), 6000.0, "0 0 1"), "406.4 x 177.9"),
        (extruded(&profile(I, &thin, ""), 6000.0, "0 0 1"), "web 7.5"),
        (extruded(&outline("", &sharp_i(457.0, 190.4, 9.0, 14.5)), 6000.0, "0 0 1"), "457.0 x 190.4"),
    ] {
        let steelwork = taken(&beam("UKB 457x191x67", &solid));
        let member = only(&steelwork);
        let missing = member.section.as_ref().unwrap_err();
        assert!(missing.reason.contains("453.4 x 189.9") && missing.reason.contains(word), "{missing}");
        assert_eq!(member.disagreements, std::slice::from_ref(&missing.reason));
    }
    // A solid box of the right outer sizes is no section of that name either.
    let steelwork = taken(&beam("HEB 300", &extruded(&rectangle(300.0, 300.0), 6000.0, "0 0 1")));
    assert!(only(&steelwork).section.is_err());
}

#[test]
fn two_names_that_disagree_give_no_section() {
    let named = format!(r#"ProfileName="UKB 457x191x74" {UB457}"#);
    let steelwork = taken(&beam("UKB 457x191x67", &extruded(&profile(I, &named, ""), 6000.0, "0 0 1")));
    let reason = &only(&steelwork).section.as_ref().unwrap_err().reason;
    assert!(reason.contains("457x191x67") && reason.contains("457x191x74"), "{reason}");
}

#[test]
fn an_unknown_name_leaves_the_models_own_sizes() {
    let own = r#"ProfileName="PG1" OverallWidth="250" OverallDepth="700" WebThickness="10" FlangeThickness="20""#;
    for zero in ["", r#" FilletRadius="0""#] {
        let steelwork = taken(&beam("B", &extruded(&profile(I, &format!("{own}{zero}"), ""), 6000.0, "0 0 1")));
        let section = only(&steelwork).section.as_ref().unwrap().clone();
        assert!(matches!(section.origin, Origin::Modelled { .. }));
        assert_eq!((section.value.designation.as_str(), section.value.r), ("PG1", None));
    }
    let outlined = taken(&beam("B", &extruded(&outline("PG1", &sharp_i(700.0, 250.0, 10.0, 20.0)), 6000.0, "0 0 1")));
    let section = only(&outlined).section.as_ref().unwrap().clone();
    assert!(matches!(section.origin, Origin::Derived(_)));
    close(section.value.t_w.get(), 10.0, 1e-6);
    close(section.value.t_f.get(), 20.0, 1e-6);
    assert_eq!(section.value.r, None);
}

#[test]
fn other_shapes_are_members_without_a_section() {
    for (shape, solid) in [
        (Shape::Hollow, profile("IfcRectangleHollowProfileDef", r#"XDim="100" YDim="200" WallThickness="8""#, "")),
        (Shape::Hollow, profile("IfcCircleHollowProfileDef", r#"Radius="70" WallThickness="5""#, "")),
        (Shape::Other, profile("IfcLShapeProfileDef", r#"Depth="150" Width="90" Thickness="10""#, "")),
        (
            Shape::Other,
            profile("IfcUShapeProfileDef", r#"Depth="200" FlangeWidth="75" WebThickness="8" FlangeThickness="11""#, ""),
        ),
        // A mono-symmetric outline: one flange wider than the other.
        (
            Shape::Other,
            outline(
                "",
                &[
                    (-50.0, 0.0),
                    (50.0, 0.0),
                    (50.0, 10.0),
                    (5.0, 10.0),
                    (5.0, 150.0),
                    (-5.0, 150.0),
                    (-5.0, 10.0),
                    (-50.0, 10.0),
                ],
            ),
        ),
    ] {
        let steelwork = taken(&beam("B", &extruded(&solid, 3000.0, "0 0 1")));
        assert_eq!(only(&steelwork).shape, shape);
        assert!(only(&steelwork).section.is_err());
    }
}

/// A quarter of an I with arcs at its roots, mirrored to a whole one, as an `IfcIndexedPolyCurve`.
fn arced_i(h: f64, b: f64, t_w: f64, t_f: f64, r: f64) -> String {
    let (x, y, w, f, k) = (b / 2.0, h / 2.0, t_w / 2.0, h / 2.0 - t_f, r * (1.0 - FRAC_1_SQRT_2));
    // From the tip of the lower right flange up the right side, then down the left one.
    let right = [
        (x, -y),
        (x, -f),
        (w + r, -f),
        (w + k, -f + k),
        (w, -f + r),
        (w, f - r),
        (w + k, f - k),
        (w + r, f),
        (x, f),
        (x, y),
    ];
    let left = right.map(|(x, y)| (-x, -y));
    let points: Vec<String> = right.iter().chain(&left).map(|(x, y)| format!("{x} {y}")).collect();
    let half = |first: usize| {
        let at = |i: usize| first + i;
        format!(
            r#"<IfcLineIndex-wrapper>{} {} {}</IfcLineIndex-wrapper><IfcArcIndex-wrapper>{} {} {}</IfcArcIndex-wrapper><IfcLineIndex-wrapper>{} {}</IfcLineIndex-wrapper><IfcArcIndex-wrapper>{} {} {}</IfcArcIndex-wrapper><IfcLineIndex-wrapper>{} {} {}</IfcLineIndex-wrapper>"#,
            at(0),
            at(1),
            at(2),
            at(2),
            at(3),
            at(4),
            at(4),
            at(5),
            at(5),
            at(6),
            at(7),
            at(7),
            at(8),
            at(9)
        )
    };
    let closing = [(10, 11), (20, 1)].map(|(a, b)| format!("<IfcLineIndex-wrapper>{a} {b}</IfcLineIndex-wrapper>"));
    let curve = format!(
        r#"<OuterCurve xsi:type="IfcIndexedPolyCurve"><Points xsi:type="IfcCartesianPointList2D" CoordList="{}"/><Segments>{}{}{}{}</Segments></OuterCurve>"#,
        points.join(" "),
        half(1),
        closing[0],
        half(11),
        closing[1]
    );
    profile("IfcArbitraryClosedProfileDef", r#"ProfileName="PG2""#, &curve)
}

#[test]
fn an_outline_with_rounded_roots_is_an_i_whose_radius_nobody_states() {
    let steelwork = taken(&beam("B", &extruded(&arced_i(453.4, 189.9, 8.5, 12.7, 10.2), 3000.0, "0 0 1")));
    let member = only(&steelwork);
    let section = &member.section.as_ref().unwrap().value;
    close(section.t_w.get(), 8.5, 1e-6);
    close(section.t_f.get(), 12.7, 1e-6);
    assert_eq!((member.shape, section.r), (Shape::I, None));
}

fn cut(first: &str, location: &str, axis: &str, agreement: bool) -> String {
    let first = first.replacen("<IfcExtrudedAreaSolid", r#"<FirstOperand xsi:type="IfcExtrudedAreaSolid""#, 1);
    let first = first.replacen("<IfcBooleanClippingResult", r#"<FirstOperand xsi:type="IfcBooleanClippingResult""#, 1);
    let end = first.rfind("</").unwrap();
    format!(
        r#"<IfcBooleanClippingResult Operator="difference">{}</FirstOperand><SecondOperand xsi:type="IfcHalfSpaceSolid" AgreementFlag="{agreement}"><BaseSurface xsi:type="IfcPlane"><Position><Location Coordinates="{location}"/><Axis DirectionRatios="{axis}"/></Position></BaseSurface></SecondOperand></IfcBooleanClippingResult>"#,
        &first[..end]
    )
}

#[test]
fn half_spaces_take_off_the_ends() {
    let whole = extruded(&profile(I, UB457, ""), 6000.0, "0 0 1");
    // Agreement false takes off the side to which the normal points, true the other one.
    let both = cut(&cut(&whole, "0 0 5500", "0 0 1", false), "0 0 200", "0 0 1", true);
    let steelwork = taken(&beam("UKB 457x191x67", &both));
    near(only(&steelwork).start, [0.0, 0.0, 200.0], 1e-9);
    near(only(&steelwork).end, [0.0, 0.0, 5500.0], 1e-9);
    // A mitre of 45° across the depth: the longest corner stays, half the depth beyond the axis.
    let steelwork = taken(&beam("UKB 457x191x67", &cut(&whole, "0 0 5500", "0 1 1", false)));
    near(only(&steelwork).end, [0.0, 0.0, 5500.0 + 453.4 / 2.0], 1e-9);
    assert!(only(&steelwork).disagreements.is_empty());
    // A plane along the axis cuts no end: told, not followed.
    let steelwork = taken(&beam("UKB 457x191x67", &cut(&whole, "0 200 0", "0 1 0", false)));
    assert_eq!(only(&steelwork).disagreements.len(), 1);
    near(only(&steelwork).end, [0.0, 0.0, 6000.0], 1e-9);
}

#[test]
fn grades_are_the_parts_own_and_never_two() {
    let solid = extruded(&profile(I, UB457, ""), 6000.0, "0 0 1");
    let at = [("IfcBeam", "i1")];
    let grade = |extra: &str, inside: &str| {
        let body = element("IfcBeam", r#"id="i1" Name="UKB 457x191x67""#, "", &solid, inside);
        only(&taken(&format!("{body}{extra}"))).grade.clone()
    };
    assert_eq!(grade(&material("S355JR", &at), "").unwrap().value.0, "S355");
    assert_eq!(grade("", &properties("Shop", &[("Steel grade", "IfcLabel", "S275")])).unwrap().value.0, "S275");
    for (extra, inside, word) in [
        (String::new(), String::new(), "no material or property"),
        (material("STEEL", &at), String::new(), "STEEL"),
        (material("8.8", &at), String::new(), "8.8"),
        (material("S355JR", &at), properties("Shop", &[("Steel grade", "IfcLabel", "S275")]), "two grades"),
    ] {
        let reason = grade(&extra, &inside).unwrap_err().reason;
        assert!(reason.contains(word), "{reason}");
    }
}

#[test]
fn concrete_is_rejected_by_its_material() {
    let solid = extruded(&rectangle(300.0, 400.0), 3000.0, "0 0 1");
    let body = element("IfcColumn", r#"id="i1" Name="C""#, "", &solid, "");
    let steelwork = taken(&format!("{body}{}", material("C25/30", &[("IfcColumn", "i1")])));
    assert!(steelwork.rejected[0].reason.contains("C25/30"));
}

#[test]
fn no_element_vanishes() {
    let revolved = r#"<IfcSphere Radius="5"><Position><Location Coordinates="0 0 0"/></Position></IfcSphere>"#;
    for (class, solids, word) in [
        ("IfcBeam", "", "no body"),
        ("IfcBuildingElementProxy", revolved, "IfcSphere"),
        ("IfcColumn", &*extruded(&rectangle(100.0, 100.0), 100.0, "0 0 1"), "block"),
        ("IfcPlate", &*extruded(&rectangle(5000.0, 5000.0), 200.0, "0 0 1"), "200 mm thick"),
        ("IfcWall", &*extruded(&rectangle(5000.0, 100.0), 3000.0, "0 0 1"), "no steelwork"),
    ] {
        let steelwork = taken(&element(class, r#"id="i1" Name="X""#, "", solids, ""));
        assert_eq!(steelwork.rejected.len(), 1, "{class}");
        assert!(steelwork.rejected[0].reason.contains(word), "{}", steelwork.rejected[0].reason);
    }
}

proptest! {
    /// However a placement turns a member, its axes stay orthonormal and right-handed, and its length stays.
    #[test]
    fn axes_are_right_handed_under_any_placement(
        z in [-1.0..1.0f64, -1.0..1.0, -1.0..1.0],
        x in [-1.0..1.0f64, -1.0..1.0, -1.0..1.0],
        back in any::<bool>(),
    ) {
        let (z, x) = (glam::DVec3::from(z), glam::DVec3::from(x));
        prop_assume!(z.length() > 0.1 && z.normalize().cross(x).length() > 0.1);
        let text = |v: glam::DVec3| format!("{} {} {}", v.x, v.y, v.z);
        let solid = extruded(&profile(I, UB457, ""), 4000.0, if back { "0 0 -1" } else { "0 0 1" });
        let body = element("IfcMember", r#"id="i1" Name="UKB 457x191x67""#, &axes("5 6 7", &text(z), &text(x)), &solid, "");
        let steelwork = taken(&body);
        let member = only(&steelwork);
        right_handed(member);
        prop_assert!((member.start.distance(member.end) - 4000.0).abs() < 1e-6);
        prop_assert!(member.section.is_ok());
    }
}
