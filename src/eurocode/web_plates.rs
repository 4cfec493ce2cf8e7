//! Supplementary web plates: EN 1993-1-8:2005 6.2.6.1(6) to (13), 6.2.6.2(6), 6.2.6.3(8) and (9).

use super::epsilon;
use super::welds::Fillets;
use crate::units::{Area, Length, LineForce, Stress};
use crate::working::Working;
use crate::{given, step};

/// What holds a web plate's long edges.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Edges {
    /// Fillets.
    Fillet(Fillets),
    /// Full-penetration butt welds.
    Butt,
}

/// A plate on one side of the web.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WebPlate {
    /// b_s.
    pub b_s: Length,
    /// t_s.
    pub t_s: Length,
    /// f_y of the plate.
    pub f_y_s: Stress,
    /// Its long edges.
    pub edges: Edges,
}

/// The web that it lies on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Web {
    /// t_wc.
    pub t_wc: Length,
    /// Clear depth between the root radii or welds.
    pub d_wc: Length,
    /// f_y of the web.
    pub f_y_wc: Stress,
}

/// Why a plate does not count: one clause.
///
/// # Errors
/// The first condition of 6.2.6.1 that it fails. `within` is how much shorter a length may be and still reach.
pub fn conditions(plate: &WebPlate, web: &Web, half_width: Length, within: Length) -> Result<(), String> {
    let WebPlate { b_s, t_s, f_y_s, .. } = *plate;
    let most = 40.0 * epsilon(f_y_s) * t_s;
    if !(t_s >= web.t_wc) {
        Err(format!("it is {t_s} thick, the web {} (6.2.6.1(11))", web.t_wc))
    } else if !(half_width >= 0.5 * web.d_wc - within) {
        let reach = 0.5 * web.d_wc;
        Err(format!("it ends {half_width} from the web's middle, the root radius {reach} (6.2.6.1(9))"))
    } else if !(b_s <= most) {
        Err(format!("it is {b_s} wide, 40ε t_s is {most} (6.2.6.1(13))"))
    } else {
        Ok(())
    }
}

/// Which part of a plate its fillets bring in: along an edge the shear of the area that is added, and across it the plate's
/// half of a web's thickness in compression, both at once by the directional method (6.2.6.1(12), (4.1)). 1 for butt welds.
pub fn share(plate: &WebPlate, web: &Web, gamma_M0: f64, gamma_M2: f64) -> (f64, Working) {
    let mut w = Working::default();
    let Edges::Fillet(Fillets { a, f_u, beta_w }) = plate.edges else { return (1.0, w) };
    let Web { t_wc, f_y_wc, .. } = *web;
    given!(w, "web plate, its fillets along the web"; t_wc, f_y_wc, a, f_u, beta_w);
    step!(w, "6.2.6.1(12), along the edge", q_Ed = 0.9 * f_y_wc * t_wc / (3.0_f64.sqrt() * gamma_M0));
    step!(w, "6.2.6.1(12), across the edge", f_Ed = 0.5 * f_y_wc * t_wc / gamma_M0);
    let together = LineForce((2.0 * f_Ed.get().powi(2) + 3.0 * q_Ed.get().powi(2)).sqrt());
    step!(w, "sqrt(2 f_Ed² + 3 q_Ed²)", F_w_Ed = together);
    step!(w, "4.5.3.2, (4.1)", F_w_Rd = f_u / (beta_w * gamma_M2) * a);
    let whole = F_w_Rd / F_w_Ed;
    step!(w, "6.2.6.1(12)", share = if whole > 1.0 { 1.0 } else { whole });
    (share, w)
}

/// A_vc with one plate: b_s t_wc more, as far as its welds bring it in. A second plate adds nothing (6.2.6.1(6)).
pub fn shear_area(w: &mut Working, A_vc: Area, t_wc: Length, b_s: Length, share: f64) -> Area {
    given!(w, "web plate"; A_vc, t_wc, b_s, share);
    step!(w, "6.2.6.1(6)", A_vc_s = A_vc + share * b_s * t_wc);
    A_vc_s
}

/// t_w,eff in compression: half a web more for each plate, as far as its welds bring it in; `shares` is their sum.
pub fn in_compression(w: &mut Working, t_wc: Length, shares: f64) -> Length {
    given!(w, "web plates in compression, sum of their shares"; t_wc, shares);
    step!(w, "6.2.6.2(6)", t_w_eff = (1.0 + 0.5 * shares) * t_wc);
    t_w_eff
}

/// t_w,eff in tension, by the weakest of the plates' edges: 1.5 t_wc for one plate with butt welds, 2.0 t_wc for two; with
/// fillets of a ≥ t_s/√2 1.4 t_wc whether one or two (1.3 t_wc from S420 on); less is not counted.
pub fn in_tension(w: &mut Working, t_wc: Length, f_y_wc: Stress, plates: &[WebPlate]) -> Length {
    let enough = |plate: &&WebPlate| match plate.edges {
        Edges::Butt => true,
        Edges::Fillet(Fillets { a, .. }) => a >= plate.t_s / 2.0_f64.sqrt(),
    };
    let counted: Vec<&WebPlate> = plates.iter().filter(enough).collect();
    let butt = counted.iter().filter(|plate| plate.edges == Edges::Butt).count();
    given!(w, "web plates in tension"; t_wc);
    let fillets = if f_y_wc.get() > 355.0 { 1.3 } else { 1.4 };
    let factor = match (counted.len(), butt) {
        (0, _) => 1.0,
        (_, 0) => fillets,
        (_, 1) => 1.5,
        _ => 2.0,
    };
    step!(w, "6.2.6.3(8)", t_w_eff = factor * t_wc);
    t_w_eff
}
