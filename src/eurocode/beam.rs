//! The beam's side: flange and web in compression (6.2.6.7), web in tension (6.2.6.8).

use super::{Resistance, epsilon};
use crate::units::{Area, Force, Length, Modulus, Stress};
use crate::working::Working;
use crate::{given, step};

/// Class of a doubly symmetric I section in major-axis bending, EN 1993-1-1 Table 5.2: `c_f`, `c_w` are the straight
/// parts of flange outstand and web, each with its own strength.
pub fn class_in_bending(flange: (Length, Length, Stress), web: (Length, Length, Stress)) -> u8 {
    let class = |(c, t, f_y): (Length, Length, Stress), limits: [f64; 3]| -> u8 {
        limits.iter().position(|limit| c / t <= limit * epsilon(f_y)).map_or(4, |i| i as u8 + 1)
    };
    class(flange, [9.0, 10.0, 14.0]).max(class(web, [72.0, 83.0, 124.0]))
}

/// A beam's flange and web in compression.
#[derive(Clone, Copy, Debug)]
pub struct FlangeCompression {
    /// W_pl,y for class 1 and 2, W_el,y for class 3.
    pub W_y: Modulus,
    /// h_b.
    pub h: Length,
    /// b_fb.
    pub b_fb: Length,
    /// t_fb.
    pub t_fb: Length,
    /// t_wb.
    pub t_wb: Length,
    /// A_v of the beam, EN 1993-1-1 6.2.6(3).
    pub A_v: Area,
    /// f_y.
    pub f_y: Stress,
    /// The shear that acts together with the moment; 0 where none is stated.
    pub V_Ed: Force,
}

/// V_pl,Rd, EN 1993-1-1 6.2.6 (6.18).
pub fn shear_resistance(A_v: Area, f_y: Stress, gamma_M0: f64) -> Force {
    A_v * f_y / (3.0_f64.sqrt() * gamma_M0)
}

/// F_c,fb,Rd = M_c,Rd/(h − t_fb), 6.2.6.7 (6.21), with M_c,Rd reduced beside a shear above half of the beam's own
/// (EN 1993-1-1 6.2.8, (6.30)); with h above 600 mm the web's share is at most 20 %.
///
/// # Errors
/// One sentence where the shear is more than the beam's own resistance: then no moment can be said.
pub fn flange_compression(c: &FlangeCompression, gamma_M0: f64) -> Result<Resistance, String> {
    let mut w = Working::default();
    let FlangeCompression { W_y, h, b_fb, t_fb, t_wb, A_v, f_y, V_Ed } = *c;
    given!(w, "beam"; W_y, h, b_fb, t_fb, f_y);
    step!(w, "EN 1993-1-1 6.2.5", M_c_Rd = W_y * f_y / gamma_M0);
    let mut M_beam = M_c_Rd;
    let V_pl_Rd = shear_resistance(A_v, f_y, gamma_M0);
    if !(V_Ed <= V_pl_Rd) {
        return Err(format!("V = {V_Ed} is more than the beam's own V_pl,Rd = {V_pl_Rd} (EN 1993-1-1 6.2.6)"));
    }
    if !(V_Ed <= 0.5 * V_pl_Rd) {
        given!(w, "shear above half of the beam's own"; V_Ed, V_pl_Rd, t_wb);
        step!(w, "EN 1993-1-1 6.2.8", rho = (2.0 * (V_Ed / V_pl_Rd) - 1.0).powi(2));
        step!(w, "EN 1993-1-1 6.2.8", A_w = (h - 2.0 * t_fb) * t_wb);
        step!(w, "EN 1993-1-1 6.2.8, (6.30)", M_y_V_Rd = (W_y - rho * (A_w * (A_w / (4.0 * t_wb)))) * f_y / gamma_M0);
        M_beam = M_y_V_Rd;
    }
    given!(w, "the beam's moment resistance that counts"; M_beam);
    step!(w, "6.2.6.7, (6.21)", F_c_fb_Rd = M_beam / (h - t_fb));
    let mut value = F_c_fb_Rd;
    if !(h.get() <= 600.0) {
        step!(w, "6.2.6.7(1)", F_flange = b_fb * t_fb * f_y / gamma_M0);
        step!(w, "6.2.6.7(1)", F_c_fb_Rd_deep = F_c_fb_Rd.min(F_flange / 0.8));
        value = F_c_fb_Rd_deep;
    }
    Ok(Resistance { value, working: w })
}

/// F_t,wb,Rd: the beam's web in tension over b_eff = l_eff of the end plate, 6.2.6.8 (6.22).
pub fn web_tension(b_eff: Length, t_wb: Length, f_y_wb: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "beam web"; b_eff, t_wb, f_y_wb);
    step!(w, "6.2.6.8, (6.22)", F_t_wb_Rd = b_eff * t_wb * f_y_wb / gamma_M0);
    Resistance { value: F_t_wb_Rd, working: w }
}
