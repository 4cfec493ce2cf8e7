//! The numbers of a fin plate, or what is missing.

use crate::assess::end_plate::numbers::{BoltNumbers, MemberStrength, Noted, print_length};
use crate::eurocode::bolt_group::{self, Place};
use crate::eurocode::notched::{self, Left};
use crate::eurocode::{Resistance, bolts};
use crate::joints::{self, Cope, FinPlate, On};
use crate::origin::Ask;
use crate::rulebook::{Grade, Rulebook, Section, Strength};
use crate::units::{Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// A plate longer than this many of its thicknesses may buckle (design guides).
const LONG: f64 = 1.0 / 0.15;

/// Everything that the formulas need.
pub(super) struct Numbers<'a> {
    pub(super) layout: &'a FinPlate,
    pub(super) rulebook: &'a Rulebook,
    pub(super) beam: Section,
    pub(super) beam_steel: MemberStrength,
    pub(super) r_b: Length,
    pub(super) support: Section,
    pub(super) support_steel: MemberStrength,
    pub(super) plate_steel: Strength,
    pub(super) plate_grade: Grade,
    pub(super) bolts: BoltNumbers,
    /// Throat of the plate's fillets.
    pub(super) a: Option<Length>,
    beta_w: Option<f64>,
}

/// One of the two plies that the bolts pass through.
pub(super) struct Ply {
    pub(super) t: Length,
    pub(super) f_y: Stress,
    pub(super) f_u: Stress,
    /// From the outermost line to the side edge.
    pub(super) side: Length,
    /// From the top row up to the edge and from the lowest row down, and whether the ply ends there: a beam's flange is no
    /// end towards which a bolt could tear out.
    to: [(Length, bool); 2],
}

impl Ply {
    /// Ends along the load.
    pub(super) fn edges(&self) -> [Option<Length>; 2] {
        self.to.map(|(to, ends)| ends.then_some(to))
    }

    /// The nearer edge along the load, whatever it is.
    pub(super) fn beside(&self) -> Length {
        self.to[0].0.min(self.to[1].0)
    }
}

impl<'a> Numbers<'a> {
    pub(super) fn gather(layout: &'a FinPlate, rulebook: &'a Rulebook, noted: &mut Noted) -> Option<Self> {
        let beam = noted.member("beam", &layout.beam, rulebook);
        let role = if layout.on == On::BeamWeb { "supporting beam" } else { "column" };
        let support = noted.member(role, &layout.support, rulebook);
        let plate_grade = noted.take("fin plate grade", &layout.grade, |g: &Grade| g.0.clone());
        let plate_steel =
            plate_grade.as_ref().and_then(|g| noted.strength("fin plate strength", rulebook, g, layout.thickness));
        for (what, value, by) in [
            ("fin plate thickness", layout.thickness, "the plate's body"),
            ("fin plate upper edge", layout.top, "above the soffit of the beam"),
            ("fin plate lower edge", layout.bottom, "above the soffit of the beam"),
            ("fin plate free edge", layout.edge, "from the support's face"),
            ("beam's end", layout.gap, "from the support's face"),
        ] {
            noted.given(what, value, by);
        }
        for (at, notch) in [("top", layout.top_notch), ("bottom", layout.bottom_notch)] {
            if let Some(notch) = notch {
                noted.given(
                    &format!("notch at the {at}, length"),
                    notch.length,
                    "the box round what is cut off the beam",
                );
                noted.given(
                    &format!("notch at the {at}, depth"),
                    notch.depth,
                    "the box round what is cut off the beam",
                );
            }
        }
        for (i, row) in layout.bolts.rows.iter().enumerate() {
            noted.given(&format!("row {} height", i + 1), *row, "bolt axes above the soffit");
        }
        for (i, line) in layout.bolts.lines.iter().enumerate() {
            noted.given(&format!("line {} distance", i + 1), *line, "bolt axes from the support's face");
        }
        let grid = &layout.bolts;
        let laid = joints::Bolts {
            diameter: grid.diameter.clone(),
            class: grid.class.clone(),
            hole: grid.hole.clone(),
            rows: Vec::new(),
            held: joints::Held { shank: grid.shank, ..joints::Held::default() },
        };
        let plies = beam.as_ref().map(|(beam, ..)| [layout.thickness, beam.t_w]);
        let bolts = BoltNumbers::gather(&laid, plies, rulebook, noted);
        let a = throat(layout, rulebook, noted);
        let (beam, beam_steel, r_b) = beam?;
        let (support, support_steel, _) = support?;
        let plate_grade = plate_grade?;
        let betas = [Some(&plate_grade), layout.support.grade.as_ref().ok().map(|grade| &grade.value)];
        let betas = betas.map(|grade| grade.and_then(|grade| rulebook.beta_w(grade)));
        let beta_w = betas[0].zip(betas[1]).map(|(a, b)| a.max(b));
        if a.is_some() && beta_w.is_none() {
            noted.not_checked("weld of the fin plate", "no β_w for its grades (Table 4.1)".into(), Ask::Method);
        }
        let numbers = Self {
            layout,
            rulebook,
            beam,
            beam_steel,
            r_b,
            support,
            support_steel,
            plate_steel: plate_steel?,
            plate_grade,
            bolts: bolts?,
            a,
            beta_w,
        };
        let too_near = numbers.too_near();
        if let Some(reason) = &too_near {
            noted.not_checked("distances of the bolts", reason.clone(), Ask::Method);
        }
        too_near.is_none().then_some(numbers)
    }

    /// Where bolts stand nearer than Table 3.3 lets them, or sizes are no sizes.
    fn too_near(&self) -> Option<String> {
        let (d_0, rules) = (self.bolts.d_0, &self.rulebook.distances);
        let slack = self.rulebook.tolerances.size;
        let (plate, web) = (self.plate(), self.web());
        let mut asked = vec![
            ("p_1", self.p_1(), rules.pitch),
            ("e_2 of the plate", plate.side, rules.edge),
            ("e_2 of the beam's web", web.side, rules.edge),
        ];
        asked.extend(self.p_2().map(|p_2| ("p_2", p_2, rules.gauge)));
        asked.extend(plate.edges().into_iter().flatten().map(|e| ("e_1 of the plate", e, rules.end)));
        asked.extend(web.edges().into_iter().flatten().map(|e| ("e_1 of the beam's web", e, rules.end)));
        let left = self.beam.h - cut(self.layout.top_notch) - cut(self.layout.bottom_notch);
        for notch in [self.layout.top_notch, self.layout.bottom_notch].into_iter().flatten() {
            // A notch that leaves part of the flange is none that the sections know.
            if !(notch.depth >= self.beam.t_f && notch.length > Length::ZERO && left >= 0.25 * self.beam.h) {
                return Some("the notches leave no section that is known: not assessed".into());
            }
        }
        asked.push(("height of the plate", self.h_p(), 1.0));
        asked.push(("distance of the bolts from the support", self.z_p(), 0.5));
        let short = asked.iter().find(|(_, own, least)| !(*own >= *least * d_0 - slack));
        short.map(|(what, own, least)| {
            format!("{what} is {own}, Table 3.3 asks for {least} d0 = {}: not assessed", *least * d_0)
        })
    }

    pub(super) fn h_p(&self) -> Length {
        self.layout.top - self.layout.bottom
    }

    pub(super) fn rows(&self) -> usize {
        self.layout.bolts.rows.len()
    }

    pub(super) fn lines(&self) -> usize {
        self.layout.bolts.lines.len()
    }

    /// From the top row to the lowest.
    pub(super) fn length(&self) -> Length {
        spread(&self.layout.bolts.rows)
    }

    /// From the first line to the last.
    pub(super) fn width(&self) -> Length {
        spread(&self.layout.bolts.lines)
    }

    /// The least pitch.
    pub(super) fn p_1(&self) -> Length {
        least_step(&self.layout.bolts.rows).unwrap_or(Length::ZERO)
    }

    pub(super) fn p_2(&self) -> Option<Length> {
        least_step(&self.layout.bolts.lines)
    }

    /// From the support to the first line.
    pub(super) fn z_p(&self) -> Length {
        self.layout.bolts.lines.iter().copied().reduce(Length::min).unwrap_or(Length::ZERO)
    }

    /// From the support to the group's centre.
    pub(super) fn z(&self) -> Length {
        self.z_p() + self.width() / 2.0
    }

    pub(super) fn is_long(&self) -> bool {
        !(self.z_p() <= LONG * self.layout.thickness)
    }

    /// The bolts from their centre.
    pub(super) fn places(&self) -> Vec<Place> {
        let lines = &self.layout.bolts.lines;
        let points: Vec<(Length, Length)> =
            self.layout.bolts.rows.iter().flat_map(|y| lines.iter().map(|x| (*x, *y))).collect();
        bolt_group::about_centre(&points)
    }

    fn outer_rows(&self) -> (Length, Length) {
        let rows = &self.layout.bolts.rows;
        let most = rows.iter().copied().reduce(Length::max).unwrap_or(Length::ZERO);
        (most, most - self.length())
    }

    pub(super) fn plate(&self) -> Ply {
        let (top, low) = self.outer_rows();
        Ply {
            t: self.layout.thickness,
            f_y: self.plate_steel.f_y,
            f_u: self.plate_steel.f_u,
            side: self.layout.edge - self.z_p() - self.width(),
            to: [(self.layout.top - top, true), (low - self.layout.bottom, true)],
        }
    }

    pub(super) fn web(&self) -> Ply {
        let (top, low) = self.outer_rows();
        Ply {
            t: self.beam.t_w,
            f_y: self.beam_steel.f_y_web,
            f_u: self.beam_steel.f_u,
            side: self.z_p() - self.layout.gap,
            to: [
                (self.beam.h - cut(self.layout.top_notch) - top, self.layout.top_notch.is_some()),
                (low - cut(self.layout.bottom_notch), self.layout.bottom_notch.is_some()),
            ],
        }
    }

    /// F_v,Rd of one bolt by γ.
    pub(super) fn bolt_in_shear(&self, gamma: f64) -> Resistance {
        let bolts = &self.bolts;
        let thread = bolts.thread_in_plane.unwrap_or(self.rulebook.settings.thread_in_shear_plane);
        let (alpha_v, area) = if thread { (bolts.alpha_v, bolts.A_s) } else { (self.rulebook.alpha_v_shank, bolts.A) };
        // 3.6.1(5): M12 and M14 in holes with 2 mm of clearance.
        let small = bolts.d.get() <= 14.0 && bolts.d_0 - bolts.d >= crate::units::mm(1.5);
        bolts::shear(alpha_v, bolts.f_ub, area, if small { 0.85 } else { 1.0 }, gamma)
    }

    /// What notches leave of the beam, each with its length from the beam's end; empty without.
    fn notched(&self) -> Vec<(notched::Section, Length)> {
        let beam = &self.beam;
        let tee = Left::Tee { b: beam.b, t_f: beam.t_f, r: self.r_b };
        let section = |left, cut: Length| notched::Section {
            left,
            h_n: beam.h - cut,
            t_w: beam.t_w,
            f_y: self.beam_steel.f_y_web,
        };
        match (self.layout.top_notch, self.layout.bottom_notch) {
            (Some(top), Some(bottom)) => {
                // Where one is longer, its end has the other flange again.
                let longer = if top.length > bottom.length { top } else { bottom };
                vec![
                    (section(Left::Web, top.depth + bottom.depth), top.length.min(bottom.length)),
                    (section(tee, longer.depth), longer.length),
                ]
            }
            (Some(one), None) | (None, Some(one)) => vec![(section(tee, one.depth), one.length)],
            (None, None) => Vec::new(),
        }
    }

    /// V_pl,Rd of the beam beside the bolts, notched or not.
    #[allow(non_snake_case)]
    pub(super) fn beam_gross(&self, gamma_M0: f64) -> Resistance {
        if let Some((section, _)) = self.notched().first() {
            return notched::shear(section, gamma_M0);
        }
        let mut w = Working::default();
        let (A_v, f_y) = (self.beam.a_v_z, self.beam_steel.f_y_flange);
        given!(w, "beam"; A_v, f_y);
        step!(w, "EN 1993-1-1 6.2.6", V_pl_Rd = A_v * f_y / (3.0_f64.sqrt() * gamma_M0));
        Resistance { value: V_pl_Rd, working: w }
    }

    /// The strength that [`Numbers::beam_gross`] is computed with.
    pub(super) fn beam_f_y(&self) -> Stress {
        self.notched().first().map_or(self.beam_steel.f_y_flange, |(section, _)| section.f_y)
    }

    /// The beam in bending where its notches end, or at the last line of bolts beyond.
    pub(super) fn notch_bending(&self, gamma_m0: f64) -> Vec<Resistance> {
        let last = self.z_p() + self.width();
        let at = |length: Length| (self.layout.gap + length).max(last);
        self.notched().iter().map(|(section, length)| notched::bending(section, at(*length), gamma_m0)).collect()
    }

    /// Throat, β_w and f_u of the weaker part of the plate's fillets.
    pub(super) fn fillets(&self) -> Option<(Length, f64, Stress)> {
        Some((self.a?, self.beta_w?, self.plate_steel.f_u.min(self.support_steel.f_u)))
    }
}

fn throat(layout: &FinPlate, rulebook: &Rulebook, noted: &mut Noted) -> Option<Length> {
    let name = "weld of the fin plate";
    let a = noted.take(name, &layout.weld, |a| format!("throat {}", print_length(a)))?;
    let least = rulebook.welds.min_throat;
    if a >= least && a.get().is_finite() {
        return Some(a);
    }
    noted.not_checked(
        name,
        format!("a throat of {a} is not counted, {least} is the least (4.5.2(2))"),
        Ask::Fabricator,
    );
    None
}

fn cut(notch: Option<Cope>) -> Length {
    notch.map_or(Length::ZERO, |notch| notch.depth)
}

fn spread(values: &[Length]) -> Length {
    let most = values.iter().copied().reduce(Length::max).unwrap_or(Length::ZERO);
    most - values.iter().copied().reduce(Length::min).unwrap_or(Length::ZERO)
}

fn least_step(values: &[Length]) -> Option<Length> {
    values.windows(2).map(|pair| (pair[1] - pair[0]).abs()).reduce(Length::min)
}
