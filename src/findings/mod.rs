//! One file a rule; the registry, and the one place where severities are changed.

use crate::assess::{Assessment, State};
use crate::intent::{IntendedDetail, ScheduledJoint};
use crate::joints::{EndPlateLayout, Joint};
use crate::review::Finding;
use crate::rulebook::Rulebook;
use crate::shop::Steelwork;

/// All that a rule may look at: one joint (or one scheduled joint without steel).
pub struct Context<'a> {
    /// Rules and tables.
    pub rulebook: &'a Rulebook,
    /// The steel.
    pub steelwork: &'a Steelwork,
    /// Whether a schedule was given at all.
    pub schedule_given: bool,
    /// The joint; `None` if the scheduled joint has no steel.
    pub joint: Option<&'a Joint>,
    /// Its layout, where it could be laid out.
    pub layout: Option<&'a EndPlateLayout>,
    /// What the schedule requires of it.
    pub scheduled: Option<&'a ScheduledJoint>,
    /// The intended detail.
    pub intended: Option<&'a IntendedDetail>,
    /// The assessment of what was detailed.
    pub assessment: Option<&'a Assessment>,
    /// The assessment of what was intended.
    pub intended_assessment: Option<&'a Assessment>,
}

impl Context<'_> {
    /// Whether what was detailed carries what is required.
    pub fn carries(&self) -> State {
        self.assessment.map_or(State::Unproven, Assessment::carries)
    }
}

/// One rule.
pub struct Rule {
    /// Its id; also the name of its file and of its page.
    pub id: &'static str,
    /// Looks at one joint.
    pub look: fn(&Context<'_>) -> Vec<Finding>,
    /// Its page, Markdown with fixed headings.
    pub page: &'static str,
}

/// All rules, in the order in which their findings are listed.
pub const RULES: &[Rule] = &[];

/// Everything the rules find at one joint, worst first.
pub fn look(context: &Context<'_>) -> Vec<Finding> {
    let mut findings: Vec<Finding> = RULES.iter().flat_map(|rule| (rule.look)(context)).collect();
    findings.sort_by_key(|finding| finding.severity);
    findings
}
