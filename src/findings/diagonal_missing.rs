//! Intended diagonal stiffeners are absent, incomplete, in another form or weaker.

use super::say::and;
use super::strengthening::{Stands, as_they_stand, detailed, faults, least, printed};
use super::{Context, Rule, deviation};
use crate::intent::DiagonalForm;
use crate::review::Finding;

const ID: &str = "diagonal-missing";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/diagonal-missing.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    found(context).into_iter().collect()
}

fn found(context: &Context<'_>) -> Option<Finding> {
    let intended = context.intended?.diagonals.as_ref()?.as_ref()?;
    let form = context.intended?.diagonal_form;
    let pairs = &detailed(context)?.diagonals;
    let named = |form| if form == DiagonalForm::N { "N form" } else { "K form" };
    let wanted = printed(form.map_or("diagonals", named), intended);
    let [first, ..] = &pairs[..] else {
        let message = "the intended diagonal stiffeners of the column are missing".into();
        return Some(deviation(context, ID, message).against(wanted, "none").on(context.column()));
    };
    let stands = Stands {
        thickness: least(pairs.iter().map(|pair| pair.thickness))?,
        grade: &first.grade,
        throat: least(pairs.iter().filter_map(|pair| Some(pair.weld.as_ref().ok()?.value))),
    };
    let own = if pairs.len() == 1 { "one pair" } else { "two pairs" };
    let mut own_faults = Vec::new();
    match (form, pairs.len()) {
        (Some(DiagonalForm::K), 1) => own_faults.push("one pair instead of a K of two".to_owned()),
        (Some(DiagonalForm::N), count) if count > 1 => own_faults.push(format!("{count} pairs instead of an N of one")),
        _ => {}
    }
    if pairs.iter().any(|pair| !pair.both_sides) {
        own_faults.push("on one side of the web only".into());
    }
    if pairs.iter().any(|pair| !pair.full_depth) {
        own_faults.push("not reaching from flange to flange".into());
    }
    own_faults.extend(faults(context, intended, &stands));
    if own_faults.is_empty() {
        return None;
    }
    let message = format!("the diagonal stiffeners of the column are not as intended: {}", and(&own_faults));
    let guids = context.parts(pairs.iter().flat_map(|pair| pair.guids.iter().map(String::as_str)));
    let stand = printed(own, &as_they_stand(intended, &stands));
    Some(deviation(context, ID, message).against(wanted, stand).on(guids))
}
