//! Plates that are welded on besides end plates and full-depth stiffeners, drawn from a few sizes.

use glam::DVec3;

use super::building::{BoltBody, Bolting, ClassIn, Column, Detail, Fitting, Owner, Section};
use super::fastening::{Seam, beam_seams};
use super::hardware;
use super::space::{Face, Frame, depth_of};

/// Across a plate that stands on another part, from `from` to `to`.
fn seam(from: DVec3, to: DVec3, into: DVec3, across: DVec3, thickness: f64) -> Seam {
    Seam { from, to, into, across, half: thickness / 2.0 }
}

/// A rectangle from `[x0, y0]` to `[x1, y1]`.
fn rectangle([x0, y0]: [f64; 2], [x1, y1]: [f64; 2]) -> Vec<[f64; 2]> {
    vec![[x0, y0], [x1, y0], [x1, y1], [x0, y1]]
}

/// The end plate of a beam's end that is bolted to another plate, with its welds. The face lies between the plates.
pub fn end_plate(on: usize, mark: &str, section: &Section, face: Face, detail: &Detail) -> Fitting {
    let (plate, bolts) = (&detail.plate, &detail.bolts);
    let hole = hardware::size(bolts.diameter).hole;
    let places = bolts.rows.iter().flat_map(|row| [-0.5, 0.5].map(|side| [side * bolts.gauge, row - plate.bottom]));
    let welds = detail.welds.iter().flat_map(|welds| beam_seams(section, face, plate, welds));
    Fitting {
        on: Owner::Beam(on),
        mark: mark.into(),
        name: "END PLATE",
        frame: Frame { origin: face.soffit + DVec3::Z * plate.bottom, z: face.out, x: DVec3::Z.cross(face.out) },
        corners: rectangle([-plate.width / 2.0, 0.0], [plate.width / 2.0, plate.top - plate.bottom]),
        holes: places.map(|place| (place, hole)).collect(),
        thickness: plate.thickness,
        grade: plate.grade.clone(),
        seams: welds.map(|(_, seam, throat)| (seam, throat)).collect(),
    }
}

/// A haunch welded from two plates.
#[derive(Clone, Debug)]
pub struct Haunch {
    /// From the beam's soffit down to the flange's lower edge at the end plate.
    pub depth: f64,
    /// From the end plate to the middle of the flange's far end.
    pub length: f64,
    /// Thickness and width of the flange.
    pub flange: [f64; 2],
    /// Thickness of the web.
    pub web: f64,
    /// Grade as written.
    pub grade: String,
    /// Throat of its fillets.
    pub throat: f64,
}

/// The plates of a haunch below a beam, behind an end plate of that thickness.
pub fn haunch(on: usize, mark: &str, face: Face, plate: f64, haunch: &Haunch) -> Vec<Fitting> {
    let Haunch { depth, length, flange: [t, b], web, grade, throat } = haunch;
    let (out, across) = (face.out, DVec3::Z.cross(face.out));
    let behind = face.soffit + out * plate;
    // The flange's upper face rises from the end plate to the soffit; its square end reaches t/2 sin θ further on average.
    let (mut run, mut rise) = (*length, *depth);
    for _ in 0..50 {
        let slope = rise.hypot(run);
        (run, rise) = (length - t / 2.0 * rise / slope, depth - t * slope / run);
    }
    let slope = rise.hypot(run);
    let (sine, cosine) = (rise / slope, run / slope);
    let start = behind - DVec3::Z * rise;
    let end = behind + out * run;
    let up = out * cosine + DVec3::Z * sine;
    let aside = across * (b / 2.0);
    let flange = Fitting {
        on: Owner::Beam(on),
        mark: format!("{mark}-F"),
        name: "HAUNCH FLANGE",
        frame: Frame { origin: start, z: out * sine - DVec3::Z * cosine, x: across },
        corners: rectangle([-b / 2.0, 0.0], [b / 2.0, slope]),
        holes: Vec::new(),
        thickness: *t,
        grade: grade.clone(),
        seams: vec![
            (seam(start - aside, start + aside, out, DVec3::Z, *t), *throat),
            (seam(end - aside, end + aside, -up, DVec3::Z, *t), *throat),
        ],
    };
    let plate = Fitting {
        on: Owner::Beam(on),
        mark: format!("{mark}-W"),
        name: "HAUNCH WEB",
        frame: Frame { origin: behind + across * (web / 2.0), z: out.cross(DVec3::Z), x: out },
        corners: vec![[0.0, -rise], [run, 0.0], [0.0, 0.0]],
        holes: Vec::new(),
        thickness: *web,
        grade: grade.clone(),
        seams: vec![
            (seam(start + DVec3::Z * 20.0, behind - DVec3::Z * 20.0, out, across, *web), *throat),
            (seam(behind + out * 30.0, end, -DVec3::Z, across, *web), *throat),
            (seam(start + up * 30.0, end, across.cross(up), across, *web), *throat),
        ],
    };
    vec![flange, plate]
}

/// A pair of stiffeners in a beam's web, its middle so far from a face.
pub fn beam_stiffeners(on: usize, mark: &str, section: &Section, face: Face, from: f64, of: &Plain) -> Vec<Fitting> {
    let Section { h, b, t_w, t_f, r, .. } = *section;
    let (out, across) = (face.out, DVec3::Z.cross(face.out));
    let cut = ((r + 3.0) / 5.0).ceil() * 5.0;
    let outer = t_w / 2.0 + ((b - t_w) / 10.0).floor() * 5.0;
    let middle = face.soffit + out * from;
    let one = |(side, hand): (f64, char)| {
        let inner = t_w / 2.0;
        let (low, high) = (t_f, h - t_f);
        // x away from the web, y up: z points along the beam on one side, against it on the other.
        let x = across * side;
        let z = x.cross(DVec3::Z);
        let corners = vec![
            [inner, low + cut],
            [inner + cut, low],
            [outer, low],
            [outer, high],
            [inner + cut, high],
            [inner, high - cut],
        ];
        let at = |x_: f64, y: f64| middle + x * x_ + DVec3::Z * y;
        let seams = [
            seam(at(inner, low + cut), at(inner, high - cut), x, out, of.thickness),
            seam(at(inner + cut, low), at(outer, low), DVec3::Z, out, of.thickness),
            seam(at(inner + cut, high), at(outer, high), -DVec3::Z, out, of.thickness),
        ];
        Fitting {
            on: Owner::Beam(on),
            mark: format!("{mark}{hand}"),
            name: "STIFFENER",
            frame: Frame { origin: middle - z * (of.thickness / 2.0), z, x },
            corners,
            holes: Vec::new(),
            thickness: of.thickness,
            grade: of.grade.clone(),
            seams: seams.map(|seam| (seam, of.throat)).to_vec(),
        }
    };
    [(1.0, 'L'), (-1.0, 'R')].map(one).to_vec()
}

/// What plates have in common whatever they do.
#[derive(Clone, Debug)]
pub struct Plain {
    /// Thickness.
    pub thickness: f64,
    /// Grade as written.
    pub grade: String,
    /// Throat of its fillets.
    pub throat: f64,
}

/// A plate flat on a column's web: `side` 1 or −1, between two levels, so wide; fillets along all edges.
pub fn web_plate(
    (on, column): (usize, &Column),
    mark: &str,
    side: f64,
    [bottom, top]: [f64; 2],
    width: f64,
    of: &Plain,
) -> Fitting {
    let depth = depth_of(column);
    let z = depth.cross(DVec3::Z) * side;
    let x = DVec3::Z.cross(z);
    let origin = DVec3::new(column.at[0], column.at[1], bottom) + z * (column.section.t_w / 2.0);
    let (half, height) = (width / 2.0, top - bottom);
    let at = |x_: f64, y: f64| origin + x * x_ + DVec3::Z * y;
    let edges = [
        seam(at(-half, 0.0), at(-half, height), x, z, of.thickness),
        seam(at(half, 0.0), at(half, height), -x, z, of.thickness),
        seam(at(-half, 0.0), at(half, 0.0), DVec3::Z, z, of.thickness),
        seam(at(-half, height), at(half, height), -DVec3::Z, z, of.thickness),
    ];
    Fitting {
        on: Owner::Column(on),
        mark: mark.into(),
        name: "WEB PLATE",
        frame: Frame { origin, z, x },
        corners: rectangle([-half, 0.0], [half, height]),
        holes: Vec::new(),
        thickness: of.thickness,
        grade: of.grade.clone(),
        seams: edges.map(|seam| (seam, of.throat)).to_vec(),
    }
}

/// A plate that stands on a column's web on one side of it: its middle plane meets the inner face of the flange towards
/// `out` at level `near` and ends `reach` further, on a line towards the level `far` at the other flange's inner face.
#[derive(Clone, Copy, Debug)]
pub struct Standing {
    /// Level at the flange with the joint.
    pub near: f64,
    /// Level at the other flange.
    pub far: f64,
    /// How far it reaches along the column's depth; `None`: to the other flange.
    pub reach: Option<f64>,
    /// 1 or −1: left or right of `out`.
    pub side: f64,
}

/// A stiffener in a column, square to the flanges or slanting, with its welds; corners cut free of the root radius.
pub fn column_plate((on, column): (usize, &Column), mark: &str, out: DVec3, at: Standing, of: &Plain) -> Fitting {
    let Section { h, b, t_w, t_f, r, .. } = column.section;
    let away = DVec3::Z.cross(out) * at.side;
    let clear = h - 2.0 * t_f;
    // Along the plate, from the flange with the joint to the other one.
    let along = (-out * clear + DVec3::Z * (at.far - at.near)).normalize();
    let square = away.cross(along);
    let lean = along.dot(-out);
    // Ends cut square touch with one edge.
    let short = of.thickness / 2.0 * along.z.abs() / lean;
    let length = match at.reach {
        Some(reach) => reach / lean - short,
        None => clear / lean - 2.0 * short,
    };
    let axis = DVec3::new(column.at[0], column.at[1], at.near);
    let start = axis + out * (clear / 2.0) + along * short;
    let cut = ((r + 3.0) / 5.0).ceil() * 5.0;
    let inner = t_w / 2.0;
    let outer = inner + ((b - t_w) / 10.0).floor() * 5.0;
    let mut corners = vec![[0.0, inner + cut], [cut, inner]];
    let far_cut = if at.reach.is_some() { 0.0 } else { cut };
    corners.extend([[length - far_cut, inner], [length, inner + far_cut], [length, outer], [0.0, outer]]);
    if far_cut == 0.0 {
        corners.remove(3);
    }
    let place = |x: f64, y: f64| start + along * x + away * y;
    let mut seams = vec![
        seam(place(cut, inner), place(length - far_cut, inner), away, square, of.thickness),
        seam(place(0.0, inner + cut), place(0.0, outer), along, square, of.thickness),
    ];
    if at.reach.is_none() {
        seams.push(seam(place(length, inner + cut), place(length, outer), -along, square, of.thickness));
    }
    // x along, y away: z = x × y.
    let z = along.cross(away);
    Fitting {
        on: Owner::Column(on),
        mark: mark.into(),
        name: "STIFFENER",
        frame: Frame { origin: start - z * (of.thickness / 2.0), z, x: along },
        corners,
        holes: Vec::new(),
        thickness: of.thickness,
        grade: of.grade.clone(),
        seams: seams.into_iter().map(|seam| (seam, of.throat)).collect(),
    }
}

/// A fin plate with one column of bolts.
#[derive(Clone, Debug)]
pub struct Fin {
    /// Thickness, grade, throat of its fillets.
    pub plate: Plain,
    /// Heights of its lower and upper edge above the beam's soffit.
    pub edges: [f64; 2],
    /// How far it reaches out.
    pub width: f64,
    /// Nominal diameter of the bolts.
    pub diameter: f64,
    /// Heights of the bolts above the beam's soffit, from the top down.
    pub rows: Vec<f64>,
    /// From the supporting member's face to the bolts.
    pub out: f64,
}

/// Bolts 8.8 whose class stands in their names.
fn bolts(path: String, level: f64, diameter: f64, grip: f64, frame: Frame, at: Vec<[f64; 2]>) -> Bolting {
    Bolting {
        path,
        level,
        diameter,
        class: Some(("8.8".into(), ClassIn::Name)),
        body: BoltBody::Shank,
        grip,
        length: None,
        anchors: false,
        frame,
        at: at.into_iter().enumerate().map(|(index, place)| (format!("bolt {}", index + 1), place)).collect(),
    }
}

/// A fin plate beside a beam's web, on the face of what carries the beam, and its bolts.
pub fn fin_plate(on: Owner, mark: &str, (section, top): (&Section, f64), face: Face, fin: &Fin) -> (Fitting, Bolting) {
    let Plain { thickness, grade, throat } = &fin.plate;
    let (out, across) = (face.out, DVec3::Z.cross(face.out));
    let outer = face.soffit + across * (section.t_w / 2.0 + thickness);
    let [low, high] = fin.edges;
    let hole = hardware::size(fin.diameter).hole;
    let middle = outer - across * (thickness / 2.0);
    let weld = seam(middle + DVec3::Z * low, middle + DVec3::Z * high, out, across, *thickness);
    let plate = Fitting {
        on,
        mark: mark.into(),
        name: "FIN PLATE",
        frame: Frame { origin: outer, z: -across, x: out },
        corners: rectangle([0.0, low], [fin.width, high]),
        holes: fin.rows.iter().map(|row| ([fin.out, *row], hole)).collect(),
        thickness: *thickness,
        grade: grade.clone(),
        seams: vec![(weld, *throat)],
    };
    // Along x up, along y towards the support.
    let frame = Frame { origin: outer, z: -across, x: DVec3::Z };
    let at = fin.rows.iter().map(|row| [*row, -fin.out]).collect();
    (plate, bolts(format!("fin {mark}"), top, fin.diameter, thickness + section.t_w, frame, at))
}

/// Cover plates on both flanges and on both sides of the web of two beams in line along x.
#[derive(Clone, Debug)]
pub struct Covers {
    /// Thickness and width of those on the flanges, thickness and height of those on the web.
    pub sizes: [[f64; 2]; 2],
    /// Grade as written.
    pub grade: String,
    /// Nominal diameter of the bolts.
    pub diameter: f64,
    /// From the middle of the splice to the flange's bolts.
    pub along: Vec<f64>,
    /// Between the two bolts of the flange across the beam.
    pub gauge: f64,
    /// From the middle of the splice to the web's bolts, and their heights above the soffit.
    pub web: (f64, Vec<f64>),
    /// Distance from the last bolts to the plates' ends.
    pub end: f64,
}

/// The plates and bolts of a splice whose middle lies at the soffit.
pub fn covers(mark: &str, section: &Section, middle: DVec3, of: &Covers) -> (Vec<Fitting>, Vec<Bolting>) {
    let [[t, b], [t_web, high]] = of.sizes;
    let hole = hardware::size(of.diameter).hole;
    let top = middle.z + section.h;
    let both = |at: &f64| [-*at, *at];
    let on_flange: Vec<[f64; 2]> =
        of.along.iter().flat_map(both).flat_map(|x| [-0.5, 0.5].map(|side| [x, side * of.gauge])).collect();
    let on_web: Vec<[f64; 2]> =
        both(&of.web.0).into_iter().flat_map(|x| of.web.1.iter().map(move |z| [x, *z])).collect();
    let reach = of.along.iter().fold(0.0_f64, |a, b| a.max(*b)) + of.end;
    let plate = |part: &str, frame, corners, holes: &[[f64; 2]], thickness| Fitting {
        on: Owner::Loose,
        mark: format!("{mark}-{part}"),
        name: "COVER PLATE",
        frame,
        corners,
        holes: holes.iter().map(|place| (*place, hole)).collect(),
        thickness,
        grade: of.grade.clone(),
        seams: Vec::new(),
    };
    let flange = || rectangle([-reach, -b / 2.0], [reach, b / 2.0]);
    let up = DVec3::Z;
    let side = (of.web.1.iter().sum::<f64>()) / of.web.1.len() as f64;
    let web = || {
        let wide = of.web.0 + of.end;
        rectangle([-wide, side - high / 2.0], [wide, side + high / 2.0])
    };
    // Seen from the south: x along the beams, y up, z towards the south.
    let on_side = |y: f64| Frame { origin: middle + DVec3::Y * y, z: -DVec3::Y, x: DVec3::X };
    let half = section.t_w / 2.0;
    let plates = vec![
        plate("T", Frame { origin: middle + up * section.h, z: up, x: DVec3::X }, flange(), &on_flange, t),
        plate("B", Frame { origin: middle - up * t, z: up, x: DVec3::X }, flange(), &on_flange, t),
        plate("N", on_side(half + t_web), web(), &on_web, t_web),
        plate("S", on_side(-half), web(), &on_web, t_web),
    ];
    let frame = |origin, z| Frame { origin, z, x: DVec3::X };
    let group = |part: &str, grip, frame, at: &[[f64; 2]]| {
        bolts(format!("covers {mark}/{part}"), top, of.diameter, grip, frame, at.to_vec())
    };
    let grip = t + section.t_f;
    let boltings = vec![
        group("top", grip, frame(middle + up * (section.h + t), -up), &on_flange),
        group("bottom", grip, frame(middle - up * t, up), &on_flange),
        group("web", section.t_w + 2.0 * t_web, on_side(half + t_web), &on_web),
    ];
    (plates, boltings)
}

/// A base plate below a column whose depth runs along x, with a square of four anchors of class 8.8, and fillets at both
/// flanges and at the web.
pub fn base(
    (on, column): (usize, &Column),
    mark: &str,
    of: &Plain,
    size: f64,
    (diameter, spacing, length): (f64, f64, f64),
) -> (Fitting, Bolting) {
    let Section { h, b, t_w, t_f, r, .. } = column.section;
    let foot = DVec3::new(column.at[0], column.at[1], column.bottom);
    let half = spacing / 2.0;
    let places = [[-half, -half], [half, -half], [half, half], [-half, half]];
    let at = |x: f64, y: f64| foot + DVec3::X * x + DVec3::Y * y;
    let edge = (h - t_f) / 2.0;
    let clear = h / 2.0 - t_f - r;
    let seams = vec![
        (seam(at(-edge, -b / 2.0), at(-edge, b / 2.0), DVec3::Z, DVec3::X, t_f), of.throat),
        (seam(at(edge, -b / 2.0), at(edge, b / 2.0), DVec3::Z, DVec3::X, t_f), of.throat),
        (seam(at(-clear, 0.0), at(clear, 0.0), DVec3::Z, DVec3::Y, t_w), of.throat),
    ];
    let plate = Fitting {
        on: Owner::Column(on),
        mark: mark.into(),
        name: "BASE PLATE",
        frame: Frame { origin: foot - DVec3::Z * of.thickness, z: DVec3::Z, x: DVec3::X },
        corners: rectangle([-size / 2.0; 2], [size / 2.0; 2]),
        holes: places.map(|place| (place, diameter + 4.0)).to_vec(),
        thickness: of.thickness,
        grade: of.grade.clone(),
        seams,
    };
    let frame = Frame { origin: foot + DVec3::Z * 60.0, z: -DVec3::Z, x: DVec3::X };
    let mut anchors = bolts(format!("base {mark}"), column.bottom, diameter, of.thickness, frame, places.to_vec());
    (anchors.anchors, anchors.length) = (true, Some(length));
    (plate, anchors)
}
