//! What limits the sum of all rows: the compression side and the web panel in shear.
#![allow(non_snake_case)]

use super::numbers::{Numbers, StiffenerPair};
use super::strengthening;
use crate::eurocode::stiffeners::{self, Web};
use crate::eurocode::web_panel::{self, FrameAction};
use crate::eurocode::{Resistance, beam, column_web};
use crate::rulebook::Rulebook;
use crate::units::{Force, Length};
use crate::working::Working;
use crate::{given, step};

/// A component that limits Σ F over all rows.
#[derive(Clone, Debug)]
pub struct Total {
    /// `column-web-panel-in-shear`.
    pub id: &'static str,
    /// In words.
    pub title: &'static str,
    /// Clause.
    pub clause: &'static str,
    /// Its own resistance.
    pub resistance: Resistance,
    /// The component's action per unit of Σ F: 1, or β for the panel.
    pub share: f64,
}

impl Total {
    /// What Σ F may be; `None` if the component is not loaded (β = 0).
    pub fn allows(&self) -> Option<Force> {
        (self.share != 0.0).then(|| self.resistance.value / self.share)
    }
}

/// The credited full-depth pair level with a flange whose middle is at `level`: within half the flange's thickness.
fn pair_at(n: &Numbers, level: Length) -> Option<&StiffenerPair> {
    let off = |s: &StiffenerPair| (s.height - level).abs();
    let level = n.stiffeners.iter().filter(|s| s.full_depth && off(s) <= 0.5 * n.beam.t_f);
    level.min_by(|a, b| off(a).get().total_cmp(&off(b).get()).then(a.height.get().total_cmp(&b.height.get())))
}

/// How far the column's lower end lies below a level.
fn to_end(n: &Numbers, level: Length) -> Option<Length> {
    Some(level - n.rows.last()?.height + n.column_below?)
}

/// The column's web at the compression flange, without web plates.
pub fn compression_web(n: &Numbers, rulebook: &Rulebook, beta: f64) -> column_web::Compression {
    let column = &n.column;
    column_web::Compression {
        t_fb: n.beam.t_f,
        a_p: n.a_compression.unwrap_or(Length::ZERO),
        t_fc: column.t_f,
        s: n.r_c,
        t_p: n.t_p,
        projection: (-n.plate_bottom).max(Length::ZERO),
        to_end: to_end(n, 0.5 * n.beam.t_f),
        t_wc: column.t_w,
        d_wc: column.h - 2.0 * (column.t_f + n.r_c),
        f_y_wc: n.column_strength.f_y_web,
        A_vc: column.a_v_z,
        beta,
        k_wc: rulebook.settings.k_wc,
    }
}

/// All total limits for tension at the top and one β, beside a shear `V_Ed` in the beam. `web_range`: the column's web in
/// tension and compression.
///
/// # Errors
/// Why the web panel or the beam can't be assessed.
pub fn totals(
    n: &Numbers,
    rulebook: &Rulebook,
    beta: f64,
    V_Ed: Force,
    web_range: (Length, Length),
    notes: &mut Vec<String>,
) -> Result<Vec<Total>, String> {
    let (gamma_M0, gamma_M1, gamma_M2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m1, rulebook.annex.gamma_m2);
    let (column, strength) = (&n.column, n.column_strength);
    let h_clear = column.h - 2.0 * column.t_f;
    let d_wc = h_clear - 2.0 * n.r_c;
    let compression_pair = pair_at(n, 0.5 * n.beam.t_f);
    let tension_pair = pair_at(n, n.beam.h - 0.5 * n.beam.t_f);

    let to_end = |level: Length| to_end(n, level);
    let mut w = Working::default();
    let A_vc = strengthening::shear_area(n, web_range, rulebook, &mut w);
    let added = w;
    let plain_web = column_web::Compression { A_vc, ..compression_web(n, rulebook, beta) };
    let half = 0.5 * column_web::effective_width(&mut Working::default(), &plain_web);
    let level = 0.5 * n.beam.t_f;
    let mut w = added.clone();
    let t_wc = strengthening::in_compression(n, (web_range.0.max(level - half), level + half), rulebook, &mut w);
    let (reinforced, _) = column_web::compression(&column_web::Compression { t_wc, ..plain_web }, gamma_M0, gamma_M1);
    w.absorb(reinforced.working);
    // Web plates and a pair together are not in the standard: the better of the two.
    let reinforced = Resistance { value: reinforced.value, working: w };
    let (_, crushing) = column_web::compression(&plain_web, gamma_M0, gamma_M1);
    let (mut title, mut compression) = ("column web in compression", reinforced);
    if let Some(pair) = compression_pair {
        let plates = pair.plates(n);
        if !plates.rigid(column.t_w, h_clear) {
            notes.push(
                "the compression stiffeners are too slight to hold the web (EN 1993-1-5 9.3.3(3)): not credited".into(),
            );
        } else if plates.stocky() {
            title = "stiffened column web in compression";
            let web = Web {
                F_web: compression.value,
                F_crushing: crushing.value,
                t_wc: column.t_w,
                h_clear,
                f_y_wc: strength.f_y_web,
                runs_on: to_end(pair.height),
            };
            let stiffened = stiffeners::compression(&plates, &web, gamma_M0, gamma_M1, gamma_M2);
            compression.working.absorb(stiffened.working);
            compression.value = stiffened.value;
            notes.push("stiffeners are taken as cut back by the column's root radius at the web".into());
        } else {
            notes.push("the compression stiffeners' outstand is above 14εt: not credited".into());
        }
    }

    let flange = beam::flange_compression(
        &beam::FlangeCompression {
            W_y: n.W_beam,
            h: n.beam.h,
            b_fb: n.beam.b,
            t_fb: n.beam.t_f,
            t_wb: n.beam.t_w,
            A_v: n.beam.a_v_z,
            f_y: n.beam_strength.f_y_flange,
            V_Ed,
        },
        gamma_M0,
    )?;

    let frame = match (compression_pair, tension_pair) {
        (Some(lower), Some(upper)) => Some(FrameAction {
            d_s: upper.height - lower.height,
            b_fc: column.b,
            t_fc: column.t_f,
            f_y_fc: strength.f_y_flange,
            b_st: 2.0 * lower.plates(n).b_s.min(upper.plates(n).b_s) + column.t_w,
            t_st: lower.t_s.min(upper.t_s),
            f_y_st: lower.f_y.min(upper.f_y),
        }),
        _ => None,
    };
    let mut panel = web_panel::shear(A_vc, column.t_w, d_wc, strength.f_y_web, frame, gamma_M0)?;
    let mut w = added;
    w.absorb(panel.working);
    if let Some(diagonals) = strengthening::diagonals(n, rulebook, beta) {
        w.absorb(diagonals.working);
        let (V_wp_Rd, V_d_Rd) = (panel.value, diagonals.value);
        given!(w, "panel and diagonals"; V_wp_Rd, V_d_Rd);
        step!(w, "6.2.6.1(5)", V_wp_with_diagonals = V_wp_Rd + V_d_Rd);
        panel.value = V_wp_with_diagonals;
    }
    panel.working = w;
    if n.strengthened.web_plates.iter().any(|plate| !(plate.bottom <= web_range.0 && plate.top >= web_range.1)) {
        notes.push(format!(
            "a web plate does not reach over all of the web in tension and compression, from {:.0} to {:.0} mm: it adds nothing to the panel (6.2.6.1(10))",
            web_range.0.get(),
            web_range.1.get()
        ));
    }

    Ok(vec![
        Total {
            id: "column-web-panel-in-shear",
            title: "column web panel in shear",
            clause: "EN 1993-1-8:2005 6.2.6.1",
            resistance: panel,
            share: beta,
        },
        Total {
            id: "column-web-in-compression",
            title,
            clause: "EN 1993-1-8:2005 6.2.6.2",
            resistance: compression,
            share: 1.0,
        },
        Total {
            id: "beam-flange-in-compression",
            title: "beam flange and web in compression",
            clause: "EN 1993-1-8:2005 6.2.6.7",
            resistance: flange,
            share: 1.0,
        },
    ])
}
