//! Flexible end plates: the checks of the design guides for simple joints, by the clauses of EN 1993-1-8 where it has them.
#![allow(non_snake_case)]

mod support;
mod tying;

use super::{Strength, component, pinned, weakest};
use crate::assess::end_plate::numbers::{BoltNumbers, MemberStrength, Noted, print_length};
use crate::assess::end_plate::sound;
use crate::assess::{Assessment, Component};
use crate::eurocode::bolts::{self, BearingPlace};
use crate::eurocode::notched::{self, Left};
use crate::eurocode::{Resistance, flexible, net_section, welds};
use crate::intent::LoadCase;
use crate::joints::{FlexibleEndPlate, HeldBy};
use crate::origin::Ask;
use crate::rulebook::{Grade, Rulebook, Section, Strength as Steel};
use crate::units::{Force, Length, Stress, mm};
use crate::working::Working;
use crate::{given, step};

/// a/t of a pair of fillets as strong as the web, by f_y. Steel Buildings in Europe, Multi-Storey Steel Buildings, Part 5.
const FULL_STRENGTH: [(f64, f64); 4] = [(235.0, 0.46), (275.0, 0.48), (355.0, 0.55), (460.0, 0.74)];
/// The guides' least depth of the plate over the beam's, for the beam's end to be held against twisting.
const HELD: f64 = 0.6;
/// How far along a web a line of bolts tears beyond its last bolt at most, in bolt diameters; from memory of the guides.
const TEARS: f64 = 5.0;

/// What the formulas need.
struct Numbers<'a> {
    layout: &'a FlexibleEndPlate,
    rulebook: &'a Rulebook,
    bolts: BoltNumbers,
    beam: Section,
    beam_steel: MemberStrength,
    r_b: Length,
    support: Section,
    support_steel: MemberStrength,
    steel: Steel,
    a: Option<Length>,
    /// Of the larger of both parts' grades.
    beta_w: Option<f64>,
    F_v_Rd: Force,
    shear_working: Working,
}

/// Assesses it against load cases.
pub fn assess(layout: &FlexibleEndPlate, cases: &[&LoadCase], rulebook: &Rulebook) -> Assessment {
    let mut noted = Noted::default();
    let numbers = Numbers::gather(layout, rulebook, &mut noted);
    let (mut shear, mut pulled) = (Vec::new(), Vec::new());
    if let Some(n) = &numbers {
        shear = n.in_shear();
        let shared = layout.shared.iter().any(|shared| *shared);
        if let Some(least) = weakest(&shear).filter(|least| shared && least.id.starts_with("supporting-web")) {
            let reason = format!(
                "another end plate hangs on the same bolts, and its force is not known here: {} less all that its bolts can bring",
                least.title
            );
            noted.lower_bound("force of the end plate on the web's other side", reason);
        }
        n.note_conditions(&mut noted);
        if cases.iter().any(|case| case.tying.is_some()) {
            n.note_tying(&mut noted);
        }
        pulled = n.in_tying();
    }
    let Noted { inputs, assumptions, gaps, .. } = noted;
    pinned(Strength { shear, tying: pulled, gaps, assumptions, inputs }, cases, rulebook)
}

impl<'a> Numbers<'a> {
    fn gather(layout: &'a FlexibleEndPlate, rulebook: &'a Rulebook, noted: &mut Noted) -> Option<Self> {
        let role = if layout.held == HeldBy::BeamWeb { "supporting beam" } else { "column" };
        let support = noted.member(role, &layout.supporting, rulebook);
        let beam = noted.member("beam", &layout.beam, rulebook);
        let plate = &layout.plate;
        for (name, value) in [("thickness", plate.thickness), ("width", plate.width)] {
            noted.given(&format!("end plate {name}"), value, "the plate's body");
        }
        for (name, value) in [("upper", plate.top), ("lower", plate.bottom)] {
            noted.given(&format!("end plate {name} edge"), value, "above the soffit of the beam");
        }
        for (name, cope) in [("top", layout.top), ("bottom", layout.bottom)] {
            if let Some(cope) = cope {
                noted.given(
                    &format!("notch at the {name}, length"),
                    cope.length,
                    "the box round what is cut off the beam",
                );
                noted.given(
                    &format!("notch at the {name}, depth"),
                    cope.depth,
                    "the box round what is cut off the beam",
                );
            }
        }
        let grade = noted.take("end plate grade", &plate.grade, |g: &Grade| g.0.clone());
        let steel = grade.as_ref().and_then(|g| noted.strength("end plate strength", rulebook, g, plate.thickness));
        let least = rulebook.welds.min_throat;
        let a = noted.take("weld at the web", &layout.weld, |a| format!("throat {}", print_length(a)));
        let a = a.filter(|a| {
            let counts = *a >= least && a.get().is_finite();
            if !counts {
                let reason = format!("a throat of {a} is not counted, {least} is the least (4.5.2(2))");
                noted.not_checked("weld at the web", reason, Ask::Fabricator);
            }
            counts
        });
        let behind = layout.supporting.section.as_ref().ok().map(|section| match layout.held {
            HeldBy::ColumnFlange => section.value.t_f,
            HeldBy::ColumnWeb | HeldBy::BeamWeb => section.value.t_w,
        });
        let bolts = BoltNumbers::gather(&layout.bolts, behind.map(|t| [plate.thickness, t]), rulebook, noted);
        let ((support, support_steel, _), (beam, beam_steel, r_b)) = (support?, beam?);
        let (bolts, steel) = (bolts?, steel?);
        let mut reasons = sound::of_bolts(&layout.bolts.rows, &bolts, rulebook);
        reasons.extend(sizes(layout, &beam));
        for (what, reason) in &reasons {
            noted.not_checked(what, reason.clone(), Ask::Method);
        }
        if !reasons.is_empty() {
            return None;
        }
        let grades = [grade.as_ref(), layout.beam.grade.as_ref().ok().map(|grade| &grade.value)];
        let beta_w = grades.map(|grade| grade.and_then(|grade| rulebook.beta_w(grade)));
        let beta_w = beta_w[0].zip(beta_w[1]).map(|(a, b)| a.max(b));
        if beta_w.is_none() {
            noted.not_checked("weld at the web", "Table 4.1 has no beta_w for its steel".into(), Ask::Method);
        }
        let thread = bolts.thread_in_plane.unwrap_or(rulebook.settings.thread_in_shear_plane);
        let (alpha_v, area) = if thread { (bolts.alpha_v, bolts.A_s) } else { (rulebook.alpha_v_shank, bolts.A) };
        // 3.6.1(5).
        let beta_hole = if bolts.d <= mm(14.0) && !(bolts.d_0 - bolts.d < mm(2.0)) { 0.85 } else { 1.0 };
        let one = bolts::shear(alpha_v, bolts.f_ub, area, beta_hole, rulebook.annex.gamma_m2);
        Some(Self {
            layout,
            rulebook,
            bolts,
            beam,
            beam_steel,
            r_b,
            support,
            support_steel,
            steel,
            a,
            beta_w,
            F_v_Rd: one.value,
            shear_working: one.working,
        })
    }

    fn h_p(&self) -> Length {
        self.layout.plate.top - self.layout.plate.bottom
    }

    /// The largest gauge: what the plate's bending and the T-stub go by.
    fn gauge(&self) -> Length {
        self.layout.bolts.rows.iter().map(|row| row.gauge).fold(Length::ZERO, Length::max)
    }

    fn edge(&self) -> Length {
        self.layout.bolts.rows.iter().map(|row| row.edge_plate).fold(mm(f64::MAX), Length::min)
    }

    /// Length of the plate beside the straight part of the beam's web.
    fn beside_web(&self) -> Length {
        self.layout.beside_web(self.beam.h, self.beam.t_f, self.r_b)
    }

    fn in_shear(&self) -> Vec<Component> {
        let mut all = vec![self.bolts_in_shear(), self.plate_in_bearing()];
        all.extend(self.plate());
        all.extend(self.beam());
        all.extend(self.weld());
        all.extend(self.support());
        all
    }

    fn bolts_in_shear(&self) -> Component {
        let mut w = self.shear_working.clone();
        let (n_s, F_v_Rd) = (2.0 * self.layout.bolts.rows.len() as f64, self.F_v_Rd);
        let share = self.rulebook.simple.bolt_group;
        given!(w, "bolts, share beside the tension in them"; n_s, share);
        step!(w, "flexible end plates, design guides", V_v_Rd = share * n_s * F_v_Rd);
        component(
            "bolts-in-shear",
            "bolts in shear",
            "EN 1993-1-8:2005 3.6.1",
            Resistance { value: V_v_Rd, working: w },
        )
    }

    /// Bearing of the group by 3.7: the sum, or where a bolt would shear off first, as often the smallest.
    fn bearing(&self, t: Length, f_u: Stress, ends: [Option<Length>; 2], e_2: impl Fn(usize) -> Length) -> Resistance {
        let up = self.bearing_towards(true, t, f_u, ends, &e_2);
        let down = self.bearing_towards(false, t, f_u, ends, &e_2);
        if up.value <= down.value { up } else { down }
    }

    /// `ends`: from the highest row up and from the lowest down to the ply's end; `None` where a flange closes it.
    fn bearing_towards(
        &self,
        up: bool,
        t: Length,
        f_u: Stress,
        ends: [Option<Length>; 2],
        e_2: &impl Fn(usize) -> Length,
    ) -> Resistance {
        let mut w = Working::default();
        let rows = &self.layout.bolts.rows;
        let (b, gamma_M2) = (&self.bolts, self.rulebook.annex.gamma_m2);
        let (mut sum, mut least, mut most) = (Force::ZERO, Force(f64::INFINITY), Force::ZERO);
        for (i, row) in rows.iter().enumerate() {
            let ahead = if up { i.checked_sub(1) } else { Some(i + 1) };
            let ahead = ahead.and_then(|j| rows.get(j));
            let e_1 = if ahead.is_some() { None } else { ends[usize::from(!up)] };
            let p_1 = ahead.map(|next| (next.height - row.height).abs());
            w.heading(format!("row {}, bolts pushing {}", i + 1, if up { "up" } else { "down" }));
            let place = BearingPlace { e_1, p_1, e_2: e_2(i), p_2: Some(row.gauge) };
            let one = bolts::bearing(place, b.d, b.d_0, t, f_u, b.f_ub, gamma_M2);
            w.absorb(one.working);
            sum += 2.0 * one.value;
            (least, most) = (least.min(one.value), most.max(one.value));
        }
        let (F_v_Rd, F_b_least, F_b_most, sum_F_b) = (self.F_v_Rd, least, most, sum);
        let n_s = 2.0 * rows.len() as f64;
        w.heading("the group");
        given!(w, "two bolts a row"; n_s, F_v_Rd, F_b_least, F_b_most, sum_F_b);
        step!(w, "EN 1993-1-8 3.7", V_b_Rd = if F_v_Rd >= F_b_most { sum_F_b } else { n_s * F_b_least });
        Resistance { value: V_b_Rd, working: w }
    }

    fn plate_in_bearing(&self) -> Component {
        let (rows, plate) = (&self.layout.bolts.rows, &self.layout.plate);
        let ends = [rows.first().map(|row| plate.top - row.height), rows.last().map(|row| row.height - plate.bottom)];
        let bearing = self.bearing(plate.thickness, self.steel.f_u, ends, |i| rows[i].edge_plate);
        component("end-plate-in-bearing", "end plate in bearing", "EN 1993-1-8:2005 3.6.1", bearing)
    }

    /// The plate along both lines of bolts.
    fn plate(&self) -> Vec<Component> {
        let annex = &self.rulebook.annex;
        let (t_p, h_p, d_0) = (self.layout.plate.thickness, self.h_p(), self.bolts.d_0);
        let rows = &self.layout.bolts.rows;
        let n_1 = rows.len() as f64;
        let (f_y, f_u) = (self.steel.f_y, self.steel.f_u);
        let gross = net_section::gross_shear(2.0 * (h_p * t_p), f_y, self.rulebook.simple.gross_shear, annex.gamma_m0);
        let net = net_section::net_shear(2.0 * ((h_p - n_1 * d_0) * t_p), f_u, annex.gamma_m2);
        let low = !(h_p >= flexible::LOW * self.gauge());
        let share = if low && rows.len() > 1 { self.rulebook.simple.block_tearing } else { 1.0 };
        let A_nt = 2.0 * (t_p * (self.edge() - 0.5 * d_0));
        let e_1 = (rows.first().map(|row| self.layout.plate.top - row.height))
            .zip(rows.last().map(|row| row.height - self.layout.plate.bottom))
            // The block may tear out upwards or downwards: the longer end is the one that it leaves.
            .map_or(Length::ZERO, |(top, bottom)| top.max(bottom));
        let A_nv = 2.0 * (t_p * (h_p - e_1 - (n_1 - 0.5) * d_0));
        let block = net_section::block_tearing((A_nt, A_nv), (f_y, f_u), share, (annex.gamma_m0, annex.gamma_m2));
        let mut all = vec![
            component("end-plate-gross-shear", "end plate, gross section in shear", "EN 1993-1-1 6.2.6", gross),
            component("end-plate-net-shear", "end plate, net section in shear", "EN 1993-1-1 6.2.6", net),
            component("end-plate-block-tearing", "end plate, block tearing", "EN 1993-1-8:2005 3.10.2", block),
        ];
        if low {
            let bent = flexible::plate_bending((t_p, h_p), self.gauge(), self.beam.t_w, f_y, annex.gamma_m0);
            all.push(component("end-plate-in-bending", "end plate in bending in its plane", "EN 1993-1-1 6.2.5", bent));
        }
        all
    }

    /// The beam's web beside the plate, and what a notch leaves of the beam.
    fn beam(&self) -> Vec<Component> {
        let gamma_M0 = self.rulebook.annex.gamma_m0;
        let (beam, f_y) = (&self.beam, self.beam_steel.f_y_web);
        let web = flexible::local_shear(self.beside_web(), beam.t_w, self.rulebook.simple.local_shear, f_y, gamma_M0);
        let mut all =
            vec![component("beam-web-in-shear", "beam web in shear beside the plate", "EN 1993-1-1 6.2.6", web)];
        let tee = Left::Tee { b: beam.b, t_f: beam.t_f, r: self.r_b };
        let section = |left, cut: Length| notched::Section { left, h_n: beam.h - cut, t_w: beam.t_w, f_y };
        // Where one notch is longer, its end has the other flange again.
        let mut ends = Vec::new();
        match (self.layout.top, self.layout.bottom) {
            (Some(top), Some(bottom)) => {
                ends.push((section(Left::Web, top.depth + bottom.depth), top.length.min(bottom.length)));
                let longer = if top.length > bottom.length { top } else { bottom };
                if !((top.length - bottom.length).abs() <= self.rulebook.tolerances.size) {
                    ends.push((section(tee, longer.depth), longer.length));
                }
            }
            (Some(one), None) | (None, Some(one)) => ends.push((section(tee, one.depth), one.length)),
            (None, None) => {}
        }
        for (section, length) in ends {
            let shear = notched::shear(&section, gamma_M0);
            let bending = notched::bending(&section, length + self.layout.plate.thickness, gamma_M0);
            all.push(component("beam-notch-in-shear", "beam at the notch in shear", "EN 1993-1-1 6.2.6", shear));
            all.push(component("beam-notch-in-bending", "beam at the notch in bending", "EN 1993-1-1 6.2.8", bending));
        }
        all
    }

    fn weld(&self) -> Option<Component> {
        let (a, beta_w) = (self.a?, self.beta_w?);
        let f_u = self.beam_steel.f_u.min(self.steel.f_u);
        let fillet = welds::along(a, f_u, beta_w, self.rulebook.annex.gamma_m2);
        let (mut w, F_w_Rd, l_w) = (fillet.working, fillet.per_length, self.weld_length(a));
        given!(w, "both sides of the web beside the plate, less a throat at each end"; l_w);
        step!(w, "4.5.3.2", V_w_Rd = 2.0 * F_w_Rd * l_w);
        let resistance = Resistance { value: V_w_Rd, working: w };
        Some(component("web-weld-in-shear", "weld at the web in shear", "EN 1993-1-8:2005 4.5.3.2", resistance))
    }

    fn weld_length(&self, a: Length) -> Length {
        (self.beside_web() - 2.0 * self.rulebook.welds.end_loss_in_throats * a).max(Length::ZERO)
    }

    /// What must hold for the method to be one of a nominally pinned joint.
    fn note_conditions(&self, noted: &mut Noted) {
        let (plate, b, beam) = (&self.layout.plate, &self.bolts, &self.beam);
        // t_p ≤ d/2.8 √(f_ub/f_y): the plate or the ply behind yields before the bolts break (design guides).
        let thickest = |f_y: Stress| b.d / 2.8 * (b.f_ub / f_y).sqrt();
        let (t_p, limit) = (plate.thickness, thickest(self.steel.f_y));
        let behind =
            self.layout.held == HeldBy::ColumnFlange && self.support.t_f <= thickest(self.support_steel.f_y_flange);
        if !(t_p <= limit) && !behind {
            let reason = format!(
                "an end plate of {t_p} is no ductile one with these bolts: {limit:.1} at most by the design guides"
            );
            noted.not_checked("rotation of the joint", reason, Ask::Engineer);
        }
        let full = FULL_STRENGTH.iter().find(|(f_y, _)| self.beam_steel.f_y_web.get() <= *f_y).map(|(_, share)| *share);
        if let Some(a) = self.a {
            match full.map(|share| share * beam.t_w) {
                Some(needed) if a >= needed - self.rulebook.tolerances.size => {}
                Some(needed) => noted.not_checked(
                    "ductility of the weld at the web",
                    format!("a throat of {a} is less than the web's full strength, {needed:.1} by the design guides: it may break as the joint turns"),
                    Ask::Fabricator,
                ),
                None => noted.not_checked(
                    "ductility of the weld at the web",
                    "the design guides have no full-strength weld for the web's steel".into(),
                    Ask::Method,
                ),
            }
        }
        if !(self.h_p() >= HELD * beam.h) {
            noted.assumptions.push(format!(
                "the end plate is lower than {HELD} of the beam: the beam's end is held against twisting by something else"
            ));
        }
        if self.layout.top.is_some() || self.layout.bottom.is_some() {
            noted.assumptions.push("the notched beam is held against lateral torsional buckling".into());
            self.note_notches(noted);
        }
    }

    fn note_notches(&self, noted: &mut Noted) {
        let (beam, f_y) = (&self.beam, self.beam_steel.f_y_web);
        let both = self.layout.top.is_some() && self.layout.bottom.is_some();
        // From memory of the guides: half of the beam's depth at one flange, a fifth at each of both.
        let deepest = if both { 0.2 * beam.h } else { 0.5 * beam.h };
        let longest = notched::longest_stable(beam.h, beam.t_w, f_y);
        for (at, cope) in [("top", self.layout.top), ("bottom", self.layout.bottom)] {
            let Some(cope) = cope else { continue };
            let stable = cope.depth <= deepest && longest.is_some_and(|longest| cope.length <= longest);
            if !stable {
                let longest = longest.map_or("no figure for its steel".into(), |l| format!("{l} long"));
                let reason = format!(
                    "{} long and {} deep; its edge is stable by the design guides up to {longest} and {deepest} deep",
                    cope.length, cope.depth
                );
                noted.not_checked(&format!("stability of the notch at the {at}"), reason, Ask::Method);
            }
        }
    }
}

/// What of the plate and the notches no formula may be asked about.
fn sizes(layout: &FlexibleEndPlate, beam: &Section) -> Vec<(&'static str, String)> {
    let mut reasons = Vec::new();
    let plate = &layout.plate;
    let rows = &layout.bolts.rows;
    let inside = rows.first().zip(rows.last()).is_some_and(|(first, last)| {
        let finite = plate.top.get().is_finite() && plate.bottom.get().is_finite();
        finite && plate.top > first.height && last.height > plate.bottom
    });
    if !(inside && sound::positive(plate.thickness) && sound::positive(plate.width)) {
        reasons.push(("end plate size", "no plate round its bolts".into()));
    }
    if !rows.iter().all(|row| row.gauge > beam.t_w) {
        reasons.push(("bolt gauge", "the bolts lie in the beam's web".into()));
    }
    let copes = [layout.top, layout.bottom];
    let cut: Length = copes.iter().flatten().map(|cope| cope.depth).sum();
    let lengths = copes.iter().flatten().all(|cope| sound::positive(cope.length) && sound::positive(cope.depth));
    // A notch that leaves part of the flange is none that the sections know.
    let deep = copes.iter().flatten().all(|cope| cope.depth >= beam.t_f);
    if !(lengths && deep && cut <= 0.75 * beam.h) {
        reasons.push(("notch", "the notches leave no section that is known".into()));
    }
    if !(layout.beside_web(beam.h, beam.t_f, beam.r.unwrap_or(Length::ZERO)) > Length::ZERO) {
        reasons.push(("end plate", "it lies beside no part of the beam's web".into()));
    }
    reasons
}
