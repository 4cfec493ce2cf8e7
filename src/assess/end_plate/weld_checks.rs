//! The fillets between beam and end plate. They must not be the weakest part (6.2.3(4)); where they are, they limit.
#![allow(non_snake_case)]

use super::limits::Limit;
use super::numbers::Numbers;
use crate::assess::{Component, RowForce};
use crate::eurocode::welds;
use crate::rulebook::Rulebook;
use crate::units::{Force, Length};
use crate::working::Working;
use crate::{given, step};

/// β_w and f_u of the weaker part joined.
fn parts(n: &Numbers) -> Option<(f64, crate::units::Stress)> {
    // The stronger β_w of the two is the safe one where the parts differ (Table 4.1 gives it per grade).
    Some((n.beta_w_beam?.max(n.beta_w_plate?), n.beam_strength.f_u.min(n.plate_strength.f_u)))
}

/// The tension flange's fillets against the rows beside the flange, and the web's against the rows beside the web, at the
/// joint's full moment resistance. `None` where a throat or a grade is not known.
pub fn at_flange_and_web(
    n: &Numbers,
    rulebook: &Rulebook,
    rows: &[RowForce],
    heights: &[Length],
    limits: &[Limit],
) -> (Option<Component>, Option<Vec<Component>>) {
    let gamma_M2 = rulebook.annex.gamma_m2;
    let Some((beta_w, f_u)) = parts(n) else { return (None, None) };
    let below: Vec<usize> = (0..rows.len()).filter(|&i| heights[i] < n.beam.h).collect();
    let beside_flange = |i: &usize| heights[*i] > n.beam.h || below.first() == Some(i);

    let flange = n.a_tension.map(|a| {
        let fillet = welds::across(a, f_u, beta_w, gamma_M2);
        let mut w = fillet.working;
        let (F_w_Rd, b_fb, t_fb, t_wb, r) = (fillet.per_length, n.beam.b, n.beam.t_f, n.beam.t_w, n.r_b);
        let f_y = n.beam_strength.f_y_flange;
        let F_rows: Force = (0..rows.len()).filter(beside_flange).map(|i| rows[i].force).sum();
        given!(w, "beam flange; rows beside it"; b_fb, t_fb, t_wb, r, f_y, F_rows);
        step!(w, "both faces of the flange, 4.5.1", l_w = b_fb + (b_fb - t_wb - 2.0 * r));
        step!(w, "4.5.3.2", F_flange_w_Rd = F_w_Rd * l_w);
        step!(w, "6.2.3(4); no more than the flange can bring", F_flange_Ed = F_rows.min(b_fb * t_fb * f_y));
        Component {
            id: "flange-weld".into(),
            title: "weld at the tension flange".into(),
            clause: "EN 1993-1-8:2005 4.5.3.2",
            resistance: F_flange_w_Rd,
            at_full: F_flange_Ed,
            working: w,
        }
    });

    let web = n.a_web.map(|a| {
        let fillet = welds::across(a, f_u, beta_w, gamma_M2);
        (below.iter().skip(1))
            .map(|&i| {
                let mut w = Working::default();
                w.absorb(fillet.working.clone());
                let F_w_Rd = fillet.per_length;
                let F_row = rows[i].force;
                let b_eff = web_length(limits, i);
                given!(w, "row beside the web"; F_row, b_eff);
                step!(w, "both sides of the web, 4.5.3.2", F_web_w_Rd = 2.0 * F_w_Rd * b_eff);
                Component {
                    id: "web-weld".into(),
                    title: format!("weld at the web, row {}", rows[i].row),
                    clause: "EN 1993-1-8:2005 4.5.3.2",
                    resistance: F_web_w_Rd,
                    at_full: F_row,
                    working: w,
                }
            })
            .collect()
    });
    (flange, web)
}

/// The length of web that a row pulls on: l_eff of the end plate for the row alone, as in 6.2.6.8.
pub fn web_length(limits: &[Limit], row: usize) -> Length {
    let own = |l: &&Limit| l.id == "beam-web-in-tension" && l.first == row && l.last == row;
    limits.iter().find(own).map_or(Length::ZERO, |limit| limit.length)
}

/// The web's fillets against the vertical shear: the length of web below the rows in tension. `None` where not known.
pub fn in_shear(n: &Numbers, rulebook: &Rulebook, tension_reach: Length) -> Option<Component> {
    let (beta_w, f_u) = parts(n)?;
    let fillet = welds::along(n.a_web?, f_u, beta_w, rulebook.annex.gamma_m2);
    let mut w = fillet.working;
    let (F_w_Rd, h, t_f, r) = (fillet.per_length, n.beam.h, n.beam.t_f, n.r_b);
    given!(w, "beam web"; h, t_f, r, tension_reach);
    step!(w, "the web below the rows in tension", l_w = (h - 2.0 * (t_f + r) - tension_reach).max(Length::ZERO));
    step!(w, "both sides of the web, 4.5.3.2", V_w_Rd = 2.0 * F_w_Rd * l_w);
    Some(Component {
        id: "web-weld-in-shear".into(),
        title: "weld at the web in shear".into(),
        clause: "EN 1993-1-8:2005 4.5.3.2",
        resistance: V_w_Rd,
        at_full: Force::ZERO,
        working: w,
    })
}
