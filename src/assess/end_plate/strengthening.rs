//! What strengthens the column besides transverse stiffeners, as far as the clauses let it count: web plates, diagonals,
//! backing plates. What they do not let count is said with the reason.
#![allow(non_snake_case)]

use super::numbers::{ColumnSide, MemberStrength, Noted, Numbers, StiffenerPair};
use crate::assess::{Gap, Input};
use crate::eurocode::diagonals::{self, Diagonal};
use crate::eurocode::t_stub::BackingPlates;
use crate::eurocode::web_plates::{self, Edges, Web, WebPlate};
use crate::eurocode::welds::Fillets;
use crate::eurocode::{Resistance, column_web, stiffeners};
use crate::joints::{self, EdgeWeld, EndPlateLayout};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::{Grade, Rulebook, Section};
use crate::units::{Area, Force, Length, mm};
use crate::working::Working;
use crate::{given, step};

/// A backing plate may stop this far from the toe of the root radius, 6.2.4.3(1).
const FROM_TOE: Length = mm(3.0);

/// What the checks credit.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Strengthened {
    pub web_plates: Vec<WebPlateAt>,
    /// One pair for the N form, two for the K form.
    pub diagonals: Vec<DiagonalAt>,
    pub backing: Vec<BackingAt>,
}

/// A web plate that keeps the conditions of 6.2.6.1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WebPlateAt {
    pub bottom: Length,
    pub top: Length,
    pub plate: WebPlate,
}

/// A pair of diagonals from flange level to flange level (N) or to the other pair (K).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DiagonalAt {
    /// Its height at the flange with the joint.
    pub near: Length,
    /// Its height at the other flange.
    pub far: Length,
    pub b: Length,
    pub t: Length,
    pub f_y: crate::units::Stress,
    pub fillets: Fillets,
    /// Whether another pair meets it at the other flange.
    pub met_at_far: bool,
}

/// Backing plates on both sides of the web.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BackingAt {
    pub bottom: Length,
    pub top: Length,
    pub plates: BackingPlates,
}

impl Strengthened {
    /// For the joint turned upside down, the beam being `h` deep.
    pub fn upside_down(&self, h: Length) -> Self {
        let mut turned = self.clone();
        turned.web_plates.iter_mut().for_each(|p| (p.bottom, p.top) = (h - p.top, h - p.bottom));
        turned.diagonals.iter_mut().for_each(|d| (d.near, d.far) = (h - d.near, h - d.far));
        turned.backing.iter_mut().for_each(|b| (b.bottom, b.top) = (h - b.top, h - b.bottom));
        turned
    }

    /// The backing plates behind a range of rows, which they pass by two bolt diameters at each end (Figure 6.3).
    pub fn behind(&self, first: Length, last: Length, d: Length) -> Option<BackingPlates> {
        let passes = |b: &&BackingAt| b.top >= first + 2.0 * d && b.bottom <= last - 2.0 * d;
        self.backing.iter().find(passes).map(|b| b.plates)
    }

    /// The web plates that reach over a range of heights.
    fn over(&self, (lo, hi): (Length, Length)) -> Vec<WebPlate> {
        self.web_plates.iter().filter(|p| p.bottom <= lo && p.top >= hi).map(|p| p.plate).collect()
    }
}

fn web(own: &ColumnSide) -> Web {
    let column = &own.section;
    let d_wc = column.h - 2.0 * (column.t_f + own.r);
    Web { t_wc: column.t_w, d_wc, f_y_wc: own.strength.f_y_web }
}

/// A_vc with the web plate that reaches over all of the web in tension and compression.
pub fn shear_area(own: &ColumnSide, range: (Length, Length), rulebook: &Rulebook, w: &mut Working) -> Area {
    let A_vc = own.section.a_v_z;
    let (m0, m2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m2);
    let shares =
        own.strengthened.over(range).into_iter().map(|plate| (plate, web_plates::share(&plate, &web(own), m0, m2)));
    let best = shares.max_by(|(a, (x, _)), (b, (y, _))| (*x * a.b_s).get().total_cmp(&(*y * b.b_s).get()));
    let Some((plate, (share, working))) = best else { return A_vc };
    w.absorb(working);
    web_plates::shear_area(w, A_vc, own.section.t_w, plate.b_s, share)
}

/// t_w,eff in compression over a range of heights.
pub fn in_compression(own: &ColumnSide, range: (Length, Length), rulebook: &Rulebook, w: &mut Working) -> Length {
    let (m0, m2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m2);
    let plates = own.strengthened.over(range);
    if plates.is_empty() {
        return own.section.t_w;
    }
    let mut shares = 0.0;
    for plate in &plates {
        let (share, working) = web_plates::share(plate, &web(own), m0, m2);
        w.absorb(working);
        shares += share;
    }
    web_plates::in_compression(w, own.section.t_w, shares)
}

/// t_w,eff in tension over a range of heights.
pub fn in_tension(own: &ColumnSide, range: (Length, Length), w: &mut Working) -> Length {
    match own.strengthened.over(range) {
        plates if plates.is_empty() => own.section.t_w,
        plates => web_plates::in_tension(w, own.section.t_w, own.strength.f_y_web, &plates),
    }
}

/// What the diagonals add to the panel's shear resistance: the lesser of the two pairs of a K. `None` without diagonals.
pub fn diagonals(n: &Numbers, column: &ColumnSide, rulebook: &Rulebook, beta: f64) -> Option<Resistance> {
    let (m0, m1, m2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m1, rulebook.annex.gamma_m2);
    let one = |at: &DiagonalAt| {
        let mut w = Working::default();
        let far_end = (!at.met_at_far).then(|| far_end(n, column, at.far, rulebook, beta, &mut w));
        let own = Diagonal {
            b: at.b.min(0.5 * (column.section.b - column.section.t_w)),
            t: at.t,
            cope: column.r_most,
            f_y: at.f_y,
            rise: (at.near - at.far).abs(),
            run: column.section.h - 2.0 * column.section.t_f,
            fillets: Fillets { f_u: at.fillets.f_u.min(column.strength.f_u), ..at.fillets },
            t_wc: column.section.t_w,
            far_end,
        };
        let own = diagonals::shear(&own, m0, m1, m2);
        w.absorb(own.working);
        Resistance { value: own.value, working: w }
    };
    column.strengthened.diagonals.iter().map(one).reduce(|a, b| if b.value < a.value { b } else { a })
}

/// What takes a diagonal's horizontal part at the column's far flange: the web over its spread through flange and root, and a
/// pair of stiffeners that is level with the end.
fn far_end(n: &Numbers, column: &ColumnSide, height: Length, rulebook: &Rulebook, beta: f64, w: &mut Working) -> Force {
    let (m0, m2) = (rulebook.annex.gamma_m0, rulebook.annex.gamma_m2);
    let (t_fc, s, t_wc, f_y_wc) = (column.section.t_f, column.r, column.section.t_w, column.strength.f_y_web);
    given!(w, "column at the diagonal's far end"; t_fc, s, t_wc, f_y_wc);
    step!(w, "6.2.6.2(1), flange and root alone", b_eff = 5.0 * (t_fc + s));
    let omega = column_web::omega(w, beta, b_eff, t_wc, column.section.a_v_z);
    step!(w, "6.2.6.2, (6.9)", F_web = omega * b_eff * t_wc * f_y_wc / m0);
    let level = |s: &&StiffenerPair| {
        s.full_depth && (s.height - height).abs() <= n.side.beam.t_f + rulebook.tolerances.position
    };
    let pair = column.stiffeners.iter().find(level).map(|pair| stiffeners::force(&pair.plates(column), m0, m2));
    let F_pair = pair.map_or(Force::ZERO, |pair| {
        w.absorb(pair.working);
        pair.value
    });
    step!(w, "web and the pair level with it", F_far_end = F_web + F_pair);
    F_far_end
}

/// A partial-depth pair level with the compression flange: no clause credits it there, and what fails without it is not
/// proven to fail.
pub fn short_in_compression(n: &Numbers) -> Option<Gap> {
    let level = n.side.compression();
    let short = |s: &&StiffenerPair| !s.full_depth && (s.height - level).abs() <= 0.5 * n.side.beam.t_f;
    n.column()?.stiffeners.iter().find(short)?;
    Some(Gap::LowerBound(Missing {
        what: "credit for a strengthening part".into(),
        reason: "the stiffeners at the compression flange do not reach from flange to flange".into(),
        at: None,
        ask: Ask::Method,
    }))
}

/// Why a part does not count.
enum Why {
    /// A clause excludes it.
    Excluded(String),
    /// Something is not known, or no clause is for it: what fails without it is not proven to fail.
    Open(String),
}

impl From<Missing> for Why {
    fn from(missing: Missing) -> Self {
        Self::Open(missing.to_string())
    }
}

/// The members' numbers by which parts are credited.
pub struct Members<'a> {
    pub column: &'a Section,
    pub strength: MemberStrength,
    pub beam: &'a Section,
}

/// Credits what the layout holds.
pub fn credit(noted: &mut Noted, layout: &EndPlateLayout, members: &Members<'_>, rulebook: &Rulebook) -> Strengthened {
    let mut credited = Strengthened::default();
    let parts = &layout.strengthening;
    let column_grade = layout.column.grade.as_ref().ok().map(|grade| &grade.value);
    for plate in &parts.web_plates {
        let what = format!("web plate from {:.0} to {:.0} mm", plate.bottom.get(), plate.top.get());
        match web_plate(plate, column_grade, members, rulebook) {
            Ok(at) => {
                input(noted, &what, plate.thickness, &plate.grade);
                credited.web_plates.push(at);
            }
            Err(why) => refuse(noted, &what, why),
        }
    }
    let mut at_levels = Vec::new();
    for pair in &parts.diagonals {
        let what = format!("diagonal from {:.0} to {:.0} mm", pair.near.get(), pair.far.get());
        match diagonal(pair, column_grade, members, rulebook) {
            Ok(at) => at_levels.push((what, at, pair)),
            Err(why) => refuse(noted, &what, why),
        }
    }
    let form = form(at_levels.iter().map(|(_, at, _)| *at).collect(), members, rulebook);
    for (what, _, pair) in &at_levels {
        match &form {
            Ok(_) => input(noted, what, pair.thickness, &pair.grade),
            Err(why) => refuse(noted, what, Why::Excluded(why.clone())),
        }
    }
    credited.diagonals = form.unwrap_or_default();
    for plates in &parts.backing {
        let what = format!("pair of backing plates from {:.0} to {:.0} mm", plates.bottom.get(), plates.top.get());
        match backing(plates, layout, members, rulebook) {
            Ok(at) => {
                input(noted, &what, plates.thickness, &plates.grade);
                credited.backing.push(at);
            }
            Err(why) => refuse(noted, &what, why),
        }
    }
    credited
}

fn input(noted: &mut Noted, what: &str, thickness: Length, grade: &Known<Grade>) {
    let body = Origin::Derived("the plates' bodies".into());
    noted.inputs.push(Input::of(&format!("{what}: thickness"), &Datum::new(thickness, body), Length::to_string));
    if let Ok(grade) = grade {
        noted.inputs.push(Input::of(&format!("{what}: grade"), grade, |g| g.0.clone()));
    }
}

fn refuse(noted: &mut Noted, what: &str, why: Why) {
    let (why, open) = match why {
        Why::Excluded(why) => (why, false),
        Why::Open(why) => (why, true),
    };
    let sentence = format!("{what} is not credited: {why}");
    if open {
        noted.gaps.push(Gap::LowerBound(Missing {
            what: "credit for a strengthening part".into(),
            reason: sentence.clone(),
            at: None,
            ask: Ask::Fabricator,
        }));
    }
    noted.not_credited.push(sentence);
}

fn sound(sizes: &[Length]) -> Result<(), Why> {
    match sizes.iter().all(|size| size.get().is_finite()) {
        true => Ok(()),
        false => Err(Why::Open("one of its sizes is no number".into())),
    }
}

/// Throat and parts of fillets between a plate and the column; f_u is the plate's.
fn fillets(
    a: Length,
    f_u: crate::units::Stress,
    plate: &Grade,
    column: Option<&Grade>,
    rulebook: &Rulebook,
) -> Result<Fillets, Why> {
    let least = rulebook.welds.min_throat;
    if !(a >= least && a.get().is_finite()) {
        return Err(Why::Excluded(format!("a throat of {a} is not counted, {least} is the least (4.5.2(2))")));
    }
    let beta_w = column.and_then(|column| rulebook.beta_w(column)).zip(rulebook.beta_w(plate));
    let (column, plate) = beta_w.ok_or_else(|| Why::Open("β_w is not known for its grade and the column's".into()))?;
    Ok(Fillets { a, f_u, beta_w: column.max(plate) })
}

fn web_plate(
    plate: &joints::WebPlate,
    column_grade: Option<&Grade>,
    members: &Members<'_>,
    rulebook: &Rulebook,
) -> Result<WebPlateAt, Why> {
    sound(&[plate.bottom, plate.top, plate.width, plate.thickness, plate.half_width])?;
    let grade = &plate.grade.as_ref().map_err(|missing| missing.clone())?.value;
    let strength = rulebook.strength(grade, plate.thickness)?.value;
    if !(Some(grade) == column_grade || strength.f_y >= members.strength.f_y_web) {
        let column = column_grade.map_or("not known", |grade| grade.0.as_str());
        return Err(Why::Excluded(format!("it is of {}, the column of {column} (6.2.6.1(8))", grade.0)));
    }
    let edges = match plate.weld.as_ref().map_err(|missing| missing.clone())?.value {
        EdgeWeld::Butt => Edges::Butt,
        EdgeWeld::Fillet(a) => {
            let own = fillets(a, strength.f_u, grade, column_grade, rulebook)?;
            Edges::Fillet(Fillets { f_u: own.f_u.min(members.strength.f_u), ..own })
        }
    };
    let own = WebPlate { b_s: plate.width, t_s: plate.thickness, f_y_s: strength.f_y, edges };
    let column = members.column;
    let d_wc = column.h - 2.0 * (column.t_f + column.r.unwrap_or(Length::ZERO));
    let web = Web { t_wc: column.t_w, d_wc, f_y_wc: members.strength.f_y_web };
    web_plates::conditions(&own, &web, plate.half_width, rulebook.tolerances.position).map_err(|why| {
        // Without the root radius nobody knows how far it has to reach.
        if column.r.is_none() { Why::Open(why) } else { Why::Excluded(why) }
    })?;
    Ok(WebPlateAt { bottom: plate.bottom, top: plate.top, plate: own })
}

fn diagonal(
    pair: &joints::Diagonal,
    column_grade: Option<&Grade>,
    members: &Members<'_>,
    rulebook: &Rulebook,
) -> Result<DiagonalAt, Why> {
    if !pair.both_sides {
        return Err(Why::Excluded("it is on one side of the web only".into()));
    }
    if !pair.full_depth {
        return Err(Why::Excluded("it does not reach from flange to flange".into()));
    }
    sound(&[pair.near, pair.far, pair.thickness, pair.outstand])?;
    let grade = &pair.grade.as_ref().map_err(|missing| missing.clone())?.value;
    let strength = rulebook.strength(grade, pair.thickness)?.value;
    let throat = pair.weld.as_ref().map_err(|missing| missing.clone())?.value;
    let fillets = fillets(throat, strength.f_u, grade, column_grade, rulebook)?;
    let (b, t) = (pair.outstand.min(0.5 * (members.column.b - members.column.t_w)), pair.thickness);
    let at = DiagonalAt { near: pair.near, far: pair.far, b, t, f_y: strength.f_y, fillets, met_at_far: false };
    let limit = 14.0 * crate::eurocode::epsilon(at.f_y) * t;
    if !(b <= limit) {
        return Err(Why::Excluded(format!("its outstand is {b}, 14ε t is {limit}")));
    }
    Ok(at)
}

/// Whether the diagonals are an N (one pair from one flange's level to the other's) or a K (two pairs from the flanges' levels
/// that meet). Ends and levels meet where the plate's end overlaps the flange, or the other plate's end, within the tolerance.
///
/// # Errors
/// Why they are neither.
fn form(pairs: Vec<DiagonalAt>, members: &Members<'_>, rulebook: &Rulebook) -> Result<Vec<DiagonalAt>, String> {
    let beam = members.beam;
    let levels = [beam.h - 0.5 * beam.t_f, 0.5 * beam.t_f];
    let run = members.column.h - 2.0 * members.column.t_f;
    let within = rulebook.tolerances.position;
    // Half the height of a plate's end, which is cut along the flange.
    let half = |d: &DiagonalAt| 0.5 * d.t * (1.0 + ((d.near - d.far) / run).powi(2)).sqrt();
    let at = |end: Length, level: Length, d: &DiagonalAt| (end - level).abs() <= 0.5 * beam.t_f + half(d) + within;
    match pairs.as_slice() {
        [] => Ok(pairs),
        [n] if [(0, 1), (1, 0)].iter().any(|(i, j)| at(n.near, levels[*i], n) && at(n.far, levels[*j], n)) => Ok(pairs),
        [a, b] => {
            let meet = |x: Length, y: Length| (x - y).abs() <= half(a) + half(b) + within;
            let starts = |x: Length, y: Length| {
                at(x, levels[0], a) && at(y, levels[1], b) || at(x, levels[1], a) && at(y, levels[0], b)
            };
            if starts(a.near, b.near) && meet(a.far, b.far) {
                Ok(pairs.iter().map(|d| DiagonalAt { met_at_far: true, ..*d }).collect())
            } else if starts(a.far, b.far) && meet(a.near, b.near) {
                Ok(pairs)
            } else {
                Err("the two do not run from the levels of the beam's flanges to one point (K form)".into())
            }
        }
        [_] => Err("it does not run from the level of one of the beam's flanges to that of the other (N form)".into()),
        _ => Err("more than two pairs of diagonals are neither an N nor a K".into()),
    }
}

fn backing(
    plates: &joints::Backing,
    layout: &EndPlateLayout,
    members: &Members<'_>,
    rulebook: &Rulebook,
) -> Result<BackingAt, Why> {
    if !plates.both_sides {
        return Err(Why::Excluded("it is on one side of the web only".into()));
    }
    sound(&[plates.bottom, plates.top, plates.thickness, plates.from_web, plates.short_of_edge])?;
    let position = rulebook.tolerances.position;
    if !(plates.short_of_edge <= position) {
        return Err(Why::Excluded(format!("it ends {} short of the flange's edge (6.2.4.3(1))", plates.short_of_edge)));
    }
    let most = members.column.r.unwrap_or(Length::ZERO) + FROM_TOE;
    if !(plates.from_web <= most) {
        let why = format!("it starts {} from the web, {most} is the most (6.2.4.3(1))", plates.from_web);
        return Err(if members.column.r.is_none() { Why::Open(why) } else { Why::Excluded(why) });
    }
    let rows = layout.bolts.rows.iter().filter(|row| row.height >= plates.bottom && row.height <= plates.top);
    if rows.count() < 2 {
        return Err(Why::Excluded("it holds one row only, like a washer".into()));
    }
    let grade = &plates.grade.as_ref().map_err(|missing| missing.clone())?.value;
    let f_y_bp = rulebook.strength(grade, plates.thickness)?.value.f_y;
    let (bottom, top) = (plates.bottom, plates.top);
    Ok(BackingAt { bottom, top, plates: BackingPlates { t_bp: plates.thickness, f_y_bp, h_bp: top - bottom } })
}
