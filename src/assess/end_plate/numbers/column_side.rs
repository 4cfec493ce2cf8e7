//! The numbers of the column's side: its flange and web, and the stiffeners that the checks credit.

use super::noted::{Noted, R_MOST, print_length};
use super::{BoltNumbers, MemberStrength};
use crate::assess::{Gap, Input};
use crate::eurocode::bolts;
use crate::eurocode::stiffeners::Pair;
use crate::joints::{EndPlateLayout, Stiffener};
use crate::origin::{Ask, Datum, Missing, Origin};
use crate::rulebook::{Rulebook, Section};
use crate::units::{Force, Length, Stress, mm};
use crate::working::Working;

/// A stiffener pair that the checks credit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StiffenerPair {
    pub height: Length,
    pub b_s: Length,
    pub t_s: Length,
    pub f_y: Stress,
    /// 0 if nobody states it: the safe geometry for m_2.
    pub throat: Length,
}

impl StiffenerPair {
    /// As the formulas take it: no wider than the column's flange, cut back by the column's root radius.
    pub fn plates(&self, column: &ColumnSide) -> Pair {
        let free = 0.5 * (column.section.b - column.section.t_w);
        Pair { b_s: self.b_s.min(free), t_s: self.t_s, cope: column.r_most, f_y_s: self.f_y }
    }
}

/// The column, for tension at the top.
#[derive(Clone, Debug, PartialEq)]
#[allow(non_snake_case)]
pub struct ColumnSide {
    pub section: Section,
    pub strength: MemberStrength,
    pub r: Length,
    /// r, or the most that it may be: what shortens the web in tension and the stiffeners' bearing.
    pub r_most: Length,
    pub B_p_Rd: Force,
    pub stiffeners: Vec<StiffenerPair>,
    /// From the top row up to the column's end; `None` where it runs on.
    pub above: Option<Length>,
    /// From the lowest row down to the column's end.
    pub below: Option<Length>,
}

/// The column's numbers that do not depend on the bolts.
pub(super) struct Member {
    section: Section,
    strength: MemberStrength,
    r: Length,
    stiffeners: Vec<StiffenerPair>,
}

impl Member {
    /// `None` if something is missing without which no resistance can be computed.
    pub(super) fn gather(layout: &EndPlateLayout, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let member = noted.member("column", &layout.column, rulebook);
        let stiffeners = layout.stiffeners.iter().filter_map(|s| credit(noted, s, rulebook)).collect();
        // What strengthens and is not credited makes the joint no weaker, so a joint that fails without it is not proven to.
        for part in &layout.not_credited {
            noted.gaps.push(Gap::LowerBound(Missing {
                what: "credit for a strengthening part".into(),
                reason: part.clone(),
                at: None,
                ask: Ask::Method,
            }));
        }
        let (section, strength, r) = member?;
        Some(Self { section, strength, r, stiffeners })
    }

    /// With the bolts; punching is worked out in `w`.
    pub(super) fn with(
        self,
        layout: &EndPlateLayout,
        bolts: &BoltNumbers,
        rulebook: &Rulebook,
        w: &mut Working,
    ) -> ColumnSide {
        let Self { section, strength, r, stiffeners } = self;
        let punching = bolts::punching(bolts.d_m, section.t_f, strength.f_u, rulebook.annex.gamma_m2);
        w.absorb(punching.working);
        ColumnSide {
            strength,
            r,
            r_most: section.r.unwrap_or(R_MOST),
            B_p_Rd: punching.value,
            stiffeners,
            above: layout.column_above,
            below: layout.column_below,
            section,
        }
    }
}

impl ColumnSide {
    /// The same upside down; `h` is the height that 0 is turned to.
    pub(super) fn upside_down(&self, h: Length) -> Self {
        let turned = |s: &StiffenerPair| StiffenerPair { height: h - s.height, ..*s };
        Self {
            stiffeners: self.stiffeners.iter().rev().map(turned).collect(),
            above: self.below,
            below: self.above,
            ..self.clone()
        }
    }
}

fn credit(noted: &mut Noted, stiffener: &Stiffener, rulebook: &Rulebook) -> Option<StiffenerPair> {
    let at = format!("stiffener at {:.0} mm", stiffener.height.get());
    let mut refuse = |why: &str| {
        noted.assumptions.push(format!("{at} is not credited: {why}"));
        None
    };
    let sizes = [stiffener.thickness, stiffener.outstand];
    if !(stiffener.height.get().is_finite() && sizes.iter().all(|t| t.get().is_finite() && *t > mm(0.0))) {
        return refuse(&format!("a thickness of {} and an outstand of {}", stiffener.thickness, stiffener.outstand));
    }
    if !stiffener.both_sides {
        return refuse("it is on one side of the web only");
    }
    if !stiffener.full_depth {
        const WHY: &str = "it does not reach from flange to flange (partial-depth stiffeners are not assessed yet)";
        let refused = refuse(WHY);
        // Like every strengthening part without credit: what fails without it is not proven to fail.
        noted.gaps.push(Gap::LowerBound(Missing {
            what: "credit for a strengthening part".into(),
            reason: format!("{at}: {WHY}"),
            at: None,
            ask: Ask::Method,
        }));
        return refused;
    }
    let grade = match &stiffener.grade {
        Ok(grade) => grade,
        Err(missing) => return refuse(&missing.to_string()),
    };
    let strength = match rulebook.strength(&grade.value, stiffener.thickness) {
        Ok(strength) => strength,
        Err(missing) => return refuse(&missing.to_string()),
    };
    noted.inputs.push(Input::of(
        &format!("{at}: thickness"),
        &Datum::new(stiffener.thickness, Origin::Derived("the plates' bodies".into())),
        print_length,
    ));
    noted.inputs.push(Input::of(&format!("{at}: grade"), grade, |g| g.0.clone()));
    let throat = match &stiffener.weld {
        Ok(weld) => {
            noted.assumptions.push(format!("{at}: its own weld is not checked"));
            weld.value
        }
        Err(_) => {
            noted.assumptions.push(format!(
                "{at}: no throat known, m2 is measured to its face (the safe geometry) and its weld is not checked"
            ));
            mm(0.0)
        }
    };
    Some(StiffenerPair {
        height: stiffener.height,
        b_s: stiffener.outstand,
        t_s: stiffener.thickness,
        f_y: strength.value.f_y,
        throat,
    })
}
