//! Which weld lies where between a member's end and its end plate.

use super::boxes::thicknesses;
use super::frame::{Frame, Span};
use super::scene::{Scene, shared};
use crate::origin::{Ask, Known, Missing};
use crate::shop::{Part, WeldSort};
use crate::units::Length;

/// A weld's middle may lie this far from the middle of the flange or web that it welds, mm, beyond half its thickness:
/// a fillet's leg and the slackness with which welds are drawn.
const BESIDE: f64 = 30.0;

/// A weld that runs over less than this share of its flange or web is not taken as welding it.
const COVERS: f64 = 0.5;

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

fn spans(scene: &Scene, frame: &Frame, weld: usize) -> Option<(Span, Span)> {
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

/// The throat for one role: the least of its welds if every one states it, else why there is none.
pub(super) fn throat(
    scene: &Scene,
    frame: &Frame,
    member: usize,
    roles: &[(usize, Role)],
    role: Role,
    what: &str,
) -> Known<Length> {
    let welds: Vec<usize> = roles.iter().filter(|(_, r)| *r == role).map(|(weld, _)| *weld).collect();
    let least = least_throat(scene, &welds, what)?;
    let beam = &scene.steel.members[member];
    let full = if role == Role::Web { beam.extents.y } else { beam.extents.x };
    // The union of the welds' runs: a seam is often drawn in pieces.
    let mut runs: Vec<Span> = welds
        .iter()
        .filter_map(|weld| spans(scene, frame, *weld))
        .map(|(across, heights)| if role == Role::Web { heights } else { across })
        .collect();
    runs.sort_by(|a, b| a.lo.total_cmp(&b.lo));
    let mut covered = 0.0;
    let mut reached = f64::NEG_INFINITY;
    for run in &runs {
        covered += (run.hi - run.lo.max(reached)).max(0.0);
        reached = reached.max(run.hi);
    }
    if !runs.is_empty() && !(covered >= COVERS * full) {
        return Err(Missing {
            what: what.into(),
            reason: format!("the welds modelled there run over {covered:.0} mm of {full:.0} mm"),
            at: welds.first().map(|weld| scene.place(Part::Weld(*weld))),
            ask: Ask::Fabricator,
        });
    }
    Ok(least)
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
        if sort == WeldSort::Butt {
            return Err(Missing { ask: Ask::Method, ..missing("butt weld: not assessed yet", Some(*weld)) });
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
