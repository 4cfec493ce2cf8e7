//! What holds the parts together: welds and bolts.

use std::io;

use glam::DVec3;

use super::building::{Beam, BoltBody, Bolting, Bolts, ClassIn, Column, Detail, EndPlate, Joint, Section, Welds};
use super::entity::{Declared::*, Entity, Link, Simple};
use super::hardware;
use super::model::{Model, Reference, level};
use super::shapes::{axes, circle, extrusion, hexagon, mapped, moved, outline, polyline, representation, ring, shape};
use super::space::{Face, Frame};

/// A weld along a line, with a fillet on both sides of a plate's edge.
#[derive(Clone, Copy, Debug)]
pub struct Seam {
    /// Where it starts.
    pub from: DVec3,
    /// Where it ends.
    pub to: DVec3,
    /// Into the plate, away from the part that it is welded to.
    pub into: DVec3,
    /// Across the plate's thickness.
    pub across: DVec3,
    /// Half of the plate's thickness.
    pub half: f64,
}

/// What alike bolts have in common.
struct Kind<'b> {
    name: String,
    size: hardware::Size,
    length: f64,
    of: &'b Bolting,
}

/// The welds of a beam's end at a plate: at both flanges and at the web as far as the plate reaches, each with its name
/// and throat.
pub fn beam_seams(section: &Section, face: Face, plate: &EndPlate, welds: &Welds) -> Vec<(&'static str, Seam, f64)> {
    let Section { h, b, t_w, t_f, r, .. } = *section;
    let across = DVec3::Z.cross(face.out);
    let behind = face.soffit + face.out * plate.thickness;
    let at = |x: f64, z: f64| behind + across * x + DVec3::Z * z;
    let flange =
        |z: f64| Seam { from: at(-b / 2.0, z), to: at(b / 2.0, z), into: face.out, across: DVec3::Z, half: t_f / 2.0 };
    let (low, high) = ((t_f + r).max(plate.bottom), (h - t_f - r).min(plate.top));
    let web = Seam { from: at(0.0, low), to: at(0.0, high), into: face.out, across, half: t_w / 2.0 };
    let all = [
        ("upper flange", flange(h - t_f / 2.0), welds.flange),
        ("lower flange", flange(t_f / 2.0), welds.flange),
        ("web", web, welds.web),
    ];
    all.into_iter().filter(|(.., throat)| !(*throat < 0.0)).collect()
}

/// The bolts of an end plate, heads on the plate, nuts behind a part of that thickness.
pub fn end_plate_bolts(path: &str, level: f64, face: Face, plate: f64, other: f64, bolts: &Bolts) -> Bolting {
    let place =
        |row: usize, side: f64, hand: char| (format!("bolt {}{hand}", row + 1), [bolts.rows[row], side * bolts.gauge]);
    Bolting {
        path: path.into(),
        level,
        diameter: bolts.diameter,
        class: bolts.class.clone(),
        body: bolts.body,
        grip: plate + other,
        length: bolts.length,
        anchors: false,
        frame: Frame { origin: face.soffit + face.out * plate, z: -face.out, x: DVec3::Z },
        at: (0..bolts.rows.len()).flat_map(|row| [place(row, -0.5, 'L'), place(row, 0.5, 'R')]).collect(),
    }
}

impl Model<'_> {
    /// Writes the welds of a beam's end: at both flanges and at the web.
    pub fn beam_welds(&mut self, owner: &str, beam: &Beam, joint: &Joint, face: Face) -> io::Result<Vec<Reference>> {
        let Some(welds) = &joint.detail.welds else { return Ok(Vec::new()) };
        let mut parts = Vec::new();
        for (name, seam, throat) in &beam_seams(&beam.section, face, &joint.detail.plate, welds) {
            parts.push(self.weld(&format!("{owner}/weld {name}"), level(beam), seam, *throat, welds.bodies)?);
        }
        Ok(parts)
    }

    /// Writes a weld, as a line or with a body.
    pub fn weld(&mut self, owner: &str, level: f64, seam: &Seam, throat: f64, body: bool) -> io::Result<Reference> {
        let length = seam.from.distance(seam.to);
        let properties = [
            ("Type1", "IfcLabel", Simple::Text("fillet".into())),
            ("a", "IfcPositiveLengthMeasure", Simple::Real(throat)),
            ("l", "IfcPositiveLengthMeasure", Simple::Real(length)),
        ];
        let set = self.properties(owner, &format!("weld {throat} {length:.3}"), "Pset_FastenerWeld", &properties);
        let line = seam.to - seam.from;
        let representation = if body {
            // Equal legs: z = a √2.
            let leg = throat * 2f64.sqrt();
            let prism = |side: f64| {
                let y = seam.across * side;
                let z = seam.into.cross(y);
                let start = if z.dot(line) > 0.0 { DVec3::ZERO } else { line };
                let frame = Frame { origin: start + y * seam.half, z, x: seam.into };
                extrusion(outline(&[[0.0, 0.0], [leg, 0.0], [0.0, leg]]), Some(frame), length).into()
            };
            representation(self.body, "Body", "SweptSolid", vec![prism(1.0), prism(-1.0)])
        } else {
            representation(self.axis, "Axis", "Curve3D", vec![polyline(&[[0.0; 3], line.to_array()]).into()])
        };
        let this = ("IfcFastener", self.new_id());
        let entity = Entity::root("IfcFastener", &self.path(owner))
            .id(this.1)
            .text("Name", "WELD")
            .token("PredefinedType", "WELD")
            .held("IsDefinedBy", "RelatedObjects", vec![set])
            .one("ObjectPlacement", Wider, self.placed(level, moved(seam.from)))
            .one("Representation", Wider, shape(representation));
        self.put(entity)?;
        Ok(this)
    }

    /// Writes the bolts of a joint, heads on the plate, nuts in the column.
    pub fn bolts(
        &mut self,
        owner: &str,
        beam: &Beam,
        column: &Column,
        joint: &Joint,
        face: Face,
    ) -> io::Result<Vec<Reference>> {
        let Detail { plate, bolts, .. } = &joint.detail;
        self.bolting(&end_plate_bolts(owner, level(beam), face, plate.thickness, column.section.t_f, bolts))
    }

    /// Writes alike bolts.
    pub fn bolting(&mut self, of: &Bolting) -> io::Result<Vec<Reference>> {
        let size = hardware::size(of.diameter);
        let length = of.length.unwrap_or_else(|| hardware::length(size, of.grip));
        let plain = format!("M{} x {length}", size.d);
        let name = match &of.class {
            Some((class, ClassIn::Name)) => format!("{plain} - {class}"),
            _ => plain,
        };
        let name = if of.anchors { format!("ANCHOR {name}") } else { name };
        let kind = Kind { name, size, length, of };
        let Frame { origin, z, x } = of.frame;
        let frame = |[along, aside]: [f64; 2]| Frame { origin: origin + x * along + z.cross(x) * aside, z, x };
        let mut parts = Vec::new();
        match of.body {
            BoltBody::Group => {
                let at: Vec<DVec3> = of.at.iter().map(|(_, [x, y])| DVec3::new(*x, *y, 0.0)).collect();
                parts.push(self.fastener(&format!("{}/bolts", of.path), &kind, of.frame, &at)?);
            }
            BoltBody::Shank | BoltBody::Mapped => {
                for (name, place) in &of.at {
                    let path = format!("{}/{name}", of.path);
                    parts.push(self.fastener(&path, &kind, frame(*place), &[DVec3::ZERO])?);
                }
            }
            BoltBody::Proxies => {
                for (name, place) in &of.at {
                    parts.extend(self.proxies(&format!("{}/{name}", of.path), &kind, frame(*place))?);
                }
            }
        }
        Ok(parts)
    }

    /// A fastener of bolts at places in its frame.
    fn fastener(&mut self, path: &str, kind: &Kind<'_>, frame: Frame, at: &[DVec3]) -> io::Result<Reference> {
        let Kind { name, size, length, of: bolts } = kind;
        let (grip, level) = (&bolts.grip, &bolts.level);
        let is_mapped = bolts.body != BoltBody::Shank;
        let key = format!("bolt type {name} {:?} {grip}", bolts.body);
        let sort = if bolts.anchors { "ANCHORBOLT" } else { "BOLT" };
        let of = self.bolt_type(&key, name, sort, *size, *length, is_mapped.then_some(*grip));
        let set = if bolts.anchors { Vec::new() } else { vec![self.bolt_properties(*size, *length)] };
        let body = match self.known(&format!("{key} map")) {
            Some(map) => {
                let items = at.iter().map(|place| mapped(map, *place).into());
                representation(self.body, "Body", "MappedRepresentation", items.collect())
            }
            None => {
                let shank = extrusion(circle(size.d), None, *length);
                representation(self.body, "Body", "SweptSolid", vec![shank.into()])
            }
        };
        let this = ("IfcMechanicalFastener", self.new_id());
        let entity = Entity::root("IfcMechanicalFastener", &self.path(path))
            .id(this.1)
            .text("Name", name)
            .real("NominalDiameter", size.d)
            .real("NominalLength", *length)
            .token("PredefinedType", sort)
            .held_single("IsTypedBy", "RelatedObjects", of)
            .held("IsDefinedBy", "RelatedObjects", set)
            .one("ObjectPlacement", Wider, self.placed(*level, frame))
            .one("Representation", Wider, shape(body));
        self.of_class(bolts, this);
        self.contain(*level, this);
        self.put(entity)?;
        Ok(this)
    }

    /// A bolt, its washer and its nut as elements of no class.
    fn proxies(&mut self, path: &str, kind: &Kind<'_>, frame: Frame) -> io::Result<[Reference; 3]> {
        let Kind { name, size, length, of: bolts } = kind;
        let (grip, level) = (&bolts.grip, &bolts.level);
        let from = |z: f64| Some(moved(DVec3::Z * z));
        let bolt = vec![
            extrusion(hexagon(size.across_flats), from(-size.head), size.head).into(),
            extrusion(circle(size.d), None, *length).into(),
        ];
        let washer = extrusion(ring(size.washer.1, size.d + 1.0), from(*grip), size.washer.0);
        let nut = extrusion(hexagon(size.across_flats), from(grip + size.washer.0), size.nut);
        let pieces = [
            ("", name.clone(), bolt),
            ("/washer", format!("WASHER {}", size.d), vec![washer.into()]),
            ("/nut", format!("NUT M{}", size.d), vec![nut.into()]),
        ];
        let mut parts = [("IfcBuildingElementProxy", 0); 3];
        for (part, (suffix, name, items)) in parts.iter_mut().zip(pieces) {
            part.1 = self.new_id();
            let entity = Entity::root(part.0, &self.path(&format!("{path}{suffix}")))
                .id(part.1)
                .text("Name", &name)
                .one("ObjectPlacement", Wider, self.placed(*level, frame))
                .one("Representation", Wider, shape(representation(self.body, "Body", "SweptSolid", items)));
            if suffix.is_empty() {
                self.of_class(bolts, *part);
            }
            self.contain(*level, *part);
            self.put(entity)?;
        }
        Ok(parts)
    }

    /// Says the strength class as a material, where that is how it is said.
    fn of_class(&mut self, bolts: &Bolting, element: Reference) {
        if let Some((class, ClassIn::Material)) = &bolts.class {
            self.of_material(class, element);
        }
    }

    fn bolt_type(
        &mut self,
        key: &str,
        name: &str,
        sort: &'static str,
        size: hardware::Size,
        length: f64,
        mapped_grip: Option<f64>,
    ) -> Link {
        self.share(key, |model| {
            let path = model.path(key);
            let id = model.new_id();
            let mut of = Entity::root("IfcMechanicalFastenerType", &path)
                .id(id)
                .text("Name", name)
                .token("PredefinedType", sort)
                .real("NominalDiameter", size.d)
                .real("NominalLength", length);
            if let Some(grip) = mapped_grip {
                let map = model.new_id();
                model.remember(format!("{key} map"), ("IfcRepresentationMap", map));
                let at = |z: f64| Some(moved(DVec3::Z * z));
                let items = vec![
                    extrusion(hexagon(size.across_flats), at(-size.head), size.head).into(),
                    extrusion(circle(size.d), None, length).into(),
                    extrusion(hexagon(size.across_flats), at(grip + size.washer.0), size.nut).into(),
                ];
                let map = Entity::new("IfcRepresentationMap")
                    .id(map)
                    .one("MappingOrigin", Select, axes(moved(DVec3::ZERO)))
                    .one("MappedRepresentation", Wider, representation(model.body, "Body", "SweptSolid", items));
                of = of.many("RepresentationMaps", vec![map.into()]);
            }
            Entity::root("IfcRelDefinesByType", &format!("{path}/occurrences")).one("RelatingType", Wider, of)
        })
    }

    fn bolt_properties(&mut self, size: hardware::Size, length: f64) -> Link {
        let properties = [
            ("ThreadDiameter", "IfcPositiveLengthMeasure", Simple::Real(size.d)),
            ("ThreadLength", "IfcPositiveLengthMeasure", Simple::Real(size.thread.min(length))),
            ("NutsCount", "IfcCountMeasure", Simple::Integer(1)),
            ("WashersCount", "IfcCountMeasure", Simple::Integer(1)),
        ];
        self.shared_properties(&format!("bolt M{} x {length}", size.d), "Pset_MechanicalFastenerBolt", &properties)
    }
}
