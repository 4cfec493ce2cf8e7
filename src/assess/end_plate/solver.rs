//! Resistances that were solved before: a building repeats few details at many joints.
#![allow(non_snake_case)]

use std::collections::HashMap;
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};

use super::Beside;
use super::moment;
use super::numbers::Numbers;
use super::shear::{self, Tension};
use crate::assess::{MomentResistance, Sense, ShearResistance};
use crate::rulebook::{RowForces, Rulebook};
use crate::units::{Force, Length};

/// A moment resistance, or why there is none: one sentence.
pub type Solved = Result<Arc<MomentResistance>, String>;

/// Solves joints by one rulebook and remembers what it solved. May be shared between threads: what is remembered is what
/// would be computed, so the order of asking changes nothing.
pub struct Solver<'a> {
    /// The rules by which it solves.
    pub rulebook: &'a Rulebook,
    solved: Mutex<HashMap<u64, Vec<Entry>>>,
    sheared: Mutex<HashMap<u64, Vec<Sheared>>>,
}

/// Everything that a resistance depends on besides the rulebook. Compared as a whole; a NaN equals nothing, so it is
/// never found again by another joint.
#[derive(PartialEq)]
struct Question {
    numbers: Arc<Numbers>,
    sense: Sense,
    beta: f64,
    beside: Beside,
    rule: Option<RowForces>,
}

/// A shear resistance with all that it depends on besides the rulebook.
type Sheared = (Arc<Numbers>, Drawn, Arc<ShearResistance>);

/// What of the bolts' tension bears on their shear.
#[derive(PartialEq)]
enum Drawn {
    Unknown(Length),
    None,
    /// Each row with what it carries, the share of it, and the web that is taken.
    Rows(Vec<(usize, Force, f64)>, f64, Length),
}

impl Drawn {
    fn of(tension: Tension<'_>) -> Self {
        match tension {
            Tension::Unknown { web_in_tension } => Self::Unknown(web_in_tension),
            Tension::None => Self::None,
            Tension::Rows(moment, share) => {
                let rows = moment.rows.iter().map(|row| (row.row, row.force, row.bolt_share));
                Self::Rows(rows.collect(), share, moment.web_in_tension)
            }
        }
    }

    /// A number to be looked up by.
    fn number(&self) -> f64 {
        match self {
            Self::Unknown(web) => web.get(),
            Self::None => -1.0,
            Self::Rows(_, share, _) => *share,
        }
    }
}

struct Entry {
    question: Question,
    solved: Solved,
}

impl<'a> Solver<'a> {
    /// One that has solved nothing yet.
    pub fn new(rulebook: &'a Rulebook) -> Self {
        Self { rulebook, solved: Mutex::default(), sheared: Mutex::default() }
    }

    /// M_j,Rd of the joint with its tension side up; see [`moment::resistance`].
    pub(super) fn moment(
        &self,
        n: &Arc<Numbers>,
        sense: Sense,
        beta: f64,
        beside: Beside,
        rule: Option<RowForces>,
    ) -> Solved {
        // Below half of the beam's own resistance the shear changes nothing (EN 1993-1-1 6.2.8).
        let V_pl_Rd = n.least(|side| side.shear_resistance(self.rulebook.annex.gamma_m0));
        let V_Ed = if beside.V_Ed <= 0.5 * V_pl_Rd { Force::ZERO } else { beside.V_Ed };
        let beside = Beside { V_Ed, ..beside };
        let shelf = shelf(n, beta, V_Ed);
        let asked = |entry: &&Entry| {
            let Question { numbers, sense: s, beta: b, beside: v, rule: r } = &entry.question;
            (*s, *b, *v, *r) == (sense, beta, beside, rule) && same(numbers, n)
        };
        if let Some(entry) = locked(&self.solved).get(&shelf).and_then(|entries| entries.iter().find(asked)) {
            return entry.solved.clone();
        }
        let solved = moment::resistance(n, sense, beta, beside, rule, self.rulebook).map(Arc::new);
        let question = Question { numbers: n.clone(), sense, beta, beside, rule };
        locked(&self.solved).entry(shelf).or_default().push(Entry { question, solved: solved.clone() });
        solved
    }

    /// V_Rd beside a tension; see [`shear::resistance`].
    pub fn shear(&self, n: &Arc<Numbers>, tension: Tension<'_>) -> Arc<ShearResistance> {
        let drawn = Drawn::of(tension);
        let shelf = shelf(n, drawn.number(), Force::ZERO);
        let asked = |(numbers, other, _): &&Sheared| *other == drawn && same(numbers, n);
        if let Some((.., known)) = locked(&self.sheared).get(&shelf).and_then(|entries| entries.iter().find(asked)) {
            return known.clone();
        }
        let solved = Arc::new(shear::resistance(n, tension, self.rulebook));
        locked(&self.sheared).entry(shelf).or_default().push((n.clone(), drawn, solved.clone()));
        solved
    }
}

/// A joint asks for several resistances by the same numbers.
fn same(a: &Arc<Numbers>, b: &Arc<Numbers>) -> bool {
    Arc::ptr_eq(a, b) || a == b
}

fn locked<T>(shelves: &Mutex<T>) -> MutexGuard<'_, T> {
    // A panic elsewhere leaves the entries whole: each is pushed in one piece.
    shelves.lock().unwrap_or_else(PoisonError::into_inner)
}

/// Where to look: a few of the numbers, mixed. Equal questions always share a shelf.
fn shelf(n: &Numbers, beta: f64, V_Ed: Force) -> u64 {
    let rows = n.rows.iter().flat_map(|row| [row.height.get(), row.gauge.get()]);
    let sides = n.sides().flat_map(|side| [side.beam.h.get(), side.t_p.get(), side.top.get()]);
    let column = n.column().map(|column| column.section.h.get());
    let sizes = [n.bolts.F_t_Rd.get(), beta, V_Ed.get()];
    // Adding 0 makes -0 and 0, which are equal, the same bits.
    rows.chain(sides)
        .chain(column)
        .chain(sizes)
        .fold(0, |mixed: u64, x| (mixed.rotate_left(7) ^ (x + 0.0).to_bits()).wrapping_mul(0x9E37_79B9_7F4A_7C15))
}
