//! Rotational stiffness of one sense and one β, and what else classifies the joint: 6.3, 5.2.3, 6.4.2.
#![allow(non_snake_case)]

use super::limits::TensionSide;
use super::numbers::Numbers;
use super::totals;
use crate::assess::{Component, JointStiffness, Spring};
use crate::eurocode::{classification, column_web, stiffness};
use crate::rulebook::Rulebook;
use crate::units::{Length, Moment};
use crate::working::Working;

/// The stiffness; `None` where no row is in tension. `moment`, `governed_by` and `components` are those of the resistance.
pub fn stiffness(
    n: &Numbers,
    side: &TensionSide<'_>,
    beta: f64,
    rulebook: &Rulebook,
    moment: Moment,
    governed_by: &str,
    components: &[Component],
) -> Option<JointStiffness> {
    if side.rows.is_empty() {
        return None;
    }
    let mut w = Working::default();
    let rows = side.springs(&mut w);
    w.heading("the joint");
    let (k_eq, z) = stiffness::equivalent(&mut w, &rows);
    let mut springs = Vec::new();
    if let Some(column) = n.column() {
        let section = &column.section;
        // Table 6.11: a panel with diagonals does not give way.
        let k_1 = match column.strengthened.diagonals.as_slice() {
            [] => stiffness::web_panel(&mut w, section.a_v_z, beta, z),
            _ => None,
        };
        let k_2 = (!totals::stiffens(n, column)).then(|| {
            let web = totals::web_in_compression(n, column, beta, 1.0);
            let b_eff = column_web::b_eff(&mut w, &web);
            stiffness::web_in_compression(&mut w, b_eff, section.t_w, web.d_wc)
        });
        springs.push(Spring { title: "column web panel in shear, k1".into(), k: k_1 });
        springs.push(Spring { title: "column web in compression, k2".into(), k: k_2 });
    }
    springs.push(Spring { title: "rows in tension, keq".into(), k: Some(k_eq) });
    let finite: Vec<Length> = springs.iter().filter_map(|spring| spring.k).collect();
    let initial = stiffness::initial(&mut w, z, &finite);
    let gamma_M0 = rulebook.annex.gamma_m0;
    let M_b_pl_Rd = n.least(|side| side.beam.w_pl_y * side.beam_strength.f_y_flange / gamma_M0);
    let full_strength = match n.column() {
        Some(column) => {
            let M_c_pl_Rd = column.section.w_pl_y * column.strength.f_y_flange / gamma_M0;
            // A column that ends within a beam's depth is one at its top.
            let runs_on = [column.above, column.below].into_iter().flatten().all(|end| end > n.side.depth());
            classification::full_strength(&mut w, M_b_pl_Rd, M_c_pl_Rd, runs_on)
        }
        None => M_b_pl_Rd,
    };
    let rotation = rotation(n, moment, M_b_pl_Rd, governed_by, components, &mut w);
    Some(JointStiffness {
        initial,
        lever_arm: z,
        springs,
        to_column: n.column().is_some(),
        I_b: n.side.beam.i_y(),
        full_strength,
        rotation,
        working: w.into(),
    })
}

/// What 6.4 lets assume for plastic analysis, one sentence.
fn rotation(
    n: &Numbers,
    moment: Moment,
    M_b_pl_Rd: Moment,
    governed_by: &str,
    components: &[Component],
    w: &mut Working,
) -> String {
    if moment >= M_b_pl_Rd * 1.2 {
        return "no rotation capacity needed: Mj,Rd is at least 1.2 times the beam's plastic moment (6.4.1)".into();
    }
    let governing = components.iter().find(|component| component.title == governed_by);
    let (t, f_y) = match governing.map(|component| component.id.as_str()) {
        // The panel is refused above 69ε, so what governs is within it.
        Some("column-web-panel-in-shear") => {
            return "enough for plastic analysis: the web panel in shear governs, d/tw within 69ε (6.4.2(1))".into();
        }
        Some("end-plate-in-bending") => {
            // The plate of a splice that its title tells.
            let side = n.sides().find(|side| governed_by.contains(side.which.suffix())).unwrap_or(&n.side);
            (side.t_p, side.strength.f_y)
        }
        Some("column-flange-in-bending") => match n.column() {
            Some(column) => (column.section.t_f, column.strength.f_y_flange),
            None => return not_shown(governed_by),
        },
        _ => return not_shown(governed_by),
    };
    let most = classification::ductile_thickness(w, n.bolts.d, n.bolts.f_ub, f_y);
    if t <= most {
        format!(
            "enough for plastic analysis: {governed_by} governs, {t} is at most 0.36 d √(fub/fy) = {most} (6.4.2(2))"
        )
    } else {
        format!("not shown: {governed_by} governs, {t} is more than 0.36 d √(fub/fy) = {most} (6.4.2(2))")
    }
}

fn not_shown(governed_by: &str) -> String {
    format!("not shown: {governed_by} governs, for which 6.4.2 has no rule")
}
