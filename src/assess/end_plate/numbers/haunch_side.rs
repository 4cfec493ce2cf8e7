//! The numbers of a haunch below the beam.

use super::noted::Noted;
use super::plate_side::Ends;
use crate::assess::Gap;
use crate::eurocode::haunch::STEEPEST;
use crate::joints::Haunch;
use crate::origin::{Ask, Missing};
use crate::rulebook::{Grade, Rulebook};
use crate::units::{Length, Stress};

/// A haunch that 6.2.6.7(3) allows.
#[derive(Clone, Debug, PartialEq)]
pub struct HaunchSide {
    /// From the beam's soffit to the underside of its flange at the end plate.
    pub depth: Length,
    /// Degrees between its flange and the beam's.
    pub angle: f64,
    pub b_f: Length,
    pub t_f: Length,
    pub t_w: Length,
    /// The lesser of flange and web.
    pub f_y: Stress,
    pub a_flange: Option<Length>,
    pub a_web: Option<Length>,
}

impl HaunchSide {
    /// `None` inside where there is no haunch; outside where there is one that can't be assessed: the gaps say why.
    pub(super) fn gather(
        laid: Option<&Haunch>,
        ends: Option<&Ends>,
        rulebook: &Rulebook,
        noted: &mut Noted,
    ) -> Option<Option<Self>> {
        let Some(laid) = laid else { return Some(None) };
        // Of two plates, or of one section.
        let body = if laid.guids.len() == 1 { "of the section that it is cut from" } else { "the plate's body" };
        let sizes = [
            ("haunch depth", laid.depth, "from the beam's soffit to the underside of its flange"),
            ("haunch length", laid.length, "from the end plate to its flange's end"),
            ("haunch flange thickness", laid.flange_thickness, body),
            ("haunch flange width", laid.flange_width, body),
            ("haunch web thickness", laid.web_thickness, body),
        ];
        for (name, value, what) in sizes {
            noted.given(name, value, what);
        }
        let flange = noted.take("haunch flange grade", &laid.flange_grade, |g: &Grade| g.0.clone());
        let web = noted.take("haunch web grade", &laid.web_grade, |g: &Grade| g.0.clone());
        let flange = flange.and_then(|g| noted.strength("haunch flange strength", rulebook, &g, laid.flange_thickness));
        let web = web.and_then(|g| noted.strength("haunch web strength", rulebook, &g, laid.web_thickness));
        let least = rulebook.welds.min_throat;
        let mut throat = |name: &str, known| {
            let throat = noted.take(name, known, |a: &Length| format!("throat {a}"))?;
            if !(throat >= least && throat.get().is_finite()) {
                let reason = format!("a throat of {throat} is not counted, {least} is the least (4.5.2(2))");
                noted.not_checked(name, reason, Ask::Fabricator);
                return None;
            }
            Some(throat)
        };
        let a_flange = throat("weld at the haunch's flange", &laid.flange_weld);
        let a_web = throat("weld at the haunch's web", &laid.web_weld);
        let (flange, web, beam) = (flange?, web?, ends?);
        let f_y = flange.f_y.min(web.f_y);
        let (section, strength, size) = (&beam.beam, beam.beam_strength, rulebook.tolerances.size);
        let mut faults = Vec::new();
        let mut asks = |holds: bool, fault: String| {
            if !holds {
                faults.push(fault);
            }
        };
        let least_f_y = strength.f_y_flange.min(strength.f_y_web);
        asks(f_y >= least_f_y, format!("its strength {f_y} is below the beam's {least_f_y}"));
        for (what, own, of_beam) in [
            ("flange's thickness", laid.flange_thickness, section.t_f),
            ("flange's width", laid.flange_width, section.b),
            ("web's thickness", laid.web_thickness, section.t_w),
        ] {
            asks(own + size >= of_beam, format!("its {what} {own} is below the beam's {of_beam}"));
        }
        let angle = laid.angle;
        asks(angle > 0.0 && angle <= STEEPEST, format!("its angle {angle:.1}° is above {STEEPEST}°"));
        asks(laid.depth > 2.0 * laid.flange_thickness, format!("its depth is {}", laid.depth));
        if !faults.is_empty() {
            let reason = format!("6.2.6.7(3) does not allow it: {}", faults.join("; "));
            noted.not_checked("haunch", reason, Ask::Fabricator);
            return None;
        }
        noted.assumptions.push("the haunch's own welds and those to the beam are not checked".into());
        if laid.stiffened {
            noted.gaps.push(Gap::LowerBound(Missing {
                what: "credit for a strengthening part".into(),
                reason: "the beam's stiffener at the haunch's end is not credited".into(),
                at: None,
                ask: Ask::Method,
            }));
        }
        Some(Some(Self {
            depth: laid.depth,
            angle,
            b_f: laid.flange_width,
            t_f: laid.flange_thickness,
            t_w: laid.web_thickness,
            f_y: f_y.min(least_f_y),
            a_flange,
            a_web,
        }))
    }

    /// Its flange's thickness, measured along the end plate.
    pub fn upright(&self) -> Length {
        self.t_f / self.angle.to_radians().cos()
    }
}
