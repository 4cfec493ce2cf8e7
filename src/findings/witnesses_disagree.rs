//! Two statements of the shop model about the same thing disagree.

use super::{Context, Rule};
use crate::joints::SimpleLayout;
use crate::review::{Finding, Outcome};

const ID: &str = "witnesses-disagree";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/witnesses-disagree.md") };

/// What a member's witnesses disagree about is its section or its grade, and a wrong section makes every number wrong:
/// unproven. Elsewhere the review goes by the geometry: a comment.
fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some(joint) = context.joint else { return Vec::new() };
    let takes_notches = joint.layout.as_ref().is_ok_and(|laid| laid.simple().is_some_and(SimpleLayout::takes_notches));
    let members = [("supporting member", joint.supporting), ("supported member", joint.supported)];
    let members = members.into_iter().filter_map(|(role, i)| Some((role, context.steelwork.members.get(i?)?)));
    let members = members.flat_map(|(role, member)| {
        let notches = member.notches.iter().filter(move |_| !(takes_notches && role == "supported member"));
        let all = member.disagreements.iter().chain(notches.map(|notch| &notch.untaken));
        let told = all.map(move |what| (Outcome::Unproven, format!("{role}: {what}")));
        told.map(|told| (told, (vec![member.identity.guid.clone()], Some(member.identity.place.clone()))))
    });
    let plates = joint.plates.iter().filter_map(|(i, role)| Some((role, context.steelwork.plates.get(*i)?)));
    let plates = plates.flat_map(|(role, plate)| {
        let told = plate
            .disagreements
            .iter()
            .map(move |what| (Outcome::Comment, format!("{}: {what}", role.replace('-', " "))));
        told.map(|told| (told, (vec![plate.identity.guid.clone()], Some(plate.identity.place.clone()))))
    });
    let whole = joint.disagreements.iter().map(|what| ((Outcome::Comment, what.clone()), context.members()));
    let all = members.chain(plates).chain(whole);
    all.map(|((severity, message), on)| Finding::new(ID, severity, message).on(on)).collect()
}
