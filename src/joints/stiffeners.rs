//! Plates between the column's flanges near an end-plate joint: transverse stiffeners, and what nobody credits.

use std::collections::BTreeMap;

use super::boxes::thicknesses;
use super::cut;
use super::end_plate::Case;
use super::frame::{Span, are_parallel, are_square, corners};
use super::layout::Stiffener;
use super::scene::Scene;
use super::strengthening::{self, Found};
use super::welds;
use crate::origin::{Ask, Known, Missing};
use crate::rulebook::Grade;
use crate::shop::{Member, Part, Plate};
use crate::units::{Length, mm};

/// Plates of the column further than this beyond the end plate, mm, are none of the joint's.
const BEYOND: f64 = 200.0;

/// What stands on the column near the joint.
#[derive(Default)]
pub(super) struct OnColumn {
    /// Web plates, diagonals and backing plates.
    pub(super) strengthening: Found,
    /// From the top down, each with its plates and welds.
    pub(super) stiffeners: Vec<(Stiffener, Vec<usize>, Vec<usize>)>,
    /// One sentence each.
    pub(super) not_credited: Vec<String>,
    /// The plates that these are about.
    pub(super) others: Vec<usize>,
}

/// A plate in the column's own frame.
struct Half {
    plate: usize,
    height: f64,
    across: Span,
    depth: Span,
}

/// Everything on the column between `BEYOND` below and above the end plate, whose heights are given.
pub(super) fn find(scene: &Scene, case: &Case, heights: Span, bolted: &[usize]) -> OnColumn {
    let column = &scene.steel.members[case.column];
    let packing = super::end_plate::packing(scene, case, bolted);
    let mut found = OnColumn::default();
    let mut halves = Vec::new();
    let mut others: BTreeMap<&str, usize> = BTreeMap::new();
    let mut rest = Vec::new();
    let on_web = strengthening::plates_on_web(scene, case);
    for index in scene.touches.plates_of[case.column].iter().copied() {
        let plate = &scene.steel.plates[index];
        let near = Span::of(corners(plate).map(|p| case.frame.height(p)))
            .is_some_and(|own| own.hi >= heights.lo - BEYOND && own.lo <= heights.hi + BEYOND);
        let end_plate =
            index == case.plate || !is_transverse(scene, column, plate) && !cut::ends_on(scene, index).is_empty();
        if !near || end_plate || packing.contains(&index) {
            continue;
        }
        match half(scene, case, index, &on_web).filter(|_| !bolted.contains(&index)) {
            Some(half) => halves.push(half),
            None if is_bolted_elsewhere(scene, index, bolted) => {}
            None => rest.push(index),
        }
    }
    found.strengthening = strengthening::find(scene, case, &rest, &on_web, bolted);
    for index in rest {
        if !found.strengthening.plates.iter().any(|(plate, _)| *plate == index) {
            *others.entry(not_a_stiffener(scene, column, &scene.steel.plates[index])).or_default() += 1;
            found.others.push(index);
        }
    }
    found.not_credited = others.into_iter().map(|(what, count)| not_credited(what, count)).collect();
    found.stiffeners = pairs(scene, column, halves);
    found
}

/// Without marks, so that like joints read alike; the finding names the parts.
pub(super) fn not_credited(what: &str, count: usize) -> String {
    match count {
        1 => format!("a {what} is not credited"),
        _ if what.contains("plate") => format!("{count} {} are not credited", what.replacen("plate", "plates", 1)),
        _ => format!("{count} {what}s are not credited"),
    }
}

fn is_transverse(scene: &Scene, column: &Member, plate: &Plate) -> bool {
    are_parallel(plate.normal, column.along, scene.tolerances().angle)
}

/// Other joints' fin plates and splice plates: their bolts are what they are there for.
fn is_bolted_elsewhere(scene: &Scene, plate: usize, bolted: &[usize]) -> bool {
    !bolted.contains(&plate) && scene.is_bolted(plate)
}

/// The plate as one half of a pair of transverse stiffeners, if it is one.
fn half(scene: &Scene, case: &Case, index: usize, on_web: &[usize]) -> Option<Half> {
    let (column, plate) = (&scene.steel.members[case.column], &scene.steel.plates[index]);
    let touch = scene.tolerances().touch.get();
    let (t_f, _) = thicknesses(column);
    let across = Span::of(corners(plate).map(|p| (p - column.start).dot(column.across)))?;
    let depth = Span::of(corners(plate).map(|p| (p - column.start).dot(column.depth)))?;
    let clear = column.extents.y / 2.0 - t_f + touch;
    let inside = depth.lo >= -clear && depth.hi <= clear;
    // One that stops short of the flange with the joint does nothing for it.
    let at_joint = if case.ply.sign() > 0.0 { depth.hi } else { -depth.lo } >= clear - 2.0 * touch;
    let stands = is_transverse(scene, column, plate) && strengthening::stands_on_web(scene, column, across, on_web);
    (stands && inside && at_joint).then(|| Half {
        plate: index,
        height: case.frame.height(plate.centre),
        across,
        depth,
    })
}

fn not_a_stiffener(scene: &Scene, column: &Member, plate: &Plate) -> &'static str {
    let angle = scene.tolerances().angle;
    let offset = (plate.centre - column.start).dot(column.depth).abs();
    if are_parallel(plate.normal, column.across, angle) {
        "web plate"
    } else if are_parallel(plate.normal, column.depth, angle) {
        if offset < column.extents.y / 2.0 { "backing plate" } else { "plate on the column's flange" }
    } else if are_square(plate.normal, column.across, angle) {
        if are_parallel(plate.normal, column.along, angle) { "transverse plate" } else { "diagonal" }
    } else {
        "plate"
    }
}

fn pairs(scene: &Scene, column: &Member, mut halves: Vec<Half>) -> Vec<(Stiffener, Vec<usize>, Vec<usize>)> {
    let position = scene.tolerances().position.get();
    halves.sort_by(|a, b| {
        let key = |h: &Half| (h.height, h.depth.mid(), h.across.mid());
        let ((ah, ad, aa), (bh, bd, ba)) = (key(a), key(b));
        bh.total_cmp(&ah).then(ad.total_cmp(&bd)).then(aa.total_cmp(&ba))
    });
    let mut stiffeners = Vec::new();
    while !halves.is_empty() {
        let one = halves.remove(0);
        let partner = halves
            .iter()
            .position(|two| one.height - two.height <= position && one.across.mid() * two.across.mid() < 0.0);
        let two = partner.map(|i| halves.remove(i));
        stiffeners.push(stiffener(scene, column, &one, two.as_ref()));
    }
    stiffeners
}

fn stiffener(scene: &Scene, column: &Member, one: &Half, two: Option<&Half>) -> (Stiffener, Vec<usize>, Vec<usize>) {
    let touch = scene.tolerances().touch.get();
    let (t_f, t_w) = thicknesses(column);
    let mut halves: Vec<&Half> = [Some(one), two].into_iter().flatten().collect();
    // Which of two level halves is a hair higher is noise: they are named in the order of the file.
    halves.sort_by_key(|half| half.plate);
    let least = |of: &dyn Fn(&Half) -> f64| halves.iter().map(|half| of(half)).fold(f64::INFINITY, f64::min);
    let plate = |half: &Half| &scene.steel.plates[half.plate];
    let clear = column.extents.y / 2.0 - t_f - touch;
    let plates: Vec<usize> = halves.iter().map(|half| half.plate).collect();
    let (weld, welded) = fillets(scene, &plates, "weld of the stiffener");
    let stiffener = Stiffener {
        guids: halves.iter().map(|half| plate(half).identity.guid.clone()).collect(),
        height: mm(halves.iter().map(|half| half.height).sum::<f64>() / halves.len() as f64),
        thickness: mm(least(&|half| plate(half).thickness.get())),
        outstand: mm(least(&|half| half.across.lo.abs().max(half.across.hi.abs()) - t_w / 2.0)),
        reach: mm(least(&|half| half.depth.size())),
        both_sides: two.is_some(),
        full_depth: halves.iter().all(|half| half.depth.lo <= -clear && half.depth.hi >= clear),
        grade: common_grade(halves.iter().map(|half| plate(half)), "stiffener"),
        weld,
    };
    (stiffener, plates, welded)
}

/// The least throat at plates that do one job, and their welds, ascending.
pub(super) fn fillets(scene: &Scene, plates: &[usize], what: &str) -> (Known<Length>, Vec<usize>) {
    let at: Vec<&[usize]> = plates.iter().map(|plate| scene.welds_at(Part::Plate(*plate))).collect();
    let mut welded: Vec<usize> = at.iter().copied().flatten().copied().collect();
    welded.sort_unstable();
    welded.dedup();
    let alike = at.iter().all(|welds| welds.is_empty()) || at.iter().all(|welds| !welds.is_empty());
    let least = if alike {
        welds::least_throat(scene, &welded, what)
    } else {
        Err(Missing {
            what: what.into(),
            reason: "a weld is modelled on one side of the web only".into(),
            at: None,
            ask: Ask::Fabricator,
        })
    };
    (least, welded)
}

/// The grade that all the plates of one thing have.
pub(super) fn common_grade<'p>(mut plates: impl Iterator<Item = &'p Plate>, of: &str) -> Known<Grade> {
    let missing =
        |reason: String| Missing { what: format!("steel grade of the {of}"), reason, at: None, ask: Ask::Fabricator };
    let first = plates.next().ok_or_else(|| missing("it has no plate".into()))?.grade.clone()?;
    for plate in plates {
        let other = plate.grade.clone()?;
        if other.value != first.value {
            let mut both = [first.value.0, other.value.0];
            both.sort();
            return Err(missing(format!("its two plates differ: {}", both.join(" and "))));
        }
    }
    Ok(first)
}
