//! M_j,Rd of one sense and one β: limits, row forces, lever arms, welds.

use std::sync::Arc;

use super::limits::TensionSide;
use super::numbers::{Numbers, PlateSide, Support};
use super::{Beside, rows, totals, turning, weld_checks};
use crate::assess::{Component, MomentResistance, Sense};
use crate::rulebook::{RowForces, Rulebook};
use crate::units::{Force, Length, Moment};

/// M_j,Rd with `n` turned so that the tension side is up, `beside` what else acts, the row forces by `rule` (see [`rows::forces`]).
///
/// # Errors
/// Why it can't be assessed: one sentence.
pub fn resistance(
    n: &Numbers,
    sense: Sense,
    beta: f64,
    beside: Beside,
    rule: Option<RowForces>,
    rulebook: &Rulebook,
) -> Result<MomentResistance, String> {
    let mut notes = Vec::new();
    let side = TensionSide::new(n, rulebook, beta)?;
    let limits = side.limits();
    let web_range = n.column().map(|column| side.web_range(column));
    let totals = totals::totals(n, rulebook, beta, beside, web_range, &mut notes)?;
    let arms: Vec<Length> = side.rows.iter().map(|row| n.lever_arm(row)).collect();
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
            title: limit.title.clone(),
            clause: limit.clause,
            resistance: limit.resistance.value,
            at_full: total * limit.share,
            working: limit.resistance.working.clone().into(),
        }))
        .collect();

    let plies = match n.support {
        Support::Column(_) => "end plate and column flange under head or nut",
        Support::Plate(_) | Support::Twin => "end plates under head or nut",
    };
    let bolts_used = forces.iter().map(|row| row.bolt_share).fold(0.0, f64::max);
    for (id, title, resistance, working) in [
        ("bolts-in-tension", "most used bolt in tension, prying included", n.bolts.F_t_Rd, &n.bolts.tension_working.0),
        ("punching", plies, n.punching(), &n.punching_working.0),
    ] {
        components.push(Component {
            id: id.into(),
            title: title.into(),
            clause: "EN 1993-1-8:2005 3.6.1",
            resistance,
            at_full: bolts_used * n.bolts.F_t_Rd.min(n.punching()),
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

    let mut share = 1.0_f64;
    for side in n.sides() {
        for weld in weld_checks::at_flange_and_web(side, rulebook, &forces, &heights, &limits) {
            let own = weld.resistance / weld.at_full;
            if weld.at_full > Force::ZERO && !(own >= share) {
                share = own;
                governed_by = weld.title.clone();
            }
            components.push(weld);
        }
        if side.beam_class == 3 {
            let of = side.which.owner();
            notes.push(format!("the {of}beam is of class 3: its flange in compression is taken with W_el"));
        }
    }
    let moment = without_welds * share;
    let stiffness = turning::stiffness(n, &side, beta, rulebook, moment, &governed_by, &components).map(Arc::new);
    let last_used = forces.iter().rposition(|row| row.force > Force::ZERO);
    let reach = |side: &PlateSide, i: usize| {
        let below = side.flange_top() - side.beam.t_f - side.r_b - heights[i];
        below.max(Length::ZERO) + 0.5 * weld_checks::web_length(side, &limits, i)
    };
    let web_in_tension =
        last_used.map_or(Length::ZERO, |i| n.sides().map(|side| reach(side, i)).fold(Length::ZERO, Length::max));
    Ok(MomentResistance {
        sense,
        beta,
        moment,
        without_welds,
        governed_by,
        web_in_tension,
        rows: forces,
        components,
        stiffness,
        notes,
    })
}
