//! A column stiffener stands where none was intended.

use super::say::mm;
use super::stiffeners::at_flanges;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "stiffener-added";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/stiffener-added.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let added = at_flanges(context).into_iter().filter(|at| at.intended.is_none()).filter_map(|at| {
        let stiffener = at.detailed?;
        let message =
            format!("there are column stiffeners level with the beam's {} flange that were not intended", at.flange);
        let on = context.parts(stiffener.guids.iter().map(String::as_str));
        Some(Finding::new(ID, Outcome::Comment, message).against("none", mm(stiffener.thickness)).on(on))
    });
    added.collect()
}
