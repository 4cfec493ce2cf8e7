//! A joint's class by stiffness and by strength, EN 1993-1-8:2005 5.2, beside what the frame's analysis takes it for.
#![allow(non_snake_case)]

use std::sync::Arc;

use super::{JointStiffness, MomentResistance};
use crate::eurocode::{classification, stiffness};
use crate::intent::{InFrame, JointClass};
use crate::units::{Moment, Stiffness};
use crate::working::Working;

/// The class of one resistance (one sense and one β) in its frame.
#[derive(Clone, Debug)]
pub struct Classified {
    /// S_j beside the required moment; `None` without one, or above the resistance.
    pub at_required: Option<Stiffness>,
    /// S_j,ini from which the joint is rigid and up to which it is nominally pinned; `None` where span or bracing is not
    /// stated.
    pub limits: Option<(Stiffness, Stiffness)>,
    /// The class by stiffness, or what of the schedule it would need.
    pub by_stiffness: Result<JointClass, &'static str>,
    /// "full-strength", "partial-strength" or "nominally pinned by strength".
    pub by_strength: &'static str,
    /// What stands behind the class and is not checked.
    pub notes: Vec<String>,
    /// The working, that of the stiffness first.
    pub working: Working,
}

/// Classifies a resistance; `required` is the moment of its load case.
pub fn classify(
    moment: &MomentResistance,
    joint: &JointStiffness,
    frame: &InFrame,
    required: Option<Moment>,
) -> Classified {
    let mut w = Working::clone(&joint.working);
    let at_required = required.and_then(|m| stiffness::beside_moment(&mut w, joint.initial, m, moment.moment));
    let mut notes = Vec::new();
    let of = |braced, L_b, w: &mut Working| {
        let limits = classification::stiffness_limits(w, joint.I_b, L_b, braced);
        (limits, class(joint.initial, limits))
    };
    let (limits, by_stiffness) = match (frame.span, frame.braced) {
        _ if !joint.to_column => (None, Err("no beam-to-column joint")),
        (None, _) => (None, Err("the span is not stated")),
        (Some(L_b), Some(braced)) => {
            let (limits, class) = of(braced, L_b, &mut w);
            (Some(limits), Ok(class))
        }
        // The bracing matters between the two limits only.
        (Some(L_b), None) => {
            let either = [true, false].map(|braced| of(braced, L_b, &mut Working::default()).1);
            let same = either[0] == either[1];
            (None, if same { Ok(either[0]) } else { Err("whether the frame is braced is not stated") })
        }
    };
    if by_stiffness == Ok(JointClass::Rigid) && frame.braced != Some(true) {
        notes.push(
            "rigid in an unbraced frame only where K_b/K_c is at least 0.1 in every storey (5.2.2.5): not checked"
                .into(),
        );
    }
    if frame.braced == Some(true) {
        notes.push(
            "braced means that the bracing takes at least 80 % off the sway (5.2.2.5): the schedule's word".into(),
        );
    }
    let by_strength = match moment.moment {
        m if m >= joint.full_strength => "full-strength",
        m if m <= joint.full_strength * 0.25 => "nominally pinned by strength",
        _ => "partial-strength",
    };
    Classified { at_required, limits, by_stiffness, by_strength, notes, working: w }
}

/// 5.2.2.1(2), Figure 5.4.
fn class(initial: Stiffness, (rigid, pinned): (Stiffness, Stiffness)) -> JointClass {
    match initial {
        s if s >= rigid => JointClass::Rigid,
        s if s <= pinned => JointClass::Pinned,
        _ => JointClass::SemiRigid,
    }
}

/// Where the class by stiffness is not the one that the analysis assumes: the class it has.
pub fn differs(
    resistance: &Arc<MomentResistance>,
    frame: &InFrame,
    required: Option<Moment>,
) -> Option<(JointClass, Classified)> {
    let assumed = frame.class.filter(|class| *class != JointClass::SemiRigid)?;
    let classified = classify(resistance, resistance.stiffness.as_ref()?, frame, required);
    let class = classified.by_stiffness.ok()?;
    (class != assumed).then_some((class, classified))
}
