//! The parts: members, plates, bolts, welds and shipping pieces.

use std::io;

use glam::DVec3;

use super::building::{Beam, BoltBody, Building, ClassIn, Column, End, Joint, Level, Section, Stiffener};
use super::entity::{Declared::*, Entity, Link, Simple, links};
use super::hardware;
use super::model::{Model, Reference, level};
use super::shapes::{
    axes, circle, extrusion, hexagon, i_profile, mapped, moved, outline, outline_with_holes, polyline, representation,
    shape,
};
use super::space::{Face, Frame, depth_of, ends, face};

/// A pair of stiffeners in a column: its middle level and what it is.
pub struct Pair {
    height: f64,
    stiffener: Stiffener,
}

/// The stiffeners that the joints of each column ask for; opposite beams share a pair at the same level.
pub fn stiffeners_by_column(building: &Building) -> Vec<Vec<Pair>> {
    let mut columns: Vec<Vec<Pair>> = building.columns.iter().map(|_| Vec::new()).collect();
    for beam in &building.beams {
        for (column, joint) in beam.joints() {
            for stiffener in &joint.detail.stiffeners {
                let height = match stiffener.at {
                    Level::Top => beam.top - beam.section.t_f / 2.0,
                    Level::Bottom => beam.soffit() + beam.section.t_f / 2.0,
                };
                let near = |pair: &Pair| (pair.height - height).abs() < stiffener.thickness / 2.0;
                if !columns[column].iter().any(near) {
                    columns[column].push(Pair { height, stiffener: stiffener.clone() });
                }
            }
        }
    }
    columns
}

/// A weld along a line, with a fillet on both sides of a plate's edge.
struct Seam {
    from: DVec3,
    to: DVec3,
    /// Into the plate, away from the part that it is welded to.
    into: DVec3,
    /// Across the plate's thickness.
    across: DVec3,
    /// Half of the plate's thickness.
    half: f64,
}

impl Model<'_> {
    fn i_section(&mut self, section: &Section) -> Link {
        self.share(&format!("profile {}", section.name), |_| i_profile(section))
    }

    fn member_type(&mut self, class: &'static str, predefined: &'static str, section: &Section) -> Link {
        self.share(&format!("relation {class} {}", section.name), |model| {
            let id = model.new_id();
            let path = model.path(&format!("{class} {}", section.name));
            let of = Entity::root(class, &path).id(id).text("Name", &section.name).token("PredefinedType", predefined);
            Entity::root("IfcRelDefinesByType", &format!("{path}/occurrences")).one("RelatingType", Wider, of)
        })
    }

    fn solid(&self, items: Vec<Link>) -> Entity {
        shape(representation(self.body, "Body", "SweptSolid", items))
    }

    /// Writes a column with its stiffeners and their welds as one shipping piece.
    pub fn column(&mut self, column: &Column, stiffeners: &[Pair]) -> io::Result<()> {
        let depth = depth_of(column);
        let foot = DVec3::new(column.at[0], column.at[1], column.bottom);
        let owner = format!("column {}", column.mark);
        let this = ("IfcColumn", self.new_id());
        self.remember(owner.clone(), this);
        let frame = Frame { origin: foot, z: DVec3::Z, x: depth.cross(DVec3::Z) };
        let of = self.member_type("IfcColumnType", "COLUMN", &column.section);
        let profile = self.i_section(&column.section);
        let entity = Entity::root("IfcColumn", &self.path(&owner))
            .id(this.1)
            .text("Name", &column.section.name)
            .text("Tag", &column.mark)
            .token("PredefinedType", "COLUMN")
            .held_single("IsTypedBy", "RelatedObjects", of)
            .one("ObjectPlacement", Wider, self.placed(column.bottom, frame))
            .one(
                "Representation",
                Wider,
                self.solid(vec![extrusion(profile, None, column.top - column.bottom).into()]),
            );
        self.of_profile(&column.section, &column.grade, this);
        self.put(entity)?;
        let mut parts = vec![this];
        for (index, pair) in stiffeners.iter().enumerate() {
            for (side, hand) in [(1.0, 'L'), (-1.0, 'R')] {
                let name = format!("{owner}/stiffener {}-{}{hand}", column.mark, index + 1);
                parts.extend(self.stiffener(&name, column, pair, depth * side)?);
            }
        }
        if stiffeners.is_empty() {
            self.contain(column.bottom, this);
            return Ok(());
        }
        self.piece(&format!("P-{}", column.mark), "COLUMN", column.bottom, &parts)
    }

    /// One plate of a pair, on the side of the web to the left of `along`, its corners cut free of the root radius.
    fn stiffener(&mut self, name: &str, column: &Column, pair: &Pair, along: DVec3) -> io::Result<Vec<Reference>> {
        let Section { h, b, t_w, t_f, r, .. } = column.section;
        let Stiffener { thickness, grade, throat, .. } = &pair.stiffener;
        let (reach, inner) = (h / 2.0 - t_f, t_w / 2.0);
        let outer = inner + ((b - t_w) / 2.0 / 5.0).floor() * 5.0;
        let cut = ((r + 3.0) / 5.0).ceil() * 5.0;
        let corners = [
            [-reach, inner + cut],
            [-reach + cut, inner],
            [reach - cut, inner],
            [reach, inner + cut],
            [reach, outer],
            [-reach, outer],
        ];
        let middle = DVec3::new(column.at[0], column.at[1], pair.height);
        let frame = Frame { origin: middle - DVec3::Z * thickness / 2.0, z: DVec3::Z, x: along };
        let plate = self.plate(name, "STIFFENER", column.bottom, frame, outline(&corners), *thickness, grade)?;
        let away = DVec3::Z.cross(along);
        let at = |x: f64, y: f64| middle + along * x + away * y;
        let seam = |from, to, into| Seam { from, to, into, across: DVec3::Z, half: thickness / 2.0 };
        let seams = [
            seam(at(cut - reach, inner), at(reach - cut, inner), away),
            seam(at(-reach, inner + cut), at(-reach, outer), along),
            seam(at(reach, inner + cut), at(reach, outer), -along),
        ];
        let mut parts = vec![plate];
        for (index, seam) in seams.iter().enumerate() {
            parts.push(self.weld(&format!("{name}/weld {}", index + 1), column.bottom, seam, *throat, false)?);
        }
        Ok(parts)
    }

    #[allow(clippy::too_many_arguments)] // A plate is as much.
    fn plate(
        &mut self,
        owner: &str,
        name: &str,
        level: f64,
        frame: Frame,
        profile: Entity,
        thickness: f64,
        grade: &str,
    ) -> io::Result<Reference> {
        let this = ("IfcPlate", self.new_id());
        let mark = owner.rsplit([' ', '/']).next().unwrap_or(owner);
        let entity = Entity::root("IfcPlate", &self.path(owner))
            .id(this.1)
            .text("Name", name)
            .text("Tag", mark)
            .token("PredefinedType", "SHEET")
            .one("ObjectPlacement", Wider, self.placed(level, frame))
            .one("Representation", Wider, self.solid(vec![extrusion(profile, None, thickness).into()]));
        self.of_material(grade, this);
        self.put(entity)?;
        Ok(this)
    }

    /// Writes a beam, its end plates and their welds as one shipping piece, then its bolts and its relations.
    pub fn beam(&mut self, beam: &Beam, columns: &[u64]) -> io::Result<()> {
        let building = self.building;
        let [start, end] = ends(&building.columns, beam);
        let along = (end - start).normalize();
        let owner = format!("beam {}", beam.mark);
        let this = ("IfcBeam", self.new_id());
        let frame = Frame { origin: start + DVec3::Z * beam.section.h / 2.0, z: along, x: DVec3::Z.cross(along) };
        let of = self.member_type("IfcBeamType", "BEAM", &beam.section);
        let common = [
            ("Reference", "IfcIdentifier", Simple::Text(beam.section.name.clone())),
            ("LoadBearing", "IfcBoolean", Simple::Truth(true)),
        ];
        let common = self.properties(&owner, &format!("common {}", beam.section.name), "Pset_BeamCommon", &common);
        let profile = self.i_section(&beam.section);
        let entity = Entity::root("IfcBeam", &self.path(&owner))
            .id(this.1)
            .text("Name", &beam.section.name)
            .text("Tag", &beam.mark)
            .token("PredefinedType", "BEAM")
            .held_single("IsTypedBy", "RelatedObjects", of)
            .held("IsDefinedBy", "RelatedObjects", vec![common])
            .one("ObjectPlacement", Wider, self.placed(level(beam), frame))
            .one("Representation", Wider, self.solid(vec![extrusion(profile, None, start.distance(end)).into()]));
        self.of_profile(&beam.section, &beam.grade, this);
        self.put(entity)?;
        let mut pieces = vec![this];
        let mut bolted = Vec::new();
        for (index, which) in ["start", "end"].into_iter().enumerate() {
            let (End::Joint { column, joint }, Some(face)) = (&beam.ends[index], face(&building.columns, beam, index))
            else {
                continue;
            };
            let owner = format!("{owner}/{which}");
            let mut welded = vec![self.end_plate(&owner, beam, which, joint, face)?];
            welded.extend(self.beam_welds(&owner, beam, joint, face)?);
            let bolts = self.bolts(&owner, beam, &building.columns[*column], joint, face)?;
            pieces.extend(&welded);
            bolted.push((joint, columns[*column], [welded, bolts].concat()));
        }
        if pieces.len() > 1 {
            self.piece(&format!("P-{}", beam.mark), "BEAM", level(beam), &pieces)?;
        } else {
            self.contain(level(beam), this);
        }
        for (joint, column, parts) in bolted.iter().filter(|(joint, ..)| joint.told) {
            let relation =
                Entity::root("IfcRelConnectsWithRealizingElements", &self.path(&format!("joint {}", joint.mark)))
                    .text("Name", &joint.mark)
                    .text("ConnectionType", "end plate")
                    .one("RelatingElement", Wider, Link::To("IfcColumn", *column))
                    .one("RelatedElement", Wider, Link::To("IfcBeam", this.1))
                    .many("RealizingElements", links(parts));
            self.put(relation)?;
        }
        Ok(())
    }

    fn end_plate(&mut self, owner: &str, beam: &Beam, which: &str, joint: &Joint, face: Face) -> io::Result<Reference> {
        let (plate, bolts) = (&joint.detail.plate, &joint.detail.bolts);
        let (half, height) = (plate.width / 2.0, plate.top - plate.bottom);
        let hole = hardware::size(bolts.diameter).hole;
        let holes: Vec<_> = bolts
            .rows
            .iter()
            .flat_map(|row| [-0.5, 0.5].map(|side| ([side * bolts.gauge, row - plate.bottom], hole)))
            .collect();
        let corners = [[-half, 0.0], [half, 0.0], [half, height], [-half, height]];
        let frame = Frame { origin: face.soffit + DVec3::Z * plate.bottom, z: face.out, x: DVec3::Z.cross(face.out) };
        let profile = outline_with_holes(&corners, &holes);
        let name = format!("{owner}/plate {}-{}", beam.mark, if which == "start" { 1 } else { 2 });
        self.plate(&name, "END PLATE", level(beam), frame, profile, plate.thickness, &plate.grade)
    }

    fn beam_welds(&mut self, owner: &str, beam: &Beam, joint: &Joint, face: Face) -> io::Result<Vec<Reference>> {
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

    fn weld(&mut self, owner: &str, level: f64, seam: &Seam, throat: f64, body: bool) -> io::Result<Reference> {
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

    fn bolts(
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
