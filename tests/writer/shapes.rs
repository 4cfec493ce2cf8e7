//! Placements, profiles and solids as entities.

use glam::DVec3;

use super::building::Section;
use super::entity::{Declared::*, Entity, Field, Link, Simple};
use super::space::Frame;

fn point(coordinates: &[f64]) -> Entity {
    Entity::new("IfcCartesianPoint").reals("Coordinates", coordinates)
}

fn direction(of: DVec3) -> Entity {
    Entity::new("IfcDirection").reals("DirectionRatios", &of.to_array())
}

/// An axis placement; axes that are those of the parent are left out, as most programs do.
pub fn axes(frame: Frame) -> Entity {
    let placement = Entity::new("IfcAxis2Placement3D").one("Location", Exactly, point(&frame.origin.to_array()));
    if frame.z == DVec3::Z && frame.x == DVec3::X {
        return placement;
    }
    placement.one("Axis", Exactly, direction(frame.z)).one("RefDirection", Exactly, direction(frame.x))
}

/// A placement in the plane of a profile, with its axes.
pub fn flat_axes(origin: &[f64; 2]) -> Entity {
    Entity::new("IfcAxis2Placement2D").one("Location", Exactly, point(origin))
}

/// A frame with the parent's axes.
pub fn moved(origin: DVec3) -> Frame {
    Frame { origin, z: DVec3::Z, x: DVec3::X }
}

/// A local placement, relative to another one if given.
pub fn placement(relative_to: Option<u64>, frame: Frame) -> Entity {
    let placement = Entity::new("IfcLocalPlacement");
    let placement = match relative_to {
        Some(id) => placement.one("PlacementRelTo", Wider, Link::To("IfcLocalPlacement", id)),
        None => placement,
    };
    placement.one("RelativePlacement", Select, axes(frame))
}

/// A prism along z of its position.
pub fn extrusion(profile: impl Into<Link>, position: Option<Frame>, depth: f64) -> Entity {
    let solid = Entity::new("IfcExtrudedAreaSolid").one("SweptArea", Wider, profile);
    let solid = match position {
        Some(frame) => solid.one("Position", Exactly, axes(frame)),
        None => solid,
    };
    solid.one("ExtrudedDirection", Exactly, direction(DVec3::Z)).real("Depth", depth)
}

/// A representation of the kind.
pub fn representation(context: u64, identifier: &str, kind: &str, items: Vec<Link>) -> Entity {
    Entity::new("IfcShapeRepresentation")
        .text("RepresentationIdentifier", identifier)
        .text("RepresentationType", kind)
        .one("ContextOfItems", Wider, Link::To("IfcGeometricRepresentationSubContext", context))
        .many("Items", items)
}

/// The shape of a product.
pub fn shape(representation: Entity) -> Entity {
    Entity::new("IfcProductDefinitionShape").many("Representations", vec![representation.into()])
}

/// The profile of a rolled I section, standing: width along x, depth along y.
pub fn i_profile(section: &Section) -> Entity {
    Entity::new("IfcIShapeProfileDef")
        .token("ProfileType", "AREA")
        .text("ProfileName", &section.name)
        .real("OverallWidth", section.b)
        .real("OverallDepth", section.h)
        .real("WebThickness", section.t_w)
        .real("FlangeThickness", section.t_f)
        .real("FilletRadius", section.r)
}

/// A line through points of two or three coordinates.
pub fn polyline<const N: usize>(points: &[[f64; N]]) -> Entity {
    Entity::new("IfcPolyline").many("Points", points.iter().map(|xyz| point(xyz).into()).collect())
}

fn closed(corners: &[[f64; 2]]) -> Entity {
    let mut points = corners.to_vec();
    points.extend(corners.first());
    polyline(&points)
}

/// A closed outline.
pub fn outline(corners: &[[f64; 2]]) -> Entity {
    Entity::new("IfcArbitraryClosedProfileDef").token("ProfileType", "AREA").one("OuterCurve", Wider, closed(corners))
}

/// A closed outline with round holes: centre and diameter.
pub fn outline_with_holes(corners: &[[f64; 2]], holes: &[([f64; 2], f64)]) -> Entity {
    let hole = |(centre, diameter): &([f64; 2], f64)| {
        Entity::new("IfcCircle").one("Position", Select, flat_axes(centre)).real("Radius", diameter / 2.0).into()
    };
    Entity::new("IfcArbitraryProfileDefWithVoids")
        .token("ProfileType", "AREA")
        .one("OuterCurve", Wider, closed(corners))
        .many("InnerCurves", holes.iter().map(hole).collect())
}

/// Corners, and round holes by centre and diameter.
pub type Outline<'a> = (&'a [[f64; 2]], &'a [([f64; 2], f64)]);

/// How many edges a round hole has in a body bounded by plane faces.
const EDGES: usize = 24;

/// A prism on an outline, bounded by plane faces.
pub fn faceted(corners: &[[f64; 2]], holes: &[([f64; 2], f64)], depth: f64) -> Entity {
    let around = |([x, y], diameter): &([f64; 2], f64)| -> Vec<[f64; 2]> {
        // clockwise: the material is outside
        let angles = (0..EDGES).rev().map(|edge| std::f64::consts::TAU * edge as f64 / EDGES as f64);
        angles.map(|angle| [x + angle.cos() * diameter / 2.0, y + angle.sin() * diameter / 2.0]).collect()
    };
    let loops: Vec<Vec<[f64; 2]>> = std::iter::once(corners.to_vec()).chain(holes.iter().map(around)).collect();
    let bound = |class, points: Vec<[f64; 3]>| -> Link {
        let points = points.iter().map(|xyz| point(xyz).into()).collect();
        Entity::new(class)
            .one("Bound", Wider, Entity::new("IfcPolyLoop").many("Polygon", points))
            .field(Field::Simple("Orientation", Simple::Truth(true)))
            .into()
    };
    let class = |index| if index == 0 { "IfcFaceOuterBound" } else { "IfcFaceBound" };
    let cap = |z: f64, turned: bool| -> Link {
        let bounds = loops.iter().enumerate().map(|(index, corners)| {
            let mut points: Vec<[f64; 3]> = corners.iter().map(|[x, y]| [*x, *y, z]).collect();
            if turned {
                points.reverse();
            }
            bound(class(index), points)
        });
        Entity::new("IfcFace").many("Bounds", bounds.collect()).into()
    };
    let mut faces = vec![cap(0.0, true), cap(depth, false)];
    for corners in &loops {
        for (index, [x, y]) in corners.iter().enumerate() {
            let [next_x, next_y] = corners[(index + 1) % corners.len()];
            let side = vec![[*x, *y, 0.0], [next_x, next_y, 0.0], [next_x, next_y, depth], [*x, *y, depth]];
            faces.push(Entity::new("IfcFace").many("Bounds", vec![bound("IfcFaceOuterBound", side)]).into());
        }
    }
    Entity::new("IfcFacetedBrep").one("Outer", Exactly, Entity::new("IfcClosedShell").many("CfsFaces", faces))
}

/// A full circle.
pub fn circle(diameter: f64) -> Entity {
    Entity::new("IfcCircleProfileDef").token("ProfileType", "AREA").real("Radius", diameter / 2.0)
}

/// A ring by its outer and inner diameter.
pub fn ring(outer: f64, inner: f64) -> Entity {
    Entity::new("IfcCircleHollowProfileDef")
        .token("ProfileType", "AREA")
        .real("Radius", outer / 2.0)
        .real("WallThickness", (outer - inner) / 2.0)
}

/// A regular hexagon by its width across flats.
pub fn hexagon(across_flats: f64) -> Entity {
    let radius = across_flats / 3f64.sqrt();
    let corners = [0.0, 60.0, 120.0, 180.0, 240.0, 300.0_f64].map(|degrees| {
        let (sine, cosine) = degrees.to_radians().sin_cos();
        [radius * cosine, radius * sine]
    });
    outline(&corners)
}

/// An item that repeats a map at a place.
pub fn mapped(map: u64, at: DVec3) -> Entity {
    let at = point(&at.to_array());
    let target = Entity::new("IfcCartesianTransformationOperator3D").one("LocalOrigin", Exactly, at);
    Entity::new("IfcMappedItem").one("MappingSource", Exactly, Link::To("IfcRepresentationMap", map)).one(
        "MappingTarget",
        Wider,
        target,
    )
}
