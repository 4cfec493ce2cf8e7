//! Bodies given by their faces: breps with plane or advanced faces, tessellations, surface models.

use std::f64::consts::TAU;

use glam::{DAffine3, DVec3};

use super::mesh::{Builder, POINTS};
use super::outline::FACETS;
use super::polyhedron::Asked;
use super::reading::Reading;
use super::solid::{Cut, Solid};
use crate::exchange::{Entity, View};

/// An edge of a curved face: its points, and the circle it runs on.
struct Edge {
    points: Vec<DVec3>,
    round: bool,
}

impl<'a> Reading<'a> {
    /// The solids of an item that is given by its faces; `None` for any other item.
    pub fn faces(&self, item: Entity<'a>) -> Option<Vec<Solid>> {
        let mut builder = Builder::default();
        let mut read = |set: Option<Entity<'a>>| self.face_set(set, &mut builder);
        let mut voids = Vec::new();
        let all: Result<(), String> = if item.is_a("IfcManifoldSolidBrep") {
            voids = item.entities("Voids");
            read(item.entity("Outer"))
        } else if item.is_a("IfcFaceBasedSurfaceModel") {
            item.entities("FbsmFaces").into_iter().try_for_each(|set| read(Some(set)))
        } else if item.is_a("IfcShellBasedSurfaceModel") {
            item.entities("SbsmBoundary").into_iter().try_for_each(|set| read(Some(set)))
        } else if item.is_a("IfcTriangulatedFaceSet") || item.is_a("IfcPolygonalFaceSet") {
            self.tessellation(item, &mut builder)
        } else {
            return None;
        };
        let asked = Asked { class: item.class(), place: item.place() };
        let mut solids = match all {
            Ok(()) => asked.solids(builder.build()),
            Err(reason) => return Some(vec![Err(reason)]),
        };
        for void in voids {
            let mut builder = Builder::default();
            let inside = match self.face_set(Some(void), &mut builder) {
                Ok(()) => asked.solids(builder.build()),
                Err(reason) => vec![Err(reason)],
            };
            let cuts =
                inside.into_iter().map(|s| s.map_or_else(|_| Cut::Other("a void".into()), |p| Cut::Prism(Box::new(p))));
            if let Some(Ok(first)) = solids.first_mut() {
                first.cuts.extend(cuts);
            }
        }
        Some(solids)
    }

    fn face_set(&self, set: Option<Entity<'a>>, builder: &mut Builder) -> Result<(), String> {
        let set = set.ok_or("its body has no shell")?;
        set.entities("CfsFaces").into_iter().try_for_each(|face| self.face(face, builder))
    }

    fn face(&self, face: Entity<'a>, builder: &mut Builder) -> Result<(), String> {
        let mut bounds = face.entities("Bounds");
        // The outer bound comes first, wherever the export put it.
        bounds.sort_by_key(|bound| !bound.is_a("IfcFaceOuterBound"));
        let mut loops: Vec<Vec<Edge>> = Vec::with_capacity(bounds.len());
        for bound in bounds {
            let Some(inner) = bound.entity("Bound") else { continue };
            loops.push(self.bound(inner)?);
        }
        let surface = face.entity("FaceSurface").filter(|s| s.is_a("IfcCylindricalSurface"));
        if let Some(surface) = surface {
            let position = surface.entity("Position").ok_or("its body has a cylinder without a position")?;
            return cylinder(self.axes(position)?.matrix3.z_axis, &loops, builder);
        }
        let mut indices = Vec::with_capacity(loops.len());
        for edges in loops {
            let corners = edges.iter().flat_map(|edge| &edge.points);
            indices.push(corners.map(|p| builder.point(*p)).collect::<Result<Vec<u32>, String>>()?);
        }
        builder.face(indices)
    }

    /// The edges of a bound, each with its start and what lies before its end.
    fn bound(&self, bound: Entity<'a>) -> Result<Vec<Edge>, String> {
        if bound.is_a("IfcPolyLoop") {
            let points: Result<Vec<DVec3>, String> =
                bound.entities("Polygon").into_iter().map(|p| self.point(Some(p))).collect();
            return Ok(vec![Edge { points: points?, round: false }]);
        }
        if !bound.is_a("IfcEdgeLoop") {
            return Ok(Vec::new()); // a vertex loop bounds nothing
        }
        bound.entities("EdgeList").into_iter().map(|edge| self.edge(edge)).collect()
    }

    fn edge(&self, oriented: Entity<'a>) -> Result<Edge, String> {
        let edge = oriented.entity("EdgeElement").unwrap_or(oriented);
        let vertex = |name: &str| {
            let vertex = edge.entity(name).and_then(|v| v.entity("VertexGeometry"));
            vertex.map(|p| self.point(Some(p))).unwrap_or_else(|| Err("its body has an edge without an end".into()))
        };
        let (start, end) = (vertex("EdgeStart")?, vertex("EdgeEnd")?);
        let curve = edge.entity("EdgeGeometry");
        let circle = curve.filter(|c| c.is_a("IfcCircle"));
        let mut points = match (circle, curve) {
            (Some(circle), _) => {
                let axes = self.axes(circle.entity("Position").ok_or("its body has a circle without a position")?)?;
                around(axes, start, end, edge.truth("SameSense") != Some(false))
            }
            (None, Some(curve)) if curve.is_a("IfcPolyline") => {
                let mut points = curve.entities("Points").into_iter().map(|p| self.point(Some(p))).collect::<Result<
                    Vec<DVec3>,
                    String,
                >>(
                )?;
                if edge.truth("SameSense") == Some(false) {
                    points.reverse();
                }
                points
            }
            _ => vec![start, end],
        };
        if oriented.truth("Orientation") == Some(false) {
            points.reverse();
        }
        if circle.is_none() || points.len() > 2 {
            points.pop(); // the next edge starts there
        }
        Ok(Edge { points, round: circle.is_some() })
    }

    fn tessellation(&self, item: Entity<'a>, builder: &mut Builder) -> Result<(), String> {
        let wrong = || format!("its body has an {} at {} that can't be followed", item.class(), item.place());
        let Some(rows) = item.entity("Coordinates").and_then(|list| list.value("CoordList").list()) else {
            return Err(wrong());
        };
        if rows.len() > POINTS {
            return Err(format!("its body has more than {POINTS} points"));
        }
        let mut points = Vec::with_capacity(rows.len());
        for row in rows.iter() {
            let xyz = row.list().filter(|xyz| xyz.len() == 3).ok_or_else(wrong)?;
            let at = |axis| xyz.get(axis).and_then(View::number).ok_or_else(wrong);
            let (x, y, z) = (at(0)?, at(1)?, at(2)?);
            points.push(builder.point(DVec3::new(x, y, z) * self.units.length)?);
        }
        // Indices count from 1; where PnIndex is given they count in it.
        let renamed = item.numbers("PnIndex").filter(|all| !all.is_empty());
        let nth = |index: View| -> Option<u32> {
            let at = (index.number()? as usize).checked_sub(1)?;
            let at = renamed.as_ref().map_or(Some(at), |all| (*all.get(at)? as usize).checked_sub(1))?;
            points.get(at).copied()
        };
        let corners = |list: View| -> Option<Vec<u32>> { list.list()?.iter().map(nth).collect() };
        if let Some(triangles) = item.value("CoordIndex").list() {
            for triangle in triangles.iter() {
                builder.face(vec![corners(triangle).ok_or_else(wrong)?])?;
            }
        }
        for face in item.entities("Faces") {
            let mut loops = vec![corners(face.value("CoordIndex")).ok_or_else(wrong)?];
            if let Some(inner) = face.value("InnerCoordIndices").list() {
                for hole in inner.iter() {
                    loops.push(corners(hole).ok_or_else(wrong)?);
                }
            }
            builder.face(loops)?;
        }
        Ok(())
    }
}

/// Points of an arc about the z axis from one point to another, or of the full circle where they are one.
fn around(axes: DAffine3, start: DVec3, end: DVec3, forward: bool) -> Vec<DVec3> {
    let back = axes.inverse();
    let (a, b) = (back.transform_point3(start), back.transform_point3(end));
    let (from, to) = (a.truncate().to_angle(), b.truncate().to_angle());
    let turn = if forward { (to - from).rem_euclid(TAU) } else { -(from - to).rem_euclid(TAU) };
    let full = if forward { TAU } else { -TAU };
    let sweep = if start.distance(end) <= 1e-6 * (1.0 + a.length()) || turn == 0.0 { full } else { turn };
    let steps = (FACETS * sweep.abs() / TAU).ceil().clamp(2.0, FACETS) as usize;
    let radius = a.truncate().length();
    let at = |i: usize| {
        let angle = from + sweep * i as f64 / steps as f64;
        axes.transform_point3(DVec3::new(radius * angle.cos(), radius * angle.sin(), a.z))
    };
    (0..=steps)
        .map(|i| {
            if i == 0 {
                start
            } else if i == steps {
                end
            } else {
                at(i)
            }
        })
        .collect()
}

/// A cylinder's face as narrow plane ones: the arcs of its lower rim, swept up to the other rim.
fn cylinder(axis: DVec3, loops: &[Vec<Edge>], builder: &mut Builder) -> Result<(), String> {
    let all = || loops.iter().flatten().flat_map(|edge| &edge.points).map(|p| p.dot(axis));
    let (low, high) = (all().fold(f64::INFINITY, f64::min), all().fold(f64::NEG_INFINITY, f64::max));
    if !(high > low) {
        return Ok(()); // nothing between its rims, or none
    }
    for edges in loops {
        let after = edges.iter().cycle().skip(1);
        for (edge, next) in edges.iter().zip(after).filter(|(edge, _)| edge.round) {
            let lower = edge.points.iter().all(|p| p.dot(axis) - low <= 1e-3 * (high - low));
            if !lower {
                continue;
            }
            let end = next.points.first().copied();
            let points: Vec<DVec3> = edge.points.iter().copied().chain(end).collect();
            for pair in points.windows(2) {
                let [a, b] = *pair else { continue };
                let up = axis * (high - low);
                let corners = [a, b, b + up, a + up].map(|p| builder.point(p));
                let [a, b, c, d] = corners;
                builder.face(vec![vec![a?, b?, c?, d?]])?;
            }
        }
    }
    Ok(())
}
