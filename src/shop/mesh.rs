//! Bodies bounded by faces: points that are one where they coincide, and loops of them.

use std::collections::HashMap;

use glam::{DVec2, DVec3};

use super::outline::Loop;

/// Points within about this distance are one, mm: exports round, and repeat points under new numbers.
const SAME: f64 = 2e-3;
/// Exports round coordinates, to a tenth of a millimetre at worst: outlines may differ by so much, mm.
const ROUNDED: f64 = 0.1;
/// No coordinate of a body lies further out than this, mm (a map grid has up to 7e8).
const REACH: f64 = 1e11;
/// A body of more points than this is no part of a joint but a scan, or an attack.
pub(super) const POINTS: usize = 200_000;

/// A section of more loops times corners than this is none of a part.
const TESTS: usize = 10_000_000;

/// A body bounded by plane faces, mm. Which way the faces look does not matter to what is asked of it.
#[derive(Debug, Default)]
pub(super) struct Mesh {
    pub points: Vec<DVec3>,
    pub faces: Vec<Face>,
}

/// A plane face: its outer loop, then those of its holes, as indices of points.
#[derive(Clone, Debug, Default)]
pub(super) struct Face {
    pub loops: Vec<Vec<u32>>,
}

/// What a plane across a mesh shows.
#[derive(Clone, Debug)]
pub(super) struct Slice {
    pub outer: Loop,
    pub voids: Vec<Loop>,
    /// Loops that lie beside the largest one.
    pub beside: usize,
}

/// Builds a mesh point by point. The map is only looked up, never walked.
#[derive(Default)]
pub(super) struct Builder {
    mesh: Mesh,
    cells: HashMap<[i64; 3], u32>,
    corners: usize,
}

impl Builder {
    /// The index of a point, mm.
    ///
    /// # Errors
    /// A clause where it is not finite, out of reach, or one too many.
    pub fn point(&mut self, p: DVec3) -> Result<u32, String> {
        if !(p.abs().max_element() <= REACH) {
            return Err("its body has a coordinate that is not finite or out of all reach".into());
        }
        let cell = |offset: f64| ((p + offset) / (4.0 * SAME)).floor().to_array().map(|c| c as i64);
        let (low, high) = (cell(-SAME), cell(SAME));
        for x in low[0]..=high[0] {
            for y in low[1]..=high[1] {
                for z in low[2]..=high[2] {
                    if let Some(known) = self.cells.get(&[x, y, z]) {
                        return Ok(*known);
                    }
                }
            }
        }
        if self.mesh.points.len() >= POINTS {
            return Err(format!("its body has more than {POINTS} points"));
        }
        let index = self.mesh.points.len() as u32;
        self.mesh.points.push(p);
        self.cells.insert(cell(0.0), index);
        Ok(index)
    }

    /// A face by its loops, the outer one first; what has no three corners is left out.
    ///
    /// # Errors
    /// A clause where the body has too many corners.
    pub fn face(&mut self, loops: Vec<Vec<u32>>) -> Result<(), String> {
        let mut kept = Vec::with_capacity(loops.len());
        for mut one in loops {
            one.dedup();
            while one.len() > 1 && one.first() == one.last() {
                one.pop();
            }
            self.corners += one.len();
            if one.len() >= 3 {
                kept.push(one);
            } else if kept.is_empty() {
                break;
            }
        }
        if self.corners > 8 * POINTS {
            return Err(format!("its body has faces of more than {} corners", 8 * POINTS));
        }
        if !kept.is_empty() {
            self.mesh.faces.push(Face { loops: kept });
        }
        Ok(())
    }

    pub fn build(self) -> Mesh {
        self.mesh
    }
}

impl Mesh {
    /// Its bodies: what hangs together by points, in the order of their first faces.
    pub fn bodies(self) -> Vec<Self> {
        let mut root: Vec<u32> = (0..self.points.len() as u32).collect();
        fn find(root: &mut [u32], mut at: u32) -> u32 {
            while root[at as usize] != at {
                root[at as usize] = root[root[at as usize] as usize];
                at = root[at as usize];
            }
            at
        }
        for face in &self.faces {
            let mut corners = face.loops.iter().flatten();
            let Some(first) = corners.next() else { continue };
            for corner in corners {
                let (a, b) = (find(&mut root, *first), find(&mut root, *corner));
                root[a.max(b) as usize] = a.min(b);
            }
        }
        let mut index: HashMap<u32, usize> = HashMap::new();
        let mut bodies: Vec<Self> = Vec::new();
        let mut renamed: Vec<Option<u32>> = vec![None; self.points.len()];
        for face in self.faces {
            let Some(first) = face.loops.first().and_then(|l| l.first()) else { continue };
            let body = *index.entry(find(&mut root, *first)).or_insert_with(|| {
                bodies.push(Self::default());
                bodies.len() - 1
            });
            let body = &mut bodies[body];
            let mut rename = |old: u32| {
                *renamed[old as usize].get_or_insert_with(|| {
                    body.points.push(self.points[old as usize]);
                    body.points.len() as u32 - 1
                })
            };
            let loops = face.loops.into_iter().map(|l| l.into_iter().map(&mut rename).collect()).collect();
            body.faces.push(Face { loops });
        }
        bodies
    }

    /// What the plane at a level along an axis shows, in (x, y); `None` where its edges do not close.
    ///
    /// The level must not be that of a point. Edges of the section are followed by the mesh's own edges, so that
    /// nothing depends on how well points were rounded.
    pub fn slice(&self, axis: DVec3, level: f64, x: DVec3, y: DVec3) -> Option<Slice> {
        let above: Vec<f64> = self.points.iter().map(|p| p.dot(axis) - level).collect();
        let mut nodes: HashMap<(u32, u32), u32> = HashMap::new();
        let mut points: Vec<DVec2> = Vec::new();
        let mut ends: Vec<[Option<u32>; 2]> = Vec::new();
        let mut crossings: Vec<u32> = Vec::new();
        for face in &self.faces {
            crossings.clear();
            for corners in &face.loops {
                let after = corners.iter().cycle().skip(1);
                for (a, b) in corners.iter().zip(after) {
                    let (sa, sb) = (above[*a as usize], above[*b as usize]);
                    if (sa < 0.0) == (sb < 0.0) {
                        continue;
                    }
                    let node = *nodes.entry((*a.min(b), *a.max(b))).or_insert_with(|| {
                        let p = self.points[*a as usize].lerp(self.points[*b as usize], sa / (sa - sb));
                        points.push(DVec2::new(p.dot(x), p.dot(y)));
                        ends.push([None, None]);
                        points.len() as u32 - 1
                    });
                    crossings.push(node);
                }
            }
            if crossings.len() > 2 {
                let from = points[*crossings.first()? as usize];
                let far = |i: &u32| points[*i as usize].distance(from);
                let along =
                    crossings.iter().max_by(|a, b| far(a).total_cmp(&far(b))).map(|i| points[*i as usize] - from)?;
                crossings.sort_by(|a, b| points[*a as usize].dot(along).total_cmp(&points[*b as usize].dot(along)));
            }
            for pair in crossings.chunks(2) {
                let [a, b] = *pair else { return None };
                for (one, other) in [(a, b), (b, a)] {
                    let free = ends[one as usize].iter_mut().find(|end| end.is_none())?;
                    *free = Some(other);
                }
            }
        }
        let mut seen = vec![false; points.len()];
        let mut loops: Vec<Loop> = Vec::new();
        for start in 0..points.len() as u32 {
            let (mut at, mut before) = (start, None);
            let mut corners = Vec::new();
            while !seen[at as usize] {
                seen[at as usize] = true;
                corners.push(points[at as usize]);
                let [a, b] = ends[at as usize];
                let next = if a == before { b } else { a }?;
                before = Some(at);
                at = next;
            }
            if !corners.is_empty() {
                loops.extend(Loop::new(corners).ok());
            }
        }
        let largest = (0..loops.len()).max_by(|a, b| loops[*a].area().total_cmp(&loops[*b].area()))?;
        let outer = loops.swap_remove(largest);
        if loops.len() * outer.points.len() > TESTS {
            return None;
        }
        let inside = |l: &Loop| l.points.first().is_some_and(|p| outer.holds(*p));
        let (voids, beside): (Vec<Loop>, Vec<Loop>) = loops.into_iter().partition(inside);
        Some(Slice { outer, voids, beside: beside.len() })
    }
}

impl Slice {
    /// What it encloses less its voids, mm².
    pub fn area(&self) -> f64 {
        self.outer.area() - self.voids.iter().map(Loop::area).sum::<f64>()
    }

    /// Whether two sections are one: area, place and size.
    pub fn same(&self, other: &Self) -> bool {
        let (a, b) = (self.outer.box_along(DVec2::X), other.outer.box_along(DVec2::X));
        let near = ROUNDED + 1e-3 * a.size.max_element();
        self.beside == other.beside
            && (self.area() - other.area()).abs() <= ROUNDED * self.outer.perimeter()
            && a.centre.distance(b.centre) <= near
            && (a.size - b.size).abs().max_element() <= near
    }
}
