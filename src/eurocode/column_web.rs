//! Column web in transverse tension and compression: EN 1993-1-8:2005 6.2.6.2, 6.2.6.3, Table 6.3.

use super::{E, Resistance};
use crate::units::{Area, Force, Length, Moment, SecondMoment, Stress};
use crate::working::Working;
use crate::{given, step};

/// ω of Table 6.3 for a transformation parameter β, with its steps noted.
pub fn omega(w: &mut Working, beta: f64, b_eff: Length, t_wc: Length, A_vc: Area) -> f64 {
    given!(w, "interaction with shear in the web"; beta, b_eff, t_wc, A_vc);
    step!(w, "Table 6.3", omega_1 = 1.0 / (1.0 + 1.3 * (b_eff * t_wc / A_vc).powi(2)).sqrt());
    step!(w, "Table 6.3", omega_2 = 1.0 / (1.0 + 5.2 * (b_eff * t_wc / A_vc).powi(2)).sqrt());
    if beta <= 0.5 {
        step!(w, "Table 6.3", omega = 1.0);
        omega
    } else if beta <= 1.0 {
        step!(w, "Table 6.3", omega = omega_1 + 2.0 * (1.0 - beta) * (1.0 - omega_1));
        omega
    } else {
        // NaN and anything beyond 2 end here too: β is at most 2 (5.3(9)), and NaN stays NaN.
        step!(w, "Table 6.3", omega = omega_1 + (beta.min(2.0) - 1.0) * (omega_2 - omega_1) + 0.0 * beta);
        omega
    }
}

/// F_t,wc,Rd: an unstiffened web in transverse tension over b_eff = l_eff of the column flange, 6.2.6.3.
pub fn tension(b_eff: Length, t_wc: Length, f_y_wc: Stress, A_vc: Area, beta: f64, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    let omega = omega(&mut w, beta, b_eff, t_wc, A_vc);
    given!(w, "column web"; f_y_wc);
    step!(w, "6.2.6.3, (6.15)", F_t_wc_Rd = omega * b_eff * t_wc * f_y_wc / gamma_M0);
    Resistance { value: F_t_wc_Rd, working: w }
}

/// An unstiffened column web in transverse compression.
#[derive(Clone, Copy, Debug)]
pub struct Compression {
    /// t_fb: the beam's compression flange.
    pub t_fb: Length,
    /// a_p: throat of its fillets on the end plate.
    pub a_p: Length,
    /// t_fc.
    pub t_fc: Length,
    /// s: root radius of a rolled column.
    pub s: Length,
    /// t_p.
    pub t_p: Length,
    /// How far the end plate projects below the compression flange, ≥ 0: fillet and spread find no more room than that.
    pub projection: Length,
    /// From the middle of the compression flange to the column's end; `None` where the column runs on.
    pub to_end: Option<Length>,
    /// t_wc.
    pub t_wc: Length,
    /// d_wc = h_c − 2(t_fc + s).
    pub d_wc: Length,
    /// f_y of the web.
    pub f_y_wc: Stress,
    /// A_vc.
    pub A_vc: Area,
    /// β.
    pub beta: f64,
    /// k_wc.
    pub k_wc: f64,
}

/// k_wc, 6.2.6.2(2) (6.14), from the column's axial force (positive in tension) and moment at the joint: the largest
/// compression in the web beside the root radius, d_wc/2 from the column's axis.
pub fn k_wc(
    w: &mut Working,
    (N_col_Ed, M_col_Ed): (Force, Moment),
    (A_c, I_c): (Area, SecondMoment),
    d_wc: Length,
    f_y_wc: Stress,
) -> f64 {
    given!(w, "stress along the column"; N_col_Ed, M_col_Ed, A_c, I_c, d_wc, f_y_wc);
    step!(w, "6.2.6.2(2)", sigma_com_Ed = M_col_Ed.abs() / (I_c / (0.5 * d_wc)) - N_col_Ed / A_c);
    if sigma_com_Ed <= 0.7 * f_y_wc {
        step!(w, "6.2.6.2(2), (6.14)", k_wc = 1.0);
        k_wc
    } else {
        step!(w, "6.2.6.2(2), (6.14)", k_wc = (1.7 - sigma_com_Ed / f_y_wc).clamp(0.0, 1.0));
        k_wc
    }
}

/// b_eff,c,wc of (6.11), no further than the column's end.
pub fn b_eff(w: &mut Working, c: &Compression) -> Length {
    let Compression { t_fb, a_p, t_fc, s, t_p, projection, to_end, .. } = *c;
    given!(w, "column web at the compression flange"; t_fb, a_p, t_fc, s, t_p, projection);
    // 45° through the end plate, both ways; below the flange no further than the plate reaches.
    step!(w, "leg of the fillets", leg = 2.0_f64.sqrt() * a_p);
    step!(w, "6.2.6.2(1), fillet and s_p above and below", spread = (leg + t_p) + (leg + t_p).min(projection));
    step!(w, "6.2.6.2, (6.11)", b_eff_full = t_fb + spread + 5.0 * (t_fc + s));
    let past_end = to_end.map_or(Length::ZERO, |to_end| (0.5 * b_eff_full - to_end).max(Length::ZERO));
    step!(w, "no web past the column's end", b_eff = (b_eff_full - past_end).max(0.5 * b_eff_full));
    b_eff
}

/// F_c,wc,Rd: crushing and buckling of the unstiffened web, 6.2.6.2 (6.9); the first value is the smaller, the second is
/// crushing alone (for a stiffened web).
pub fn compression(c: &Compression, gamma_M0: f64, gamma_M1: f64) -> (Resistance, Resistance) {
    let mut w = Working::default();
    let Compression { t_wc, d_wc, f_y_wc, A_vc, beta, k_wc, .. } = *c;
    let b_eff = b_eff(&mut w, c);
    let omega = omega(&mut w, beta, b_eff, t_wc, A_vc);
    given!(w, "column web"; t_wc, d_wc, f_y_wc, k_wc);
    step!(w, "6.2.6.2, (6.13c)", lambda_p = 0.932 * ((b_eff / t_wc) * (d_wc / t_wc) * (f_y_wc / E)).sqrt());
    let rho = if lambda_p <= 0.72 {
        step!(w, "6.2.6.2, (6.13a)", rho = 1.0);
        rho
    } else {
        step!(w, "6.2.6.2, (6.13b)", rho = (lambda_p - 0.2) / (lambda_p * lambda_p));
        rho
    };
    step!(w, "6.2.6.2, (6.9)", F_crushing = omega * k_wc * b_eff * t_wc * f_y_wc / gamma_M0);
    let crushing = Resistance { value: F_crushing, working: w.clone() };
    step!(w, "6.2.6.2, (6.9)", F_buckling = omega * k_wc * rho * b_eff * t_wc * f_y_wc / gamma_M1);
    step!(w, "6.2.6.2, (6.9)", F_c_wc_Rd = F_crushing.min(F_buckling));
    (Resistance { value: F_c_wc_Rd, working: w }, crushing)
}
