//! Right prisms: what a body comes to, wherever the exchange put it and whatever it cut off it.

use glam::{DAffine2, DAffine3, DMat2, DMat3, DVec2, DVec3};

use super::outline::Loop;
use super::profile::Profile;

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
    /// Why it is more than this prism, which only stands in for it: curved, tapered, built up.
    pub beyond: Option<String>,
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
        bounds: Option<(DAffine3, Loop)>,
    },
    /// An extrusion.
    Prism(Box<Prism>),
    /// Something else, by its class.
    Other(String),
    /// What the body's own faces show, as a sentence.
    Trim(String),
}

/// One solid of a body, or why it can't be read.
pub(super) type Solid = Result<Prism, String>;

impl Prism {
    /// The right prism that a profile and a sweep come to under an affine map; `straight` is the sine of the angle
    /// by which the sweep may lean.
    ///
    /// # Errors
    /// A clause that says why it is none.
    pub fn swept(profile: Profile, map: DAffine3, sweep: DVec3, straight: f64) -> Solid {
        let (x, y) = (map.matrix3.x_axis, map.matrix3.y_axis);
        let (scale, other) = (x.length(), y.length());
        let square = scale > 0.0 && other > 0.0 && x.dot(y).abs() <= 1e-6 * scale * other;
        if !square || !map.translation.is_finite() {
            return Err("its body is mapped with a skew across its profile".into());
        }
        let sweep = map.transform_vector3(sweep);
        let (x, normal) = (x / scale, x.cross(y).normalize_or_zero());
        let upright = sweep.dot(normal) / sweep.length();
        if !(upright.abs() >= (1.0 - straight * straight).sqrt()) {
            return Err("its body is extruded at a slant to its profile: no right prism".into());
        }
        // Swept against the normal: look at the profile from behind, so that z is always the sweep.
        let side = upright.signum();
        let (x, z) = (x * side, normal * side);
        let frame = DAffine3::from_mat3_translation(DMat3::from_cols(x, z.cross(x), z), map.translation);
        let profile = if (scale - other).abs() <= 1e-6 * scale {
            let flat = DAffine2::from_mat2(DMat2::from_diagonal(DVec2::new(side * scale, scale)));
            profile.mapped(flat, scale)
        } else {
            profile.stretched(DVec2::new(side * scale, other))?
        };
        let depth = sweep.length() * upright.abs();
        if !frame.is_finite() || !depth.is_finite() {
            return Err("its body has a coordinate that is not finite".into());
        }
        Ok(Self { profile, frame, depth, cuts: Vec::new(), beyond: None })
    }

    /// The prism under an affine map, with what is cut off it.
    ///
    /// # Errors
    /// A clause where it is no right prism any more.
    pub fn moved(self, map: DAffine3, straight: f64) -> Solid {
        let mut moved = Self::swept(self.profile, map * self.frame, DVec3::Z * self.depth, straight)?;
        moved.cuts = self.cuts.iter().map(|cut| cut.moved(map, straight)).collect();
        moved.beyond = self.beyond;
        Ok(moved)
    }

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

    /// Corners of the profile at both ends, in the world.
    pub fn corners(&self) -> impl Iterator<Item = DVec3> + '_ {
        self.profile.outer.points.iter().flat_map(|p| [0.0, self.depth].map(|level| self.at(*p, level)))
    }

    /// Area of the profile times length, mm³, voids included.
    pub fn bulk(&self) -> f64 {
        self.profile.outer.area() * self.depth
    }
}

impl Cut {
    fn moved(&self, map: DAffine3, straight: f64) -> Self {
        match self {
            Self::Plane { at, keep, bounds } => {
                // A normal turns by the inverse transpose, so that it stays one under unequal scales.
                let normal = map.matrix3.inverse().transpose() * *keep;
                match normal.try_normalize() {
                    Some(keep) => Self::Plane {
                        at: map.transform_point3(*at),
                        keep,
                        bounds: bounds.as_ref().map(|(frame, polygon)| (map * *frame, polygon.clone())),
                    },
                    None => Self::Other("a half-space that its map makes flat".into()),
                }
            }
            Self::Prism(prism) => match prism.as_ref().clone().moved(map, straight) {
                Ok(prism) => Self::Prism(Box::new(prism)),
                Err(_) => Self::Other("a slanted extrusion".into()),
            },
            Self::Other(_) | Self::Trim(_) => self.clone(),
        }
    }
}
