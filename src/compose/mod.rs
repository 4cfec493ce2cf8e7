//! Puts the review together: each joint's assessment, findings and outcome, the counts, the problems.

mod brief;
mod joint;
mod sketch;

use rayon::prelude::*;
use sha2::{Digest, Sha256};

use crate::assess::end_plate::{self, Demand, Opposite, Solver};
use crate::assess::simple;
use crate::assess::{Assessment, Gap};
use crate::exchange::Exchange;
use crate::findings::{self, Context};
use crate::intent::{IntendedDetail, Intent, LoadCase, Pairing, ScheduledJoint};
use crate::joints::{Joint, Joints, Laid, Layout};
use crate::origin::{Ask, Missing, Problem};
use crate::review::{Basis, Counts, JointReview, Outcome, Review, Survey};
use crate::rulebook::{Alpha, ModeOne, RowForces, Rulebook};
use crate::shop::Steelwork;

/// Everything that was read and recognised.
pub struct Sources<'a> {
    /// Rules and tables.
    pub rulebook: &'a Rulebook,
    /// The exchange.
    pub exchange: &'a Exchange,
    /// The steel.
    pub steelwork: &'a Steelwork,
    /// The joints.
    pub joints: &'a Joints,
    /// The schedule.
    pub intent: &'a Intent,
    /// Which line means which joint.
    pub pairing: &'a Pairing,
    /// The schedules' names; empty if none was given.
    pub schedules: Vec<&'a str>,
}

/// The SHA-256 of a model's bytes, as hexadecimal digits.
pub fn sha256(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().map(|byte| format!("{byte:02x}")).collect()
}

/// The review of everything.
pub fn review(sources: &Sources<'_>, file: &str, bytes: &[u8]) -> Review {
    review_of(sources, file, sha256(bytes))
}

/// The same, for who has let the model's bytes go and kept their [`sha256`].
pub fn review_of(sources: &Sources<'_>, file: &str, sha256: String) -> Review {
    let (solver, checks) = (Solver::new(sources.rulebook), joint::Checks::new(sources.rulebook.welds.min_throat));
    let found = (0..sources.joints.joints.len()).into_par_iter();
    let mut joints: Vec<JointReview> = found.map(|index| sources.found(&solver, &checks, index)).collect();
    let pairing = sources.pairing;
    joints.extend(pairing.not_found.iter().filter_map(|&index| sources.without_steel(index, false)));
    joints.extend(pairing.unclear.iter().filter_map(|&index| sources.without_steel(index, true)));
    joints.par_sort_by_cached_key(|joint| natural(&joint.mark));

    let ends = |outcome| joints.iter().filter(|joint| joint.outcome == outcome).count();
    let resistance = |joint: &&JointReview| {
        let r = &joint.resistance;
        r.moment_knm.is_some() || r.moment_reversed_knm.is_some() || r.shear_kn.is_some() || r.axial_kn.is_some()
    };
    let counts = Counts {
        found: sources.joints.joints.len(),
        scheduled: sources.intent.joints.len(),
        paired: sources.pairing.scheduled.iter().flatten().count(),
        assessed: joints.iter().filter(resistance).count(),
        clear: ends(Outcome::Clear),
        comment: ends(Outcome::Comment),
        hold: ends(Outcome::Hold),
        unproven: ends(Outcome::Unproven),
    };
    let mut problems: Vec<Problem> = Vec::new();
    problems.extend(sources.intent.problems.iter().cloned());
    problems.extend(sources.pairing.problems.iter().cloned());
    problems.extend(sources.exchange.problems.iter().cloned());
    problems.extend(sources.steelwork.problems.iter().cloned());
    Review {
        file: file.to_owned(),
        exchange: sources.exchange.form.clone(),
        sha256,
        schedule: (!sources.schedules.is_empty()).then(|| sources.schedules.join(", ")),
        basis: basis(sources.rulebook),
        counts,
        joints,
        problems,
        survey: survey(sources),
    }
}

/// Marks in the order a person expects: T2 before T10.
fn natural(mark: &str) -> Vec<(u64, String)> {
    let mut parts: Vec<(u64, String)> = Vec::new();
    let mut rest = mark;
    while !rest.is_empty() {
        let words = rest.find(|c: char| c.is_ascii_digit()).unwrap_or(rest.len());
        let (word, tail) = rest.split_at(words);
        let digits = tail.find(|c: char| !c.is_ascii_digit()).unwrap_or(tail.len());
        let (number, tail) = tail.split_at(digits);
        // A number too long for u64 sorts last among numbers, then by its text.
        parts.push((0, word.to_owned()));
        parts.push((number.parse().unwrap_or(u64::MAX), number.to_owned()));
        rest = tail;
    }
    parts
}

fn basis(rulebook: &Rulebook) -> Basis {
    let settings = &rulebook.settings;
    let said = |name: &str, value: String| (name.to_owned(), value);
    Basis {
        standard: "EN 1993-1-8:2005",
        annex: rulebook.annex.name.clone(),
        annex_source: rulebook.annex.source.clone(),
        gamma_m0: rulebook.annex.gamma_m0,
        gamma_m1: rulebook.annex.gamma_m1,
        gamma_m2: rulebook.annex.gamma_m2,
        settings: vec![
            said(
                "row forces",
                match settings.row_forces {
                    RowForces::LinearBeyond19 => "in proportion beyond 1.9 Ft,Rd (6.2.7.2(9))",
                    RowForces::ThinPlateOrLinear => {
                        "plastic if plate or flange is thin, else in proportion (UK practice)"
                    }
                }
                .into(),
            ),
            said(
                "T-stub mode 1",
                match settings.mode_one {
                    ModeOne::Method1 => "method 1",
                    ModeOne::Method2 => "method 2",
                }
                .into(),
            ),
            said("table of steel strengths", rulebook.steel_table().to_owned()),
            said(
                "strength of rolled sections",
                if settings.strength_by_flange { "by flange thickness" } else { "by each element's thickness" }.into(),
            ),
            said(
                "α beside stiffeners and flanges",
                match settings.alpha {
                    Alpha::Chart => "Figure 6.11",
                    Alpha::Draft2024 => "formula of a draft of EN 1993-1-8:2024, at most 8",
                }
                .into(),
            ),
            said("α of Figure 6.11, at most", format!("{}", settings.alpha_max)),
            said("rows carry shear only below", format!("{} of the beam's depth", settings.shear_only_below)),
            said(
                "bolt tension beside shear",
                if settings.shear_with_full_tension { "as if fully used" } else { "by the row's share" }.into(),
            ),
            said(
                "shear plane",
                if settings.thread_in_shear_plane { "through the thread" } else { "through the shank" }.into(),
            ),
            said("axial force neglected up to", format!("{} of N_pl,Rd (6.2.7.1(2))", settings.axial_limit)),
        ],
    }
}

fn survey(sources: &Sources<'_>) -> Survey {
    let steel = sources.steelwork;
    Survey {
        members: steel.members.len(),
        plates: steel.plates.len(),
        bolts: steel.bolts.len(),
        welds: steel.welds.len(),
        pieces: steel.pieces.len(),
        loose_bolts: (sources.joints.loose_bolts.iter())
            .filter_map(|&i| steel.bolts.get(i))
            .map(|bolt| (bolt.identity.guid.clone(), bolt.identity.place.clone()))
            .collect(),
        rejected: (steel.rejected.iter())
            .map(|r| {
                let name = if r.identity.name.is_empty() { &r.identity.class } else { &r.identity.name };
                (name.clone(), r.reason.clone(), r.identity.place.clone())
            })
            .collect(),
    }
}

/// A detail of the schedule that nothing of the steel is held against.
fn not_compared() -> Missing {
    let reason =
        "what the schedule's detail states of steel, bolts and welds is not compared with a joint of this kind yet";
    Missing { what: "comparison with the intended detail".into(), reason: reason.into(), at: None, ask: Ask::Method }
}

/// What was computed for one joint.
struct Computed {
    detailed: Option<Assessment>,
    intended: Option<Result<(Layout, Assessment), Missing>>,
}

impl<'a> Sources<'a> {
    fn scheduled(&self, joint: usize) -> Option<&'a ScheduledJoint> {
        self.intent.joints.get((*self.pairing.scheduled.get(joint)?)?)
    }

    fn detail(&self, scheduled: Option<&ScheduledJoint>) -> Option<&'a IntendedDetail> {
        let name = scheduled?.detail.as_ref()?;
        self.intent.details.iter().find(|detail| detail.name == *name)
    }

    /// The load cases with what the joint on the other flange does in the case of the same name.
    fn demands<'b>(&self, joint: &Joint, cases: &'b [LoadCase]) -> Vec<Demand<'b>> {
        let opposite = |case: &LoadCase| match (joint.opposite, joint.opposite_unclear) {
            (_, Some(why)) => Opposite::Unclear(why),
            (None, None) => Opposite::None,
            (Some(other), None) => (self.scheduled(other))
                .and_then(|other| other.cases.iter().find(|its| its.name == case.name))
                .and_then(|its| its.moment)
                .map_or(Opposite::NotStated, Opposite::Moment),
        };
        cases.iter().map(|case| Demand { case, opposite: opposite(case) }).collect()
    }

    fn compute(&self, solver: &Solver<'_>, joint: &Joint, scheduled: Option<&ScheduledJoint>) -> Computed {
        let cases = scheduled.map_or(&[][..], |s| &s.cases);
        let layout = match &joint.layout {
            Ok(Laid::Plates(layout)) => layout,
            Ok(Laid::Simple(layout)) => {
                let cases: Vec<&LoadCase> = cases.iter().collect();
                let detail = self.detail(scheduled);
                let asked = detail.and_then(|detail| simple::with_detail(layout, detail));
                let mut detailed = simple::assess(asked.as_ref().unwrap_or(layout), &cases, self.rulebook);
                if detail.is_some_and(IntendedDetail::states_steel) {
                    detailed.gaps.push(Gap::NotChecked(not_compared()));
                }
                return Computed { detailed: Some(detailed), intended: None };
            }
            Err(_) => return Computed { detailed: None, intended: None },
        };
        let demands = self.demands(joint, cases);
        let two_sided = joint.opposite.is_some() || joint.opposite_unclear.is_some();
        let assess = |layout: &Layout| end_plate::assess_with(solver, layout, &demands, two_sided);
        let intended = self.detail(scheduled).map(|detail| {
            let meant = end_plate::intended_layout(layout, detail, self.rulebook)?;
            let assessment = assess(&meant);
            Ok((meant, assessment))
        });
        let asked = self.detail(scheduled).and_then(|detail| end_plate::with_category(layout, detail, self.rulebook));
        Computed { detailed: Some(assess(asked.as_ref().unwrap_or(layout))), intended }
    }

    fn found(&self, solver: &Solver<'_>, checks: &joint::Checks, index: usize) -> JointReview {
        let joint = &self.joints.joints[index];
        let scheduled = self.scheduled(index);
        let computed = self.compute(solver, joint, scheduled);
        let context = Context {
            rulebook: self.rulebook,
            steelwork: self.steelwork,
            schedule_given: !self.schedules.is_empty(),
            joint: Some(joint),
            layout: joint.layout.as_ref().ok().and_then(Laid::plates),
            scheduled,
            intended: self.detail(scheduled),
            assessment: computed.detailed.as_ref(),
            intended_assessment: computed.intended.as_ref().and_then(|i| i.as_ref().ok()).map(|(_, a)| a),
            unclear: false,
        };
        let findings = findings::look(&context);
        joint::review(self, checks, joint, scheduled, computed, findings)
    }

    fn without_steel(&self, index: usize, unclear: bool) -> Option<JointReview> {
        let scheduled = self.intent.joints.get(index)?;
        let context = Context {
            rulebook: self.rulebook,
            steelwork: self.steelwork,
            schedule_given: true,
            joint: None,
            layout: None,
            scheduled: Some(scheduled),
            intended: self.detail(Some(scheduled)),
            assessment: None,
            intended_assessment: None,
            unclear,
        };
        let kind = if unclear { "not-paired" } else { "not-found" };
        Some(joint::without_steel(scheduled, kind, findings::look(&context)))
    }
}
