//! N_j,Rd, the axial resistance of the joint without moment, for the interaction of 6.2.7.1(3).
#![allow(non_snake_case)]

use super::limits::{Limit, TensionSide};
use super::numbers::{Numbers, Row};
use super::{rows, totals, weld_checks};
use crate::assess::{AxialResistance, Component, MomentResistance, RowForce};
use crate::eurocode::column_web;
use crate::rulebook::{RowForces, Rulebook};
use crate::units::{Force, Length, Moment};
use crate::working::Working;
use crate::{given, step};

const CLAUSE: &str = "EN 1993-1-8:2005 6.2.7.1";

/// In compression: what both flanges can press through, each by the least of its components. `senses`: the moment
/// resistance that presses through the lower flange, and the one that presses through the upper one.
pub fn compression(n: &Numbers, turned: &Numbers, senses: [&MomentResistance; 2]) -> AxialResistance {
    let mut w = Working::default();
    let mut least: Option<(Force, String)> = None;
    let mut flange = |name: &str, moment: &MomentResistance, n: &Numbers, w: &mut Working| {
        w.heading(name);
        const WEB: &str = "column-web-in-compression";
        let mut force: Option<(Force, &str)> = None;
        let pressed = |component: &&Component| [WEB, "beam-flange-in-compression"].contains(&component.id.as_str());
        for component in moment.components.iter().filter(pressed) {
            let mut resistance = component.resistance;
            if let Some(column) = n.column().filter(|_| component.id == WEB) {
                // Both flanges press: beyond half their distance the web is the other one's.
                let web = totals::web_in_compression(n, column, moment.beta, 1.0);
                let b_eff = column_web::b_eff(&mut Working::default(), &web);
                let apart = n.side.beam.h - n.side.beam.t_f;
                given!(w, "column web, both flanges pressing on it"; resistance, b_eff, apart);
                step!(w, "shared web, our own bound", shared = ((apart + b_eff) / (2.0 * b_eff)).min(1.0));
                resistance = resistance * shared;
            }
            if force.is_none_or(|(standing, _)| !(resistance >= standing)) {
                force = Some((resistance, &component.title));
            }
        }
        let (F_c_Rd, title) = force.unwrap_or((Force::ZERO, "compression"));
        given!(w, "the least of its components"; F_c_Rd);
        if least.as_ref().is_none_or(|(standing, _)| !(F_c_Rd >= *standing)) {
            least = Some((F_c_Rd, format!("{title}, {name}")));
        }
        F_c_Rd
    };
    let F_c_lower_Rd = flange("lower flange", senses[0], n, &mut w);
    let F_c_upper_Rd = flange("upper flange", senses[1], turned, &mut w);
    // The force stands in the beam's axis: the weaker flange has half of it.
    step!(w, "6.2.7.1(3)", N_j_Rd = 2.0 * F_c_lower_Rd.min(F_c_upper_Rd));
    let governed_by = least.map_or_else(String::new, |(_, title)| title);
    AxialResistance { force: N_j_Rd, governed_by, working: w.into() }
}

/// One half of the rows with its forces.
struct Half {
    rows: Vec<Row>,
    forces: Vec<RowForce>,
    /// Σ F (h − axis), from the beam's axis outwards.
    moment: Moment,
    governed_by: String,
}

/// The rows above the axis of a joint that stands with this half up, by their limits and welds.
fn half(n: &Numbers, rulebook: &Rulebook, beta: f64, rule: Option<RowForces>) -> Result<Half, String> {
    let side = TensionSide::of(n, rulebook, beta, |row| row.height > axis(n))?;
    let limits = side.limits();
    let arms: Vec<Length> = side.rows.iter().map(|row| n.lever_arm(row)).collect();
    let heights: Vec<Length> = side.rows.iter().map(|row| row.height).collect();
    let numbers: Vec<usize> = side.rows.iter().map(|row| row.number).collect();
    let mut forces = rows::forces(n, &arms, &numbers, &limits, &[], rule, &mut Vec::new());
    let largest = forces.iter().max_by(|a, b| a.force.get().total_cmp(&b.force.get()));
    let mut governed_by = largest.map_or_else(|| "no bolt row".into(), |row| row.governed_by.clone());
    let welds: Vec<Component> = n
        .sides()
        .flat_map(|side| weld_checks::at_flange_and_web(side, rulebook, &forces, &heights, &limits))
        .filter(|weld| weld.at_full > Force::ZERO)
        .collect();
    let mut share = 1.0;
    for weld in &welds {
        let own = weld.resistance / weld.at_full;
        if !(own >= share) {
            (share, governed_by) = (own, weld.title.clone());
        }
    }
    for row in &mut forces {
        row.force = row.force * share;
    }
    let moment = forces.iter().zip(&heights).map(|(row, h)| row.force * (*h - axis(n))).sum();
    Ok(Half { rows: side.rows, forces, moment, governed_by })
}

/// The height of the beam's axis.
fn axis(n: &Numbers) -> Length {
    n.side.soffit + 0.5 * n.side.beam.h
}

/// In tension: the rows of both halves by their T-stubs, groups and welds, the stronger half cut back until the forces
/// balance about the beam's axis, and all of them by the groups that reach across it. A lower bound: rows in the middle
/// are left out, and rows next to the lower flange count in groups across the axis as if it were not there.
///
/// # Errors
/// Why there is none: one sentence.
pub fn tension(
    n: &Numbers,
    turned: &Numbers,
    beta: f64,
    rule: Option<RowForces>,
    rulebook: &Rulebook,
) -> Result<AxialResistance, String> {
    let (upper, lower) = (half(n, rulebook, beta, rule)?, half(turned, rulebook, beta, rule)?);
    let balanced = upper.moment.min(lower.moment);
    if !(balanced > Moment::ZERO) {
        return Err("tension without moment needs bolt rows on both sides of the beam's axis".into());
    }
    let mut w = Working::default();
    let total = |half: &Half| half.forces.iter().map(|row| row.force).sum::<Force>();
    let (F_upper, M_upper, F_lower, M_lower) = (total(&upper), upper.moment, total(&lower), lower.moment);
    given!(w, "rows above and below the beam's axis, and their moments about it"; F_upper, M_upper, F_lower, M_lower);
    step!(
        w,
        "balanced about the beam's axis",
        F_balanced = F_upper * (balanced / M_upper) + F_lower * (balanced / M_lower)
    );
    let mut governed_by =
        if upper.moment < lower.moment { upper.governed_by.clone() } else { lower.governed_by.clone() };

    let mut forces: Vec<Force> = upper.forces.iter().map(|row| row.force * (balanced / upper.moment)).collect();
    forces.extend(lower.forces.iter().rev().map(|row| row.force * (balanced / lower.moment)));
    let all = TensionSide::of(n, rulebook, beta, |row| {
        upper.rows.iter().chain(&lower.rows).any(|own| own.number == row.number)
    })?;
    if all.rows.len() != forces.len() {
        return Err("the rows above and below the beam's axis are not those that carry".into());
    }
    let split = upper.rows.len();
    let mut share = 1.0;
    let mut across = |title: &str, first: usize, last: usize, most: Force| {
        let force: Force = forces.iter().take(last + 1).skip(first).copied().sum();
        let own = most / force;
        if force > Force::ZERO && !(own >= share) {
            share = own;
            governed_by = title.to_owned();
        }
    };
    for limit in all.limits().iter().filter(|limit| limit.first < split && limit.last >= split) {
        let Some(side) = n.sides().find(|side| limit.of == Some(side.which)) else {
            across(&limit.title, limit.first, limit.last, limit.resistance.value);
            continue;
        };
        let beside_web = |row: &Row| row.height > side.soffit && row.height < side.flange_top();
        let in_web = [limit.first, limit.last].iter().all(|i| all.rows.get(*i).is_some_and(beside_web));
        if in_web {
            across(&limit.title, limit.first, limit.last, limit.resistance.value);
            if let Some(weld) = web_weld(side, rulebook, limit) {
                across(&format!("weld at the web, {}", limit.title), limit.first, limit.last, weld);
            }
        }
    }
    given!(w, "cut back by groups and welds across the axis"; share);
    step!(w, "6.2.7.1(3)", N_j_Rd = F_balanced * share);
    Ok(AxialResistance { force: N_j_Rd, governed_by, working: w.into() })
}

/// The web's fillets over the length of a group.
fn web_weld(side: &super::numbers::PlateSide, rulebook: &Rulebook, limit: &Limit) -> Option<Force> {
    (limit.id == "beam-web-in-tension").then(|| weld_checks::over_web(side, rulebook, limit.length)).flatten()
}

/// (6.24): M_j,Ed/M_j,Rd + N_j,Ed/N_j,Rd, with its working.
pub fn interaction((M_j_Ed, M_j_Rd): (Moment, Moment), (N_j_Ed, axial): (Force, &AxialResistance)) -> (f64, Component) {
    let mut w = Working::clone(&axial.working);
    let N_j_Rd = axial.force;
    w.heading("moment and axial force");
    given!(w, "required, and without one another"; M_j_Ed, M_j_Rd, N_j_Ed, N_j_Rd);
    step!(w, "6.2.7.1(3), (6.24)", used = M_j_Ed.abs() / M_j_Rd + N_j_Ed.abs() / N_j_Rd);
    let what = if N_j_Ed < Force::ZERO { "compression" } else { "tension" };
    let component = Component {
        id: "moment-and-axial-force".into(),
        title: format!("moment with axial {what}, which {} limits", axial.governed_by),
        clause: CLAUSE,
        resistance: N_j_Rd,
        at_full: N_j_Ed.abs(),
        working: w.into(),
    };
    (used, component)
}
