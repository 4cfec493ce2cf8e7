//! What strengthens a column at an end-plate joint besides transverse stiffeners: plates on its web, diagonals, backing
//! plates behind its flange. Whether the rules let them count is not decided here.

use super::boxes::thicknesses;
use super::end_plate::{Case, is_rectangular};
use super::frame::{Span, are_parallel, are_square, corners};
use super::layout::{Backing, Diagonal, EdgeWeld, Strengthening, WebPlate};
use super::scene::Scene;
use super::stiffeners::{common_grade, fillets};
use super::welds;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::shop::{Member, Part, Plate, WeldSort};
use crate::units::{Length, mm};

/// A long edge counts as welded if welds lie along this share of it.
const ALONG: f64 = 0.9;

/// Strengthening parts as laid out, and which plates and welds they are.
#[derive(Default)]
pub(super) struct Found {
    pub(super) layout: Strengthening,
    /// Plates with their roles.
    pub(super) plates: Vec<(usize, &'static str)>,
    /// Their welds, ascending.
    pub(super) welds: Vec<usize>,
}

/// A plate in the column's own axes: across from the web's middle, along the depth towards the joint's flange, and up.
struct At {
    plate: usize,
    across: Span,
    depth: Span,
    height: Span,
}

fn at(scene: &Scene, case: &Case, plate: usize) -> Option<At> {
    let (column, own) = (&scene.steel.members[case.column], &scene.steel.plates[plate]);
    let sign = case.ply.sign();
    Some(At {
        plate,
        across: Span::of(corners(own).map(|p| (p - column.start).dot(column.across)))?,
        depth: Span::of(corners(own).map(|p| sign * (p - column.start).dot(column.depth)))?,
        height: Span::of(corners(own).map(|p| case.frame.height(p)))?,
    })
}

/// Plates that lie flat on the column's web, whatever they do there.
pub(super) fn plates_on_web(scene: &Scene, case: &Case) -> Vec<usize> {
    let column = &scene.steel.members[case.column];
    let (angle, touch) = (scene.tolerances().angle, scene.tolerances().touch.get());
    let (t_f, t_w) = thicknesses(column);
    let plates = scene.touches.plates_of[case.column].iter().copied();
    let flat = plates.filter(|index| {
        let plate = &scene.steel.plates[*index];
        let off = (plate.centre - column.start).dot(column.across).abs();
        let clear = column.extents.y / 2.0 - t_f + touch;
        are_parallel(plate.normal, column.across, angle)
            && (off - (t_w + plate.thickness.get()) / 2.0).abs() <= touch
            && at(scene, case, *index).is_some_and(|at| at.depth.lo >= -clear && at.depth.hi <= clear)
    });
    flat.collect()
}

/// Whether a plate that is square to the web stands on it, or on a plate that lies on it.
pub(super) fn stands_on_web(scene: &Scene, column: &Member, across: Span, on_web: &[usize]) -> bool {
    let touch = scene.tolerances().touch.get();
    let (_, t_w) = thicknesses(column);
    let middles = on_web.iter().map(|index| &scene.steel.plates[*index]);
    let faces = middles.map(|plate| {
        let middle = (plate.centre - column.start).dot(column.across);
        middle + plate.thickness.get() / 2.0 * middle.signum()
    });
    faces.chain([-t_w / 2.0, t_w / 2.0]).any(|face| {
        let inner = if face > 0.0 { across.lo } else { across.hi };
        (inner - face).abs() <= touch
    })
}

/// Sorts out those of the column's plates that are no transverse stiffeners.
pub(super) fn find(scene: &Scene, case: &Case, plates: &[usize], on_web: &[usize], bolted: &[usize]) -> Found {
    let mut found = Found::default();
    let own = || plates.iter().filter_map(|plate| at(scene, case, *plate));
    for plate in own().filter(|at| on_web.contains(&at.plate) && !bolted.contains(&at.plate)) {
        if let Some(laid) = web_plate(scene, case, &plate) {
            found.layout.web_plates.push(laid);
            found.plates.push((plate.plate, "web-plate"));
            found.welds.extend(scene.welds_at(Part::Plate(plate.plate)));
        }
    }
    let key = |plate: &WebPlate| (plate.bottom.get(), plate.positive);
    found.layout.web_plates.sort_by(|a, b| key(a).0.total_cmp(&key(b).0).then(key(a).1.cmp(&key(b).1)));

    let halves = own().filter(|at| !bolted.contains(&at.plate)).filter_map(|at| half(scene, case, at, on_web));
    for pair in pairs(halves.collect(), |a, b| {
        let near = |a: f64, b: f64| (a - b).abs() <= scene.tolerances().position.get();
        near(a.near, b.near) && near(a.far, b.far) && a.at.across.mid() * b.at.across.mid() < 0.0
    }) {
        let plates: Vec<usize> = pair.iter().map(|half| half.at.plate).collect();
        let (weld, welded) = fillets(scene, &plates, "weld of the diagonal");
        found.layout.diagonals.push(diagonal(scene, case, &pair, weld));
        found.plates.extend(plates.iter().map(|plate| (*plate, "diagonal")));
        found.welds.extend(welded);
    }
    let height = |d: &Diagonal| d.near.max(d.far).get();
    found.layout.diagonals.sort_by(|a, b| height(b).total_cmp(&height(a)).then(b.near.get().total_cmp(&a.near.get())));

    let behind = own().filter(|at| bolted.contains(&at.plate) && is_behind_flange(scene, case, at));
    for pair in pairs(behind.collect(), |a, b| {
        let shared = a.height.hi.min(b.height.hi) - a.height.lo.max(b.height.lo);
        shared > 0.5 * a.height.size().max(b.height.size()) && a.across.mid() * b.across.mid() < 0.0
    }) {
        found.plates.extend(pair.iter().map(|at| (at.plate, "backing-plate")));
        found.layout.backing.push(backing(scene, case, &pair));
    }
    found.layout.backing.sort_by(|a, b| b.top.get().total_cmp(&a.top.get()));
    found.welds.sort_unstable();
    found.welds.dedup();
    found
}

/// Puts together what belongs together, in the order of the file; what finds no partner stands alone.
fn pairs<T>(items: Vec<T>, partners: impl Fn(&T, &T) -> bool) -> Vec<Vec<T>> {
    let mut groups: Vec<Vec<T>> = Vec::new();
    for item in items {
        let open = groups.iter_mut().find(|group| group.len() == 1 && group.iter().all(|one| partners(one, &item)));
        match open {
            Some(group) => group.push(item),
            None => groups.push(vec![item]),
        }
    }
    groups
}

fn web_plate(scene: &Scene, case: &Case, at: &At) -> Option<WebPlate> {
    let plate = &scene.steel.plates[at.plate];
    let outline = case.frame.height_outline(plate, &scene.steel.members[case.column]);
    is_rectangular(&outline, scene.tolerances().position.get()).then(|| WebPlate {
        guid: plate.identity.guid.clone(),
        positive: at.across.mid() > 0.0,
        thickness: plate.thickness,
        width: mm(at.depth.size()),
        half_width: mm(at.depth.hi.min(-at.depth.lo)),
        bottom: mm(at.height.lo),
        top: mm(at.height.hi),
        grade: plate.grade.clone(),
        weld: long_edges(scene, case, at),
    })
}

/// The welds along both long edges of a web plate: fillets of the least throat, or butt welds.
fn long_edges(scene: &Scene, case: &Case, at: &At) -> Known<EdgeWeld> {
    const WHAT: &str = "weld of the web plate";
    let missing = |reason: String| Missing { what: WHAT.into(), reason, at: None, ask: Ask::Fabricator };
    let column = &scene.steel.members[case.column];
    let (touch, long) = (scene.tolerances().touch.get(), at.height.size());
    // A stiffener's weld on the plate does not hold the plate.
    let own = |weld: &usize| {
        let other = |part: &Part| matches!(part, Part::Plate(plate) if *plate != at.plate);
        !scene.touches.welded[*weld].iter().any(other)
    };
    let welds: Vec<usize> = scene.welds_at(Part::Plate(at.plate)).iter().copied().filter(own).collect();
    if welds.is_empty() {
        return Err(missing("no weld is modelled there".into()));
    }
    let mut along = Vec::new();
    for edge in [at.depth.lo, at.depth.hi] {
        let mut covered = 0.0;
        for weld in &welds {
            let points = &scene.steel.welds[*weld].points;
            let throat = scene.steel.welds[*weld].throat.as_ref().map_or(0.0, |a| a.value.get().clamp(0.0, 50.0));
            let depth = Span::of(points.iter().map(|p| case.ply.sign() * (*p - column.start).dot(column.depth)));
            let height = Span::of(points.iter().map(|p| case.frame.height(*p)));
            let Some((depth, height)) = depth.zip(height) else { continue };
            let reach = touch + 2.0 * throat;
            let run = height.hi.min(at.height.hi) - height.lo.max(at.height.lo);
            // A weld at an end of the plate runs across and is no longer than it is wide.
            if depth.lo - reach <= edge && edge <= depth.hi + reach && height.size() > 4.0 * throat.max(touch) {
                covered += run.max(0.0);
                along.push(*weld);
            }
        }
        if !(covered >= ALONG * long) {
            return Err(missing(format!("{covered:.0} mm of a long edge of {long:.0} mm are welded")));
        }
    }
    along.sort_unstable();
    along.dedup();
    let t_s = scene.steel.plates[at.plate].thickness;
    // A butt weld whose depth is not that of the plate is not known to go through.
    let through = |weld: &usize| {
        let weld = &scene.steel.welds[*weld];
        let deep = || weld.throat.as_ref().is_ok_and(|a| a.value >= t_s - scene.tolerances().size);
        weld.sort == WeldSort::FullButt || weld.sort == WeldSort::Butt && deep()
    };
    if along.iter().all(through) {
        let first = along.first().map(|weld| scene.place(Part::Weld(*weld)));
        return Ok(Datum::new(EdgeWeld::Butt, Origin::Modelled { by: "butt welds along its edges".into(), at: first }));
    }
    let throat = welds::least_throat(scene, &along, WHAT)?;
    Ok(Datum::new(EdgeWeld::Fillet(throat.value), throat.origin))
}

/// One plate of a diagonal: the heights at which its middle plane meets the column's flanges.
struct HalfDiagonal {
    at: At,
    near: f64,
    far: f64,
    full_depth: bool,
}

fn half(scene: &Scene, case: &Case, at: At, on_web: &[usize]) -> Option<HalfDiagonal> {
    let (column, plate) = (&scene.steel.members[case.column], &scene.steel.plates[at.plate]);
    let (angle, touch) = (scene.tolerances().angle, scene.tolerances().touch.get());
    let (t_f, _) = thicknesses(column);
    let level = are_parallel(plate.normal, column.along, angle) || are_parallel(plate.normal, column.depth, angle);
    if level || !are_square(plate.normal, column.across, angle) || !stands_on_web(scene, column, at.across, on_web) {
        return None;
    }
    let run = column.across.cross(plate.normal);
    let slope = run.dot(case.frame.up) / (case.ply.sign() * run.dot(column.depth));
    let clear = column.extents.y / 2.0 - t_f;
    let middle = case.ply.sign() * (plate.centre - column.start).dot(column.depth);
    let meets = |depth: f64| case.frame.height(plate.centre) + slope * (depth - middle);
    // An end that is cut square reaches the flange with its edge only.
    let square_cut = touch + 0.5 * plate.thickness.get() * slope.abs();
    let ends = [clear - at.depth.hi, clear + at.depth.lo];
    slope.is_finite().then_some(HalfDiagonal {
        near: meets(clear),
        far: meets(-clear),
        full_depth: ends.iter().all(|short| *short >= -touch && *short <= square_cut),
        at,
    })
}

fn diagonal(scene: &Scene, case: &Case, pair: &[HalfDiagonal], weld: Known<Length>) -> Diagonal {
    let (_, t_w) = thicknesses(&scene.steel.members[case.column]);
    let plates = || pair.iter().map(|half| &scene.steel.plates[half.at.plate]);
    let mean = |of: fn(&HalfDiagonal) -> f64| mm(pair.iter().map(of).sum::<f64>() / pair.len() as f64);
    let outstand = |half: &HalfDiagonal| half.at.across.lo.abs().max(half.at.across.hi.abs()) - t_w / 2.0;
    Diagonal {
        guids: guids(plates()),
        near: mean(|half| half.near),
        far: mean(|half| half.far),
        thickness: mm(least(plates().map(|plate| plate.thickness.get()))),
        outstand: mm(least(pair.iter().map(outstand))),
        both_sides: pair.len() == 2,
        full_depth: pair.iter().all(|half| half.full_depth),
        grade: common_grade(plates(), "diagonal"),
        weld,
    }
}

/// Whether a plate lies against the inner face of the flange with the joint.
fn is_behind_flange(scene: &Scene, case: &Case, at: &At) -> bool {
    let (column, plate) = (&scene.steel.members[case.column], &scene.steel.plates[at.plate]);
    let (t_f, _) = thicknesses(column);
    let face = column.extents.y / 2.0 - t_f;
    are_parallel(plate.normal, column.depth, scene.tolerances().angle)
        && (at.depth.mid() + plate.thickness.get() / 2.0 - face).abs() <= scene.tolerances().touch.get()
        && at.across.lo * at.across.hi > 0.0
}

fn backing(scene: &Scene, case: &Case, pair: &[At]) -> Backing {
    let column = &scene.steel.members[case.column];
    let (_, t_w) = thicknesses(column);
    let plates = || pair.iter().map(|at| &scene.steel.plates[at.plate]);
    let (inner, outer) =
        (|at: &At| at.across.lo.abs().min(at.across.hi.abs()), |at: &At| at.across.lo.abs().max(at.across.hi.abs()));
    let most = |of: &dyn Fn(&At) -> f64| mm(pair.iter().map(of).fold(f64::NEG_INFINITY, f64::max));
    Backing {
        guids: guids(plates()),
        thickness: mm(least(plates().map(|plate| plate.thickness.get()))),
        bottom: most(&|at| at.height.lo),
        top: mm(least(pair.iter().map(|at| at.height.hi))),
        from_web: most(&|at| inner(at) - t_w / 2.0),
        short_of_edge: most(&|at| column.extents.x / 2.0 - outer(at)),
        both_sides: pair.len() == 2,
        grade: common_grade(plates(), "backing plates"),
    }
}

fn guids<'p>(plates: impl Iterator<Item = &'p Plate>) -> Vec<String> {
    plates.map(|plate| plate.identity.guid.clone()).collect()
}

fn least(values: impl Iterator<Item = f64>) -> f64 {
    values.fold(f64::INFINITY, f64::min)
}
