//! V_Rd: bolts in shear beside their tension, bearing in plate and column flange, the web's weld.
#![allow(non_snake_case)]

use super::numbers::{Numbers, PlateSide, Row, Slip, Support};
use super::weld_checks;
use crate::assess::{Component, MomentResistance, ShearResistance};
use crate::eurocode::bolts::{self, BearingPlace};
use crate::eurocode::slip;
use crate::rulebook::Rulebook;
use crate::units::{Force, Length, Stress, mm};
use crate::working::Working;
use crate::{given, step};

/// M12 and M14 in holes with 2 mm clearance carry 0.85 of their shear, 3.6.1(5).
fn beta_hole(n: &Numbers) -> f64 {
    if n.bolts.d <= mm(14.0) && !(n.bolts.d_0 - n.bolts.d < mm(2.0)) { 0.85 } else { 1.0 }
}

/// The tension that acts in the bolts together with the shear.
#[derive(Clone, Copy)]
pub enum Tension<'a> {
    /// Nobody can say: every bolt may be fully used; the web is taken by rows in tension over this length.
    Unknown {
        /// See [`MomentResistance::web_in_tension`].
        web_in_tension: Length,
    },
    /// None at all: no shear resistance can be above this one.
    None,
    /// This share (0 to 1) of what the moment resistance puts into its rows.
    Rows(&'a MomentResistance, f64),
}

/// V_Rd beside a tension. The bolts' own minimum is added up row by
/// row (each bolt the smaller of its shear and bearing resistance); the shear may act up or down, the worse counts.
pub fn resistance(n: &Numbers, tension: Tension<'_>, rulebook: &Rulebook) -> ShearResistance {
    let gamma_M2 = rulebook.annex.gamma_m2;
    let thread = n.bolts.thread_in_plane.unwrap_or(rulebook.settings.thread_in_shear_plane);
    let (alpha_v, area) = if thread { (n.bolts.alpha_v, n.bolts.A_s) } else { (rulebook.alpha_v_shank, n.bolts.A) };
    let shear = bolts::shear(alpha_v, n.bolts.f_ub, area, beta_hole(n), gamma_M2);
    let (beta_p, packing) = slip::packing(n.bolts.d, n.bolts.packing);

    let mut in_shear = Force::ZERO;
    let mut w = Working::default();
    w.absorb(shear.working);
    let mut F_v_Rd = shear.value;
    if n.bolts.packing > Length::ZERO {
        w.absorb(packing);
        step!(w, "3.6.1(12)", F_v_Rd_p = beta_p * F_v_Rd);
        F_v_Rd = F_v_Rd_p;
    }
    let mut per_row = Vec::new();
    let mut tensions = Vec::new();
    for row in &n.rows {
        let used = match tension {
            Tension::Unknown { .. } => 1.0,
            Tension::None => 0.0,
            Tension::Rows(moment, share) => {
                let row = moment.rows.iter().find(|f| f.row == row.number).filter(|f| f.force > Force::ZERO);
                match row {
                    None => 0.0,
                    Some(_) if rulebook.settings.shear_with_full_tension => 1.0,
                    // A share that is no number counts as all.
                    Some(row) => (row.bolt_share * share).min(1.0),
                }
            }
        };
        w.heading(format!("row {}", row.number));
        let left = bolts::shear_beside_tension(F_v_Rd, used * n.bolts.F_t_Rd, n.bolts.F_t_Rd);
        w.absorb(left.working);
        in_shear += 2.0 * left.value;
        per_row.push(left.value);
        tensions.push((row.number, used * n.bolts.F_t_Rd));
    }
    let V_bolts = in_shear;
    given!(w, "all bolts in shear"; V_bolts);

    let mut components = vec![Component {
        id: "bolts-in-shear".into(),
        title: "bolts in shear with their tension".into(),
        clause: "EN 1993-1-8:2005 3.6.1",
        resistance: V_bolts,
        at_full: Force::ZERO,
        working: w.into(),
    }];
    let mut least = (V_bolts, "bolts in shear with their tension".to_owned());
    for ply in Ply::of(n) {
        let (id, title) = ply.named();
        let (up, down) = (bearing(n, ply, true, &per_row, gamma_M2), bearing(n, ply, false, &per_row, gamma_M2));
        let worst = if up.1 <= down.1 { up } else { down };
        if !(worst.1 >= least.0) {
            least = (worst.1, format!("bolts in shear and {title}"));
        }
        components.push(Component {
            id: id.into(),
            title,
            clause: "EN 1993-1-8:2005 3.6.1",
            resistance: worst.0,
            at_full: Force::ZERO,
            working: worst.2.into(),
        });
    }
    if let Some(slip) = in_slip(n, &tensions, rulebook) {
        if !(slip.resistance >= least.0) {
            least = (slip.resistance, slip.title.clone());
        }
        components.push(slip);
    }
    let reach = match tension {
        Tension::Unknown { web_in_tension } => web_in_tension,
        Tension::None => Length::ZERO,
        Tension::Rows(moment, _) => moment.web_in_tension,
    };
    for weld in n.sides().filter_map(|side| weld_checks::in_shear(side, rulebook, reach)) {
        if !(weld.resistance >= least.0) {
            least = (weld.resistance, weld.title.clone());
        }
        components.push(weld);
    }
    ShearResistance { shear: least.0, governed_by: least.1, components }
}

/// Slip of the group beside its bolts' tension, 3.9.2; `None` unless the bolts are of category C and all is known. The one
/// friction surface counts once, also where packing makes it several in a row.
fn in_slip(n: &Numbers, tensions: &[(usize, Force)], rulebook: &Rulebook) -> Option<Component> {
    let Slip { mu, gamma_M3 } = n.bolts.slip?;
    let preload = slip::preload(n.bolts.f_ub, n.bolts.A_s);
    let mut w = preload.working;
    let mut group = Force::ZERO;
    for (number, tension) in tensions {
        w.heading(format!("row {number}"));
        let F_t_Ed = if rulebook.slip.reduced_by_tension { *tension } else { Force::ZERO };
        // Normal round holes only: k_s = 1.0, Table 3.6.
        let one = slip::slip(1.0, 1.0, mu, preload.value, F_t_Ed, gamma_M3);
        w.absorb(one.working);
        group += 2.0 * one.value;
    }
    let V_slip = group;
    step!(w, "sum over the bolts", V_s_Rd = V_slip);
    Some(Component {
        id: "bolts-in-slip".into(),
        title: "bolts in slip with their tension".into(),
        clause: "EN 1993-1-8:2005 3.9",
        resistance: V_s_Rd,
        at_full: Force::ZERO,
        working: w.into(),
    })
}

/// What the bolts bear on.
#[derive(Clone, Copy)]
struct Ply<'a> {
    /// The end plate, or the column's flange.
    plate: Option<&'a PlateSide>,
    /// Its upper and lower edge; `None` where it runs on.
    ends: [Option<Length>; 2],
    t: Length,
    f_u: Stress,
}

impl<'a> Ply<'a> {
    fn of(n: &'a Numbers) -> Vec<Self> {
        let plate = |side: &'a PlateSide| Self {
            plate: Some(side),
            ends: [Some(side.top), Some(side.bottom)],
            t: side.t_p,
            f_u: side.strength.f_u,
        };
        let behind = match &n.support {
            Support::Twin => None,
            Support::Plate(other) => Some(plate(other)),
            Support::Column(column) => Some(Self {
                plate: None,
                ends: [
                    n.rows.first().zip(column.above).map(|(row, above)| row.height + above),
                    n.rows.last().zip(column.below).map(|(row, below)| row.height - below),
                ],
                t: column.section.t_f,
                f_u: column.strength.f_u,
            }),
        };
        [plate(&n.side)].into_iter().chain(behind).collect()
    }

    fn named(self) -> (&'static str, String) {
        match self.plate {
            Some(side) => ("end-plate-in-bearing", format!("end plate in bearing{}", side.which.suffix())),
            None => ("column-flange-in-bearing", "column flange in bearing".into()),
        }
    }

    fn e_2(self, row: &Row) -> Length {
        self.plate.map_or(row.e_support, |side| row.edge(side))
    }
}

/// Bearing of all bolts in one ply alone, and the sum of each bolt's smaller of bearing and `shear_left`.
///
/// `up`: the bolts push the ply upwards.
fn bearing(n: &Numbers, ply: Ply<'_>, up: bool, shear_left: &[Force], gamma_M2: f64) -> (Force, Force, Working) {
    let mut w = Working::default();
    let (mut all, mut with_shear) = (Force::ZERO, Force::ZERO);
    let count = n.rows.len();
    for (i, row) in n.rows.iter().enumerate() {
        let ahead = if up { i.checked_sub(1) } else { Some(i + 1).filter(|&j| j < count) };
        let p_1 = ahead.map(|j| (n.rows[j].height - row.height).abs());
        let [top, bottom] = ply.ends;
        let e_1 = match (ahead, up) {
            (Some(_), _) => None,
            (None, true) => top.map(|top| top - row.height),
            (None, false) => bottom.map(|bottom| row.height - bottom),
        };
        let e_2 = ply.e_2(row);
        w.heading(format!("row {}, bolts pushing {}", row.number, if up { "up" } else { "down" }));
        let place = BearingPlace { e_1, p_1, e_2, p_2: Some(row.gauge) };
        let bearing = bolts::bearing(place, n.bolts.d, n.bolts.d_0, ply.t, ply.f_u, n.bolts.f_ub, gamma_M2);
        w.absorb(bearing.working);
        all += 2.0 * bearing.value;
        with_shear += 2.0 * bearing.value.min(shear_left[i]);
    }
    let V_b_Rd = all;
    given!(w, "two bolts a row, summed over the rows"; V_b_Rd);
    (V_b_Rd, with_shear, w)
}
