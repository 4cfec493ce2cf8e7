//! An intended pair of column stiffeners is absent, incomplete or weaker.

use super::compare::{Strength, grades, less};
use super::say::{and, mm};
use super::stiffeners::at_flanges;
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
            return Some(deviation(context, ID, message).against(printed(intended, true), "none").on(context.column()));
        };
        let faults = faults(context, intended, detailed);
        if faults.is_empty() {
            return None;
        }
        let message = format!("the column stiffeners {level} are less than intended: {}", and(&faults));
        let detailed_grade = detailed.grade.as_ref().ok().map(|grade| grade.value.0.clone());
        let stand = IntendedStiffener { thickness: Some(detailed.thickness), grade: detailed_grade };
        let on = context.parts(detailed.guids.iter().map(String::as_str));
        Some(
            deviation(context, ID, message)
                .against(printed(intended, true), printed(&stand, detailed.both_sides))
                .on(on),
        )
    });
    short.collect()
}

fn faults(context: &Context<'_>, intended: &IntendedStiffener, detailed: &Stiffener) -> Vec<String> {
    let mut faults = Vec::new();
    if !detailed.both_sides {
        faults.push("on one side of the web only".into());
    }
    if !detailed.full_depth {
        faults.push("not reaching from flange to flange".into());
    }
    if let Some(thickness) = intended.thickness
        && less(detailed.thickness, thickness, context.rulebook.tolerances.size)
    {
        faults.push(format!("{} thick instead of {}", mm(detailed.thickness), mm(thickness)));
    }
    if let (Some(grade), Ok(stands)) = (&intended.grade, &detailed.grade)
        && let strength @ (Strength::Lower | Strength::Unranked) =
            grades(context.rulebook, &stands.value, grade, Some(detailed.thickness))
    {
        faults.push(format!("of a grade {}, {} instead of {grade}", strength.word(), stands.value.0));
    }
    faults
}

/// "a pair, 12 mm, S275", as far as it is known.
fn printed(stiffener: &IntendedStiffener, pair: bool) -> String {
    let count = if pair { "a pair" } else { "one plate" };
    let sizes = stiffener.thickness.map(mm).into_iter().chain(stiffener.grade.clone());
    [count.into()].into_iter().chain(sizes).collect::<Vec<String>>().join(", ")
}
