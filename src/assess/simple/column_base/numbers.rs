//! What the formulas of a column base need, from layout, schedule and rulebook, or what is missing.
#![allow(non_snake_case)]

use crate::assess::end_plate::Noted;
use crate::assess::{Component, Input};
use crate::eurocode::column_base::{self, Foot, Stubs};
use crate::eurocode::{beam, bolts, effective_length, epsilon, welds};
use crate::joints::{Anchor, ColumnBase, Foundation, Spread};
use crate::origin::{Ask, Datum, Known, Origin};
use crate::rulebook::{Grade, Rulebook, Section};
use crate::units::{Force, Length, Stress};
use crate::working::Working;
use crate::{given, step};

/// Everything that does not depend on a load case.
pub(super) struct Numbers {
    pub(super) section: Section,
    pub(super) f_y: Stress,
    /// N_c,Rd of the column; `None` for class 4.
    pub(super) squash: Option<Component>,
    /// Below the plate; `None` where the concrete is not known.
    pub(super) concrete: Option<Stubs>,
    /// One side's anchors in tension with what holds them, and z_T; or why they are not assessed.
    pub(super) tension: Result<(Vec<Component>, Length), String>,
    /// One anchor in shear; or why none is credited.
    pub(super) anchor: Result<(Force, Working), String>,
    /// Anchors between the flanges, and the lesser count beyond one of them.
    pub(super) inner: usize,
    pub(super) outer: usize,
    /// Whether the bed is stated, without which no friction is credited.
    pub(super) bed: bool,
    /// Whether the concrete's designer vouches for the anchors.
    pub(super) held: bool,
    /// The web's fillets along the web; `None` for a butt weld or one that is not known.
    pub(super) web_weld: Option<Component>,
    /// What is missing of the anchors, which only matters where they are needed.
    pub(super) of_anchors: Noted,
    /// The same of the flanges' welds, which matter where a flange is in tension.
    pub(super) of_flange: Noted,
}

/// A component without an action of its own yet.
pub(super) fn part(id: &str, title: &str, clause: &'static str, resistance: Force, working: Working) -> Component {
    Component { id: id.into(), title: title.into(), clause, resistance, at_full: Force::ZERO, working: working.into() }
}

impl Numbers {
    /// `None` if something is missing without which nothing can be computed.
    pub(super) fn gather(base: &ColumnBase, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let column = noted.member("column", &base.column, rulebook);
        noted.given("base plate thickness", base.thickness, "the plate's body");
        for (name, [least, most]) in [("depth", base.half_depths), ("width", base.half_widths)] {
            noted.given(&format!("base plate {name}"), least + most, "the plate's body, along or across the column");
            noted.given(&format!("base plate {name}, lesser half"), least, "from the column's axis to its edge");
        }
        let grade = noted.take("base plate grade", &base.grade, |g: &Grade| g.0.clone());
        let plate =
            grade.as_ref().and_then(|grade| noted.strength("base plate strength", rulebook, grade, base.thickness));
        let f_jd = bearing(base, noted);
        let throat = |noted: &mut Noted, name: &str, known: &Known<Length>, full: bool| {
            let least = rulebook.welds.min_throat;
            let a = noted
                .take(name, known, |a| if full { format!("butt weld through {a}") } else { format!("throat {a}") });
            let counts = a.filter(|a| *a >= least && a.get().is_finite());
            if let (Some(a), None) = (a, counts) {
                let reason = format!("a throat of {a} is not counted, {least} is the least (4.5.2(2))");
                noted.not_checked(name, reason, Ask::Fabricator);
            }
            counts.filter(|_| !full)
        };
        let mut of_flange = Noted::default();
        let a_flange = throat(&mut of_flange, "weld at the column's flanges", &base.flange_weld, base.full.0);
        let a_web = throat(noted, "weld at the column's web", &base.web_weld, base.full.1);
        let (section, strength, r) = column?;
        let (plate, f_y) = (plate?, strength.f_y_flange);

        let concrete = f_jd.map(|(f_jd, w)| {
            let foot = Foot {
                h: section.h,
                b: section.b,
                t_w: section.t_w,
                t_f: section.t_f,
                beyond_h: (base.half_depths[0] - 0.5 * section.h).max(Length::ZERO),
                beyond_b: (base.half_widths[0] - 0.5 * section.b).max(Length::ZERO),
                t_p: base.thickness,
                f_yp: plate.f_y,
                f_jd,
            };
            let mut stubs = column_base::compression(&foot, rulebook.annex.gamma_m0);
            for stub in [&mut stubs.all, &mut stubs.flange] {
                let mut working = w.clone();
                working.absorb(std::mem::take(&mut stub.working));
                stub.working = working;
            }
            stubs
        });
        let epsilon = epsilon(f_y);
        let flange = 0.5 * (section.b - section.t_w - 2.0 * r) / section.t_f;
        let web = (section.h - 2.0 * (section.t_f + r)) / section.t_w;
        let squash = if flange <= 14.0 * epsilon && web <= 42.0 * epsilon {
            let squash = column_base::squash(section.area, f_y, rulebook.annex.gamma_m0);
            let title = "column in compression at its foot";
            Some(part("column-in-compression", title, "EN 1993-1-1 6.2.4", squash.value, squash.working))
        } else {
            let reason = format!("{} is of class 4 in compression", section.designation);
            noted.not_checked("column of class 4", reason, Ask::Method);
            None
        };
        let beta_w = grade.as_ref().and_then(|grade| rulebook.beta_w(grade));
        let of_column = base.column.grade.as_ref().ok().and_then(|grade| rulebook.beta_w(&grade.value));
        let beta_w = beta_w.zip(of_column).map(|(a, b)| a.max(b));
        let f_u = strength.f_u.min(plate.f_u);
        let gamma_M2 = rulebook.annex.gamma_m2;
        let web_weld = a_web.zip(beta_w).map(|(a, beta_w)| {
            let fillet = welds::along(a, f_u, beta_w, gamma_M2);
            let mut w = fillet.working;
            let (F_w_Rd, h, t_f, r) = (fillet.per_length, section.h, section.t_f, r);
            given!(w, "column web"; h, t_f, r);
            step!(w, "4.5.1", l_w = h - 2.0 * (t_f + r));
            step!(w, "both sides of the web, 4.5.3.2", V_w_Rd = 2.0 * F_w_Rd * l_w);
            part("web-weld-in-shear", "weld at the column's web in shear", "EN 1993-1-8:2005 4.5.3.2", V_w_Rd, w)
        });
        let flange_weld = a_flange.zip(beta_w).map(|(a, beta_w)| {
            let fillet = welds::across(a, f_u, beta_w, gamma_M2);
            let mut w = fillet.working;
            let (F_w_Rd, b, t_w, r) = (fillet.per_length, section.b, section.t_w, r);
            given!(w, "column flange"; b, t_w, r);
            step!(w, "both faces of the flange, 4.5.1", l_w = b + (b - t_w - 2.0 * r));
            step!(w, "4.5.3.2", F_flange_w_Rd = F_w_Rd * l_w);
            part("flange-weld", "weld at the column's flange in tension", "EN 1993-1-8:2005 4.5.3.2", F_flange_w_Rd, w)
        });
        let mut of_anchors = Noted::default();
        let bolt = Bolt::gather(base, rulebook, &mut of_anchors);
        let tension = anchors_in_tension(base, &section, a_flange, (plate.f_y, f_y), bolt.as_ref(), rulebook);
        let tension = tension.map(|(mut parts, z_T)| {
            parts.extend(flange_weld);
            (parts, z_T)
        });
        let half = 0.5 * section.h;
        let beyond = |sign: f64| base.anchors.iter().filter(|a| sign * a.along > half).count();
        let (above, below) = (beyond(1.0), beyond(-1.0));
        let stated = base.foundation.as_ref().map(|(stated, _)| stated);
        Some(Self {
            squash,
            concrete,
            tension,
            anchor: anchor_in_shear(base, bolt.as_ref(), plate.f_u, rulebook),
            inner: base.anchors.len() - above - below,
            outer: above.min(below),
            bed: stated.is_some_and(|stated| stated.bed.is_some()),
            held: stated.and_then(|stated| stated.anchors_held) == Some(true),
            web_weld,
            of_anchors,
            of_flange,
            f_y,
            section,
        })
    }
}

/// One anchor.
struct Bolt {
    d: Length,
    d_0: Length,
    f_yb: Stress,
    f_ub: Stress,
    A_s: crate::units::Area,
}

impl Bolt {
    fn gather(base: &ColumnBase, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let d = noted.take("anchor diameter", &base.diameter, Length::to_string);
        let name = noted.take("anchor class", &base.class, String::clone);
        let size = d.and_then(|d| {
            let size = rulebook.bolt_size(d);
            if size.is_none() {
                noted.not_checked("anchor size", format!("no table has a bolt of {d}"), Ask::Method);
            }
            size
        });
        let class = name.and_then(|name| {
            let class = rulebook.bolt_class(&name);
            if class.is_none() {
                let reason = format!("{name} is no class of EN 1993-1-8 Table 3.1");
                noted.not_checked("anchor class", reason, Ask::Fabricator);
            }
            class
        });
        let (size, class) = (size?, class?);
        Some(Self { d: size.d, d_0: size.d_0, f_yb: class.f_yb, f_ub: class.f_ub, A_s: size.a_s })
    }
}

/// f_jd as the schedule states the foundation; what is missing is noted.
fn bearing(base: &ColumnBase, noted: &mut Noted) -> Option<(Stress, Working)> {
    const WHAT: &str = "concrete below the base plate";
    let Some((stated, origin)) = &base.foundation else {
        let reason =
            "no model of the steel shows it, and the schedule names no detail with a base = { … } for this joint";
        noted.not_checked(WHAT, reason.into(), Ask::Engineer);
        return None;
    };
    let Foundation { concrete, gamma_c, alpha_cc, bed, bed_strength, spread, .. } = stated;
    let mut input = |name: &str, value: String| {
        noted.inputs.push(Input::of(name, &Datum::new(value, origin.clone()), String::clone));
    };
    if let Some((class, f_ck)) = concrete {
        input("concrete", format!("{class}, fck {f_ck}"));
    }
    for (name, value) in [("γc", gamma_c), ("αcc", alpha_cc)] {
        value.iter().for_each(|value| input(name, value.to_string()));
    }
    bed.iter().for_each(|bed| input("bed below the base plate", bed.to_string()));
    bed_strength.iter().for_each(|f| input("strength of the bed", f.to_string()));
    match spread {
        Some(Spread::Ratio(ratio)) => input("√(Ac1/Ac0)", ratio.to_string()),
        Some(Spread::Foundation { e_h, e_b, depth }) => {
            input("foundation beyond the base plate", format!("{e_h} along and {e_b} across the column, {depth} deep"));
        }
        None => {}
    }
    let lacks = [
        ("concrete", concrete.is_none()),
        ("gamma_c", gamma_c.is_none()),
        ("alpha_cc", alpha_cc.is_none()),
        ("bed_mm", bed.is_none()),
        ("bed_strength_MPa", bed_strength.is_none()),
        ("concentration or foundation", spread.is_none()),
    ];
    let lacks: Vec<&str> = lacks.into_iter().filter(|(_, lacks)| *lacks).map(|(key, _)| key).collect();
    let known = concrete.as_ref().zip(*gamma_c).zip(alpha_cc.zip(*spread)).zip(bed.zip(*bed_strength));
    let Some(((((_, f_ck), gamma_c), (alpha_cc, spread)), (bed, bed_strength))) = known else {
        noted.not_checked(WHAT, format!("the detail's base does not state {}", lacks.join(", ")), Ask::Engineer);
        return None;
    };
    let (h_p, b_p) = (base.half_depths[0] + base.half_depths[1], base.half_widths[0] + base.half_widths[1]);
    let asked = if bed.get() <= 50.0 { 0.2 * *f_ck } else { *f_ck };
    if !(bed <= 0.2 * h_p.min(b_p) && bed_strength >= asked) {
        let reason = format!(
            "a bed of {bed} and {bed_strength}: β_j = 2/3 asks for at most 0.2 times the plate's lesser side and at \
             least {asked} (6.2.5(7))"
        );
        noted.not_checked(WHAT, reason, Ask::Engineer);
        return None;
    }
    let mut w = Working::default();
    let alpha = match spread {
        Spread::Ratio(ratio) => ratio.min(3.0),
        Spread::Foundation { e_h, e_b, depth } => column_base::concentration(&mut w, (h_p, b_p), (e_h, e_b), depth),
    };
    let f_jd = column_base::bearing_strength(&mut w, alpha, alpha_cc, *f_ck, gamma_c);
    Some((f_jd, w))
}

/// F_T,Rd of one side: a row of two anchors beyond each flange, alike on both sides.
fn anchors_in_tension(
    base: &ColumnBase,
    section: &Section,
    a_flange: Option<Length>,
    (f_yp, f_y): (Stress, Stress),
    bolt: Option<&Bolt>,
    rulebook: &Rulebook,
) -> Result<(Vec<Component>, Length), String> {
    let near = |a: Length, b: Length| (a - b).abs() <= rulebook.tolerances.position;
    let half = 0.5 * section.h;
    let beyond = |sign: f64| base.anchors.iter().filter(|a| sign * a.along > half).collect::<Vec<&Anchor>>();
    let (above, below) = (beyond(1.0), beyond(-1.0));
    let ([a, b], [c, d]) = (&above[..], &below[..]) else {
        return Err("only one row of two anchors beyond each flange is assessed in tension".into());
    };
    let alike = near(a.along, b.along)
        && near(c.along, d.along)
        && near(a.along, -c.along)
        && [(a, b), (c, d)].iter().all(|(one, other)| near(one.across, -other.across))
        && near(a.across.abs(), c.across.abs());
    if !alike {
        return Err("anchors beyond the flanges that are not alike on both sides are not assessed in tension".into());
    }
    let Some(bolt) = bolt else { return Err("diameter or class of the anchors is not known".into()) };
    let gammas = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m2);
    let anchor = bolts::tension(bolt.f_ub, bolt.A_s, gammas.1);
    let mut w = anchor.working;
    let (F_t_Rd, gauge) = (anchor.value, (a.across - b.across).abs());
    let z_T = [a, b, c, d].iter().map(|anchor| anchor.along.abs()).fold(a.along, Length::min);
    let furthest = [a, b, c, d].iter().map(|anchor| anchor.along.abs()).fold(a.along, Length::max);
    let (half_depth, half_width, b_p) =
        (base.half_depths[0], base.half_widths[0], base.half_widths[0] + base.half_widths[1]);
    // No fillet known: none, the safe geometry.
    let a_fillet = a_flange.unwrap_or(Length::ZERO);
    let h = section.h;
    given!(w, "anchors beyond the flange"; furthest, gauge, half_depth, half_width, b_p, h, a_fillet);
    step!(w, "6.2.6.5, Figure 6.10", m_x = furthest - 0.5 * h - 0.8 * 2.0_f64.sqrt() * a_fillet);
    step!(w, "6.2.6.5, Figure 6.10", e_x = half_depth - furthest);
    step!(w, "Table 6.6", e = half_width - 0.5 * gauge);
    if !(m_x > Length::ZERO && e_x > Length::ZERO && e > Length::ZERO) {
        return Err("the anchors lie in the weld or at the plate's edge".into());
    }
    let l = effective_length::outside_tension_flange(m_x, e_x, e, gauge, b_p);
    let l_eff = l.cp.min(l.nc);
    w.absorb(l.working);
    let stub = column_base::tension((l_eff, m_x), (base.thickness, f_yp), 2.0 * F_t_Rd, gammas.0);
    w.absorb(stub.working);
    let clause = "EN 1993-1-8:2005 6.2.6.11";
    let mut parts =
        vec![part("anchors-in-tension", "base plate in bending with anchors in tension", clause, stub.value, w)];
    let mut w = Working::default();
    let (b_f, t_f) = (section.b, section.t_f);
    given!(w, "column flange"; b_f, t_f, f_y);
    step!(w, "EN 1993-1-1 6.2.3", F_flange_Rd = b_f * t_f * f_y / gammas.0);
    parts.push(part("column-flange-in-tension", "column flange in tension", "EN 1993-1-1 6.2.3", F_flange_Rd, w));
    Ok((parts, z_T))
}

/// F_vb,Rd of one anchor, 6.2.2(7): the least distances in any direction, since nobody says which way the shear acts.
fn anchor_in_shear(
    base: &ColumnBase,
    bolt: Option<&Bolt>,
    f_u: Stress,
    rulebook: &Rulebook,
) -> Result<(Force, Working), String> {
    let bolt = bolt.ok_or("diameter or class of the anchors is not known")?;
    let hole = base.hole.as_ref().map_err(|missing| format!("{}: {}", missing.what, missing.reason))?;
    if !(hole.value <= bolt.d_0 + rulebook.tolerances.size) {
        return Err(format!("holes of {} are larger than the normal {} (6.2.2(5))", hole.value, bolt.d_0));
    }
    let Some(own) = column_base::anchor_shear(bolt.f_yb, bolt.f_ub, bolt.A_s, rulebook.annex.gamma_m2) else {
        return Err(format!("f_yb = {} is outside 235 to 640 N/mm² (6.2.2(7))", bolt.f_yb));
    };
    let to_edge =
        |anchor: &Anchor| (base.half_depths[0] - anchor.along.abs()).min(base.half_widths[0] - anchor.across.abs());
    let edge = base.anchors.iter().map(to_edge).fold(Length(f64::INFINITY), Length::min);
    let apart = |a: &Anchor, b: &Anchor| Length((a.along - b.along).get().hypot((a.across - b.across).get()));
    let pairs = base.anchors.iter().enumerate().flat_map(|(i, a)| base.anchors[..i].iter().map(move |b| apart(a, b)));
    let pitch = pairs.reduce(Length::min);
    let place = bolts::BearingPlace { e_1: Some(edge), p_1: pitch, e_2: edge, p_2: pitch };
    let bearing = bolts::bearing(place, bolt.d, hole.value, base.thickness, f_u, bolt.f_ub, rulebook.annex.gamma_m2);
    let mut w = own.working;
    w.absorb(bearing.working);
    let (F_1_vb_Rd, F_2_vb_Rd) = (bearing.value, own.value);
    step!(w, "6.2.2(7)", F_vb_Rd = F_1_vb_Rd.min(F_2_vb_Rd));
    Ok((F_vb_Rd, w))
}

/// F_c,fc,Rd, 6.2.6.7, beside a shear.
pub(super) fn flange_in_compression(n: &Numbers, V_Ed: Force, rulebook: &Rulebook) -> Result<Component, String> {
    let (s, r) = (&n.section, n.section.r.unwrap_or(Length::ZERO));
    let clear = (0.5 * (s.b - s.t_w - 2.0 * r), s.h - 2.0 * (s.t_f + r));
    let class = beam::class_in_bending((clear.0, s.t_f, n.f_y), (clear.1, s.t_w, n.f_y));
    if class == 4 {
        return Err(format!("{} is of class 4 in bending", s.designation));
    }
    let column = beam::FlangeCompression {
        W_y: if class <= 2 { s.w_pl_y } else { s.w_el_y },
        h: s.h,
        b_fb: s.b,
        t_fb: s.t_f,
        t_wb: s.t_w,
        A_v: s.a_v_z,
        f_y: n.f_y,
        V_Ed,
    };
    let flange = beam::flange_compression(&column, rulebook.annex.gamma_m0)?;
    let clause = "EN 1993-1-8:2005 6.2.6.7";
    Ok(part(
        "column-flange-in-compression",
        "column flange and web in compression",
        clause,
        flange.value,
        flange.working,
    ))
}

/// The origin of what a schedule's detail states.
pub(super) fn stated_in(name: &str, at: Option<&crate::origin::Place>) -> Origin {
    Origin::Modelled { by: format!("the schedule's detail {name}"), at: at.cloned() }
}
