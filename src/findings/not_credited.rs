//! A part that strengthens the joint is credited by no check.

use super::{Context, Rule};
use crate::joints::Layout;
use crate::review::{Finding, Outcome};

const ID: &str = "not-credited";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/not-credited.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let parts = context.layout.into_iter().filter_map(Layout::on_column).flat_map(|layout| &layout.not_credited);
    let plates = context.joint.into_iter().flat_map(|joint| &joint.plates).filter(|(_, role)| *role == "plate");
    let plates = plates.filter_map(|(index, _)| context.steelwork.plates.get(*index));
    let guids: Vec<&str> = plates.map(|plate| plate.identity.guid.as_str()).filter(|guid| !guid.is_empty()).collect();
    let on = || if guids.is_empty() { context.column() } else { context.parts(guids.iter().copied()) };
    parts.map(|what| Finding::new(ID, Outcome::Comment, what).on(on())).collect()
}
