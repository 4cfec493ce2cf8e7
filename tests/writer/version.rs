//! What differs between the versions of IFC in what this writer writes.

use std::collections::BTreeMap;
use std::io;
use std::sync::LazyLock;

use glam::DVec3;

use super::entity::{Declared::*, Entity, Field, Link, Sink};
use super::schema::Schema;
use super::shapes::{axes, flat_axes, moved};

/// A version of IFC.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Version {
    /// IFC2X3 TC1.
    Ifc2x3,
    /// IFC4 ADD2 TC1: entities are described by its names.
    Ifc4,
    /// IFC4X3.
    Ifc4x3,
}

/// What IFC2X3 can't say: attributes that came later.
const LATER: [(&str, &str); 10] = [
    ("IfcBeam", "PredefinedType"),
    ("IfcColumn", "PredefinedType"),
    ("IfcPlate", "PredefinedType"),
    ("IfcBuildingElementProxy", "PredefinedType"),
    ("IfcFastener", "PredefinedType"), // that it is a weld is told by its name and property set only
    ("IfcMechanicalFastener", "PredefinedType"),
    ("IfcMechanicalFastenerType", "PredefinedType"),
    ("IfcMechanicalFastenerType", "NominalDiameter"),
    ("IfcMechanicalFastenerType", "NominalLength"),
    ("IfcMaterial", "Category"),
];

impl Version {
    /// As STEP files name it.
    pub fn name(self) -> &'static str {
        match self {
            Self::Ifc2x3 => "IFC2X3",
            Self::Ifc4 => "IFC4",
            Self::Ifc4x3 => "IFC4X3_ADD2",
        }
    }

    /// Its entities.
    pub fn schema(self) -> &'static Schema {
        static IFC2X3: LazyLock<Schema> =
            LazyLock::new(|| Schema::parse(include_str!("../../src/exchange/schema/ifc2x3.txt")));
        static IFC4: LazyLock<Schema> =
            LazyLock::new(|| Schema::parse(include_str!("../../src/exchange/schema/ifc4.txt")));
        static IFC4X3: LazyLock<Schema> =
            LazyLock::new(|| Schema::parse(include_str!("../../src/exchange/schema/ifc4x3.txt")));
        match self {
            Self::Ifc2x3 => &IFC2X3,
            Self::Ifc4 => &IFC4,
            Self::Ifc4x3 => &IFC4X3,
        }
    }
}

/// Writes entities of IFC4 as those of IFC2X3.
pub struct AsIfc2x3<S> {
    /// Where they go.
    pub to: S,
    owner: u64,
    /// The relation that gives each property set to all who have it; there may be only one.
    given: BTreeMap<u64, u64>,
}

impl<S: Sink> AsIfc2x3<S> {
    /// Writes who made it all: IFC2X3 wants that of every IfcRoot.
    pub fn begin(mut to: S) -> io::Result<Self> {
        let owner = to.new_id();
        let firm = to.new_id();
        let organization = Entity::new("IfcOrganization").id(firm).text("Name", "an invented fabricator");
        let person = Entity::new("IfcPerson").text("FamilyName", "a nobody");
        let user = Entity::new("IfcPersonAndOrganization").one("ThePerson", Exactly, person).one(
            "TheOrganization",
            Exactly,
            organization,
        );
        let application = Entity::new("IfcApplication")
            .one("ApplicationDeveloper", Exactly, Link::To("IfcOrganization", firm))
            .text("Version", "1.0")
            .text("ApplicationFullName", "an invented authoring program")
            .text("ApplicationIdentifier", "invented");
        to.put(
            Entity::new("IfcOwnerHistory")
                .id(owner)
                .one("OwningUser", Exactly, user)
                .one("OwningApplication", Exactly, application)
                .token("ChangeAction", "NOCHANGE")
                .integer("CreationDate", 1_714_640_400),
        )?;
        Ok(Self { to, owner, given: BTreeMap::new() })
    }

    fn adapt(&mut self, entity: &mut Entity) {
        let class = entity.class;
        entity.fields.retain(|field| match field {
            Field::Simple(name, _) => !LATER.contains(&(class, *name)),
            _ => true,
        });
        let has = |name: &str| entity.fields.iter().any(|field| field.name() == name);
        // these were not optional yet
        let place = match class {
            "IfcIShapeProfileDef" | "IfcCircleProfileDef" | "IfcCircleHollowProfileDef" if !has("Position") => {
                Some(flat_axes(&[0.0, 0.0]))
            }
            "IfcExtrudedAreaSolid" if !has("Position") => Some(axes(moved(DVec3::ZERO))),
            _ => None,
        };
        entity.fields.extend(place.map(|place| Field::One("Position", Exactly, place.into())));
        if has_global_id(entity) {
            entity.fields.push(Field::One("OwnerHistory", Exactly, Link::To("IfcOwnerHistory", self.owner)));
        }
        // material profiles came later: the plain material stands in, the profile is told by the body
        for field in &mut entity.fields {
            if let Field::One("RelatingMaterial", _, link) = field {
                while let Link::Own(usage) = link
                    && let Some(inner) = usage.fields.iter_mut().find_map(of_profile)
                {
                    *link = inner;
                }
            }
        }
        for link in entity.fields.iter_mut().flat_map(Field::links_mut) {
            self.give_once(link);
            if let Link::Own(owned) = link {
                self.adapt(owned);
            }
        }
    }

    /// A relation that gives a property set which another one gives already becomes that other one.
    fn give_once(&mut self, link: &mut Link) {
        let Link::Own(relation) = link else { return };
        let mut fields = relation.fields.iter();
        let set = fields.find_map(|field| match field {
            Field::One("RelatingPropertyDefinition", _, Link::Own(set)) => set.id,
            Field::One("RelatingPropertyDefinition", _, Link::To(_, id)) => Some(*id),
            _ => None,
        });
        let Some(set) = set else { return };
        if let Some(other) = self.given.get(&set) {
            *link = Link::To(relation.class, *other);
        } else {
            let id = *relation.id.get_or_insert_with(|| self.to.new_id());
            self.given.insert(set, id);
        }
    }
}

fn has_global_id(entity: &Entity) -> bool {
    entity.fields.iter().any(|field| field.name() == "GlobalId")
}

/// What lies one step nearer to the material in the usage of a set of profiles.
fn of_profile(field: &mut Field) -> Option<Link> {
    match field {
        Field::One("ForProfileSet" | "Material", _, link) => Some(link.clone()),
        Field::Many("MaterialProfiles", links) => links.first().cloned(),
        _ => None,
    }
}

impl<S: Sink> Sink for AsIfc2x3<S> {
    fn new_id(&mut self) -> u64 {
        self.to.new_id()
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        self.adapt(&mut entity);
        self.to.put(entity)
    }
}
