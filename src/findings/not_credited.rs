//! A part that strengthens the joint is credited by no check.

use super::{Context, Rule};
use crate::joints::Layout;
use crate::review::{Finding, Outcome};

const ID: &str = "not-credited";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/not-credited.md") };

/// Roles of parts that may strengthen the column.
const ROLES: [&str; 4] = ["plate", "web-plate", "diagonal", "backing-plate"];

fn look(context: &Context<'_>) -> Vec<Finding> {
    let layout = context.layout.and_then(Layout::on_column);
    // What no check can credit the layout knows; what the clauses exclude only the assessment.
    let named = layout.into_iter().flat_map(|layout| &layout.not_credited);
    let excluded = context.assessment.into_iter().flat_map(|assessment| &assessment.not_credited);
    let mut parts: Vec<&String> = named.collect();
    for part in excluded {
        if !parts.contains(&part) {
            parts.push(part);
        }
    }
    let plates = context.joint.into_iter().flat_map(|joint| &joint.plates).filter(|(_, role)| ROLES.contains(role));
    let plates = plates.filter_map(|(index, _)| context.steelwork.plates.get(*index));
    let guids: Vec<&str> = plates.map(|plate| plate.identity.guid.as_str()).filter(|guid| !guid.is_empty()).collect();
    let on = || if guids.is_empty() { context.column() } else { context.parts(guids.iter().copied()) };
    parts.into_iter().map(|what| Finding::new(ID, Outcome::Comment, what).on(on())).collect()
}
