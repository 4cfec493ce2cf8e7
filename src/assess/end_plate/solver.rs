//! Moment resistances that were solved before: a building repeats few details at many joints.
#![allow(non_snake_case)]

use std::collections::HashMap;
use std::sync::{Arc, Mutex, PoisonError};

use super::moment;
use super::numbers::Numbers;
use crate::assess::{MomentResistance, Sense};
use crate::rulebook::{RowForces, Rulebook};
use crate::units::Force;

/// A moment resistance, or why there is none: one sentence.
pub type Solved = Result<Arc<MomentResistance>, String>;

/// Solves joints by one rulebook and remembers what it solved. May be shared between threads: what is remembered is what
/// would be computed, so the order of asking changes nothing.
pub struct Solver<'a> {
    /// The rules by which it solves.
    pub rulebook: &'a Rulebook,
    solved: Mutex<HashMap<u64, Vec<Entry>>>,
}

/// Everything that a resistance depends on besides the rulebook. Compared as a whole; a NaN equals nothing, so it is
/// never found again.
#[derive(PartialEq)]
struct Question {
    numbers: Numbers,
    sense: Sense,
    beta: f64,
    V_Ed: Force,
    rule: Option<RowForces>,
}

struct Entry {
    question: Question,
    solved: Solved,
}

impl<'a> Solver<'a> {
    /// One that has solved nothing yet.
    pub fn new(rulebook: &'a Rulebook) -> Self {
        Self { rulebook, solved: Mutex::default() }
    }

    /// M_j,Rd of the joint with its tension side up; see [`moment::resistance`].
    pub fn moment(&self, n: &Numbers, sense: Sense, beta: f64, V_Ed: Force, rule: Option<RowForces>) -> Solved {
        // Below half of the beam's own resistance the shear changes nothing (EN 1993-1-1 6.2.8).
        let V_pl_Rd = n.least(|side| side.shear_resistance(self.rulebook.annex.gamma_m0));
        let V_Ed = if V_Ed <= 0.5 * V_pl_Rd { Force::ZERO } else { V_Ed };
        let shelf = shelf(n, beta, V_Ed);
        let asked = |entry: &&Entry| {
            let Question { numbers, sense: s, beta: b, V_Ed: v, rule: r } = &entry.question;
            (*s, *b, *v, *r) == (sense, beta, V_Ed, rule) && numbers == n
        };
        if let Some(entry) = self.locked().get(&shelf).and_then(|entries| entries.iter().find(asked)) {
            return entry.solved.clone();
        }
        let solved = moment::resistance(n, sense, beta, V_Ed, rule, self.rulebook).map(Arc::new);
        let question = Question { numbers: n.clone(), sense, beta, V_Ed, rule };
        self.locked().entry(shelf).or_default().push(Entry { question, solved: solved.clone() });
        solved
    }

    fn locked(&self) -> std::sync::MutexGuard<'_, HashMap<u64, Vec<Entry>>> {
        // A panic elsewhere leaves the entries whole: each is pushed in one piece.
        self.solved.lock().unwrap_or_else(PoisonError::into_inner)
    }
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
