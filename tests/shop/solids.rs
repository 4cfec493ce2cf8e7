//! Primitives, unions, sweeps and made profiles.

use faying::shop::{Member, Shape, Steelwork};

use super::model::*;
use crate::close;

fn part(name: &str, solids: &str) -> Steelwork {
    taken(&element("IfcMember", &format!(r#"id="i1" Name="{name}""#), "", solids, ""))
}

#[track_caller]
fn member(steelwork: &Steelwork) -> &Member {
    assert_eq!(steelwork.members.len(), 1, "{:?}", steelwork.rejected);
    &steelwork.members[0]
}

/// Renames the outermost element of a solid, as an operand of the attribute.
fn operand(attribute: &str, solid: &str) -> String {
    let end = solid.find([' ', '>']).unwrap();
    let close = solid.rfind("</").unwrap_or(solid.len());
    let class = &solid[1..end];
    let inside = &solid[end..close];
    match solid.strip_suffix("/>") {
        Some(bare) if close == solid.len() => format!(r#"<{attribute} xsi:type="{class}"{}/>"#, &bare[end..]),
        _ => format!(r#"<{attribute} xsi:type="{class}"{inside}</{attribute}>"#),
    }
}

fn boolean(operator: &str, first: &str, second: &str) -> String {
    format!(
        r#"<IfcBooleanResult Operator="{operator}">{}{}</IfcBooleanResult>"#,
        operand("FirstOperand", first),
        operand("SecondOperand", second)
    )
}

fn cylinder(at: &str, radius: f64, height: f64) -> String {
    format!(
        r#"<IfcRightCircularCylinder Height="{height}" Radius="{radius}"><Position><Location Coordinates="{at}"/></Position></IfcRightCircularCylinder>"#
    )
}

fn block(at: &str, x: f64, y: f64, z: f64) -> String {
    format!(
        r#"<IfcBlock XLength="{x}" YLength="{y}" ZLength="{z}"><Position><Location Coordinates="{at}"/></Position></IfcBlock>"#
    )
}

#[test]
fn a_tree_of_primitives_is_a_plate_with_holes() {
    let once = boolean("difference", &block("10 20 0", 200.0, 400.0, 15.0), &cylinder("60 80 -5", 11.0, 30.0));
    let twice = boolean("difference", &once, &cylinder("160 80 -5", 13.0, 30.0));
    let solid = format!("<IfcCsgSolid>{}</IfcCsgSolid>", operand("TreeRootExpression", &twice));
    let steelwork = part("PL15*200", &solid);
    assert_eq!(steelwork.plates.len(), 1, "{:?}", steelwork.rejected);
    let plate = &steelwork.plates[0];
    // The block stands on its corner.
    near(plate.centre, [110.0, 220.0, 7.5], 1e-9);
    let mut holes: Vec<f64> = plate.holes.iter().map(|h| h.diameter).collect();
    holes.sort_by(f64::total_cmp);
    close(holes[0], 22.0, 1e-9);
    close(holes[1], 26.0, 1e-9);
    assert_eq!(plate.disagreements, Vec::<String>::new());
}

#[test]
fn both_cutters_of_a_union_are_holes() {
    let both = boolean("union", &cylinder("60 80 -5", 11.0, 30.0), &cylinder("160 80 -5", 11.0, 30.0));
    let steelwork = part("Plate", &boolean("difference", &block("0 0 0", 200.0, 400.0, 15.0), &both));
    assert_eq!(steelwork.plates[0].holes.len(), 2);
}

#[test]
fn a_union_of_shank_and_head_is_one_bolt() {
    let solid = boolean("union", &cylinder("0 0 0", 10.0, 70.0), &cylinder("0 0 -12", 16.0, 12.0));
    let steelwork = part("Bolt M20 x 70", &solid);
    assert_eq!((steelwork.bolts.len(), steelwork.members.len()), (1, 0), "{:?}", steelwork.rejected);
    near(steelwork.bolts[0].end, [0.0, 0.0, 70.0], 1e-9);
    let steelwork = part("B", &boolean("intersection", &cylinder("0 0 0", 10.0, 70.0), &cylinder("0 0 0", 9.0, 70.0)));
    assert!(steelwork.rejected[0].reason.contains("intersection"));
}

const I: &str = "IfcIShapeProfileDef";
/// UKB 457x191x67 of BS 4-1:2005.
const UB457: &str =
    r#"OverallWidth="189.9" OverallDepth="453.4" WebThickness="8.5" FlangeThickness="12.7" FilletRadius="10.2""#;

#[test]
fn curved_tapered_and_built_up_members_are_members_that_are_not_assessed() {
    let i = profile(I, UB457, "");
    // A quarter turn of 10 m radius about an axis along y, 10 m off in x.
    let curved = format!(
        r#"<IfcRevolvedAreaSolid Angle="1.5707963267948966">{i}<Axis><Location Coordinates="10000 0 0"/><Axis DirectionRatios="0 1 0"/></Axis></IfcRevolvedAreaSolid>"#
    );
    let end = profile(I, &UB457.replace("453.4", "300"), "").replace("SweptArea", "EndSweptArea");
    let tapered = format!(
        r#"<IfcExtrudedAreaSolidTapered Depth="6000">{i}<ExtrudedDirection DirectionRatios="0 0 1"/>{end}</IfcExtrudedAreaSolidTapered>"#
    );
    let disk = r#"<IfcSweptDiskSolid Radius="40" InnerRadius="35"><Directrix xsi:type="IfcPolyline"><Points><IfcCartesianPoint Coordinates="0 0 0"/><IfcCartesianPoint Coordinates="0 0 3000"/><IfcCartesianPoint Coordinates="1000 0 5000"/></Points></Directrix></IfcSweptDiskSolid>"#;
    let flange = |y: f64| {
        format!(
            r#"<IfcExtrudedAreaSolid Depth="6000">{}<Position><Location Coordinates="0 {y} 0"/></Position><ExtrudedDirection DirectionRatios="0 0 1"/></IfcExtrudedAreaSolid>"#,
            rectangle(300.0, 20.0)
        )
    };
    let built = flange(390.0) + &flange(-390.0) + &extruded(&rectangle(10.0, 760.0), 6000.0, "0 0 1");
    for (solid, word) in [
        (&*curved, "radius of 10000 mm"),
        (&tapered, "tapered: 453.4 x 189.9"),
        (disk, "bent"),
        (&built, "built up of 3 solids"),
    ] {
        let steelwork = part("X1", solid);
        let member = member(&steelwork);
        assert!(member.not_assessed.as_ref().unwrap().contains(word), "{word}: {:?}", member.not_assessed);
        assert!(member.section.is_err());
        near(member.across.cross(member.depth), member.along.to_array(), 1e-9);
    }
    let steelwork = part("X1", &curved);
    let arch = member(&steelwork);
    near(arch.start, [0.0, 0.0, 0.0], 1e-6);
    // Turned about the y axis by 90°: from -10 m in x off the axle to 10 m in z, by the right-hand rule.
    near(arch.end, [10_000.0, 0.0, 10_000.0], 1e-6);
    let steelwork = part("X1", &built);
    let girder = member(&steelwork);
    near(girder.end - girder.start, [0.0, 0.0, 6000.0], 1e-6);
    close(girder.extents.max_element(), 800.0, 1e-9);
    close(girder.extents.min_element(), 300.0, 1e-9);
}

#[test]
fn ends_of_one_size_are_no_taper() {
    let i = profile(I, UB457, "");
    let end = i.replace("SweptArea", "EndSweptArea");
    let solid = format!(
        r#"<IfcExtrudedAreaSolidTapered Depth="6000">{i}<ExtrudedDirection DirectionRatios="0 0 1"/>{end}</IfcExtrudedAreaSolidTapered>"#
    );
    let steelwork = part("UKB 457x191x67", &solid);
    assert!(member(&steelwork).not_assessed.is_none() && member(&steelwork).section.is_ok());
}

#[test]
fn a_straight_disk_sweep_is_a_round_bar() {
    let disk = r#"<IfcSweptDiskSolid Radius="10"><Directrix xsi:type="IfcPolyline"><Points><IfcCartesianPoint Coordinates="5 0 0"/><IfcCartesianPoint Coordinates="5 0 70"/></Points></Directrix></IfcSweptDiskSolid>"#;
    let steelwork = part("Bolt M20", disk);
    near(steelwork.bolts[0].start, [5.0, 0.0, 0.0], 1e-9);
    near(steelwork.bolts[0].end, [5.0, 0.0, 70.0], 1e-9);
}

#[test]
fn a_full_turn_is_a_bolt_with_its_head() {
    // Half the outline of a bolt along y, turned about y: shank radius 10 from 0 to 70, head radius 16 below.
    let half =
        outline("", &[(0.0, -12.0), (16.0, -12.0), (16.0, 0.0), (10.0, 0.0), (10.0, 70.0), (0.0, 70.0), (0.0, -12.0)]);
    let solid = format!(
        r#"<IfcRevolvedAreaSolid Angle="6.283185307179586">{half}<Axis><Location Coordinates="0 0 0"/><Axis DirectionRatios="0 1 0"/></Axis></IfcRevolvedAreaSolid>"#
    );
    let steelwork = part("Bolt M20 x 70", &solid);
    assert_eq!(steelwork.bolts.len(), 1, "{:?}", steelwork.rejected);
    near(steelwork.bolts[0].start, [0.0, 0.0, 0.0], 1e-9);
    near(steelwork.bolts[0].end, [0.0, 70.0, 0.0], 1e-9);
    close(steelwork.bolts[0].diameter.as_ref().unwrap().value.get(), 20.0, 1e-9);
}

#[test]
fn made_profiles_come_to_what_they_are_made_of() {
    let parent = profile(I, UB457, "").replace("SweptArea", "ParentProfile");
    let turned = format!(
        r#"<SweptArea xsi:type="IfcDerivedProfileDef" ProfileType="area">{parent}<Operator><Axis1 DirectionRatios="0 1"/><LocalOrigin Coordinates="0 50"/></Operator></SweptArea>"#
    );
    let mirrored = format!(r#"<SweptArea xsi:type="IfcMirroredProfileDef" ProfileType="area">{parent}</SweptArea>"#);
    let steelwork = part("UKB 457x191x67", &extruded(&turned, 6000.0, "0 0 1"));
    near(member(&steelwork).start, [0.0, 50.0, 0.0], 1e-9);
    close(member(&steelwork).depth.x.abs(), 1.0, 1e-9);
    assert!(member(&steelwork).section.is_ok());
    let steelwork = part("UKB 457x191x67", &extruded(&mirrored, 6000.0, "0 0 1"));
    assert!(member(&steelwork).section.is_ok());
    // Two angles back to back: what they are together is not read.
    let angle = |x: f64| {
        format!(
            r#"<IfcLShapeProfileDef ProfileType="area" Depth="100" Width="65" Thickness="8"><Position><Location Coordinates="{x} 0"/></Position></IfcLShapeProfileDef>"#
        )
    };
    let pair = format!(
        r#"<SweptArea xsi:type="IfcCompositeProfileDef" ProfileType="area"><Profiles>{}{}</Profiles></SweptArea>"#,
        angle(-40.0),
        angle(40.0)
    );
    let steelwork = part("Brace", &extruded(&pair, 3000.0, "0 0 1"));
    assert!(member(&steelwork).not_assessed.as_ref().unwrap().contains("built up of 2 profiles"));
    close(member(&steelwork).extents.x, 145.0, 1e-9);
}

#[test]
fn an_asymmetric_i_of_equal_flanges_is_an_i() {
    let sizes = |top: f64| {
        format!(
            r#"ProfileName="G1" BottomFlangeWidth="300" OverallDepth="800" WebThickness="10" BottomFlangeThickness="20" TopFlangeWidth="{top}" TopFlangeThickness="20""#
        )
    };
    let solid = |top: f64| extruded(&profile("IfcAsymmetricIShapeProfileDef", &sizes(top), ""), 9000.0, "0 0 1");
    let steelwork = part("G1", &solid(300.0));
    assert_eq!(member(&steelwork).shape, Shape::I);
    close(member(&steelwork).section.as_ref().unwrap().value.t_f.get(), 20.0, 1e-9);
    let steelwork = part("G1", &solid(250.0));
    assert!(member(&steelwork).section.is_err());
}

/// A mapped item of a solid, with the rest of its operator.
fn mapped(solid: &str, operator: &str) -> String {
    format!(
        r#"<IfcMappedItem><MappingSource><MappingOrigin xsi:type="IfcAxis2Placement3D"><Location Coordinates="0 0 0"/></MappingOrigin><MappedRepresentation xsi:type="IfcShapeRepresentation" RepresentationIdentifier="Body"><Items>{solid}</Items></MappedRepresentation></MappingSource>{operator}</IfcMappedItem>"#
    )
}

#[test]
fn mirrored_and_stretched_maps_are_followed() {
    let i = profile(I, UB457, "");
    // An I drawn at half its depth and width is stretched to twice: flanges and web with it.
    let half =
        profile(I, r#"OverallWidth="94.95" OverallDepth="226.7" WebThickness="4.25" FlangeThickness="6.35""#, "");
    let uneven = r#"<MappingTarget xsi:type="IfcCartesianTransformationOperator3DnonUniform" Scale="2" Scale2="2" Scale3="3"><LocalOrigin Coordinates="0 0 0"/></MappingTarget>"#;
    let steelwork = part("UKB 457x191x67", &mapped(&extruded(&half, 2000.0, "0 0 1"), uneven));
    near(member(&steelwork).end, [0.0, 0.0, 6000.0], 1e-6);
    assert!(member(&steelwork).section.is_ok(), "{:?}", member(&steelwork).section);
    // A plate of 100 x 400 stretched across to 200 x 400.
    let across = r#"<MappingTarget xsi:type="IfcCartesianTransformationOperator3DnonUniform" Scale="2" Scale2="1" Scale3="1"><LocalOrigin Coordinates="0 0 0"/></MappingTarget>"#;
    let steelwork = part("PL15*200", &mapped(&extruded(&rectangle(100.0, 400.0), 15.0, "0 0 1"), across));
    assert_eq!(steelwork.plates.len(), 1, "{:?}", steelwork.rejected);
    assert!(steelwork.plates[0].disagreements.is_empty(), "{:?}", steelwork.plates[0].disagreements);
    // Mirrored across x, nested in a shift.
    let mirror = r#"<MappingTarget xsi:type="IfcCartesianTransformationOperator3D"><Axis1 DirectionRatios="-1 0 0"/><Axis2 DirectionRatios="0 1 0"/><LocalOrigin Coordinates="0 0 0"/><Axis3 DirectionRatios="0 0 1"/></MappingTarget>"#;
    let shift = r#"<MappingTarget xsi:type="IfcCartesianTransformationOperator3D"><LocalOrigin Coordinates="0 0 100"/></MappingTarget>"#;
    let moved = profile(I, UB457, r#"<Position><Location Coordinates="70 0"/></Position>"#);
    let _ = i;
    let steelwork = part("UKB 457x191x67", &mapped(&mapped(&extruded(&moved, 3000.0, "0 0 1"), mirror), shift));
    let member = member(&steelwork);
    near((member.start + member.end) / 2.0, [-70.0, 0.0, 1600.0], 1e-6);
    near(member.across.cross(member.depth), member.along.to_array(), 1e-9);
}

#[test]
fn a_materials_profile_is_a_witness_of_the_section() {
    let usage = |sizes: &str| {
        format!(
            r#"<IfcRelAssociatesMaterial GlobalId="0Rel000000000000000098"><RelatedObjects><IfcMember ref="i1" xsi:nil="true"/></RelatedObjects><RelatingMaterial><IfcMaterialProfileSetUsage CardinalPoint="8"><ForProfileSet><MaterialProfiles><IfcMaterialProfile><Material Name="S355JR"/><Profile xsi:type="{I}" ProfileType="area" ProfileName="PG 453" {sizes}/></IfcMaterialProfile></MaterialProfiles></ForProfileSet></IfcMaterialProfileSetUsage></RelatingMaterial></IfcRelAssociatesMaterial>"#
        )
    };
    // A sharp outline 226.7 below the axis, as the cardinal point says: where the body lies is what counts.
    let low: Vec<(f64, f64)> = sharp_i(453.4, 189.9, 8.5, 12.7).into_iter().map(|(x, y)| (x, y - 226.7)).collect();
    let body = element("IfcMember", r#"id="i1" Name="B""#, "", &extruded(&outline("", &low), 6000.0, "0 0 1"), "");
    let steelwork = taken(&(body.clone() + &usage(UB457)));
    let one = member(&steelwork);
    near(one.start, [0.0, -226.7, 0.0], 1e-9);
    let section = one.section.as_ref().unwrap();
    close(section.value.r.unwrap().get(), 10.2, 0.0);
    assert!(section.origin.to_string().contains("material"), "{}", section.origin);
    assert_eq!(one.grade.as_ref().unwrap().value.0, "S355");
    // It says another depth than the body has: the body is followed, and both are shown.
    let steelwork = taken(&(body + &usage(&UB457.replace("453.4", "500"))));
    let other = member(&steelwork);
    close(other.section.as_ref().unwrap().value.h.get(), 453.4, 1e-6);
    assert!(other.disagreements.iter().any(|d| d.contains("500.0")), "{:?}", other.disagreements);
}

#[test]
fn a_part_that_is_read_in_part_is_not_assessed() {
    let sphere = r#"<IfcSphere Radius="5"><Position><Location Coordinates="0 0 0"/></Position></IfcSphere>"#;
    let steelwork = part("UKB 457x191x67", &(extruded(&profile(I, UB457, ""), 6000.0, "0 0 1") + sphere));
    assert!(member(&steelwork).not_assessed.as_ref().unwrap().contains("IfcSphere"));
    let steelwork = part("PL15*200", &(extruded(&rectangle(200.0, 400.0), 15.0, "0 0 1") + sphere));
    assert!(steelwork.plates[0].disagreements[0].contains("IfcSphere"));
}

#[test]
fn a_ring_is_a_plate_and_a_short_pipe_is_none() {
    let inner = r#"<IfcCircle Radius="110"><Position xsi:type="IfcAxis2Placement2D"><Location Coordinates="0 0"/></Position></IfcCircle>"#;
    let curve = format!(
        r#"<OuterCurve xsi:type="IfcCircle" Radius="150"><Position xsi:type="IfcAxis2Placement2D"><Location Coordinates="0 0"/></Position></OuterCurve><InnerCurves>{inner}</InnerCurves>"#
    );
    let ring = profile("IfcArbitraryProfileDefWithVoids", "", &curve);
    let steelwork = part("F1", &extruded(&ring, 20.0, "0 0 1"));
    assert_eq!(steelwork.plates.len(), 1, "{:?}", steelwork.rejected);
    close(steelwork.plates[0].holes[0].diameter, 220.0, 1e-9);
    let steelwork = part("F1", &extruded(&ring, 100.0, "0 0 1"));
    assert_eq!((steelwork.plates.len(), member(&steelwork).shape), (0, Shape::Hollow));
}

/// UKB 457x191x67 6 m along z, its depth along y, less a block from `at` with these sizes.
fn notched(at: &str, (x, y, z): (f64, f64, f64)) -> Member {
    let sizes =
        r#"OverallWidth="189.9" OverallDepth="453.4" WebThickness="8.5" FlangeThickness="12.7" FilletRadius="10.2""#;
    let whole = extruded(&profile("IfcIShapeProfileDef", sizes, ""), 6000.0, "0 0 1");
    member(&part("UKB 457x191x67", &boolean("difference", &whole, &block(at, x, y, z)))).clone()
}

/// Own arithmetic on half the depth, 226.7.
#[test]
fn a_notch_takes_one_flange_at_one_end() {
    for (at, size, end, positive, length, depth) in [
        ("-100 176.7 -10", (200.0, 60.0, 110.0), false, true, 100.0, 50.0),
        ("-94.95 -226.7 5880", (189.9, 40.0, 120.0), true, false, 120.0, 40.0),
    ] {
        let member = notched(at, size);
        let [notch] = &member.notches[..] else { panic!("{:?} {:?}", member.notches, member.disagreements) };
        assert_eq!((notch.at_end, notch.positive), (end, positive));
        close(notch.length, length, 1e-6);
        close(notch.depth, depth, 1e-6);
        assert!(member.disagreements.is_empty() && notch.untaken.contains("cut by"));
    }
}

#[test]
fn what_is_no_notch_is_told() {
    for (at, size) in [
        // One half of the flange only; between the ends; all of the end; half of the member.
        ("0 176.7 -10", (200.0, 60.0, 110.0)),
        ("-100 176.7 3000", (200.0, 60.0, 110.0)),
        ("-100 -300 -10", (200.0, 600.0, 110.0)),
        ("-100 176.7 -10", (200.0, 60.0, 3200.0)),
        // Inside the web.
        ("-100 -50 -10", (200.0, 100.0, 110.0)),
    ] {
        let member = notched(at, size);
        assert!(member.notches.is_empty(), "{at}");
        assert!(member.disagreements.iter().any(|told| told.contains("cut by")), "{at}");
    }
}
