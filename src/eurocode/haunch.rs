//! A beam with a haunch: flange and web in compression at the end plate (6.2.6.7), the beam's web at the haunch's end
//! (6.2.6.7(4), 6.2.6.2).
#![allow(non_snake_case)]

use super::{E, Resistance, column_web, epsilon};
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// The steepest haunch flange that 6.2.6.7(3) allows, degrees to the beam's flange.
pub const STEEPEST: f64 = 45.0;

/// A haunched beam at its end plate.
#[derive(Clone, Copy, Debug)]
pub struct Compression {
    /// Depth of beam and haunch together at the end plate.
    pub h: Length,
    /// Depth of the haunch alone, from the soffit of the beam to the underside of its flange.
    pub h_h: Length,
    /// Width and thickness of the haunch's flange, and the angle between it and the beam's flange in degrees.
    pub b_fh: Length,
    /// See `b_fh`.
    pub t_fh: Length,
    /// See `b_fh`.
    pub theta: f64,
    /// Thickness of the haunch's web.
    pub t_wh: Length,
    /// Width and thickness of the beam's flange, thickness of its web.
    pub b_fb: Length,
    /// See `b_fb`.
    pub t_fb: Length,
    /// See `b_fb`.
    pub t_wb: Length,
    /// The least f_y of the parts.
    pub f_y: Stress,
    /// Whether the shear is no more than half of the beam's own resistance (EN 1993-1-1 6.2.8): else the web helps nothing.
    pub little_shear: bool,
}

/// F_c,fb,Rd of a haunched beam, the force square to the end plate: its flange alone, or with its web by M_c,Rd/(h − t) of
/// the elastic section without the intermediate flange, whichever is more; above 600 mm the web's share is at most 20 %.
///
/// # Errors
/// One sentence where the haunch's flange is of class 4.
pub fn compression(c: &Compression, gamma_M0: f64) -> Result<Resistance, String> {
    let mut w = Working::default();
    let Compression { h, h_h, b_fh, t_fh, theta, t_wh, b_fb, t_fb, t_wb, f_y, little_shear } = *c;
    given!(w, "haunch"; h, h_h, b_fh, t_fh, theta, t_wh, f_y);
    let outstand = 0.5 * (b_fh - t_wh);
    if !(outstand <= 14.0 * epsilon(f_y) * t_fh) {
        return Err(format!(
            "the haunch's flange, outstand {outstand} and thickness {t_fh}, is of class 4 (EN 1993-1-1 Table 5.2)"
        ));
    }
    step!(w, "its part square to the plate", F_flange = b_fh * t_fh * f_y / gamma_M0 * theta.to_radians().cos());
    let mut value = F_flange;
    // Elastic stresses over the whole depth: psi at the beam's lower flange.
    step!(w, "EN 1993-1-1 Table 5.2", psi = 1.0 - 2.0 * (h_h / h));
    let limit = 42.0 * epsilon(f_y) / (0.67 + 0.33 * psi);
    let panel_holds = psi > -1.0 && h_h <= limit * t_wh;
    if little_shear && panel_holds {
        given!(w, "beam, the lesser sizes count"; b_fb, t_fb, t_wb);
        step!(w, "width", b = b_fh.min(b_fb));
        step!(w, "flange", t = (t_fh * theta.to_radians().cos()).min(t_fb));
        step!(w, "web", t_w = t_wh.min(t_wb));
        step!(
            w,
            "without the intermediate flange, 6.2.6.7(1)",
            W_el = b * t * (h - t) * ((h - t) / h) + t_w * (h - 2.0 * t) * (h - 2.0 * t) * ((h - 2.0 * t) / h) / 6.0
        );
        step!(w, "EN 1993-1-1 6.2.5", M_c_Rd = W_el * f_y / gamma_M0);
        step!(w, "6.2.6.7, (6.21)", F_c = M_c_Rd / (h - t));
        let mut F_web = F_c;
        if !(h.get() <= 600.0) {
            step!(w, "6.2.6.7(1), at most 20 % by the web", F_c_deep = F_c.min(F_flange / 0.8));
            F_web = F_c_deep;
        }
        step!(w, "6.2.6.7", F_c_fb_Rd = F_flange.max(F_web));
        value = F_c_fb_Rd;
    }
    Ok(Resistance { value, working: w })
}

/// The beam's web where the haunch's flange ends.
#[derive(Clone, Copy, Debug)]
pub struct AtEnd {
    /// t_fh and the angle between the haunch's flange and the beam's, in degrees.
    pub t_fh: Length,
    /// See `t_fh`.
    pub theta: f64,
    /// t_fb, root radius and web of the beam.
    pub t_fb: Length,
    /// See `t_fb`.
    pub r: Length,
    /// See `t_fb`.
    pub t_wb: Length,
    /// d_wb = h − 2(t_fb + r).
    pub d_wb: Length,
    /// f_y of the beam's web.
    pub f_y: Stress,
    /// A_v of the beam.
    pub A_v: Area,
}

/// k_wc where nobody states the beam's own stress: σ_com,Ed is f_y at most, 6.2.6.2(2).
const K_WC_LEAST: f64 = 0.7;

/// F_c,wb,Rd: the beam's web in compression square to the beam at the haunch's end, by 6.2.6.2 with a stiff bearing s_s of
/// the haunch flange's thickness parallel to the beam (6.2.6.7(3)); ω for β = 1, k_wc at its least.
pub fn web_at_end(c: &AtEnd, gamma_M0: f64, gamma_M1: f64) -> Resistance {
    let mut w = Working::default();
    let AtEnd { t_fh, theta, t_fb, r, t_wb, d_wb, f_y, A_v } = *c;
    given!(w, "beam's web at the haunch's end"; t_fh, theta, t_fb, r, t_wb, d_wb, f_y);
    step!(w, "6.2.6.7(3)", s_s = t_fh / theta.to_radians().sin());
    step!(w, "6.2.6.2, (6.11)", b_eff = s_s + 5.0 * (t_fb + r));
    let omega = column_web::omega(&mut w, 1.0, b_eff, t_wb, A_v);
    let k_wc = K_WC_LEAST;
    given!(w, "the beam's own stress is not known, 6.2.6.2(2)"; k_wc);
    step!(w, "6.2.6.2, (6.13c)", lambda_p = 0.932 * ((b_eff / t_wb) * (d_wb / t_wb) * (f_y / E)).sqrt());
    let rho = if lambda_p <= 0.72 { 1.0 } else { (lambda_p - 0.2) / (lambda_p * lambda_p) };
    given!(w, "6.2.6.2, (6.13)"; rho);
    step!(w, "6.2.6.2, (6.9)", F_crushing = omega * k_wc * b_eff * t_wb * f_y / gamma_M0);
    step!(w, "6.2.6.2, (6.9)", F_buckling = omega * k_wc * rho * b_eff * t_wb * f_y / gamma_M1);
    step!(w, "6.2.6.2, (6.9)", F_c_wb_Rd = F_crushing.min(F_buckling));
    let value: Force = F_c_wb_Rd;
    Resistance { value, working: w }
}
