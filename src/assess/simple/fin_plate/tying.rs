//! A fin plate pulled by a tying force, by γ_Mu (design guides).

use super::super::component;
use super::numbers::{Numbers, Ply};
use crate::assess::Component;
use crate::eurocode::bolts::BearingPlace;
use crate::eurocode::{Resistance, bolts, fin_plate, net_section};
use crate::joints::On;
use crate::units::Length;
use crate::working::Working;
use crate::{given, step};

const GUIDE: &str = "design guides, tying";

/// Every component; none where the annex has no γ_Mu, the weld is not of full strength for all that is known, or the support is a
/// beam's web, which the guides leave open.
#[allow(non_snake_case)]
pub(super) fn components(n: &Numbers<'_>) -> Vec<Component> {
    let (Some(gamma_Mu), Some((a, ..))) = (n.rulebook.annex.gamma_mu, n.fillets()) else { return Vec::new() };
    if n.layout.on == On::BeamWeb {
        return Vec::new();
    }
    let mut all = vec![component("tying-bolts-in-shear", "tying: bolts in shear", GUIDE, bolts_in_shear(n, gamma_Mu))];
    for (ply, what, id) in [(n.plate(), "plate", "tying-plate"), (n.web(), "beam web", "tying-beam-web")] {
        let mut push = |how: &str, words: &str, resistance| {
            all.push(component(&format!("{id}-{how}"), &format!("tying: {what}{words}"), GUIDE, resistance));
        };
        push("in-bearing", " in bearing", bearing(n, &ply, gamma_Mu));
        push("net-section", ", net section", net(n, &ply, gamma_Mu));
        push("block-tearing", " in block tearing", block(n, &ply, gamma_Mu));
    }
    if n.layout.on == On::ColumnWeb {
        let d = n.support.h - 2.0 * (n.support.t_f + n.support.r.unwrap_or(Length::ZERO));
        let s = 2.0_f64.sqrt() * a;
        let sizes = (n.h_p(), n.layout.thickness, s);
        let web = fin_plate::web_in_tying((n.support.t_w, d, n.support_steel.f_u), sizes, gamma_Mu);
        all.push(component("tying-column-web", "tying: column web in bending", GUIDE, web));
    }
    all
}

#[allow(non_snake_case)]
fn bolts_in_shear(n: &Numbers<'_>, gamma_Mu: f64) -> Resistance {
    let one = n.bolt_in_shear(gamma_Mu);
    let mut w = one.working;
    let (count, F_v_u) = ((n.rows() * n.lines()) as f64, one.value);
    given!(w, "bolts, by γ_Mu"; count);
    step!(w, GUIDE, N_v_u = count * F_v_u);
    Resistance { value: N_v_u, working: w }
}

#[allow(non_snake_case)]
fn bearing(n: &Numbers<'_>, ply: &Ply, gamma_Mu: f64) -> Resistance {
    let place = BearingPlace { e_1: Some(ply.side), p_1: n.p_2(), e_2: ply.beside(), p_2: Some(n.p_1()) };
    let one = bolts::bearing(place, n.bolts.d, n.bolts.d_0, ply.t, ply.f_u, n.bolts.f_ub, gamma_Mu);
    let mut w = one.working;
    let (count, F_b_u) = ((n.rows() * n.lines()) as f64, one.value);
    given!(w, "bolts, by γ_Mu"; count);
    step!(w, GUIDE, N_b_u = count * F_b_u);
    Resistance { value: N_b_u, working: w }
}

/// The ply through one line of holes, a web over the plate's height.
#[allow(non_snake_case)]
fn net(n: &Numbers<'_>, ply: &Ply, gamma_Mu: f64) -> Resistance {
    let mut w = Working::default();
    let (t, h, n_1, d_0) = (ply.t, n.h_p(), n.rows() as f64, n.bolts.d_0);
    given!(w, "ply over the plate's height, holes in one line"; t, h, n_1, d_0);
    step!(w, GUIDE, A_net = t * (h - n_1 * d_0));
    let net = fin_plate::net_tension(A_net, ply.f_u, gamma_Mu);
    w.absorb(net.working);
    Resistance { value: net.value, working: w }
}

/// The block between the outermost rows torn out to the side: in tension along the first line, sheared along both rows.
#[allow(non_snake_case)]
fn block(n: &Numbers<'_>, ply: &Ply, gamma_Mu: f64) -> Resistance {
    let mut w = Working::default();
    let (t, e_2, d_0, n_1, n_2) = (ply.t, ply.side, n.bolts.d_0, n.rows() as f64, n.lines() as f64);
    let (length, width, gamma_M0) = (n.length(), n.width(), n.rulebook.annex.gamma_m0);
    given!(w, "block of all bolts, to the side"; t, e_2, n_1, n_2, length, width, d_0);
    step!(w, "3.10.2, net areas", A_nt = t * (length - (n_1 - 1.0) * d_0));
    step!(w, "3.10.2, net areas", A_nv = 2.0 * (t * (e_2 + width - (n_2 - 0.5) * d_0)));
    let torn = net_section::block_tearing((A_nt, A_nv), (ply.f_y, ply.f_u), 1.0, (gamma_M0, gamma_Mu));
    w.absorb(torn.working);
    Resistance { value: torn.value, working: w }
}
