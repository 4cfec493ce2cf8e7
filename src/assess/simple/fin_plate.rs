//! Fin plates: EN 1993-1-8, and where it leaves off "Steel Buildings in Europe, Multi-Storey Steel Buildings, Part 5".

mod conditions;
mod numbers;
mod tying;

use super::{Strength, component};
use crate::assess::Component;
use crate::assess::end_plate::numbers::Noted;
use crate::eurocode::bolts::BearingPlace;
use crate::eurocode::{Resistance, bolt_group, bolts, fin_plate, net_section};
use crate::joints::{FinPlate, On};
use crate::rulebook::Rulebook;
use crate::units::{Length, Stress};
use crate::working::Working;
use crate::{given, step};
use numbers::{Numbers, Ply};

/// Everything about a fin plate's strength.
pub(super) fn strength(layout: &FinPlate, rulebook: &Rulebook) -> Strength {
    let mut noted = Noted::default();
    let (mut shear, mut pulled) = (Vec::new(), Vec::new());
    if let Some(numbers) = Numbers::gather(layout, rulebook, &mut noted) {
        conditions::note(&numbers, &mut noted);
        shear = in_shear(&numbers);
        pulled = tying::components(&numbers);
    }
    let Noted { inputs, assumptions, gaps, .. } = noted;
    Strength { shear, tying: pulled, gaps, assumptions, inputs }
}

const GUIDE: &str = "fin plates, design guides";

#[allow(non_snake_case)]
fn in_shear(n: &Numbers<'_>) -> Vec<Component> {
    let annex = &n.rulebook.annex;
    let (gamma_M0, gamma_M1, gamma_M2) = (annex.gamma_m0, annex.gamma_m1, annex.gamma_m2);
    let rules = &n.rulebook.simple;
    let group = bolt_group::eccentric(&n.places(), n.z());
    let one = n.bolt_in_shear(gamma_M2);
    let mut all = Vec::new();
    let mut bolts = bolt_group::shear(&group, one.value);
    let mut working = one.working;
    working.absorb(bolts.working);
    bolts.working = working;
    all.push(component("bolts-in-shear", "bolts in shear", "EN 1993-1-8:2005 3.6.1", bolts));
    for (id, title, ply) in
        [("plate-in-bearing", "plate in bearing", n.plate()), ("beam-web-in-bearing", "beam web in bearing", n.web())]
    {
        all.push(component(id, title, "EN 1993-1-8:2005 3.6.1", bearing(n, &group, &ply, gamma_M2)));
    }

    let (t_p, h_p, f_y) = (n.layout.thickness, n.h_p(), n.plate_steel.f_y);
    let gross = net_section::gross_shear(h_p * t_p, f_y, rules.gross_shear, gamma_M0);
    all.push(component("plate-gross-shear", "plate, gross section in shear", "EN 1993-1-1 6.2.6", gross));
    all.push(component("plate-net-shear", "plate, net section in shear", GUIDE, net_shear_of_plate(n, gamma_M2)));
    let plate = n.plate();
    let factors = (rules.block_tearing, gamma_M0, gamma_M2);
    let torn = ends(&plate).map(|end| block_tearing(n, &plate, end, factors)).reduce(weaker);
    all.extend(torn.map(|r| component("plate-block-tearing", "plate in block tearing", "EN 1993-1-8:2005 3.10.2", r)));
    all.push(component(
        "plate-in-bending",
        "plate in bending",
        GUIDE,
        fin_plate::bending(t_p, h_p, n.z(), f_y, gamma_M0),
    ));
    if n.is_long() {
        let buckling = fin_plate::buckling((t_p, h_p), (n.z_p(), n.z()), f_y, gamma_M1);
        all.push(component("plate-buckling", "plate in lateral torsional buckling", GUIDE, buckling));
    }

    let web = n.web();
    let gross = n.beam_gross(gamma_M0);
    let mut w = gross.working.clone();
    let (n_1, d_0, t_w, f_u) = (n.rows() as f64, n.bolts.d_0, n.beam.t_w, n.beam_steel.f_u);
    let A_v = gross.value / (n.beam_f_y() / (3.0_f64.sqrt() * gamma_M0));
    given!(w, "the beam's shear area, holes in one line"; A_v, n_1, d_0, t_w);
    step!(w, "net section, design guides", A_v_net = A_v - n_1 * (d_0 * t_w));
    let net = net_section::net_shear(A_v_net, f_u, gamma_M2);
    w.absorb(net.working);
    all.push(component("beam-web-gross-shear", "beam web, gross section in shear", "EN 1993-1-1 6.2.6", gross));
    let net = Resistance { value: net.value, working: w };
    all.push(component("beam-web-net-shear", "beam web, net section in shear", GUIDE, net));
    let torn = ends(&web).map(|end| block_tearing(n, &web, end, factors)).reduce(weaker);
    all.extend(
        torn.map(|r| component("beam-web-block-tearing", "beam web in block tearing", "EN 1993-1-8:2005 3.10.2", r)),
    );
    all.extend(
        n.notch_bending(gamma_M0)
            .into_iter()
            .reduce(weaker)
            .map(|r| component("beam-notch-in-bending", "beam at the notch in bending", "EN 1993-1-1 6.2.8", r)),
    );

    if let Some((a, beta_w, f_u)) = n.fillets() {
        let welds = fin_plate::welds((a, h_p), n.z(), (f_u, beta_w), gamma_M2);
        all.push(component("plate-weld", "weld of the plate", "EN 1993-1-8:2005 4.5.3.2", welds));
    }
    if n.layout.on != On::ColumnFlange {
        all.push(component(
            "supporting-web-local-shear",
            "supporting web in shear beside the plate",
            "EN 1993-1-1 6.2.6",
            local_shear(h_p, n.support.t_w, n.support_steel.f_y_flange, gamma_M0),
        ));
    }
    all
}

/// Both sides of the plate in shear through the supporting web.
#[allow(non_snake_case)]
fn local_shear(h_p: Length, t_w: Length, f_y: Stress, gamma_M0: f64) -> Resistance {
    let mut w = Working::default();
    given!(w, "supporting web over the plate's height"; h_p, t_w, f_y);
    step!(w, GUIDE, A_v = 2.0 * (h_p * t_w));
    step!(w, "EN 1993-1-1 6.2.6", V_l_Rd = A_v * f_y / (3.0_f64.sqrt() * gamma_M0));
    Resistance { value: V_l_Rd, working: w }
}

fn weaker(a: Resistance, b: Resistance) -> Resistance {
    if a.value.get().is_nan() || b.value >= a.value { a } else { b }
}

/// Bearing of the group in one ply, along the load and across it.
fn bearing(n: &Numbers<'_>, group: &bolt_group::Eccentric, ply: &Ply, gamma_m2: f64) -> Resistance {
    let (d, d_0, f_ub) = (n.bolts.d, n.bolts.d_0, n.bolts.f_ub);
    let (p_1, p_2) = (n.p_1(), n.p_2());
    let end = ply.edges().into_iter().flatten().reduce(Length::min);
    let along = BearingPlace { e_1: end, p_1: Some(p_1), e_2: ply.side, p_2 };
    let ver = bolts::bearing(along, d, d_0, ply.t, ply.f_u, f_ub, gamma_m2);
    let across = BearingPlace { e_1: Some(ply.side), p_1: p_2, e_2: ply.beside(), p_2: Some(p_1) };
    let hor = bolts::bearing(across, d, d_0, ply.t, ply.f_u, f_ub, gamma_m2);
    let whole = bolt_group::bearing(group, ver.value, hor.value);
    let mut w = Working::default();
    w.heading("one bolt along the load");
    w.absorb(ver.working);
    w.heading("one bolt across the load");
    w.absorb(hor.working);
    w.heading("the group");
    w.absorb(whole.working);
    Resistance { value: whole.value, working: w }
}

#[allow(non_snake_case)]
fn net_shear_of_plate(n: &Numbers<'_>, gamma_M2: f64) -> Resistance {
    let mut w = Working::default();
    let (t_p, h_p, n_1, d_0) = (n.layout.thickness, n.h_p(), n.rows() as f64, n.bolts.d_0);
    given!(w, "plate, holes in one line"; t_p, h_p, n_1, d_0);
    step!(w, "net section, design guides", A_v_net = t_p * (h_p - n_1 * d_0));
    let net = net_section::net_shear(A_v_net, n.plate_steel.f_u, gamma_M2);
    w.absorb(net.working);
    Resistance { value: net.value, working: w }
}

/// Edges of a ply towards which a block could be torn off: towards a flange it would have to take that along.
fn ends(ply: &Ply) -> impl Iterator<Item = Length> + use<> {
    ply.edges().into_iter().flatten()
}

/// The block of all bolts torn off towards an edge along the load, `e_1` from the last row: sheared along the line furthest from
/// the side, in tension from the first row to the side.
#[allow(non_snake_case)]
fn block_tearing(n: &Numbers<'_>, ply: &Ply, e_1: Length, (share, gamma_M0, gamma_M2): (f64, f64, f64)) -> Resistance {
    let mut w = Working::default();
    let (n_1, n_2, d_0, t, e_2) = (n.rows() as f64, n.lines() as f64, n.bolts.d_0, ply.t, ply.side);
    let (length, width) = (n.length(), n.width());
    given!(w, "block of all bolts: to the end, to the side, rows and lines"; t, e_1, e_2, n_1, n_2, length, width, d_0);
    step!(w, "3.10.2, net areas", A_nt = t * (e_2 + width - (n_2 - 0.5) * d_0));
    step!(w, "3.10.2, net areas", A_nv = t * (e_1 + length - (n_1 - 0.5) * d_0));
    let torn = net_section::block_tearing((A_nt, A_nv), (ply.f_y, ply.f_u), share, (gamma_M0, gamma_M2));
    w.absorb(torn.working);
    Resistance { value: torn.value, working: w }
}
