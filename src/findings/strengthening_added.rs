//! Web plates, diagonals or backing plates stand where none were intended.

use super::strengthening::detailed;
use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "strengthening-added";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/strengthening-added.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let (Some(intended), Some(own)) = (context.intended, detailed(context)) else { return Vec::new() };
    let web: Vec<&str> = own.web_plates.iter().map(|plate| plate.guid.as_str()).collect();
    let diagonals: Vec<&str> = own.diagonals.iter().flat_map(|pair| &pair.guids).map(String::as_str).collect();
    let backing: Vec<&str> = own.backing.iter().flat_map(|pair| &pair.guids).map(String::as_str).collect();
    let sorts = [
        ("supplementary plates on the column's web", &intended.web_plates, own.web_plates.is_empty(), web),
        ("diagonal stiffeners in the column", &intended.diagonals, own.diagonals.is_empty(), diagonals),
        ("backing plates behind the column's flange", &intended.backing_plates, own.backing.is_empty(), backing),
    ];
    let added = sorts.into_iter().filter(|(_, intended, absent, _)| **intended == Some(None) && !absent);
    let told = added.map(|(what, _, _, guids)| {
        let message = format!("there are {what} that were not intended");
        Finding::new(ID, Outcome::Comment, message).against("none", "some").on(context.parts(guids))
    });
    told.collect()
}
