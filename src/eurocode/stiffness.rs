//! Rotational stiffness of a bolted end-plate joint: EN 1993-1-8:2005 6.3, Tables 6.8, 6.10 and 6.11 (numbers of
//! equations from memory).
//!
//! A coefficient k is a length; the stiffness of the component is E k. What is infinitely stiff has no coefficient.

use super::E;
use crate::units::{Area, Length, Modulus, Moment, Stiffness};
use crate::working::Working;
use crate::{given, step};

/// ψ of bolted end plates, Table 6.8.
pub const PSI: f64 = 2.7;

/// Springs in a row: 1/Σ(1/k).
pub fn in_series(k: &[Length]) -> Length {
    Length(1.0 / k.iter().map(|k| 1.0 / k.get()).sum::<f64>())
}

/// k_1 of the column's web panel in shear; `None` where β = 0 and no shear comes to it.
pub fn web_panel(w: &mut Working, A_vc: Area, beta: f64, z: Length) -> Option<Length> {
    if beta == 0.0 {
        return None;
    }
    given!(w, "column web panel in shear"; A_vc, beta, z);
    step!(w, "Table 6.11", k_1 = 0.38 * A_vc / (beta * z));
    Some(k_1)
}

/// k_2 of an unstiffened column web in compression over the b_eff of 6.2.6.2.
pub fn web_in_compression(w: &mut Working, b_eff_c_wc: Length, t_wc: Length, d_c: Length) -> Length {
    given!(w, "column web in compression"; b_eff_c_wc, t_wc, d_c);
    step!(w, "Table 6.11", k_2 = 0.7 * b_eff_c_wc * t_wc / d_c);
    k_2
}

/// k_3 of the column's web in tension: b_eff of one row, the smallest of Tables 6.4 and 6.5, alone or in a group.
pub fn web_in_tension(w: &mut Working, b_eff_t_wc: Length, t_wc: Length, d_c: Length) -> Length {
    given!(w, "column web in tension"; b_eff_t_wc, t_wc, d_c);
    step!(w, "Table 6.11", k_3 = 0.7 * b_eff_t_wc * t_wc / d_c);
    k_3
}

/// k_4 of the column's flange in bending: l_eff of one row, the smallest of Tables 6.4 and 6.5, alone or in a group.
pub fn flange_in_bending(w: &mut Working, l_eff: Length, t_fc: Length, m: Length) -> Length {
    given!(w, "column flange in bending"; l_eff, t_fc, m);
    step!(w, "Table 6.11", k_4 = 0.9 * l_eff * (t_fc / m).powi(3));
    k_4
}

/// k_5 of the end plate in bending: l_eff of one row, the smallest of Table 6.6; m is m_x beyond the tension flange.
pub fn plate_in_bending(w: &mut Working, l_eff: Length, t_p: Length, m: Length) -> Length {
    given!(w, "end plate in bending"; l_eff, t_p, m);
    step!(w, "Table 6.11", k_5 = 0.9 * l_eff * (t_p / m).powi(3));
    k_5
}

/// L_b of a bolt: what it clamps, washers included, and half of head and nut.
pub fn bolt_length(w: &mut Working, clamped: Length, washers: Length, head: Length, nut: Length) -> Length {
    given!(w, "bolts"; clamped, washers, head, nut);
    step!(w, "Table 6.11", L_b = clamped + washers + 0.5 * (head + nut));
    L_b
}

/// k_10 of a row's two bolts in tension.
pub fn bolts(w: &mut Working, A_s: Area, L_b: Length) -> Length {
    given!(w, "bolts in tension"; A_s, L_b);
    step!(w, "Table 6.11", k_10 = 1.6 * A_s / L_b);
    k_10
}

/// Several rows as one spring: k_eq and its lever arm z_eq, 6.3.3.1. `rows`: k_eff,r and h_r of each.
pub fn equivalent(w: &mut Working, rows: &[(Length, Length)]) -> (Length, Length) {
    step!(w, "6.3.3.1", sum_k_h = rows.iter().map(|(k_eff_r, h_r)| *k_eff_r * *h_r).sum::<Area>());
    step!(w, "6.3.3.1", sum_k_h_h = rows.iter().map(|(k_eff_r, h_r)| *k_eff_r * *h_r * *h_r).sum::<Modulus>());
    step!(w, "6.3.3.1, (6.31)", z_eq = sum_k_h_h / sum_k_h);
    step!(w, "6.3.3.1, (6.29)", k_eq = sum_k_h / z_eq);
    (k_eq, z_eq)
}

/// S_j,ini of springs in a row at the lever arm z, (6.27) with μ = 1.
pub fn initial(w: &mut Working, z: Length, springs: &[Length]) -> Stiffness {
    given!(w, "Young's modulus of steel, EN 1993-1-1 3.2.6"; E);
    step!(w, "6.3.1, (6.27)", S_j_ini = Stiffness::per_radian(E * z * z * in_series(springs)));
    S_j_ini
}

/// S_j beside M_j,Ed: S_j,ini/μ, (6.28a) and (6.28b). `None` where the moment is above the joint's resistance, or no number.
pub fn beside_moment(w: &mut Working, S_j_ini: Stiffness, M_j_Ed: Moment, M_j_Rd: Moment) -> Option<Stiffness> {
    if !(M_j_Ed.abs() <= M_j_Rd) {
        return None;
    }
    given!(w, "required moment"; M_j_Ed, M_j_Rd);
    let mu = if M_j_Ed.abs() <= M_j_Rd * (2.0 / 3.0) {
        step!(w, "6.3.1, (6.28a)", mu = 1.0);
        mu
    } else {
        step!(w, "6.3.1, (6.28b)", mu = (1.5 * (M_j_Ed.abs() / M_j_Rd)).powf(PSI));
        mu
    };
    step!(w, "6.3.1, (6.27)", S_j = S_j_ini / mu);
    Some(S_j)
}
