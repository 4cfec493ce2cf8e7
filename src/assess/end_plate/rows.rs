//! Row forces in equilibrium, 6.2.7.2: from the tension side down, each row as much as it, its groups, the compression
//! side, the panel and the rule of (9) allow, and only then the next.
#![allow(non_snake_case)]

use super::limits::Limit;
use super::numbers::{Numbers, Support};
use super::totals::Total;
use crate::assess::RowForce;
use crate::rulebook::RowForces;
use crate::units::{Force, Length};

/// What limits a row once a row above it has passed the limit of 6.2.7.2(9).
struct Linear {
    force: Force,
    lever_arm: Length,
    row: usize,
}

/// Whether the plate or the flange is thin enough for a plastic distribution whatever the row forces: UK practice,
/// t ≤ (d/1.9) √(f_ub/f_y) of either (UK National Annex to EN 1993-1-8, NA.2.7, from memory).
fn thin_enough(n: &Numbers) -> bool {
    let limit = |f_y: crate::units::Stress| n.bolts.d / 1.9 * (n.bolts.f_ub / f_y).sqrt();
    let behind = match &n.support {
        Support::Column(column) => column.section.t_f <= limit(column.strength.f_y_flange),
        Support::Plate(other) => other.t_p <= limit(other.strength.f_y),
        Support::Twin => false,
    };
    n.side.t_p <= limit(n.side.strength.f_y) || behind
}

/// Works down the rows. `lever_arms` and `numbers` are of the tension rows, from the tension side. No `rule`: in proportion
/// from the first row on, whatever it carries.
pub fn forces(
    n: &Numbers,
    lever_arms: &[Length],
    numbers: &[usize],
    limits: &[Limit],
    totals: &[Total],
    rule: Option<RowForces>,
    notes: &mut Vec<String>,
) -> Vec<RowForce> {
    let plastic = rule == Some(RowForces::ThinPlateOrLinear) && thin_enough(n);
    let mut forces: Vec<RowForce> = Vec::new();
    let mut linear: Option<Linear> = None;
    for (r, (&lever_arm, &number)) in lever_arms.iter().zip(numbers).enumerate() {
        let mut potential: Option<(Force, &str)> = None;
        // A group that reaches further down limits the row too, though it seldom does: what lies below carries at least 0.
        for limit in limits.iter().filter(|limit| (limit.first..=limit.last).contains(&r)) {
            let above: Force = forces[limit.first..r].iter().map(|f| f.force).sum();
            let left = limit.resistance.value - above;
            if potential.is_none_or(|(least, _)| tighter(left, least)) {
                potential = Some((left, &limit.title));
            }
        }
        let Some((potential, governed_by)) = potential else { break };
        let (mut force, mut governed_by) = (potential, governed_by.to_owned());
        let above: Force = forces.iter().map(|f| f.force).sum();
        for total in totals {
            if let Some(allowed) = total.allows()
                && tighter(allowed - above, force)
            {
                (force, governed_by) = (allowed - above, total.title.to_owned());
            }
        }
        if let Some(Linear { force: of_row, lever_arm: its_arm, row }) = &linear {
            let allowed = *of_row * (lever_arm / *its_arm);
            if tighter(allowed, force) {
                (force, governed_by) = (allowed, format!("row forces in proportion to row {row}, 6.2.7.2(9)"));
            }
        }
        force = force.max(Force::ZERO);
        if linear.is_none() && !plastic {
            let triggers = match rule {
                Some(RowForces::LinearBeyond19) => !(force <= 1.9 * n.bolts.F_t_Rd),
                Some(RowForces::ThinPlateOrLinear) | None => true,
            };
            if triggers && r + 1 < lever_arms.len() {
                notes.push(match rule {
                    Some(RowForces::LinearBeyond19) => format!(
                        "row {number} carries {force}, more than 1.9 Ft,Rd = {}: the rows beyond it are limited in proportion to their lever arms (6.2.7.2(9))",
                        1.9 * n.bolts.F_t_Rd
                    ),
                    Some(RowForces::ThinPlateOrLinear) => format!(
                        "neither end plate nor column flange is thin enough for a plastic distribution: the rows beyond row {number} are limited in proportion to their lever arms"
                    ),
                    None => format!(
                        "row {number} might pass 1.9 Ft,Rd = {} if all were known: the rows beyond it are limited in proportion to their lever arms (6.2.7.2(9))",
                        1.9 * n.bolts.F_t_Rd
                    ),
                });
                linear = Some(Linear { force, lever_arm, row: number });
            }
        }
        let potential = potential.max(Force::ZERO);
        forces.push(RowForce { row: number, lever_arm, potential, force, governed_by, bolt_share: 0.0 });
    }
    for r in 0..forces.len() {
        forces[r].bolt_share = bolt_share(r, &forces, limits);
    }
    forces
}

/// Whether a limit counts instead of the one that stood so far; a NaN counts, and nothing counts instead of it.
fn tighter(limit: Force, standing: Force) -> bool {
    !(limit >= standing) && !standing.get().is_nan()
}

/// How far a row's bolts are used, prying included: the most of all its T-stubs, alone and in groups, since a T-stub at its
/// resistance may have every bolt at F_t,Rd.
fn bolt_share(row: usize, forces: &[RowForce], limits: &[Limit]) -> f64 {
    let mut most = 0.0;
    for limit in limits.iter().filter(|l| l.bolts_used && (l.first..=l.last).contains(&row)) {
        let force: Force = forces.iter().take(limit.last + 1).skip(limit.first).map(|f| f.force).sum();
        let share = if force == Force::ZERO { 0.0 } else { force / limit.resistance.value };
        if !(share <= most) {
            most = share;
        }
    }
    most
}
