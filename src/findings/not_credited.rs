//! A part that strengthens the joint is credited by no check.

use super::{Context, Rule};
use crate::review::{Finding, Outcome};

const ID: &str = "not-credited";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/not-credited.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let parts = context.layout.into_iter().flat_map(|layout| &layout.not_credited);
    parts.map(|what| Finding::new(ID, Outcome::Comment, what).on(context.column())).collect()
}
