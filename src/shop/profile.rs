//! Profiles: the area that is swept, as loops in its own plane, mm.

use glam::{DAffine2, DAffine3, DMat2, DVec2, DVec3};

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
    /// How many profiles lie in it, side by side.
    pub several: usize,
    /// Whether it is the profile of a material, and not of a body.
    pub of_material: bool,
    pub place: Place,
}

/// Profiles of profiles nest; deeper than this is none.
const DEPTH: usize = 3;

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

impl Profile {
    /// The mean thickness of what lies round its voids, mm; 0 where no voids are drawn.
    pub fn wall(&self) -> f64 {
        if self.voids.is_empty() {
            return 0.0;
        }
        let voids = |of: fn(&Loop) -> f64| self.voids.iter().map(of).sum::<f64>();
        2.0 * (self.outer.area() - voids(Loop::area)) / (self.outer.perimeter() + voids(Loop::perimeter))
    }

    /// The profile with unequal scales along x and y.
    ///
    /// # Errors
    /// A clause where what is known of it would no longer hold.
    pub fn stretched(mut self, by: DVec2) -> Result<Self, String> {
        if self.kind != Kind::Outline && self.up.x.abs().min(self.up.y.abs()) > 1e-9 {
            return Err("its body is mapped with unequal scales across its profile".into());
        }
        let swapped = self.up.x.abs() > self.up.y.abs();
        let (x, y) = (by.x.abs(), by.y.abs());
        let (across, deep) = if swapped { (y, x) } else { (x, y) };
        if let Kind::I(sizes) = &mut self.kind {
            *sizes = ISizes {
                h: sizes.h * deep,
                b: sizes.b * across,
                t_w: sizes.t_w * across,
                t_f: sizes.t_f * deep,
                r: None, // an ellipse now
            };
        }
        let map = DAffine2::from_scale(by);
        for l in std::iter::once(&mut self.outer).chain(&mut self.voids) {
            *l = Loop { circle: None, ..std::mem::take(l).mapped(map, 1.0) };
        }
        self.up = map.transform_vector2(self.up).normalize_or(DVec2::Y);
        Ok(self)
    }
}

impl Reading<'_> {
    /// Reads a profile with its position.
    ///
    /// # Errors
    /// A clause that ends "its body …" where the profile can't be read.
    pub fn profile(&self, profile: Entity<'_>) -> Result<Profile, String> {
        self.profile_within(profile, 0)
    }

    /// A profile made of another one: derived, mirrored, or several side by side. `None` for any other.
    fn made_of(&self, profile: Entity<'_>, depth: usize) -> Option<Result<Profile, String>> {
        let derived = profile.is_a("IfcDerivedProfileDef");
        if !derived && !profile.is_a("IfcCompositeProfileDef") {
            return None;
        }
        if depth >= DEPTH {
            return Some(Err(format!("its profile is made of profiles more than {DEPTH} times over")));
        }
        let name = profile.text("ProfileName").map(str::to_owned);
        let parent = |parent: Option<Entity<'_>>| match parent {
            Some(parent) => self.profile_within(parent, depth + 1),
            None => Err(format!("the {} at {} is made of no profile", profile.class(), profile.place())),
        };
        if derived {
            return Some(parent(profile.entity("ParentProfile")).and_then(|read| {
                let map = match profile.entity("Operator") {
                    Some(operator) => self.operator(operator)?,
                    // Mirrored about y; IFC4 derives the operator.
                    None if profile.is_a("IfcMirroredProfileDef") => DAffine3::from_scale(DVec3::new(-1.0, 1.0, 1.0)),
                    None => DAffine3::IDENTITY,
                };
                let flat = DAffine2::from_mat2_translation(
                    DMat2::from_cols(map.matrix3.x_axis.truncate(), map.matrix3.y_axis.truncate()),
                    map.translation.truncate(),
                );
                let (sx, sy) = (flat.matrix2.x_axis.length(), flat.matrix2.y_axis.length());
                let read = if (sx - sy).abs() <= 1e-6 * sx {
                    read.mapped(flat, sx)
                } else {
                    let rigid = DAffine2::from_mat2_translation(
                        DMat2::from_cols(flat.matrix2.x_axis / sx, flat.matrix2.y_axis / sy),
                        flat.translation,
                    );
                    read.stretched(DVec2::new(sx, sy))?.mapped(rigid, 1.0)
                };
                Ok(Profile { name: name.or(read.name), ..read })
            }));
        }
        let all = profile.entities("Profiles");
        if all.len() > 16 {
            return Some(Err(format!("its profile is made of {} profiles; at most 16 are read", all.len())));
        }
        let read: Result<Vec<Profile>, String> = all.into_iter().map(|p| self.profile_within(p, depth + 1)).collect();
        Some(read.and_then(|mut read| match read.len() {
            0 => parent(None),
            1 => Ok(Profile { name: name.or(read[0].name.take()), ..read.swap_remove(0) }),
            several => {
                let points = read.iter().flat_map(|p| &p.outer.points);
                let (low, high) =
                    points.fold((DVec2::INFINITY, DVec2::NEG_INFINITY), |(l, h), p| (l.min(*p), h.max(*p)));
                let corners = vec![low, DVec2::new(high.x, low.y), high, DVec2::new(low.x, high.y)];
                Ok(Profile {
                    class: profile.class().to_owned(),
                    name,
                    kind: Kind::Boxed,
                    outer: Loop::new(corners)?,
                    voids: Vec::new(),
                    up: DVec2::Y,
                    several,
                    of_material: false,
                    place: profile.place(),
                })
            }
        }))
    }

    fn profile_within(&self, profile: Entity<'_>, depth: usize) -> Result<Profile, String> {
        if let Some(made) = self.made_of(profile, depth) {
            return made;
        }
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
            "IfcAsymmetricIShapeProfileDef" => self.asymmetric(profile)?,
            "IfcTrapeziumProfileDef" => {
                let (bottom, top, y) = (size("BottomXDim")?, size("TopXDim")?, size("YDim")?);
                let offset = profile.number("TopXOffset").unwrap_or_default() * self.units.length - bottom / 2.0;
                let corners = [(-bottom / 2.0, -y), (bottom / 2.0, -y), (offset + top, y), (offset, y)];
                let corners = corners.map(|(x, y)| DVec2::new(x, y / 2.0));
                (Kind::Outline, Loop::new(corners.to_vec())?, Vec::new())
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
            several: 1,
            of_material: false,
            place: profile.place(),
        };
        let position = profile.entity("Position").map_or(Ok(DAffine2::IDENTITY), |p| self.axes_2d(p))?;
        Ok(read.mapped(position, 1.0))
    }
    /// An I whose flanges may differ: where they do not it is one like any other, as welded girders are written.
    fn asymmetric(&self, profile: Entity<'_>) -> Result<(Kind, Loop, Vec<Loop>), String> {
        let size =
            |name: &str| profile.number(name).map(|n| n * self.units.length).filter(|n| *n > 0.0 && n.is_finite());
        // IFC2X3 calls the bottom flange overall.
        let bottom = size("BottomFlangeWidth").or_else(|| size("OverallWidth"));
        let (Some(bottom), Some(top), Some(h)) = (bottom, size("TopFlangeWidth"), size("OverallDepth")) else {
            return Err(format!("the {} at {} lacks a size", profile.class(), profile.place()));
        };
        let t_f = size("BottomFlangeThickness").or_else(|| size("FlangeThickness"));
        let same = |a: Option<f64>, b: Option<f64>| matches!((a, b), (Some(a), Some(b)) if (a - b).abs() < 1e-6);
        let upper = size("TopFlangeThickness").or(t_f);
        let slope =
            ["BottomFlangeSlope", "TopFlangeSlope"].iter().any(|s| profile.number(s).is_some_and(|s| s.abs() > 1e-6));
        let radii = [size("BottomFlangeFilletRadius").or_else(|| size("FilletRadius")), size("TopFlangeFilletRadius")];
        let kind = match (t_f, size("WebThickness")) {
            (Some(f), Some(w))
                if same(Some(bottom), Some(top)) && same(t_f, upper) && !slope && radii[0] == radii[1] =>
            {
                Kind::I(ISizes { h, b: bottom, t_w: w, t_f: f, r: radii[0] })
            }
            _ => Kind::Boxed,
        };
        if let Kind::I(sizes) = kind
            && !(2.0 * sizes.t_f < sizes.h && sizes.t_w < sizes.b)
        {
            return Err(format!("the {} at {} is thicker than it is large", profile.class(), profile.place()));
        }
        Ok((kind, Loop::rectangle(bottom.max(top), h), Vec::new()))
    }
}
