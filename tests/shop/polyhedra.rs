//! Bodies by their faces, written in each of the ways in which exports write them.

use glam::{DAffine3, DVec2, DVec3};

/// A body: its points, and faces of loops (the outer one first) of points by index.
#[derive(Clone, Default)]
pub struct Body {
    pub points: Vec<DVec3>,
    pub faces: Vec<Vec<Vec<usize>>>,
}

/// Points of a regular polygon.
pub fn ring(centre: (f64, f64), radius: f64, corners: usize) -> Vec<(f64, f64)> {
    let at = |i: usize| DVec2::from_angle(std::f64::consts::TAU * i as f64 / corners as f64) * radius;
    (0..corners).map(|i| (centre.0 + at(i).x, centre.1 + at(i).y)).collect()
}

impl Body {
    /// A prism along z from an outline and holes (without a repeated last point), caps as one face each.
    pub fn prism(outline: &[(f64, f64)], holes: &[Vec<(f64, f64)>], from: f64, depth: f64) -> Self {
        let mut body = Self::default();
        let (mut low, mut high) = (Vec::new(), Vec::new());
        for corners in std::iter::once(outline).chain(holes.iter().map(Vec::as_slice)) {
            let first = body.points.len();
            let n = corners.len();
            body.points.extend(corners.iter().map(|(x, y)| DVec3::new(*x, *y, from)));
            body.points.extend(corners.iter().map(|(x, y)| DVec3::new(*x, *y, from + depth)));
            low.push((first..first + n).rev().collect());
            high.push((first + n..first + 2 * n).collect());
            for i in 0..n {
                let j = (i + 1) % n;
                body.faces.push(vec![vec![first + i, first + j, first + n + j, first + n + i]]);
            }
        }
        body.faces.extend([low, high]);
        body
    }

    /// Several bodies as one list of faces.
    pub fn and(mut self, other: Self) -> Self {
        let first = self.points.len();
        self.points.extend(other.points);
        let shift = |l: Vec<usize>| l.into_iter().map(|i| i + first).collect();
        self.faces.extend(other.faces.into_iter().map(|face| face.into_iter().map(shift).collect()));
        self
    }

    pub fn moved(mut self, map: DAffine3) -> Self {
        self.points.iter_mut().for_each(|p| *p = map.transform_point3(*p));
        self
    }

    /// `IfcFace`s of poly loops, each with points of its own.
    fn shell(&self) -> String {
        let poly = |corners: &Vec<usize>| -> String {
            let point = |i: &usize| {
                let p = self.points[*i];
                format!(r#"<IfcCartesianPoint Coordinates="{} {} {}"/>"#, p.x, p.y, p.z)
            };
            corners.iter().map(point).collect()
        };
        let bound = |(i, corners): (usize, &Vec<usize>)| {
            let class = if i == 0 { "IfcFaceOuterBound" } else { "IfcFaceBound" };
            format!(
                r#"<{class} Orientation="true"><Bound xsi:type="IfcPolyLoop"><Polygon>{}</Polygon></Bound></{class}>"#,
                poly(corners)
            )
        };
        let face = |face: &Vec<Vec<usize>>| {
            format!("<IfcFace><Bounds>{}</Bounds></IfcFace>", face.iter().enumerate().map(bound).collect::<String>())
        };
        self.faces.iter().map(face).collect()
    }

    pub fn faceted(&self) -> String {
        format!("<IfcFacetedBrep><Outer><CfsFaces>{}</CfsFaces></Outer></IfcFacetedBrep>", self.shell())
    }

    pub fn face_based(&self) -> String {
        format!(
            "<IfcFaceBasedSurfaceModel><FbsmFaces><IfcConnectedFaceSet><CfsFaces>{}</CfsFaces></IfcConnectedFaceSet></FbsmFaces></IfcFaceBasedSurfaceModel>",
            self.shell()
        )
    }

    pub fn shell_based(&self) -> String {
        format!(
            "<IfcShellBasedSurfaceModel><SbsmBoundary><IfcClosedShell><CfsFaces>{}</CfsFaces></IfcClosedShell></SbsmBoundary></IfcShellBasedSurfaceModel>",
            self.shell()
        )
    }

    fn list(&self) -> String {
        let all: Vec<String> = self.points.iter().map(|p| format!("{} {} {}", p.x, p.y, p.z)).collect();
        format!(r#"<Coordinates CoordList="{}"/>"#, all.join(" "))
    }

    /// Loops by index; faces with holes in the class that has them.
    pub fn polygonal(&self) -> String {
        let one = |corners: &Vec<usize>| corners.iter().map(|i| (i + 1).to_string()).collect::<Vec<_>>().join(" ");
        let face = |face: &Vec<Vec<usize>>| match face.as_slice() {
            [outer] => format!(r#"<IfcIndexedPolygonalFace CoordIndex="{}"/>"#, one(outer)),
            [outer, holes @ ..] => {
                let holes: String = holes
                    .iter()
                    .map(|hole| {
                        format!("<Seq-IfcPositiveInteger-wrapper>{}</Seq-IfcPositiveInteger-wrapper>", one(hole))
                    })
                    .collect();
                format!(
                    r#"<IfcIndexedPolygonalFaceWithVoids CoordIndex="{}"><InnerCoordIndices>{holes}</InnerCoordIndices></IfcIndexedPolygonalFaceWithVoids>"#,
                    one(outer)
                )
            }
            [] => String::new(),
        };
        let faces: String = self.faces.iter().map(face).collect();
        format!("<IfcPolygonalFaceSet>{}<Faces>{faces}</Faces></IfcPolygonalFaceSet>", self.list())
    }

    /// Triangles; each face's corners as fans from the corners given for it (a face that is convex needs one).
    pub fn triangulated(&self, fans: impl Fn(&[Vec<usize>]) -> Vec<[usize; 3]>) -> String {
        let triangles = self.faces.iter().flat_map(|face| fans(face));
        let index: Vec<String> = triangles.map(|[a, b, c]| format!("{} {} {}", a + 1, b + 1, c + 1)).collect();
        format!(r#"<IfcTriangulatedFaceSet CoordIndex="{}">{}</IfcTriangulatedFaceSet>"#, index.join(" "), self.list())
    }
}

/// A fan of a convex face.
pub fn fan(face: &[Vec<usize>]) -> Vec<[usize; 3]> {
    let corners = &face[0];
    (1..corners.len() - 1).map(|i| [corners[0], corners[i], corners[i + 1]]).collect()
}
