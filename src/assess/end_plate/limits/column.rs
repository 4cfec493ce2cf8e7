//! The column's flange and web, and the stiffeners that the rows lean on.
#![allow(non_snake_case)]

use super::{Limit, TensionSide, sum};
use crate::assess::end_plate::numbers::{ColumnSide, Numbers, Row, StiffenerPair};
use crate::assess::end_plate::{strengthening, totals};
use crate::eurocode::effective_length::{self as el, EffectiveLength, RowPlace};
use crate::eurocode::t_stub::{TStub, t_stub};
use crate::eurocode::{Resistance, column_web, stiffeners};
use crate::units::Length;
use crate::working::Working;

impl TensionSide<'_> {
    pub(super) fn m_column(&self, column: &ColumnSide, row: &Row) -> Length {
        self.m_beside(column, row, column.r)
    }

    /// m of the column's flange with this root radius.
    fn m_beside(&self, column: &ColumnSide, row: &Row, r: Length) -> Length {
        0.5 * (row.gauge - column.section.t_w - 2.0 * (0.8 * r))
    }

    /// The stiffener right above (`up`) or below a tension row, with no other bolt row between, that the row's yield line
    /// reaches (m_2 below half of the plain pattern): m_2 and the pair. One further away helps nothing.
    fn stiffener_beside<'c>(&self, column: &'c ColumnSide, i: usize, up: bool) -> Option<(Length, &'c StiffenerPair)> {
        let row = self.rows[i].height;
        // A stiffener in a row's own plane counts as above it: m_2 is then below 0, and the row is refused.
        let beyond = |height: Length| if up { height >= row } else { height < row };
        let distance = |height: Length| (height - row).abs();
        let pair = (column.stiffeners.iter().filter(|s| beyond(s.height)))
            .min_by(|a, b| distance(a.height).get().total_cmp(&distance(b.height).get()))?;
        let between = self.n.rows.iter().any(|other| {
            beyond(other.height)
                && distance(other.height) > Length::ZERO
                && distance(other.height) < distance(pair.height)
        });
        let m_2 = distance(pair.height) - 0.5 * pair.t_s - Numbers::fillet(Some(pair.throat));
        let reach = 2.0 * self.m_column(column, &self.rows[i]) + 0.625 * self.rows[i].e_support;
        (!between && m_2 < reach).then_some((m_2, pair))
    }

    pub(super) fn next_to_stiffener<'c>(
        &self,
        column: &'c ColumnSide,
        i: usize,
    ) -> Option<(Length, &'c StiffenerPair)> {
        let beside = [self.stiffener_beside(column, i, true), self.stiffener_beside(column, i, false)];
        beside.into_iter().flatten().min_by(|a, b| a.0.get().total_cmp(&b.0.get()))
    }

    fn column_place(
        &self,
        column: &ColumnSide,
        i: usize,
        beside: Option<(Length, &StiffenerPair)>,
        w: &mut Working,
    ) -> RowPlace {
        let row = &self.rows[i];
        match beside {
            None => RowPlace::Plain,
            Some((m_2, _)) => {
                RowPlace::Stiffened { alpha: self.alpha(self.m_column(column, row), row.e_support, m_2, w) }
            }
        }
    }

    /// Distance to the column's end above or below a row.
    fn column_end(&self, column: &ColumnSide, i: usize, up: bool) -> Option<Length> {
        let row = self.rows[i].height;
        if up {
            Some(column.above? + (self.n.rows.first()?.height - row))
        } else {
            Some(column.below? + (row - self.n.rows.last()?.height))
        }
    }

    /// The pairs of stiffeners that a range of rows leans on: those between its rows and those beside its ends.
    fn pairs_at<'c>(&self, column: &'c ColumnSide, first: usize, last: usize) -> Vec<&'c StiffenerPair> {
        if first == last {
            return self.next_to_stiffener(column, first).map(|(_, pair)| pair).into_iter().collect();
        }
        let beside = [self.stiffener_beside(column, first, true), self.stiffener_beside(column, last, false)];
        let outside = |s: &StiffenerPair| beside.iter().flatten().any(|(_, pair)| std::ptr::eq(*pair, s));
        column.stiffeners.iter().filter(|s| outside(s) || self.parts(first, last, s)).collect()
    }

    /// Whether a pair stands between rows of the range: then they are no group.
    fn parts(&self, first: usize, last: usize, pair: &StiffenerPair) -> bool {
        (self.rows[last].height..self.rows[first].height).contains(&pair.height)
    }

    /// Each row's share of the effective length of a range, on the column's flange with a root radius, with the stiffeners
    /// beside them or as if there were none.
    fn column_lengths(
        &self,
        column: &ColumnSide,
        (first, last): (usize, usize),
        stiffened: bool,
        r: Length,
        w: &mut Working,
    ) -> Vec<EffectiveLength> {
        let mut lengths = Vec::new();
        for i in first..=last {
            let row = &self.rows[i];
            let (m, e) = (self.m_beside(column, row, r), row.e_support);
            let place = |beside: Option<(Length, &StiffenerPair)>, w: &mut Working| {
                self.column_place(column, i, beside.filter(|_| stiffened), w)
            };
            w.heading(format!("row {}", row.number));
            lengths.push(if first == last {
                let place = place(self.next_to_stiffener(column, i), w);
                let end = [self.column_end(column, i, true), self.column_end(column, i, false)].into_iter().flatten();
                el::alone(place, m, e, end.min_by(|a, b| a.get().total_cmp(&b.get())))
            } else if i == first {
                let place = place(self.stiffener_beside(column, i, true), w);
                el::end_of_group(place, m, e, self.pitch_below(i), self.column_end(column, i, true))
            } else if i == last {
                let place = place(self.stiffener_beside(column, i, false), w);
                el::end_of_group(place, m, e, self.pitch_below(i - 1), self.column_end(column, i, false))
            } else {
                el::inner_in_group(0.5 * (self.pitch_below(i - 1) + self.pitch_below(i)))
            });
        }
        lengths
    }

    /// The smallest effective length of one row, alone or as part of a group (Table 6.11), with a root radius.
    pub(super) fn least_on_column(&self, column: &ColumnSide, row: usize, r: Length) -> Length {
        let parted = |first, last| {
            let pairs = self.pairs_at(column, first, last);
            first != last && pairs.iter().any(|pair| self.parts(first, last, pair))
        };
        self.least_length(row, |first, last, w| {
            (!parted(first, last)).then(|| self.column_lengths(column, (first, last), true, r, w))
        })
    }

    /// The column flange's T-stub of a range of rows with a root radius, with the stiffeners beside them or as if there were
    /// none.
    fn column_stub(
        &self,
        column: &ColumnSide,
        first: usize,
        last: usize,
        stiffened: bool,
        r: Length,
        w: &mut Working,
    ) -> TStub {
        let lengths = self.column_lengths(column, (first, last), stiffened, r, w);
        // A group of rows with unequal gauge takes the largest m and the smallest n.
        let m = self.over(first, last, |row| self.m_beside(column, row, r), Length::max);
        let n_e = self.over(first, last, Row::e_min, Length::min);
        let (l_eff_1, l_eff_2) = sum(&lengths, w);
        TStub {
            l_eff_1,
            l_eff_2,
            t_f: column.section.t_f,
            f_y: column.strength.f_y_flange,
            m,
            n: n_e.min(1.25 * m),
            sum_F_t_Rd: self.bolt_force(first, last, column.B_p_Rd),
            mode_one: self.mode_one(),
            backing: (column.strengthened)
                .behind(self.rows[first].height, self.rows[last].height, self.n.bolts.d)
                .filter(|_| stiffened),
        }
    }

    /// All of the column's web in tension and in compression: what a web plate must reach over to add to the panel
    /// (6.2.6.1(10)), as far as there is a column.
    pub(in crate::assess::end_plate) fn web_range(&self, column: &ColumnSide) -> (Length, Length) {
        let n = self.n;
        let stub = |i: usize| self.column_stub(column, i, i, false, column.r_most, &mut Working::default());
        let hi = (0..self.rows.len()).map(|i| self.rows[i].height + 0.5 * stub(i).l_eff_1);
        let hi = hi.fold(n.side.flange_top(), Length::max);
        let web = totals::web_in_compression(n, column, self.beta, self.rulebook.settings.k_wc);
        let lo = n.side.compression() - 0.5 * column_web::b_eff(&mut Working::default(), &web);
        let top = n.rows.first().zip(column.above).map(|(row, above)| row.height + above);
        let foot = n.rows.last().zip(column.below).map(|(row, below)| row.height - below);
        (foot.map_or(lo, |foot| lo.max(foot)), top.map_or(hi, |top| hi.min(top)))
    }

    pub(super) fn column_limits(&self, column: &ColumnSide, first: usize, last: usize, limits: &mut Vec<Limit>) {
        let pairs = self.pairs_at(column, first, last);
        if !pairs.iter().any(|pair| first != last && self.parts(first, last, pair)) {
            let mut w = Working::default();
            let stub = self.column_stub(column, first, last, true, column.r, &mut w);
            let (title, clause) = ("column flange in bending", "EN 1993-1-8:2005 6.2.6.4");
            self.bending(("column-flange-in-bending", None), title, clause, stub, w, (first, last), limits);
        }
        let mut w = Working::default();
        let plain = self.column_stub(column, first, last, false, column.r, &mut w);
        if !pairs.is_empty() {
            limits.push(self.stiffener_limit(column, first, last, &pairs, &plain, w));
        }
        // A large radius brings the yield lines nearer and leaves less of the web.
        let mut w = Working::default();
        let length = self.column_stub(column, first, last, false, column.r_most, &mut w).l_eff_1.max(Length::ZERO);
        let middle = 0.5 * (self.rows[first].height + self.rows[last].height);
        let range = (middle - 0.5 * length, middle + 0.5 * length);
        let t_wc = strengthening::in_tension(column, range, &mut w);
        let A_vc = strengthening::shear_area(column, self.web_range(column), self.rulebook, &mut w);
        let mut web = column_web::tension(length, t_wc, column.strength.f_y_web, A_vc, self.beta, self.gamma_M0());
        w.absorb(web.working);
        for pair in pairs.iter().filter(|pair| pair.full_depth) {
            let stiffened = stiffeners::tension(&pair.plates(column), web.value, self.gamma_M0(), self.gamma_M2());
            w.absorb(stiffened.working);
            web.value = stiffened.value;
        }
        let what = if !pairs.iter().any(|pair| pair.full_depth) { "column web" } else { "column web and stiffener" };
        limits.push(Limit {
            id: "column-web-in-tension",
            title: format!("{what} in tension, {}", self.named(first, last)),
            of: None,
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
    #[allow(clippy::too_many_arguments)]
    fn stiffener_limit(
        &self,
        column: &ColumnSide,
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
            let m = self.m_column(column, &self.rows[i]);
            self.next_to_stiffener(column, i).map(|(m_2, _)| m / (m + m_2))
        };
        let beside_one = match (pairs, last - first) {
            ([pair], 0) => Some(pair),
            ([pair], 1) if self.parts(first, last, pair) => Some(pair),
            _ => None,
        };
        let value = match (beside_one, [share(first), share(last)].into_iter().flatten().reduce(f64::max)) {
            (Some(pair), Some(most)) => {
                let support = stiffeners::support(&pair.plates(column), most, gamma_M0, self.gamma_M2());
                w.absorb(support.working);
                support.value.max(flange.value)
            }
            _ => pairs.iter().fold(flange.value, |value, pair| {
                let with = stiffeners::tension(&pair.plates(column), value, gamma_M0, self.gamma_M2());
                w.absorb(with.working);
                with.value
            }),
        };
        Limit {
            id: "column-stiffener-in-tension",
            title: format!("column stiffener beside {}", self.named(first, last)),
            of: None,
            clause: "EN 1993-1-8:2005 6.2.6.4",
            first,
            last,
            resistance: Resistance { value, working: w },
            length: plain.l_eff_1,
            bolts_used: false,
        }
    }
}
