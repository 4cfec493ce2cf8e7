//! Which weld lies where between a member's end and its end plate.

use super::boxes::thicknesses;
use super::frame::{Frame, Span};
use super::scene::{Scene, shared};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::shop::{Part, WeldSort};
use crate::units::{Length, mm};

/// A weld's middle may lie this far from the middle of the flange or web that it welds, mm, beyond half its thickness:
/// a fillet's leg and the slackness with which welds are drawn.
pub(super) const BESIDE: f64 = 30.0;

/// The place of a weld in an end-plate joint.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Role {
    FlangeTop,
    FlangeBottom,
    Web,
    Stiffener,
    Other,
}

impl Role {
    pub(super) fn word(self) -> &'static str {
        match self {
            Self::FlangeTop => "flange-top",
            Self::FlangeBottom => "flange-bottom",
            Self::Web => "web",
            Self::Stiffener => "stiffener",
            Self::Other => "other",
        }
    }
}

/// Welds between a member and its end plate with their roles; one that goes all round has three.
pub(super) fn at_plate(scene: &Scene, frame: &Frame, member: usize, plate: usize) -> Vec<(usize, Role)> {
    let (m, p) = (Part::Member(member), Part::Plate(plate));
    let mut roles = Vec::new();
    for weld in shared(scene.welds_at(p), scene.welds_at(m)) {
        roles.extend(by_place(scene, frame, member, weld).into_iter().map(|role| (weld, role)));
    }
    for weld in scene.placeless_welds(p, m) {
        roles.push((weld, by_name(&scene.steel.welds[weld].identity.name).unwrap_or(Role::Other)));
    }
    roles.sort_unstable();
    roles
}

fn by_place(scene: &Scene, frame: &Frame, member: usize, weld: usize) -> Vec<Role> {
    let beam = &scene.steel.members[member];
    let (t_f, t_w) = thicknesses(beam);
    let (h, b) = (beam.extents.y, beam.extents.x);
    let Some((across, heights)) = spans(scene, frame, weld) else { return vec![Role::Other] };
    if across.size() >= b / 2.0 && heights.size() >= 0.8 * h {
        return vec![Role::FlangeTop, Role::FlangeBottom, Role::Web];
    }
    let near = |x: f64, middle: f64, thickness: f64| (x - middle).abs() <= thickness / 2.0 + BESIDE;
    let role = if across.size() > heights.size() {
        match heights.mid() {
            y if near(y, h - t_f / 2.0, t_f) => Role::FlangeTop,
            y if near(y, t_f / 2.0, t_f) => Role::FlangeBottom,
            _ => Role::Other,
        }
    } else if near(across.mid(), 0.0, t_w) && heights.mid() >= 0.0 && heights.mid() <= h {
        Role::Web
    } else {
        Role::Other
    };
    vec![role]
}

pub(super) fn spans(scene: &Scene, frame: &Frame, weld: usize) -> Option<(Span, Span)> {
    let points = || scene.steel.welds[weld].points.iter().copied().filter(|p| p.is_finite());
    Span::of(points().map(|p| frame.across(p))).zip(Span::of(points().map(|p| frame.height(p))))
}

/// The second witness.
fn by_name(name: &str) -> Option<Role> {
    let name = name.to_lowercase();
    let has = |word: &str| name.contains(word);
    match (has("flange"), has("web")) {
        (true, false) if has("top") || has("upper") => Some(Role::FlangeTop),
        (true, false) if has("bottom") || has("lower") => Some(Role::FlangeBottom),
        (false, true) => Some(Role::Web),
        _ => None,
    }
}

/// Says where a weld's name speaks of another place than the one where it lies, or is all that there is.
pub(super) fn say_where_names_disagree(scene: &Scene, roles: &[(usize, Role)], sentences: &mut Vec<String>) {
    for (weld, role) in roles {
        let named = by_name(&scene.steel.welds[*weld].identity.name);
        let all_round = roles.iter().filter(|(other, _)| other == weld).count() > 1;
        if scene.steel.welds[*weld].points.is_empty() {
            sentences.push(format!("a weld has no place: its name alone makes it \"{}\"", role.word()));
        } else if named.is_some_and(|named| named != *role) && !all_round {
            sentences.push(format!("a weld lies at \"{}\", which its name does not say", role.word()));
        }
    }
}

/// The throat for one role: the least of its welds if every one states it and they run along the whole of the flange or
/// web, else why there is none.
pub(super) fn throat(
    scene: &Scene,
    frame: &Frame,
    member: usize,
    roles: &[(usize, Role)],
    role: Role,
    what: &str,
) -> Known<Length> {
    let welds: Vec<usize> = roles.iter().filter(|(_, r)| *r == role).map(|(weld, _)| *weld).collect();
    if full_butt(scene, frame, member, roles, role) {
        let t = part_thickness(scene, member, role);
        let by = "full penetration by its name, its depth or the sign of a preparation without a depth (ISO 2553)";
        return Ok(Datum::new(mm(t), Origin::Assumed(by.into())));
    }
    let least = least_throat(scene, &welds, what)?;
    match short(scene, frame, member, &welds, role).or_else(|| one_sided(scene, frame, member, &welds, role)) {
        None => Ok(least),
        Some(reason) => Err(Missing {
            what: what.into(),
            reason,
            at: welds.first().map(|weld| scene.place(Part::Weld(*weld))),
            ask: Ask::Fabricator,
        }),
    }
}

/// Whether butt welds of full penetration run along the whole of the flange or web; fillets beside them only reinforce.
pub(super) fn full_butt(scene: &Scene, frame: &Frame, member: usize, roles: &[(usize, Role)], role: Role) -> bool {
    let t = part_thickness(scene, member, role);
    let through = |weld: &usize| {
        let weld = &scene.steel.welds[*weld];
        let depth = weld.throat.as_ref().map_or(0.0, |throat| throat.value.get());
        match weld.sort {
            WeldSort::FullButt => t > 0.0,
            WeldSort::Butt => t > 0.0 && depth >= t - scene.tolerances().size.get(),
            WeldSort::Fillet | WeldSort::Unknown => false,
        }
    };
    let butts: Vec<usize> = roles.iter().filter(|(_, r)| *r == role).map(|(weld, _)| *weld).filter(through).collect();
    !butts.is_empty() && short(scene, frame, member, &butts, role).is_none()
}

/// t_f or t_w of the member, mm; 0 where its section is not known.
fn part_thickness(scene: &Scene, member: usize, role: Role) -> f64 {
    let (t_f, t_w) = thicknesses(&scene.steel.members[member]);
    if role == Role::Web { t_w } else { t_f }
}

/// Why welds do not run along the whole of what they weld, if they do not. A seam is often drawn in pieces, so their union
/// counts: of each piece no more than its stated length (an intermittent seam is drawn from end to end), and none that is
/// too short to be counted (EN 1993-1-8 4.5.1(2)).
fn short(scene: &Scene, frame: &Frame, member: usize, welds: &[usize], role: Role) -> Option<String> {
    let beam = &scene.steel.members[member];
    let full = match (&beam.section, role) {
        (Ok(section), Role::Web) => {
            let r = section.value.r.unwrap_or(Length::ZERO);
            (section.value.h - 2.0 * (section.value.t_f + r)).get()
        }
        (Err(_), Role::Web) => beam.extents.y,
        _ => beam.extents.x,
    };
    short_of(scene, frame, welds, role, full)
}

/// The throat of the web's welds if they run over `full` mm of it: those of a plate that is shorter than the web.
pub(super) fn throat_over(
    scene: &Scene,
    frame: &Frame,
    member: usize,
    roles: &[(usize, Role)],
    full: f64,
) -> Known<Length> {
    let what = "weld at the web";
    let welds: Vec<usize> = roles.iter().filter(|(_, r)| *r == Role::Web).map(|(weld, _)| *weld).collect();
    let least = least_throat(scene, &welds, what)?;
    let short = short_of(scene, frame, &welds, Role::Web, full);
    match short.or_else(|| one_sided(scene, frame, member, &welds, Role::Web)) {
        None => Ok(least),
        Some(reason) => Err(Missing {
            what: what.into(),
            reason,
            at: welds.first().map(|weld| scene.place(Part::Weld(*weld))),
            ask: Ask::Fabricator,
        }),
    }
}

fn short_of(scene: &Scene, frame: &Frame, welds: &[usize], role: Role, full: f64) -> Option<String> {
    let rules = &scene.rules.welds;
    let mut runs: Vec<Span> = Vec::new();
    let mut placeless = 0.0_f64;
    for index in welds {
        let weld = &scene.steel.welds[*index];
        let stated = weld.length.as_ref().ok().map(|length| length.value.get());
        let throat = weld.throat.as_ref().map_or(0.0, |throat| throat.value.get());
        let least = rules.min_length.get().max(rules.min_length_in_throats * throat);
        let run = match spans(scene, frame, *index) {
            Some((across, heights)) => {
                let run = if role == Role::Web { heights } else { across };
                Span { hi: run.hi.min(run.lo + stated.unwrap_or(f64::INFINITY)), ..run }
            }
            None => {
                placeless = placeless.max(stated.unwrap_or(0.0));
                continue;
            }
        };
        if run.size() >= least {
            runs.push(run);
        }
    }
    runs.sort_by(|a, b| a.lo.total_cmp(&b.lo));
    let (mut covered, mut reached) = (0.0, f64::NEG_INFINITY);
    for run in &runs {
        covered += (run.hi - run.lo.max(reached)).max(0.0);
        reached = reached.max(run.hi);
    }
    let covered = placeless.max(covered);
    if covered >= full - 2.0 * scene.tolerances().position.get() {
        return None;
    }
    let nowhere = welds.iter().all(|weld| scene.steel.welds[*weld].points.is_empty());
    Some(if nowhere && covered == 0.0 {
        "the welds there have neither a place nor a length".into()
    } else {
        format!(
            "the welds modelled there run over {covered:.0} mm of {full:.0} mm; shorter or intermittent ones are not counted"
        )
    })
}

/// Says so where every weld has a body and all lie on one side of the flange or web: the other side has none.
fn one_sided(scene: &Scene, frame: &Frame, member: usize, welds: &[usize], role: Role) -> Option<String> {
    let beam = &scene.steel.members[member];
    let (t_f, t_w) = thicknesses(beam);
    let touch = scene.tolerances().touch.get();
    let (low, high) = match role {
        Role::FlangeTop => (beam.extents.y - t_f, beam.extents.y),
        Role::FlangeBottom => (0.0, t_f),
        _ => (-t_w / 2.0, t_w / 2.0),
    };
    let mut sides = (false, false);
    for weld in welds {
        // A line tells no side, nor does a box that reaches into the steel.
        let (across, heights) = spans(scene, frame, *weld).filter(|_| scene.steel.welds[*weld].points.len() > 2)?;
        let own = if role == Role::Web { across } else { heights };
        match (own.hi <= low + touch, own.lo >= high - touch) {
            (true, false) => sides.0 = true,
            (false, true) => sides.1 = true,
            _ => return None,
        }
    }
    (sides.0 != sides.1).then(|| "the welds modelled there lie on one side only; the other side has none".into())
}

/// The least throat of some welds if every one is a fillet with a known throat.
pub(super) fn least_throat(scene: &Scene, welds: &[usize], what: &str) -> Known<Length> {
    let missing = |reason: &str, weld: Option<usize>| Missing {
        what: what.into(),
        reason: reason.into(),
        at: weld.map(|weld| scene.place(Part::Weld(weld))),
        ask: Ask::Fabricator,
    };
    let mut least: Known<Length> = Err(missing("no weld is modelled there", None));
    for weld in welds {
        let sort = scene.steel.welds[*weld].sort;
        if matches!(sort, WeldSort::Butt | WeldSort::FullButt) {
            let why = "a butt weld that is not known to go through, or not all along: not assessed yet";
            return Err(Missing { ask: Ask::Method, ..missing(why, Some(*weld)) });
        }
        let throat = match &scene.steel.welds[*weld].throat {
            Ok(throat) => throat.clone(),
            Err(why) => return Err(Missing { what: what.into(), ..why.clone() }),
        };
        if !(throat.value.get() > 0.0) {
            return Err(missing(&format!("its throat is given as {}", throat.value), Some(*weld)));
        }
        if !least.as_ref().is_ok_and(|known| known.value.get() <= throat.value.get()) {
            least = Ok(throat);
        }
    }
    least
}
