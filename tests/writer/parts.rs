//! The parts: members, plates and shipping pieces.

use std::io;

use glam::DVec3;

use super::building::{Beam, Building, Column, End, Fitting, Joint, Level, Notch, Owner, PlateAs, Section, Stiffener};
use super::entity::{Declared::*, Entity, Link, Simple, links};
use super::fastening::Seam;
use super::hardware;
use super::model::{Model, Reference, level};
use super::shapes::{
    Outline, extrusion, faceted, i_profile, moved, outline, outline_with_holes, representation, shape,
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
    pub fn column(&mut self, index: usize, stiffeners: &[Pair]) -> io::Result<()> {
        let column = &self.building.columns[index];
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
        parts.extend(self.fittings(Owner::Column(index), column.bottom)?);
        if parts.len() == 1 {
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
        let plate = self.plate(name, "STIFFENER", column.bottom, frame, (&corners, &[]), *thickness, grade)?;
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
        (corners, holes): Outline<'_>,
        thickness: f64,
        grade: &str,
    ) -> io::Result<Reference> {
        let class = match (self.building.plates, name) {
            (PlateAs::Plate, _) => "IfcPlate",
            (PlateAs::Member, "STIFFENER") => "IfcColumn",
            (PlateAs::Member, _) => "IfcBeam",
        };
        let this = (class, self.new_id());
        let mark = owner.rsplit([' ', '/']).next().unwrap_or(owner);
        let entity = Entity::root(class, &self.path(owner)).id(this.1).text("Name", name).text("Tag", mark);
        let (entity, shape) = match self.building.plates {
            PlateAs::Plate => {
                let profile = if holes.is_empty() { outline(corners) } else { outline_with_holes(corners, holes) };
                let body = self.solid(vec![extrusion(profile, None, thickness).into()]);
                (entity.token("PredefinedType", "SHEET"), body)
            }
            PlateAs::Member => {
                let brep = faceted(corners, holes, thickness).into();
                (entity, shape(representation(self.body, "Body", "Brep", vec![brep])))
            }
        };
        let entity =
            entity.one("ObjectPlacement", Wider, self.placed(level, frame)).one("Representation", Wider, shape);
        self.of_material(grade, this);
        self.put(entity)?;
        Ok(this)
    }

    /// Writes a beam, its end plates and their welds as one shipping piece, then its bolts and its relations.
    pub fn beam(&mut self, index: usize, columns: &[u64]) -> io::Result<()> {
        let building = self.building;
        let beam = &building.beams[index];
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
            .one("Representation", Wider, self.notched(index, extrusion(profile, None, start.distance(end))));
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
        pieces.extend(self.fittings(Owner::Beam(index), level(beam))?);
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

    /// A beam's body less its notches.
    fn notched(&self, index: usize, whole: Entity) -> Entity {
        let building = self.building;
        let beam = &building.beams[index];
        let [start, end] = ends(&building.columns, beam);
        let Section { h, b, .. } = beam.section;
        let mut body = whole;
        let notches: Vec<&Notch> = building.notches.iter().filter(|notch| notch.beam == index).collect();
        for notch in &notches {
            // Ten millimetres beyond the beam on all free sides.
            let (half, low) = (b / 2.0 + 10.0, h / 2.0 - notch.depth);
            let corners = [[-half, low], [half, low], [half, h / 2.0 + 10.0], [-half, h / 2.0 + 10.0]];
            let from = if notch.end == 0 { -10.0 } else { start.distance(end) - notch.length };
            let cutter = extrusion(outline(&corners), Some(moved(DVec3::Z * from)), notch.length + 10.0);
            body = Entity::new("IfcBooleanResult")
                .token("Operator", "DIFFERENCE")
                .one("FirstOperand", Select, body)
                .one("SecondOperand", Select, cutter);
        }
        let kind = if notches.is_empty() { "SweptSolid" } else { "CSG" };
        shape(representation(self.body, "Body", kind, vec![body.into()]))
    }

    /// Writes the fittings of a member with their welds.
    pub fn fittings(&mut self, on: Owner, level: f64) -> io::Result<Vec<Reference>> {
        let building = self.building;
        let mut parts = Vec::new();
        for fitting in building.fittings.iter().filter(|fitting| fitting.on == on) {
            let Fitting { name, frame, corners, holes, thickness, grade, .. } = fitting;
            let path = format!("fitting {}", fitting.mark);
            parts.push(self.plate(&path, name, level, *frame, (corners, holes), *thickness, grade)?);
            for (index, (seam, throat)) in fitting.seams.iter().enumerate() {
                parts.push(self.weld(&format!("{path}/weld {}", index + 1), level, seam, *throat, false)?);
            }
        }
        Ok(parts)
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
        let name = format!("{owner}/plate {}-{}", beam.mark, if which == "start" { 1 } else { 2 });
        self.plate(&name, "END PLATE", level(beam), frame, (&corners, &holes), plate.thickness, &plate.grade)
    }
}
