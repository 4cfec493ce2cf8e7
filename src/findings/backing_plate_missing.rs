//! Intended backing plates behind the column's flange are absent, on one side or weaker.

use super::say::and;
use super::strengthening::{Stands, as_they_stand, detailed, faults, least, printed};
use super::{Context, Rule, deviation};
use crate::review::Finding;

const ID: &str = "backing-plate-missing";
pub(super) const RULE: Rule =
    Rule { id: ID, look, page: include_str!("../../rules/findings/backing-plate-missing.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    found(context).into_iter().collect()
}

fn found(context: &Context<'_>) -> Option<Finding> {
    let intended = context.intended?.backing_plates.as_ref()?.as_ref()?;
    let plates = &detailed(context)?.backing;
    let wanted = printed("a pair", intended);
    let [first, ..] = &plates[..] else {
        let message = "the intended backing plates behind the column's flange are missing".into();
        return Some(deviation(context, ID, message).against(wanted, "none").on(context.column()));
    };
    let thickness = least(plates.iter().map(|pair| pair.thickness))?;
    let stands = Stands { thickness, grade: &first.grade, throat: None };
    let mut own_faults = faults(context, intended, &stands);
    let pair = plates.iter().all(|pair| pair.both_sides);
    if !pair {
        own_faults.insert(0, "on one side of the web only".into());
    }
    if own_faults.is_empty() {
        return None;
    }
    let message = format!("the backing plates behind the column's flange are less than intended: {}", and(&own_faults));
    let guids = context.parts(plates.iter().flat_map(|pair| pair.guids.iter().map(String::as_str)));
    let stand = printed(if pair { "a pair" } else { "one side" }, &as_they_stand(intended, &stands));
    Some(deviation(context, ID, message).against(wanted, stand).on(guids))
}
