//! The end plate in bending and the beam's web in tension.
#![allow(non_snake_case)]

use super::{Limit, OnPlate, TensionSide, sum};
use crate::assess::end_plate::numbers::{Numbers, Row};
use crate::eurocode::effective_length::{self as el, RowPlace};
use crate::eurocode::t_stub::TStub;
use crate::eurocode::{Resistance, beam};
use crate::units::Length;
use crate::working::Working;

impl TensionSide<'_> {
    pub(super) fn m_plate(&self, row: &Row) -> Length {
        self.m_web(row, self.n.a_web)
    }

    /// m of the end plate beside the beam's web with fillets of throat `a`.
    fn m_web(&self, row: &Row, a: Option<Length>) -> Length {
        0.5 * (row.gauge - self.n.beam.t_w - 2.0 * Numbers::fillet(a))
    }

    pub(super) fn m_x(&self, row: &Row) -> Length {
        row.height - self.n.beam.h - Numbers::fillet(self.n.a_tension)
    }

    pub(super) fn m_2_plate(&self, row: &Row) -> Length {
        self.n.beam.h - self.n.beam.t_f - row.height - Numbers::fillet(self.n.a_tension)
    }

    pub(super) fn plate_limits(&self, first: usize, last: usize, limits: &mut Vec<Limit>) {
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
            backing: None,
        }
    }
}
