//! The numbers of a beam with its end plate.

use super::haunch_side::HaunchSide;
use super::noted::{Noted, R_MOST};
use super::{BoltNumbers, MemberStrength};
use crate::eurocode::{beam, bolts};
use crate::joints::{FullButts, PlateSide as Laid, Which};
use crate::origin::{Ask, Known};
use crate::rulebook::{Grade, Rulebook, Section, Strength};
use crate::units::{Force, Length, Modulus, mm};
use crate::working::Working;

/// Lengths that differ by less, mm, differ by the noise of coordinates.
pub(super) const NOISE: Length = mm(1e-6);

/// A beam with its end plate and welds, for tension at the top.
#[derive(Clone, Debug, PartialEq)]
#[allow(non_snake_case)]
pub struct PlateSide {
    pub which: Which,
    pub beam: Section,
    pub beam_strength: MemberStrength,
    pub r_b: Length,
    /// r_b, or the most that it may be: what shortens the welds.
    pub r_b_most: Length,
    /// W_pl,y or W_el,y by the beam's class.
    pub W_beam: Modulus,
    pub beam_class: u8,
    pub beta_w_beam: Option<f64>,
    pub beta_w_plate: Option<f64>,
    /// Height of the soffit of the beam's lower flange in the joint's frame.
    pub soffit: Length,
    pub t_p: Length,
    pub b_p: Length,
    pub top: Length,
    pub bottom: Length,
    pub strength: Strength,
    pub B_p_Rd: Force,
    pub a_tension: Option<Length>,
    pub a_compression: Option<Length>,
    pub a_web: Option<Length>,
    /// Butt welds of full penetration, which have no fillet; for tension at the top as well.
    pub full: FullButts,
    /// The haunch below, on the compression side.
    pub haunch: Option<HaunchSide>,
}

/// The numbers of a beam and its plate that do not depend on the bolts.
pub(super) struct Ends {
    pub(super) beam: Section,
    pub(super) beam_strength: MemberStrength,
    r_b: Length,
    plate_grade: Grade,
    strength: Strength,
    a_top: Option<Length>,
    a_bottom: Option<Length>,
    a_web: Option<Length>,
    full: FullButts,
}

impl Ends {
    /// `None` if something is missing without which no resistance can be computed.
    pub(super) fn gather(laid: Laid<'_>, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let which = laid.which;
        let of = which.owner();
        let beam = noted.member(&format!("{of}beam"), laid.beam, rulebook);
        let plate = laid.plate;
        noted.given(&format!("{of}end plate thickness"), plate.thickness, "the plate's body");
        noted.given(&format!("{of}end plate width"), plate.width, "the plate's body");
        noted.given(&format!("{of}end plate upper edge"), plate.top, "above the soffit of the beam");
        noted.given(&format!("{of}end plate lower edge"), plate.bottom, "above the soffit of the beam");
        let plate_grade = noted.take(&format!("{of}end plate grade"), &plate.grade, |g: &Grade| g.0.clone());
        let strength = plate_grade
            .as_ref()
            .and_then(|grade| noted.strength(&format!("{of}end plate strength"), rulebook, grade, plate.thickness));
        let least = rulebook.welds.min_throat;
        let suffix = which.suffix();
        // On a plate narrower than the flange no weld is as strong as the flange.
        let wide = beam.as_ref().is_some_and(|(beam, ..)| plate.width >= beam.b - rulebook.tolerances.position);
        let laid_full = laid.welds.full;
        let full = FullButts {
            flange_top: laid_full.flange_top && wide,
            flange_bottom: laid_full.flange_bottom && wide,
            web: laid_full.web,
        };
        if full != laid_full {
            let reason = "a butt weld on an end plate that is narrower than the flange: not assessed yet";
            noted.not_checked(&format!("butt weld{}", which.suffix()), reason.into(), Ask::Method);
        }
        let mut weld = |at: &str, known: &Known<Length>, full: bool| {
            let name = format!("weld at the {at}{suffix}");
            if full { butt(noted, &name, known) } else { throat(noted, &name, known, least) }
        };
        let a_top = weld("top flange", &laid.welds.flange_top, full.flange_top);
        let a_bottom = weld("bottom flange", &laid.welds.flange_bottom, full.flange_bottom);
        let a_web = weld("web", &laid.welds.web, full.web);
        let (beam, beam_strength, r_b) = beam?;
        Some(Self {
            beam,
            beam_strength,
            r_b,
            plate_grade: plate_grade?,
            strength: strength?,
            a_top,
            a_bottom,
            a_web,
            full,
        })
    }

    /// With the bolts; punching is worked out in `w`. `None` for a beam of class 4.
    pub(super) fn with(
        self,
        laid: Laid<'_>,
        haunch: Option<HaunchSide>,
        bolts: &BoltNumbers,
        rulebook: &Rulebook,
        noted: &mut Noted,
        w: &mut Working,
    ) -> Option<PlateSide> {
        let Self { beam, beam_strength, r_b, plate_grade, strength, a_top, a_bottom, a_web, full } = self;
        let clear = |section: &Section, r: Length| {
            (0.5 * (section.b - section.t_w - 2.0 * r), section.h - 2.0 * (section.t_f + r))
        };
        let (c_f, c_w) = clear(&beam, r_b);
        let beam_class =
            beam::class_in_bending((c_f, beam.t_f, beam_strength.f_y_flange), (c_w, beam.t_w, beam_strength.f_y_web));
        if beam_class == 4 {
            noted.not_checked("beam of class 4", format!("{} is of class 4 in bending", beam.designation), Ask::Method);
            return None;
        }
        let punching = bolts::punching(bolts.d_m, laid.plate.thickness, strength.f_u, rulebook.annex.gamma_m2);
        w.absorb(punching.working);
        Some(PlateSide {
            which: laid.which,
            beam_strength,
            r_b,
            r_b_most: beam.r.unwrap_or(R_MOST),
            W_beam: if beam_class <= 2 { beam.w_pl_y } else { beam.w_el_y },
            beam_class,
            beta_w_beam: laid.beam.grade.as_ref().ok().and_then(|grade| rulebook.beta_w(&grade.value)),
            beta_w_plate: rulebook.beta_w(&plate_grade),
            soffit: laid.soffit,
            t_p: laid.plate.thickness,
            b_p: laid.plate.width,
            top: laid.plate.top,
            bottom: laid.plate.bottom,
            strength,
            B_p_Rd: punching.value,
            a_tension: a_top,
            a_compression: a_bottom,
            a_web,
            full,
            haunch,
            beam,
        })
    }
}

impl PlateSide {
    /// Height of the outer face of the tension flange.
    pub fn flange_top(&self) -> Length {
        self.soffit + self.beam.h
    }

    /// Height of the centre of compression, the middle of the compression flange (6.2.7.1, Figure 6.15), the haunch's if
    /// there is one.
    pub fn compression(&self) -> Length {
        self.lowest() + 0.5 * self.compression_flange()
    }

    /// Thickness of the compression flange, measured along the end plate.
    pub fn compression_flange(&self) -> Length {
        self.haunch.as_ref().map_or(self.beam.t_f, HaunchSide::upright)
    }

    /// Height of the outer face of the compression flange.
    pub fn lowest(&self) -> Length {
        self.soffit - self.haunch.as_ref().map_or(Length::ZERO, |haunch| haunch.depth)
    }

    /// Depth of the beam, with its haunch.
    pub fn depth(&self) -> Length {
        self.flange_top() - self.lowest()
    }

    /// Whether both welds on the tension side are known.
    pub fn welds_known(&self) -> bool {
        (self.a_tension.is_some() || self.full.flange_top) && (self.a_web.is_some() || self.full.web)
    }

    /// Whether a side without any weld to compute has none that could fail: a butt weld at the flange, and at the web one
    /// too or a fillet that no row pulls at.
    pub fn no_fillet_pulled(&self) -> bool {
        let fillets = self.beta_w_beam.is_some() && self.beta_w_plate.is_some();
        self.full.flange_top && (self.full.web || fillets)
    }

    /// V_pl,Rd of the beam, EN 1993-1-1 6.2.6 (6.18).
    pub fn shear_resistance(&self, gamma_m0: f64) -> Force {
        beam::shear_resistance(self.beam.a_v_z, self.beam_strength.f_y_flange, gamma_m0)
    }

    /// Whether two halves of a splice are the same but for the noise of their coordinates.
    pub(super) fn is_like(&self, other: &Self) -> bool {
        let lengths = |side: &Self| {
            let throats = [side.a_tension, side.a_compression, side.a_web];
            let sizes = [side.soffit, side.t_p, side.b_p, side.top, side.bottom, side.r_b, side.r_b_most];
            sizes.into_iter().map(Some).chain(throats)
        };
        let rest = |side: &Self| Self {
            which: Which::Both,
            soffit: Length::ZERO,
            t_p: Length::ZERO,
            b_p: Length::ZERO,
            top: Length::ZERO,
            bottom: Length::ZERO,
            // Follows from t_p.
            B_p_Rd: Force::ZERO,
            a_tension: None,
            a_compression: None,
            a_web: None,
            ..side.clone()
        };
        let same = |(a, b): (Option<Length>, Option<Length>)| match (a, b) {
            (Some(a), Some(b)) => (a - b).abs() <= NOISE,
            (a, b) => a.is_none() && b.is_none(),
        };
        rest(self) == rest(other) && lengths(self).zip(lengths(other)).all(same)
    }

    /// The same upside down, without its haunch; `h` is the height that 0 is turned to.
    pub(super) fn upside_down(&self, h: Length) -> Self {
        Self {
            soffit: h - self.flange_top(),
            top: h - self.bottom,
            bottom: h - self.top,
            a_tension: self.a_compression,
            a_compression: self.a_tension,
            full: FullButts { flange_top: self.full.flange_bottom, flange_bottom: self.full.flange_top, ..self.full },
            haunch: None,
            ..self.clone()
        }
    }
}

/// A butt weld of full penetration is as strong as the weaker part it joins (4.7.1) and is not checked; it has no fillet
/// that anybody states, so there is no throat.
fn butt(noted: &mut Noted, name: &str, known: &Known<Length>) -> Option<Length> {
    noted.take(name, known, |t| format!("butt weld through {t}"));
    noted
        .assumptions
        .push(format!("{name}: as strong as the weaker part (4.7.1), its weld metal no weaker than the steel"));
    None
}

/// The throat, or the safe geometry (no fillet), said twice: the weld itself can't be checked, and the T-stubs beside it
/// are a lower bound.
fn throat(noted: &mut Noted, name: &str, known: &Known<Length>, least: Length) -> Option<Length> {
    let throat = noted.take(name, known, |a| format!("throat {a}"));
    let throat = throat.filter(|a| {
        let counts = *a >= least && a.get().is_finite();
        if !counts {
            noted.not_checked(
                name,
                format!("a throat of {a} is not counted, {least} is the least (4.5.2(2))"),
                Ask::Fabricator,
            );
        }
        counts
    });
    if throat.is_none() {
        noted.lower_bound(name, "T-stubs beside it are computed with no fillet, the safe geometry".into());
    }
    throat
}
