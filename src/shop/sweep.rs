//! Swept bodies and primitives as prisms; what is curved or tapered is stood in for by one that says so.

use std::f64::consts::TAU;

use glam::{DAffine2, DAffine3, DMat3, DVec2, DVec3};

use super::outline::{FACETS, Loop};
use super::placement::direction;
use super::profile::{Kind, Profile};
use super::reading::Reading;
use super::solid::{Prism, Solid};
use crate::exchange::{Entity, View};

/// Curves of curves nest; deeper than this is none.
const DEPTH: usize = 4;
/// A line that strays less than this from the straight one between its ends is straight, mm.
const STRAIGHT: f64 = 0.1;

impl<'a> Reading<'a> {
    /// A swept solid or primitive in its own coordinates.
    pub fn sweep(&self, item: Entity<'a>) -> Solid {
        if item.is_a("IfcExtrudedAreaSolid") {
            self.extrusion(item)
        } else if item.is_a("IfcRevolvedAreaSolid") {
            self.revolution(item)
        } else if item.is_a("IfcSweptDiskSolid") {
            self.disk(item)
        } else if item.is_a("IfcSweptAreaSolid") && item.entity("Directrix").is_some() {
            let profile = self.profile(item.entity("SweptArea").ok_or("its body has a sweep without a profile")?)?;
            self.along(item, profile, self.position(item)?)
        } else if item.is_a("IfcBlock") || item.is_a("IfcRightCircularCylinder") {
            self.primitive(item)
        } else {
            Err(format!("its body is no straight prism ({})", item.class()))
        }
    }

    fn position(&self, item: Entity<'a>) -> Result<DAffine3, String> {
        item.entity("Position").map_or(Ok(DAffine3::IDENTITY), |p| self.axes(p))
    }

    fn size(&self, item: Entity<'a>, attribute: &str) -> Result<f64, String> {
        let size = item.number(attribute).map(|d| d * self.units.length).filter(|d| *d > 0.0 && d.is_finite());
        size.ok_or_else(|| {
            format!("its body has an {} whose {attribute} is not more than 0 ({})", item.class(), item.place())
        })
    }

    fn extrusion(&self, solid: Entity<'a>) -> Solid {
        let profile = self.profile(solid.entity("SweptArea").ok_or("its body has an extrusion without a profile")?)?;
        let depth = solid.number("Depth").map(|d| d * self.units.length).filter(|d| *d > 0.0 && d.is_finite());
        let depth = depth
            .ok_or_else(|| format!("its body has an extrusion whose Depth is not more than 0 ({})", solid.place()))?;
        let direction = direction(solid, "ExtrudedDirection")?
            .ok_or_else(|| format!("its body has an extrusion without an ExtrudedDirection ({})", solid.place()))?;
        let several = (profile.several > 1).then(|| format!("built up of {} profiles", profile.several));
        let (profile, tapered) = match solid.entity("EndSweptArea") {
            Some(end) => larger(profile, self.profile(end)?),
            None => (profile, None),
        };
        let mut prism = Prism::swept(profile, self.position(solid)?, direction * depth, self.straight())?;
        prism.beyond = tapered.or(several);
        Ok(prism)
    }

    /// A profile turned about an axis by less than a full turn: the chord stands in.
    fn revolution(&self, solid: Entity<'a>) -> Solid {
        let profile = self.profile(solid.entity("SweptArea").ok_or("its body has a revolution without a profile")?)?;
        let (at, about) = self.axle(solid)?;
        let angle = solid.number("Angle").map(|a| a * self.units.angle).filter(|a| a.is_finite());
        let angle = angle.ok_or("its body has a revolution without an angle")?;
        let centre = profile.outer.box_along(DVec2::X).centre.extend(0.0);
        let turned = at + glam::DQuat::from_axis_angle(about, angle) * (centre - at);
        let radius = (centre - at).reject_from(about).length();
        let why = format!("curved, with a radius of {radius:.0} mm");
        Self::chord(profile, centre, turned, why)?.moved(self.position(solid)?, self.straight())
    }

    /// The axis of a revolution.
    fn axle(&self, solid: Entity<'a>) -> Result<(DVec3, DVec3), String> {
        let axis = solid.entity("Axis").ok_or("its body has a revolution without an axis")?;
        Ok((self.point(axis.entity("Location"))?, direction(axis, "Axis")?.unwrap_or(DVec3::Z)))
    }

    /// What stands in for a profile that runs from one point to another in some other way than straight.
    fn chord(profile: Profile, from: DVec3, to: DVec3, why: String) -> Solid {
        let along = (to - from).try_normalize().ok_or("its body is swept back to where it starts")?;
        let beside = if along.x.abs() < 0.9 { DVec3::X } else { DVec3::Y };
        let x = beside.reject_from_normalized(along).normalize_or_zero();
        let centre = profile.outer.box_along(DVec2::X).centre;
        let frame = DAffine3::from_mat3_translation(DMat3::from_cols(x, along.cross(x), along), from);
        let profile = profile.mapped(DAffine2::from_translation(-centre), 1.0);
        let depth = from.distance(to);
        Ok(Prism { profile, frame, depth, cuts: Vec::new(), beyond: Some(why) })
    }

    /// A full turn about an axis: rings and rounds, one for each level at which the outline changes. `None` for
    /// anything else.
    pub fn turned_body(&self, solid: Entity<'a>) -> Option<Vec<Solid>> {
        if !solid.is_a("IfcRevolvedAreaSolid") {
            return None;
        }
        let full = solid.number("Angle").is_some_and(|a| (a * self.units.angle).abs() >= TAU - 1e-3);
        let profile = full.then(|| self.profile(solid.entity("SweptArea")?).ok()).flatten()?;
        let (at, about) = self.axle(solid).ok()?;
        let position = self.position(solid).ok()?;
        let about2 = about.truncate().try_normalize().filter(|_| about.z.abs() < 1e-6)?;
        // Away from the axis, on whichever side the profile lies.
        let away = about2.perp();
        let middle = profile.outer.box_along(DVec2::X).centre - at.truncate();
        let away = if middle.dot(away) < 0.0 { -away } else { away };
        let points = &profile.outer.points;
        let mut levels: Vec<f64> = points.iter().map(|p| (*p - at.truncate()).dot(about2)).collect();
        levels.sort_by(f64::total_cmp);
        levels.dedup_by(|a, b| *a - *b <= STRAIGHT);
        if levels.len() > 2 * FACETS as usize {
            return Some(vec![Err("its body is turned about an axis with more steps than any bolt".into())]);
        }
        let x = away.extend(0.0);
        let frame = |level: f64| {
            let axes = DMat3::from_cols(x, about.cross(x), about);
            position * DAffine3::from_mat3_translation(axes, at + about * level)
        };
        let ring = |from: f64, to: f64| -> Option<Solid> {
            let level = at.truncate() + about2 * ((from + to) / 2.0);
            let reach = profile.outer.box_along(away).size.x * 2.0 + middle.length();
            let chords = profile.outer.chords(level - away * reach, away);
            let (inner, outer) = (chords.first()?.0 - reach, chords.last()?.1 - reach);
            let mut ring = Profile {
                kind: Kind::Outline,
                outer: Loop::circle(DVec2::ZERO, outer),
                voids: Vec::new(),
                up: DVec2::Y,
                ..profile.clone()
            };
            if inner > STRAIGHT {
                ring.voids.push(Loop::circle(DVec2::ZERO, inner));
                ring.kind = if inner * inner > 0.5 * outer * outer { Kind::Hollow } else { Kind::Outline };
            }
            Some(Prism::swept(ring, frame(from), DVec3::Z * (to - from), self.straight()))
        };
        let rings: Vec<Solid> = levels.windows(2).filter_map(|w| ring(w[0], w[1])).collect();
        (!rings.is_empty()).then_some(rings)
    }

    /// A disk along a line: a round bar or a pipe, if the line is straight.
    fn disk(&self, solid: Entity<'a>) -> Solid {
        let radius = self.size(solid, "Radius")?;
        let inner = solid.number("InnerRadius").map(|r| r * self.units.length).filter(|r| *r > 0.0 && *r < radius);
        let profile = Profile {
            class: solid.class().to_owned(),
            name: None,
            kind: if inner.is_some() { Kind::Hollow } else { Kind::Outline },
            outer: Loop::circle(DVec2::ZERO, radius),
            voids: inner.map(|r| Loop::circle(DVec2::ZERO, r)).into_iter().collect(),
            up: DVec2::Y,
            several: 1,
            of_material: false,
            place: solid.place(),
        };
        self.along(solid, profile, DAffine3::IDENTITY)
    }

    /// A profile along the item's directrix.
    fn along(&self, item: Entity<'a>, profile: Profile, map: DAffine3) -> Solid {
        let line = self.line(item.entity("Directrix").ok_or("its body has a sweep without a directrix")?, 0)?;
        let (Some(from), Some(to)) = (line.first().copied(), line.last().copied()) else {
            return Err("its body is swept along a line without points".into());
        };
        let run = to - from;
        let off = |p: &DVec3| (*p - from).reject_from(run).length();
        let back = line.windows(2).any(|w| (w[1] - w[0]).dot(run) < 0.0);
        let straight = run.length() > 0.0 && !back && line.iter().all(|p| off(p) <= STRAIGHT);
        let trimmed = |name: &str| item.number(name).is_some_and(|t| t.abs() > 1e-9 && line.len() > 2);
        if trimmed("StartParam") {
            return Err("its body is swept along a part of a line only, which is not read".into());
        }
        let bent = format!("bent or curved: swept along a line of {} points", line.len());
        // The longest straight length is what a bent rod passes through a plate with.
        if !straight && profile.outer.circle.is_some() {
            let length = |w: &&[DVec3]| w[0].distance_squared(w[1]);
            let longest = line.windows(2).max_by(|a, b| length(a).total_cmp(&length(b)));
            if let Some([a, b]) = longest {
                return Self::chord(profile, *a, *b, bent)?.moved(map, self.straight());
            }
        }
        let mut prism = Self::chord(profile, from, to, bent)?.moved(map, self.straight())?;
        // How an open section turns about a straight line is not read, so that only a round one is taken as it is.
        if straight {
            let round = prism.profile.outer.circle.is_some();
            prism.beyond =
                (!round).then(|| "swept along a line, about which its section's turn is not read".to_owned());
        }
        Ok(prism)
    }

    /// The points of a line in space; an arc by its ends and its middle.
    fn line(&self, curve: Entity<'a>, depth: usize) -> Result<Vec<DVec3>, String> {
        let unread = || format!("its body is swept along a line that is not read ({})", curve.class());
        let all = |list: Vec<Entity<'a>>| list.into_iter().map(|p| self.point(Some(p))).collect();
        match curve.class() {
            "IfcPolyline" => all(curve.entities("Points")),
            "IfcIndexedPolyCurve" => {
                let Some(rows) = curve.entity("Points").and_then(|list| list.value("CoordList").list()) else {
                    return Err(unread());
                };
                let point = |row: View| match row.list()?.numbers()?.as_slice() {
                    [x, y, z] => Some(DVec3::new(*x, *y, *z) * self.units.length),
                    _ => None,
                };
                let points: Option<Vec<DVec3>> = rows.iter().map(point).collect();
                points.filter(|all| all.iter().all(|p| p.is_finite())).ok_or_else(unread)
            }
            "IfcCompositeCurve" if depth < DEPTH => {
                let mut points = Vec::new();
                for segment in curve.entities("Segments") {
                    let mut piece = self.line(segment.entity("ParentCurve").ok_or_else(unread)?, depth + 1)?;
                    if segment.truth("SameSense") == Some(false) {
                        piece.reverse();
                    }
                    points.extend(piece);
                }
                Ok(points)
            }
            "IfcTrimmedCurve" => {
                let basis = curve.entity("BasisCurve").ok_or_else(unread)?;
                let trim = |name: &str| {
                    let point = curve.entities(name).into_iter().find(|e| e.is_a("IfcCartesianPoint"));
                    let parameter = match curve.value(name) {
                        View::List(items) => items.iter().find_map(View::number),
                        value => value.number(),
                    };
                    (point, parameter)
                };
                let at = |(point, parameter): (Option<Entity<'a>>, Option<f64>)| -> Result<DVec3, String> {
                    if let Some(point) = point {
                        return self.point(Some(point));
                    }
                    let t = parameter.ok_or_else(unread)?;
                    match basis.class() {
                        "IfcLine" => {
                            let vector = basis.entity("Dir").ok_or_else(unread)?;
                            let unit = direction(vector, "Orientation")?.ok_or_else(unread)?;
                            let length = vector.number("Magnitude").ok_or_else(unread)? * self.units.length;
                            Ok(self.point(basis.entity("Pnt"))? + unit * length * t)
                        }
                        "IfcCircle" => {
                            let axes = self.axes(basis.entity("Position").ok_or_else(unread)?)?;
                            let (sin, cos) = (t * self.units.angle).sin_cos();
                            let radius = self.size(basis, "Radius")?;
                            Ok(axes.transform_point3(DVec3::new(radius * cos, radius * sin, 0.0)))
                        }
                        _ => Err(unread()),
                    }
                };
                let (from, to) = (at(trim("Trim1"))?, at(trim("Trim2"))?);
                if basis.is_a("IfcLine") {
                    return Ok(vec![from, to]);
                }
                // Which way round does not matter: it is curved.
                let centre = self.axes(basis.entity("Position").ok_or_else(unread)?)?.translation;
                let radius = from.distance(centre);
                let middle = centre + ((from + to) / 2.0 - centre).normalize_or_zero() * radius;
                Ok(vec![from, middle, to])
            }
            _ => Err(unread()),
        }
    }

    fn primitive(&self, item: Entity<'a>) -> Solid {
        let (outer, depth) = if item.is_a("IfcBlock") {
            let (x, y) = (self.size(item, "XLength")?, self.size(item, "YLength")?);
            // A block stands on the corner of its position, a cylinder on its centre.
            let block = Loop::rectangle(x, y).mapped(DAffine2::from_translation(DVec2::new(x, y) / 2.0), 1.0);
            (block, self.size(item, "ZLength")?)
        } else {
            (Loop::circle(DVec2::ZERO, self.size(item, "Radius")?), self.size(item, "Height")?)
        };
        let profile = Profile {
            class: item.class().to_owned(),
            name: None,
            kind: Kind::Outline,
            outer,
            voids: Vec::new(),
            up: DVec2::Y,
            several: 1,
            of_material: false,
            place: item.place(),
        };
        Prism::swept(profile, self.position(item)?, DVec3::Z * depth, self.straight())
    }
}

/// The larger of the profiles at both ends, and a sentence if they are not one.
fn larger(start: Profile, end: Profile) -> (Profile, Option<String>) {
    let (a, b) = (start.outer.box_along(DVec2::X), end.outer.box_along(DVec2::X));
    let alike = (a.size - b.size).abs().max_element() <= STRAIGHT
        && a.centre.distance(b.centre) <= STRAIGHT
        && (start.outer.area() - end.outer.area()).abs() <= 1e-3 * start.outer.area();
    let why = format!(
        "tapered: {:.1} x {:.1} mm at its start, {:.1} x {:.1} mm at its end",
        a.size.y, a.size.x, b.size.y, b.size.x
    );
    let bulk = |size: DVec2| size.x * size.y;
    let profile = if bulk(b.size) > bulk(a.size) { end } else { start };
    (profile, (!alike).then_some(why))
}
