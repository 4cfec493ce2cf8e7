//! Fillet welds: EN 1993-1-8:2005 4.5.3.2, the directional method.

use crate::units::{Length, LineForce, Stress};
use crate::working::Working;
use crate::{given, step};

/// Fillets of one throat and what the parts that they join are made of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fillets {
    /// a.
    pub a: Length,
    /// f_u of the weaker part joined.
    pub f_u: Stress,
    /// β_w of Table 4.1, the larger of the two parts'.
    pub beta_w: f64,
}

/// A fillet's resistance per length for one direction of force.
#[derive(Clone, Debug)]
pub struct FilletResistance {
    /// Force per length of one fillet.
    pub per_length: LineForce,
    /// How it was computed.
    pub working: Working,
}

/// One fillet at 90° between two plates, pulled across its length: σ⊥ = τ⊥ = F/(√2 a), (4.1).
pub fn across(a: Length, f_u: Stress, beta_w: f64, gamma_M2: f64) -> FilletResistance {
    let mut w = Working::default();
    given!(w, "fillet, weaker part joined"; a, f_u, beta_w);
    step!(w, "4.5.3.2, (4.1)", F_across = f_u / (2.0_f64.sqrt() * beta_w * gamma_M2) * a);
    step!(w, "4.5.3.2, (4.1)", F_sigma = 2.0_f64.sqrt() * 0.9 * f_u / gamma_M2 * a);
    step!(w, "4.5.3.2, (4.1)", F_w_Rd = F_across.min(F_sigma));
    FilletResistance { per_length: F_w_Rd, working: w }
}

/// One fillet sheared along its length: τ∥ = F/a, (4.1).
pub fn along(a: Length, f_u: Stress, beta_w: f64, gamma_M2: f64) -> FilletResistance {
    let mut w = Working::default();
    given!(w, "fillet, weaker part joined"; a, f_u, beta_w);
    step!(w, "4.5.3.2, (4.1)", F_w_Rd = f_u / (3.0_f64.sqrt() * beta_w * gamma_M2) * a);
    FilletResistance { per_length: F_w_Rd, working: w }
}

/// One fillet whatever the direction of its force: the simplified method, (4.3) and (4.4).
pub fn any_direction(fillets: &Fillets, gamma_M2: f64) -> FilletResistance {
    let mut w = Working::default();
    let Fillets { a, f_u, beta_w } = *fillets;
    given!(w, "fillet, weaker part joined"; a, f_u, beta_w);
    step!(w, "4.5.3.3, (4.3) and (4.4)", F_w_Rd = f_u / (3.0_f64.sqrt() * beta_w * gamma_M2) * a);
    FilletResistance { per_length: F_w_Rd, working: w }
}
