//! Transverse stiffeners of a column web: EN 1993-1-8:2005 6.2.6.2, 6.2.6.3 with EN 1993-1-5 9.1 and 9.4.

use super::welds::{self, Fillets};
use super::{E, Resistance, epsilon};
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// A pair of transverse stiffeners, one plate on each side of the web.
#[derive(Clone, Copy, Debug)]
pub struct Pair {
    /// b_s: outstand of one plate.
    pub b_s: Length,
    /// t_s.
    pub t_s: Length,
    /// Width of one plate that is cut away beside the column's root fillet.
    pub cope: Length,
    /// f_y of the stiffeners.
    pub f_y_s: Stress,
    /// Length of one plate along the web, less what is cut away at its ends.
    pub l_s: Length,
    /// Its fillets; `None` where nobody states them: then they are not asked.
    pub fillets: Option<Fillets>,
    /// Where it ends in the web, the web there: t_wc and its f_y. `None` for one from flange to flange.
    pub ends_in_web: Option<(Length, Stress)>,
}

/// The web that a pair strengthens in compression.
#[derive(Clone, Copy, Debug)]
pub struct Web {
    /// The unstiffened web's resistance.
    pub F_web: Force,
    /// Its crushing part.
    pub F_crushing: Force,
    /// t_wc.
    pub t_wc: Length,
    /// Clear depth between the flanges.
    pub h_clear: Length,
    /// f_y of the web.
    pub f_y_wc: Stress,
    /// How far the web runs on beyond the stiffeners on its shorter side, if the column ends there.
    pub runs_on: Option<Length>,
}

impl Pair {
    /// A_s,net: what bears on the flange.
    pub fn net_area(&self) -> Area {
        2.0 * (self.b_s - self.cope).max(Length::ZERO) * self.t_s
    }

    /// Whether the outstand keeps b_s/t_s ≤ 14 ε, so that it may be counted in full (EN 1993-1-1 Table 5.2, class 3).
    pub fn stocky(&self) -> bool {
        self.b_s / self.t_s <= 14.0 * epsilon(self.f_y_s)
    }

    /// Whether the pair holds the web against buckling: I_st ≥ 0.75 h_w t_w³, EN 1993-1-5 9.3.3(3), its rule for long panels,
    /// with h_w the clear depth between the flanges.
    pub fn rigid(&self, t_w: Length, h_w: Length) -> bool {
        let width = 2.0 * self.b_s + t_w;
        let slenderness = (width / t_w).powi(3) * (self.t_s / h_w);
        slenderness / 12.0 >= 0.75
    }
}

/// F_s,Rd: the force that a pair takes from the flange and gives to the web: its net section, its fillets on the flange (both
/// faces of both plates) and along the web, and for one that ends in the web its own shear beside the web and the web's on
/// both sides of it.
pub fn force(pair: &Pair, gamma_M0: f64, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    let Pair { b_s, t_s, cope, f_y_s, l_s, .. } = *pair;
    given!(w, "pair of stiffeners"; b_s, t_s, cope, f_y_s);
    step!(w, "EN 1993-1-5 9.4", A_s_net = pair.net_area());
    step!(w, "EN 1993-1-1 6.2.3, 6.2.4", F_s_y = A_s_net * f_y_s / gamma_M0);
    let mut value: Force = F_s_y;
    if let Some(Fillets { a, f_u, beta_w }) = pair.fillets {
        let (across, along) = (welds::across(a, f_u, beta_w, gamma_M2), welds::along(a, f_u, beta_w, gamma_M2));
        w.absorb(across.working);
        let (F_w_across, b_net) = (across.per_length, (b_s - cope).max(Length::ZERO));
        step!(w, "four fillets on the flange, 4.5.3.2", F_s_flange_w = 4.0 * F_w_across * b_net);
        w.absorb(along.working);
        let F_w_along = along.per_length;
        given!(w, "stiffener along the web"; l_s);
        step!(w, "four fillets along the web, 4.5.3.2", F_s_web_w = 4.0 * F_w_along * l_s);
        value = value.min(F_s_flange_w).min(F_s_web_w);
    }
    if let Some((t_wc, f_y_wc)) = pair.ends_in_web {
        given!(w, "stiffener that ends in the web"; l_s, t_wc, f_y_wc);
        step!(w, "EN 1993-1-1 6.2.6, both plates", F_s_v = 2.0 * l_s * t_s * f_y_s / (3.0_f64.sqrt() * gamma_M0));
        step!(
            w,
            "EN 1993-1-1 6.2.6, web above and below",
            F_w_v = 2.0 * l_s * t_wc * f_y_wc / (3.0_f64.sqrt() * gamma_M0)
        );
        value = value.min(F_s_v).min(F_w_v);
    }
    step!(w, "the least of these", F_s_Rd = value);
    Resistance { value: F_s_Rd, working: w }
}

/// A column web stiffened by a pair, in compression: the smaller of web crushing with the net stiffener area and of
/// flexural buckling of the cross of stiffeners and 15 ε t_w of web each way (EN 1993-1-5 9.1, curve c, buckling length
/// 0.75 of the clear depth), never less than the web alone.
pub fn compression(pair: &Pair, web: &Web, gamma_M0: f64, gamma_M1: f64, gamma_M2: f64) -> Resistance {
    let own = force(pair, gamma_M0, gamma_M2);
    let (F_s_Rd, mut w) = (own.value, own.working);
    let Web { F_web, F_crushing, t_wc, h_clear, f_y_wc, runs_on } = *web;
    let Pair { b_s, t_s, f_y_s, .. } = *pair;
    given!(w, "pair of stiffeners and column web"; F_web, F_crushing, t_wc, h_clear, f_y_wc);
    step!(w, "EN 1993-1-8 6.2.6.2(4)", F_crushing_stiffened = F_crushing + F_s_Rd);
    step!(w, "EN 1993-1-1 Table 5.2", eps = epsilon(f_y_wc));
    let full = 15.0 * eps * t_wc;
    let shorter = runs_on.map_or(full, |runs_on| full.min((runs_on - 0.5 * t_s).max(Length::ZERO)));
    step!(w, "EN 1993-1-5 9.1(2)", l_web = full + shorter);
    step!(w, "EN 1993-1-5 9.1(2)", A_eff = 2.0 * b_s * t_s + (l_web + t_s) * t_wc);
    step!(w, "EN 1993-1-5 9.1(2)", width = 2.0 * b_s + t_wc);
    step!(
        w,
        "second moment of area of the cross / A_eff",
        i_squared = (t_s * width / A_eff) * (width * width) / 12.0 + (l_web * t_wc / A_eff) * (t_wc * t_wc) / 12.0
    );
    step!(w, "EN 1993-1-5 9.4(2)", l_cr = 0.75 * h_clear);
    step!(w, "EN 1993-1-1 6.3.1.2", f_y_least = f_y_s.min(f_y_wc));
    let chi = curve_c(&mut w, l_cr, i_squared, f_y_least);
    step!(w, "EN 1993-1-1 6.3.1.1", N_b_Rd = chi * A_eff * f_y_least / gamma_M1);
    step!(w, "EN 1993-1-8 6.2.6.2(4)", F_c_stiffened = F_crushing_stiffened.min(N_b_Rd).max(F_web));
    Resistance { value: F_c_stiffened, working: w }
}

/// χ of buckling curve c for a buckling length and i², with its steps noted.
pub(super) fn curve_c(w: &mut Working, l_cr: Length, i_squared: Area, f_y: Stress) -> f64 {
    step!(
        w,
        "EN 1993-1-1 6.3.1.3",
        lambda = (l_cr * l_cr / i_squared).sqrt() / (std::f64::consts::PI * (E / f_y).sqrt())
    );
    step!(w, "EN 1993-1-1 6.3.1.2, curve c", Phi = 0.5 * (1.0 + 0.49 * (lambda - 0.2) + lambda * lambda));
    let slender = 1.0 / (Phi + (Phi * Phi - lambda * lambda).sqrt());
    step!(w, "EN 1993-1-1 6.3.1.2", chi = if slender > 1.0 { 1.0 } else { slender });
    chi
}

/// What a pair can take of the bolt rows beside it while it holds the column's flange: a row puts m/(m + m_2) of its force
/// into the stiffener (published handbook method for moment joints, from memory); `most` is the largest such share.
pub fn support(pair: &Pair, most: f64, gamma_M0: f64, gamma_M2: f64) -> Resistance {
    let own = force(pair, gamma_M0, gamma_M2);
    let (F_s_Rd, mut w) = (own.value, own.working);
    given!(w, "stiffener beside the rows, largest share m/(m + m_2)"; most);
    step!(w, "6.2.6.4", F_support = F_s_Rd / most);
    Resistance { value: F_support, working: w }
}

/// A column web with a pair of stiffeners in tension: the web over the row's b_eff and the pair.
pub fn tension(pair: &Pair, F_t_wc_Rd: Force, gamma_M0: f64, gamma_M2: f64) -> Resistance {
    let own = force(pair, gamma_M0, gamma_M2);
    let (F_s_Rd, mut w) = (own.value, own.working);
    given!(w, "column web"; F_t_wc_Rd);
    step!(w, "EN 1993-1-8 6.2.6.3(5)", F_t_stiffened = F_t_wc_Rd + F_s_Rd);
    Resistance { value: F_t_stiffened, working: w }
}
