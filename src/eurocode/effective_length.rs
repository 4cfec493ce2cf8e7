//! Effective lengths of bolt rows: EN 1993-1-8:2005 Tables 6.4 (column flange), 6.5 (next to a stiffener) and 6.6 (end
//! plate). `cp` are the circular patterns, `nc` the non-circular ones; l_eff,1 = min(nc, cp), l_eff,2 = nc.

use std::f64::consts::PI;

use crate::units::Length;
use crate::working::Working;
use crate::{given, step};

/// Where a row stands in the part in bending.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum RowPlace {
    /// Away from any stiffener.
    Plain,
    /// Next to a stiffener or a flange, with the α of Figure 6.11.
    Stiffened {
        /// α.
        alpha: f64,
    },
}

/// A row's effective lengths (its own, or its share of a group's).
#[derive(Clone, Debug, Default)]
pub struct EffectiveLength {
    /// Circular patterns.
    pub cp: Length,
    /// Non-circular patterns.
    pub nc: Length,
    /// How they were computed.
    pub working: Working,
}

/// A row considered alone: Tables 6.4, 6.5 and 6.6. `e_1` is the distance from the row to the end of the part, where the
/// part has one beyond this row (it governs only if near).
pub fn alone(place: RowPlace, m: Length, e: Length, e_1: Option<Length>) -> EffectiveLength {
    let mut w = Working::default();
    given!(w, "row alone"; m, e);
    step!(w, "Tables 6.4, 6.5, 6.6", l_cp_inner = 2.0 * PI * m);
    let l_nc_inner = match place {
        RowPlace::Plain => {
            step!(w, "Tables 6.4, 6.6", l_nc = 4.0 * m + 1.25 * e);
            l_nc
        }
        RowPlace::Stiffened { alpha } => {
            given!(w, "Figure 6.11"; alpha);
            step!(w, "Tables 6.5, 6.6", l_nc = alpha * m);
            l_nc
        }
    };
    let (mut cp, mut nc) = (l_cp_inner, l_nc_inner);
    if let Some(e_1) = e_1 {
        given!(w, "to the end of the part"; e_1);
        step!(w, "Tables 6.4, 6.5", l_cp_end = PI * m + 2.0 * e_1);
        cp = cp.min(l_cp_end);
        match place {
            RowPlace::Plain => {
                step!(w, "Table 6.4", l_nc_end = 2.0 * m + 0.625 * e + e_1);
                nc = nc.min(l_nc_end);
            }
            RowPlace::Stiffened { alpha } => {
                // With the end far away this is more than an inner row's α m, which then stands.
                step!(w, "Table 6.5", l_nc_end = e_1 + alpha * m - (2.0 * m + 0.625 * e));
                nc = nc.min(l_nc_end);
            }
        }
    }
    EffectiveLength { cp, nc, working: w }
}

/// An inner row's share of a group: p is half the distance between its two neighbours.
pub fn inner_in_group(p: Length) -> EffectiveLength {
    let mut w = Working::default();
    given!(w, "inner row of the group"; p);
    step!(w, "Tables 6.4, 6.6", l_cp = 2.0 * p);
    step!(w, "Tables 6.4, 6.6", l_nc = p);
    EffectiveLength { cp: l_cp, nc: l_nc, working: w }
}

/// The first or last row's share of a group, p to its neighbour in the group. `e_1` as in [`alone`].
pub fn end_of_group(place: RowPlace, m: Length, e: Length, p: Length, e_1: Option<Length>) -> EffectiveLength {
    let mut w = Working::default();
    given!(w, "end row of the group"; m, e, p);
    step!(w, "Tables 6.4, 6.5, 6.6", l_cp_end = PI * m + p);
    let l_nc_end = match place {
        RowPlace::Plain => {
            step!(w, "Tables 6.4, 6.6", l_nc = 2.0 * m + 0.625 * e + 0.5 * p);
            l_nc
        }
        RowPlace::Stiffened { alpha } => {
            given!(w, "Figure 6.11"; alpha);
            step!(w, "Tables 6.5, 6.6", l_nc = 0.5 * p + alpha * m - (2.0 * m + 0.625 * e));
            l_nc
        }
    };
    let (mut cp, mut nc) = (l_cp_end, l_nc_end);
    if let (Some(e_1), RowPlace::Plain) = (e_1, place) {
        given!(w, "to the end of the part"; e_1);
        step!(w, "Table 6.4", l_cp_near_end = 2.0 * e_1 + p);
        step!(w, "Table 6.4", l_nc_near_end = e_1 + 0.5 * p);
        cp = cp.min(l_cp_near_end);
        nc = nc.min(l_nc_near_end);
    }
    EffectiveLength { cp, nc, working: w }
}

/// The end-plate row outside the tension flange, Table 6.6: never part of a group. `m_x` to the flange's fillet, `e_x` to
/// the plate's edge beyond the row, `e` to its side edge, `w` the gauge, `b_p` the plate's width.
pub fn outside_tension_flange(m_x: Length, e_x: Length, e: Length, gauge: Length, b_p: Length) -> EffectiveLength {
    let mut w = Working::default();
    given!(w, "row outside the tension flange"; m_x, e_x, e, gauge, b_p);
    step!(w, "Table 6.6", l_cp = (2.0 * PI * m_x).min(PI * m_x + gauge).min(PI * m_x + 2.0 * e));
    step!(
        w,
        "Table 6.6",
        l_nc = (4.0 * m_x + 1.25 * e_x)
            .min(e + 2.0 * m_x + 0.625 * e_x)
            .min(0.5 * b_p)
            .min(0.5 * gauge + 2.0 * m_x + 0.625 * e_x)
    );
    EffectiveLength { cp: l_cp, nc: l_nc, working: w }
}
