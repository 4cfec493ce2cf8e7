//! The model as a whole: project, site, storeys, who holds what, and which material belongs to whom.

use std::collections::BTreeMap;
use std::io;

use glam::{DVec3, dvec3};

use super::building::{Beam, Building, Owner, Section};
use super::entity::{Declared::*, Entity, Field, Link, Simple, Sink, links};
use super::shapes::{axes, moved, placement};
use super::{parts, space};

/// A class and a number.
pub type Reference = (&'static str, u64);

/// The model while it is written. Only ids are kept of what has been written.
pub struct Model<'a> {
    /// What is to be written.
    pub building: &'a Building,
    sink: &'a mut dyn Sink,
    /// The subcontext of bodies.
    pub body: u64,
    /// The subcontext of axes.
    pub axis: u64,
    storeys: Vec<Storey>,
    shared: BTreeMap<String, Reference>,
    plain_materials: BTreeMap<String, Vec<Reference>>,
    member_materials: BTreeMap<(String, String), Vec<Reference>>,
}

struct Storey {
    id: u64,
    placement: u64,
    holds: Vec<Reference>,
}

/// Writes the building, entity by entity.
pub fn write(building: &Building, sink: &mut dyn Sink) -> io::Result<()> {
    let [project, site, hall, site_placement, hall_placement, context, body, axis] = [(); 8].map(|()| sink.new_id());
    let storeys = building
        .storeys
        .iter()
        .map(|_| Storey { id: sink.new_id(), placement: sink.new_id(), holds: Vec::new() })
        .collect();
    let mut model = Model {
        building,
        sink,
        body,
        axis,
        storeys,
        shared: BTreeMap::new(),
        plain_materials: BTreeMap::new(),
        member_materials: BTreeMap::new(),
    };
    let root = model.project(project, site, [context, body, axis]);
    model.put(root)?;
    let stiffeners = parts::stiffeners_by_column(building);
    for (index, stiffeners) in stiffeners.iter().enumerate() {
        model.column(index, stiffeners)?;
    }
    let column_ids: Vec<u64> =
        building.columns.iter().filter_map(|column| model.known(&format!("column {}", column.mark))).collect();
    for index in 0..building.beams.len() {
        model.beam(index, &column_ids)?;
    }
    for part in model.fittings(Owner::Loose, 0.0)? {
        model.contain(0.0, part);
    }
    for bolting in &building.boltings {
        model.bolting(bolting)?;
    }
    model.spaces(site, hall, site_placement, hall_placement)?;
    model.materials()
}

impl Model<'_> {
    /// A new number.
    pub fn new_id(&mut self) -> u64 {
        self.sink.new_id()
    }

    /// Writes an entity.
    pub fn put(&mut self, entity: Entity) -> io::Result<()> {
        self.sink.put(entity)
    }

    /// The path from which a part's GlobalId follows.
    pub fn path(&self, rest: &str) -> String {
        format!("{}/{rest}", self.building.name)
    }

    /// The number of something shared that has been written.
    pub fn known(&self, key: &str) -> Option<u64> {
        self.shared.get(key).map(|(_, id)| *id)
    }

    /// Keeps a number under a key.
    pub fn remember(&mut self, key: String, reference: Reference) {
        self.shared.insert(key, reference);
    }

    /// Something that many share: defined at its first use, referred to afterwards.
    pub fn share(&mut self, key: &str, make: impl FnOnce(&mut Self) -> Entity) -> Link {
        if let Some((class, id)) = self.shared.get(key) {
            return Link::To(class, *id);
        }
        let id = self.new_id();
        let entity = make(self).id(id);
        self.shared.insert(key.to_owned(), (entity.class, id));
        entity.into()
    }

    /// Puts an element into the storey of a level.
    pub fn contain(&mut self, level: f64, element: Reference) {
        let storey = self.storey(level);
        self.storeys[storey].holds.push(element);
    }

    /// A placement relative to the storey of a level; the frame is the world's less the site's origin.
    pub fn placed(&self, level: f64, frame: space::Frame) -> Entity {
        let storey = self.storey(level);
        let below = dvec3(0.0, 0.0, self.building.storeys[storey].elevation);
        placement(Some(self.storeys[storey].placement), space::Frame { origin: frame.origin - below, ..frame })
    }

    /// The highest storey that is not above the level.
    fn storey(&self, level: f64) -> usize {
        self.building.storeys.iter().rposition(|storey| storey.elevation <= level + 1.0).unwrap_or(0)
    }

    /// Says that a plate or a bolt is of a material.
    pub fn of_material(&mut self, material: &str, element: Reference) {
        self.plain_materials.entry(material.to_owned()).or_default().push(element);
    }

    /// Says that a member is of a section and a grade.
    pub fn of_profile(&mut self, section: &Section, grade: &str, element: Reference) {
        self.member_materials.entry((section.name.clone(), grade.to_owned())).or_default().push(element);
    }

    /// A relation that gives an object a property set; both are shared by all who use the key.
    pub fn shared_properties(
        &mut self,
        key: &str,
        set: &str,
        properties: &[(&'static str, &'static str, Simple)],
    ) -> Link {
        self.share(&format!("relation {key}"), |model| {
            let definition = model.property_set(key, set, properties);
            Entity::root("IfcRelDefinesByProperties", &model.path(&format!("relation {key}"))).one(
                "RelatingPropertyDefinition",
                Select,
                definition,
            )
        })
    }

    /// A relation of its own that gives an object a property set shared by all who use the key.
    pub fn properties(
        &mut self,
        owner: &str,
        key: &str,
        set: &str,
        properties: &[(&'static str, &'static str, Simple)],
    ) -> Link {
        let definition = self.share(&format!("set {key}"), |model| model.property_set(key, set, properties));
        let path = self.path(&format!("{owner}/{set}"));
        Entity::root("IfcRelDefinesByProperties", &path).one("RelatingPropertyDefinition", Select, definition).into()
    }

    fn property_set(&self, key: &str, set: &str, properties: &[(&'static str, &'static str, Simple)]) -> Entity {
        let property = |(name, of, value): &(&str, &'static str, Simple)| {
            Entity::new("IfcPropertySingleValue")
                .text("Name", name)
                .field(Field::Typed("NominalValue", of, value.clone()))
                .into()
        };
        Entity::root("IfcPropertySet", &self.path(&format!("set {key}")))
            .text("Name", set)
            .many("HasProperties", properties.iter().map(property).collect())
    }

    fn aggregates(&self, whole: &str, parts: &[Reference]) -> Vec<Link> {
        let path = self.path(&format!("{whole}/parts"));
        vec![Entity::root("IfcRelAggregates", &path).many("RelatedObjects", links(parts)).into()]
    }

    /// A shipping piece of parts that are welded in the shop.
    pub fn piece(&mut self, mark: &str, name: &str, level: f64, parts: &[Reference]) -> io::Result<()> {
        let id = self.new_id();
        let owner = format!("piece {mark}");
        let piece = Entity::root("IfcElementAssembly", &self.path(&owner))
            .id(id)
            .text("Name", name)
            .text("ObjectType", "shipping piece")
            .text("Tag", mark)
            .token("AssemblyPlace", "FACTORY")
            .token("PredefinedType", "USERDEFINED")
            .held("IsDecomposedBy", "RelatingObject", self.aggregates(&owner, parts))
            .one("ObjectPlacement", Wider, self.placed(level, moved(DVec3::Z * level)));
        self.contain(level, ("IfcElementAssembly", id));
        self.put(piece)
    }

    fn project(&self, id: u64, site: u64, [context, body, axis]: [u64; 3]) -> Entity {
        let subcontext = |id, identifier, target| {
            Entity::new("IfcGeometricRepresentationSubContext")
                .id(id)
                .text("ContextIdentifier", identifier)
                .text("ContextType", "Model")
                .token("TargetView", target)
                .into()
        };
        let unit = |unit_type, prefix: Option<&'static str>, name| {
            let unit = Entity::new("IfcSIUnit").token("UnitType", unit_type);
            let unit = match prefix {
                Some(prefix) => unit.token("Prefix", prefix),
                None => unit,
            };
            unit.token("Name", name).into()
        };
        let units = vec![
            unit("LENGTHUNIT", Some("MILLI"), "METRE"),
            unit("AREAUNIT", None, "SQUARE_METRE"),
            unit("VOLUMEUNIT", None, "CUBIC_METRE"),
            unit("PLANEANGLEUNIT", None, "RADIAN"),
            unit("MASSUNIT", Some("KILO"), "GRAM"),
            unit("FORCEUNIT", Some("KILO"), "NEWTON"),
        ];
        let model_context = Entity::new("IfcGeometricRepresentationContext")
            .id(context)
            .text("ContextType", "Model")
            .integer("CoordinateSpaceDimension", 3)
            .real("Precision", 1e-4)
            .one("WorldCoordinateSystem", Select, axes(moved(DVec3::ZERO)))
            .held(
                "HasSubContexts",
                "ParentContext",
                vec![subcontext(body, "Body", "MODEL_VIEW"), subcontext(axis, "Axis", "GRAPH_VIEW")],
            );
        Entity::root("IfcProject", &self.path("project"))
            .id(id)
            .text("Name", &self.building.name)
            .held("IsDecomposedBy", "RelatingObject", self.aggregates("project", &[("IfcSite", site)]))
            .many("RepresentationContexts", vec![model_context.into()])
            .one("UnitsInContext", Exactly, Entity::new("IfcUnitAssignment").many("Units", units))
    }

    /// Site, building and storeys come after the elements: only now is it known what they hold.
    fn spaces(&mut self, site: u64, hall: u64, site_placement: u64, hall_placement: u64) -> io::Result<()> {
        let [x, y, z] = self.building.site;
        self.put(
            Entity::root("IfcSite", &self.path("site"))
                .id(site)
                .text("Name", "Site")
                .token("CompositionType", "ELEMENT")
                .held("IsDecomposedBy", "RelatingObject", self.aggregates("site", &[("IfcBuilding", hall)]))
                .one("ObjectPlacement", Wider, placement(None, moved(dvec3(x, y, z))).id(site_placement)),
        )?;
        let storeys = std::mem::take(&mut self.storeys);
        let ids: Vec<Reference> = storeys.iter().map(|storey| ("IfcBuildingStorey", storey.id)).collect();
        self.put(
            Entity::root("IfcBuilding", &self.path("building"))
                .id(hall)
                .text("Name", &self.building.name)
                .token("CompositionType", "ELEMENT")
                .held("IsDecomposedBy", "RelatingObject", self.aggregates("building", &ids))
                .one("ObjectPlacement", Wider, placement(Some(site_placement), moved(DVec3::ZERO)).id(hall_placement)),
        )?;
        let building = self.building;
        for (storey, said) in storeys.iter().zip(&building.storeys) {
            let owner = format!("storey {}", said.name);
            let entity = Entity::root("IfcBuildingStorey", &self.path(&owner))
                .id(storey.id)
                .text("Name", &said.name)
                .token("CompositionType", "ELEMENT")
                .real("Elevation", said.elevation)
                .one(
                    "ObjectPlacement",
                    Wider,
                    placement(Some(hall_placement), moved(DVec3::Z * said.elevation)).id(storey.placement),
                );
            let holds = Entity::root("IfcRelContainedInSpatialStructure", &self.path(&format!("{owner}/elements")))
                .many("RelatedElements", links(&storey.holds));
            let entity = if storey.holds.is_empty() {
                entity
            } else {
                entity.held("ContainsElements", "RelatingStructure", vec![holds.into()])
            };
            self.put(entity)?;
        }
        Ok(())
    }

    fn material(&mut self, name: &str) -> Link {
        self.share(&format!("material {name}"), |_| {
            Entity::new("IfcMaterial").text("Name", name).text("Category", "Steel")
        })
    }

    fn materials(&mut self) -> io::Result<()> {
        for ((section, grade), members) in std::mem::take(&mut self.member_materials) {
            let material = self.material(&grade);
            let profile = self.known(&format!("profile {section}")).expect("each member has written its profile");
            let profile = Entity::new("IfcMaterialProfile").one("Material", Exactly, material).one(
                "Profile",
                Wider,
                Link::To("IfcIShapeProfileDef", profile),
            );
            let set = Entity::new("IfcMaterialProfileSet")
                .text("Name", &section)
                .many("MaterialProfiles", vec![profile.into()]);
            let usage = Entity::new("IfcMaterialProfileSetUsage").integer("CardinalPoint", 5).one(
                "ForProfileSet",
                Exactly,
                set,
            );
            let path = self.path(&format!("material {section} {grade}"));
            self.put(associates(&path, &members, usage.into()))?;
        }
        for (name, elements) in std::mem::take(&mut self.plain_materials) {
            let material = self.material(&name);
            let path = self.path(&format!("material {name}"));
            self.put(associates(&path, &elements, material))?;
        }
        Ok(())
    }
}

fn associates(path: &str, elements: &[Reference], material: Link) -> Entity {
    Entity::root("IfcRelAssociatesMaterial", path).many("RelatedObjects", links(elements)).one(
        "RelatingMaterial",
        Select,
        material,
    )
}

/// The level by which a beam belongs to a storey: that of its floor.
pub fn level(beam: &Beam) -> f64 {
    beam.top
}
