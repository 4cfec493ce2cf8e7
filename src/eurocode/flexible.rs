//! Flexible end plates and the webs that they hang on: what the design guides for simple joints ask beyond EN 1993-1-8.

use super::Resistance;
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// A plate that is low against its gauge bends in its own plane between the web and the two lines of bolts: below this depth
/// over the gauge, by the guides.
pub const LOW: f64 = 1.36;

/// The plate in bending in its own plane: each half a cantilever from the web to its line of bolts.
pub fn plate_bending((t_p, h_p): (Length, Length), p_3: Length, t_w: Length, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "end plate, gauge, beam web"; t_p, h_p, p_3, t_w, f_y);
    step!(w, "elastic", W_el = t_p * (h_p * h_p) / 6.0);
    step!(w, "flexible end plates, design guides", V_m_Rd = 2.0 * (W_el * f_y / gamma_M0) / (0.5 * (p_3 - t_w)));
    Resistance { value: V_m_Rd, working: w }
}

/// A web in shear over a depth beside what hangs on it: `share` of the area (0.9 by the guides).
pub fn local_shear(depth: Length, t_w: Length, share: f64, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "web beside the plate"; depth, t_w, share, f_y);
    step!(w, "flexible end plates, design guides", A_v = share * (depth * t_w));
    step!(w, "EN 1993-1-1 6.2.6", V_c_Rd = A_v * f_y / (3.0_f64.sqrt() * gamma_M0));
    Resistance { value: V_c_Rd, working: w }
}

/// A web that bolts tear out of along both their lines: the smaller of its gross and its net area, twice.
pub fn supporting_web(
    (A_v, A_v_net): (Area, Area),
    (f_y, f_u): (Stress, Stress),
    (gamma_M0, gamma_M2): (f64, f64),
) -> Resistance {
    let mut w = Working::default();
    given!(w, "web along one line of bolts"; A_v, A_v_net, f_y, f_u);
    step!(w, "EN 1993-1-1 6.2.6", V_2_Rd = 2.0 * (A_v * f_y / (3.0_f64.sqrt() * gamma_M0)));
    step!(w, "net section, design guides", V_2_net_Rd = 2.0 * (A_v_net * f_u / (3.0_f64.sqrt() * gamma_M2)));
    step!(w, "flexible end plates, design guides", V_w2_Rd = V_2_Rd.min(V_2_net_Rd).max(Force::ZERO));
    Resistance { value: V_w2_Rd, working: w }
}

/// A beam's web in tension over the depth of the plate, for tying.
pub fn web_tearing(t_w: Length, h_w: Length, f_u: Stress, gamma_Mu: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "beam web beside the plate, tying"; t_w, h_w, f_u, gamma_Mu);
    step!(w, "tying, design guides", N_w_Rd_u = t_w * h_w * f_u / gamma_Mu);
    Resistance { value: N_w_Rd_u, working: w }
}

/// A web pulled square to its plane by a group of bolts, held along its edges `d_2` apart: yield lines at f_u, for tying.
/// `p` from the first to the last of `n_1` rows. From memory of the guides.
#[allow(clippy::too_many_arguments, reason = "each a symbol of the one formula")]
pub fn web_pulled(
    t_2: Length,
    d_2: Length,
    p_3: Length,
    d_0: Length,
    p: Length,
    n_1: f64,
    f_u: Stress,
    gamma_Mu: f64,
) -> Resistance {
    let mut w = Working::default();
    given!(w, "supporting web, tying"; t_2, d_2, p_3, d_0, p, n_1, f_u, gamma_Mu);
    step!(w, "tying, design guides", eta_1 = (p - 0.5 * n_1 * d_0).max(Length::ZERO) / d_2);
    step!(w, "tying, design guides", beta_1 = p_3 / d_2);
    step!(w, "tying, design guides", gamma_1 = d_0 / d_2);
    // 1 − β and 1 − γ above 0: the caller has the bolts between the edges.
    step!(w, "per length", m_pl_u = 0.25 * f_u * (t_2 * t_2) / gamma_Mu);
    step!(
        w,
        "tying, design guides",
        N_2_Rd_u = 8.0 * m_pl_u / (1.0 - beta_1) * (eta_1 + 1.5 * (1.0 - beta_1).sqrt() * (1.0 - gamma_1).sqrt())
    );
    Resistance { value: N_2_Rd_u, working: w }
}
