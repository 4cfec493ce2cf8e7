//! Placements and transformation operators, as affine maps in mm.
//!
//! Axes are completed and made orthogonal by the functions of the IFC schema (`IfcBuildAxes`, `IfcFirstProjAxis`,
//! `IfcBaseAxis`); where those yield nothing (zero or parallel directions) the map is refused with a reason.

use glam::{DAffine2, DAffine3, DMat2, DMat3, DVec3};

use super::reading::Reading;
use crate::exchange::Entity;

/// Longest chain of `PlacementRelTo` that is followed; a real one has about ten links.
const DEPTH: usize = 256;

impl Reading<'_> {
    /// World placement of a product; the identity where it has none.
    pub fn placement_of(&self, product: Entity<'_>) -> Result<DAffine3, String> {
        product.entity("ObjectPlacement").map_or(Ok(DAffine3::IDENTITY), |placement| self.placement(placement))
    }

    fn placement(&self, placement: Entity<'_>) -> Result<DAffine3, String> {
        if let Some((id, known)) = self.last_placement.get()
            && id == placement.id
        {
            return Ok(known);
        }
        // Most stand on what others stand on too.
        let parent = placement.entity("PlacementRelTo").map(|parent| parent.id);
        let known = parent.map_or(Some(DAffine3::IDENTITY), |id| self.placements.borrow().get(&id).copied());
        let world = match known {
            Some(parent) => self.placed(placement, parent)?,
            None => self.chained(placement)?,
        };
        self.last_placement.set(Some((placement.id, world)));
        Ok(world)
    }

    /// A placement on one that is known.
    fn placed(&self, link: Entity<'_>, parent: DAffine3) -> Result<DAffine3, String> {
        if !link.is_a("IfcLocalPlacement") {
            return Err(format!("its placement is {}; only IfcLocalPlacement is read", link.class()));
        }
        let relative = link.entity("RelativePlacement").ok_or("its placement has no RelativePlacement".to_owned())?;
        Ok(parent * self.axes(relative)?)
    }

    /// A placement with all that it is relative to, which is kept.
    fn chained(&self, placement: Entity<'_>) -> Result<DAffine3, String> {
        let mut chain = Vec::new();
        let mut next = Some(placement);
        let mut world = DAffine3::IDENTITY;
        while let Some(link) = next {
            if let Some(known) = self.placements.borrow().get(&link.id) {
                world = *known;
                break;
            }
            if chain.len() >= DEPTH {
                return Err(format!("its placement chain is a loop or longer than {DEPTH} links"));
            }
            chain.push(link);
            next = link.entity("PlacementRelTo");
        }
        for link in chain.into_iter().rev() {
            world = self.placed(link, world)?;
            self.placements.borrow_mut().insert(link.id, world);
        }
        Ok(world)
    }

    /// An `IfcAxis2Placement3D` or `2D` as a rigid map.
    pub fn axes(&self, placement: Entity<'_>) -> Result<DAffine3, String> {
        if placement.is_a("IfcAxis2Placement2D") {
            return self.axes_2d(placement).map(lift);
        }
        let location = self.point(placement.entity("Location"))?;
        let z = direction(placement, "Axis")?.unwrap_or(DVec3::Z);
        let x = first_axis(z, direction(placement, "RefDirection")?)
            .ok_or_else(|| parallel(placement, "RefDirection", "Axis"))?;
        Ok(DAffine3::from_mat3_translation(DMat3::from_cols(x, z.cross(x), z), location))
    }

    /// An `IfcAxis2Placement2D` as a rigid map.
    pub fn axes_2d(&self, placement: Entity<'_>) -> Result<DAffine2, String> {
        let location = self.point(placement.entity("Location"))?.truncate();
        let x = direction(placement, "RefDirection")?.unwrap_or(DVec3::X).truncate();
        let x = x.try_normalize().ok_or_else(|| degenerate(placement, "RefDirection"))?;
        Ok(DAffine2::from_mat2_translation(DMat2::from_cols(x, x.perp()), location))
    }

    /// An `IfcCartesianTransformationOperator3D` (or `2D`), scale included; it may mirror.
    pub fn operator(&self, operator: Entity<'_>) -> Result<DAffine3, String> {
        let location = self.point(operator.entity("LocalOrigin"))?;
        let scale = operator.number("Scale").unwrap_or(1.0);
        let (scale_2, scale_3) =
            (operator.number("Scale2").unwrap_or(scale), operator.number("Scale3").unwrap_or(scale));
        if !(scale > 0.0 && scale_2 > 0.0 && scale_3 > 0.0) {
            return Err(format!("its map is scaled by {scale}; a scale must be more than 0"));
        }
        let z = direction(operator, "Axis3")?.unwrap_or(DVec3::Z);
        let x = first_axis(z, direction(operator, "Axis1")?).ok_or_else(|| parallel(operator, "Axis1", "Axis3"))?;
        // Axis2 only tells the side: what is neither along z nor x of it.
        let y = match direction(operator, "Axis2")? {
            Some(axis) => (axis - axis.dot(z) * z - axis.dot(x) * x)
                .try_normalize()
                .ok_or_else(|| parallel(operator, "Axis2", "the other axes"))?,
            None => z.cross(x),
        };
        Ok(DAffine3::from_mat3_translation(DMat3::from_cols(x * scale, y * scale_2, z * scale_3), location))
    }

    /// A cartesian point in mm, z = 0 for one of two coordinates.
    pub fn point(&self, point: Option<Entity<'_>>) -> Result<DVec3, String> {
        let Some(point) = point else { return Err("a placement or curve lacks a point".into()) };
        vector(point, "Coordinates")
            .map(|p| p * self.units.length)
            .filter(|p| p.is_finite())
            .ok_or_else(|| format!("the point at {} has no two or three finite coordinates", point.place()))
    }
}

/// A map of the plane as one of space.
pub(super) fn lift(map: DAffine2) -> DAffine3 {
    let (x, y) = (map.matrix2.x_axis.extend(0.0), map.matrix2.y_axis.extend(0.0));
    DAffine3::from_mat3_translation(DMat3::from_cols(x, y, DVec3::Z), map.translation.extend(0.0))
}

/// Two or three numbers of a list attribute, z = 0 for one of two.
fn vector(of: Entity<'_>, attribute: &str) -> Option<DVec3> {
    let list = of.value(attribute).list()?;
    let at = |index| list.get(index)?.number();
    match list.len() {
        2 => Some(DVec3::new(at(0)?, at(1)?, 0.0)),
        3 => Some(DVec3::new(at(0)?, at(1)?, at(2)?)),
        _ => None,
    }
}

/// A unit direction; an error if it is given but has no length.
pub(super) fn direction(of: Entity<'_>, attribute: &str) -> Result<Option<DVec3>, String> {
    let Some(direction) = of.entity(attribute) else { return Ok(None) };
    vector(direction, "DirectionRatios")
        .and_then(DVec3::try_normalize)
        .map(Some)
        .ok_or_else(|| degenerate(of, attribute))
}

/// `IfcFirstProjAxis`: the x axis at right angles to z; `None` where the given one is parallel to z.
fn first_axis(z: DVec3, given: Option<DVec3>) -> Option<DVec3> {
    let towards = match given {
        Some(given) if given.cross(z).length() < 1e-9 => return None,
        Some(given) => given,
        None if z.abs_diff_eq(DVec3::X, 1e-12) || z.abs_diff_eq(-DVec3::X, 1e-12) => DVec3::Y,
        None if z.cross(DVec3::X).length() < 1e-9 => DVec3::Y, // all but parallel: the schema leaves noise
        None => DVec3::X,
    };
    (towards - towards.dot(z) * z).try_normalize()
}

fn degenerate(of: Entity<'_>, attribute: &str) -> String {
    format!("{attribute} of the {} at {} has no direction", of.class(), of.place())
}

fn parallel(of: Entity<'_>, attribute: &str, other: &str) -> String {
    format!("{attribute} of the {} at {} is parallel to {other}", of.class(), of.place())
}
