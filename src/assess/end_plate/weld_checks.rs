//! The fillets between beam and end plate. They must not be the weakest part (6.2.3(4)); where they are, they limit.
#![allow(non_snake_case)]

use super::limits::Limit;
use super::numbers::{HaunchSide, PlateSide};
use crate::assess::{Component, RowForce};
use crate::eurocode::{Resistance, welds};
use crate::joints::Which;
use crate::rulebook::Rulebook;
use crate::units::{Force, Length};
use crate::{given, step};

/// β_w and f_u of the weaker part joined.
fn parts(n: &PlateSide) -> Option<(f64, crate::units::Stress)> {
    // The stronger β_w of the two is the safe one where the parts differ (Table 4.1 gives it per grade).
    Some((n.beta_w_beam?.max(n.beta_w_plate?), n.beam_strength.f_u.min(n.strength.f_u)))
}

/// The tension flange's fillets against the rows beside the flange, and the web's against the rows beside the web, alone and
/// in groups, at the joint's full moment resistance. None where a throat or a grade is not known.
pub fn at_flange_and_web(
    n: &PlateSide,
    rulebook: &Rulebook,
    rows: &[RowForce],
    heights: &[Length],
    limits: &[Limit],
) -> Vec<Component> {
    let gamma_M2 = rulebook.annex.gamma_m2;
    let Some((beta_w, f_u)) = parts(n) else { return Vec::new() };
    let first_below = (0..rows.len()).find(|&i| heights[i] < n.flange_top());
    let F_rows: Force =
        rows.iter().zip(0..).filter(|(_, i)| first_below.is_none_or(|b| *i <= b)).map(|(r, _)| r.force).sum();
    let (b_fb, t_fb, t_wb, r) = (n.beam.b, n.beam.t_f, n.beam.t_w, n.r_b_most);
    let F_flange = b_fb * t_fb * n.beam_strength.f_y_flange;

    let flange = n.a_tension.map(|a| {
        let fillet = welds::across(a, f_u, beta_w, gamma_M2);
        let mut w = fillet.working;
        let (F_w_Rd, f_y, b_p) = (fillet.per_length, n.beam_strength.f_y_flange, n.b_p);
        let beyond_flange = n.top - n.flange_top();
        given!(w, "beam flange on the plate; rows beside it"; b_fb, t_fb, t_wb, r, f_y, b_p, beyond_flange, F_rows);
        step!(w, "leg of the fillet", leg = 2.0_f64.sqrt() * a);
        // A plate that ends at the flange has no room for the outer fillet.
        let b_outer = if beyond_flange >= leg { b_fb.min(b_p) } else { Length::ZERO };
        given!(w, "where the plate has room for it"; b_outer);
        step!(w, "faces of the flange, 4.5.1", l_w = b_outer + (b_fb.min(b_p) - t_wb - 2.0 * r));
        step!(w, "4.5.3.2", F_flange_w_Rd = F_w_Rd * l_w);
        step!(w, "the most that the flange can bring", F_flange_most = b_fb * t_fb * f_y);
        // A weaker weld than the flange gives way as the rows' force reaches it, whatever the flange could bring.
        let F_most = if F_flange_w_Rd >= F_flange_most { F_flange_most } else { F_rows };
        given!(w, "the flange, or the rows where the weld is weaker than the flange"; F_most);
        step!(w, "6.2.3(4)", F_flange_Ed = F_rows.min(F_most));
        let a_min = rulebook.welds.min_throat;
        step!(w, "the throat that this needs, 4.5.2(2)", a_needed = (a * (F_flange_Ed / F_flange_w_Rd)).max(a_min));
        Component {
            id: "flange-weld".into(),
            title: format!("weld at the tension flange{}", n.which.suffix()),
            clause: "EN 1993-1-8:2005 4.5.3.2",
            resistance: F_flange_w_Rd,
            at_full: F_flange_Ed,
            working: w.into(),
        }
    });

    let web = n.a_web.map(|a| {
        let fillet = welds::across(a, f_u, beta_w, gamma_M2);
        let one = |limit: &Limit, first: usize, last: usize, force: Force| {
            let mut w = fillet.working.clone();
            let (F_w_Rd, F_row, b_eff) = (fillet.per_length, force, limit.length);
            given!(w, "rows beside the web"; F_row, b_eff);
            step!(w, "both sides of the web, 4.5.3.2", F_web_w_Rd = 2.0 * F_w_Rd * b_eff);
            let a_min = rulebook.welds.min_throat;
            step!(w, "the throat that this needs, 4.5.2(2)", a_needed = (a * (F_row / F_web_w_Rd)).max(a_min));
            Component {
                id: "web-weld".into(),
                title: format!(
                    "weld at the web{}, {}",
                    n.which.suffix(),
                    super::limits::named(rows[first].row, rows[last].row)
                ),
                clause: "EN 1993-1-8:2005 4.5.3.2",
                resistance: F_web_w_Rd,
                at_full: force,
                working: w.into(),
            }
        };
        let mut components = Vec::new();
        for limit in limits.iter().filter(|limit| is_web_of(n.which, limit) && limit.last < rows.len()) {
            let force: Force = rows[limit.first..=limit.last].iter().map(|row| row.force).sum();
            let beside_flange = Some(limit.first) == first_below;
            if !beside_flange {
                components.push(one(limit, limit.first, limit.last, force));
            } else if limit.first == limit.last && !(F_rows <= F_flange) {
                // What the flange can't bring comes through the web.
                components.push(one(limit, limit.first, limit.last, F_rows - F_flange));
            }
        }
        components
    });
    flange.into_iter().chain(web.into_iter().flatten()).collect()
}

fn is_web_of(which: Which, limit: &Limit) -> bool {
    limit.id == "beam-web-in-tension" && limit.of == Some(which)
}

/// The length of web that a row pulls on: l_eff of the end plate for the row alone, as in 6.2.6.8.
pub fn web_length(n: &PlateSide, limits: &[Limit], row: usize) -> Length {
    let own = |l: &&Limit| is_web_of(n.which, l) && l.first == row && l.last == row;
    limits.iter().find(own).map_or(Length::ZERO, |limit| limit.length)
}

/// What the web's fillets carry across over a length, both sides of the web; `None` where not known.
pub fn over_web(n: &PlateSide, rulebook: &Rulebook, length: Length) -> Option<Force> {
    let (beta_w, f_u) = parts(n)?;
    Some(2.0 * welds::across(n.a_web?, f_u, beta_w, rulebook.annex.gamma_m2).per_length * length)
}

/// The web's fillets against the vertical shear: the length of web below the rows in tension. `None` where not known.
pub fn in_shear(n: &PlateSide, rulebook: &Rulebook, tension_reach: Length) -> Option<Component> {
    let (beta_w, f_u) = parts(n)?;
    let fillet = welds::along(n.a_web?, f_u, beta_w, rulebook.annex.gamma_m2);
    let mut w = fillet.working;
    let (F_w_Rd, h, t_f, r) = (fillet.per_length, n.beam.h, n.beam.t_f, n.r_b_most);
    given!(w, "beam web"; h, t_f, r, tension_reach);
    step!(w, "the web below the rows in tension", l_w = (h - 2.0 * (t_f + r) - tension_reach).max(Length::ZERO));
    let mut V_haunch = Force::ZERO;
    if let Some((haunch, a)) = n.haunch.as_ref().and_then(|haunch| haunch.a_web.map(|a| (haunch, a))) {
        let fillet = welds::along(a, f_u, beta_w, rulebook.annex.gamma_m2);
        w.absorb(fillet.working);
        let (F_wh_Rd, h_h, t_fh) = (fillet.per_length, haunch.depth, haunch.upright());
        given!(w, "the haunch's web"; F_wh_Rd, h_h, t_fh);
        step!(w, "both sides of the haunch's web", V_wh_Rd = 2.0 * F_wh_Rd * (h_h - t_fh));
        V_haunch = V_wh_Rd;
    }
    step!(w, "both sides of the web, 4.5.3.2", V_w_Rd = 2.0 * F_w_Rd * l_w + V_haunch);
    Some(Component {
        id: "web-weld-in-shear".into(),
        title: format!("weld at the web in shear{}", n.which.suffix()),
        clause: "EN 1993-1-8:2005 4.5.3.2",
        resistance: V_w_Rd,
        at_full: Force::ZERO,
        working: w.into(),
    })
}

/// The fillets of the haunch's flange against that part of its force that runs along the end plate; the part square to the
/// plate bears in contact. `None` where a throat or a grade is not known.
pub fn of_haunch(n: &PlateSide, haunch: &HaunchSide, rulebook: &Rulebook) -> Option<Resistance> {
    let (beta_w, f_u) = parts(n)?;
    let fillet = welds::across(haunch.a_flange?, f_u, beta_w, rulebook.annex.gamma_m2);
    let mut w = fillet.working;
    let (F_w_Rd, b_f, t_w, b_p) = (fillet.per_length, haunch.b_f, haunch.t_w, n.b_p);
    given!(w, "haunch flange on the plate"; b_f, t_w, b_p);
    step!(w, "its upper face, 4.5.1", l_w = b_f.min(b_p) - t_w);
    step!(w, "4.5.3.2", F_haunch_w_Rd = F_w_Rd * l_w);
    Some(Resistance { value: F_haunch_w_Rd, working: w })
}
