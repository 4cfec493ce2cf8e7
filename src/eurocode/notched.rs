//! A beam's web where a notch has taken one flange or both: shear, bending beside shear, and when the edge needs no check of
//! its own, by the design guides for simple joints.

use super::Resistance;
use crate::units::{Area, Force, Length, Modulus, Stress};
use crate::working::Working;
use crate::{given, step};

/// What a notch leaves of an I section.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Left {
    /// A T: the web with one flange of width `b` and thickness `t_f`, root radius `r`.
    Tee {
        /// b.
        b: Length,
        /// t_f.
        t_f: Length,
        /// r.
        r: Length,
    },
    /// The web alone.
    Web,
}

/// The section at a notch: `h_n` deep, web `t_w`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Section {
    /// What is left.
    pub left: Left,
    /// Its depth.
    pub h_n: Length,
    /// t_w.
    pub t_w: Length,
    /// f_y.
    pub f_y: Stress,
}

fn shear_area(section: &Section, w: &mut Working) -> Area {
    let Section { left, h_n, t_w, f_y } = *section;
    given!(w, "section at the notch"; h_n, t_w, f_y);
    match left {
        Left::Web => {
            step!(w, "EN 1993-1-1 6.2.6", A_v_N = h_n * t_w);
            A_v_N
        }
        Left::Tee { b, t_f, r } => {
            given!(w, "the flange that is left"; b, t_f, r);
            let fillets = 2.0 - std::f64::consts::FRAC_PI_2;
            step!(w, "area of the T", A_T = (h_n - t_f) * t_w + b * t_f + fillets * (r * r));
            step!(w, "EN 1993-1-1 6.2.6", A_v_N = A_T - b * t_f + 0.5 * ((t_w + 2.0 * r) * t_f));
            A_v_N
        }
    }
}

/// V_pl,N,Rd: the section at a notch in shear.
pub fn shear(section: &Section, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    let A_v_N = shear_area(section, &mut w);
    let f_y = section.f_y;
    step!(w, "EN 1993-1-1 6.2.6", V_pl_N_Rd = A_v_N * f_y / (3.0_f64.sqrt() * gamma_M0));
    Resistance { value: V_pl_N_Rd, working: w }
}

/// W_el of the T at its free edge, root radii left out.
fn tee_modulus(section: &Section, (b, t_f): (Length, Length), w: &mut Working) -> Modulus {
    let Section { h_n, t_w, .. } = *section;
    step!(w, "web of the T", A_w = (h_n - t_f) * t_w);
    step!(w, "flange of the T", A_f = b * t_f);
    step!(w, "its centre, from the flange", z_c = (0.5 * t_f * A_f + 0.5 * (h_n + t_f) * A_w) / (A_f + A_w));
    step!(w, "web to the centre", z_w = (0.5 * (h_n + t_f) - z_c).abs());
    step!(w, "flange to the centre", z_f = (z_c - 0.5 * t_f).abs());
    step!(
        w,
        "second moment of area",
        I_N = (A_w * (h_n - t_f) / 12.0 * (h_n - t_f)) + (A_f * t_f / 12.0 * t_f) + A_w * z_w * z_w + A_f * z_f * z_f
    );
    step!(w, "the farther edge", z_edge = z_c.max(h_n - z_c));
    step!(w, "elastic", W_el_N = I_N / z_edge);
    W_el_N
}

/// The end shear that a notched section carries with the moment V·a that it makes at the notch's end, `a` from the support's
/// face. Elastic below half of V_pl,N,Rd; above it reduced as in EN 1993-1-1 6.2.8, and then a web alone is plastic.
pub fn bending(section: &Section, a: Length, gamma_M0: f64) -> Resistance {
    let in_shear = shear(section, gamma_M0);
    let (V_pl_N_Rd, mut w) = (in_shear.value, in_shear.working);
    let Section { left, h_n, t_w, f_y } = *section;
    given!(w, "from the support's face to the end of the notch"; a);
    let W_el = match left {
        Left::Tee { b, t_f, .. } => tee_modulus(section, (b, t_f), &mut w),
        Left::Web => {
            step!(w, "elastic", W_el_N = t_w * (h_n * h_n) / 6.0);
            W_el_N
        }
    };
    let W_el_N = W_el;
    step!(w, "notched beams, design guides", V_low_Rd = f_y * W_el_N / gamma_M0 / a);
    if V_low_Rd <= 0.5 * V_pl_N_Rd {
        let V_N_Rd = V_low_Rd;
        given!(w, "shear no more than half of the section's own"; V_N_Rd);
        return Resistance { value: V_N_Rd, working: w };
    }
    let W = match left {
        Left::Tee { .. } => W_el,
        Left::Web => {
            step!(w, "plastic", W_pl_N = t_w * (h_n * h_n) / 4.0);
            W_pl_N
        }
    };
    let W_N = W;
    given!(w, "beside a high shear"; W_N);
    // V a = M (1 − (2V/V_pl − 1)²) has this one solution above V = 0.
    step!(w, "V times a over the moment at V = V_pl", k = a * V_pl_N_Rd / (W_N * f_y / gamma_M0));
    step!(w, "EN 1993-1-1 6.2.8, solved for V", V_N_Rd = (1.0 - k / 4.0) * V_pl_N_Rd);
    Resistance { value: V_N_Rd.max(Force::ZERO), working: w }
}

/// The longest notch whose edge does not buckle in a beam that is held against lateral torsional buckling; for a steel above
/// S355 there is no figure: `None`. Figures of the design guides, from memory: 54.3 and 160 000 for S275, 48 and 110 000 for S355.
pub fn longest_stable(h: Length, t_w: Length, f_y: Stress) -> Option<Length> {
    let (slender, factor) = match f_y.get() {
        f if f <= 275.0 => (54.3, 160_000.0),
        f if f <= 355.0 => (48.0, 110_000.0),
        _ => return None,
    };
    let slenderness = h / t_w;
    Some(if slenderness <= slender { h } else { factor * h / slenderness.powi(3) })
}
