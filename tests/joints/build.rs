//! Builds steelwork by hand from parameters. Sizes are invented details on catalogue sections; all numbers mm.

use std::collections::BTreeMap;
use std::sync::Arc;

use faying::origin::{Ask, Datum, Known, Missing, Origin, Place};
use faying::rulebook::{Grade, Rulebook, Section};
use faying::shop::{Bolt, Hole, Identity, Member, Part, Piece, Plate, Shape, Steelwork, Told, Weld, WeldSort};
use faying::units::{Area, Length, Modulus, mm};
use glam::{DQuat, DVec2, DVec3};

/// h, b, t_w, t_f.
pub type Sizes = (&'static str, f64, f64, f64, f64);

/// Sizes of EN 10365 sections, from memory.
pub const COLUMN: Sizes = ("UKC 305x305x137", 320.5, 309.2, 13.8, 21.7);
/// See [`COLUMN`].
pub const BEAM: Sizes = ("UKB 406x178x60", 406.4, 177.9, 7.9, 12.8);
/// See [`COLUMN`].
pub const DEEP: Sizes = ("UKB 533x210x92", 533.1, 209.3, 10.1, 15.6);

pub fn rulebook() -> Rulebook {
    Rulebook::embedded()
}

pub fn known<T>(value: T) -> Known<T> {
    Ok(Datum::new(value, Origin::Assumed("test".into())))
}

pub fn missing<T>(what: &str) -> Known<T> {
    Err(Missing { what: what.into(), reason: "the test leaves it out".into(), at: None, ask: Ask::Fabricator })
}

/// Parts are named by their mark; the GlobalId is the mark with a hyphen in front.
pub fn identity(mark: &str) -> Identity {
    let place = Place { file: Arc::from("built"), line: 0, column: 0 };
    let guid = format!("-{mark}");
    Identity { guid, class: String::new(), name: String::new(), mark: Some(mark.into()), place }
}

pub fn section((name, h, b, t_w, t_f): Sizes) -> Section {
    Section {
        designation: name.into(),
        h: mm(h),
        b: mm(b),
        t_w: mm(t_w),
        t_f: mm(t_f),
        r: None,
        area: Area(0.0),
        w_pl_y: Modulus(0.0),
        w_el_y: Modulus(0.0),
        a_v_z: Area(0.0),
        rolled: true,
    }
}

/// An I section from `start` to `end` with its depth as near as can be to `depth`.
pub fn member(mark: &str, sizes: Sizes, start: DVec3, end: DVec3, depth: DVec3) -> Member {
    let along = (end - start).normalize();
    let depth = (depth - along * depth.dot(along)).normalize();
    Member {
        identity: identity(mark),
        start,
        end,
        along,
        across: depth.cross(along),
        depth,
        shape: Shape::I,
        extents: DVec2::new(sizes.2, sizes.1),
        section: known(section(sizes)),
        grade: known(Grade("S355".into())),
        notches: Vec::new(),
        not_assessed: None,
        disagreements: Vec::new(),
    }
}

/// A rectangle of `size` in (u, v) about `centre`.
pub fn plate(mark: &str, centre: DVec3, u: DVec3, v: DVec3, size: (f64, f64), thickness: f64) -> Plate {
    let (x, y) = (size.0 / 2.0, size.1 / 2.0);
    Plate {
        identity: identity(mark),
        centre,
        u,
        v,
        normal: u.cross(v),
        outline: vec![DVec2::new(-x, -y), DVec2::new(x, -y), DVec2::new(x, y), DVec2::new(-x, y)],
        holes: Vec::new(),
        thickness: mm(thickness),
        grade: known(Grade("S275".into())),
        disagreements: Vec::new(),
    }
}

pub fn bolt(mark: &str, start: DVec3, end: DVec3, d: f64) -> Bolt {
    Bolt {
        identity: identity(mark),
        start,
        end,
        diameter: known(mm(d)),
        thread: None,
        length: missing("bolt length"),
        class: known("8.8".into()),
        hole: None,
        slot: None,
        anchor: false,
    }
}

/// A weld as a box between two opposite corners.
pub fn weld(mark: &str, lo: DVec3, hi: DVec3, throat: f64) -> Weld {
    let points = (0..8).map(|i| {
        let pick = |bit: usize, axis: usize| if i >> bit & 1 == 0 { lo[axis] } else { hi[axis] };
        DVec3::new(pick(0, 0), pick(1, 1), pick(2, 2))
    });
    Weld {
        identity: identity(mark),
        sort: WeldSort::Fillet,
        throat: known(mm(throat)),
        length: missing("weld length"),
        points: points.collect(),
    }
}

/// A stiffener of the column.
#[derive(Clone, Copy, Debug)]
pub struct Rib {
    /// Height of its middle plane above the soffit.
    pub height: f64,
    pub thickness: f64,
    pub outstand: f64,
    /// Along the depth, from the flange with the joint.
    pub reach: f64,
    pub both_sides: bool,
    pub weld: Option<f64>,
}

/// One end-plate joint on the flange of a column that stands at the origin.
#[derive(Clone, Debug)]
pub struct Detail {
    pub beam: Sizes,
    pub beam_mark: &'static str,
    /// Height of the soffit in the world.
    pub soffit: f64,
    pub thickness: f64,
    pub width: f64,
    pub bottom: f64,
    pub top: f64,
    pub rows: Vec<f64>,
    pub gauge: f64,
    pub diameter: f64,
    /// Throats at the flanges and the web.
    pub throats: Option<(f64, f64)>,
    /// Whether beam and plate are one piece.
    pub piece: bool,
    /// Whether the beam's end (not its start) is at the column.
    pub at_end: bool,
    /// Half a turn: the joint sits on the other flange.
    pub turned: bool,
    pub ribs: Vec<Rib>,
}

impl Default for Detail {
    fn default() -> Self {
        Self {
            beam: BEAM,
            beam_mark: "B1",
            soffit: 4000.0,
            thickness: 15.0,
            width: 200.0,
            bottom: -15.0,
            top: 486.4,
            rows: vec![450.4, 345.0, 265.0, 73.0],
            gauge: 90.0,
            diameter: 20.0,
            throats: Some((7.0, 4.0)),
            piece: true,
            at_end: false,
            turned: false,
            ribs: Vec::new(),
        }
    }
}

/// A column 8 m high at the origin with these joints.
pub fn frame(details: &[Detail]) -> Steelwork {
    let mut steel = Steelwork::default();
    steel.members.push(member("C1", COLUMN, DVec3::ZERO, DVec3::Z * 8000.0, DVec3::X));
    for detail in details {
        add(&mut steel, 0, detail);
    }
    steel
}

/// Adds a joint on a column of the size of [`COLUMN`] that stands upright with its depth along x.
pub fn add(steel: &mut Steelwork, column: usize, detail: &Detail) {
    let base = steel.members[column].start;
    let mut own = Steelwork::default();
    let (h_c, h) = (COLUMN.1, detail.beam.1);
    let face = h_c / 2.0 + detail.thickness;
    let name = detail.beam_mark;
    let point = |out: f64, across: f64, height: f64| DVec3::new(h_c / 2.0 + out, across, detail.soffit + height);

    let (near, far) =
        (DVec3::new(face, 0.0, detail.soffit + h / 2.0), DVec3::new(6000.0, 0.0, detail.soffit + h / 2.0));
    let (start, end) = if detail.at_end { (far, near) } else { (near, far) };
    own.members.push(member(name, detail.beam, start, end, DVec3::Z));
    let middle = point(detail.thickness / 2.0, 0.0, (detail.bottom + detail.top) / 2.0);
    let size = (detail.width, detail.top - detail.bottom);
    own.plates.push(plate(&format!("{name}-P"), middle, DVec3::Y, DVec3::Z, size, detail.thickness));
    for (i, row) in detail.rows.iter().enumerate() {
        for (j, side) in [-0.5, 0.5].into_iter().enumerate() {
            let at = |out| point(out, side * detail.gauge, *row);
            own.bolts.push(bolt(&format!("{name}-N{i}{j}"), at(-COLUMN.4), at(detail.thickness), detail.diameter));
        }
    }
    if let Some((a_f, a_w)) = detail.throats {
        // As fillets are drawn: a box of twice the throat about the flange's outer face or the web.
        let out = detail.thickness;
        let flange =
            |at: f64| (point(out, -detail.beam.2 / 2.0, at - a_f), point(out + a_f, detail.beam.2 / 2.0, at + a_f));
        for (role, at) in [("top", h), ("bottom", 0.0)] {
            let (lo, hi) = flange(at);
            own.welds.push(weld(&format!("{name}-W-{role}"), lo, hi, a_f));
        }
        let t_f = detail.beam.4;
        own.welds.push(weld(&format!("{name}-W-web"), point(out, -a_w, t_f), point(out + a_w, a_w, h - t_f), a_w));
    }
    for (i, rib) in detail.ribs.iter().enumerate() {
        let (t_f, t_w) = (COLUMN.4, COLUMN.3);
        for side in if rib.both_sides { &[-1.0, 1.0][..] } else { &[1.0] } {
            let middle = point(-t_f - rib.reach / 2.0, side * (t_w + rib.outstand) / 2.0, rib.height);
            let mark = format!("{name}-S{i}{}", if *side < 0.0 { "a" } else { "b" });
            own.plates.push(plate(&mark, middle, DVec3::X, DVec3::Y, (rib.reach, rib.outstand), rib.thickness));
            if let Some(a) = rib.weld {
                let at = middle - DVec3::Y * side * rib.outstand / 2.0;
                let half = DVec3::new(rib.reach / 2.0 - 30.0, a, rib.thickness / 2.0 + a);
                own.welds.push(weld(&format!("{mark}-W"), at - half, at + half, a));
            }
        }
    }
    let turn = if detail.turned { DQuat::from_rotation_z(std::f64::consts::PI) } else { DQuat::IDENTITY };
    move_all(&mut own, |p| base + turn * p, |d| turn * d);
    let (m, p) = (steel.members.len(), steel.plates.len());
    steel.members.append(&mut own.members);
    steel.plates.append(&mut own.plates);
    steel.bolts.append(&mut own.bolts);
    steel.welds.append(&mut own.welds);
    if detail.piece {
        let parts = vec![Part::Member(m), Part::Plate(p)];
        steel.pieces.push(Piece { identity: identity(&format!("A-{name}")), parts });
    }
}

/// Two beams whose end plates are bolted to each other at the origin: `one` runs towards +x, `two` towards -x. The rows
/// are those of `one`.
pub fn spliced(one: &Detail, two: &Detail) -> Steelwork {
    let mut steel = Steelwork::default();
    for (detail, turned) in [(one, false), (two, true)] {
        let mut own = frame(&[Detail { turned, rows: one.rows.clone(), ..detail.clone() }]);
        let by = DVec3::X * COLUMN.1 / 2.0 * if turned { 1.0 } else { -1.0 };
        move_all(&mut own, |p| p + by, |d| d);
        let (m, p) = (steel.members.len(), steel.plates.len());
        steel.members.extend(own.members.drain(1..));
        steel.plates.append(&mut own.plates);
        steel.welds.append(&mut own.welds);
        if !turned {
            own.bolts.iter_mut().for_each(|b| b.start.x = -two.thickness);
            steel.bolts.append(&mut own.bolts);
        }
        if detail.piece {
            let parts = vec![Part::Member(m), Part::Plate(p)];
            steel.pieces.push(Piece { identity: identity(&format!("A-{}", detail.beam_mark)), parts });
        }
    }
    steel
}

/// A haunch welded from plates below the beam of a joint on the flange of a column at the origin.
#[derive(Clone, Copy, Debug)]
pub struct Haunched {
    /// From the soffit to the underside of its flange.
    pub depth: f64,
    pub length: f64,
    pub flange: f64,
    pub width: f64,
    pub web: f64,
    pub throat: Option<f64>,
}

/// See [`Haunched`].
pub const HAUNCH: Haunched =
    Haunched { depth: 300.0, length: 700.0, flange: 15.0, width: 180.0, web: 10.0, throat: Some(6.0) };

/// Adds the plates H-F and H-W to the first joint of [`frame`], whose plate must reach below them.
pub fn add_haunch(steel: &mut Steelwork, detail: &Detail, haunch: Haunched) {
    let face = COLUMN.1 / 2.0 + detail.thickness;
    let point = |out: f64, up: f64| DVec3::new(face + out, 0.0, detail.soffit + up);
    // The flange's middle plane from the end plate up to the soffit.
    let angle = (haunch.depth / haunch.length).atan();
    let half = haunch.flange / 2.0 / angle.cos();
    let (foot, tip) = (point(0.0, -haunch.depth + half), point(haunch.length, half));
    let along = (tip - foot).normalize();
    let size = ((tip - foot).length(), haunch.width);
    let mut flange = plate("H-F", (foot + tip) / 2.0, along, DVec3::Y, size, haunch.flange);
    flange.grade = known(Grade("S355".into()));
    let mut web = plate("H-W", point(0.0, 0.0), DVec3::X, DVec3::Z, (2.0, 2.0), haunch.web);
    web.outline = vec![DVec2::ZERO, DVec2::new(0.0, -haunch.depth + 2.0 * half), DVec2::new(haunch.length, 0.0)];
    web.grade = known(Grade("S355".into()));
    steel.plates.extend([flange, web]);
    if let Some(a) = haunch.throat {
        let lo = foot + DVec3::new(0.0, -haunch.width / 2.0, half);
        steel.welds.push(weld("H-F-W", lo, lo + DVec3::new(a, haunch.width, a), a));
        let lo = point(0.0, -haunch.depth + 4.0 * half) - DVec3::Y * (haunch.web / 2.0 + a);
        steel.welds.push(weld("H-W-W", lo, point(a, -40.0) + DVec3::Y * (haunch.web / 2.0 + a), a));
    }
}

/// The same haunch cut from an I section that is no smaller than the beam: its flange below, its web as far as the soffit;
/// its upper flange, which lies within the beam, is cut away.
pub fn add_cut_haunch(steel: &mut Steelwork, detail: &Detail, sizes: Sizes, (depth, length): (f64, f64), throat: f64) {
    let face = COLUMN.1 / 2.0 + detail.thickness;
    let point = |out: f64, up: f64| DVec3::new(face + out, 0.0, detail.soffit + up);
    let up = DVec3::new(-depth, 0.0, length).normalize();
    // As the exchange tells a mitred member: from its furthest corner to its furthest corner.
    let (underside, tip) = (point(0.0, -depth), point(length, 0.0));
    let haunch = member("H1", sizes, underside + up * sizes.1 / 2.0, tip + up * sizes.1 / 2.0, DVec3::Z);
    steel.pieces[0].parts.push(Part::Member(steel.members.len()));
    steel.members.push(haunch);
    let lo = point(0.0, -depth + sizes.4) - DVec3::Y * sizes.2 / 2.0;
    steel.welds.push(weld("H-F-W", lo, lo + DVec3::new(throat, sizes.2, throat), throat));
    let lo = point(0.0, -depth + 2.0 * sizes.4) - DVec3::Y * (sizes.3 / 2.0 + throat);
    steel.welds.push(weld("H-W-W", lo, point(throat, -40.0) + DVec3::Y * (sizes.3 / 2.0 + throat), throat));
}

pub fn hole(x: f64, y: f64, diameter: f64, length: f64) -> Hole {
    Hole { centre: DVec2::new(x, y), diameter, length }
}

pub fn told(name: &str, between: &[Part], by: &[Part]) -> Told {
    let place = identity("").place;
    Told {
        name: Some(name.into()).filter(|n: &String| !n.is_empty()),
        between: between.to_vec(),
        by: by.to_vec(),
        place,
    }
}

/// Moves every point and turns every direction.
pub fn move_all(steel: &mut Steelwork, point: impl Fn(DVec3) -> DVec3, direction: impl Fn(DVec3) -> DVec3) {
    for m in &mut steel.members {
        (m.start, m.end) = (point(m.start), point(m.end));
        (m.along, m.across, m.depth) = (direction(m.along), direction(m.across), direction(m.depth));
    }
    for p in &mut steel.plates {
        p.centre = point(p.centre);
        (p.u, p.v, p.normal) = (direction(p.u), direction(p.v), direction(p.normal));
    }
    for b in &mut steel.bolts {
        (b.start, b.end) = (point(b.start), point(b.end));
    }
    for w in &mut steel.welds {
        w.points.iter_mut().for_each(|p| *p = point(*p));
    }
}

/// The building turned about the vertical, in degrees, then moved.
pub fn moved(mut steel: Steelwork, degrees: f64, by: DVec3) -> Steelwork {
    let turn = DQuat::from_rotation_z(degrees.to_radians());
    move_all(&mut steel, |p| turn * p + by, |d| turn * d);
    steel
}

/// The building in a mirror, its parts' own axes right-handed again.
pub fn mirrored(mut steel: Steelwork) -> Steelwork {
    let flip = |p: DVec3| DVec3::new(p.x, -p.y, p.z);
    move_all(&mut steel, flip, flip);
    for m in &mut steel.members {
        m.across = m.depth.cross(m.along);
    }
    for p in &mut steel.plates {
        p.normal = -p.normal;
        std::mem::swap(&mut p.u, &mut p.v);
        p.normal = p.u.cross(p.v);
        p.outline = p.outline.iter().rev().map(|q| DVec2::new(q.y, q.x)).collect();
        p.holes.iter_mut().for_each(|hole| hole.centre = DVec2::new(hole.centre.y, hole.centre.x));
    }
    steel
}

/// The same parts in another order: each list is sorted by `rank` of its index.
pub fn shuffled(steel: Steelwork, rank: impl Fn(usize) -> u64) -> Steelwork {
    fn reorder<T>(list: Vec<T>, rank: &impl Fn(usize) -> u64) -> (Vec<T>, Vec<usize>) {
        let mut items: Vec<(usize, T)> = list.into_iter().enumerate().collect();
        items.sort_by_key(|(i, _)| rank(*i));
        let moved: BTreeMap<usize, usize> = items.iter().enumerate().map(|(new, (old, _))| (*old, new)).collect();
        (items.into_iter().map(|(_, item)| item).collect(), moved.into_values().collect())
    }
    let (members, m) = reorder(steel.members, &rank);
    let (plates, p) = reorder(steel.plates, &rank);
    let (bolts, b) = reorder(steel.bolts, &rank);
    let (welds, w) = reorder(steel.welds, &rank);
    let new = |part: &Part| match *part {
        Part::Member(i) => Part::Member(m[i]),
        Part::Plate(i) => Part::Plate(p[i]),
        Part::Bolt(i) => Part::Bolt(b[i]),
        Part::Weld(i) => Part::Weld(w[i]),
    };
    let (mut pieces, _) = reorder(steel.pieces, &rank);
    let (mut told, _) = reorder(steel.told, &rank);
    for piece in &mut pieces {
        piece.parts = piece.parts.iter().map(new).rev().collect();
    }
    for told in &mut told {
        told.between = told.between.iter().map(new).rev().collect();
        told.by = told.by.iter().map(new).rev().collect();
    }
    Steelwork { members, plates, bolts, welds, pieces, told, ..steel }
}

pub fn length(known: &Known<Length>) -> Option<f64> {
    known.as_ref().ok().map(|datum| datum.value.get())
}
