//! The numbers of the column's side: its flange and web, and the stiffeners that the checks credit.

use super::noted::{Noted, R_MOST, print_length};
use super::{BoltNumbers, MemberStrength};
use crate::assess::end_plate::strengthening::{self, Members, Strengthened};
use crate::assess::{Gap, Input};
use crate::eurocode::bolts;
use crate::eurocode::stiffeners::Pair;
use crate::eurocode::welds::Fillets;
use crate::joints::{EndPlateLayout, Stiffener};
use crate::origin::{Ask, Datum, Missing, Origin};
use crate::rulebook::{Grade, Rulebook, Section};
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
    /// Its length along the column's depth.
    pub reach: Length,
    /// Whether it reaches from flange to flange; else it holds the flange in tension and nothing more.
    pub full_depth: bool,
    /// Its fillets, by its own f_u; `None` if nobody states them.
    pub fillets: Option<Fillets>,
}

impl StiffenerPair {
    /// As the formulas take it: no wider than the column's flange, cut back by the column's root radius.
    pub fn plates(&self, column: &ColumnSide) -> Pair {
        let free = 0.5 * (column.section.b - column.section.t_w);
        let cope = column.r_most;
        Pair {
            b_s: self.b_s.min(free),
            t_s: self.t_s,
            cope,
            f_y_s: self.f_y,
            l_s: (self.reach - if self.full_depth { 2.0 } else { 1.0 } * cope).max(Length::ZERO),
            fillets: self.fillets.map(|own| Fillets { f_u: own.f_u.min(column.strength.f_u), ..own }),
            ends_in_web: (!self.full_depth).then_some((column.section.t_w, column.strength.f_y_web)),
        }
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
    pub strengthened: Strengthened,
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
    strengthened: Strengthened,
}

impl Member {
    /// `None` if something is missing without which no resistance can be computed.
    pub(super) fn gather(layout: &EndPlateLayout, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let member = noted.member("column", &layout.column, rulebook);
        let column_grade = layout.column.grade.as_ref().ok().map(|grade| &grade.value);
        let stiffeners = layout.stiffeners.iter().filter_map(|s| credit(noted, s, column_grade, rulebook)).collect();
        // What strengthens and is not credited makes the joint no weaker, so a joint that fails without it is not proven to.
        for part in &layout.not_credited {
            noted.not_credited.push(part.clone());
            noted.gaps.push(Gap::LowerBound(Missing {
                what: "credit for a strengthening part".into(),
                reason: part.clone(),
                at: None,
                ask: Ask::Method,
            }));
        }
        let (section, strength, r) = member?;
        let beam = layout.beam.section.as_ref().map(|beam| &beam.value);
        let strengthened = beam.map_or_else(
            |_| Strengthened::default(),
            |beam| strengthening::credit(noted, layout, &Members { column: &section, strength, beam }, rulebook),
        );
        Some(Self { section, strength, r, stiffeners, strengthened })
    }

    /// With the bolts; punching is worked out in `w`.
    pub(super) fn with(
        self,
        layout: &EndPlateLayout,
        bolts: &BoltNumbers,
        rulebook: &Rulebook,
        w: &mut Working,
    ) -> ColumnSide {
        let Self { section, strength, r, stiffeners, strengthened } = self;
        let punching = bolts::punching(bolts.d_m, section.t_f, strength.f_u, rulebook.annex.gamma_m2);
        w.absorb(punching.working);
        ColumnSide {
            strength,
            r,
            r_most: section.r.unwrap_or(R_MOST),
            B_p_Rd: punching.value,
            stiffeners,
            strengthened,
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
            strengthened: self.strengthened.upside_down(h),
            above: self.below,
            below: self.above,
            ..self.clone()
        }
    }
}

fn credit(
    noted: &mut Noted,
    stiffener: &Stiffener,
    column_grade: Option<&Grade>,
    rulebook: &Rulebook,
) -> Option<StiffenerPair> {
    let at = format!("stiffener at {:.0} mm", stiffener.height.get());
    let mut refuse = |why: &str| {
        noted.assumptions.push(format!("{at} is not credited: {why}"));
        None
    };
    let sizes = [stiffener.thickness, stiffener.outstand, stiffener.reach];
    if !(stiffener.height.get().is_finite() && sizes.iter().all(|t| t.get().is_finite() && *t > mm(0.0))) {
        return refuse(&format!("a thickness of {} and an outstand of {}", stiffener.thickness, stiffener.outstand));
    }
    if !stiffener.both_sides {
        return refuse("it is on one side of the web only");
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
    let beta_w = column_grade.and_then(|column| rulebook.beta_w(column)).zip(rulebook.beta_w(&grade.value));
    let fillets = match (&stiffener.weld, beta_w) {
        (Err(missing), _) => Err((missing.reason.clone(), missing.ask)),
        (Ok(weld), _) if !(weld.value >= rulebook.welds.min_throat && weld.value.get().is_finite()) => {
            let least = rulebook.welds.min_throat;
            Err((
                format!("a throat of {} is not counted, {least} is the least (4.5.2(2))", weld.value),
                Ask::Fabricator,
            ))
        }
        (Ok(_), None) => Err(("β_w is not known for its grade and the column's".into(), Ask::Method)),
        (Ok(weld), Some((column, own))) => {
            noted.inputs.push(Input::of(&format!("{at}: weld"), weld, |a| format!("throat {a}")));
            Ok(Fillets { a: weld.value, f_u: strength.value.f_u, beta_w: own.max(column) })
        }
    };
    if let Err((reason, ask)) = &fillets {
        noted.not_checked(&format!("weld of the {at}"), reason.clone(), *ask);
        noted
            .assumptions
            .push(format!("{at}: its weld is not checked, and m2 is measured to its face (the safe geometry)"));
    }
    Some(StiffenerPair {
        height: stiffener.height,
        b_s: stiffener.outstand,
        t_s: stiffener.thickness,
        f_y: strength.value.f_y,
        throat: fillets.as_ref().map_or(mm(0.0), |fillets| fillets.a),
        reach: stiffener.reach,
        full_depth: stiffener.full_depth,
        fillets: fillets.ok(),
    })
}
