//! Sections through bolt holes: EN 1993-1-8:2005 3.10.2, EN 1993-1-1:2005 6.2.3 and 6.2.6, and the factors of the design
//! guides for simple joints.

use super::Resistance;
use crate::units::{Area, Stress};
use crate::working::Working;
use crate::{given, step};

/// V_eff,Rd: block tearing, 3.10.2 (3.9) and (3.10). `tension_share` is 1 for a concentric group, 0.5 for an eccentric one.
pub fn block_tearing(
    (A_nt, A_nv): (Area, Area),
    (f_y, f_u): (Stress, Stress),
    tension_share: f64,
    (gamma_M0, gamma_M2): (f64, f64),
) -> Resistance {
    let mut w = Working::default();
    given!(w, "block tearing, areas in tension and shear"; A_nt, A_nv, f_y, f_u, tension_share);
    step!(
        w,
        "3.10.2",
        V_eff_Rd = tension_share * (f_u * A_nt) / gamma_M2 + 1.0 / 3.0_f64.sqrt() * (f_y * A_nv) / gamma_M0
    );
    Resistance { value: V_eff_Rd, working: w }
}

/// Gross section of a plate in shear; `reduction` is 1.27 by the guides for the stress from bending beside it.
pub fn gross_shear(A_v: Area, f_y: Stress, reduction: f64, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "gross section in shear, factor of the design guides"; A_v, f_y, reduction);
    step!(w, "EN 1993-1-1 6.2.6", V_g_Rd = A_v / reduction * (f_y / (3.0_f64.sqrt() * gamma_M0)));
    Resistance { value: V_g_Rd, working: w }
}

/// Net section in shear, by the guides for simple joints.
pub fn net_shear(A_v_net: Area, f_u: Stress, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "net section in shear"; A_v_net, f_u);
    step!(w, "net section, design guides", V_n_Rd = A_v_net * (f_u / (3.0_f64.sqrt() * gamma_M2)));
    Resistance { value: V_n_Rd, working: w }
}
