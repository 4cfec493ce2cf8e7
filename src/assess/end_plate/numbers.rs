//! The numbers of an end-plate joint: what the layout states and the rulebook adds, or what is missing.

use super::sound;
use super::strengthening::{self, Members, Strengthened};
use std::sync::Arc;

use crate::assess::{Gap, Input};
use crate::eurocode::stiffeners::Pair;
use crate::eurocode::welds::Fillets;
use crate::eurocode::{beam, bolts};
use crate::joints::{EndPlateLayout, MemberAt, Stiffener};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::{Grade, Rulebook, Section, Strength};
use crate::units::{Area, Force, Length, Modulus, Stress, mm};
use crate::working::Working;

/// No rolled I section of the tables has a larger root radius.
const R_MOST: Length = mm(30.0);

/// Strengths of a rolled section's flange and web, and the smaller f_u.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MemberStrength {
    pub f_y_flange: Stress,
    pub f_y_web: Stress,
    pub f_u: Stress,
}

/// A stiffener pair that the checks credit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StiffenerPair {
    pub height: Length,
    pub b_s: Length,
    pub t_s: Length,
    pub f_y: Stress,
    /// 0 if nobody states it: the safe geometry for m_2.
    pub throat: Length,
    /// Its length along the column's depth.
    pub reach: Length,
    /// Whether it reaches from flange to flange; else it holds the flange in tension and nothing more.
    pub full_depth: bool,
    /// Its fillets, by its own f_u; `None` if nobody states them.
    pub fillets: Option<Fillets>,
}

impl StiffenerPair {
    /// As the formulas take it: no wider than the column's flange, cut back by the column's root radius.
    pub fn plates(&self, n: &Numbers) -> Pair {
        let free = 0.5 * (n.column.b - n.column.t_w);
        let cope = n.r_c_most;
        Pair {
            b_s: self.b_s.min(free),
            t_s: self.t_s,
            cope,
            f_y_s: self.f_y,
            l_s: (self.reach - if self.full_depth { 2.0 } else { 1.0 } * cope).max(Length::ZERO),
            fillets: self.fillets.map(|own| Fillets { f_u: own.f_u.min(n.column_strength.f_u), ..own }),
            ends_in_web: (!self.full_depth).then_some((n.column.t_w, n.column_strength.f_y_web)),
        }
    }
}

/// One row, seen from the tension side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Row {
    /// Its number from the top of the joint, from 1, whatever the sense.
    pub number: usize,
    pub height: Length,
    pub gauge: Length,
    pub e_plate: Length,
    pub e_column: Length,
}

/// Everything the formulas need, for tension at the top; [`Numbers::upside_down`] gives the other sense.
#[derive(Clone, Debug, PartialEq)]
#[allow(non_snake_case)]
pub struct Numbers {
    pub column: Section,
    pub column_strength: MemberStrength,
    pub r_c: Length,
    /// r_c, or the most that it may be: what shortens the web in tension and the stiffeners' bearing.
    pub r_c_most: Length,
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
    pub t_p: Length,
    pub b_p: Length,
    pub plate_top: Length,
    pub plate_bottom: Length,
    pub plate_strength: Strength,
    pub d: Length,
    pub d_0: Length,
    pub f_ub: Stress,
    pub A_s: Area,
    pub A: Area,
    pub alpha_v: f64,
    pub washer: Length,
    pub F_t_Rd: Force,
    pub tension_working: Arc<Working>,
    pub B_p_plate: Force,
    pub B_p_column: Force,
    pub punching_working: Arc<Working>,
    pub rows: Vec<Row>,
    pub a_tension: Option<Length>,
    pub a_compression: Option<Length>,
    pub a_web: Option<Length>,
    pub stiffeners: Vec<StiffenerPair>,
    pub strengthened: Strengthened,
    pub column_above: Option<Length>,
    pub column_below: Option<Length>,
}

/// What was noted while the numbers were gathered.
#[derive(Debug, Default)]
pub struct Noted {
    pub inputs: Vec<Input>,
    pub assumptions: Vec<String>,
    pub gaps: Vec<Gap>,
    pub not_credited: Vec<String>,
}

impl Noted {
    fn take<T: Clone>(&mut self, name: &str, known: &Known<T>, print: impl Fn(&T) -> String) -> Option<T> {
        match known {
            Ok(datum) => {
                self.inputs.push(Input::of(name, datum, print));
                if let Origin::Assumed(by) = &datum.origin {
                    self.assumptions.push(format!("{name}: {by}"));
                }
                Some(datum.value.clone())
            }
            Err(missing) => {
                self.gaps.push(Gap::NotChecked(missing.clone()));
                None
            }
        }
    }

    fn not_checked(&mut self, what: &str, reason: String, ask: Ask) {
        self.gaps.push(Gap::NotChecked(Missing { what: what.into(), reason, at: None, ask }));
    }

    fn lower_bound(&mut self, what: &str, reason: String) {
        self.gaps.push(Gap::LowerBound(Missing { what: what.into(), reason, at: None, ask: Ask::Fabricator }));
    }

    fn member(&mut self, role: &str, at: &MemberAt, rulebook: &Rulebook) -> Option<(Section, MemberStrength, Length)> {
        let section = self.take(&format!("{role} section"), &at.section, |s| s.designation.clone());
        let grade = self.take(&format!("{role} grade"), &at.grade, |g: &Grade| g.0.clone());
        let (section, grade) = (section?, grade?);
        let flange = self.strength(&format!("{role} flange strength"), rulebook, &grade, section.t_f)?;
        let web = if section.rolled && rulebook.settings.strength_by_flange {
            flange
        } else {
            self.strength(&format!("{role} web strength"), rulebook, &grade, section.t_w)?
        };
        let r = section.r.unwrap_or_else(|| {
            self.lower_bound(
                &format!("{role} root radius"),
                format!("the model gives none and the section is in no table; taken as 0, or as {R_MOST} where a large one is the worse"),
            );
            Length::ZERO
        });
        let strength = MemberStrength { f_y_flange: flange.f_y, f_y_web: web.f_y, f_u: flange.f_u.min(web.f_u) };
        Some((section, strength, r))
    }

    fn strength(&mut self, name: &str, rulebook: &Rulebook, grade: &Grade, t: Length) -> Option<Strength> {
        let known = rulebook.strength(grade, t);
        self.take(name, &known, |s| format!("fy {}, fu {} at {t}", s.f_y, s.f_u))
    }
}

fn print_length(length: &Length) -> String {
    length.to_string()
}

fn given(name: &str, value: Length, what: &str) -> Input {
    Input::of(name, &Datum::new(value, Origin::Derived(what.into())), print_length)
}

impl Numbers {
    /// Gathers the numbers; `None` if something is missing without which no resistance can be computed (the gaps in
    /// `noted` say what).
    pub fn gather(layout: &EndPlateLayout, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let gamma_m2 = rulebook.annex.gamma_m2;
        let column = noted.member("column", &layout.column, rulebook);
        let beam = noted.member("beam", &layout.beam, rulebook);

        let plate = &layout.plate;
        noted.inputs.push(given("end plate thickness", plate.thickness, "the plate's body"));
        noted.inputs.push(given("end plate width", plate.width, "the plate's body"));
        noted.inputs.push(given("end plate upper edge", plate.top, "above the soffit of the beam"));
        noted.inputs.push(given("end plate lower edge", plate.bottom, "above the soffit of the beam"));
        let plate_grade = noted.take("end plate grade", &plate.grade, |g: &Grade| g.0.clone());
        let plate_strength = plate_grade
            .as_ref()
            .and_then(|grade| noted.strength("end plate strength", rulebook, grade, plate.thickness));

        let d = noted.take("bolt diameter", &layout.bolts.diameter, print_length);
        let class = noted.take("bolt class", &layout.bolts.class, String::clone);
        let d_0 = noted.take("bolt hole", &layout.bolts.hole, print_length);
        let size = d.and_then(|d| {
            let size = rulebook.bolt_size(d);
            if size.is_none() {
                noted.not_checked("bolt size", format!("no table has a bolt of {d}"), Ask::Method);
            }
            size
        });
        let class = class.and_then(|name| {
            let class = rulebook.bolt_class(&name);
            if class.is_none() {
                noted.not_checked(
                    "bolt class",
                    format!("{name} is no class of EN 1993-1-8 Table 3.1"),
                    Ask::Fabricator,
                );
            }
            class
        });
        for (i, row) in layout.bolts.rows.iter().enumerate() {
            noted.inputs.push(given(&format!("row {} height", i + 1), row.height, "bolt axes above the soffit"));
            noted.inputs.push(given(&format!("row {} gauge", i + 1), row.gauge, "between the bolts' axes"));
        }

        let least = rulebook.welds.min_throat;
        let a_top = weld(noted, "weld at the top flange", &layout.welds.flange_top, least);
        let a_bottom = weld(noted, "weld at the bottom flange", &layout.welds.flange_bottom, least);
        let a_web = weld(noted, "weld at the web", &layout.welds.web, least);

        let column_grade = layout.column.grade.as_ref().ok().map(|grade| &grade.value);
        let stiffeners = layout.stiffeners.iter().filter_map(|s| credit(noted, s, column_grade, rulebook)).collect();
        // What strengthens and is not credited makes the joint no weaker, so a joint that fails without it is not proven to.
        for part in &layout.not_credited {
            noted.not_credited.push(part.clone());
            noted.gaps.push(Gap::LowerBound(Missing {
                what: "credit for a strengthening part".into(),
                reason: part.clone(),
                at: None,
                ask: Ask::Method,
            }));
        }

        let ((column, column_strength, r_c), (beam, beam_strength, r_b)) = (column?, beam?);
        let (r_c_most, r_b_most) = (column.r.unwrap_or(R_MOST), beam.r.unwrap_or(R_MOST));
        let members = Members { column: &column, strength: column_strength, beam: &beam };
        let strengthened = strengthening::credit(noted, layout, &members, rulebook);
        let (plate_strength, size, class, d_0) = (plate_strength?, size?, class?, d_0?);

        let beam_h = beam.h;
        let reasons = sound::reasons(layout, beam_h, size.d, d_0, rulebook);
        if !reasons.is_empty() {
            for (what, reason) in reasons {
                noted.not_checked(what, reason, Ask::Method);
            }
            return None;
        }

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
        noted.assumptions.push(format!(
            "head and nut across flats {}, the smallest that the product standards allow, for punching",
            size.across_flats
        ));
        let d_m = 0.5 * (size.across_flats + size.across_corners);
        let tension = bolts::tension(class.f_ub, size.a_s, gamma_m2);
        let punching_plate = bolts::punching(d_m, plate.thickness, plate_strength.f_u, gamma_m2);
        let punching_column = bolts::punching(d_m, column.t_f, column_strength.f_u, gamma_m2);
        let mut punching_working = punching_plate.working;
        punching_working.absorb(punching_column.working);
        let beta_w = |grade: Option<&Grade>| grade.and_then(|g| rulebook.beta_w(g));

        Some(Self {
            W_beam: if beam_class <= 2 { beam.w_pl_y } else { beam.w_el_y },
            beam_class,
            beta_w_beam: beta_w(layout.beam.grade.as_ref().ok().map(|g| &g.value)),
            beta_w_plate: beta_w(plate_grade.as_ref()),
            column,
            column_strength,
            r_c,
            r_c_most,
            beam,
            beam_strength,
            r_b,
            r_b_most,
            t_p: plate.thickness,
            b_p: plate.width,
            plate_top: plate.top,
            plate_bottom: plate.bottom,
            plate_strength,
            d: size.d,
            d_0,
            f_ub: class.f_ub,
            A_s: size.a_s,
            A: size.a,
            alpha_v: class.alpha_v,
            washer: size.washer,
            F_t_Rd: tension.value,
            tension_working: Arc::new(tension.working),
            B_p_plate: punching_plate.value,
            B_p_column: punching_column.value,
            punching_working: Arc::new(punching_working),
            rows: (layout.bolts.rows.iter().enumerate())
                .map(|(i, row)| Row {
                    number: i + 1,
                    height: row.height,
                    gauge: row.gauge,
                    e_plate: row.edge_plate,
                    e_column: row.edge_column,
                })
                .collect(),
            a_tension: a_top,
            a_compression: a_bottom,
            a_web,
            stiffeners,
            strengthened,
            column_above: layout.column_above,
            column_below: layout.column_below,
        })
    }

    /// V_pl,Rd of the beam, EN 1993-1-1 6.2.6 (6.18).
    pub fn beam_shear_resistance(&self, gamma_m0: f64) -> Force {
        beam::shear_resistance(self.beam.a_v_z, self.beam_strength.f_y_flange, gamma_m0)
    }

    /// The same joint turned upside down, so that its lower side is the tension side.
    pub fn upside_down(&self) -> Self {
        let h = self.beam.h;
        let mut turned = self.clone();
        turned.plate_top = h - self.plate_bottom;
        turned.plate_bottom = h - self.plate_top;
        turned.rows = self.rows.iter().rev().map(|row| Row { height: h - row.height, ..*row }).collect();
        turned.a_tension = self.a_compression;
        turned.a_compression = self.a_tension;
        turned.stiffeners =
            self.stiffeners.iter().rev().map(|s| StiffenerPair { height: h - s.height, ..*s }).collect();
        turned.strengthened = self.strengthened.upside_down(h);
        turned.column_above = self.column_below;
        turned.column_below = self.column_above;
        turned
    }

    /// What the fillet of throat `a` takes off m, m_2 and m_x: 0.8 √2 a (Figures 6.8, 6.10).
    pub fn fillet(a: Option<Length>) -> Length {
        0.8 * 2.0_f64.sqrt() * a.unwrap_or(Length::ZERO)
    }
}

/// The throat, or the safe geometry (no fillet), said twice: the weld itself can't be checked, and the T-stubs beside it
/// are a lower bound.
fn weld(noted: &mut Noted, name: &str, known: &Known<Length>, least: Length) -> Option<Length> {
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

fn credit(
    noted: &mut Noted,
    stiffener: &Stiffener,
    column_grade: Option<&Grade>,
    rulebook: &Rulebook,
) -> Option<StiffenerPair> {
    let at = format!("stiffener at {:.0} mm", stiffener.height.get());
    let mut refuse = |why: &str| {
        noted.assumptions.push(format!("{at} is not credited: {why}"));
        None
    };
    let sizes = [stiffener.thickness, stiffener.outstand, stiffener.reach];
    if !(stiffener.height.get().is_finite() && sizes.iter().all(|t| t.get().is_finite() && *t > mm(0.0))) {
        return refuse(&format!("a thickness of {} and an outstand of {}", stiffener.thickness, stiffener.outstand));
    }
    if !stiffener.both_sides {
        return refuse("it is on one side of the web only");
    }
    let grade = match &stiffener.grade {
        Ok(grade) => grade,
        Err(missing) => return refuse(&missing.to_string()),
    };
    let strength = match rulebook.strength(&grade.value, stiffener.thickness) {
        Ok(strength) => strength,
        Err(missing) => return refuse(&missing.to_string()),
    };
    noted.inputs.push(Input::of(
        &format!("{at}: thickness"),
        &Datum::new(stiffener.thickness, Origin::Derived("the plates' bodies".into())),
        print_length,
    ));
    noted.inputs.push(Input::of(&format!("{at}: grade"), grade, |g| g.0.clone()));
    let beta_w = column_grade.and_then(|column| rulebook.beta_w(column)).zip(rulebook.beta_w(&grade.value));
    let fillets = match (&stiffener.weld, beta_w) {
        (Err(missing), _) => Err((missing.reason.clone(), missing.ask)),
        (Ok(weld), _) if !(weld.value >= rulebook.welds.min_throat && weld.value.get().is_finite()) => {
            let least = rulebook.welds.min_throat;
            Err((
                format!("a throat of {} is not counted, {least} is the least (4.5.2(2))", weld.value),
                Ask::Fabricator,
            ))
        }
        (Ok(_), None) => Err(("β_w is not known for its grade and the column's".into(), Ask::Method)),
        (Ok(weld), Some((column, own))) => {
            noted.inputs.push(Input::of(&format!("{at}: weld"), weld, |a| format!("throat {a}")));
            Ok(Fillets { a: weld.value, f_u: strength.value.f_u, beta_w: own.max(column) })
        }
    };
    if let Err((reason, ask)) = &fillets {
        noted.not_checked(&format!("weld of the {at}"), reason.clone(), *ask);
        noted
            .assumptions
            .push(format!("{at}: its weld is not checked, and m2 is measured to its face (the safe geometry)"));
    }
    Some(StiffenerPair {
        height: stiffener.height,
        b_s: stiffener.outstand,
        t_s: stiffener.thickness,
        f_y: strength.value.f_y,
        throat: fillets.as_ref().map_or(mm(0.0), |fillets| fillets.a),
        reach: stiffener.reach,
        full_depth: stiffener.full_depth,
        fillets: fillets.ok(),
    })
}
