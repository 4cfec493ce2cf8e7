//! M_j,Rd of one sense and one β: limits, row forces, lever arms, welds.

use super::limits::{TensionSide, lever_arm};
use super::numbers::Numbers;
use super::{rows, totals, weld_checks};
use crate::assess::{Component, MomentResistance, Sense};
use crate::rulebook::{RowForces, Rulebook};
use crate::units::{Force, Length, Moment};

/// M_j,Rd with `n` turned so that the tension side is up, beside a shear `V_Ed` (0 where none is stated), the row forces by
/// `rule` (see [`rows::forces`]).
///
/// # Errors
/// Why it can't be assessed: one sentence.
#[allow(non_snake_case, reason = "the standard's symbol")]
pub fn resistance(
    n: &Numbers,
    sense: Sense,
    beta: f64,
    V_Ed: Force,
    rule: Option<RowForces>,
    rulebook: &Rulebook,
) -> Result<MomentResistance, String> {
    let mut notes = Vec::new();
    let side = TensionSide::new(n, rulebook, beta)?;
    let limits = side.limits();
    let totals = totals::totals(n, rulebook, beta, V_Ed, side.web_range(), &mut notes)?;
    let arms: Vec<Length> = side.rows.iter().map(|row| lever_arm(n, row)).collect();
    let heights: Vec<Length> = side.rows.iter().map(|row| row.height).collect();
    let numbers: Vec<usize> = side.rows.iter().map(|row| row.number).collect();
    let forces = rows::forces(n, &arms, &numbers, &limits, &totals, rule, &mut notes);
    let without_welds: Moment = forces.iter().map(|row| row.force * row.lever_arm).sum();
    let total: Force = forces.iter().map(|row| row.force).sum();

    let mut components: Vec<Component> = limits
        .iter()
        .map(|limit| Component {
            id: limit.id.into(),
            title: limit.title.clone(),
            clause: limit.clause,
            resistance: limit.resistance.value,
            at_full: forces.get(limit.first..=limit.last).map_or(Force::ZERO, |f| f.iter().map(|row| row.force).sum()),
            working: limit.resistance.working.clone().into(),
        })
        .chain(totals.iter().map(|limit| Component {
            id: limit.id.into(),
            title: limit.title.into(),
            clause: limit.clause,
            resistance: limit.resistance.value,
            at_full: total * limit.share,
            working: limit.resistance.working.clone().into(),
        }))
        .collect();

    let bolts_used = forces.iter().map(|row| row.bolt_share).fold(0.0, f64::max);
    for (id, title, resistance, working) in [
        ("bolts-in-tension", "most used bolt in tension, prying included", n.F_t_Rd, &n.tension_working),
        (
            "punching",
            "end plate and column flange under head or nut",
            n.B_p_plate.min(n.B_p_column),
            &n.punching_working,
        ),
    ] {
        components.push(Component {
            id: id.into(),
            title: title.into(),
            clause: "EN 1993-1-8:2005 3.6.1",
            resistance,
            at_full: bolts_used * n.F_t_Rd.min(n.B_p_plate).min(n.B_p_column),
            working: working.clone(),
        });
    }

    // The row that gives most of the moment, or what cut a row short, is what strengthening would have to start with.
    let cut = forces.iter().find(|row| !(row.force >= row.potential));
    let largest = forces.iter().max_by(|a, b| (a.force * a.lever_arm).get().total_cmp(&(b.force * b.lever_arm).get()));
    let mut governed_by = match (cut, largest) {
        (Some(row), _) | (None, Some(row)) => row.governed_by.clone(),
        (None, None) => "no bolt row on the tension side".into(),
    };

    let (flange, web) = weld_checks::at_flange_and_web(n, rulebook, &forces, &heights, &limits);
    let mut share = 1.0_f64;
    for weld in flange.into_iter().chain(web.into_iter().flatten()) {
        let own = weld.resistance / weld.at_full;
        if weld.at_full > Force::ZERO && !(own >= share) {
            share = own;
            governed_by = weld.title.clone();
        }
        components.push(weld);
    }
    if n.beam_class == 3 {
        notes.push("the beam is of class 3: its flange in compression is taken with W_el".into());
    }
    let last_used = forces.iter().rposition(|row| row.force > Force::ZERO);
    let web_in_tension = last_used.map_or(Length::ZERO, |i| {
        (n.beam.h - n.beam.t_f - n.r_b - heights[i]).max(Length::ZERO) + 0.5 * weld_checks::web_length(&limits, i)
    });
    Ok(MomentResistance {
        sense,
        beta,
        moment: without_welds * share,
        without_welds,
        governed_by,
        web_in_tension,
        rows: forces,
        components,
        notes,
    })
}
