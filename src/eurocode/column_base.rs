//! Column bases: EN 1993-1-8:2005 6.2.2, 6.2.5, 6.2.8, and the bearing strength of concrete by EN 1992-1-1 6.7.

use super::Resistance;
use crate::units::{Area, Force, Length, Moment, Stress};
use crate::working::Working;
use crate::{given, step};

/// C_f,d between base plate and a bed of sand and cement mortar, 6.2.2(6).
pub const FRICTION: f64 = 0.20;

/// α = √(A_c1/A_c0): how far the load spreads below the plate, EN 1992-1-1 6.7: no further than the foundation's edges
/// (`e_h` beyond the plate's depth `h_p`, `e_b` beyond its width `b_p`) and depth `d_f` allow, at most 3.
pub fn concentration(w: &mut Working, (h_p, b_p): (Length, Length), (e_h, e_b): (Length, Length), d_f: Length) -> f64 {
    given!(w, "base plate; foundation beyond it, its depth"; h_p, b_p, e_h, e_b, d_f);
    step!(w, "EN 1992-1-1 6.7", alpha_d = 1.0 + d_f / h_p.max(b_p));
    step!(w, "EN 1992-1-1 6.7", alpha_h = 1.0 + 2.0 * e_h / h_p);
    step!(w, "EN 1992-1-1 6.7", alpha_b = 1.0 + 2.0 * e_b / b_p);
    step!(w, "EN 1992-1-1 6.7, (6.63)", alpha = alpha_d.min(alpha_h).min(alpha_b).min(3.0));
    alpha
}

/// f_jd, 6.2.5(7) with β_j = 2/3, which asks for a bed as the clause has it. `alpha` = √(A_c1/A_c0), at most 3.
pub fn bearing_strength(w: &mut Working, alpha: f64, alpha_cc: f64, f_ck: Stress, gamma_c: f64) -> Stress {
    given!(w, "concrete; √(A_c1/A_c0)"; alpha_cc, f_ck, gamma_c, alpha);
    step!(w, "EN 1992-1-1 3.1.6, (3.15)", f_cd = alpha_cc * f_ck / gamma_c);
    step!(w, "6.2.5(7)", beta_j = 2.0 / 3.0);
    step!(w, "6.2.5(7), EN 1992-1-1 6.7, (6.63)", f_jd = beta_j * alpha * f_cd);
    f_jd
}

/// An I section on its plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Foot {
    /// h_c.
    pub h: Length,
    /// b_fc.
    pub b: Length,
    /// t_wc.
    pub t_w: Length,
    /// t_fc.
    pub t_f: Length,
    /// From the flange's outer face to the plate's edge, the lesser of both sides.
    pub beyond_h: Length,
    /// From the flange's tips to the plate's edge, the least of both sides.
    pub beyond_b: Length,
    /// t_p.
    pub t_p: Length,
    /// f_yp.
    pub f_yp: Stress,
    /// f_jd.
    pub f_jd: Stress,
}

/// The T-stubs in compression below a column.
#[derive(Clone, Debug)]
pub struct Stubs {
    /// F_c,pl,Rd below one flange, even about the flange's middle, 6.2.6.9.
    pub flange: Resistance,
    /// N_j,Rd: below both flanges and the web, 6.2.8.2.
    pub all: Resistance,
    /// z_C: from the column's axis to the flange's middle.
    pub z_C: Length,
}

/// The T-stubs below flanges and web, 6.2.5 and 6.2.8.2: they do not overlap and end with the plate.
pub fn compression(foot: &Foot, gamma_M0: f64) -> Stubs {
    let mut w = Working::default();
    let Foot { h, b, t_w, t_f, beyond_h, beyond_b, t_p, f_yp, f_jd } = *foot;
    given!(w, "column on its base plate"; h, b, t_w, t_f, beyond_h, beyond_b, t_p, f_yp, f_jd);
    step!(w, "6.2.5(4), (6.5)", c = t_p * (f_yp / (3.0 * f_jd * gamma_M0)).sqrt());
    step!(w, "6.2.5, to the plate's edge at most", c_out = c.min(beyond_h));
    step!(w, "6.2.8.2, to the web's middle at most", c_in = c.min(0.5 * (h - 2.0 * t_f)));
    step!(w, "6.2.5, to the plate's edge at most", c_side = c.min(beyond_b));
    step!(w, "6.2.5, (6.4)", F_flange = f_jd * ((c_out + t_f + c_in) * (b + 2.0 * c_side)));
    step!(w, "6.2.8.2, between the flanges' own", l_web = h - 2.0 * (t_f + c_in));
    step!(w, "6.2.5, to the plate's edge at most", b_web = (t_w + 2.0 * c).min(b + 2.0 * c_side));
    step!(w, "6.2.5, (6.4)", F_web = f_jd * (l_web * b_web));
    step!(w, "6.2.8.2", N_j_Rd = 2.0 * F_flange + F_web);
    let all = w.clone();
    // A T-stub that is even about the flange's middle keeps its force there.
    step!(w, "6.2.6.9, even about the flange", F_c_pl_Rd = f_jd * ((t_f + 2.0 * c_out.min(c_in)) * (b + 2.0 * c_side)));
    step!(w, "6.2.8.1", z_C = 0.5 * (h - t_f));
    Stubs { flange: Resistance { value: F_c_pl_Rd, working: w }, all: Resistance { value: N_j_Rd, working: all }, z_C }
}

/// What a base's two sides carry of N_Ed (positive in tension) and M_Ed (by magnitude): F_C,Ed of the side that is compressed
/// the more and F_T,Ed of the other, or of the side in more tension. The equilibrium from which Table 6.7 is made. `None` where
/// a side is in tension and has no `z_T`.
pub fn sides(M_Ed: Moment, N_Ed: Force, z_C: Length, z_T: Option<Length>) -> Option<((Force, Force), Working)> {
    let mut w = Working::default();
    given!(w, "about the column's axis, N in tension"; M_Ed, N_Ed, z_C);
    step!(w, "compression of the column", N_c_Ed = -N_Ed);
    if M_Ed <= N_c_Ed * z_C {
        step!(w, "6.2.8.3, Table 6.7, both sides in compression", F_C_Ed = 0.5 * N_c_Ed + M_Ed / (2.0 * z_C));
        return Some(((F_C_Ed, Force::ZERO), w));
    }
    let z_T = z_T?;
    given!(w, "anchors from the column's axis"; z_T);
    if M_Ed <= N_Ed * z_T {
        step!(w, "6.2.8.3, Table 6.7, both sides in tension", F_T_Ed = 0.5 * N_Ed + M_Ed / (2.0 * z_T));
        return Some(((Force::ZERO, F_T_Ed), w));
    }
    step!(w, "6.2.8.3, Table 6.7", z = z_T + z_C);
    step!(w, "6.2.8.3, Table 6.7", F_C_Ed = M_Ed / z + N_c_Ed * (z_T / z));
    step!(w, "6.2.8.3, Table 6.7", F_T_Ed = M_Ed / z - N_c_Ed * (z_C / z));
    Some(((F_C_Ed, F_T_Ed), w))
}

/// F_T,pl,Rd of the anchors of one side, 6.2.6.11 and Table 6.2 without prying: modes 1-2 and 3. With prying the T-stub would
/// have no less, so that the length of the anchors is not asked.
pub fn tension(
    (l_eff, m_x): (Length, Length),
    (t_p, f_yp): (Length, Stress),
    sum_F_t_Rd: Force,
    gamma_M0: f64,
) -> Resistance {
    let mut w = Working::default();
    given!(w, "base plate beside the anchors in tension"; l_eff, m_x, t_p, f_yp, sum_F_t_Rd);
    step!(w, "Table 6.2", M_pl_1_Rd = 0.25 * l_eff * (t_p * t_p) * f_yp / gamma_M0);
    step!(w, "Table 6.2, without prying", F_T_12_Rd = 2.0 * M_pl_1_Rd / m_x);
    step!(w, "Table 6.2", F_T_3_Rd = sum_F_t_Rd);
    step!(w, "6.2.6.11", F_T_pl_Rd = F_T_12_Rd.min(F_T_3_Rd));
    Resistance { value: F_T_pl_Rd, working: w }
}

/// F_2,vb,Rd of one anchor, 6.2.2(7). `None` with an f_yb outside 235 … 640 N/mm², for which the clause does not stand.
pub fn anchor_shear(f_yb: Stress, f_ub: Stress, A_s: Area, gamma_M2: f64) -> Option<Resistance> {
    let mut w = Working::default();
    if !(f_yb.get() >= 235.0 && f_yb.get() <= 640.0) {
        return None;
    }
    given!(w, "anchor"; f_yb, f_ub, A_s);
    step!(w, "6.2.2(7)", alpha_b = 0.44 - 0.0003 * f_yb.get());
    step!(w, "6.2.2(7)", F_2_vb_Rd = alpha_b * f_ub * A_s / gamma_M2);
    Some(Resistance { value: F_2_vb_Rd, working: w })
}

/// F_v,Rd of a base beside N_Ed, 6.2.2(8), (6.2): friction and `n` anchors of F_vb,Rd each.
pub fn shear(N_Ed: Force, n: f64, F_vb_Rd: Force) -> Resistance {
    let mut w = Working::default();
    given!(w, "axial force; anchors in shear"; N_Ed, n, F_vb_Rd);
    step!(w, "6.2.2(6)", C_f_d = FRICTION);
    step!(w, "6.2.2(6), (6.1)", F_f_Rd = C_f_d * (-N_Ed).max(Force::ZERO));
    step!(w, "6.2.2(8), (6.2)", F_v_Rd = F_f_Rd + n * F_vb_Rd);
    Resistance { value: F_v_Rd, working: w }
}

/// N_c,Rd of the column at its foot, EN 1993-1-1 6.2.4, for classes 1 to 3.
pub fn squash(A: Area, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "column"; A, f_y);
    step!(w, "EN 1993-1-1 6.2.4", N_c_Rd = A * f_y / gamma_M0);
    Resistance { value: N_c_Rd, working: w }
}
