//! The end plate in bending and the beam's web in tension.
#![allow(non_snake_case)]

use super::{Limit, OnPlate, PlateRows, TensionSide, sum};
use crate::assess::end_plate::numbers::{Numbers, Row};
use crate::eurocode::effective_length::{self as el, EffectiveLength, RowPlace};
use crate::eurocode::t_stub::TStub;
use crate::eurocode::{Resistance, beam};
use crate::units::Length;
use crate::working::Working;

impl PlateRows<'_> {
    pub(super) fn m(&self, row: &Row) -> Length {
        self.m_web(row, self.side.a_web)
    }

    /// m of the end plate beside the beam's web with fillets of throat `a`.
    fn m_web(&self, row: &Row, a: Option<Length>) -> Length {
        0.5 * (row.gauge - self.side.beam.t_w - 2.0 * Numbers::fillet(a))
    }

    pub(super) fn m_x(&self, row: &Row) -> Length {
        row.height - self.side.flange_top() - Numbers::fillet(self.side.a_tension)
    }

    pub(super) fn m_2(&self, row: &Row) -> Length {
        self.side.flange_top() - self.side.beam.t_f - row.height - Numbers::fillet(self.side.a_tension)
    }
}

impl TensionSide<'_> {
    pub(super) fn plate_limits(&self, plate: &PlateRows<'_>, first: usize, last: usize, limits: &mut Vec<Limit>) {
        let side = plate.side;
        let (title, clause) = (format!("end plate in bending{}", side.which.suffix()), "EN 1993-1-8:2005 6.2.6.5");
        let mut w = Working::default();
        if plate.places[first] == OnPlate::Outside {
            if first != last {
                return; // the flange parts the plate: no group across it
            }
            let row = &self.rows[first];
            let (m_x, e_x) = (plate.m_x(row), side.top - row.height);
            w.heading(format!("row {}", row.number));
            let length = el::outside_tension_flange(m_x, e_x, row.edge(side), row.gauge, side.b_p);
            let (l_1, l_2) = sum(&[length], &mut w);
            // Of two plates the one that ends nearer to the row (6.2.4.2, Figure 6.2).
            let e_x = self.n.least(|side| side.top) - row.height;
            let stub = TStub { m: m_x, n: e_x.min(1.25 * m_x), ..self.plate_stub(plate, l_1, l_2, first, last) };
            self.bending(("end-plate-in-bending", Some(side.which)), &title, clause, stub, w, (first, last), limits);
            return;
        }
        let (l_1, l_2) = self.plate_lengths(plate, first, last, side.a_web, &mut w);
        let m = self.over(first, last, |row| plate.m(row), Length::max);
        let n_e = self.over(first, last, Row::e_min, Length::min);
        let stub = TStub { m, n: n_e.min(1.25 * m), ..self.plate_stub(plate, l_1, l_2, first, last) };
        self.bending(("end-plate-in-bending", Some(side.which)), &title, clause, stub, w, (first, last), limits);

        // A large fillet brings the yield lines nearer and leaves less of the web; none is thicker than the web.
        let mut w = Working::default();
        let (length, _) = self.plate_lengths(plate, first, last, side.a_web.or(Some(side.beam.t_w)), &mut w);
        let length = length.max(Length::ZERO);
        let web = beam::web_tension(length, side.beam.t_w, side.beam_strength.f_y_web, self.gamma_M0());
        w.absorb(web.working);
        limits.push(Limit {
            id: "beam-web-in-tension",
            title: format!("beam web in tension{}, {}", side.which.suffix(), self.named(first, last)),
            of: Some(side.which),
            clause: "EN 1993-1-8:2005 6.2.6.8",
            first,
            last,
            resistance: Resistance { value: web.value, working: w },
            length,
            bolts_used: false,
        });
    }

    /// Σ l_eff,1 and Σ l_eff,2 of rows beside the beam's web, with a fillet of throat `a` there.
    fn plate_lengths(
        &self,
        plate: &PlateRows<'_>,
        first: usize,
        last: usize,
        a: Option<Length>,
        w: &mut Working,
    ) -> (Length, Length) {
        sum(&self.plate_row_lengths(plate, first, last, a, w), w)
    }

    /// Each row's share of them.
    fn plate_row_lengths(
        &self,
        plate: &PlateRows<'_>,
        first: usize,
        last: usize,
        a: Option<Length>,
        w: &mut Working,
    ) -> Vec<EffectiveLength> {
        let mut lengths = Vec::new();
        for i in first..=last {
            let row = &self.rows[i];
            let (m, e) = (plate.m_web(row, a), row.edge(plate.side));
            w.heading(format!("row {}", row.number));
            let mut place = || match plate.places[i] {
                OnPlate::BelowFlange => RowPlace::Stiffened { alpha: self.alpha(m, e, plate.m_2(row), w) },
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
        lengths
    }

    /// The smallest effective length of one row, alone or as part of a group (Table 6.11), and its m or m_x.
    pub(super) fn least_on_plate(&self, plate: &PlateRows<'_>, i: usize) -> (Length, Length) {
        let (row, side) = (&self.rows[i], plate.side);
        if plate.places[i] == OnPlate::Outside {
            let (m_x, e_x) = (plate.m_x(row), side.top - row.height);
            let length = el::outside_tension_flange(m_x, e_x, row.edge(side), row.gauge, side.b_p);
            return (length.cp.min(length.nc), m_x);
        }
        let least = self.least_length(i, |first, last, w| {
            (plate.places[first] != OnPlate::Outside).then(|| self.plate_row_lengths(plate, first, last, side.a_web, w))
        });
        (least, plate.m(row))
    }

    fn plate_stub(&self, plate: &PlateRows<'_>, l_eff_1: Length, l_eff_2: Length, first: usize, last: usize) -> TStub {
        TStub {
            l_eff_1,
            l_eff_2,
            t_f: plate.side.t_p,
            f_y: plate.side.strength.f_y,
            m: Length::ZERO,
            n: Length::ZERO,
            sum_F_t_Rd: self.bolt_force(first, last, plate.side.B_p_Rd),
            mode_one: self.mode_one(),
            backing: None,
        }
    }
}
