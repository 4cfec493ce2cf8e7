//! Column bases: axial force below the three T-stubs, moment with axial force by equilibrium of both sides, shear by friction
//! and anchors. What the concrete itself does with the anchors is its designer's.
#![allow(non_snake_case)]

mod numbers;

use std::sync::Arc;

use numbers::{Numbers, flange_in_compression, part, stated_in};

use super::{against, unproven, weakest};
use crate::assess::end_plate::Noted;
use crate::assess::{About, Assessment, AxialResistance, CaseResult, Component, Gap, ShearResistance, State, Verdict};
use crate::eurocode::column_base;
use crate::intent::{IntendedDetail, LoadCase};
use crate::joints::ColumnBase;
use crate::origin::{Ask, Missing};
use crate::rulebook::Rulebook;
use crate::units::{Force, Moment};
use crate::working::Working;

/// The base with the foundation that a detail states.
pub fn with_foundation(base: &ColumnBase, detail: &IntendedDetail) -> Option<ColumnBase> {
    let stated = detail.base.clone()?;
    let origin = stated_in(&detail.name, detail.at.as_ref());
    Some(ColumnBase { foundation: Some((stated, origin)), ..base.clone() })
}

/// Assesses a base against load cases if there are any.
pub fn assess(base: &ColumnBase, cases: &[&LoadCase], rulebook: &Rulebook) -> Assessment {
    let mut noted = Noted::default();
    noted.not_credited.extend(base.beside.iter().cloned());
    let numbers = Numbers::gather(base, rulebook, &mut noted);
    let mut assessment = Assessment::default();
    let mut needs_anchors = cases.is_empty();
    if let Some(n) = &numbers {
        for some in [&n.of_anchors, &n.of_flange] {
            noted.inputs.extend(some.inputs.iter().cloned());
            noted.assumptions.extend(some.assumptions.iter().cloned());
        }
        noted.assumptions.extend(ASSUMED.map(String::from));
        let bound = lower_bound(&noted);
        let foot = Foot { n, rulebook, bound: bound.as_deref() };
        assessment.axial = foot.axial();
        assessment.shear = foot.shear(Force::ZERO, 0).ok().map(Arc::new);
        let results: Vec<Held> = cases.iter().map(|case| foot.held(case)).collect();
        needs_anchors |= results.iter().any(|held| held.needs_anchors);
        if cases.is_empty() || results.iter().any(|held| held.in_tension) {
            noted.gaps.extend(n.of_flange.gaps.iter().cloned());
        }
        let most = |held: &Held| held.verdicts.iter().filter_map(|v| v.utilisation).fold(0.0, f64::max);
        let leading = results.iter().max_by(|a, b| most(a).total_cmp(&most(b)));
        assessment.beside = leading.map_or_else(|| foot.parts(), |held| held.parts.clone());
        let result = |(case, held): (usize, Held)| CaseResult {
            case,
            verdicts: held.verdicts,
            moment: None,
            shear: held.shear.map(Arc::new),
            axial: None,
        };
        assessment.cases = results.into_iter().enumerate().map(result).collect();
        if needs_anchors {
            noted.gaps.extend(n.of_anchors.gaps.iter().cloned());
            if !n.held {
                let reason = "pull-out, cone and edge failure of the concrete are its designer's to check (EN 1992-4): \
                              anchors_held = true in the detail's base says that it is done";
                noted.not_checked("anchors in the concrete", reason.into(), Ask::Engineer);
            }
        }
    } else {
        let all = |(case, _)| CaseResult {
            case,
            verdicts: vec![unproven(About::Force, None, "kN", "an input is missing".into())],
            moment: None,
            shear: None,
            axial: None,
        };
        assessment.cases = cases.iter().enumerate().map(all).collect();
    }
    let Noted { inputs, assumptions, gaps, not_credited } = noted;
    Assessment { inputs, assumptions, gaps, not_credited, ..assessment }
}

/// What is assumed of every base.
const ASSUMED: [&str; 3] = [
    "the column's end is sawn square and bears on the plate in contact: its welds carry tension and shear only",
    "friction of 0.20 stands for a bed of sand and cement mortar (6.2.2(6)); other beds need a test",
    "the moment acts about the column's major axis, the shear along its web",
];

fn lower_bound(noted: &Noted) -> Option<String> {
    noted.gaps.iter().find_map(|gap| match gap {
        Gap::LowerBound(Missing { what, .. }) => {
            Some(format!("the resistance is only a lower bound: not known: {what}"))
        }
        Gap::NotChecked(_) => None,
    })
}

/// One load case held against the base.
struct Held {
    verdicts: Vec<Verdict>,
    parts: Vec<(Component, Option<Force>)>,
    shear: Option<ShearResistance>,
    needs_anchors: bool,
    in_tension: bool,
}

struct Foot<'a> {
    n: &'a Numbers,
    rulebook: &'a Rulebook,
    bound: Option<&'a str>,
}

impl Foot<'_> {
    /// The T-stubs below all of the column.
    fn concrete(&self) -> Option<Component> {
        let all = &self.n.concrete.as_ref()?.all;
        let clause = "EN 1993-1-8:2005 6.2.8.2";
        Some(part("concrete-in-compression", "concrete below the base plate", clause, all.value, all.working.clone()))
    }

    /// N_j,Rd in compression; `None` where the concrete or the column's class leaves it open.
    fn axial(&self) -> Option<AxialResistance> {
        let components = [self.concrete()?, self.n.squash.clone()?];
        let least = weakest(&components)?;
        Some(AxialResistance {
            force: least.resistance,
            governed_by: least.title.clone(),
            working: least.working.clone(),
        })
    }

    /// What can be said without a load case.
    fn parts(&self) -> Vec<(Component, Option<Force>)> {
        let tension = self.n.tension.iter().flat_map(|(parts, _)| parts.iter().cloned());
        let all = self.concrete().into_iter().chain(self.n.squash.clone()).chain(tension);
        all.map(|component| (component, None)).collect()
    }

    fn held(&self, case: &LoadCase) -> Held {
        let mut held =
            Held { verdicts: Vec::new(), parts: Vec::new(), shear: None, needs_anchors: false, in_tension: false };
        let compressed = case.axial.map(|n| (-n).max(Force::ZERO));
        let compression = self.concrete().into_iter().chain(self.n.squash.clone());
        held.parts.extend(compression.map(|component| (component, compressed)));
        held.verdicts.push(match case.axial {
            None => unproven(About::Force, None, "kN", "N is not stated".into()),
            // A tension is held with the moment, by the anchors of both sides.
            Some(n) if n > Force::ZERO => self.pulled(n),
            Some(n) => self.compressed(n),
        });
        // How many sides are in tension: both where nobody can say.
        let mut sides_in_tension = 2;
        match (case.axial, case.moment) {
            (_, None) => held.verdicts.push(unproven(About::Moment, None, "kNm", "M is not stated".into())),
            (None, Some(m)) => {
                let reason = "N, which stands beside it, is not stated";
                held.verdicts.push(unproven(About::Moment, Some(m.knm()), "kNm", reason.into()));
            }
            (Some(n), Some(m)) if m == Moment::ZERO => sides_in_tension = if n > Force::ZERO { 2 } else { 0 },
            (Some(n), Some(m)) => {
                let (verdict, sides) = self.bent(n, m.abs(), case.shear.unwrap_or(Force::ZERO).abs(), &mut held);
                sides_in_tension = sides;
                held.verdicts.push(verdict);
            }
        }
        held.in_tension = sides_in_tension > 0;
        held.needs_anchors |= held.in_tension;
        match case.shear {
            None => held.verdicts.push(unproven(About::Shear, None, "kN", "V is not stated".into())),
            Some(v) => self.sheared(v.abs(), case.axial.unwrap_or(Force::ZERO), sides_in_tension, &mut held),
        }
        held
    }

    fn compressed(&self, n: Force) -> Verdict {
        let (Some(concrete), Some(squash)) = (self.concrete(), self.n.squash.clone()) else {
            return unproven(About::Force, Some(n.kn()), "kN", "no resistance could be computed".into());
        };
        match weakest(&[concrete, squash]) {
            Some(least) => {
                Verdict { required: Some(n.kn()), ..against(About::Force, n.abs(), least, self.bound, self.rulebook) }
            }
            None => unproven(About::Force, Some(n.kn()), "kN", "the resistance is no number".into()),
        }
    }

    /// N_Ed in tension on both sides' anchors alike.
    fn pulled(&self, n: Force) -> Verdict {
        let side = self
            .n
            .tension
            .as_ref()
            .map_err(Clone::clone)
            .and_then(|(parts, _)| weakest(parts).ok_or_else(|| "the resistance is no number".to_owned()));
        match side {
            Ok(side) => {
                let both = Component { resistance: 2.0 * side.resistance, ..side.clone() };
                against(About::Force, n, &both, self.bound, self.rulebook)
            }
            Err(reason) => unproven(About::Force, Some(n.kn()), "kN", reason),
        }
    }

    /// M with N, and how many sides are in tension.
    fn bent(&self, n: Force, m: Moment, v: Force, held: &mut Held) -> (Verdict, usize) {
        let open = |reason: &str| unproven(About::Moment, Some(m.knm()), "kNm", reason.to_owned());
        let Some(concrete) = &self.n.concrete else {
            return (open("the concrete below the base plate is not known"), 2);
        };
        let z_T = self.n.tension.as_ref().map(|(_, z_T)| *z_T);
        let Some(((F_C_Ed, F_T_Ed), w)) = column_base::sides(m, n, concrete.z_C, z_T.as_ref().ok().copied()) else {
            return (open(z_T.as_ref().err().map_or("the anchors are not assessed in tension", |why| why.as_str())), 2);
        };
        let flange = match flange_in_compression(self.n, v, self.rulebook) {
            Ok(flange) => flange,
            Err(reason) => return (open(&reason), 2),
        };
        let with = |component: &Component| {
            let mut working = Working::clone(&component.working);
            working.heading("actions on both sides");
            working.absorb(w.clone());
            Component { working: working.into(), ..component.clone() }
        };
        let clause = "EN 1993-1-8:2005 6.2.6.9";
        let stub = concrete.flange.clone();
        let below = part("concrete-below-flange", "concrete below the flange", clause, stub.value, stub.working);
        let mut parts = vec![(with(&below), F_C_Ed), (flange, F_C_Ed)];
        if let (true, Ok((anchors, _))) = (F_T_Ed > Force::ZERO, &self.n.tension) {
            parts.extend(anchors.iter().map(|component| (with(component), F_T_Ed)));
        }
        let sides = match (F_T_Ed > Force::ZERO, F_C_Ed > Force::ZERO) {
            (false, _) => 0,
            (true, true) => 1,
            (true, false) => 2,
        };
        let used = |(component, force): &(Component, Force)| *force / component.resistance;
        let number = parts.iter().map(used).all(f64::is_finite);
        let most = parts.iter().max_by(|a, b| used(a).total_cmp(&used(b)));
        let verdict = match most {
            Some(most) if number => {
                let u = used(most);
                // With N in proportion, as Table 6.7 has it.
                let as_moment = Component { resistance: Force(m.get() / u), ..most.0.clone() };
                let verdict = against(About::Moment, Force(m.get()), &as_moment, self.bound, self.rulebook);
                let moment = |u: f64| m.knm() / u;
                Verdict { required: Some(m.knm()), resistance: Some(moment(u)), unit: "kNm", ..verdict }
            }
            _ => open("the utilisation is no number"),
        };
        held.parts.extend(parts.into_iter().map(|(component, force)| (component, Some(force))));
        (verdict, sides)
    }

    /// V_Rd beside an axial force; only anchors that have no tension count.
    ///
    /// # Errors
    /// Why nothing can be said.
    fn shear(&self, n: Force, sides_in_tension: usize) -> Result<ShearResistance, String> {
        let free = match sides_in_tension {
            0 => self.n.inner + 2 * self.n.outer,
            1 => self.n.inner + self.n.outer,
            _ => self.n.inner,
        };
        let friction = if self.n.bed { n } else { Force::ZERO };
        let (F_vb_Rd, mut w) = match &self.n.anchor {
            Ok((F_vb_Rd, w)) => (*F_vb_Rd, w.clone()),
            // The reason is told where more is needed.
            Err(_) if friction < Force::ZERO => (Force::ZERO, Working::default()),
            Err(reason) => return Err(format!("no anchor counts in shear: {reason}")),
        };
        let shear = column_base::shear(friction, free as f64, F_vb_Rd);
        w.absorb(shear.working);
        let title = "friction below the base plate and anchors in shear";
        let clause = "EN 1993-1-8:2005 6.2.2";
        let mut components = vec![part(BASE_IN_SHEAR, title, clause, shear.value, w)];
        components.extend(self.n.web_weld.clone());
        let least = weakest(&components).ok_or("the resistance is no number")?;
        Ok(ShearResistance {
            shear: least.resistance,
            governed_by: least.title.clone(),
            components: components.clone(),
        })
    }

    fn sheared(&self, v: Force, n: Force, sides_in_tension: usize, held: &mut Held) {
        let friction = if self.n.bed { column_base::FRICTION * (-n).max(Force::ZERO) } else { Force::ZERO };
        let needed = !(v <= friction);
        held.needs_anchors |= needed;
        let shear = if v == Force::ZERO { None } else { Some(self.shear(n, sides_in_tension)) };
        held.verdicts.push(match &shear {
            None => Verdict {
                state: State::Met,
                utilisation: Some(0.0),
                reason: None,
                ..unproven(About::Shear, Some(0.0), "kN", String::new())
            },
            Some(Err(reason)) => unproven(About::Shear, Some(v.kn()), "kN", reason.clone()),
            Some(Ok(shear)) => {
                let bound = self.bound.map(String::from).or_else(|| self.shear_bound(sides_in_tension));
                match weakest(&shear.components) {
                    Some(least) => against(About::Shear, v, least, bound.as_deref(), self.rulebook),
                    None => unproven(About::Shear, Some(v.kn()), "kN", "the resistance is no number".into()),
                }
            }
        });
        held.shear = shear.and_then(Result::ok);
    }

    /// Why more may be there than was credited in shear.
    fn shear_bound(&self, sides_in_tension: usize) -> Option<String> {
        match &self.n.anchor {
            Err(reason) => Some(format!("no anchor counts in shear: {reason}")),
            _ if !self.n.bed => Some("no bed is stated below the plate, so that no friction counts".into()),
            _ if sides_in_tension > 0 => Some("anchors in tension are not counted in shear".into()),
            Ok(_) => None,
        }
    }
}

/// The id of the base's own check in shear.
pub const BASE_IN_SHEAR: &str = "base-in-shear";
