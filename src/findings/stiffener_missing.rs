//! An intended pair of column stiffeners is absent, incomplete or weaker.

use super::compare::less;
use super::say::{and, mm};
use super::stiffeners::at_flanges;
use super::strengthening::{self, Stands, as_they_stand, printed};
use super::{Context, Rule, deviation};
use crate::intent::IntendedStiffener;
use crate::joints::Stiffener;
use crate::review::Finding;

const ID: &str = "stiffener-missing";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/stiffener-missing.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let short = at_flanges(context).into_iter().filter_map(|at| {
        let intended = at.intended.as_ref()?;
        let level = format!("level with the beam's {} flange", at.flange);
        let Some(detailed) = at.detailed else {
            let message = format!("the intended column stiffeners {level} are missing");
            return Some(
                deviation(context, ID, message).against(printed("a pair", intended), "none").on(context.column()),
            );
        };
        let faults = faults(context, intended, detailed);
        if faults.is_empty() {
            return None;
        }
        let message = format!("the column stiffeners {level} are less than intended: {}", and(&faults));
        let stands = standing(detailed);
        let stand = as_they_stand(intended, &stands);
        let length = intended.length.map(|_| detailed.reach);
        let stand = IntendedStiffener { length, ..stand };
        let count = if detailed.both_sides { "a pair" } else { "one plate" };
        let on = context.parts(detailed.guids.iter().map(String::as_str));
        Some(deviation(context, ID, message).against(printed("a pair", intended), printed(count, &stand)).on(on))
    });
    short.collect()
}

fn standing(detailed: &Stiffener) -> Stands<'_> {
    let throat = detailed.weld.as_ref().ok().map(|weld| weld.value);
    Stands { thickness: detailed.thickness, grade: &detailed.grade, throat }
}

fn faults(context: &Context<'_>, intended: &IntendedStiffener, detailed: &Stiffener) -> Vec<String> {
    let mut faults = Vec::new();
    if !detailed.both_sides {
        faults.push("on one side of the web only".into());
    }
    match intended.length {
        None if !detailed.full_depth => faults.push("not reaching from flange to flange".into()),
        Some(length) if !detailed.full_depth && less(detailed.reach, length, context.rulebook.tolerances.position) => {
            faults.push(format!("{} long instead of {}", mm(detailed.reach), mm(length)));
        }
        _ => {}
    }
    faults.extend(strengthening::faults(context, intended, &standing(detailed)));
    faults
}
