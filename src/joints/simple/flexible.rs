//! Flexible end plates: a plate welded to the beam's web only, bolted to a column's flange or to a web.

use super::super::bolts::{self, Behind};
use super::super::boxes::{Ply, thicknesses};
use super::super::cut;
use super::super::draft::Draft;
use super::super::end_plate::{UPRIGHT, is_rectangular, member_at, plate_at};
use super::super::frame::{Frame, are_parallel};
use super::super::scene::Scene;
use super::super::touch::{EndOn, Pass};
use super::super::welds::{self, Role};
use super::super::{Bolts, EndPlate, MemberAt};
use crate::origin::{Ask, Known, Missing};
use crate::shop::Member;
use crate::units::{Length, mm};

/// What a flexible end plate is bolted to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Held {
    /// A column's flange.
    ColumnFlange,
    /// The web of a member that stands along the joint's height.
    ColumnWeb,
    /// The web of a member that lies across.
    BeamWeb,
}

impl Held {
    /// "column web".
    pub fn word(self) -> &'static str {
        match self {
            Self::ColumnFlange => "column flange",
            Self::ColumnWeb => "column web",
            Self::BeamWeb => "supporting beam's web",
        }
    }
}

/// A notch at the beam's end at a joint.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cope {
    /// l_n: from the beam's end.
    pub length: Length,
    /// d_n: from the flange's outer face.
    pub depth: Length,
}

/// A flexible end-plate joint. Heights are measured up from the soffit of the beam's lower flange, whether or not it is
/// notched away.
#[derive(Clone, Debug)]
pub struct FlexibleEndPlate {
    /// The supporting member.
    pub supporting: MemberAt,
    /// The beam.
    pub beam: MemberAt,
    /// The plate.
    pub plate: EndPlate,
    /// The bolts; a row's `edge_column` is the distance across to the edge of the ply behind: the flange's edge, the end of
    /// the web between its flanges, or the supporting beam's end.
    pub bolts: Bolts,
    /// Throat of the fillets on both sides of the beam's web.
    pub weld: Known<Length>,
    /// What the bolts pass through behind the plate.
    pub held: Held,
    /// The notch at the top.
    pub top: Option<Cope>,
    /// The notch at the bottom.
    pub bottom: Option<Cope>,
    /// From the highest row up to the column's end, or to the inner face of the supporting beam's upper flange.
    pub above: Length,
    /// From the lowest row down to the column's other end, or to the inner face of the lower flange.
    pub below: Length,
    /// By row: whether another end plate on the web's other side hangs on the same bolts.
    pub shared: Vec<bool>,
}

impl FlexibleEndPlate {
    /// The detail in lines.
    pub fn lines(&self) -> Vec<String> {
        let print = |known: &Known<Length>| known.as_ref().map_or_else(|_| "unknown".into(), |d| d.value.to_string());
        let notch = |cope: Option<Cope>| cope.map_or("none".into(), |c| format!("{} × {}", c.length, c.depth));
        let mut lines = vec![
            format!("on the {}", self.held.word()),
            format!(
                "end plate {} × {}, from {} to {}",
                self.plate.thickness, self.plate.width, self.plate.bottom, self.plate.top
            ),
            format!("bolts d {}, d0 {}", print(&self.bolts.diameter), print(&self.bolts.hole)),
            format!("weld at the web a {}", print(&self.weld)),
            format!("notch at the top {}", notch(self.top)),
            format!("notch at the bottom {}", notch(self.bottom)),
        ];
        for (row, shared) in self.bolts.rows.iter().zip(&self.shared) {
            let with = if *shared { ", through two end plates" } else { "" };
            lines.push(format!("row at {}, gauge {}{with}", row.height, row.gauge));
        }
        lines
    }
}

/// # Errors
/// One sentence on the first thing that the assessment does not cover.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft) -> Result<FlexibleEndPlate, String> {
    let angle = scene.tolerances().angle;
    let touch = scene.tolerances().touch.get();
    let plate = draft.joint.plates.iter().find(|(_, role)| *role == "end-plate").map(|(plate, _)| *plate);
    let (Some(plate), Some(beam), Some(supporting)) = (plate, draft.joint.supported, draft.joint.supporting) else {
        return Err("the joint has no end plate between two members: not assessed".into());
    };
    let ends = cut::ends_on(scene, plate);
    let end = *ends.first().filter(|end| end.member == beam).ok_or("the beam does not end on the plate")?;
    if ends.len() > 1 {
        return Err("another member ends on the same end plate: not assessed yet".into());
    }
    let (at, body) = (&scene.steel.members[supporting], &scene.steel.plates[plate]);
    for (role, member) in [("beam", beam), ("supporting member", supporting)] {
        if let Some(why) = &scene.steel.members[member].not_assessed {
            return Err(format!("{role}: {why}"));
        }
    }
    let frame = Frame::new(&scene.steel.members[beam], &end, body).ok_or("the beam's end has no direction")?;
    let roles = welds::at_plate(scene, &frame, beam, plate);
    if roles.iter().any(|(_, role)| matches!(role, Role::FlangeTop | Role::FlangeBottom)) {
        return Err(
            "the end plate is welded to one of the beam's flanges, and so not flexible: not assessed yet".into()
        );
    }
    let held = held(scene, draft, at, supporting, &frame)?;
    placed(scene, &end, &frame, at, plate, held)?;
    let outline = frame.outline(body);
    if !is_rectangular(&outline, scene.tolerances().position.get()) {
        return Err("the end plate is no upright rectangle: not assessed yet".into());
    }
    if !are_parallel(frame.out, body.normal, angle) || !(end.gap.abs() <= touch) {
        return Err(format!("the beam's end stands {:.1} mm off the end plate: not assessed", end.gap));
    }
    let shared_plates = beyond(scene, draft, plate, beam)?;
    let behind = if held == Held::ColumnFlange { Behind::Column(supporting) } else { Behind::Web(supporting) };
    let bolts = bolts::lay_out(scene, draft, &frame, plate, behind)?;
    let plate_at = plate_at(scene, plate, &outline)?;

    let position = scene.tolerances().position.get();
    let holds = |bolt: usize| shared_plates.iter().any(|p| scene.touches.passes[bolt].contains(&Pass::Plate(*p)));
    let heights: Vec<(f64, bool)> = (draft.joint.bolts.iter())
        .map(|bolt| {
            let body = &scene.steel.bolts[*bolt];
            (frame.height((body.start + body.end) / 2.0), holds(*bolt))
        })
        .collect();
    let near = |row: f64, height: f64| (height - row).abs() <= 2.0 * position;
    let shared = bolts.rows.iter().map(|row| heights.iter().any(|(h, s)| *s && near(row.height.get(), *h))).collect();

    let (Some(highest), Some(lowest)) = (bolts.rows.first(), bolts.rows.last()) else {
        return Err("the joint has no bolts".into());
    };
    let (upper, lower) = limits(at, &frame, held);
    let (above, below) = (upper - highest.height.get(), lowest.height.get() - lower);
    if !(above > 0.0 && below > 0.0) {
        return Err(format!("bolts lie beyond the end of the {}: not assessed", held.word()));
    }
    let cope = |top: bool| cope(&scene.steel.members[beam], &end, &frame, top);
    let (top, bottom) = (cope(true), cope(false));
    let at_beam = member_at(scene, beam);
    let sizes = at_beam.section.as_ref().map(|section| (section.value.t_f, section.value.r.unwrap_or(Length::ZERO)));
    let (t_f, r) = sizes.unwrap_or((Length::ZERO, Length::ZERO));
    let mut layout = FlexibleEndPlate {
        supporting: member_at(scene, supporting),
        weld: Err(Missing { what: "weld at the web".into(), reason: String::new(), at: None, ask: Ask::Fabricator }),
        beam: at_beam,
        plate: plate_at,
        bolts,
        held,
        top,
        bottom,
        above: mm(above),
        below: mm(below),
        shared,
    };
    let run = layout.beside_web(mm(scene.steel.members[beam].extents.y), t_f, r);
    layout.weld = welds::throat_over(scene, &frame, beam, &roles, run.get());
    Ok(layout)
}

impl FlexibleEndPlate {
    /// Length of the plate beside the straight part of the beam's web, as left by the notches; `h`, `t_f` and `r` are the
    /// beam's. Not below 0.
    pub fn beside_web(&self, h: Length, t_f: Length, r: Length) -> Length {
        let upper = self.top.map_or(h - t_f - r, |cope| h - cope.depth);
        let lower = self.bottom.map_or(t_f + r, |cope| cope.depth);
        (self.plate.top.min(upper) - self.plate.bottom.max(lower)).max(Length::ZERO)
    }
}

/// What the bolts pass through behind the plate; every bolt the same.
fn held(scene: &Scene, draft: &Draft, at: &Member, supporting: usize, frame: &Frame) -> Result<Held, String> {
    if draft.joint.bolts.iter().any(|bolt| scene.steel.bolts[*bolt].anchor) {
        return Err("among its bolts are anchors: not assessed yet".into());
    }
    let angle = scene.tolerances().angle;
    let stands = are_parallel(at.along, frame.up, angle);
    let lies = are_parallel(at.depth, frame.up, angle);
    let (_, passed) = cut::passed(scene, &draft.joint.bolts);
    let plies = passed.get(&supporting).filter(|plies| plies.len() == 1).and_then(|plies| plies.first());
    let (ply, held) = match plies {
        Some(Ply::Web) if stands => (Ply::Web, Held::ColumnWeb),
        Some(Ply::Web) if lies => (Ply::Web, Held::BeamWeb),
        Some(ply) if ply.sign() != 0.0 && stands => (*ply, Held::ColumnFlange),
        Some(_) => {
            return Err(
                "the beam's depth runs neither along the supporting member nor with its depth: not assessed yet".into(),
            );
        }
        None => return Err("the bolts do not all pass through one flange or web: not assessed yet".into()),
    };
    let through = |bolt: &&usize| scene.touches.passes[**bolt].contains(&Pass::Member(supporting, ply));
    let (count, all) = (draft.joint.bolts.iter().filter(through).count(), draft.joint.bolts.len());
    if count < all {
        return Err(format!("{} of {all} bolts do not pass through the {}: not assessed", all - count, held.word()));
    }
    Ok(held)
}

/// # Errors
/// Where the beam or the plate does not stand square on its support, or not against it.
fn placed(scene: &Scene, end: &EndOn, frame: &Frame, at: &Member, plate: usize, held: Held) -> Result<(), String> {
    let angle = scene.tolerances().angle;
    let touch = scene.tolerances().touch.get();
    if !(frame.up.z >= UPRIGHT) {
        return Err("the supported member is vertical or lies on its side: not assessed yet".into());
    }
    if !(end.slope <= angle) {
        return Err(format!("the beam is inclined by {:.1}° to the end plate's normal: not assessed yet", end.slope));
    }
    let (t_f, t_w) = thicknesses(at);
    let (normal, face) = match held {
        Held::ColumnFlange => (at.depth, at.extents.y / 2.0),
        Held::ColumnWeb | Held::BeamWeb => (at.across, t_w / 2.0),
    };
    if !are_parallel(frame.out, normal, angle) {
        return Err(format!("the end plate is not parallel to the {}: not assessed yet", held.word()));
    }
    let gap = -scene.steel.plates[plate].thickness.get() - (frame.outward(at.start) + face);
    if !(gap.abs() <= touch) {
        let how = if gap > 0.0 { "stands off" } else { "runs into" };
        return Err(format!("the end plate {how} the {} by {:.1} mm: not assessed", held.word(), gap.abs()));
    }
    let eccentric = (frame.origin - at.start).dot(at.across).abs();
    if held == Held::ColumnFlange && !(eccentric <= scene.tolerances().position.get()) {
        return Err(format!("beam is eccentric to the column's web by {eccentric:.1} mm: not assessed"));
    }
    // A plate beside a web must fit between the flanges, else it can't lie on it.
    let clear = at.extents.y / 2.0 - t_f;
    let outline = frame.outline(&scene.steel.plates[plate]);
    let from_middle = |p: &glam::DVec2| match held {
        Held::ColumnFlange => 0.0,
        Held::ColumnWeb | Held::BeamWeb => {
            let point = frame.origin + frame.side * p.x + frame.up * p.y;
            (point - at.start).dot(at.depth).abs()
        }
    };
    if !outline.iter().all(|p| from_middle(p) <= clear + touch) {
        return Err(format!("the end plate runs past the {} into a flange: not assessed", held.word()));
    }
    Ok(())
}

/// End plates of other members that the same bolts hold on the web's other side.
///
/// # Errors
/// Where something else lies under the bolts.
fn beyond(scene: &Scene, draft: &Draft, plate: usize, beam: usize) -> Result<Vec<usize>, String> {
    let (plates, members) = cut::passed(scene, &draft.joint.bolts);
    let others: Vec<usize> = plates.into_iter().filter(|other| *other != plate).collect();
    let is_end_plate = |other: &usize| cut::ends_on(scene, *other).first().is_some_and(|end| end.member != beam);
    if others.len() > 1 || !others.iter().all(is_end_plate) {
        return Err("packing or another plate lies under the bolts: not assessed yet".into());
    }
    if members.keys().any(|member| Some(*member) != draft.joint.supporting) {
        return Err("the bolts pass through a third member: not assessed yet".into());
    }
    Ok(others)
}

/// Heights of what ends the ply behind: a column's ends, the inner faces of a beam's flanges.
fn limits(at: &Member, frame: &Frame, held: Held) -> (f64, f64) {
    let (one, two) = match held {
        Held::ColumnFlange | Held::ColumnWeb => (frame.height(at.start), frame.height(at.end)),
        Held::BeamWeb => {
            let clear = at.depth * (at.extents.y / 2.0 - thicknesses(at).0);
            (frame.height(at.start + clear), frame.height(at.start - clear))
        }
    };
    (one.max(two), one.min(two))
}

/// The notch at the beam's end at the top or the bottom; of several the box round them.
fn cope(beam: &Member, end: &EndOn, frame: &Frame, top: bool) -> Option<Cope> {
    let upwards = beam.depth.dot(frame.up) > 0.0;
    let own = beam.notches.iter().filter(|notch| notch.at_end == end.at_end && (notch.positive == upwards) == top);
    own.fold(None, |most: Option<Cope>, notch| {
        let (length, depth) = (mm(notch.length), mm(notch.depth));
        Some(most.map_or(Cope { length, depth }, |m| Cope { length: m.length.max(length), depth: m.depth.max(depth) }))
    })
}
