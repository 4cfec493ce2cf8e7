//! Notched beam ends (coped at one flange or both) by the design guides for simple joints.

use std::f64::consts::PI;

use super::Resistance;
use crate::units::{Area, Force, Length, Modulus, Stress};
use crate::working::Working;
use crate::{given, step};

/// What is left of an I section where flanges are notched away.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rest {
    /// Height of what is left.
    pub h: Length,
    /// t_w.
    pub t_w: Length,
    /// Width, thickness and root radius of the flange that is left; `None` where both are notched.
    pub flange: Option<(Length, Length, Length)>,
}

/// A_v of the rest: for a tee the half of EN 1993-1-1 6.2.6(3), without a flange the web.
pub fn shear_area(rest: &Rest, w: &mut Working) -> Area {
    let Rest { h, t_w, flange } = *rest;
    given!(w, "notched section"; h, t_w);
    let Some((_, t_f, r)) = flange else {
        step!(w, "notch, design guides", A_v = h * t_w);
        return A_v;
    };
    given!(w, "its flange"; t_f, r);
    step!(
        w,
        "notch, design guides",
        A_v = (h - t_f) * t_w + 2.0 * (1.0 - PI / 4.0) * (r * r) + (t_w + 2.0 * r) * t_f / 2.0
    );
    A_v
}

/// W_el of the rest to the notched edge. The root fillets are left out.
pub fn modulus(rest: &Rest, w: &mut Working) -> Modulus {
    let Rest { h, t_w, flange } = *rest;
    given!(w, "notched section"; h, t_w);
    let Some((b, t_f, _)) = flange else {
        step!(w, "notch, design guides", W_N = t_w * (h * h) / 6.0);
        return W_N;
    };
    given!(w, "its flange"; b, t_f);
    step!(w, "own arithmetic", h_w = h - t_f);
    step!(w, "own arithmetic", A_N = b * t_f + h_w * t_w);
    step!(w, "own arithmetic", y_N = (b * t_f * (t_f / 2.0) + h_w * t_w * (t_f + h_w / 2.0)) / A_N);
    step!(w, "own arithmetic", I_flange = (b * t_f * t_f) * t_f / 12.0 + (b * t_f * (y_N - t_f / 2.0)) * (y_N - t_f / 2.0));
    step!(
        w,
        "own arithmetic",
        I_web = (t_w * h_w * h_w) * h_w / 12.0 + (t_w * h_w * (t_f + h_w / 2.0 - y_N)) * (t_f + h_w / 2.0 - y_N)
    );
    step!(w, "notch, design guides", W_N = (I_flange + I_web) / (h - y_N));
    W_N
}

/// V for which the bending at the notch's root, V·`z_N`, is just carried: elastic, and beside a shear above half of V_pl,N,Rd
/// with (1 − ρ) f_y.
pub fn bending(rest: &Rest, z_N: Length, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    let A_v = shear_area(rest, &mut w);
    let W_N = modulus(rest, &mut w);
    given!(w, "from the support to the notch's root"; z_N, f_y);
    step!(w, "EN 1993-1-1 6.2.6", V_pl_N_Rd = A_v * f_y / (3.0_f64.sqrt() * gamma_M0));
    step!(w, "EN 1993-1-1 6.2.5", M_N_Rd = W_N * f_y / gamma_M0);
    step!(w, "notch, design guides", V_low = M_N_Rd / z_N);
    // From M_N,Rd (1 − (2V/V_pl − 1)²) = V z_N.
    step!(w, "EN 1993-1-1 6.2.8(3)", V_high = V_pl_N_Rd * (1.0 - V_pl_N_Rd / (4.0 * M_N_Rd / z_N)));
    let value = if V_low <= 0.5 * V_pl_N_Rd { V_low } else { V_high };
    let V_N_Rd = value;
    given!(w, "shear up to half of V_pl,N,Rd, or above it"; V_N_Rd);
    Resistance { value: V_N_Rd, working: w }
}

/// Whether a notched end of a laterally restrained beam needs no check of its stability, by the guides' limits: `depths` of the
/// notches at top and bottom, `l` the longer. `None` for a strength above that of the limits.
pub fn is_stable(h: Length, t_w: Length, depths: [Length; 2], l: Length, f_y: Stress) -> Option<bool> {
    let (slender, longest) = match f_y.get() {
        f_y if f_y <= 275.0 => (54.3, 160_000.0),
        f_y if f_y <= 355.0 => (48.0, 110_000.0),
        _ => return None,
    };
    let both = depths.iter().all(|depth| *depth > Length::ZERO);
    let deepest = depths[0].max(depths[1]);
    let deep_enough = deepest <= if both { h / 5.0 } else { h / 2.0 };
    let ratio = h / t_w;
    let most = if ratio <= slender { h } else { longest * h / ratio.powi(3) };
    Some(deep_enough && l <= most)
}

/// V_pl,N,Rd of the rest.
pub fn shear(rest: &Rest, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    let A_v = shear_area(rest, &mut w);
    given!(w, "notched section"; f_y);
    step!(w, "EN 1993-1-1 6.2.6", V_pl_N_Rd = A_v * f_y / (3.0_f64.sqrt() * gamma_M0));
    Resistance { value: V_pl_N_Rd, working: w }
}

/// V_n,Rd of the rest through `n_1` holes of `d_0`.
pub fn net_shear(rest: &Rest, (n_1, d_0): (f64, Length), f_u: Stress, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    let A_v = shear_area(rest, &mut w);
    given!(w, "holes in one line"; n_1, d_0, f_u);
    let t_w = rest.t_w;
    step!(w, "net section, design guides", A_v_net = A_v - n_1 * (d_0 * t_w));
    step!(w, "net section, design guides", V_n_Rd = A_v_net * (f_u / (3.0_f64.sqrt() * gamma_M2)));
    let value: Force = V_n_Rd;
    Resistance { value, working: w }
}
