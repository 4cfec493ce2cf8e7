//! An edge distance or a spacing of the bolts is below the least that the standard allows.

use super::compare::less;
use super::say::mm;
use super::{Context, Rule};
use crate::joints::{FlexibleEndPlate, HeldBy, Layout, PlateSide, SimpleLayout};
use crate::review::{Finding, Outcome};
use crate::rulebook::Distances;
use crate::units::Length;

const ID: &str = "edge-distance-short";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/edge-distance-short.md") };

/// Needs no intention and no required action: below these distances the formulas of the standard do not hold. Of each
/// sort the shortest is told.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let least = &context.rulebook.distances;
    let simple = context.joint.and_then(|joint| joint.layout.as_ref().ok()?.simple());
    let (bolts, distances) = match (context.layout, simple) {
        (Some(layout), _) => (layout.bolts(), distances(layout, least)),
        (None, Some(SimpleLayout::FlexibleEndPlate(layout))) => (&layout.bolts, of_flexible(layout, least)),
        (None, None | Some(SimpleLayout::FinPlate(_) | SimpleLayout::ColumnBase(_))) => return Vec::new(),
    };
    let Ok(hole) = &bolts.hole else { return Vec::new() };
    let findings = distances.into_iter().filter_map(|(what, factor, all)| {
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

/// The same of a flexible end plate and what it is bolted to.
fn of_flexible(layout: &FlexibleEndPlate, least: &Distances) -> Vec<(&'static str, f64, Vec<Length>)> {
    let rows = &layout.bolts.rows;
    let ends = [
        rows.first().map(|row| layout.plate.top - row.height),
        rows.last().map(|row| row.height - layout.plate.bottom),
    ];
    let behind: Vec<Length> = rows.iter().map(|row| row.edge_column).collect();
    let column_ends = vec![layout.above, layout.below];
    // The flanges close a column's web across, and a beam's web up and down.
    let (end, edge) = match layout.held {
        HeldBy::ColumnFlange => (column_ends, behind),
        HeldBy::ColumnWeb => (column_ends, Vec::new()),
        HeldBy::BeamWeb => (Vec::new(), behind),
    };
    let pitches = rows.windows(2).filter_map(|pair| Some(pair.first()?.height - pair.last()?.height));
    vec![
        ("the end distance e1 of the bolts in the end plate", least.end, ends.into_iter().flatten().collect()),
        ("the end distance e1 of the bolts in the column", least.end, end),
        (
            "the edge distance e2 of the bolts in the end plate",
            least.edge,
            rows.iter().map(|row| row.edge_plate).collect(),
        ),
        ("the edge distance e2 of the bolts in the support", least.edge, edge),
        ("the spacing p1 of the bolt rows", least.pitch, pitches.collect()),
        ("the gauge p2 of the bolts", least.gauge, rows.iter().map(|row| row.gauge).collect()),
    ]
}
