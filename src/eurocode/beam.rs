//! The beam's side: flange and web in compression (6.2.6.7), web in tension (6.2.6.8).

use super::{Resistance, epsilon};
use crate::units::{Length, Modulus, Stress};
use crate::working::Working;
use crate::{given, step};

/// Class of a doubly symmetric I section in major-axis bending, EN 1993-1-1 Table 5.2: `c_f`, `c_w` are the straight
/// parts of flange outstand and web.
pub fn class_in_bending(c_f: Length, t_f: Length, c_w: Length, t_w: Length, f_y: Stress) -> u8 {
    let eps = epsilon(f_y);
    let class = |ratio: f64, limits: [f64; 3]| -> u8 {
        limits.iter().position(|limit| ratio <= limit * eps).map_or(4, |i| i as u8 + 1)
    };
    class(c_f / t_f, [9.0, 10.0, 14.0]).max(class(c_w / t_w, [72.0, 83.0, 124.0]))
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
    /// f_y.
    pub f_y: Stress,
}

/// F_c,fb,Rd = M_c,Rd/(h − t_fb), 6.2.6.7 (6.21); with h above 600 mm the web's share is at most 20 %.
pub fn flange_compression(c: &FlangeCompression, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    let FlangeCompression { W_y, h, b_fb, t_fb, f_y } = *c;
    given!(w, "beam"; W_y, h, b_fb, t_fb, f_y);
    step!(w, "EN 1993-1-1 6.2.5", M_c_Rd = W_y * f_y / gamma_M0);
    step!(w, "6.2.6.7, (6.21)", F_c_fb_Rd = M_c_Rd / (h - t_fb));
    let mut value = F_c_fb_Rd;
    if !(h.get() <= 600.0) {
        step!(w, "6.2.6.7(1)", F_flange = b_fb * t_fb * f_y / gamma_M0);
        step!(w, "6.2.6.7(1)", F_c_fb_Rd_deep = F_c_fb_Rd.min(F_flange / 0.8));
        value = F_c_fb_Rd_deep;
    }
    Resistance { value, working: w }
}

/// F_t,wb,Rd: the beam's web in tension over b_eff = l_eff of the end plate, 6.2.6.8 (6.22).
pub fn web_tension(b_eff: Length, t_wb: Length, f_y_wb: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "beam web"; b_eff, t_wb, f_y_wb);
    step!(w, "6.2.6.8, (6.22)", F_t_wb_Rd = b_eff * t_wb * f_y_wb / gamma_M0);
    Resistance { value: F_t_wb_Rd, working: w }
}
