//! What limits the sum of all rows: the compression side and the web panel in shear.
#![allow(non_snake_case)]

use super::numbers::{ColumnSide, HaunchSide, Numbers, PlateSide, StiffenerPair};
use super::{Beside, strengthening, weld_checks};
use crate::eurocode::stiffeners::{self, Web};
use crate::eurocode::web_panel::{self, FrameAction};
use crate::eurocode::{Resistance, beam, column_web, haunch};
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
    pub title: String,
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

/// All total limits for tension at the top and one β, beside what else acts. `web_range`: the column's web in tension
/// and compression.
///
/// # Errors
/// Why the column's web, its panel or a beam can't be assessed.
pub fn totals(
    n: &Numbers,
    rulebook: &Rulebook,
    beta: f64,
    beside: Beside,
    web_range: Option<(Length, Length)>,
    notes: &mut Vec<String>,
) -> Result<Vec<Total>, String> {
    let mut totals = match n.column() {
        Some(column) => on_column(n, column, rulebook, beta, (beside, web_range.unwrap_or_default()), notes)?,
        None => {
            level(n)?;
            Vec::new()
        }
    };
    for side in n.sides() {
        if let Some(haunch) = &side.haunch {
            totals.extend(of_haunch(side, haunch, beside.V_Ed, rulebook)?);
            continue;
        }
        totals.push(Total {
            id: "beam-flange-in-compression",
            title: format!("beam flange and web in compression{}", side.which.suffix()),
            clause: "EN 1993-1-8:2005 6.2.6.7",
            resistance: flange(side, beside.V_Ed, rulebook.annex.gamma_m0)?,
            share: 1.0,
        });
    }
    Ok(totals)
}

/// The haunch's flange and web at the end plate, and the beam's web where the haunch ends.
fn of_haunch(side: &PlateSide, haunch: &HaunchSide, V_Ed: Force, rulebook: &Rulebook) -> Result<Vec<Total>, String> {
    let (gamma_M0, gamma_M1) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m1);
    let (beam, strength) = (&side.beam, side.beam_strength);
    let V_pl_Rd = side.shear_resistance(gamma_M0);
    if !(V_Ed <= V_pl_Rd) {
        return Err(format!("V = {V_Ed} is more than the beam's own V_pl,Rd = {V_pl_Rd} (EN 1993-1-1 6.2.6)"));
    }
    let at_plate = haunch::Compression {
        h: side.depth(),
        h_h: haunch.depth,
        b_fh: haunch.b_f,
        t_fh: haunch.t_f,
        theta: haunch.angle,
        t_wh: haunch.t_w,
        b_fb: beam.b,
        t_fb: beam.t_f,
        t_wb: beam.t_w,
        f_y: haunch.f_y,
        little_shear: V_Ed <= 0.5 * V_pl_Rd,
    };
    let at_end = haunch::AtEnd {
        t_fh: haunch.t_f,
        theta: haunch.angle,
        t_fb: beam.t_f,
        r: side.r_b,
        t_wb: beam.t_w,
        d_wb: beam.h - 2.0 * (beam.t_f + side.r_b),
        f_y: strength.f_y_web,
        A_v: beam.a_v_z,
    };
    let share = haunch.angle.to_radians().tan();
    let mut totals = vec![
        Total {
            id: "haunch-in-compression",
            title: "haunch flange and web in compression".into(),
            clause: "EN 1993-1-8:2005 6.2.6.7",
            resistance: haunch::compression(&at_plate, gamma_M0)?,
            share: 1.0,
        },
        Total {
            id: "beam-web-at-haunch-end",
            title: "beam web in compression at the haunch's end".into(),
            clause: "EN 1993-1-8:2005 6.2.6.2",
            resistance: haunch::web_at_end(&at_end, gamma_M0, gamma_M1),
            share,
        },
    ];
    totals.extend(weld_checks::of_haunch(side, haunch, rulebook).map(|resistance| Total {
        id: "haunch-weld",
        title: "weld at the haunch's flange".into(),
        clause: "EN 1993-1-8:2005 4.5.3.2",
        resistance,
        share,
    }));
    Ok(totals)
}

/// Whether the compression passes straight from one beam's flange into the other's.
///
/// # Errors
/// By how much it doesn't.
fn level(n: &Numbers) -> Result<(), String> {
    let centres = n.sides().map(PlateSide::compression);
    let (lowest, highest) =
        (centres.clone().fold(n.side.compression(), Length::min), centres.fold(n.side.compression(), Length::max));
    let off = highest - lowest;
    if !(off <= 0.5 * n.least(|side| side.beam.t_f)) {
        return Err(format!(
            "the compression flanges of the two beams lie {off} apart, more than half a flange's thickness: not assessed yet"
        ));
    }
    Ok(())
}

fn flange(side: &PlateSide, V_Ed: Force, gamma_M0: f64) -> Result<Resistance, String> {
    beam::flange_compression(
        &beam::FlangeCompression {
            W_y: side.W_beam,
            h: side.beam.h,
            b_fb: side.beam.b,
            t_fb: side.beam.t_f,
            t_wb: side.beam.t_w,
            A_v: side.beam.a_v_z,
            f_y: side.beam_strength.f_y_flange,
            V_Ed,
        },
        gamma_M0,
    )
}

/// The credited full-depth pair level with a flange whose middle is at `level`: within half the flange's thickness.
fn pair_at(column: &ColumnSide, level: Length, t_fb: Length) -> Option<&StiffenerPair> {
    let off = |s: &StiffenerPair| (s.height - level).abs();
    let level = column.stiffeners.iter().filter(|s| s.full_depth && off(s) <= 0.5 * t_fb);
    level.min_by(|a, b| off(a).get().total_cmp(&off(b).get()).then(a.height.get().total_cmp(&b.height.get())))
}

/// How far the column's lower end lies below a level.
fn to_end(n: &Numbers, column: &ColumnSide, level: Length) -> Option<Length> {
    Some(level - n.rows.last()?.height + column.below?)
}

/// The column's web at the compression flange, as if without stiffeners and web plates.
pub fn web_in_compression(n: &Numbers, own: &ColumnSide, beta: f64, k_wc: f64) -> column_web::Compression {
    let (column, side) = (&own.section, &n.side);
    let a_p = match &side.haunch {
        Some(haunch) => haunch.a_flange,
        None => side.a_compression,
    };
    column_web::Compression {
        t_fb: side.compression_flange(),
        a_p: a_p.unwrap_or(Length::ZERO),
        t_fc: column.t_f,
        s: own.r,
        t_p: side.t_p,
        projection: (side.lowest() - side.bottom).max(Length::ZERO),
        to_end: to_end(n, own, side.compression()),
        t_wc: column.t_w,
        d_wc: column.h - 2.0 * (column.t_f + own.r),
        f_y_wc: own.strength.f_y_web,
        A_vc: column.a_v_z,
        beta,
        k_wc,
    }
}

/// The pair that stiffens the column's web at the compression flange.
pub fn stiffens(n: &Numbers, own: &ColumnSide) -> bool {
    let pair = pair_at(own, n.side.compression(), n.side.compression_flange());
    pair.is_some_and(|pair| {
        let plates = pair.plates(own);
        plates.rigid(own.section.t_w, own.section.h - 2.0 * own.section.t_f) && plates.stocky()
    })
}

/// The column's web in compression and its panel in shear.
fn on_column(
    n: &Numbers,
    own: &ColumnSide,
    rulebook: &Rulebook,
    beta: f64,
    (beside, web_range): (Beside, (Length, Length)),
    notes: &mut Vec<String>,
) -> Result<Vec<Total>, String> {
    let (gamma_M0, gamma_M1, gamma_M2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m1, rulebook.annex.gamma_m2);
    let (column, strength, side) = (&own.section, own.strength, &n.side);
    let t_fb = side.compression_flange();
    let h_clear = column.h - 2.0 * column.t_f;
    let d_wc = h_clear - 2.0 * own.r;
    let compression_pair = pair_at(own, side.compression(), t_fb);
    let tension_pair = pair_at(own, side.flange_top() - 0.5 * side.beam.t_f, side.beam.t_f);

    let mut w = Working::default();
    let k_wc = beside.column.map_or(rulebook.settings.k_wc, |actions| {
        column_web::k_wc(&mut w, actions, (column.area, column.i_y()), d_wc, strength.f_y_web)
    });
    // Beyond 1.7 − 1 the column yields by its own forces, which is no longer a matter of the joint.
    if beside.column.is_some() && !(k_wc >= 0.7) {
        return Err("N and M stated for the column stress its web above f_y (6.2.6.2(2))".into());
    }
    let mut added = Working::default();
    let A_vc = strengthening::shear_area(own, web_range, rulebook, &mut added);
    w.absorb(added.clone());
    let plain_web = column_web::Compression { A_vc, ..web_in_compression(n, own, beta, k_wc) };
    let half = 0.5 * column_web::b_eff(&mut Working::default(), &plain_web);
    let level = side.compression();
    let t_wc = strengthening::in_compression(own, (web_range.0.max(level - half), level + half), rulebook, &mut w);
    let (reinforced, _) = column_web::compression(&column_web::Compression { t_wc, ..plain_web }, gamma_M0, gamma_M1);
    w.absorb(reinforced.working);
    // Web plates and a pair together are not in the standard: the better of the two.
    let reinforced = Resistance { value: reinforced.value, working: w };
    let (_, crushing) = column_web::compression(&plain_web, gamma_M0, gamma_M1);
    let (mut title, mut compression) = ("column web in compression", reinforced);
    if let Some(pair) = compression_pair {
        let plates = pair.plates(own);
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
                runs_on: to_end(n, own, pair.height),
            };
            let stiffened = stiffeners::compression(&plates, &web, gamma_M0, gamma_M1, gamma_M2);
            compression.working.absorb(stiffened.working);
            compression.value = stiffened.value;
            notes.push("stiffeners are taken as cut back by the column's root radius at the web".into());
        } else {
            notes.push("the compression stiffeners' outstand is above 14εt: not credited".into());
        }
    }

    let frame = match (compression_pair, tension_pair) {
        (Some(lower), Some(upper)) => Some(FrameAction {
            d_s: upper.height - lower.height,
            b_fc: column.b,
            t_fc: column.t_f,
            f_y_fc: strength.f_y_flange,
            b_st: 2.0 * lower.plates(own).b_s.min(upper.plates(own).b_s) + column.t_w,
            t_st: lower.t_s.min(upper.t_s),
            f_y_st: lower.f_y.min(upper.f_y),
        }),
        _ => None,
    };
    let mut panel = web_panel::shear(A_vc, column.t_w, d_wc, strength.f_y_web, frame, gamma_M0)?;
    let mut w = added;
    w.absorb(panel.working);
    if let Some(diagonals) = strengthening::diagonals(n, own, rulebook, beta) {
        w.absorb(diagonals.working);
        let (V_wp_Rd, V_d_Rd) = (panel.value, diagonals.value);
        given!(w, "panel and diagonals"; V_wp_Rd, V_d_Rd);
        step!(w, "6.2.6.1(5)", V_wp_with_diagonals = V_wp_Rd + V_d_Rd);
        panel.value = V_wp_with_diagonals;
    }
    panel.working = w;
    let (lo, hi) = web_range;
    if own.strengthened.web_plates.iter().any(|plate| !(plate.bottom <= lo && plate.top >= hi)) {
        notes.push(format!(
            "a web plate does not reach over all of the web in tension and compression, from {:.0} to {:.0} mm: it adds nothing to the panel (6.2.6.1(10))",
            lo.get(),
            hi.get()
        ));
    }

    Ok(vec![
        Total {
            id: "column-web-panel-in-shear",
            title: "column web panel in shear".into(),
            clause: "EN 1993-1-8:2005 6.2.6.1",
            resistance: panel,
            share: beta,
        },
        Total {
            id: "column-web-in-compression",
            title: title.into(),
            clause: "EN 1993-1-8:2005 6.2.6.2",
            resistance: compression,
            share: 1.0,
        },
    ])
}
