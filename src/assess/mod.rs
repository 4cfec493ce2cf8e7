//! One room a joint kind: which checks, in which order; row forces, moment and shear.

pub mod classification;
pub mod end_plate;
pub mod simple;

use std::sync::Arc;

use crate::origin::{Datum, Missing, Origin};
use crate::units::{Force, Length, Moment, SecondMoment, Stiffness};
use crate::working::Working;

/// Which way the moment bends the joint.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// Tension at the top.
    Hogging,
    /// Tension at the bottom.
    Sagging,
}

/// One row's part in the moment resistance.
#[derive(Clone, Debug)]
pub struct RowForce {
    /// From the top, from 1, whatever the sense.
    pub row: usize,
    /// From the centre of compression.
    pub lever_arm: Length,
    /// Alone and in groups, before compression and panel shear cut it back.
    pub potential: Force,
    /// What counts.
    pub force: Force,
    /// What governs the force.
    pub governed_by: String,
    /// Share of F_t,Rd that the row's bolts carry, prying included: F over the smaller T-stub of the row alone.
    pub bolt_share: f64,
}

/// One component's check, with its working.
#[derive(Clone, Debug)]
pub struct Component {
    /// Its id: `column-web-in-compression`.
    pub id: String,
    /// In words with rows: "column flange in bending, rows 1-2".
    pub title: String,
    /// Clause.
    pub clause: &'static str,
    /// Its resistance.
    pub resistance: Force,
    /// What it carries at the joint's own full moment resistance.
    pub at_full: Force,
    /// The working.
    pub working: Arc<Working>,
}

impl Component {
    /// For a weld: the throat that `force` needs on it, which is in proportion, at least `least`.
    pub fn needed_throat(&self, force: Force, least: Length) -> Option<Length> {
        if !self.id.contains("-weld") {
            return None;
        }
        let throat = self.working.steps.iter().find(|step| step.symbol == "a")?.value.value;
        let needed = Length(throat) * (force.abs() / self.resistance);
        needed.get().is_finite().then(|| needed.max(least))
    }
}

/// A spring of the joint's rotational stiffness, Table 6.11.
#[derive(Clone, Debug, PartialEq)]
pub struct Spring {
    /// In words: "column web panel in shear, k1".
    pub title: String,
    /// k; `None` where it is infinitely stiff.
    pub k: Option<Length>,
}

/// The rotational stiffness in one sense and for one β, and what classifies a joint besides.
#[derive(Clone, Debug)]
#[allow(non_snake_case, reason = "the standard's symbols")]
pub struct JointStiffness {
    /// S_j,ini.
    pub initial: Stiffness,
    /// z.
    pub lever_arm: Length,
    /// The springs in a row that make it.
    pub springs: Vec<Spring>,
    /// Whether the supporting side is a column.
    pub to_column: bool,
    /// I_b of the supported member.
    pub I_b: SecondMoment,
    /// The moment from which the joint is of full strength, 5.2.3.3.
    pub full_strength: Moment,
    /// What 6.4.2 lets assume of the rotation capacity, one sentence.
    pub rotation: String,
    /// The working.
    pub working: Arc<Working>,
}

/// The moment resistance in one sense and for one β.
#[derive(Clone, Debug)]
pub struct MomentResistance {
    /// Which sense.
    pub sense: Sense,
    /// The transformation parameter it was computed with.
    pub beta: f64,
    /// M_j,Rd, welds included where they are known.
    pub moment: Moment,
    /// M_j,Rd of all components but the welds.
    pub without_welds: Moment,
    /// What governs.
    pub governed_by: String,
    /// The beam's web from the tension flange down to half a pattern below the lowest row in tension: not free for shear.
    pub web_in_tension: Length,
    /// Row forces from the tension side.
    pub rows: Vec<RowForce>,
    /// Every component.
    pub components: Vec<Component>,
    /// Its rotational stiffness; `None` where no row is in tension.
    pub stiffness: Option<Arc<JointStiffness>>,
    /// Notes that the reader needs: "row 1 passes 1.9 Ft,Rd: lower rows limited in proportion".
    pub notes: Vec<String>,
}

/// An input of the calculation with its origin, for the sheet.
#[derive(Clone, Debug)]
pub struct Input {
    /// What it is: "end plate thickness".
    pub name: String,
    /// As printed: "25 mm".
    pub value: String,
    /// Where it came from.
    pub origin: Origin,
}

impl Input {
    /// An input from a datum.
    pub fn of<T>(name: &str, datum: &Datum<T>, print: impl Fn(&T) -> String) -> Self {
        Self { name: name.into(), value: print(&datum.value), origin: datum.origin.clone() }
    }
}

/// Something that keeps a result from being a proof.
#[derive(Clone, Debug, PartialEq)]
pub enum Gap {
    /// A check could not be made.
    NotChecked(Missing),
    /// A check was made on the safe side: if it is met it is proven, if not it is unproven.
    LowerBound(Missing),
}

/// What a verdict is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum About {
    /// M_Ed against M_j,Rd of every component but the welds.
    Moment,
    /// V_Ed against bolts in shear with tension, bearing and the like.
    Shear,
    /// The welds between beam and end plate.
    Weld,
    /// A tying force of EN 1991-1-7 against the resistance by γ_Mu.
    Tying,
    /// N_Ed against the joint's own axial resistance.
    Force,
    /// N_Ed against the 5 % limit of 6.2.7.1(2); beyond it M_Ed and N_Ed together by 6.2.7.1(3).
    Axial,
}

/// Whether something carries.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum State {
    /// Proven to carry.
    Met,
    /// Proven not to carry.
    NotMet,
    /// Neither.
    Unproven,
}

/// One required action against one resistance.
#[derive(Clone, Debug)]
pub struct Verdict {
    /// What it is about.
    pub about: About,
    /// Whether it carries.
    pub state: State,
    /// Required, in `unit`; `None` if not stated.
    pub required: Option<f64>,
    /// The resistance that stands against it, in `unit`.
    pub resistance: Option<f64>,
    /// "kNm" or "kN".
    pub unit: &'static str,
    /// required / resistance.
    pub utilisation: Option<f64>,
    /// The component that governs.
    pub governed_by: String,
    /// Why it is unproven.
    pub reason: Option<String>,
}

/// All verdicts of one load case.
#[derive(Clone, Debug)]
pub struct CaseResult {
    /// Index into the scheduled joint's cases.
    pub case: usize,
    /// One of each [`About`] that applies.
    pub verdicts: Vec<Verdict>,
    /// The moment resistance of this case (its sense and β); `None` if M is not stated or nothing could be computed.
    pub moment: Option<Arc<MomentResistance>>,
    /// The shear resistance beside this case's bolt tensions; `None` if V is not stated.
    pub shear: Option<Arc<ShearResistance>>,
    /// Moment with axial force, 6.2.7.1(3), where the force passes the limit below which it may be neglected.
    pub axial: Option<Component>,
}

/// N_j,Rd: the axial resistance of a joint without moment.
#[derive(Clone, Debug)]
pub struct AxialResistance {
    /// N_j,Rd.
    pub force: Force,
    /// What governs.
    pub governed_by: String,
    /// The working.
    pub working: Arc<Working>,
}

/// The shear resistance of a joint, with the bolts' tension at its full moment resistance.
#[derive(Clone, Debug)]
pub struct ShearResistance {
    /// V_Rd.
    pub shear: Force,
    /// What governs.
    pub governed_by: String,
    /// Every component.
    pub components: Vec<Component>,
}

/// Everything that could be said about one joint's strength.
#[derive(Clone, Debug, Default)]
pub struct Assessment {
    /// M_j,Rd with tension at the top.
    pub hogging: Option<Arc<MomentResistance>>,
    /// M_j,Rd with tension at the bottom.
    pub sagging: Option<Arc<MomentResistance>>,
    /// V_Rd.
    pub shear: Option<Arc<ShearResistance>>,
    /// Every component in tying, by γ_Mu; empty where the kind has no method.
    pub tying: Vec<Component>,
    /// N_j,Rd in compression without a moment, where the kind has it.
    pub axial: Option<AxialResistance>,
    /// Components beside those of moment and shear, each with what the leading load case puts on it.
    pub beside: Vec<(Component, Option<Force>)>,
    /// Results for each load case.
    pub cases: Vec<CaseResult>,
    /// What keeps it from being a proof.
    pub gaps: Vec<Gap>,
    /// What was assumed, one sentence each.
    pub assumptions: Vec<String>,
    /// Strengthening parts that no check credits, and why: one sentence each.
    pub not_credited: Vec<String>,
    /// Inputs with their origins.
    pub inputs: Vec<Input>,
}

impl Assessment {
    /// Whether something that is not known might make the joint stronger or stiffer than it was computed.
    pub fn at_bound(&self) -> bool {
        self.gaps.iter().any(|gap| matches!(gap, Gap::LowerBound(_)))
    }

    /// Whether the joint carries everything that is required of it.
    pub fn carries(&self) -> State {
        let verdicts = || self.cases.iter().flat_map(|case| &case.verdicts);
        if verdicts().any(|v| v.state == State::NotMet) {
            State::NotMet
        } else if self.cases.is_empty()
            || verdicts().any(|v| v.state == State::Unproven)
            || self.gaps.iter().any(|gap| matches!(gap, Gap::NotChecked(_)))
        {
            State::Unproven
        } else {
            State::Met
        }
    }
}
