//! Diagonal stiffeners of a column web panel: EN 1993-1-8:2005 6.2.6.1(5) with EN 1993-1-1.

use super::stiffeners::curve_c;
use super::welds::{self, Fillets};
use super::{Resistance, epsilon};
use crate::units::{Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// A pair of diagonal plates, one on each side of the web.
#[derive(Clone, Copy, Debug)]
pub struct Diagonal {
    /// b: outstand of one plate.
    pub b: Length,
    /// t.
    pub t: Length,
    /// Width of one plate that is cut away beside the column's root fillet.
    pub cope: Length,
    /// f_y of the plates.
    pub f_y: Stress,
    /// Between its ends, along the column's axis.
    pub rise: Length,
    /// Between its ends, along the column's depth.
    pub run: Length,
    /// Its fillets.
    pub fillets: Fillets,
    /// t_wc.
    pub t_wc: Length,
    /// What takes its horizontal part at the column's far flange: `None` where another diagonal does.
    pub far_end: Option<Force>,
}

impl Diagonal {
    /// Whether the outstand keeps b/t ≤ 14 ε (EN 1993-1-1 Table 5.2, class 3).
    pub fn stocky(&self) -> bool {
        self.b / self.t <= 14.0 * epsilon(self.f_y)
    }
}

/// What a pair of diagonals adds to the panel's shear resistance: the horizontal part of the least of its net section, its
/// buckling as a strut of the gross section out of the web's plane (curve c, its full length) and its fillets at an end. So it
/// holds in either sense.
pub fn shear(diagonal: &Diagonal, gamma_M0: f64, gamma_M1: f64, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    let Diagonal { b, t, cope, f_y, rise, run, t_wc, .. } = *diagonal;
    given!(w, "pair of diagonals"; b, t, cope, f_y, rise, run, t_wc);
    step!(w, "length of the diagonal", l_d = run * (1.0 + (rise / run).powi(2)).sqrt());
    step!(w, "against the beam's axis", cos_theta = run / l_d);
    step!(w, "two plates", A_d = 2.0 * b * t);
    step!(w, "at its ends", A_d_net = 2.0 * (b - cope).max(Length::ZERO) * t);
    step!(w, "EN 1993-1-1 6.2.3, 6.2.4", N_d_y = A_d_net * f_y / gamma_M0);
    step!(w, "two plates and the web between", i_squared = (2.0 * b + t_wc) * (2.0 * b + t_wc) / 12.0);
    let chi = curve_c(&mut w, l_d, i_squared, f_y);
    step!(w, "EN 1993-1-1 6.3.1.1", N_d_b = chi * A_d * f_y / gamma_M1);
    let fillet = welds::any_direction(&diagonal.fillets, gamma_M2);
    w.absorb(fillet.working);
    let F_w_Rd = fillet.per_length;
    step!(w, "four fillets at an end, 4.5.3.3", N_d_w = 4.0 * F_w_Rd * (b - cope).max(Length::ZERO));
    step!(w, "the least of these", N_d_Rd = N_d_y.min(N_d_b).min(N_d_w));
    step!(w, "6.2.6.1(5)", V_d_Rd = N_d_Rd * cos_theta);
    let mut value: Force = V_d_Rd;
    if let Some(F_far_end) = diagonal.far_end {
        given!(w, "web and stiffeners at the far flange"; F_far_end);
        step!(w, "6.2.6.1(5), at the far flange", V_d_Rd_far = V_d_Rd.min(F_far_end));
        value = V_d_Rd_far;
    }
    Resistance { value, working: w }
}
