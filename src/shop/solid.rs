//! Bodies as right prisms in the world: what an extrusion, mapped any number of times and cut, comes to.

use glam::{DAffine2, DAffine3, DMat2, DMat3, DVec2, DVec3};

use super::placement::direction;
use super::profile::Profile;
use super::reading::Reading;
use crate::exchange::Entity;

/// Boolean results nest; a beam in the wild was cut 21 times.
const DEPTH: usize = 128;
/// Mapped items nest.
const NESTED: usize = 16;
/// A body of more items than this is no fastener group but a mistake (or an attack: maps can multiply).
const ITEMS: usize = 10_000;

/// A profile swept at right angles to its plane.
#[derive(Clone, Debug)]
pub(super) struct Prism {
    pub profile: Profile,
    /// From (profile x, profile y, distance along the sweep) to the world: rigid and right-handed.
    pub frame: DAffine3,
    /// Length of the sweep, mm.
    pub depth: f64,
    /// What boolean operations take off it.
    pub cuts: Vec<Cut>,
}

/// What is taken off a body.
#[derive(Clone, Debug)]
pub(super) enum Cut {
    /// Everything beyond a plane.
    Plane {
        /// A point of the plane, world.
        at: DVec3,
        /// Unit normal towards what is kept.
        keep: DVec3,
        /// The prism inside which the plane cuts, if it is bounded.
        bounds: Option<(DAffine3, Vec<DVec2>)>,
    },
    /// An extrusion.
    Prism(Box<Prism>),
    /// Something else, by its class.
    Other(String),
}

impl Prism {
    /// Unit direction of the sweep.
    pub fn axis(&self) -> DVec3 {
        self.frame.matrix3.z_axis
    }

    /// A point of the profile's plane at a distance along the sweep, in the world.
    pub fn at(&self, point: DVec2, along: f64) -> DVec3 {
        self.frame.transform_point3(point.extend(along))
    }

    /// A direction of the profile's plane in the world.
    pub fn turned(&self, direction: DVec2) -> DVec3 {
        self.frame.transform_vector3(direction.extend(0.0))
    }
}

/// One solid of a body, or why it can't be read.
pub(super) type Solid = Result<Prism, String>;

impl<'a> Reading<'a> {
    /// The solids of a part's body in the world; an error where there is none at all.
    pub fn body(&self, product: Entity<'a>) -> Result<Vec<Solid>, String> {
        let world = self.placement_of(product)?;
        let representations: Vec<_> =
            product.entity("Representation").map(|r| r.entities("Representations")).unwrap_or_default();
        let body = |r: &&Entity<'_>| {
            r.text("RepresentationIdentifier").is_some_and(|identifier| identifier.eq_ignore_ascii_case("Body"))
        };
        let mut items: Vec<_> = representations.iter().filter(body).flat_map(|r| r.entities("Items")).collect();
        if items.is_empty() {
            let solid = |item: &Entity<'_>| {
                item.is_a("IfcSolidModel") || item.is_a("IfcMappedItem") || item.is_a("IfcBooleanResult")
            };
            items = representations.iter().flat_map(|r| r.entities("Items")).filter(solid).collect();
        }
        let (mut solids, mut budget) = (Vec::new(), ITEMS);
        for item in items {
            self.solids(item, world, 0, &mut budget, &mut solids);
        }
        if solids.is_empty() { Err("it has no body".into()) } else { Ok(solids) }
    }

    /// End points of its Axis representation in the world, if it is a polyline.
    pub fn axis_line(&self, product: Entity<'a>) -> Option<Vec<DVec3>> {
        let world = self.placement_of(product).ok()?;
        let line = product
            .entity("Representation")?
            .entities("Representations")
            .into_iter()
            .filter(|r| r.text("RepresentationIdentifier").is_some_and(|i| i.eq_ignore_ascii_case("Axis")))
            .flat_map(|r| r.entities("Items"))
            .find(|item| item.is_a("IfcPolyline"))?;
        let points = line.entities("Points");
        let ends = [*points.first()?, *points.last()?];
        ends.into_iter().map(|p| Some(world.transform_point3(self.point(Some(p)).ok()?))).collect()
    }

    fn solids(&self, item: Entity<'a>, map: DAffine3, depth: usize, budget: &mut usize, into: &mut Vec<Solid>) {
        let Some(left) = budget.checked_sub(1) else { return };
        *budget = left;
        if left == 0 {
            into.push(Err(format!("its body has more than {ITEMS} items")));
        } else if depth > NESTED {
            into.push(Err(format!("its body is of mapped items nested deeper than {NESTED} levels")));
        } else if item.is_a("IfcMappedItem") {
            match self.mapping(item) {
                Ok((inner, items)) => {
                    for item in items {
                        self.solids(item, map * inner, depth + 1, budget, into);
                    }
                }
                Err(reason) => into.push(Err(reason)),
            }
        } else {
            into.push(self.solid(item, map));
        }
    }

    /// The map of a mapped item and the items it maps. The mapping origin is applied first, then the target, as
    /// exports are written; for the usual origin without offset every reading of the standard agrees.
    fn mapping(&self, item: Entity<'a>) -> Result<(DAffine3, Vec<Entity<'a>>), String> {
        let source = item.entity("MappingSource").ok_or("its body has a mapped item without a source")?;
        let origin = source.entity("MappingOrigin").map_or(Ok(DAffine3::IDENTITY), |o| self.axes(o))?;
        let target = item.entity("MappingTarget").map_or(Ok(DAffine3::IDENTITY), |t| self.operator(t))?;
        let items = source.entity("MappedRepresentation").map(|r| r.entities("Items")).unwrap_or_default();
        Ok((target * origin, items))
    }

    /// One solid: an extrusion, or the first operand of boolean results with what they cut.
    fn solid(&self, item: Entity<'a>, map: DAffine3) -> Solid {
        let mut cutters = Vec::new();
        let mut item = item;
        while item.is_a("IfcBooleanResult") {
            if cutters.len() > DEPTH {
                return Err(format!("its body is cut more than {DEPTH} times"));
            }
            if item.token("Operator") != Some("DIFFERENCE") {
                let operator = item.token("Operator").unwrap_or("none").to_lowercase();
                return Err(format!("its body is made by the boolean operator {operator}; only difference is read"));
            }
            cutters.push(item.entity("SecondOperand"));
            item = item.entity("FirstOperand").ok_or("its body has a boolean result without a first operand")?;
        }
        if !item.is_a("IfcExtrudedAreaSolid") {
            return Err(format!("its body is no straight prism ({})", item.class()));
        }
        let mut prism = self.extrusion(item, map)?;
        prism.cuts = cutters.into_iter().rev().map(|cutter| self.cut(cutter, map)).collect();
        Ok(prism)
    }

    fn cut(&self, cutter: Option<Entity<'a>>, map: DAffine3) -> Cut {
        let Some(cutter) = cutter else { return Cut::Other("nothing".into()) };
        let read = if cutter.is_a("IfcHalfSpaceSolid") {
            self.half_space(cutter, map)
        } else if cutter.is_a("IfcExtrudedAreaSolid") {
            self.extrusion(cutter, map).ok().map(|prism| Cut::Prism(Box::new(prism)))
        } else {
            None
        };
        read.unwrap_or_else(|| Cut::Other(cutter.class().to_owned()))
    }

    fn half_space(&self, cutter: Entity<'a>, map: DAffine3) -> Option<Cut> {
        let surface = cutter.entity("BaseSurface").filter(|s| s.is_a("IfcPlane"))?;
        let plane = map * self.axes(surface.entity("Position")?).ok()?;
        let normal = plane.matrix3.x_axis.cross(plane.matrix3.y_axis).try_normalize()?;
        // AgreementFlag true: the half-space that is taken off lies on the side away from the normal.
        let keep = if cutter.truth("AgreementFlag")? { normal } else { -normal };
        let bounds = if cutter.is_a("IfcPolygonalBoundedHalfSpace") {
            let position = map * self.axes(cutter.entity("Position")?).ok()?;
            Some((position, self.closed_curve(cutter.entity("PolygonalBoundary")).ok()?.points))
        } else {
            None
        };
        Some(Cut::Plane { at: plane.translation, keep, bounds })
    }

    fn extrusion(&self, solid: Entity<'a>, map: DAffine3) -> Solid {
        let profile = self.profile(solid.entity("SweptArea").ok_or("its body has an extrusion without a profile")?)?;
        let position = solid.entity("Position").map_or(Ok(DAffine3::IDENTITY), |p| self.axes(p))?;
        let depth = solid.number("Depth").map(|d| d * self.units.length).filter(|d| *d > 0.0 && d.is_finite());
        let depth = depth
            .ok_or_else(|| format!("its body has an extrusion whose Depth is not more than 0 ({})", solid.place()))?;
        let direction = direction(solid, "ExtrudedDirection")?
            .ok_or_else(|| format!("its body has an extrusion without an ExtrudedDirection ({})", solid.place()))?;
        prism(profile, map * position, direction * depth, self.rulebook.tolerances.angle)
    }
}

/// The right prism that a profile and a sweep come to under an affine map.
fn prism(profile: Profile, map: DAffine3, sweep: DVec3, angle_tolerance: f64) -> Solid {
    let (x, y) = (map.matrix3.x_axis, map.matrix3.y_axis);
    let scale = x.length();
    let skew = !((y.length() - scale).abs() <= 1e-6 * scale && x.dot(y).abs() <= 1e-6 * scale * scale);
    if skew || !(scale > 0.0) || !map.translation.is_finite() {
        return Err("its body is mapped with unequal scales across its profile".into());
    }
    let sweep = map.transform_vector3(sweep);
    let (x, normal) = (x / scale, x.cross(y).normalize_or_zero());
    let upright = sweep.dot(normal) / sweep.length();
    if !(upright.abs() >= angle_tolerance.to_radians().cos()) {
        return Err("its body is extruded at a slant to its profile: no right prism".into());
    }
    // Swept against the normal: look at the profile from behind, so that z is always the sweep.
    let side = upright.signum();
    let (x, z) = (x * side, normal * side);
    let frame = DAffine3::from_mat3_translation(DMat3::from_cols(x, z.cross(x), z), map.translation);
    let flat = DAffine2::from_mat2(DMat2::from_diagonal(DVec2::new(side * scale, scale)));
    let depth = sweep.length() * upright.abs();
    if !frame.is_finite() || !depth.is_finite() {
        return Err("its body has a coordinate that is not finite".into());
    }
    Ok(Prism { profile: profile.mapped(flat, scale), frame, depth, cuts: Vec::new() })
}
