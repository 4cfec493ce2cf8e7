//! A fin plate: welded to the support, bolted to the beam's web.

use glam::DVec3;

use super::flexible::Cope;
use super::grid::{self, Axes, Grid};
use crate::joints::boxes::thicknesses;
use crate::joints::draft::Draft;
use crate::joints::end_plate::{UPRIGHT, is_rectangular, member_at};
use crate::joints::frame::{Span, are_parallel, are_square, corners};
use crate::joints::layout::MemberAt;
use crate::joints::scene::{Scene, shared};
use crate::joints::touch::Pass;
use crate::joints::welds::least_throat;
use crate::origin::{Ask, Known, Missing};
use crate::rulebook::Grade;
use crate::shop::{Part, Shape};
use crate::units::{Length, mm};

/// A plate on a column's flange further than this from the column's web, mm, leaves the flange to bend.
const OFF_WEB: f64 = 30.0;

/// What the plate is welded to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum On {
    /// A column's flange, in front of its web.
    ColumnFlange,
    /// A column's web.
    ColumnWeb,
    /// Another beam's web.
    BeamWeb,
}

impl On {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Self::ColumnFlange => "column flange",
            Self::ColumnWeb => "column web",
            Self::BeamWeb => "supporting beam's web",
        }
    }
}

/// A fin plate. Heights are from the soffit of the beam's lower flange, distances from the support's face into the beam.
#[derive(Clone, Debug)]
pub struct FinPlate {
    /// The beam.
    pub beam: MemberAt,
    /// What it is held by.
    pub support: MemberAt,
    /// What the plate is welded to.
    pub on: On,
    /// GlobalId of the plate.
    pub guid: String,
    /// t_p.
    pub thickness: Length,
    /// Height of the plate's lower edge.
    pub bottom: Length,
    /// Height of its upper edge.
    pub top: Length,
    /// Distance of its free edge.
    pub edge: Length,
    /// Steel grade of the plate.
    pub grade: Known<Grade>,
    /// The bolts: heights of rows, distances of lines.
    pub bolts: Grid,
    /// Distance of the beam's end.
    pub gap: Length,
    /// The notch at the beam's top.
    pub top_notch: Option<Cope>,
    /// The notch at its bottom.
    pub bottom_notch: Option<Cope>,
    /// Throat of the fillets on both sides of the plate along the support.
    pub weld: Known<Length>,
    /// Whether another plate stands on the other side of the same web beside this one.
    pub opposite: bool,
}

impl FinPlate {
    /// The detail in lines.
    pub(super) fn lines(&self) -> Vec<String> {
        let list = |all: &[Length]| all.iter().map(|x| format!("{:.1}", x.get())).collect::<Vec<_>>().join(" ");
        let known = |length: &Known<Length>| length.as_ref().map_or("not known".into(), |l| format!("{}", l.value));
        let notch = |cope: Option<Cope>| cope.map_or("none".into(), |c| format!("{} × {}", c.length, c.depth));
        let grade = self.grade.as_ref().map_or("not known", |grade| grade.value.0.as_str());
        vec![
            format!("fin plate on {}", self.on.words()),
            format!("plate {} thick, {} from {} to {}, {grade}", self.thickness, self.edge, self.bottom, self.top),
            format!("bolt rows at {} mm", list(&self.bolts.rows)),
            format!("bolt lines at {} mm", list(&self.bolts.lines)),
            format!("bolts {} {}", known(&self.bolts.diameter), self.bolts.class.as_ref().map_or("", |c| &c.value)),
            format!("gap {}", self.gap),
            format!("notch at the top {}", notch(self.top_notch)),
            format!("notch at the bottom {}", notch(self.bottom_notch)),
            format!("weld throat {}", known(&self.weld)),
        ]
    }
}

/// # Errors
/// One sentence on the first thing that the assessment does not cover.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft) -> Result<FinPlate, String> {
    let tolerances = scene.tolerances();
    let (touch, position, angle) = (tolerances.touch.get(), tolerances.position.get(), tolerances.angle);
    let (Some(beam_index), Some(support_index)) = (draft.joint.supported, draft.joint.supporting) else {
        return Err("fin plate: it is not told what holds the plate".into());
    };
    let [(plate_index, _)] = draft.joint.plates[..] else {
        return Err(format!(
            "fin plate: {} plates are bolted to the beam's web: not assessed yet",
            draft.joint.plates.len()
        ));
    };
    let (beam, support) = (&scene.steel.members[beam_index], &scene.steel.members[support_index]);
    let plate = &scene.steel.plates[plate_index];
    for (role, member) in [("beam", beam), ("supporting member", support)] {
        if let Some(why) = &member.not_assessed {
            return Err(format!("{role}: {why}"));
        }
        if member.shape != Shape::I {
            return Err(format!("fin plate: the {role} is no I section: not assessed yet"));
        }
    }
    let (end, inward) = match draft.joint.at_end {
        Some(true) => (beam.end, -beam.along),
        _ => (beam.start, beam.along),
    };
    let up = if beam.depth.z < 0.0 { -beam.depth } else { beam.depth };
    if !(up.z >= UPRIGHT) {
        return Err("fin plate: the beam is vertical or lies on its side: not assessed yet".into());
    }
    let origin = end - up * (beam.extents.y / 2.0);
    if support.section.is_err() {
        return Err("fin plate: the supporting member's section is not known".into());
    }
    let (_, t_w) = thicknesses(support);
    let column = are_parallel(support.along, up, angle);
    let across_flange = are_parallel(inward, support.depth, angle);
    let across_web = are_parallel(inward, support.across, angle);
    let on = match (column, across_flange, across_web) {
        (true, true, _) => On::ColumnFlange,
        (true, _, true) => On::ColumnWeb,
        (false, _, true) if are_square(support.along, up, angle) => On::BeamWeb,
        _ => return Err("fin plate: the beam does not meet its support at right angles: not assessed yet".into()),
    };
    let half = if on == On::ColumnFlange { support.extents.y / 2.0 } else { t_w / 2.0 };
    let face = (support.start - origin).dot(inward) + half;
    let origin = origin + inward * face;
    let gap = (end - origin).dot(inward);
    if !(gap >= -touch) {
        return Err(format!("fin plate: the beam runs {:.1} mm into its support: not assessed", -gap));
    }
    if !are_square(plate.normal, up, angle) || !are_square(plate.normal, inward, angle) {
        return Err("fin plate: the plate is not parallel to the beam's web: not assessed yet".into());
    }
    let local = |point: DVec3| glam::DVec2::new((point - origin).dot(inward), (point - origin).dot(up));
    let outline: Vec<_> = corners(plate).map(local).collect();
    if !is_rectangular(&outline, position) {
        return Err("fin plate: the plate is no upright rectangle: not assessed yet".into());
    }
    let spans = Span::of(outline.iter().map(|p| p.x)).zip(Span::of(outline.iter().map(|p| p.y)));
    let (wide, high) = spans.ok_or("fin plate: the plate has no outline")?;
    if !(wide.lo.abs() <= touch) {
        return Err(format!("fin plate: the plate stands {:.1} mm off its support: not assessed", wide.lo));
    }
    let off = (plate.centre - support.start).dot(support.across).abs();
    if on == On::ColumnFlange && !(off <= OFF_WEB) {
        return Err(format!(
            "fin plate: it stands {off:.0} mm beside the column's web on its flange: not assessed yet"
        ));
    }
    let plies: Vec<Vec<Pass>> = draft.joint.bolts.iter().map(|bolt| scene.touches.passes[*bolt].clone()).collect();
    let both = |passes: &Vec<Pass>| {
        passes.len() == 2
            && passes.contains(&Pass::Plate(plate_index))
            && passes.iter().any(|pass| matches!(pass, Pass::Member(member, _) if *member == beam_index))
    };
    if !plies.iter().all(both) {
        return Err(
            "fin plate: its bolts pass through other plies than the plate and the beam's web: not assessed yet".into(),
        );
    }
    let bolts = grid::lay_out(scene, draft, plate_index, &Axes { origin, along: inward, up })
        .map_err(|why| format!("fin plate: {why}"))?;
    if bolts.rows.len() < 2 || bolts.lines.len() > 2 {
        let (n_1, n_2) = (bolts.rows.len(), bolts.lines.len());
        return Err(format!("fin plate: {n_2} lines of {n_1} bolts: assessed are one or two lines of at least two"));
    }
    let heights = Span { lo: high.lo, hi: high.hi };
    let upwards = beam.depth.dot(up) > 0.0;
    let at_end = draft.joint.at_end == Some(true);
    let notch =
        |top: bool| {
            let own = beam.notches.iter().filter(|notch| notch.at_end == at_end && (notch.positive == upwards) == top);
            own.fold(None, |most: Option<Cope>, notch| {
                let (length, depth) = (mm(notch.length), mm(notch.depth));
                Some(most.map_or(Cope { length, depth }, |m| Cope {
                    length: m.length.max(length),
                    depth: m.depth.max(depth),
                }))
            })
        };
    Ok(FinPlate {
        beam: member_at(scene, beam_index),
        support: member_at(scene, support_index),
        on,
        guid: plate.identity.guid.clone(),
        thickness: plate.thickness,
        bottom: mm(high.lo),
        top: mm(high.hi),
        edge: mm(wide.hi),
        grade: plate.grade.clone(),
        bolts,
        gap: mm(gap),
        top_notch: notch(true),
        bottom_notch: notch(false),
        weld: weld(scene, plate_index, support_index, &Along { origin, up, heights }),
        opposite: on != On::ColumnFlange
            && is_opposed(scene, plate_index, support_index, inward, &Along { origin, up, heights }),
    })
}

/// The edge of a plate along which it is welded.
struct Along {
    origin: DVec3,
    up: DVec3,
    heights: Span,
}

impl Along {
    fn span(&self, points: impl Iterator<Item = DVec3>) -> Option<Span> {
        Span::of(points.filter(|p| p.is_finite()).map(|p| (p - self.origin).dot(self.up)))
    }
}

/// The throat of the plate's fillets to its support, if they run along the whole of it on both sides, as far as bodies tell.
fn weld(scene: &Scene, plate: usize, support: usize, along: &Along) -> Known<Length> {
    let what = "weld of the fin plate";
    let (p, m) = (Part::Plate(plate), Part::Member(support));
    let mut welds: Vec<usize> = shared(scene.welds_at(p), scene.welds_at(m)).collect();
    welds.extend(scene.placeless_welds(p, m));
    let throat = least_throat(scene, &welds, what)?;
    let missing = |reason: String| {
        Err(Missing {
            what: what.into(),
            reason,
            at: welds.first().map(|weld| scene.place(Part::Weld(*weld))),
            ask: Ask::Fabricator,
        })
    };
    let body = &scene.steel.plates[plate];
    let slack = 2.0 * scene.tolerances().position.get();
    let (mut sides, mut bodies) = ([false; 2], true);
    let mut runs = Vec::new();
    for index in &welds {
        let weld = &scene.steel.welds[*index];
        let stated = weld.length.as_ref().map_or(f64::INFINITY, |length| length.value.get());
        let run = along.span(weld.points.iter().copied());
        let full = along.heights.size();
        match run {
            Some(run) => runs.push(Span { hi: run.hi.min(run.lo + stated), ..run }),
            None if stated.is_finite() => {
                runs.push(Span { lo: along.heights.lo, hi: along.heights.lo + stated.min(full) })
            }
            None => return missing("the welds there have neither a place nor a length".into()),
        }
        let beside = Span::of(weld.points.iter().map(|point| (*point - body.centre).dot(body.normal)));
        match beside.filter(|_| weld.points.len() > 2) {
            Some(own) if own.mid() > 0.0 => sides[1] = true,
            Some(_) => sides[0] = true,
            None => bodies = false,
        }
        // A box all round the plate's edge is on both.
        if beside.is_some_and(|own| own.size() >= body.thickness.get()) {
            sides = [true; 2];
        }
    }
    runs.sort_by(|a, b| a.lo.total_cmp(&b.lo));
    let (mut covered, mut reached) = (0.0, f64::NEG_INFINITY);
    for run in &runs {
        covered += (run.hi - run.lo.max(reached)).max(0.0);
        reached = reached.max(run.hi);
    }
    let full = along.heights.size();
    if !(covered >= full - slack) {
        return missing(format!("the welds modelled there run over {covered:.0} mm of {full:.0} mm"));
    }
    if bodies && sides != [true; 2] {
        return missing("the welds modelled there lie on one side only; the other side has none".into());
    }
    Ok(throat)
}

/// Whether another plate touches the support's web on the other side at the same heights.
fn is_opposed(scene: &Scene, plate: usize, support: usize, inward: DVec3, along: &Along) -> bool {
    let middle = scene.steel.members[support].start;
    scene.touches.plates_of[support].iter().any(|other| {
        let body = &scene.steel.plates[*other];
        let behind = (body.centre - middle).dot(inward) < 0.0;
        let level =
            along.span(corners(body)).is_some_and(|own| own.lo <= along.heights.hi && own.hi >= along.heights.lo);
        let near = (body.centre - scene.steel.plates[plate].centre).dot(scene.steel.members[support].along).abs()
            <= 2.0 * along.heights.size()
            && body.centre.distance(scene.steel.plates[plate].centre) <= 2.0 * along.heights.size() + 500.0;
        *other != plate && behind && level && near
    })
}
