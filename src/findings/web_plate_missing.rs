//! Intended supplementary web plates are absent, on fewer sides or weaker.

use super::say::and;
use super::strengthening::{Stands, as_they_stand, detailed, faults, least, printed, throat_of};
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "web-plate-missing";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/web-plate-missing.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    found(context).into_iter().collect()
}

fn found(context: &Context<'_>) -> Option<Finding> {
    let intended = context.intended?.web_plates.as_ref()?.as_ref()?;
    let sides = context.intended?.web_plate_sides;
    let plates = &detailed(context)?.web_plates;
    let on = |sides: u8| if sides == 1 { "on one side" } else { "on both sides" };
    let wanted = printed(sides.map_or("web plates", on), intended);
    let [first, ..] = &plates[..] else {
        let message = "the intended supplementary plates on the column's web are missing".into();
        return Some(deviation(context, ID, message).against(wanted, "none").on(context.column()));
    };
    let stands = Stands {
        thickness: least(plates.iter().map(|plate| plate.thickness))?,
        grade: &first.grade,
        throat: least(plates.iter().filter_map(|plate| throat_of(&plate.weld))),
    };
    let own = if plates.iter().any(|plate| plate.positive != first.positive) { 2 } else { 1 };
    let mut faults = faults(context, intended, &stands);
    if sides.is_some_and(|sides| own < sides) {
        faults.insert(0, "on one side of the web only".into());
    }
    if faults.is_empty() {
        return None;
    }
    let message = format!("the supplementary plates on the column's web are less than intended: {}", and(&faults));
    let guids = context.parts(plates.iter().map(|plate| plate.guid.as_str()));
    let stand = printed(on(own), &as_they_stand(intended, &stands));
    Some(deviation(context, ID, message).against(wanted, stand).on(guids))
}
