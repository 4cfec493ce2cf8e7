//! An edge distance or a spacing of the bolts is below the least that the standard allows.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule};
use crate::joints::{Layout, PlateSide};
use crate::review::{Finding, Outcome};
use crate::rulebook::Distances;
use crate::units::Length;

const ID: &str = "edge-distance-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/edge-distance-short.md") };

/// Needs no intention and no required action: below these distances the formulas of the standard do not hold. Of each
/// sort the shortest is told.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(layout) = context.layout else { return Vec::new() };
    let Ok(hole) = &layout.bolts().hole else { return Vec::new() };
    let findings = distances(layout, &context.rulebook.distances).into_iter().filter_map(|(what, factor, all)| {
        let shortest = all.into_iter().reduce(Length::min)?;
        let least = factor * hole.value;
        if !less(shortest, least, context.rulebook.tolerances.size) {
            return None;
        }
        let message = format!("{what} is {}, the least allowed is {} ({factor} d0)", mm(shortest), mm(least));
        Some(
            Finding::new(ID, Outcome::Hold, message)
                .against(format!("at least {}", mm(least)), mm(shortest))
                .on(context.plate()),
        )
    });
    findings.collect()
}

/// What, its least in hole diameters (round holes, rows not staggered: the layout takes no others), all of its sort.
fn distances(layout: &Layout, least: &Distances) -> Vec<(&'static str, f64, Vec<Length>)> {
    let rows = &layout.bolts().rows;
    let (top, bottom) = (rows.first(), rows.last());
    let ends = |side: &PlateSide<'_>| {
        [top.map(|row| side.plate.top - row.height), bottom.map(|row| row.height - side.plate.bottom)]
    };
    let ends = layout.sides().iter().flat_map(ends).flatten().collect();
    let of_plate = rows.iter().map(|row| row.edge_plate);
    let behind: Vec<Length> = rows.iter().map(|row| row.edge_column).collect();
    let pitches = rows.windows(2).filter_map(|pair| Some(pair.first()?.height - pair.last()?.height));
    let (plates, flange, column_ends) = match layout {
        Layout::EndPlate(layout) => {
            (of_plate.collect(), behind, [layout.column_above, layout.column_below].into_iter().flatten().collect())
        }
        Layout::Splice(_) => (of_plate.chain(behind).collect(), Vec::new(), Vec::new()),
    };
    vec![
        ("the end distance e1 of the bolts in the end plate", least.end, ends),
        ("the end distance e1 of the bolts in the column", least.end, column_ends),
        ("the edge distance e2 of the bolts in the end plate", least.edge, plates),
        ("the edge distance e2 of the bolts in the column flange", least.edge, flange),
        ("the spacing p1 of the bolt rows", least.pitch, pitches.collect()),
        ("the gauge p2 of the bolts", least.gauge, rows.iter().map(|row| row.gauge).collect()),
    ]
}
