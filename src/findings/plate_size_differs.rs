//! The end plate is not as wide, or does not reach as far up or down, as intended.

use super::compare::{differs, less};
use super::say::{and, mm};
use super::{Context, Rule, deviation, rows};
use crate::intent::IntendedDetail;
use crate::joints::PlateSide;
use crate::review::{Finding, Outcome};
use crate::units::Length;

const ID: &str = "plate-size-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/plate-size-differs.md") };

/// A plate that is larger on every differing side is a comment. On a joint that was detailed upside down only the width
/// is compared: `joint-handed-wrong` tells the rest.
fn look(context: &Context<'_>) -> Vec<Finding> {
    context.plates().filter_map(|(side, intended)| of_plate(context, side, intended)).collect()
}

fn of_plate(context: &Context<'_>, side: PlateSide<'_>, intended: &IntendedDetail) -> Option<Finding> {
    let (plate, tolerances) = (side.plate, &context.rulebook.tolerances);
    let upright = !rows::upside_down(context);
    // What, intended, detailed, tolerance, whether less of it is a smaller plate (else more).
    let sides: [(&str, Option<Length>, Length, Length, bool); 3] = [
        ("width", intended.plate_width, plate.width, tolerances.size, true),
        ("upper edge", intended.plate_top.filter(|_| upright), plate.top, tolerances.position, true),
        ("lower edge", intended.plate_bottom.filter(|_| upright), plate.bottom, tolerances.position, false),
    ];
    let differing: Vec<_> = sides
        .into_iter()
        .filter_map(|(what, intended, detailed, tolerance, up)| Some((what, intended?, detailed, tolerance, up)))
        .filter(|(_, intended, detailed, tolerance, _)| differs(*intended, *detailed, *tolerance))
        .collect();
    if differing.is_empty() {
        return None;
    }
    let smaller = differing.iter().any(|&(_, intended, detailed, tolerance, up)| {
        if up { less(detailed, intended, tolerance) } else { less(intended, detailed, tolerance) }
    });
    let each: Vec<String> = differing
        .iter()
        .map(|(what, intended, detailed, ..)| format!("{what} {} instead of {}", mm(*detailed), mm(*intended)))
        .collect();
    let message = format!("the end plate{} has another size than intended: {}", side.which.of(), and(&each));
    let finding = if smaller { deviation(context, ID, message) } else { Finding::new(ID, Outcome::Comment, message) };
    let print = |of: &dyn Fn(usize) -> Length| {
        let each = differing.iter().enumerate().map(|(i, (what, ..))| format!("{what} {}", mm(of(i))));
        each.collect::<Vec<_>>().join(", ")
    };
    Some(finding.against(print(&|i| differing[i].1), print(&|i| differing[i].2)).on(context.plate_of(side)))
}
