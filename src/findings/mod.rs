//! One file a rule; the registry, and the one place where severities are decided.

mod action_not_stated;
mod axial_force_beyond_limit;
mod axial_short;
mod backing_plate_missing;
mod bolt_class_higher;
mod bolt_class_lower;
mod bolt_class_unknown;
mod bolt_count_differs;
mod bolt_larger;
mod bolt_size_unknown;
mod bolt_smaller;
mod bolt_too_short;
mod compare;
mod context;
mod diagonal_missing;
mod distance_beyond_greatest;
mod edge_distance_short;
mod gauge_differs;
mod grade_unknown;
mod haunch_differs;
mod head_without_room;
mod joint_handed_wrong;
mod joint_not_found;
mod joint_not_paired;
mod joint_not_scheduled;
mod kind_not_assessed;
mod moment_short;
mod not_credited;
mod plate_grade_lower;
mod plate_grade_unknown;
mod plate_size_differs;
mod plate_thicker;
mod plate_thinner;
mod plate_wider_than_flange;
mod room;
mod row_missing;
mod row_moved;
mod rows;
mod say;
mod section_differs;
mod section_unknown;
mod shear_short;
mod shortfall;
mod stiffener_added;
mod stiffener_in_root;
mod stiffener_missing;
mod stiffeners;
mod stiffness_differs;
mod strengthening;
mod strengthening_added;
mod tool_without_room;
mod tying_short;
mod web_plate_missing;
mod weld_not_found;
mod weld_short;
mod weld_thinner;
mod witnesses_disagree;

pub use context::Context;
pub use rows::{RowMatch, match_rows};

use crate::assess::{Assessment, MomentResistance, Sense, State};
use crate::review::{Finding, Outcome};

/// One rule.
pub struct Rule {
    /// Its id; also the name of its file and of its page.
    pub id: &'static str,
    /// Looks at one joint.
    pub look: fn(&Context<'_>) -> Vec<Finding>,
    /// Its page, Markdown with fixed headings.
    pub page: &'static str,
}

/// All rules, in the order in which their findings are listed: what can hurt, what nobody knows, what is only odd.
pub const RULES: &[Rule] = &[
    joint_not_found::RULE,
    moment_short::RULE,
    weld_short::RULE,
    shear_short::RULE,
    axial_short::RULE,
    tying_short::RULE,
    joint_handed_wrong::RULE,
    edge_distance_short::RULE,
    head_without_room::RULE,
    bolt_too_short::RULE,
    row_missing::RULE,
    bolt_class_lower::RULE,
    bolt_smaller::RULE,
    plate_thinner::RULE,
    weld_thinner::RULE,
    stiffener_missing::RULE,
    web_plate_missing::RULE,
    diagonal_missing::RULE,
    backing_plate_missing::RULE,
    haunch_differs::RULE,
    section_differs::RULE,
    plate_grade_lower::RULE,
    row_moved::RULE,
    gauge_differs::RULE,
    plate_size_differs::RULE,
    axial_force_beyond_limit::RULE,
    stiffness_differs::RULE,
    kind_not_assessed::RULE,
    joint_not_scheduled::RULE,
    joint_not_paired::RULE,
    action_not_stated::RULE,
    section_unknown::RULE,
    weld_not_found::RULE,
    bolt_class_unknown::RULE,
    bolt_size_unknown::RULE,
    plate_grade_unknown::RULE,
    grade_unknown::RULE,
    witnesses_disagree::RULE,
    bolt_count_differs::RULE,
    plate_thicker::RULE,
    bolt_class_higher::RULE,
    bolt_larger::RULE,
    distance_beyond_greatest::RULE,
    plate_wider_than_flange::RULE,
    stiffener_in_root::RULE,
    tool_without_room::RULE,
    stiffener_added::RULE,
    strengthening_added::RULE,
    not_credited::RULE,
];

/// The rule of that id.
pub fn rule(id: &str) -> Option<&'static Rule> {
    RULES.iter().find(|rule| rule.id == id)
}

/// Everything the rules find at one joint, worst first, else in the order of [`RULES`].
pub fn look(context: &Context<'_>) -> Vec<Finding> {
    let mut findings: Vec<Finding> = RULES.iter().flat_map(|rule| (rule.look)(context)).collect();
    findings.sort_by_key(|finding| finding.severity);
    findings
}

/// How grave a deviation from the intended detail is: a comment where the joint still carries what is required, a hold
/// where it proves not to, unproven where nobody can tell.
fn severity(context: &Context<'_>) -> Outcome {
    match context.carries() {
        State::Met => Outcome::Comment,
        State::NotMet => Outcome::Hold,
        State::Unproven => Outcome::Unproven,
    }
}

/// A deviation from the intended detail to the worse side, or one whose side nobody can tell.
///
/// Says what the joint has lost as a whole: what a single deviation costs can't be told while others stand beside it.
fn deviation(context: &Context<'_>, rule: &'static str, message: String) -> Finding {
    let lost = lost_capacity(context).map(|lost| (100.0 * lost).round()).map_or(String::new(), |percent| {
        let change = match percent {
            p if p >= 1.0 => format!("{p} % less moment resistance than intended"),
            p if p <= -1.0 => format!("{} % more moment resistance than intended", -p),
            _ => "the intended moment resistance within 1 %".into(),
        };
        format!("; as detailed the joint has {change}")
    });
    Finding::new(rule, severity(context), message + &lost)
}

/// The share of the intended moment resistance that the joint as detailed lacks (negative if it has more): the largest
/// over the load cases that ask for a moment, each in its own sense; `None` unless both details could be computed.
pub fn lost_capacity(context: &Context<'_>) -> Option<f64> {
    let (detailed, intended) = (context.assessment?, context.intended_assessment?);
    let cases = &context.scheduled?.cases;
    let lost = cases.iter().enumerate().filter_map(|(index, case)| {
        let sense = sense(case.moment?.get())?;
        let pair = match (of_case(detailed, index), of_case(intended, index)) {
            (Some(detailed), Some(intended)) => (detailed, intended),
            _ => (of_sense(detailed, sense)?, of_sense(intended, sense)?),
        };
        let lost = 1.0 - pair.0.moment / pair.1.moment;
        lost.is_finite().then_some(lost)
    });
    lost.max_by(f64::total_cmp)
}

/// The sense that a required moment asks for; `None` for no moment.
fn sense(moment: f64) -> Option<Sense> {
    match moment {
        m if m > 0.0 => Some(Sense::Hogging),
        m if m < 0.0 => Some(Sense::Sagging),
        _ => None,
    }
}

fn of_case(assessment: &Assessment, index: usize) -> Option<&MomentResistance> {
    assessment.cases.iter().find(|case| case.case == index)?.moment.as_deref()
}

fn of_sense(assessment: &Assessment, sense: Sense) -> Option<&MomentResistance> {
    match sense {
        Sense::Hogging => assessment.hogging.as_deref(),
        Sense::Sagging => assessment.sagging.as_deref(),
    }
}
