//! Every limit on the rows' forces, for tension at the top: Σ F over rows first..=last ≤ resistance.
#![allow(non_snake_case)]

mod column;
mod plate;
mod springs;

use super::numbers::{Numbers, PlateSide, Row};
use crate::eurocode::effective_length::EffectiveLength;
use crate::eurocode::t_stub::{ModeOne, TStub, t_stub};
use crate::eurocode::{Resistance, alpha};
use crate::joints::Which;
use crate::rulebook::{self, Alpha, Rulebook};
use crate::units::{Force, Length};
use crate::working::Working;

/// A component that limits the sum of some neighbouring tension rows.
#[derive(Clone, Debug)]
pub struct Limit {
    /// `end-plate-in-bending`.
    pub id: &'static str,
    /// "end plate in bending, rows 2-3 (mode 2)".
    pub title: String,
    /// Which side's end plate or beam it is about; `None` for the column.
    pub of: Option<Which>,
    /// Clause.
    pub clause: &'static str,
    /// Index of the first tension row, from the tension side.
    pub first: usize,
    /// Index of the last one.
    pub last: usize,
    /// What they may carry together.
    pub resistance: Resistance,
    /// Σ l_eff,1 of the rows, which is also b_eff of the web.
    pub length: Length,
    /// Whether it is a T-stub: then its share tells how far the bolts are used.
    pub bolts_used: bool,
}

/// Where a row stands on the end plate.
#[derive(Clone, Copy, Debug, PartialEq)]
enum OnPlate {
    Outside,
    BelowFlange,
    Other,
}

/// The tension rows and all limits on them.
pub struct TensionSide<'a> {
    n: &'a Numbers,
    rulebook: &'a Rulebook,
    beta: f64,
    /// The tension rows from the tension side.
    pub rows: Vec<Row>,
    /// Where they stand on each end plate.
    plates: Vec<PlateRows<'a>>,
}

/// Where the tension rows stand on one end plate.
struct PlateRows<'a> {
    side: &'a PlateSide,
    places: Vec<OnPlate>,
}

impl<'a> TensionSide<'a> {
    /// Sorts out which rows are in tension.
    ///
    /// # Errors
    /// Why this arrangement of rows has no rule in the standard.
    pub fn new(n: &'a Numbers, rulebook: &'a Rulebook, beta: f64) -> Result<Self, String> {
        let deepest = n.sides().map(PlateSide::depth).fold(Length::ZERO, Length::max);
        let least = rulebook.settings.shear_only_below * deepest;
        // Rows beside a haunch carry shear only.
        let in_tension = |row: &Row| n.lever_arm(row) >= least && n.sides().all(|side| row.height >= side.soffit);
        Self::of(n, rulebook, beta, in_tension)
    }

    /// The same with the rows that are picked.
    ///
    /// # Errors
    /// As [`TensionSide::new`].
    pub fn of(
        n: &'a Numbers,
        rulebook: &'a Rulebook,
        beta: f64,
        picked: impl Fn(&Row) -> bool,
    ) -> Result<Self, String> {
        let rows: Vec<Row> = n.rows.iter().filter(|row| picked(row)).copied().collect();
        let mut plates = Vec::new();
        for side in n.sides() {
            plates.push(PlateRows { side, places: places(side, &rows)? });
        }
        let side = Self { n, rulebook, beta, rows, plates };
        for (i, row) in side.rows.iter().enumerate() {
            let mut distances = Vec::new();
            if let Some(column) = n.column() {
                distances.push(("m of the column flange", side.m_column(column, row)));
                distances.push(("e of the column flange", row.e_support));
                let beside = side.next_to_stiffener(column, i);
                distances.extend(beside.map(|(m_2, _)| ("m_2 beside the stiffener", m_2)));
            }
            for plate in &side.plates {
                distances.push(("e of the end plate", row.edge(plate.side)));
                match plate.places[i] {
                    OnPlate::Outside => {
                        distances.extend([("m_x", plate.m_x(row)), ("e_x", plate.side.top - row.height)])
                    }
                    OnPlate::BelowFlange => distances.extend([("m", plate.m(row)), ("m_2", plate.m_2(row))]),
                    OnPlate::Other => distances.push(("m", plate.m(row))),
                }
            }
            for (what, value) in distances {
                if !(value > Length::ZERO) {
                    return Err(format!("row {}: {what} is {value}, there is no room for a T-stub", row.number));
                }
            }
        }
        Ok(side)
    }

    /// All limits, rows alone before groups.
    pub fn limits(&self) -> Vec<Limit> {
        let mut limits = Vec::new();
        for last in 0..self.rows.len() {
            for first in (0..=last).rev() {
                if let Some(column) = self.n.column() {
                    self.column_limits(column, first, last, &mut limits);
                }
                for plate in &self.plates {
                    self.plate_limits(plate, first, last, &mut limits);
                }
            }
        }
        limits
    }

    /// The least share that a row has in the ranges it belongs to; `lengths` of a range, `None` where it is no group.
    fn least_length(
        &self,
        row: usize,
        lengths: impl Fn(usize, usize, &mut Working) -> Option<Vec<EffectiveLength>>,
    ) -> Length {
        let ranges = (0..=row).flat_map(|first| (row..self.rows.len()).map(move |last| (first, last)));
        let shares = ranges.filter_map(|(first, last)| {
            let share = lengths(first, last, &mut Working::default())?.into_iter().nth(row - first)?;
            Some(share.cp.min(share.nc))
        });
        shares.reduce(Length::min).unwrap_or(Length::ZERO)
    }

    fn alpha(&self, m: Length, e: Length, m_2: Length, w: &mut Working) -> f64 {
        crate::given!(w, "beside flange or stiffener"; m, e, m_2);
        crate::step!(w, "Figure 6.11", lambda_1 = m / (m + e));
        crate::step!(w, "Figure 6.11", lambda_2 = m_2 / (m + e));
        match self.rulebook.settings.alpha {
            Alpha::Chart => alpha::alpha(lambda_1, lambda_2, self.rulebook.settings.alpha_max),
            Alpha::Draft2024 => alpha::alpha_of_draft(lambda_1, lambda_2),
        }
    }

    #[allow(clippy::too_many_arguments)]
    fn bending(
        &self,
        (id, of): (&'static str, Option<Which>),
        title: &str,
        clause: &'static str,
        stub: TStub,
        mut working: Working,
        (first, last): (usize, usize),
        limits: &mut Vec<Limit>,
    ) {
        let result = t_stub(&stub, self.gamma_M0());
        working.absorb(result.resistance.working);
        limits.push(Limit {
            id,
            title: format!("{title}, {} (mode {})", self.named(first, last), result.mode),
            of,
            clause,
            first,
            last,
            resistance: Resistance { value: result.resistance.value, working },
            length: stub.l_eff_1,
            bolts_used: true,
        });
    }

    fn gamma_M0(&self) -> f64 {
        self.rulebook.annex.gamma_m0
    }

    fn gamma_M2(&self) -> f64 {
        self.rulebook.annex.gamma_m2
    }

    fn mode_one(&self) -> ModeOne {
        match self.rulebook.settings.mode_one {
            rulebook::ModeOne::Method1 => ModeOne::Method1,
            rulebook::ModeOne::Method2 => ModeOne::Method2 { d_w: self.n.bolts.washer },
        }
    }

    fn bolt_force(&self, first: usize, last: usize, punching: Force) -> Force {
        2.0 * (last - first + 1) as f64 * self.n.bolts.F_t_Rd.min(punching)
    }

    fn pitch_below(&self, i: usize) -> Length {
        self.rows[i].height - self.rows[i + 1].height
    }

    fn over(
        &self,
        first: usize,
        last: usize,
        of: impl Fn(&Row) -> Length,
        pick: fn(Length, Length) -> Length,
    ) -> Length {
        self.rows[first + 1..=last].iter().map(&of).fold(of(&self.rows[first]), pick)
    }

    fn named(&self, first: usize, last: usize) -> String {
        named(self.rows[first].number, self.rows[last].number)
    }
}

/// "row 2", "rows 2-3", always counted from the top.
pub fn named(a: usize, b: usize) -> String {
    if a == b { format!("row {a}") } else { format!("rows {}-{}", a.min(b), a.max(b)) }
}

/// Where the tension rows stand on an end plate.
///
/// # Errors
/// Why this arrangement has no rule in the standard.
fn places(side: &PlateSide, rows: &[Row]) -> Result<Vec<OnPlate>, String> {
    let mut places = Vec::new();
    for row in rows {
        places.push(if row.height > side.flange_top() {
            if places.contains(&OnPlate::Outside) {
                return Err("more than one row beyond the tension flange has no rule in Table 6.6".into());
            }
            OnPlate::Outside
        } else if !(row.height < side.flange_top() - side.beam.t_f) {
            return Err(format!("row {} lies in the beam's flange", row.number));
        } else if places.iter().any(|p| *p != OnPlate::Outside) {
            OnPlate::Other
        } else {
            OnPlate::BelowFlange
        });
    }
    Ok(places)
}

fn sum(lengths: &[EffectiveLength], w: &mut Working) -> (Length, Length) {
    for length in lengths {
        w.absorb(length.working.clone());
    }
    let sum_l_cp: Length = lengths.iter().map(|l| l.cp).sum();
    let sum_l_nc: Length = lengths.iter().map(|l| l.nc).sum();
    crate::given!(w, "sum over the rows"; sum_l_cp, sum_l_nc);
    (sum_l_cp.min(sum_l_nc), sum_l_nc)
}
