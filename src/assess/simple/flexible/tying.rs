//! A tying force along the beam: ultimate strengths by γ_Mu, large deformations allowed (design guides).

use super::super::component;
use super::Numbers;
use crate::assess::Component;
use crate::assess::end_plate::numbers::Noted;
use crate::eurocode::Resistance;
use crate::eurocode::t_stub::{ModeOne, TStub, t_stub};
use crate::eurocode::{bolts, flexible, welds};
use crate::joints::HeldBy;
use crate::origin::Ask;
use crate::rulebook;
use crate::units::{Area, Length};
use crate::{given, step};

impl Numbers<'_> {
    /// Empty where the annex has no γ_Mu or the weld is not known.
    pub(super) fn in_tying(&self) -> Vec<Component> {
        let (Some(gamma_Mu), Some(a), Some(beta_w)) = (self.rulebook.annex.gamma_mu, self.a, self.beta_w) else {
            return Vec::new();
        };
        let beside = self.beside_web();
        let tearing = flexible::web_tearing(self.beam.t_w, beside, self.beam_steel.f_u, gamma_Mu);
        let f_u = self.beam_steel.f_u.min(self.steel.f_u);
        let fillet = welds::across(a, f_u, beta_w, gamma_Mu);
        let (mut w, F_w_Rd, l_w) = (fillet.working, fillet.per_length, self.weld_length(a));
        given!(w, "both sides of the web beside the plate, by gamma_Mu"; gamma_Mu, l_w);
        step!(w, "4.5.3.2", N_weld_Rd_u = 2.0 * F_w_Rd * l_w);
        let weld = Resistance { value: N_weld_Rd_u, working: w };
        let mut all = vec![
            component(
                "end-plate-in-tying",
                "end plate in tying",
                "EN 1993-1-8:2005 6.2.4",
                self.plate_pulled(a, gamma_Mu),
            ),
            component("beam-web-in-tying", "beam web in tying", "EN 1993-1-1 6.2.3", tearing),
            component("web-weld-in-tying", "weld at the web in tying", "EN 1993-1-8:2005 4.5.3.2", weld),
        ];
        if self.layout.held != HeldBy::ColumnFlange {
            all.extend(self.web_pulled(gamma_Mu).map(|r| {
                let title = format!("{} in tying", self.layout.held.word());
                component("supporting-web-in-tying", &title, "tying, design guides", r)
            }));
        }
        all
    }

    /// What of the support is not covered where a tying force is asked for.
    pub(super) fn note_tying(&self, noted: &mut Noted) {
        if self.rulebook.annex.gamma_mu.is_none() {
            noted.not_checked("tying", "the annex states no gamma_Mu".into(), Ask::Method);
        }
        if self.layout.held == HeldBy::ColumnFlange {
            let reason = "column flange and web under a tying force: not assessed yet";
            noted.not_checked("column in tying", reason.into(), Ask::Method);
        } else if self.web_pulled(1.0).is_none() {
            let reason = "the bolts do not lie between the flanges of the supporting web";
            noted.not_checked("supporting web in tying", reason.into(), Ask::Method);
        }
    }

    /// All rows as one T-stub about the beam's web; f_y stands for f_u, gamma_M0 for gamma_Mu.
    fn plate_pulled(&self, a: Length, gamma_Mu: f64) -> Resistance {
        let (b, rows) = (&self.bolts, &self.layout.bolts.rows);
        let bolt = bolts::tension(b.f_ub, b.A_s, gamma_Mu);
        let plies = [(self.layout.plate.thickness, self.steel.f_u), (self.t_2(), self.support_steel.f_u)];
        let punching = plies.map(|(t, f_u)| bolts::punching(b.d_m, t, f_u, gamma_Mu));
        let F_t_Rd_u = punching.iter().fold(bolt.value, |least, one| least.min(one.value));
        let mut w = bolt.working;
        punching.into_iter().for_each(|one| w.absorb(one.working));
        let (p_3, t_w, d_0) = (self.gauge(), self.beam.t_w, b.d_0);
        let n_s = 2.0 * rows.len() as f64;
        given!(w, "T-stub of the plate about the beam's web"; p_3, t_w, d_0, a, n_s, F_t_Rd_u);
        step!(w, "6.2.4", m = 0.5 * (p_3 - t_w - 2.0 * 0.8 * 2.0_f64.sqrt() * a));
        let e_min = self.edge();
        given!(w, "to the plate's edge"; e_min);
        step!(w, "6.2.4", n = e_min.min(1.25 * m));
        step!(
            w,
            "a row's reach past itself, design guides",
            reach = 0.5 * (p_3 - t_w - 2.0 * 2.0_f64.sqrt() * a) + 0.5 * d_0
        );
        let ends = (rows.first().map_or(Length::ZERO, |row| self.layout.plate.top - row.height), rows.last());
        let lower = ends.1.map_or(Length::ZERO, |row| row.height - self.layout.plate.bottom);
        let between: Length = rows.windows(2).map(|pair| (pair[0].height - pair[1].height).min(2.0 * reach)).sum();
        let l_eff = ends.0.min(reach) + lower.min(reach) + between;
        given!(w, "sum over the rows, ends and pitches within their reach"; l_eff);
        w.heading("by ultimate strengths: f_y stands for f_u, gamma_M0 for gamma_Mu");
        let mode_one = match self.rulebook.settings.mode_one {
            rulebook::ModeOne::Method1 => ModeOne::Method1,
            rulebook::ModeOne::Method2 => ModeOne::Method2 { d_w: b.washer },
        };
        let stub = TStub {
            l_eff_1: l_eff,
            l_eff_2: l_eff,
            t_f: self.layout.plate.thickness,
            f_y: self.steel.f_u,
            m,
            n,
            sum_F_t_Rd: n_s * F_t_Rd_u,
            mode_one,
            backing: None,
        };
        let stub = t_stub(&stub, gamma_Mu).resistance;
        w.absorb(stub.working);
        Resistance { value: stub.value, working: w }
    }

    /// `None` where the bolts lie beyond the web's clear depth.
    fn web_pulled(&self, gamma_Mu: f64) -> Option<Resistance> {
        let rows = &self.layout.bolts.rows;
        let (first, last) = rows.first().zip(rows.last())?;
        let section = &self.support;
        let d_2 = section.h - 2.0 * (section.t_f + section.r.unwrap_or(Length::ZERO));
        let p = first.height - last.height;
        let (p_3, d_0, n_1) = (self.gauge(), self.bolts.d_0, rows.len() as f64);
        // On a beam's web the yield lines run between its flanges, past the rows instead of past the gauge.
        let (along, across) = if self.layout.held == HeldBy::BeamWeb { (p_3, p) } else { (p, p_3) };
        let lines = if self.layout.held == HeldBy::BeamWeb { 2.0 } else { n_1 };
        if !(across > Length::ZERO && across < d_2 && d_0 < d_2 && d_2 * section.t_w > Area::ZERO) {
            return None;
        }
        let f_u = self.support_steel.f_u;
        Some(flexible::web_pulled(section.t_w, d_2, across, d_0, along, lines, f_u, gamma_Mu))
    }
}
