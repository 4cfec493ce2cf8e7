//! An edge distance or a spacing of the bolts is above the most that the standard allows for exposed steel.

use super::compare::more;
use super::say::mm;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};
use crate::units::Length;

const ID: &str = "distance-beyond-greatest";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/distance-beyond-greatest.md") };

/// A comment: not strength but corrosion. Asked for only where the schedule, or the rule file, calls the steel exposed.
/// Of each sort the longest is told.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let limits = &context.rulebook.distances;
    let Some(layout) = context.layout else { return Vec::new() };
    let exposed = context.intended.and_then(|detail| detail.exposed).unwrap_or(limits.exposed);
    let Some([t_p, behind]) = layout.plies().filter(|_| exposed) else { return Vec::new() };
    let t = t_p.min(behind);
    let edge = limits.greatest_edge * t + limits.greatest_edge_beside;
    let spacing = (limits.greatest_spacing * t).min(limits.greatest_spacing_most);
    let (rows, plate) = (&layout.bolts().rows, layout.side().plate);
    let ends = [rows.first().map(|row| plate.top - row.height), rows.last().map(|row| row.height - plate.bottom)];
    let pitches = rows.windows(2).filter_map(|pair| Some(pair.first()?.height - pair.last()?.height));
    let sorts: [(&str, Length, Vec<Length>); 5] = [
        ("end distance e1 of the bolts in the end plate", edge, ends.into_iter().flatten().collect()),
        ("edge distance e2 of the bolts in the end plate", edge, rows.iter().map(|row| row.edge_plate).collect()),
        ("edge distance e2 of the bolts in the column flange", edge, rows.iter().map(|row| row.edge_column).collect()),
        ("spacing p1 of the bolt rows", spacing, pitches.collect()),
        ("gauge p2 of the bolts", spacing, rows.iter().map(|row| row.gauge).collect()),
    ];
    let finding = |(what, most, all): (&str, Length, Vec<Length>)| {
        let longest = all.into_iter().reduce(Length::max)?;
        if !more(longest, most, context.rulebook.tolerances.size) {
            return None;
        }
        let message = format!(
            "the {what} is {}, the most allowed where the steel is exposed is {} (t = {})",
            mm(longest),
            mm(most),
            mm(t)
        );
        let finding = Finding::new(ID, Outcome::Comment, message);
        Some(finding.against(format!("at most {}", mm(most)), mm(longest)).on(context.plate()))
    };
    sorts.into_iter().filter_map(finding).collect()
}
