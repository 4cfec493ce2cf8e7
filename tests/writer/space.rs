//! Places and directions of parts in the world.

use glam::{DVec3, dvec3};

use super::building::{Along, Beam, Column, End};

/// A local frame: origin, z and x; y follows.
#[derive(Clone, Copy, Debug)]
pub struct Frame {
    /// Origin.
    pub origin: DVec3,
    /// Local z.
    pub z: DVec3,
    /// Local x.
    pub x: DVec3,
}

/// One end of a beam at a column's flange.
#[derive(Clone, Copy, Debug)]
pub struct Face {
    /// On the flange, at the beam's web, at soffit level.
    pub soffit: DVec3,
    /// From the column out into the beam.
    pub out: DVec3,
}

/// The direction of a column's depth.
pub fn depth_of(column: &Column) -> DVec3 {
    match column.depth {
        Along::X => DVec3::X,
        Along::Y => DVec3::Y,
    }
}

/// The face of a column's flange that a beam's end sees.
pub fn face(columns: &[Column], beam: &Beam, end: usize) -> Option<Face> {
    let at = |end: &End| match end {
        End::Joint { column, .. } => columns[*column].at,
        End::Free(at) => *at,
    };
    let End::Joint { column, .. } = &beam.ends[end] else { return None };
    let column = &columns[*column];
    let ([x, y], [other_x, other_y]) = (at(&beam.ends[end]), at(&beam.ends[1 - end]));
    let out = (dvec3(other_x, other_y, 0.0) - dvec3(x, y, 0.0)).normalize();
    assert!(out.dot(depth_of(column)).abs() > 0.999, "beam {} does not meet a flange of {}", beam.mark, column.mark);
    Some(Face { soffit: dvec3(x, y, beam.soffit()) + out * column.section.h / 2.0, out })
}

/// The beam's two ends on its lower edge: behind the end plates, or where it ends free.
pub fn ends(columns: &[Column], beam: &Beam) -> [DVec3; 2] {
    [0, 1].map(|end| match (&beam.ends[end], face(columns, beam, end)) {
        (End::Joint { joint, .. }, Some(face)) => face.soffit + face.out * joint.detail.plate.thickness,
        (End::Free([x, y]), _) => dvec3(*x, *y, beam.soffit()),
        (End::Joint { .. }, None) => unreachable!("an end with a joint has a face"),
    })
}
