//! What holds the parts together: welds and bolts.

use std::io;

use glam::DVec3;

use super::building::{Beam, BoltBody, ClassIn, Column, Joint, Section};
use super::entity::{Declared::*, Entity, Link, Simple};
use super::hardware;
use super::model::{Model, Reference, level};
use super::shapes::{axes, circle, extrusion, hexagon, mapped, moved, outline, polyline, representation, shape};
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
        let mut parts = Vec::new();
        for (row, height) in bolts.rows.iter().enumerate() {
            for (side, hand) in [(-0.5, 'L'), (0.5, 'R')] {
                let key = format!("bolt type {name} {:?} {grip}", bolts.body);
                let of = self.bolt_type(&key, &name, size, length, (bolts.body == BoltBody::Mapped).then_some(grip));
                let set = self.bolt_properties(size, length);
                let body = match self.known(&format!("{key} map")) {
                    Some(map) => representation(self.body, "Body", "MappedRepresentation", vec![mapped(map).into()]),
                    None => {
                        let shank = extrusion(circle(size.d), None, length);
                        representation(self.body, "Body", "SweptSolid", vec![shank.into()])
                    }
                };
                let behind = face.soffit + face.out * plate.thickness + DVec3::Z * height;
                let origin = behind + DVec3::Z.cross(face.out) * side * bolts.gauge;
                let frame = Frame { origin, z: -face.out, x: DVec3::Z };
                let this = ("IfcMechanicalFastener", self.new_id());
                let entity =
                    Entity::root("IfcMechanicalFastener", &self.path(&format!("{owner}/bolt {}{hand}", row + 1)))
                        .id(this.1)
                        .text("Name", &name)
                        .real("NominalDiameter", size.d)
                        .real("NominalLength", length)
                        .token("PredefinedType", "BOLT")
                        .held_single("IsTypedBy", "RelatedObjects", of)
                        .held("IsDefinedBy", "RelatedObjects", vec![set])
                        .one("ObjectPlacement", Wider, self.placed(level(beam), frame))
                        .one("Representation", Wider, shape(body));
                if let Some((class, ClassIn::Material)) = &bolts.class {
                    self.of_material(class, this);
                }
                self.contain(level(beam), this);
                self.put(entity)?;
                parts.push(this);
            }
        }
        Ok(parts)
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
