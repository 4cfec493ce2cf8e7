//! Bolts: EN 1993-1-8:2005 3.6.1, Table 3.4.

use std::f64::consts::PI;

use super::Resistance;
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// F_t,Rd of one bolt that is not countersunk (k_2 = 0.9), Table 3.4.
pub fn tension(f_ub: Stress, A_s: Area, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "bolt"; f_ub, A_s);
    step!(w, "Table 3.4", k_2 = 0.9);
    step!(w, "Table 3.4", F_t_Rd = k_2 * f_ub * A_s / gamma_M2);
    Resistance { value: F_t_Rd, working: w }
}

/// B_p,Rd of one bolt: punching of the ply under head or nut, Table 3.4. `d_m` is the mean of the across-points and
/// across-flats dimensions of head or nut, whichever is smaller.
pub fn punching(d_m: Length, t_p: Length, f_u: Stress, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "head or nut, ply"; d_m, t_p, f_u);
    step!(w, "Table 3.4", B_p_Rd = 0.6 * PI * d_m * t_p * f_u / gamma_M2);
    Resistance { value: B_p_Rd, working: w }
}

/// F_v,Rd of one bolt in one shear plane, Table 3.4. `area` is A_s with the thread in the shear plane (α_v 0.6, or 0.5
/// for 4.8, 5.8, 6.8 and 10.9), else the gross area A (α_v 0.6). `beta_hole` is 0.85 for M12 and M14 in 2 mm
/// clearance holes (3.6.1(5)), else 1.
pub fn shear(alpha_v: f64, f_ub: Stress, area: Area, beta_hole: f64, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "bolt in one shear plane"; alpha_v, f_ub, area, beta_hole);
    step!(w, "Table 3.4", F_v_Rd = beta_hole * (alpha_v * f_ub * area / gamma_M2));
    Resistance { value: F_v_Rd, working: w }
}

/// Distances of one bolt in a ply for bearing: in the direction of load and across it.
#[derive(Clone, Copy, Debug)]
pub struct BearingPlace {
    /// e_1 to the end that the bolt pushes towards; `None` for a bolt with another bolt in that direction.
    pub e_1: Option<Length>,
    /// p_1 to the next bolt in that direction.
    pub p_1: Option<Length>,
    /// e_2 to the side edge.
    pub e_2: Length,
    /// p_2 to the neighbour across the load; `None` if there is none.
    pub p_2: Option<Length>,
}

/// F_b,Rd of one bolt in a normal round hole, Table 3.4: α_d from e_1 for an end bolt and p_1 for an inner one (both, if
/// both are given), k_1 from e_2 and p_2.
pub fn bearing(
    place: BearingPlace,
    d: Length,
    d_0: Length,
    t: Length,
    f_u: Stress,
    f_ub: Stress,
    gamma_M2: f64,
) -> Resistance {
    let mut w = Working::default();
    let BearingPlace { e_1, p_1, e_2, p_2 } = place;
    given!(w, "bolt and ply"; d, d_0, t, f_u, f_ub, e_2);
    let mut alpha_d = 1.0;
    if let Some(e_1) = e_1 {
        given!(w, "end distance"; e_1);
        step!(w, "Table 3.4", alpha_d_end = e_1 / (3.0 * d_0));
        alpha_d = least(alpha_d, alpha_d_end);
    }
    if let Some(p_1) = p_1 {
        given!(w, "pitch"; p_1);
        step!(w, "Table 3.4", alpha_d_inner = p_1 / (3.0 * d_0) - 0.25);
        alpha_d = least(alpha_d, alpha_d_inner);
    }
    given!(w, "least of these, at most 1"; alpha_d);
    step!(w, "Table 3.4", alpha_b = least(alpha_d, f_ub / f_u));
    let mut k_1_across = 2.5;
    if let Some(p_2) = p_2 {
        given!(w, "gauge"; p_2);
        step!(w, "Table 3.4", k_1_inner = 1.4 * (p_2 / d_0) - 1.7);
        k_1_across = k_1_inner;
    }
    given!(w, "across the load, at most 2.5"; k_1_across);
    step!(w, "Table 3.4", k_1_edge = 2.8 * (e_2 / d_0) - 1.7);
    step!(w, "Table 3.4", k_1 = least(k_1_edge, least(k_1_across, 2.5)));
    // A distance below the minimum of Table 3.3 would make the factors negative: then nothing is left.
    step!(w, "Table 3.4", F_b_Rd = (not_negative(k_1) * not_negative(alpha_b)) * f_u * (d * t) / gamma_M2);
    Resistance { value: F_b_Rd, working: w }
}

/// The smaller; NaN if either is NaN (`f64::min` would hide it).
fn least(a: f64, b: f64) -> f64 {
    if a.is_nan() || b >= a { a } else { b }
}

/// At least 0; NaN stays NaN.
fn not_negative(a: f64) -> f64 {
    if a < 0.0 { 0.0 } else { a }
}

/// What is left of F_v,Rd beside a tension, from F_v,Ed/F_v,Rd + F_t,Ed/(1.4 F_t,Rd) ≤ 1 (Table 3.4), with F_t,Ed ≤ F_t,Rd.
pub fn shear_beside_tension(F_v_Rd: Force, F_t_Ed: Force, F_t_Rd: Force) -> Resistance {
    let mut w = Working::default();
    given!(w, "bolt in shear and tension"; F_v_Rd, F_t_Ed, F_t_Rd);
    step!(w, "Table 3.4", F_v_Rd_t = F_v_Rd * (1.0 - F_t_Ed / (1.4 * F_t_Rd)).max(0.0));
    Resistance { value: F_v_Rd_t, working: w }
}
