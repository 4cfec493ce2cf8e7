//! Every limit on the rows' forces, for tension at the top: Σ F over rows first..=last ≤ resistance.
#![allow(non_snake_case)]

use super::numbers::{Numbers, Row, StiffenerPair};
use crate::eurocode::effective_length::{self as el, EffectiveLength, RowPlace};
use crate::eurocode::stiffeners;
use crate::eurocode::t_stub::{ModeOne, TStub, t_stub};
use crate::eurocode::{Resistance, alpha, beam, column_web};
use crate::rulebook::{self, Rulebook};
use crate::units::{Force, Length};
use crate::working::Working;

/// A component that limits the sum of some neighbouring tension rows.
#[derive(Clone, Debug)]
pub struct Limit {
    /// `end-plate-in-bending`.
    pub id: &'static str,
    /// "end plate in bending, rows 2-3 (mode 2)".
    pub title: String,
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
    places: Vec<OnPlate>,
}

impl<'a> TensionSide<'a> {
    /// Sorts out which rows are in tension.
    ///
    /// # Errors
    /// Why this arrangement of rows has no rule in the standard.
    pub fn new(n: &'a Numbers, rulebook: &'a Rulebook, beta: f64) -> Result<Self, String> {
        let least = rulebook.settings.shear_only_below * n.beam.h;
        let rows: Vec<Row> = n.rows.iter().filter(|row| lever_arm(n, row) >= least).copied().collect();
        let flange_soffit = n.beam.h - n.beam.t_f;
        let mut places = Vec::new();
        for row in &rows {
            places.push(if row.height > n.beam.h {
                if places.contains(&OnPlate::Outside) {
                    return Err("more than one row beyond the tension flange has no rule in Table 6.6".into());
                }
                OnPlate::Outside
            } else if !(row.height < flange_soffit) {
                return Err(format!("row {} lies in the beam's flange", row.number));
            } else if places.iter().any(|p| *p != OnPlate::Outside) {
                OnPlate::Other
            } else {
                OnPlate::BelowFlange
            });
        }
        let side = Self { n, rulebook, beta, rows, places };
        for (i, row) in side.rows.iter().enumerate() {
            let distances = [
                ("m of the column flange", side.m_column(row)),
                ("e of the column flange", row.e_column),
                ("e of the end plate", row.e_plate),
            ]
            .into_iter()
            .chain(match side.places[i] {
                OnPlate::Outside => vec![("m_x", side.m_x(row)), ("e_x", n.plate_top - row.height)],
                OnPlate::BelowFlange => vec![("m", side.m_plate(row)), ("m_2", side.m_2_plate(row))],
                OnPlate::Other => vec![("m", side.m_plate(row))],
            })
            .chain(side.next_to_stiffener(i).map(|(m_2, _)| ("m_2 beside the stiffener", m_2)));
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
                self.column_limits(first, last, &mut limits);
                self.plate_limits(first, last, &mut limits);
            }
        }
        limits
    }

    // ---- column side ------------------------------------------------------------------------------------------

    fn m_column(&self, row: &Row) -> Length {
        self.m_beside(row, self.n.r_c)
    }

    /// m of the column's flange with this root radius.
    fn m_beside(&self, row: &Row, r: Length) -> Length {
        0.5 * (row.gauge - self.n.column.t_w - 2.0 * (0.8 * r))
    }

    /// The stiffener right above (`up`) or below a tension row, with no other bolt row between, that the row's yield line
    /// reaches (m_2 below half of the plain pattern): m_2 and the pair. One further away helps nothing.
    fn stiffener_beside(&self, i: usize, up: bool) -> Option<(Length, &StiffenerPair)> {
        let row = self.rows[i].height;
        // A stiffener in a row's own plane counts as above it: m_2 is then below 0, and the row is refused.
        let beyond = |height: Length| if up { height >= row } else { height < row };
        let distance = |height: Length| (height - row).abs();
        let pair = (self.n.stiffeners.iter().filter(|s| beyond(s.height)))
            .min_by(|a, b| distance(a.height).get().total_cmp(&distance(b.height).get()))?;
        let between = self.n.rows.iter().any(|other| {
            beyond(other.height)
                && distance(other.height) > Length::ZERO
                && distance(other.height) < distance(pair.height)
        });
        let m_2 = distance(pair.height) - 0.5 * pair.t_s - Numbers::fillet(Some(pair.throat));
        let reach = 2.0 * self.m_column(&self.rows[i]) + 0.625 * self.rows[i].e_column;
        (!between && m_2 < reach).then_some((m_2, pair))
    }

    fn next_to_stiffener(&self, i: usize) -> Option<(Length, &StiffenerPair)> {
        let beside = [self.stiffener_beside(i, true), self.stiffener_beside(i, false)];
        beside.into_iter().flatten().min_by(|a, b| a.0.get().total_cmp(&b.0.get()))
    }

    fn column_place(&self, i: usize, beside: Option<(Length, &StiffenerPair)>, w: &mut Working) -> RowPlace {
        let row = &self.rows[i];
        match beside {
            None => RowPlace::Plain,
            Some((m_2, _)) => RowPlace::Stiffened { alpha: self.alpha(self.m_column(row), row.e_column, m_2, w) },
        }
    }

    fn alpha(&self, m: Length, e: Length, m_2: Length, w: &mut Working) -> f64 {
        crate::step!(w, "Figure 6.11", lambda_1 = m / (m + e));
        crate::step!(w, "Figure 6.11", lambda_2 = m_2 / (m + e));
        alpha::alpha(lambda_1, lambda_2, self.rulebook.settings.alpha_max)
    }

    /// Distance to the column's end above or below a row.
    fn column_end(&self, i: usize, up: bool) -> Option<Length> {
        let row = self.rows[i].height;
        if up {
            Some(self.n.column_above? + (self.n.rows.first()?.height - row))
        } else {
            Some(self.n.column_below? + (row - self.n.rows.last()?.height))
        }
    }

    /// The pairs of stiffeners that a range of rows leans on: those between its rows and those beside its ends.
    fn pairs_at(&self, first: usize, last: usize) -> Vec<&StiffenerPair> {
        if first == last {
            return self.next_to_stiffener(first).map(|(_, pair)| pair).into_iter().collect();
        }
        let beside = [self.stiffener_beside(first, true), self.stiffener_beside(last, false)];
        let outside = |s: &StiffenerPair| beside.iter().flatten().any(|(_, pair)| std::ptr::eq(*pair, s));
        self.n.stiffeners.iter().filter(|s| outside(s) || self.parts(first, last, s)).collect()
    }

    /// Whether a pair stands between rows of the range: then they are no group.
    fn parts(&self, first: usize, last: usize, pair: &StiffenerPair) -> bool {
        (self.rows[last].height..self.rows[first].height).contains(&pair.height)
    }

    /// The column flange's T-stub of a range of rows with a root radius, with the stiffeners beside them or as if there were
    /// none.
    fn column_stub(&self, first: usize, last: usize, stiffened: bool, r: Length, w: &mut Working) -> TStub {
        let n = self.n;
        let mut lengths = Vec::new();
        for i in first..=last {
            let row = &self.rows[i];
            let (m, e) = (self.m_beside(row, r), row.e_column);
            let place = |beside: Option<(Length, &StiffenerPair)>, w: &mut Working| {
                self.column_place(i, beside.filter(|_| stiffened), w)
            };
            w.heading(format!("row {}", row.number));
            lengths.push(if first == last {
                let place = place(self.next_to_stiffener(i), w);
                let end = [self.column_end(i, true), self.column_end(i, false)].into_iter().flatten();
                el::alone(place, m, e, end.min_by(|a, b| a.get().total_cmp(&b.get())))
            } else if i == first {
                let place = place(self.stiffener_beside(i, true), w);
                el::end_of_group(place, m, e, self.pitch_below(i), self.column_end(i, true))
            } else if i == last {
                let place = place(self.stiffener_beside(i, false), w);
                el::end_of_group(place, m, e, self.pitch_below(i - 1), self.column_end(i, false))
            } else {
                el::inner_in_group(0.5 * (self.pitch_below(i - 1) + self.pitch_below(i)))
            });
        }
        // A group of rows with unequal gauge takes the largest m and the smallest n.
        let m = self.over(first, last, |row| self.m_beside(row, r), Length::max);
        let n_e = self.over(first, last, |row| row.e_column.min(row.e_plate), Length::min);
        let (l_eff_1, l_eff_2) = sum(&lengths, w);
        TStub {
            l_eff_1,
            l_eff_2,
            t_f: n.column.t_f,
            f_y: n.column_strength.f_y_flange,
            m,
            n: n_e.min(1.25 * m),
            sum_F_t_Rd: self.bolt_force(first, last, n.B_p_column),
            mode_one: self.mode_one(),
        }
    }

    fn column_limits(&self, first: usize, last: usize, limits: &mut Vec<Limit>) {
        let n = self.n;
        let pairs = self.pairs_at(first, last);
        if !pairs.iter().any(|pair| first != last && self.parts(first, last, pair)) {
            let mut w = Working::default();
            let stub = self.column_stub(first, last, true, n.r_c, &mut w);
            let (title, clause) = ("column flange in bending", "EN 1993-1-8:2005 6.2.6.4");
            self.bending("column-flange-in-bending", title, clause, stub, w, (first, last), limits);
        }
        let mut w = Working::default();
        let plain = self.column_stub(first, last, false, n.r_c, &mut w);
        if !pairs.is_empty() {
            limits.push(self.stiffener_limit(first, last, &pairs, &plain, w));
        }
        // A large radius brings the yield lines nearer and leaves less of the web.
        let mut w = Working::default();
        let length = self.column_stub(first, last, false, n.r_c_most, &mut w).l_eff_1.max(Length::ZERO);
        let mut web = column_web::tension(
            length,
            n.column.t_w,
            n.column_strength.f_y_web,
            n.column.a_v_z,
            self.beta,
            self.gamma_M0(),
        );
        w.absorb(web.working);
        for pair in &pairs {
            let stiffened = stiffeners::tension(&pair.plates(n), web.value, self.gamma_M0());
            w.absorb(stiffened.working);
            web.value = stiffened.value;
        }
        let what = if pairs.is_empty() { "column web" } else { "column web and stiffener" };
        limits.push(Limit {
            id: "column-web-in-tension",
            title: format!("{what} in tension, {}", self.named(first, last)),
            clause: "EN 1993-1-8:2005 6.2.6.3",
            first,
            last,
            resistance: Resistance { value: web.value, working: w },
            length,
            bolts_used: false,
        });
    }

    /// What the stiffeners bear that the rows lean on, and the flange without them where that is more. Rows beside one
    /// pair: what the pair can take of them. A longer range: the flange without stiffeners and the pairs' own resistance,
    /// the pattern in which the stiffeners yield with it.
    fn stiffener_limit(
        &self,
        first: usize,
        last: usize,
        pairs: &[&StiffenerPair],
        plain: &TStub,
        mut w: Working,
    ) -> Limit {
        let gamma_M0 = self.gamma_M0();
        let flange = t_stub(plain, gamma_M0).resistance;
        w.absorb(flange.working);
        let share = |i: usize| {
            let m = self.m_column(&self.rows[i]);
            self.next_to_stiffener(i).map(|(m_2, _)| m / (m + m_2))
        };
        let beside_one = match (pairs, last - first) {
            ([pair], 0) => Some(pair),
            ([pair], 1) if self.parts(first, last, pair) => Some(pair),
            _ => None,
        };
        let value = match (beside_one, [share(first), share(last)].into_iter().flatten().reduce(f64::max)) {
            (Some(pair), Some(most)) => {
                let support = stiffeners::support(&pair.plates(self.n), most, gamma_M0);
                w.absorb(support.working);
                support.value.max(flange.value)
            }
            _ => pairs.iter().fold(flange.value, |value, pair| {
                let with = stiffeners::tension(&pair.plates(self.n), value, gamma_M0);
                w.absorb(with.working);
                with.value
            }),
        };
        Limit {
            id: "column-stiffener-in-tension",
            title: format!("column stiffener beside {}", self.named(first, last)),
            clause: "EN 1993-1-8:2005 6.2.6.4",
            first,
            last,
            resistance: Resistance { value, working: w },
            length: plain.l_eff_1,
            bolts_used: false,
        }
    }

    // ---- end plate side ---------------------------------------------------------------------------------------

    fn m_plate(&self, row: &Row) -> Length {
        self.m_web(row, self.n.a_web)
    }

    /// m of the end plate beside the beam's web with fillets of throat `a`.
    fn m_web(&self, row: &Row, a: Option<Length>) -> Length {
        0.5 * (row.gauge - self.n.beam.t_w - 2.0 * Numbers::fillet(a))
    }

    fn m_x(&self, row: &Row) -> Length {
        row.height - self.n.beam.h - Numbers::fillet(self.n.a_tension)
    }

    fn m_2_plate(&self, row: &Row) -> Length {
        self.n.beam.h - self.n.beam.t_f - row.height - Numbers::fillet(self.n.a_tension)
    }

    fn plate_limits(&self, first: usize, last: usize, limits: &mut Vec<Limit>) {
        let n = self.n;
        let mut w = Working::default();
        if self.places[first] == OnPlate::Outside {
            if first != last {
                return; // the flange parts the plate: no group across it
            }
            let row = &self.rows[first];
            let (m_x, e_x) = (self.m_x(row), n.plate_top - row.height);
            w.heading(format!("row {}", row.number));
            let length = el::outside_tension_flange(m_x, e_x, row.e_plate, row.gauge, n.b_p);
            let (l_1, l_2) = sum(&[length], &mut w);
            let stub = TStub { m: m_x, n: e_x.min(1.25 * m_x), ..self.plate_stub(l_1, l_2, first, last) };
            let title = ("end-plate-in-bending", "end plate in bending", "EN 1993-1-8:2005 6.2.6.5");
            self.bending(title.0, title.1, title.2, stub, w, (first, last), limits);
            return;
        }
        let (l_1, l_2) = self.plate_lengths(first, last, n.a_web, &mut w);
        let m = self.over(first, last, |row| self.m_plate(row), Length::max);
        let n_e = self.over(first, last, |row| row.e_plate.min(row.e_column), Length::min);
        let stub = TStub { m, n: n_e.min(1.25 * m), ..self.plate_stub(l_1, l_2, first, last) };
        let (title, clause) = ("end plate in bending", "EN 1993-1-8:2005 6.2.6.5");
        self.bending("end-plate-in-bending", title, clause, stub, w, (first, last), limits);

        // A large fillet brings the yield lines nearer and leaves less of the web; none is thicker than the web.
        let mut w = Working::default();
        let (length, _) = self.plate_lengths(first, last, n.a_web.or(Some(n.beam.t_w)), &mut w);
        let length = length.max(Length::ZERO);
        let web = beam::web_tension(length, n.beam.t_w, n.beam_strength.f_y_web, self.gamma_M0());
        w.absorb(web.working);
        limits.push(Limit {
            id: "beam-web-in-tension",
            title: format!("beam web in tension, {}", self.named(first, last)),
            clause: "EN 1993-1-8:2005 6.2.6.8",
            first,
            last,
            resistance: Resistance { value: web.value, working: w },
            length,
            bolts_used: false,
        });
    }

    /// Σ l_eff,1 and Σ l_eff,2 of rows beside the beam's web, with a fillet of throat `a` there.
    fn plate_lengths(&self, first: usize, last: usize, a: Option<Length>, w: &mut Working) -> (Length, Length) {
        let mut lengths = Vec::new();
        for i in first..=last {
            let row = &self.rows[i];
            let (m, e) = (self.m_web(row, a), row.e_plate);
            w.heading(format!("row {}", row.number));
            let mut place = || match self.places[i] {
                OnPlate::BelowFlange => RowPlace::Stiffened { alpha: self.alpha(m, e, self.m_2_plate(row), w) },
                _ => RowPlace::Plain,
            };
            lengths.push(if first == last {
                el::alone(place(), m, e, None)
            } else if i == first {
                el::end_of_group(place(), m, e, self.pitch_below(i), None)
            } else if i == last {
                el::end_of_group(RowPlace::Plain, m, e, self.pitch_below(i - 1), None)
            } else {
                el::inner_in_group(0.5 * (self.pitch_below(i - 1) + self.pitch_below(i)))
            });
        }
        sum(&lengths, w)
    }

    fn plate_stub(&self, l_eff_1: Length, l_eff_2: Length, first: usize, last: usize) -> TStub {
        TStub {
            l_eff_1,
            l_eff_2,
            t_f: self.n.t_p,
            f_y: self.n.plate_strength.f_y,
            m: Length::ZERO,
            n: Length::ZERO,
            sum_F_t_Rd: self.bolt_force(first, last, self.n.B_p_plate),
            mode_one: self.mode_one(),
        }
    }

    // ---- both sides -------------------------------------------------------------------------------------------

    #[allow(clippy::too_many_arguments)]
    fn bending(
        &self,
        id: &'static str,
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

    fn mode_one(&self) -> ModeOne {
        match self.rulebook.settings.mode_one {
            rulebook::ModeOne::Method1 => ModeOne::Method1,
            rulebook::ModeOne::Method2 => ModeOne::Method2 { d_w: self.n.washer },
        }
    }

    fn bolt_force(&self, first: usize, last: usize, punching: Force) -> Force {
        2.0 * (last - first + 1) as f64 * self.n.F_t_Rd.min(punching)
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

/// From the centre of compression, the middle of the compression flange (6.2.7.1, Figure 6.15).
pub fn lever_arm(n: &Numbers, row: &Row) -> Length {
    row.height - 0.5 * n.beam.t_f
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
