//! Preloaded bolts and slip: EN 1993-1-8:2005 3.9; packing: 3.6.1(12).

use super::Resistance;
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// F_p,C of one bolt of class 8.8 or 10.9 that is tightened under control, 3.9.1(2).
pub fn preload(f_ub: Stress, A_s: Area) -> Resistance {
    let mut w = Working::default();
    given!(w, "preloaded bolt"; f_ub, A_s);
    step!(w, "3.9.1, (3.7)", F_p_C = 0.7 * f_ub * A_s);
    Resistance { value: F_p_C, working: w }
}

/// F_s,Rd of one preloaded bolt beside a tension, 3.9.2 (3.8); without one, 3.9.1 (3.6). `k_s` by Table 3.6 (1.0 for
/// normal holes), `n` friction surfaces, `mu` by Table 3.7 or by test; `gamma_M3` is that of the state that is checked.
pub fn slip(k_s: f64, n: f64, mu: f64, F_p_C: Force, F_t_Ed: Force, gamma_M3: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "friction surfaces, tension in the bolt"; k_s, n, mu, F_t_Ed);
    step!(w, "3.9.2, (3.8)", F_s_Rd = k_s * n * mu * (F_p_C - 0.8 * F_t_Ed).max(Force::ZERO) / gamma_M3);
    Resistance { value: F_s_Rd, working: w }
}

/// β_p of bolts in shear through packing of total thickness `t_p`, 3.6.1(12) (3.3): 1 up to a third of the diameter.
pub fn packing(d: Length, t_p: Length) -> (f64, Working) {
    let mut w = Working::default();
    given!(w, "bolt through packing"; d, t_p);
    let free = t_p <= d / 3.0;
    step!(w, "3.6.1(12), (3.3)", beta_p = if free { 1.0 } else { (9.0 * d / (8.0 * d + 3.0 * t_p)).min(1.0) });
    (beta_p, w)
}
