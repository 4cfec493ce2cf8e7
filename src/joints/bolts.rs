//! Rows, sizes and holes of an end plate's bolts.

use glam::{DVec2, DVec3};

use super::boxes::thicknesses;
use super::draft::Draft;
use super::frame::Frame;
use super::layout::{BoltRow, Bolts, Held};
use super::scene::Scene;
use crate::origin::{Ask, Datum, Known, Missing, Origin, Place};
use crate::shop::{Bolt, Member, Part};
use crate::units::{Length, mm};

/// What an end plate's bolts pass through besides it.
#[derive(Clone, Copy)]
pub(super) enum Behind {
    /// A column's flange.
    Column(usize),
    /// Another end plate.
    Plate(usize),
    /// The web of a member. An edge across the load is that of the web between the flanges, or the member's end.
    Web(usize),
}

/// A bolt where its axis crosses the end plate.
pub(super) struct Placed {
    pub(super) bolt: usize,
    pub(super) point: DVec3,
    pub(super) across: f64,
    pub(super) height: f64,
}

/// The bolts in rows from the top down.
///
/// # Errors
/// One sentence on what is no regular pair of columns of bolts.
pub(super) fn lay_out(
    scene: &Scene,
    draft: &mut Draft,
    frame: &Frame,
    plate: usize,
    behind: Behind,
) -> Result<Bolts, String> {
    let position = scene.tolerances().position.get();
    let end_plate = plate;
    let plate = &scene.steel.plates[end_plate];
    let mut placed = Vec::new();
    for bolt in &draft.joint.bolts {
        let body = &scene.steel.bolts[*bolt];
        let axis = (body.end - body.start).normalize_or_zero();
        let lean = axis.dot(frame.out).abs().min(1.0).acos().to_degrees();
        if !(lean <= scene.tolerances().angle) {
            return Err(format!("a bolt leans {lean:.1}° from the end plate's normal: not assessed yet"));
        }
        let point = body.start + axis * (plate.centre - body.start).dot(plate.normal) / axis.dot(plate.normal);
        placed.push(Placed { bolt: *bolt, point, across: frame.across(point), height: frame.height(point) });
    }
    placed.sort_by(|a, b| b.height.total_cmp(&a.height).then(a.across.total_cmp(&b.across)));

    let mut rows: Vec<Vec<&Placed>> = Vec::new();
    for bolt in &placed {
        match rows.last_mut() {
            Some(row) if row[0].height - bolt.height <= position => row.push(bolt),
            _ => rows.push(vec![bolt]),
        }
    }
    let outline = frame.outline(plate);
    let other = match behind {
        Behind::Column(_) | Behind::Web(_) => Vec::new(),
        Behind::Plate(other) => frame.outline(&scene.steel.plates[other]),
    };
    let mut laid = Vec::new();
    for row in &rows {
        let height = row.iter().map(|bolt| bolt.height).sum::<f64>() / row.len() as f64;
        let [a, b] = row[..] else {
            return Err(format!(
                "the row at {height:.0} mm has {} in it: only rows of two bolts are assessed yet",
                row.len()
            ));
        };
        let off = (a.across + b.across).abs();
        if !(off <= position && a.across * b.across < 0.0) {
            return Err(format!(
                "the row at {height:.0} mm is not symmetrical about the web, by {off:.1} mm: not assessed yet"
            ));
        }
        let edge = |edges: Option<f64>| edges.filter(|e| *e > 0.0).map(mm);
        let to_plate = to_side(&outline, a).zip(to_side(&outline, b)).map(|(a, b)| a.min(b));
        let to_other = [a, b].map(|bolt| match behind {
            Behind::Column(column) => {
                let column = &scene.steel.members[column];
                Some(column.extents.x / 2.0 - (bolt.point - column.start).dot(column.across).abs())
            }
            Behind::Plate(_) => to_side(&other, bolt),
            Behind::Web(member) => beside_in_web(&scene.steel.members[member], frame, bolt.point),
        });
        let to_other = to_other[0].zip(to_other[1]).map(|(a, b)| a.min(b));
        let (Some(edge_plate), Some(edge_column)) = (edge(to_plate), edge(to_other)) else {
            return Err(format!("a bolt in the row at {height:.0} mm lies on no side edge's inner side"));
        };
        laid.push(BoltRow { height: mm(height), gauge: mm((a.across - b.across).abs()), edge_plate, edge_column });
    }

    let bodies: Vec<&Bolt> = placed.iter().map(|bolt| &scene.steel.bolts[bolt.bolt]).collect();
    let size = scene.tolerances().size;
    let diameter = all_alike(
        "bolt diameter",
        bodies.iter().map(|bolt| &bolt.diameter),
        |a, b| (*a - *b).abs() <= size,
        |d| format!("{} mm", d.get()),
    );
    let class = all_alike("bolt class", bodies.iter().map(|bolt| &bolt.class), |a, b| a == b, Clone::clone);
    let plates = match behind {
        Behind::Column(_) | Behind::Web(_) => vec![end_plate],
        Behind::Plate(other) => vec![end_plate, other],
    };
    let hole = hole(scene, draft, &plates, &placed, &diameter)?;
    let shanks = bodies.iter().map(|bolt| Some(bolt.length.as_ref().ok()?.value - bolt.thread?));
    let shank = shanks.collect::<Option<Vec<Length>>>().and_then(|all| all.into_iter().reduce(Length::min));
    Ok(Bolts { diameter, class, hole, rows: laid, held: Held { shank, ..Held::default() } })
}

/// From a bolt across to the nearer edge of the web that it passes: the flange's inner face where the member stands along
/// the joint's height, the member's end where it lies across.
fn beside_in_web(member: &Member, frame: &Frame, point: DVec3) -> Option<f64> {
    let from = point - member.start;
    if member.along.dot(frame.up).abs() > 0.5 {
        let (t_f, _) = thicknesses(member);
        return Some(member.extents.y / 2.0 - t_f - from.dot(member.depth).abs());
    }
    let at = from.dot(member.along);
    Some(at.min(member.start.distance(member.end) - at))
}

/// From a bolt to the outline's side edge on its own side of the web, at the bolt's height.
fn to_side(outline: &[DVec2], bolt: &Placed) -> Option<f64> {
    let sign = bolt.across.signum();
    let after = outline.iter().cycle().skip(1);
    outline
        .iter()
        .zip(after)
        .filter(|(a, b)| (a.y > bolt.height) != (b.y > bolt.height))
        .map(|(a, b)| (a.x + (b.x - a.x) * (bolt.height - a.y) / (b.y - a.y) - bolt.across) * sign)
        .filter(|distance| *distance >= 0.0)
        .min_by(f64::total_cmp)
}

/// One value for all, or why there is none: a bolt without it, or two that differ.
pub(super) fn all_alike<'k, T: Clone + 'k>(
    what: &str,
    all: impl Iterator<Item = &'k Known<T>> + Clone,
    same: impl Fn(&T, &T) -> bool,
    show: impl Fn(&T) -> String,
) -> Known<T> {
    let count = all.clone().count();
    let without = all.clone().filter(|known| known.is_err()).count();
    let mut first: Option<&Datum<T>> = None;
    let mut shown = Vec::new();
    for known in all {
        let datum = match known {
            Ok(datum) => datum,
            Err(why) if without == count => return Err(why.clone()),
            Err(why) => {
                return Err(Missing { reason: format!("{without} of {count} bolts: {}", why.reason), ..why.clone() });
            }
        };
        if first.is_none_or(|first| !same(&first.value, &datum.value)) {
            shown.push(show(&datum.value));
        }
        first = first.or(Some(datum));
    }
    shown.sort_unstable();
    shown.dedup();
    let missing = |reason| Missing { what: what.into(), reason, at: None, ask: Ask::Fabricator };
    match first {
        Some(datum) if shown.len() == 1 => Ok(datum.clone()),
        Some(_) => Err(missing(format!("the bolts of the joint differ: {}", shown.join(" and ")))),
        None => Err(missing("the joint has no bolts".into())),
    }
}

/// d_0: modelled in the plate, else a property of the bolts, else the normal hole of the bolt size.
pub(super) fn hole(
    scene: &Scene,
    draft: &mut Draft,
    plates: &[usize],
    placed: &[Placed],
    diameter: &Known<Length>,
) -> Result<Known<Length>, String> {
    let size = scene.tolerances().size.get();
    let slot = placed.iter().find_map(|bolt| scene.steel.bolts[bolt.bolt].slot);
    if let Some(slot) = slot {
        return Err(format!("slotted holes (a property of the bolts says {slot}): not assessed yet"));
    }
    let mut modelled: Vec<Known<Length>> = Vec::new();
    for (plate, bolt) in plates.iter().flat_map(|plate| placed.iter().map(move |bolt| (plate, bolt))) {
        let plate = &scene.steel.plates[*plate];
        let from = bolt.point - plate.centre;
        let at = DVec2::new(from.dot(plate.u), from.dot(plate.v));
        let near = plate.holes.iter().filter(|hole| hole.centre.distance(at) <= hole.length.max(hole.diameter) / 2.0);
        let Some(hole) = near.min_by(|a, b| a.centre.distance(at).total_cmp(&b.centre.distance(at))) else { continue };
        if !((hole.length - hole.diameter).abs() <= size) {
            return Err("slotted holes: not assessed yet".into());
        }
        let by = Origin::Derived("modelled holes of the end plate".into());
        modelled.push(Ok(Datum::new(mm(hole.diameter), by)));
    }
    let place = |i: usize| -> Place { scene.place(Part::Bolt(i)) };
    let stated = placed.iter().filter_map(|bolt| {
        let d_0 = scene.steel.bolts[bolt.bolt].hole?;
        let by = "hole diameter, a property of the bolt".to_owned();
        Some(Ok(Datum::new(d_0, Origin::Modelled { by, at: Some(place(bolt.bolt)) })))
    });
    let all = if modelled.is_empty() { placed.len() } else { placed.len() * plates.len() };
    let (holes, words): (Vec<Known<Length>>, _) =
        if modelled.is_empty() { (stated.collect(), "stated") } else { (modelled, "modelled") };
    if holes.is_empty() {
        return Ok(assumed(scene, diameter));
    }
    if holes.len() < all {
        let of = if all > placed.len() { "places" } else { "bolts" };
        draft.joint.disagreements.push(format!("holes are {words} for {} of {all} {of} only", holes.len()));
    }
    let same = |a: &Length, b: &Length| (*a - *b).abs().get() <= size;
    let hole = all_alike("bolt hole", holes.iter(), same, |d_0| format!("{} mm", d_0.get()));
    Ok(match (hole, diameter) {
        (Ok(hole), Ok(d)) if !(hole.value >= d.value) => Err(Missing {
            what: "bolt hole".into(),
            reason: format!("a hole of {} is {words} for a bolt of {}", hole.value, d.value),
            at: None,
            ask: Ask::Fabricator,
        }),
        (hole, _) => hole,
    })
}

fn assumed(scene: &Scene, diameter: &Known<Length>) -> Known<Length> {
    let missing = |reason: String| Missing { what: "bolt hole".into(), reason, at: None, ask: Ask::Fabricator };
    let d = diameter.as_ref().map_err(|why| missing(format!("none is modelled, and {}: {}", why.what, why.reason)))?;
    let size = scene.rules.bolt_size(d.value);
    let size = size.ok_or_else(|| missing(format!("none is modelled, and a bolt of {} is in no table", d.value)))?;
    Ok(Datum::new(size.d_0, Origin::Assumed("normal round hole, EN 1090-2".into())))
}
