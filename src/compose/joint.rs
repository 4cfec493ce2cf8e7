//! One joint's review: resistance, required actions, checks, findings, outcome.

use std::collections::HashMap;
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};

use super::{Computed, Sources, brief, sketch};
use crate::assess::classification::classify;
use crate::assess::end_plate::{BOUND_BY_OPPOSITE, BOUND_BY_TENSION};
use crate::assess::simple::column_base::BASE_IN_SHEAR;
use crate::assess::{About, Assessment, Component, Gap, MomentResistance, Sense, ShearResistance, State, Verdict};
use crate::intent::{JointClass, ScheduledJoint};
use crate::joints::Joint;
use crate::origin::{Ask, Missing};
use crate::review::{
    CheckResult, Finding, JointReview, Outcome, REQUIRED_ACTIONS, Required, Resistance, RowBasis, RowResult,
    StiffnessResult,
};
use crate::units::{Force, Length, Moment, kn};

/// A joint of the steel.
pub fn review(
    sources: &Sources<'_>,
    checks: &Checks,
    joint: &Joint,
    scheduled: Option<&ScheduledJoint>,
    mut computed: Computed,
    mut findings: Vec<Finding>,
) -> JointReview {
    let steel = sources.steelwork;
    let inputs = computed.detailed.as_mut().map(|a| std::mem::take(&mut a.inputs)).unwrap_or_default();
    let computed = &computed;
    let assessment = computed.detailed.as_ref();
    let member = |index: Option<usize>| index.and_then(|i| steel.members.get(i)).map(brief::member);
    let missing = missing(sources, joint, scheduled, computed);
    findings.sort_by_key(|finding| finding.severity);
    let outcome = outcome(assessment, &findings, &missing);
    let intended = computed.intended.as_ref().and_then(|i| i.as_ref().ok());
    let leading = assessment.map(|a| leading(a, scheduled, checks)).unwrap_or_default();
    JointReview {
        mark: scheduled.and_then(|s| s.mark.clone()).unwrap_or_else(|| joint.mark.clone()),
        kind: joint.kind.word().into(),
        detail: scheduled.and_then(|s| s.detail.clone()),
        outcome,
        reasons: reasons(&findings, &missing),
        supporting: member(joint.supporting),
        supported: member(joint.supported),
        bolts: brief::bolts(steel, joint),
        plates: brief::plates(steel, joint),
        welds: brief::welds(steel, joint),
        resistance: assessment.map(resistance).unwrap_or_default(),
        intended_resistance: intended.map(|(_, a)| resistance(a)),
        required: required(assessment, scheduled),
        rows: leading.rows,
        row_basis: leading.row_basis,
        shear_case: leading.shear_case,
        stiffness: leading.stiffness,
        checks: leading.checks,
        findings,
        missing,
        assumptions: assessment.map(assumptions).unwrap_or_default(),
        inputs: inputs.into_iter().map(|i| (i.name, i.value, i.origin.printed())).collect(),
        difference: intended
            .and_then(|(meant, _)| Some((brief::lines(meant), brief::lines(joint.layout.as_ref().ok()?.plates()?)))),
        sketch: sketch::sketch(steel, joint),
        at: joint.place.clone(),
    }
}

/// What was assumed, and where a resistance was computed on the safe side for want of a number.
fn assumptions(assessment: &Assessment) -> Vec<String> {
    let bounds = assessment.gaps.iter().filter_map(|gap| match gap {
        Gap::LowerBound(missing) => Some(format!("{} not known: {}", missing.what, missing.reason)),
        Gap::NotChecked(_) => None,
    });
    assessment.assumptions.iter().cloned().chain(bounds).collect()
}

/// A scheduled joint without steel (`kind` "not-found"), or one that fits no single joint of the steel ("not-paired").
pub fn without_steel(scheduled: &ScheduledJoint, kind: &str, findings: Vec<Finding>) -> JointReview {
    let named = || {
        let ends = [scheduled.supported.as_deref(), scheduled.supporting.as_deref()];
        ends.into_iter().flatten().collect::<Vec<_>>().join(" / ")
    };
    JointReview {
        mark: scheduled.mark.clone().unwrap_or_else(named),
        kind: kind.into(),
        detail: scheduled.detail.clone(),
        outcome: outcome(None, &findings, &[]),
        reasons: reasons(&findings, &[]),
        supporting: None,
        supported: None,
        bolts: None,
        plates: Vec::new(),
        welds: Vec::new(),
        resistance: Resistance::default(),
        intended_resistance: None,
        required: required(None, Some(scheduled)),
        rows: Vec::new(),
        row_basis: None,
        shear_case: None,
        stiffness: None,
        checks: Arc::default(),
        findings,
        missing: Vec::new(),
        assumptions: Vec::new(),
        inputs: Vec::new(),
        difference: None,
        sketch: None,
        at: Some(scheduled.at.clone()),
    }
}

/// Clear must be earned: everything required is proven to be carried, and nothing was found.
fn outcome(assessment: Option<&Assessment>, findings: &[Finding], missing: &[Missing]) -> Outcome {
    let worst = findings.iter().map(|finding| finding.severity).min();
    if worst == Some(Outcome::Hold) {
        return Outcome::Hold;
    }
    match assessment.map(Assessment::carries) {
        // A rule for each of these stands in the findings; should one be silent, the joint is still held.
        Some(State::NotMet) => Outcome::Hold,
        Some(State::Met) if worst != Some(Outcome::Unproven) && missing.is_empty() => {
            if worst.is_some() {
                Outcome::Comment
            } else {
                Outcome::Clear
            }
        }
        _ => Outcome::Unproven,
    }
}

fn reasons(findings: &[Finding], missing: &[Missing]) -> Vec<String> {
    let mut reasons: Vec<String> = Vec::new();
    let said = findings.iter().map(|finding| finding.message.clone());
    // What a finding says word for word is not said again as missing.
    let missing = missing.iter().filter(|gap| !findings.iter().any(|finding| finding.message.contains(&gap.reason)));
    for reason in said.chain(missing.map(Missing::to_string)) {
        if !reasons.contains(&reason) {
            reasons.push(reason);
        }
    }
    reasons
}

/// Everything that keeps the joint from being proven.
fn missing(
    sources: &Sources<'_>,
    joint: &Joint,
    scheduled: Option<&ScheduledJoint>,
    computed: &Computed,
) -> Vec<Missing> {
    let said =
        |what: &str, reason: String, ask: Ask| Missing { what: what.into(), reason, at: joint.place.clone(), ask };
    let mut missing = Vec::new();
    if let Err(reason) = &joint.layout {
        missing.push(said("assessment of this kind", reason.clone(), Ask::Method));
    }
    match scheduled {
        None if sources.schedules.is_empty() => {
            missing.push(said(REQUIRED_ACTIONS, "no schedule was given".into(), Ask::Engineer));
        }
        None => missing.push(said(REQUIRED_ACTIONS, "the schedule has no line for this joint".into(), Ask::Engineer)),
        Some(scheduled) if scheduled.cases.is_empty() => missing.push(Missing {
            at: Some(scheduled.at.clone()),
            ..said(REQUIRED_ACTIONS, "the schedule states no load case for this joint".into(), Ask::Engineer)
        }),
        Some(_) => {}
    }
    let carries = computed.detailed.as_ref().map(Assessment::carries);
    let gaps = || computed.detailed.iter().flat_map(|a| &a.gaps);
    let not_checked = |what: &str| gaps().any(|gap| matches!(gap, Gap::NotChecked(other) if other.what == what));
    for gap in gaps() {
        match gap {
            Gap::NotChecked(gap) => missing.push(gap.clone()),
            // What can't be checked stands in the list once; a lower bound that carries proves it all the same.
            Gap::LowerBound(gap) if carries != Some(State::Met) && !not_checked(&gap.what) => missing.push(gap.clone()),
            Gap::LowerBound(_) => {}
        }
    }
    let cases = computed.detailed.iter().flat_map(|a| &a.cases);
    let verdicts = cases.flat_map(|case| case.verdicts.iter().map(move |verdict| (case.case, verdict)));
    for (case, verdict) in verdicts.filter(|(_, verdict)| verdict.state == State::Unproven) {
        if let Some(reason) = verdict.reason.as_ref().filter(|reason| *reason != "an input is missing") {
            let what = match verdict.about {
                About::Moment => "proof of the moment",
                About::Shear => "proof of the shear",
                About::Weld => "proof of the welds",
                About::Axial | About::Force => "proof of the axial force",
                About::Tying => "proof of the tying force",
            };
            let engineers = verdict.required.is_none() || reason == BOUND_BY_OPPOSITE || reason == BOUND_BY_TENSION;
            let gap = said(what, reason.clone(), if engineers { Ask::Engineer } else { Ask::Method });
            let line = scheduled.and_then(|scheduled| scheduled.cases.get(case)).map(|case| case.at.clone());
            missing.push(Missing { at: line.filter(|_| engineers).or(gap.at), ..gap });
        }
    }
    if let Some(Err(gap)) = &computed.intended {
        missing.push(gap.clone());
    }
    let mut seen: Vec<Missing> = Vec::new();
    for gap in missing {
        if !seen.iter().any(|other| other.what == gap.what && other.reason == gap.reason) {
            seen.push(Missing { at: gap.at.or_else(|| joint.place.clone()), ..gap });
        }
    }
    seen
}

fn resistance(assessment: &Assessment) -> Resistance {
    let (hogging, sagging) = (assessment.hogging.as_ref(), assessment.sagging.as_ref());
    let shear = assessment.shear.as_ref();
    let governs = (hogging.or(sagging).map(|m| m.governed_by.clone()))
        .or(assessment.axial.as_ref().map(|axial| axial.governed_by.clone()))
        .or(shear.map(|s| s.governed_by.clone()));
    Resistance {
        moment_knm: hogging.map(|m| m.moment.knm()),
        moment_reversed_knm: sagging.map(|m| m.moment.knm()),
        moment_without_welds_knm: hogging.or(sagging).map(|m| m.without_welds.knm()),
        shear_kn: shear.map(|s| s.shear.kn()),
        axial_kn: (assessment.cases.iter().filter_map(|case| case.axial.as_ref()))
            .map(|axial| axial.resistance.kn())
            .min_by(f64::total_cmp)
            .or(assessment.axial.as_ref().map(|axial| axial.force.kn())),
        governed_by: governs,
    }
}

fn required(assessment: Option<&Assessment>, scheduled: Option<&ScheduledJoint>) -> Vec<Required> {
    let cases = scheduled.map_or(&[][..], |s| &s.cases);
    let one = |(index, case): (usize, &crate::intent::LoadCase)| {
        let result = assessment.and_then(|a| a.cases.iter().find(|result| result.case == index));
        let worst: Option<&Verdict> = result
            .iter()
            .flat_map(|result| &result.verdicts)
            .filter(|v| v.utilisation.is_some())
            .max_by(|a, b| a.utilisation.unwrap_or(0.0).total_cmp(&b.utilisation.unwrap_or(0.0)));
        Required {
            case: case.name.clone(),
            moment_knm: case.moment.map(|m| m.knm()),
            shear_kn: case.shear.map(|v| v.kn()),
            axial_kn: case.axial.map(|n| n.kn()),
            tying_kn: case.tying.map(|force| force.kn()),
            utilisation: worst.and_then(|v| v.utilisation),
            governed_by: worst.map(|v| v.governed_by.clone()),
            moment_resistance_knm: result.and_then(|r| r.moment.as_ref()).map(|m| m.moment.knm()),
            at: Some(case.at.clone()),
        }
    };
    cases.iter().enumerate().map(one).collect()
}

/// Row forces and checks of the load case that uses the joint most, or at its own full resistance without one.
#[derive(Default)]
struct Leading {
    rows: Vec<RowResult>,
    row_basis: Option<RowBasis>,
    shear_case: Option<String>,
    stiffness: Option<StiffnessResult>,
    checks: Arc<[CheckResult]>,
}

/// Checks of like joints: the same resistances held against the same actions.
pub struct Checks {
    /// Of a fillet.
    least_throat: Length,
    known: Mutex<Known>,
}

/// By the addresses of the resistances.
type Known = HashMap<(usize, usize), Vec<(Held, Arc<[CheckResult]>)>>;

/// What checks are made from. Resistances are the same if they are one; they are kept here, so that no other takes its
/// address.
struct Held {
    moment: Option<Arc<MomentResistance>>,
    shear: Option<Arc<ShearResistance>>,
    /// The share of the moment resistance that is used; the required moment, kNm, and shear, kN.
    actions: [Option<f64>; 3],
}

impl Checks {
    /// None yet.
    pub fn new(least_throat: Length) -> Self {
        Self { least_throat, known: Mutex::default() }
    }

    fn of(&self, held: Held) -> Arc<[CheckResult]> {
        let bits = |held: &Held| held.actions.map(|action| action.map(f64::to_bits));
        let same = |(other, _): &&(Held, _)| bits(other) == bits(&held);
        let key = (held.moment.as_ref().map_or(0, address), held.shear.as_ref().map_or(0, address));
        if let Some((_, checks)) = self.locked().get(&key).and_then(|entries| entries.iter().find(same)) {
            return checks.clone();
        }
        let checks = held.checks(self.least_throat);
        self.locked().entry(key).or_default().push((held, checks.clone()));
        checks
    }

    fn locked(&self) -> MutexGuard<'_, Known> {
        // A panic elsewhere leaves the entries whole: each is pushed in one piece.
        self.known.lock().unwrap_or_else(PoisonError::into_inner)
    }
}

fn address<T>(of: &Arc<T>) -> usize {
    Arc::as_ptr(of).addr()
}

impl Held {
    fn checks(&self, least_throat: Length) -> Arc<[CheckResult]> {
        let [share, moment_knm, shear_kn] = self.actions;
        let mut checks = Vec::new();
        if let Some(moment) = &self.moment {
            let title = match moment.sense {
                Sense::Hogging => "moment, tension at the top",
                Sense::Sagging => "moment, tension at the bottom",
            };
            checks.push(check("moment", title, "EN 1993-1-8:2005 6.2.7", moment.moment.knm(), moment_knm, "kNm"));
            // At a smaller moment each component carries its share of what it carries at the full one.
            checks.extend(
                moment.components.iter().map(|c| component(c, share.map(|s| s * c.at_full.kn()), least_throat)),
            );
        }
        if let Some(shear) = &self.shear {
            let resistance = shear.shear.kn();
            let of_base = shear.components.iter().any(|c| c.id == BASE_IN_SHEAR);
            let title = if of_base { "shear" } else { "vertical shear" };
            let clause = if of_base { "EN 1993-1-8:2005 6.2.2" } else { "EN 1993-1-8:2005 3.6, 3.7" };
            checks.push(check("shear", title, clause, resistance, shear_kn, "kN"));
            checks.extend(shear.components.iter().map(|c| component(c, shear_kn, least_throat)));
        }
        checks.into()
    }
}

fn leading(assessment: &Assessment, scheduled: Option<&ScheduledJoint>, checks: &Checks) -> Leading {
    let use_of = |verdicts: &[Verdict], about: About| {
        verdicts.iter().find(|v| v.about == about).and_then(|v| v.utilisation).unwrap_or(0.0)
    };
    let by_moment = (assessment.cases.iter())
        .filter(|case| case.moment.is_some())
        .max_by(|a, b| use_of(&a.verdicts, About::Moment).total_cmp(&use_of(&b.verdicts, About::Moment)));
    let moment =
        by_moment.and_then(|c| c.moment.as_ref()).or(assessment.hogging.as_ref()).or(assessment.sagging.as_ref());
    let rows = moment.iter().flat_map(|m| &m.rows);
    let rows = rows
        .map(|row| RowResult {
            row: row.row,
            lever_arm_mm: row.lever_arm.get(),
            potential_kn: row.potential.kn(),
            force_kn: row.force.kn(),
            governed_by: row.governed_by.clone(),
        })
        .collect();
    let named = |case: usize| Some(scheduled?.cases.get(case)?.name.clone());
    let row_basis = moment.map(|m| RowBasis {
        case: by_moment.and_then(|case| named(case.case)),
        tension_at_top: m.sense == Sense::Hogging,
        beta: m.beta,
        of_rows_knm: m.without_welds.knm(),
        moment_knm: m.moment.knm(),
        notes: m.notes.clone(),
    });

    let stated = by_moment.and_then(|case| scheduled?.cases.get(case.case)?.moment);
    let stiffness = moment.and_then(|moment| stiffness(assessment, moment, scheduled, stated));
    let share = by_moment.map(|case| use_of(&case.verdicts, About::Moment));
    let moment_knm = stated.map(|m| m.knm().abs());
    let shear_case = assessment
        .cases
        .iter()
        .max_by(|a, b| use_of(&a.verdicts, About::Shear).total_cmp(&use_of(&b.verdicts, About::Shear)));
    let shear = shear_case.and_then(|case| case.shear.as_ref()).or(assessment.shear.as_ref());
    let verdict = shear_case.and_then(|case| case.verdicts.iter().find(|v| v.about == About::Shear));
    let actions = [share, moment_knm, verdict.and_then(|v| v.required)];
    let least_throat = checks.least_throat;
    let mut checks = checks.of(Held { moment: moment.cloned(), shear: shear.cloned(), actions });
    // Moment and axial force together: its use is their sum, not the force's own share.
    let together = (assessment.cases.iter())
        .filter_map(|case| Some((case.axial.as_ref()?, use_of(&case.verdicts, About::Axial))))
        .max_by(|a, b| a.1.total_cmp(&b.1));
    if let Some((axial, used)) = together {
        let result = component(axial, Some(axial.at_full.kn()), least_throat);
        let outcome = if used <= 1.0 { "met" } else { "unproven" };
        let result = CheckResult { utilisation: Some(used), outcome, ..result };
        checks = checks.iter().cloned().chain([result]).collect();
    }
    if !assessment.tying.is_empty() {
        let stated = scheduled.iter().flat_map(|s| &s.cases).filter_map(|case| case.tying);
        let most = stated.map(|force| force.kn().abs()).max_by(f64::total_cmp);
        let tying = assessment.tying.iter().map(|c| component(c, most, least_throat));
        checks = checks.iter().cloned().chain(tying).collect();
    }
    if !assessment.beside.is_empty() {
        let beside = assessment.beside.iter().map(|(part, force)| component(part, force.map(Force::kn), least_throat));
        checks = beside.chain(checks.iter().cloned()).collect();
    }
    let shear_case = shear_case.filter(|case| case.shear.is_some()).and_then(|case| named(case.case));
    Leading { rows, row_basis, shear_case, stiffness, checks }
}

fn stiffness(
    assessment: &Assessment,
    moment: &MomentResistance,
    scheduled: Option<&ScheduledJoint>,
    required: Option<Moment>,
) -> Option<StiffnessResult> {
    let joint = moment.stiffness.as_ref()?;
    let frame = scheduled.map(|s| s.frame).unwrap_or_default();
    let classified = classify(moment, joint, &frame, required);
    Some(StiffnessResult {
        sense: match moment.sense {
            Sense::Hogging => "tension at the top",
            Sense::Sagging => "tension at the bottom",
        },
        beta: moment.beta,
        initial: joint.initial.knm_per_rad(),
        at_required: classified.at_required.map(|s| s.knm_per_rad()),
        lower_bound: assessment.at_bound(),
        lever_arm_mm: joint.lever_arm.get(),
        springs: joint.springs.iter().map(|spring| (spring.title.clone(), spring.k.map(|k| k.get()))).collect(),
        rigid_from: classified.limits.map(|(rigid, _)| rigid.knm_per_rad()),
        pinned_up_to: classified.limits.map(|(_, pinned)| pinned.knm_per_rad()),
        class: match classified.by_stiffness {
            Ok(class) => class.word().into(),
            Err(why) => format!("not stated: {why}"),
        },
        assumed: frame.class.map(JointClass::word),
        strength: classified.by_strength,
        rotation: joint.rotation.clone(),
        notes: classified.notes,
        working: classified.working.into(),
    })
}

fn component(component: &Component, action: Option<f64>, least_throat: Length) -> CheckResult {
    let mut result = check(&component.id, &component.title, component.clause, component.resistance.kn(), action, "kN");
    result.working = component.working.clone();
    let force = action.map_or(component.at_full, kn);
    result.needed_throat_mm =
        component.needed_throat(force, least_throat).map(Length::get).filter(|_| force.get() > 0.0);
    result
}

fn check(id: &str, title: &str, clause: &str, resistance: f64, action: Option<f64>, unit: &'static str) -> CheckResult {
    let utilisation = action.map(|a| a / resistance).filter(|u| u.is_finite());
    CheckResult {
        id: id.into(),
        title: title.into(),
        clause: clause.into(),
        resistance: Some(resistance).filter(|r| r.is_finite()),
        action,
        unit,
        utilisation,
        outcome: match utilisation {
            Some(u) if u <= 1.0 => "met",
            Some(_) => "not met",
            None => "unproven",
        },
        needed_throat_mm: None,
        working: Default::default(),
    }
}
