//! Classification of joints by stiffness and strength, and the rotation capacity that may be assumed: EN 1993-1-8:2005
//! 5.2 and 6.4.

use super::E;
use crate::units::{Length, Moment, SecondMoment, Stiffness, Stress};
use crate::working::Working;
use crate::{given, step};

/// S_j,ini from which a joint is rigid and up to which it is nominally pinned, 5.2.2.5 (Figure 5.4). `braced`: whether a
/// bracing takes at least 80 % off the frame's sway.
pub fn stiffness_limits(w: &mut Working, I_b: SecondMoment, L_b: Length, braced: bool) -> (Stiffness, Stiffness) {
    let k_b = if braced { 8.0 } else { 25.0 };
    given!(w, "beam and frame"; E, I_b, L_b, k_b);
    step!(w, "5.2.2.5", S_rigid = k_b * Stiffness::per_radian(E * (I_b / L_b)));
    step!(w, "5.2.2.5", S_pinned = 0.5 * Stiffness::per_radian(E * (I_b / L_b)));
    (S_rigid, S_pinned)
}

/// The moment from which a joint is of full strength, 5.2.3.3 (Figure 5.5): the beam's M_pl,Rd or, if it is less, that of
/// the column, twice where the column runs on.
pub fn full_strength(w: &mut Working, M_b_pl_Rd: Moment, M_c_pl_Rd: Moment, runs_on: bool) -> Moment {
    let columns = if runs_on { 2.0 } else { 1.0 };
    given!(w, "plastic moments of beam and column, columns at the joint"; M_b_pl_Rd, M_c_pl_Rd, columns);
    step!(w, "5.2.3.3", M_full = M_b_pl_Rd.min(columns * M_c_pl_Rd));
    M_full
}

/// The thickness up to which a column flange or end plate in bending gives a joint that it governs enough rotation
/// capacity for plastic analysis, 6.4.2(2).
pub fn ductile_thickness(w: &mut Working, d: Length, f_ub: Stress, f_y: Stress) -> Length {
    given!(w, "bolt and governing plate"; d, f_ub, f_y);
    step!(w, "6.4.2(2)", t_most = 0.36 * d * (f_ub / f_y).sqrt());
    t_most
}
