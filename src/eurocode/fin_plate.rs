//! Fin plates by the design guides for simple joints: bending, lateral torsional buckling, welds, tension.

use std::f64::consts::PI;

use super::{E, Resistance};
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// The plate in bending at the support: elastic, V at `z`.
pub fn bending(t_p: Length, h_p: Length, z: Length, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "plate, its bolts' centre"; t_p, h_p, z, f_y);
    step!(w, "EN 1993-1-1 6.2.5", W_el = t_p * (h_p * h_p) / 6.0);
    step!(w, "fin plates, design guides", V_m_Rd = W_el * f_y / gamma_M0 / z);
    Resistance { value: V_m_Rd, working: w }
}

/// Lateral torsional buckling of a long plate, `z_p` from the support to the first line of bolts, `z` to their centre. χ_LT
/// by EN 1993-1-1 6.3.2.2, curve d; 0.6 for the moment's triangle.
pub fn buckling((t_p, h_p): (Length, Length), (z_p, z): (Length, Length), f_y: Stress, gamma_M1: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "long plate"; t_p, h_p, z_p, z, f_y);
    step!(w, "EN 1993-1-1 6.2.5", W_el = t_p * (h_p * h_p) / 6.0);
    step!(w, "fin plates, design guides", lambda_LT = 2.8 * (z_p * h_p / (1.5 * (t_p * t_p))).sqrt());
    step!(w, "EN 1993-1-1 6.3.1.3", lambda_1 = PI * (E / f_y).sqrt());
    step!(w, "EN 1993-1-1 6.3.2.2", lambda_bar_LT = lambda_LT / lambda_1);
    step!(w, "EN 1993-1-1 6.3.2.2", alpha_LT = 0.76);
    step!(w, "EN 1993-1-1 6.3.2.2", phi_LT = 0.5 * (1.0 + alpha_LT * (lambda_bar_LT - 0.2) + lambda_bar_LT.powi(2)));
    step!(
        w,
        "EN 1993-1-1 6.3.2.2",
        chi_LT = (1.0 / (phi_LT + (phi_LT.powi(2) - lambda_bar_LT.powi(2)).sqrt())).min(1.0)
    );
    step!(w, "fin plates, design guides", V_LT_Rd = W_el * (chi_LT * f_y) / (0.6 * gamma_M1) / z);
    Resistance { value: V_LT_Rd, working: w }
}

/// Two fillets of throat `a` along the plate's edge under V at `z`: elastic, the directional method at the seam's end. Each
/// counts less a throat at either end.
pub fn welds((a, h_p): (Length, Length), z: Length, (f_u, beta_w): (Stress, f64), gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "two fillets, weaker part joined"; a, h_p, z, f_u, beta_w);
    step!(w, "4.5.1", l_w = h_p - 2.0 * a);
    step!(w, "force along one fillet for V = 1", q_along = 1.0 / (2.0 * l_w.get()));
    step!(w, "force across one fillet for V = 1, at its end", q_across = 3.0 * z.get() / l_w.get().powi(2));
    step!(w, "4.5.3.2, (4.1)", q_w = (2.0 * q_across.powi(2) + 3.0 * q_along.powi(2)).sqrt());
    step!(w, "4.5.3.2, (4.1)", V_w_1 = (f_u / (beta_w * gamma_M2) * a).get() / q_w);
    step!(w, "4.5.3.2, (4.1), σ⊥", V_w_2 = (0.9 * f_u / gamma_M2 * a).get() * 2.0_f64.sqrt() / q_across);
    step!(w, "4.5.3.2, (4.1)", V_w_Rd = Force(least(V_w_1, V_w_2)));
    Resistance { value: V_w_Rd, working: w }
}

/// The smaller; NaN if either is NaN.
fn least(a: f64, b: f64) -> f64 {
    if a.is_nan() || b >= a { a } else { b }
}

/// Net section in tension under a tying force.
pub fn net_tension(A_net: Area, f_u: Stress, gamma_Mu: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "net section in tension"; A_net, f_u, gamma_Mu);
    step!(w, "EN 1993-1-1 6.2.3", N_n_u = 0.9 * A_net * f_u / gamma_Mu);
    Resistance { value: N_n_u, working: w }
}

/// A web bent by a tying force on a plate across it: yield lines, ultimate strength (design guides, from memory).
/// `d` is the web's clear depth between the fillets.
pub fn web_in_tying(
    (t_w, d, f_u): (Length, Length, Stress),
    (h_p, t_p, s): (Length, Length, Length),
    gamma_Mu: f64,
) -> Resistance {
    let mut w = Working::default();
    given!(w, "web, and the plate with its fillets' legs on it"; t_w, d, f_u, h_p, t_p, s);
    step!(w, "design guides, tying", M_pl_u = t_w * t_w * f_u / (4.0 * gamma_Mu));
    step!(w, "design guides, tying", eta_1 = h_p / d);
    step!(w, "design guides, tying", beta_1 = (t_p + 2.0 * s) / d);
    step!(w, "design guides, tying", N_w_u = 8.0 * M_pl_u / (1.0 - beta_1) * (eta_1 + 1.5 * (1.0 - beta_1).sqrt()));
    Resistance { value: N_w_u, working: w }
}
