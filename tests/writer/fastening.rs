//! What holds the parts together: welds and bolts.

use std::io;

use glam::DVec3;

use super::building::{Beam, BoltBody, Bolts, ClassIn, Column, Joint, Section};
use super::entity::{Declared::*, Entity, Link, Simple};
use super::hardware;
use super::model::{Model, Reference, level};
use super::shapes::{axes, circle, extrusion, hexagon, mapped, moved, outline, polyline, representation, ring, shape};
use super::space::{Face, Frame};

/// A weld along a line, with a fillet on both sides of a plate's edge.
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

/// What the bolts of a joint have in common.
struct Kind {
    name: String,
    size: hardware::Size,
    grip: f64,
    length: f64,
    level: f64,
}

/// Where a bolt is.
struct Place {
    name: String,
    origin: DVec3,
    /// In the frame of a group: x up from the soffit, y across.
    in_group: DVec3,
}

impl Model<'_> {
    /// Writes the welds of a beam's end: at both flanges and at the web.
    pub fn beam_welds(&mut self, owner: &str, beam: &Beam, joint: &Joint, face: Face) -> io::Result<Vec<Reference>> {
        let Some(welds) = &joint.detail.welds else { return Ok(Vec::new()) };
        let Section { h, b, t_w, t_f, r, .. } = beam.section;
        let across = DVec3::Z.cross(face.out);
        let behind = face.soffit + face.out * joint.detail.plate.thickness;
        let at = |x: f64, z: f64| behind + across * x + DVec3::Z * z;
        let flange = |z: f64| Seam {
            from: at(-b / 2.0, z),
            to: at(b / 2.0, z),
            into: face.out,
            across: DVec3::Z,
            half: t_f / 2.0,
        };
        let web = Seam { from: at(0.0, t_f + r), to: at(0.0, h - t_f - r), into: face.out, across, half: t_w / 2.0 };
        let seams = [
            ("upper flange", flange(h - t_f / 2.0), welds.flange),
            ("lower flange", flange(t_f / 2.0), welds.flange),
            ("web", web, welds.web),
        ];
        let mut parts = Vec::new();
        for (name, seam, throat) in &seams {
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
        let (plate, bolts) = (&joint.detail.plate, &joint.detail.bolts);
        let size = hardware::size(bolts.diameter);
        let grip = plate.thickness + column.section.t_f;
        let length = hardware::length(size, grip);
        let plain = format!("M{} x {length}", size.d);
        let name = match &bolts.class {
            Some((class, ClassIn::Name)) => format!("{plain} - {class}"),
            _ => plain.clone(),
        };
        let behind = face.soffit + face.out * plate.thickness;
        let place = |row: usize, side: f64, hand: char| {
            let aside = side * bolts.gauge;
            let origin = behind + DVec3::Z * bolts.rows[row] + DVec3::Z.cross(face.out) * aside;
            let name = format!("{owner}/bolt {}{hand}", row + 1);
            Place { name, origin, in_group: DVec3::new(bolts.rows[row], aside, 0.0) }
        };
        let both = |row| [place(row, -0.5, 'L'), place(row, 0.5, 'R')];
        let places: Vec<Place> = (0..bolts.rows.len()).flat_map(both).collect();
        let kind = Kind { name, size, grip, length, level: level(beam) };
        let frame = |origin| Frame { origin, z: -face.out, x: DVec3::Z };
        let mut parts = Vec::new();
        match bolts.body {
            BoltBody::Group => {
                let at: Vec<DVec3> = places.iter().map(|place| place.in_group).collect();
                parts.push(self.fastener(&format!("{owner}/bolts"), &kind, bolts, frame(behind), &at)?);
            }
            BoltBody::Shank | BoltBody::Mapped => {
                for place in &places {
                    parts.push(self.fastener(&place.name, &kind, bolts, frame(place.origin), &[DVec3::ZERO])?);
                }
            }
            BoltBody::Proxies => {
                for place in &places {
                    parts.extend(self.proxies(&place.name, &kind, bolts, frame(place.origin))?);
                }
            }
        }
        Ok(parts)
    }

    /// A fastener of bolts at places in its frame.
    fn fastener(
        &mut self,
        path: &str,
        kind: &Kind,
        bolts: &Bolts,
        frame: Frame,
        at: &[DVec3],
    ) -> io::Result<Reference> {
        let Kind { name, size, grip, length, level } = kind;
        let is_mapped = bolts.body != BoltBody::Shank;
        let key = format!("bolt type {name} {:?} {grip}", bolts.body);
        let of = self.bolt_type(&key, name, *size, *length, is_mapped.then_some(*grip));
        let set = self.bolt_properties(*size, *length);
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
            .token("PredefinedType", "BOLT")
            .held_single("IsTypedBy", "RelatedObjects", of)
            .held("IsDefinedBy", "RelatedObjects", vec![set])
            .one("ObjectPlacement", Wider, self.placed(*level, frame))
            .one("Representation", Wider, shape(body));
        self.of_class(bolts, this);
        self.contain(*level, this);
        self.put(entity)?;
        Ok(this)
    }

    /// A bolt, its washer and its nut as elements of no class.
    fn proxies(&mut self, path: &str, kind: &Kind, bolts: &Bolts, frame: Frame) -> io::Result<[Reference; 3]> {
        let Kind { name, size, grip, length, level } = kind;
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
    fn of_class(&mut self, bolts: &Bolts, element: Reference) {
        if let Some((class, ClassIn::Material)) = &bolts.class {
            self.of_material(class, element);
        }
    }

    fn bolt_type(
        &mut self,
        key: &str,
        name: &str,
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
                .token("PredefinedType", "BOLT")
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
