//! Joints that carry shear or axial force and are no moment joints: what every kind shares, and which file assesses which.

pub mod column_base;
mod fin_plate;
mod flexible;

use std::sync::Arc;

use super::{About, Assessment, CaseResult, Component, Gap, Input, ShearResistance, State, Verdict};
use crate::eurocode::Resistance;
use crate::intent::{IntendedDetail, LoadCase};
use crate::joints::SimpleLayout;
use crate::rulebook::Rulebook;
use crate::units::{Force, Moment};

/// What one kind's file gathers.
#[derive(Debug, Default)]
pub struct Strength {
    /// Every component in shear, each with what it carries of V_Ed; empty if something is missing.
    pub shear: Vec<Component>,
    /// Every component in tying, by γ_Mu; empty if the kind has no method or something is missing.
    pub tying: Vec<Component>,
    /// What keeps it from being a proof.
    pub gaps: Vec<Gap>,
    /// What was assumed, one sentence each.
    pub assumptions: Vec<String>,
    /// Inputs with their origins.
    pub inputs: Vec<Input>,
}

/// Assesses a joint as laid out, against load cases if there are any.
pub fn assess(layout: &SimpleLayout, cases: &[&LoadCase], rulebook: &Rulebook) -> Assessment {
    match layout {
        SimpleLayout::FinPlate(layout) => pinned(fin_plate::strength(layout, rulebook), cases, rulebook),
        SimpleLayout::FlexibleEndPlate(layout) => flexible::assess(layout, cases, rulebook),
        SimpleLayout::ColumnBase(base) => column_base::assess(base, cases, rulebook),
    }
}

/// The layout with what only a schedule states, where its detail states something of the kind.
pub fn with_detail(layout: &SimpleLayout, detail: &IntendedDetail) -> Option<SimpleLayout> {
    match layout {
        SimpleLayout::ColumnBase(base) => {
            let base = column_base::with_foundation(base, detail)?;
            Some(SimpleLayout::ColumnBase(Box::new(base)))
        }
        SimpleLayout::FinPlate(_) | SimpleLayout::FlexibleEndPlate(_) => None,
    }
}

/// A component by its resistance; what it carries of V_Ed is told by the case.
fn component(id: &str, title: &str, clause: &'static str, resistance: Resistance) -> Component {
    Component {
        id: id.into(),
        title: title.into(),
        clause,
        resistance: resistance.value,
        at_full: Force::ZERO,
        working: resistance.working.into(),
    }
}

/// The component with the least resistance; `None` for none, or where a resistance is no number.
pub fn weakest(components: &[Component]) -> Option<&Component> {
    if components.iter().any(|c| !c.resistance.get().is_finite()) {
        return None;
    }
    components.iter().min_by(|a, b| a.resistance.get().total_cmp(&b.resistance.get()))
}

/// The assessment of a nominally pinned joint: V_Ed against the weakest component in shear, a tying force against the weakest
/// in tying. An axial force or a moment that is not zero takes it out of the method; a moment that nobody states is none, which
/// is what nominally pinned means.
pub fn pinned(strength: Strength, cases: &[&LoadCase], rulebook: &Rulebook) -> Assessment {
    let Strength { shear, tying, gaps, mut assumptions, inputs } = strength;
    let bound = gaps.iter().find_map(|gap| match gap {
        Gap::LowerBound(missing) => Some(format!("the resistance is only a lower bound: not known: {}", missing.what)),
        Gap::NotChecked(_) => None,
    });
    if cases.iter().any(|case| case.moment.is_none()) {
        assumptions.push("the joint is nominally pinned: a moment that is not stated is taken as none".into());
    }
    let held = |about, required: Force, components: &[Component]| match weakest(components) {
        Some(weakest) => against(about, required.abs(), weakest, bound.as_deref(), rulebook),
        None => unproven(about, Some(required.kn()), "kN", "no resistance could be computed".into()),
    };
    let results = cases.iter().enumerate().map(|(index, case)| {
        let mut verdicts = vec![match case.shear {
            Some(v) => held(About::Shear, v, &shear),
            None => unproven(About::Shear, None, "kN", "V is not stated".into()),
        }];
        verdicts.extend(case.moment.filter(|m| !(*m == Moment::ZERO)).map(|m| {
            unproven(About::Moment, Some(m.knm()), "kNm", "a moment on a nominally pinned joint is not assessed".into())
        }));
        match case.axial {
            Some(n) if n == Force::ZERO => {}
            Some(n) => verdicts.push(unproven(
                About::Axial,
                Some(n.kn()),
                "kN",
                "an axial force beside the shear of this kind of joint is not assessed".into(),
            )),
            None => verdicts.push(unproven(About::Axial, None, "kN", "N is not stated".into())),
        }
        verdicts.extend(case.tying.map(|force| held(About::Tying, force, &tying)));
        CaseResult { case: index, verdicts, moment: None, shear: resistance(&shear), axial: None }
    });
    let cases = results.collect();
    Assessment { shear: resistance(&shear), tying, cases, gaps, assumptions, inputs, ..Assessment::default() }
}

/// The shear resistance that components give together.
pub fn resistance(components: &[Component]) -> Option<Arc<ShearResistance>> {
    let weakest = weakest(components)?;
    Some(Arc::new(ShearResistance {
        shear: weakest.resistance,
        governed_by: weakest.title.clone(),
        components: components.to_vec(),
    }))
}

/// A required force against a component. Above a resistance that is a lower bound it is unproven.
pub fn against(about: About, required: Force, by: &Component, bound: Option<&str>, rulebook: &Rulebook) -> Verdict {
    let utilisation = required / by.resistance;
    let met = utilisation <= 1.0 + rulebook.tolerances.utilisation;
    let (state, reason) = match (met, bound) {
        (true, _) => (State::Met, None),
        (false, Some(bound)) => (State::Unproven, Some(bound.to_owned())),
        (false, None) if utilisation.is_finite() => (State::NotMet, None),
        (false, None) => (State::Unproven, Some("the utilisation is no number".into())),
    };
    Verdict {
        about,
        state,
        required: Some(required.kn()),
        resistance: Some(by.resistance.kn()),
        unit: "kN",
        utilisation: utilisation.is_finite().then_some(utilisation),
        governed_by: by.title.clone(),
        reason,
    }
}

/// Neither proven to carry nor not to.
pub fn unproven(about: About, required: Option<f64>, unit: &'static str, reason: String) -> Verdict {
    Verdict {
        about,
        state: State::Unproven,
        required,
        resistance: None,
        unit,
        utilisation: None,
        governed_by: String::new(),
        reason: Some(reason),
    }
}
