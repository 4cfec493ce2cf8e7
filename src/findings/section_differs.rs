//! A member's section or steel grade is another than intended.

use super::compare::{Strength, grades, sections};
use super::context::Parts;
use super::{Context, Rule, deviation};
use crate::joints::MemberAt;
use crate::review::{Finding, Outcome};

const ID: &str = "section-differs";
pub(super) const RULE: Rule = Rule { id: ID, look, page: include_str!("../../rules/findings/section-differs.md") };

fn look(context: &Context<'_>) -> Vec<Finding> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let column = (&intended.supporting_section, &intended.supporting_grade);
    let beam = (&intended.supported_section, &intended.supported_grade);
    let members = [
        ("supporting", layout.supporting(), column, context.column()),
        ("supported", layout.side().beam, beam, context.beam()),
    ];
    let findings = members.into_iter().flat_map(|(which, member, (section, grade), on)| {
        [
            section.as_ref().and_then(|section| of_section(context, which, member, section, on.clone())),
            grade.as_ref().and_then(|grade| of_grade(context, which, member, grade, on)),
        ]
    });
    findings.flatten().collect()
}

fn of_section(context: &Context<'_>, which: &str, member: &MemberAt, intended: &str, on: Parts) -> Option<Finding> {
    let detailed = &member.section.as_ref().ok()?.value;
    let strength = sections(context.rulebook, detailed, intended);
    let how = match strength {
        Strength::Same => return None,
        Strength::Lower => "a lighter section than intended",
        Strength::Higher => "a heavier section than intended",
        Strength::Unranked => "another section than intended",
    };
    let name = &detailed.designation;
    // Both as the tables spell them: "UKB 406x178x60" beside "UB 406x178x54" would read as another series.
    let intended = context.rulebook.section(intended).map_or(intended, |section| section.designation.as_str());
    let message = format!("the {which} member is {how}: {name} instead of {intended}");
    let finding = match strength {
        Strength::Higher => Finding::new(ID, Outcome::Comment, message),
        _ => deviation(context, ID, message),
    };
    Some(finding.against(intended, name).on(on))
}

/// A higher grade of a member can do no harm to the joint and is not told.
fn of_grade(context: &Context<'_>, which: &str, member: &MemberAt, intended: &str, on: Parts) -> Option<Finding> {
    let detailed = &member.grade.as_ref().ok()?.value;
    let flange = member.section.as_ref().ok().map(|section| section.value.t_f);
    let strength = grades(context.rulebook, detailed, intended, flange);
    if !matches!(strength, Strength::Lower | Strength::Unranked) {
        return None;
    }
    let how = strength.word();
    let message = format!("the grade of the {which} member is {how}: {} instead of {intended}", detailed.0);
    Some(deviation(context, ID, message).against(intended, &detailed.0).on(on))
}
