//! The bolted end-plate joint between a beam and a column's flange, EN 1993-1-8:2005 6.2.

mod axial;
mod intended;
mod limits;
mod moment;
pub(in crate::assess) mod numbers;
mod rows;
mod shear;
mod solver;
pub(in crate::assess) mod sound;
mod strengthening;
mod totals;
mod turning;
mod weld_checks;

pub use intended::{intended, intended_layout, with_category};
pub(in crate::assess) use numbers::Noted;
use numbers::{Numbers, PlateSide};
use shear::Tension;
use solver::Solved;
pub use solver::Solver;

use std::sync::Arc;

use super::{About, Assessment, CaseResult, Component, Gap, MomentResistance, RowForce, Sense, State, Verdict, simple};
use crate::intent::LoadCase;
use crate::joints::BoltedPlate;
use crate::origin::{Ask, Missing};
use crate::rulebook::{RowForces, Rulebook};
use crate::units::{Force, Length, Moment};

/// What stands on the column's other flange in a load case.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Opposite {
    /// No joint there.
    None,
    /// A joint with this moment, positive with tension at its top.
    Moment(Moment),
    /// A joint whose moment nobody states: β at its upper bound.
    NotStated,
    /// Something whose moment does not tell the panel's shear, and why, in one clause: β at its upper bound.
    Unclear(&'static str),
}

/// One load case with what happens on the other side.
#[derive(Clone, Debug)]
pub struct Demand<'a> {
    /// The load case.
    pub case: &'a LoadCase,
    /// The other side.
    pub opposite: Opposite,
}

/// What acts beside the moment and lowers its resistance.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(non_snake_case, reason = "the standard's symbol")]
struct Beside {
    /// The beam's shear; 0 where none is stated.
    V_Ed: Force,
    /// N_col,Ed (positive in tension) and M_col,Ed at the joint, where both are stated.
    column: Option<(Force, Moment)>,
}

impl Beside {
    const NOTHING: Self = Self { V_Ed: Force::ZERO, column: None };

    fn of(case: &LoadCase) -> Self {
        Self { V_Ed: case.shear.map_or(Force::ZERO, Force::abs), column: case.column_axial.zip(case.column_moment) }
    }
}

/// The upper bound of β, 5.3(9).
const BETA_MAX: f64 = 2.0;

/// Why a resistance is only a lower bound where β was put at its upper bound.
pub const BOUND_BY_OPPOSITE: &str =
    "the resistance is only a lower bound: the moment on the column's other flange is not known";

/// Why a shear resistance is only a lower bound in a load case that leaves M blank.
pub const BOUND_BY_TENSION: &str =
    "the resistance is only a lower bound: M is not stated, and the bolts are taken as fully in tension";

/// Why the resistance in the sense that leaves out the haunch is only a lower bound.
const BOUND_BY_HAUNCH: &str =
    "the resistance is only a lower bound: the haunch is not credited with tension at the bottom";

/// The same beside an axial tension that is not neglected.
const BOUND_BY_AXIAL: &str =
    "the resistance is only a lower bound: beside the axial tension the bolts are taken as fully in tension";

/// The same where something that would raise it is not known.
fn lower_bound(gaps: &[Gap]) -> Option<String> {
    let mut unknown: Vec<&str> = Vec::new();
    for gap in gaps {
        if let Gap::LowerBound(missing) = gap
            && !unknown.contains(&missing.what.as_str())
        {
            unknown.push(&missing.what);
        }
    }
    (!unknown.is_empty()).then(|| format!("the resistance is only a lower bound: not known: {}", unknown.join(", ")))
}

/// β = |1 − M_2/M_1| ≤ 2, 5.3(9) (5.4), moments positive with tension at the top on either side.
fn beta(own: Moment, opposite: Opposite) -> f64 {
    match opposite {
        Opposite::None => 1.0,
        Opposite::NotStated | Opposite::Unclear(_) => BETA_MAX,
        Opposite::Moment(other) if own == Moment::ZERO => {
            if other == Moment::ZERO {
                1.0
            } else {
                BETA_MAX
            }
        }
        Opposite::Moment(other) => (1.0 - other / own).abs().min(BETA_MAX),
    }
}

/// Whether β is only bounded.
fn at_bound(opposite: Opposite) -> bool {
    matches!(opposite, Opposite::NotStated | Opposite::Unclear(_))
}

/// Assesses an end-plate joint or splice as laid out, against load cases if there are any. `two_sided`: whether a joint stands on the column's
/// other flange (then, without load cases, β is at its upper bound).
pub fn assess<'l>(
    layout: impl Into<BoltedPlate<'l>>,
    demands: &[Demand<'_>],
    two_sided: bool,
    rulebook: &Rulebook,
) -> Assessment {
    assess_with(&Solver::new(rulebook), layout, demands, two_sided)
}

/// The same with a solver that remembers what it solved for other joints.
pub fn assess_with<'l>(
    solver: &Solver<'_>,
    layout: impl Into<BoltedPlate<'l>>,
    demands: &[Demand<'_>],
    two_sided: bool,
) -> Assessment {
    let rulebook = solver.rulebook;
    let mut noted = Noted::default();
    let numbers = Numbers::gather(layout.into(), rulebook, &mut noted).map(Arc::new);
    let mut assessment = Assessment { ..Assessment::default() };
    if let Some(n) = &numbers {
        let without: Vec<&LoadCase> =
            demands.iter().map(|demand| demand.case).filter(|case| Beside::of(case).column.is_none()).collect();
        if n.column().is_some() && (demands.is_empty() || !without.is_empty()) {
            let names: Vec<&str> = without.iter().map(|case| case.name.as_str()).collect();
            let at = if without.len() < demands.len() { format!(" in {}", names.join(", ")) } else { String::new() };
            noted.assumptions.push(format!(
                "k_wc = {}{at}: the column's axial stress is not stated (6.2.6.2(2))",
                rulebook.settings.k_wc
            ));
        }
        noted.assumptions.push("the compression flange bears on the end plate in contact: its weld is not checked in compression (common practice without a source)".into());
        let plain_beta = if two_sided { BETA_MAX } else { 1.0 };
        if n.side.haunch.is_some() {
            noted.assumptions.push("with tension at the bottom the haunch and the rows beside it are left out".into());
        }
        let turned = Arc::new(n.upside_down());
        let solve = |sense: Sense, beta: f64, beside: Beside, rule: Option<RowForces>| {
            solver.moment(if sense == Sense::Hogging { n } else { &turned }, sense, beta, beside, rule)
        };
        // The side that no case asks for keeps no proof back.
        let needed = |sense| {
            demands.is_empty() && sense == Sense::Hogging
                || demands.iter().any(|d| d.case.moment.is_some_and(|m| sense_of(m) == sense))
        };
        for (sense, n) in [(Sense::Hogging, n), (Sense::Sagging, &turned)] {
            if needed(sense) {
                noted.gaps.extend(strengthening::short_in_compression(n));
            }
        }
        let at_rest = |sense, noted: &mut Noted| match solve(
            sense,
            plain_beta,
            Beside::NOTHING,
            Some(rulebook.settings.row_forces),
        ) {
            Ok(resistance) => Some(resistance),
            Err(reason) => {
                let what = if sense == Sense::Hogging { "tension at the top" } else { "tension at the bottom" };
                if needed(sense) {
                    noted.gaps.push(Gap::NotChecked(Missing {
                        what: format!("moment with {what}"),
                        reason,
                        at: None,
                        ask: Ask::Method,
                    }));
                }
                None
            }
        };
        assessment.hogging = at_rest(Sense::Hogging, &mut noted);
        assessment.sagging = at_rest(Sense::Sagging, &mut noted);
        let n_pl = n.least(|side| side.beam.area * side.beam_strength.f_y_flange / rulebook.annex.gamma_m0);
        let lower_bound = lower_bound(&noted.gaps);
        let at_rest = [&assessment.hogging, &assessment.sagging];
        let reach = at_rest.map(|m| m.as_ref().map(|m| m.web_in_tension));
        let unknown = Tension::Unknown {
            // A sense that can't be solved may take all of the web.
            web_in_tension: reach
                .into_iter()
                .map(|reach| reach.unwrap_or(n.side.beam.h))
                .fold(Length::ZERO, Length::max),
        };
        let context = Cases { n, turned: &turned, solver, rulebook, n_pl, lower_bound, unknown, solve: &solve };
        for (case, demand) in demands.iter().enumerate() {
            assessment.cases.push(context.result(case, demand));
        }
        govern(&mut assessment, demands);
        noted.assumptions.extend(at_upper_bound(&assessment, demands, two_sided));
        let tension = assessment.hogging.as_ref().or(assessment.sagging.as_ref());
        let tension = tension.map_or(unknown, |moment| Tension::Rows(moment, 1.0));
        assessment.shear = Some(solver.shear(n, tension));
    } else {
        for (case, demand) in demands.iter().enumerate() {
            assessment.cases.push(CaseResult {
                case,
                verdicts: not_computed(demand.case),
                moment: None,
                shear: None,
                axial: None,
            });
        }
    }
    assessment.gaps = noted.gaps;
    assessment.not_credited = noted.not_credited;
    assessment.assumptions = noted.assumptions;
    assessment.inputs = noted.inputs;
    assessment
}

fn sense_of(moment: Moment) -> Sense {
    if moment < Moment::ZERO { Sense::Sagging } else { Sense::Hogging }
}

/// With load cases, the joint's own resistance is that of the case that uses it most, in each sense.
fn govern(assessment: &mut Assessment, demands: &[Demand<'_>]) {
    for sense in [Sense::Hogging, Sense::Sagging] {
        let used = |case: &&CaseResult| {
            let required = demands[case.case].case.moment.unwrap_or(Moment::ZERO).abs();
            case.moment.as_ref().map_or(0.0, |m| required / m.moment)
        };
        let worst = (assessment.cases.iter())
            .filter(|case| case.moment.as_ref().is_some_and(|m| m.sense == sense))
            .max_by(|a, b| used(a).total_cmp(&used(b)));
        if let Some(moment) = worst.and_then(|case| case.moment.clone()) {
            match sense {
                Sense::Hogging => assessment.hogging = Some(moment),
                Sense::Sagging => assessment.sagging = Some(moment),
            }
        }
    }
}

/// Where β was put at its upper bound for want of the moment on the other side: load cases, and resistances of a sense
/// that no load case asks for. One sentence each.
fn at_upper_bound(assessment: &Assessment, demands: &[Demand<'_>], two_sided: bool) -> Vec<String> {
    const BOUND: &str = "β = 2, its upper bound (5.3(9)),";
    let mut whys: Vec<&str> = Vec::new();
    let mut sentences = Vec::new();
    let why = |opposite| match opposite {
        Opposite::NotStated => Some("the moment on the column's other flange is not stated"),
        Opposite::Unclear(why) => Some(why),
        Opposite::None | Opposite::Moment(_) => None,
    };
    whys.extend(demands.iter().filter(|demand| demand.case.moment.is_some()).filter_map(|demand| why(demand.opposite)));
    whys.dedup();
    for reason in whys {
        let cases = demands.iter().filter(|d| d.case.moment.is_some() && why(d.opposite) == Some(reason));
        let names: Vec<&str> = cases.map(|demand| demand.case.name.as_str()).collect();
        sentences.push(format!("{BOUND} in {}: {reason}", names.join(", ")));
    }
    if !two_sided {
        return sentences;
    }
    let asked = |sense| assessment.cases.iter().any(|c| c.moment.as_ref().is_some_and(|m| m.sense == sense));
    let which = match (
        assessment.hogging.is_some() && !asked(Sense::Hogging),
        assessment.sagging.is_some() && !asked(Sense::Sagging),
    ) {
        (true, true) => "in both senses",
        (true, false) => "with tension at the top",
        (false, true) => "with tension at the bottom",
        (false, false) => return sentences,
    };
    sentences.push(format!(
        "{BOUND} for the moment resistance {which}: no load case asks for it, and beams meet both column flanges"
    ));
    sentences
}

fn not_computed(case: &LoadCase) -> Vec<Verdict> {
    let reason = "an input is missing";
    let unproven = |about, required, unit| simple::unproven(about, required, unit, reason.into());
    let mut verdicts = vec![
        unproven(About::Moment, case.moment.map(|m| m.knm()), "kNm"),
        unproven(About::Shear, case.shear.map(|v| v.kn()), "kN"),
        unproven(About::Axial, case.axial.map(|n| n.kn()), "kN"),
    ];
    verdicts.extend(tying(case));
    verdicts
}

/// A tying force on a joint that carries a moment has no method here.
fn tying(case: &LoadCase) -> Option<Verdict> {
    let reason = "the resistance to tying of this kind of joint is not assessed yet";
    case.tying.map(|force| simple::unproven(About::Tying, Some(force.kn()), "kN", reason.into()))
}

struct Cases<'a, F> {
    n: &'a Arc<Numbers>,
    turned: &'a Arc<Numbers>,
    solver: &'a Solver<'a>,
    rulebook: &'a Rulebook,
    n_pl: crate::units::Force,
    /// Why the resistances are a lower bound, if they are: then "not met" is not proven.
    lower_bound: Option<String>,
    /// The bolts' tension where the moment is not known.
    unknown: Tension<'a>,
    solve: &'a F,
}

impl<F: Fn(Sense, f64, Beside, Option<RowForces>) -> Solved> Cases<'_, F> {
    /// The moment resistance of a case. Where an unknown makes it a lower bound, it must be one beyond the cliff of
    /// 6.2.7.2(9) too: what is unknown may raise a row above 1.9 F_t,Rd and so lower the rows below it.
    fn moment(&self, m: Moment, opposite: Opposite, beside: Beside) -> Solved {
        let sense = sense_of(m);
        let rule = self.rulebook.settings.row_forces;
        let solved = (self.solve)(sense, beta(m, opposite), beside, Some(rule))?;
        let steep = |row: &RowForce| !(row.force <= 1.9 * self.n.bolts.F_t_Rd);
        let unknown = rule == RowForces::LinearBeyond19
            && (self.lower_bound.is_some()
                || self.without_haunch(sense).is_some()
                || at_bound(opposite) && (self.solve)(sense, 0.0, beside, Some(rule))?.rows.iter().any(steep));
        if !unknown || solved.rows.first().is_some_and(steep) {
            return Ok(solved);
        }
        let linear = (self.solve)(sense, solved.beta, beside, None)?;
        Ok(if linear.without_welds < solved.without_welds { linear } else { solved })
    }

    /// Why the resistance in this sense leaves out a haunch, if it does.
    fn without_haunch(&self, sense: Sense) -> Option<&'static str> {
        (sense == Sense::Sagging && self.n.side.haunch.is_some()).then_some(BOUND_BY_HAUNCH)
    }

    fn result(&self, case: usize, demand: &Demand<'_>) -> CaseResult {
        let LoadCase { moment, shear, axial, .. } = demand.case;
        let mut verdicts = Vec::new();
        let beside = Beside::of(demand.case);
        let solved = moment.map(|m| self.moment(m, demand.opposite, beside));
        let bound = at_bound(demand.opposite).then_some(BOUND_BY_OPPOSITE);
        let bound = bound.or(moment.and_then(|m| self.without_haunch(sense_of(m))));
        match (moment, &solved) {
            (Some(m), Some(Ok(resistance))) => {
                let governed = if resistance.moment < resistance.without_welds {
                    component_governing(resistance)
                } else {
                    resistance.governed_by.clone()
                };
                verdicts.push(self.verdict(
                    About::Moment,
                    m.knm().abs(),
                    resistance.without_welds.knm(),
                    "kNm",
                    governed,
                    bound,
                ));
                if self.n.sides().all(PlateSide::welds_known) {
                    verdicts.push(self.weld_verdict(*m, resistance, bound));
                }
            }
            (_, Some(Err(reason))) => verdicts.push(unproven(About::Moment, *moment, reason.clone())),
            _ => verdicts.push(unproven(About::Moment, None, "M is not stated".into())),
        }
        let solved = solved.and_then(Result::ok);
        // Tension that counts pulls at rows on both sides: every bolt may be fully used.
        let pulled = axial.is_some_and(|n| n > self.neglected());
        let tension = match (&solved, moment) {
            (Some(resistance), Some(m)) if !pulled => {
                let share = m.abs() / resistance.without_welds;
                Tension::Rows(resistance, if share.is_finite() { share.min(1.0) } else { 1.0 })
            }
            _ => self.unknown,
        };
        let shear_resistance = shear.map(|_| self.solver.shear(self.n, tension));
        verdicts.push(match (shear, &shear_resistance) {
            (Some(v), Some(resistance)) => {
                let (kn, governed) = (resistance.shear.kn(), resistance.governed_by.clone());
                let bound = match (&solved, pulled) {
                    (None, _) => Some(BOUND_BY_TENSION),
                    (Some(_), true) => Some(BOUND_BY_AXIAL),
                    (Some(_), false) => None,
                };
                let mut verdict = self.verdict(About::Shear, v.kn().abs(), kn, "kN", governed, bound);
                // More than the bolts carry without any tension is proven not to be carried, whatever is not known.
                let most = || self.solver.shear(self.n, Tension::None).shear;
                if verdict.state == State::Unproven && v.get().is_finite() && v.abs() > most() {
                    (verdict.state, verdict.reason) = (State::NotMet, None);
                }
                verdict
            }
            _ => unproven_shear(),
        });
        let (verdict, together) = self.axial(*axial, moment.zip(solved.as_deref()), beside, bound);
        verdicts.push(verdict);
        verdicts.extend(tying(demand.case));
        CaseResult { case, verdicts, moment: solved, shear: shear_resistance, axial: together }
    }

    /// Up to here N may be neglected, 6.2.7.1(2).
    fn neglected(&self) -> Force {
        self.rulebook.settings.axial_limit * self.n_pl
    }

    /// N against the limit of 6.2.7.1(2), and beyond it M and N together, 6.2.7.1(3).
    fn axial(
        &self,
        axial: Option<Force>,
        moment: Option<(Moment, &MomentResistance)>,
        beside: Beside,
        bound: Option<&str>,
    ) -> (Verdict, Option<Component>) {
        let limit = self.neglected();
        let percent = 100.0 * self.rulebook.settings.axial_limit;
        let left = |reason: String| {
            let (required, resistance) = (axial.map(|n| n.kn()), Some(limit.kn()));
            Verdict { unit: "kN", required, resistance, ..unproven(About::Axial, None, reason) }
        };
        let Some(n) = axial else { return (left("N is not stated".into()), None) };
        if n.abs() <= limit {
            let governed_by = format!("within {percent:.0} % of N_pl,Rd, neglected by 6.2.7.1(2)");
            return (Verdict { state: State::Met, governed_by, reason: None, ..left(String::new()) }, None);
        }
        let beyond = |why: &str| {
            left(format!("N = {n} is above {percent:.0} % of the beam's N_pl,Rd ({limit}), 6.2.7.1(2): {why}"))
        };
        let Some((m, resistance)) = moment else {
            return (beyond("moment with axial force needs the moment and its resistance"), None);
        };
        if self.n.side.haunch.is_some() {
            return (beyond("moment with axial force of a haunched beam is not assessed yet"), None);
        }
        let (beta, rule) = (resistance.beta, Some(self.rulebook.settings.row_forces));
        let own = if n < Force::ZERO {
            let sense = |sense| (self.solve)(sense, beta, beside, rule);
            sense(Sense::Hogging)
                .and_then(|hogging| Ok(axial::compression(self.n, self.turned, [&*hogging, &*sense(Sense::Sagging)?])))
        } else {
            axial::tension(self.n, self.turned, beta, rule, self.rulebook)
        };
        let own = match own {
            Ok(own) => own,
            Err(why) => return (beyond(&why), None),
        };
        let (used, component) = axial::interaction((m, resistance.moment), (n, &own));
        let met = used <= 1.0 + self.rulebook.tolerances.utilisation;
        let by = "the conservative method of 6.2.7.1(3)";
        let reason = match bound.or(self.lower_bound.as_deref()) {
            Some(bound) => format!("M and N together come to {used:.2} by {by}; {bound}"),
            None => format!("M and N together come to {used:.2} by {by}, which proves no failure"),
        };
        let verdict = Verdict {
            about: About::Axial,
            state: if met { State::Met } else { State::Unproven },
            required: Some(n.kn()),
            resistance: Some(own.force.kn()),
            unit: "kN",
            utilisation: Some(used).filter(|used| used.is_finite()),
            governed_by: component.title.clone(),
            reason: (!met).then_some(reason),
        };
        (verdict, Some(component))
    }

    fn verdict(
        &self,
        about: About,
        required: f64,
        resistance: f64,
        unit: &'static str,
        governed_by: String,
        bound: Option<&str>,
    ) -> Verdict {
        let utilisation = required / resistance;
        let met = required <= resistance * (1.0 + self.rulebook.tolerances.utilisation);
        let number = required.is_finite() && resistance.is_finite();
        let bound = if number { bound.or(self.lower_bound.as_deref()) } else { Some("it comes to no number") };
        Verdict {
            about,
            state: match met && number {
                true => State::Met,
                false if bound.is_some() => State::Unproven,
                false => State::NotMet,
            },
            required: Some(required),
            resistance: Some(resistance),
            unit,
            utilisation: Some(utilisation).filter(|u| u.is_finite()),
            governed_by,
            reason: bound.filter(|_| !(met && number)).map(str::to_owned),
        }
    }

    fn weld_verdict(&self, required: Moment, resistance: &MomentResistance, bound: Option<&str>) -> Verdict {
        // The welds' share of the moment: they limit it at moment/without_welds, or carry more than the rest can bring.
        let used = |c: &Component| if c.at_full == Force::ZERO { 0.0 } else { (c.at_full / c.resistance).abs() };
        let worst = (resistance.components.iter())
            .filter(|c| matches!(c.id.as_str(), "flange-weld" | "web-weld"))
            .max_by(|a, b| used(a).total_cmp(&used(b)));
        let Some(worst) = worst else {
            if !self.n.sides().all(PlateSide::no_fillet_pulled) {
                return unproven(About::Weld, Some(required), "no weld could be computed".into());
            }
            let limit = resistance.without_welds.knm();
            let governs = "butt weld as strong as the weaker part".into();
            return self.verdict(About::Weld, required.knm().abs(), limit, "kNm", governs, bound);
        };
        // Without a row in tension nothing pulls at the welds: they carry as much as the rest does.
        let limit = match used(worst) {
            0.0 => resistance.without_welds,
            used => resistance.without_welds / used,
        };
        self.verdict(About::Weld, required.knm().abs(), limit.knm(), "kNm", worst.title.clone(), bound)
    }
}

/// What governs besides the welds.
fn component_governing(resistance: &MomentResistance) -> String {
    let cut = resistance.rows.iter().find(|row| !(row.force >= row.potential));
    cut.or(resistance.rows.first()).map_or_else(String::new, |row| row.governed_by.clone())
}

fn unproven(about: About, required: Option<Moment>, reason: String) -> Verdict {
    simple::unproven(about, required.map(|m| m.knm()), "kNm", reason)
}

fn unproven_shear() -> Verdict {
    Verdict { unit: "kN", ..unproven(About::Shear, None, "V is not stated".into()) }
}
