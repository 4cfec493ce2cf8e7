//! Profiles: the area that is swept, as loops in its own plane, mm.

use glam::{DAffine2, DVec2};

use super::outline::Loop;
use super::reading::Reading;
use crate::exchange::Entity;
use crate::origin::Place;

/// Numbers of an I profile, mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct ISizes {
    pub h: f64,
    pub b: f64,
    pub t_w: f64,
    pub t_f: f64,
    /// Root radius; `None` where absent or zero.
    pub r: Option<f64>,
}

/// What is known of a profile besides its loops.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Kind {
    /// The numbers of an `IfcIShapeProfileDef`.
    I(ISizes),
    /// A hollow profile.
    Hollow,
    /// A profile known by its class only; the loop is its bounding box.
    Boxed,
    /// The loops are all there is to know.
    Outline,
}

/// A profile in the plane of its sweep.
#[derive(Clone, Debug)]
pub(super) struct Profile {
    pub class: String,
    pub name: Option<String>,
    pub kind: Kind,
    pub outer: Loop,
    pub voids: Vec<Loop>,
    /// Its own y axis: the direction of the depth.
    pub up: DVec2,
    pub place: Place,
}

impl Profile {
    /// The profile under a similarity of the plane that scales by `scale`.
    pub fn mapped(mut self, map: DAffine2, scale: f64) -> Self {
        self.outer = self.outer.mapped(map, scale);
        self.voids = self.voids.into_iter().map(|v| v.mapped(map, scale)).collect();
        self.up = map.transform_vector2(self.up).normalize_or(DVec2::Y);
        if let Kind::I(sizes) = &mut self.kind {
            for size in [&mut sizes.h, &mut sizes.b, &mut sizes.t_w, &mut sizes.t_f] {
                *size *= scale;
            }
            sizes.r = sizes.r.map(|r| r * scale);
        }
        self
    }
}

impl Reading<'_> {
    /// Reads a profile with its position.
    ///
    /// # Errors
    /// A clause that ends "its body …" where the profile can't be read.
    pub fn profile(&self, profile: Entity<'_>) -> Result<Profile, String> {
        let class = profile.class();
        let size = |attribute: &str| -> Result<f64, String> {
            profile
                .number(attribute)
                .map(|n| n * self.units.length)
                .filter(|n| *n > 0.0 && n.is_finite())
                .ok_or_else(|| format!("{attribute} of the {class} at {} is not more than 0", profile.place()))
        };
        let boxed = |x: f64, y: f64| Loop::rectangle(x, y);
        let (kind, outer, voids) = match class {
            "IfcIShapeProfileDef" => {
                let sizes = ISizes {
                    h: size("OverallDepth")?,
                    b: size("OverallWidth")?,
                    t_w: size("WebThickness")?,
                    t_f: size("FlangeThickness")?,
                    r: size("FilletRadius").ok(),
                };
                if !(2.0 * sizes.t_f < sizes.h && sizes.t_w < sizes.b) {
                    return Err(format!("the IfcIShapeProfileDef at {} is thicker than it is large", profile.place()));
                }
                let tapered = profile.number("FlangeSlope").is_some_and(|slope| slope.abs() > 1e-6);
                let kind = if tapered { Kind::Boxed } else { Kind::I(sizes) };
                (kind, boxed(sizes.b, sizes.h), Vec::new())
            }
            "IfcRectangleProfileDef" | "IfcRoundedRectangleProfileDef" => {
                (Kind::Outline, boxed(size("XDim")?, size("YDim")?), Vec::new())
            }
            "IfcCircleProfileDef" => (Kind::Outline, Loop::circle(DVec2::ZERO, size("Radius")?), Vec::new()),
            "IfcCircleHollowProfileDef" => (Kind::Hollow, Loop::circle(DVec2::ZERO, size("Radius")?), Vec::new()),
            "IfcRectangleHollowProfileDef" => (Kind::Hollow, boxed(size("XDim")?, size("YDim")?), Vec::new()),
            "IfcAsymmetricIShapeProfileDef" => {
                let width = size("BottomFlangeWidth")?.max(size("TopFlangeWidth")?);
                (Kind::Boxed, boxed(width, size("OverallDepth")?), Vec::new())
            }
            "IfcLShapeProfileDef" => {
                // An angle of equal legs may leave Width out.
                let depth = size("Depth")?;
                (Kind::Boxed, boxed(size("Width").unwrap_or(depth), depth), Vec::new())
            }
            "IfcUShapeProfileDef" | "IfcTShapeProfileDef" => {
                (Kind::Boxed, boxed(size("FlangeWidth")?, size("Depth")?), Vec::new())
            }
            "IfcZShapeProfileDef" => {
                let width = 2.0 * size("FlangeWidth")? - size("WebThickness")?;
                (Kind::Boxed, boxed(width, size("Depth")?), Vec::new())
            }
            "IfcCShapeProfileDef" => (Kind::Boxed, boxed(size("Width")?, size("Depth")?), Vec::new()),
            "IfcArbitraryClosedProfileDef" | "IfcArbitraryProfileDefWithVoids" => {
                let outer = self.closed_curve(profile.entity("OuterCurve"))?;
                let voids: Result<Vec<_>, _> =
                    profile.entities("InnerCurves").into_iter().map(|curve| self.closed_curve(Some(curve))).collect();
                let voids = voids?;
                // More void than steel: a hollow section, not a plate with holes.
                let area: f64 = voids.iter().map(Loop::area).sum();
                let hollow = voids.len() == 1 && area > 0.5 * outer.area();
                (if hollow { Kind::Hollow } else { Kind::Outline }, outer, voids)
            }
            other => return Err(format!("its profile is not read ({other})")),
        };
        let read = Profile {
            class: class.to_owned(),
            name: profile.text("ProfileName").map(str::to_owned),
            kind,
            outer,
            voids,
            up: DVec2::Y,
            place: profile.place(),
        };
        let position = profile.entity("Position").map_or(Ok(DAffine2::IDENTITY), |p| self.axes_2d(p))?;
        Ok(read.mapped(position, 1.0))
    }
}
