//! Column web panel in shear: EN 1993-1-8:2005 6.2.6.1.

use super::{Resistance, epsilon};
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// What a pair of transverse stiffeners at the tension and at the compression flange adds, (6.8).
#[derive(Clone, Copy, Debug)]
pub struct FrameAction {
    /// d_s: between the centrelines of the stiffeners.
    pub d_s: Length,
    /// b_fc.
    pub b_fc: Length,
    /// t_fc.
    pub t_fc: Length,
    /// f_y of the column flange.
    pub f_y_fc: Stress,
    /// Overall width of a stiffener pair with the web between.
    pub b_st: Length,
    /// Thickness of the thinner pair.
    pub t_st: Length,
    /// f_y of the weaker stiffener.
    pub f_y_st: Stress,
}

/// V_wp,Rd, or why it does not apply: the panel's slenderness d_wc/t_wc is above 69 ε.
///
/// # Errors
/// One sentence with the slenderness and its limit.
pub fn shear(
    A_vc: Area,
    t_wc: Length,
    d_wc: Length,
    f_y_wc: Stress,
    frame: Option<FrameAction>,
    gamma_M0: f64,
) -> Result<Resistance, String> {
    let mut w = Working::default();
    let slenderness = d_wc / t_wc;
    let limit = 69.0 * epsilon(f_y_wc);
    if !(slenderness <= limit) {
        return Err(format!("the web panel's d/t_w is {slenderness:.1}, 6.2.6.1(1) applies up to 69ε = {limit:.1}"));
    }
    given!(w, "column web panel"; A_vc, t_wc, d_wc, f_y_wc, slenderness, limit);
    step!(w, "6.2.6.1, (6.7)", V_wp_Rd = 0.9 * f_y_wc * A_vc / (3.0_f64.sqrt() * gamma_M0));
    let mut value: Force = V_wp_Rd;
    if let Some(FrameAction { d_s, b_fc, t_fc, f_y_fc, b_st, t_st, f_y_st }) = frame {
        given!(w, "flanges and both pairs of stiffeners"; d_s, b_fc, t_fc, f_y_fc, b_st, t_st, f_y_st);
        step!(w, "6.2.6.1(4)", M_pl_fc_Rd = 0.25 * b_fc * (t_fc * t_fc) * f_y_fc / gamma_M0);
        step!(w, "6.2.6.1(4)", M_pl_st_Rd = 0.25 * b_st * (t_st * t_st) * f_y_st / gamma_M0);
        step!(
            w,
            "6.2.6.1, (6.8)",
            V_wp_add_Rd = (4.0 * M_pl_fc_Rd / d_s).min((2.0 * M_pl_fc_Rd + 2.0 * M_pl_st_Rd) / d_s)
        );
        step!(w, "6.2.6.1(4)", V_wp_stiffened_Rd = V_wp_Rd + V_wp_add_Rd);
        value = V_wp_stiffened_Rd;
    }
    Ok(Resistance { value, working: w })
}
