//! Bolt groups loaded beside their centre: elastic, about the centre (EN 1993-1-8:2005 3.12, and α, β of the design guides
//! for simple joints).

use super::Resistance;
use crate::units::{Area, Force, Length};
use crate::working::Working;
use crate::{given, step};

/// Where a bolt lies from the group's centre.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Across the load, positive away from it.
    pub x: Length,
    /// Along the load.
    pub y: Length,
}

/// Bolts at these points, seen from their centre.
pub fn about_centre(points: &[(Length, Length)]) -> Vec<Place> {
    let n = points.len() as f64;
    let x_0 = points.iter().map(|(x, _)| *x).sum::<Length>() / n;
    let y_0 = points.iter().map(|(_, y)| *y).sum::<Length>() / n;
    points.iter().map(|(x, y)| Place { x: *x - x_0, y: *y - y_0 }).collect()
}

/// Σ(x² + y²).
pub fn polar(bolts: &[Place]) -> Area {
    Area(bolts.iter().map(|bolt| (bolt.x * bolt.x + bolt.y * bolt.y).get()).sum())
}

/// Every bolt's share of a force at the distance `z` from the centre, along the force and across it.
pub fn shares(bolts: &[Place], z: Length) -> Vec<(f64, f64)> {
    let (n, i) = (bolts.len() as f64, polar(bolts));
    bolts.iter().map(|bolt| (1.0 / n - z * bolt.x / i, z * bolt.y / i)).collect()
}

/// A group with what its outermost bolt bears of the moment.
#[derive(Clone, Debug)]
pub struct Eccentric {
    /// n.
    pub n: f64,
    /// Of the moment, along the load.
    pub alpha: f64,
    /// Of the moment, across the load.
    pub beta: f64,
    /// How they were computed.
    pub working: Working,
}

/// α and β of a group whose load is `z` away; as the guides have it, that of the bolt furthest out in either direction.
pub fn eccentric(bolts: &[Place], z: Length) -> Eccentric {
    let mut w = Working::default();
    let n = bolts.len() as f64;
    let I_bp = polar(bolts);
    let furthest = |of: fn(&Place) -> Length| bolts.iter().map(|bolt| of(bolt).abs()).fold(Length::ZERO, Length::max);
    let (x_max, y_max) = (furthest(|bolt| bolt.x), furthest(|bolt| bolt.y));
    given!(w, "bolt group, from its centre"; n, z, I_bp, x_max, y_max);
    step!(w, "bolt group, design guides", alpha = z * x_max / I_bp);
    step!(w, "bolt group, design guides", beta = z * y_max / I_bp);
    Eccentric { n, alpha, beta, working: w }
}

/// V_Rd of a group by the shear of its bolts.
pub fn shear(group: &Eccentric, F_v_Rd: Force) -> Resistance {
    let mut w = group.working.clone();
    let Eccentric { n, alpha, beta, .. } = *group;
    given!(w, "one bolt"; F_v_Rd);
    step!(
        w,
        "bolt group, design guides",
        V_b_Rd = n * F_v_Rd / ((1.0 + alpha * n).powi(2) + (beta * n).powi(2)).sqrt()
    );
    Resistance { value: V_b_Rd, working: w }
}

/// V_Rd of a group by the bearing of one ply along the load (`F_b_ver_Rd`) and across it (`F_b_hor_Rd`).
pub fn bearing(group: &Eccentric, F_b_ver_Rd: Force, F_b_hor_Rd: Force) -> Resistance {
    let mut w = group.working.clone();
    let Eccentric { n, alpha, beta, .. } = *group;
    given!(w, "one bolt in the ply, along and across the load"; F_b_ver_Rd, F_b_hor_Rd);
    step!(
        w,
        "bolt group, design guides",
        V_b_Rd = n * F_b_ver_Rd / ((1.0 + alpha * n).powi(2) + (beta * n * (F_b_ver_Rd / F_b_hor_Rd)).powi(2)).sqrt()
    );
    Resistance { value: V_b_Rd, working: w }
}
