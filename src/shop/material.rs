//! Materials of a part and the steel grade that they name.

use std::borrow::Cow;
use std::rc::Rc;

use super::kin::said_of;
use super::profile::Profile;
use super::properties::{By, Property};
use super::reading::Reading;
use crate::exchange::Entity;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::Grade;

/// Sets and usages of materials nest; deeper than this is none.
const DEPTH: usize = 5;

/// A text about a part's material, with what holds it.
pub(super) struct Said<'a> {
    pub by: By<'a>,
    pub text: Cow<'a, str>,
    pub at: Entity<'a>,
}

impl<'a> Reading<'a> {
    /// The materials of a part: through sets, lists and usages.
    fn materials(&self, element: Entity<'a>) -> Vec<Entity<'a>> {
        let mut materials = Vec::new();
        for definition in self.materials_of(element) {
            gather(definition, 0, &mut |e| {
                if e.is_a("IfcMaterial") {
                    materials.push(e);
                }
            });
        }
        materials
    }

    /// Names that a material profile set gives to the section.
    pub fn profile_set_names(&self, element: Entity<'a>) -> Vec<(String, String)> {
        let mut names = Vec::new();
        let mut note = |by: &str, text: Option<&str>| names.extend(text.map(|t| (by.to_owned(), t.to_owned())));
        for definition in self.materials_of(element) {
            gather(definition, 0, &mut |e| match e.class() {
                "IfcMaterialProfileSet" => note("name of the material profile set", e.text("Name")),
                "IfcMaterialProfile" => {
                    note("name of the material profile", e.text("Name"));
                    note("profile of the material", e.entity("Profile").and_then(|p| p.text("ProfileName")));
                }
                _ => {}
            });
        }
        names
    }

    /// The profiles that a material profile set gives to the section.
    pub fn material_profiles(&self, element: Entity<'a>) -> Vec<Profile> {
        let mut profiles = Vec::new();
        for definition in self.materials_of(element) {
            gather(definition, 0, &mut |e| {
                if e.is_a("IfcMaterialProfile") {
                    profiles.extend(e.entity("Profile").and_then(|p| self.profile(p).ok()));
                }
            });
        }
        profiles
    }

    /// What a part's materials are called.
    pub fn material_texts(&self, element: Entity<'a>) -> Vec<Said<'a>> {
        let mut texts = Vec::new();
        for material in self.materials(element) {
            for (attribute, by) in [
                ("Name", "material"),
                ("Category", "Category of the material"),
                ("Description", "Description of the material"),
            ] {
                texts.extend(material.text(attribute).map(|t| Said {
                    by: By::Words(by),
                    text: t.into(),
                    at: material,
                }));
            }
        }
        texts
    }

    /// Whether a material says that the part is of no steel.
    pub fn not_of_steel(&self, element: Entity<'a>) -> Option<String> {
        self.kin(element).not_of_steel.get_or_init(|| self.no_steel(element)).clone()
    }

    fn no_steel(&self, element: Entity<'a>) -> Option<String> {
        let concrete = |text: &str| {
            // A concrete class: C25/30.
            text.split_whitespace().any(|word| {
                let classes = word.strip_prefix(['C', 'c']).and_then(|rest| rest.split_once('/'));
                classes.is_some_and(|(a, b)| {
                    [a, b].iter().all(|n| !n.is_empty() && n.len() <= 3 && n.chars().all(|c| c.is_ascii_digit()))
                })
            })
        };
        let mut texts = self.material_texts(element).into_iter();
        texts.find(|said| self.says("no-steel", &said.text) || concrete(&said.text)).map(|said| said.text.into_owned())
    }

    /// The steel grade of a part, from its materials and its properties; never from other parts.
    pub fn grade(&self, element: Entity<'a>) -> Known<Grade> {
        let (with, grade) = self.once(element, &self.kin(element).grade, || Rc::new(self.find_grade(element)));
        said_of(&grade, with, element)
    }

    fn find_grade(&self, element: Entity<'a>) -> Known<Grade> {
        let missing = |reason: String| Missing {
            what: "steel grade".into(),
            reason,
            at: Some(element.place()),
            ask: Ask::Fabricator,
        };
        let mut said = self.material_texts(element);
        let states = |p: &&Property<'_>| p.name == "StructuralGrade" || p.means("grade");
        for material in self.materials(element) {
            said.extend(self.properties_of_material(material).iter().filter(states).filter_map(said_by));
        }
        said.extend(self.properties_of(element).iter().filter(states).filter_map(said_by));
        let mut found = said.iter().filter_map(|s| Some((s, self.text(&s.text).grade()?)));
        let Some((witness, grade)) = found.next() else {
            let texts: Vec<String> = said.iter().map(|s| format!("{} \"{}\"", s.by, s.text)).collect();
            return Err(missing(if texts.is_empty() {
                "no material or property of the part states one".into()
            } else {
                format!("{} names no steel grade", texts.join(", "))
            }));
        };
        if let Some((other_witness, other)) = found.find(|(_, other)| *other != grade) {
            return Err(missing(format!(
                "{} \"{}\" and {} \"{}\" name two grades, {} and {}",
                witness.by, witness.text, other_witness.by, other_witness.text, grade.0, other.0
            )));
        }
        let by = format!("{} \"{}\"", witness.by, witness.text);
        Ok(Datum::new(grade, Origin::Modelled { by, at: Some(witness.at.place()) }))
    }
}

pub(super) fn said_by<'a>(property: &Property<'a>) -> Option<Said<'a>> {
    Some(Said { by: property.by(), text: property.text()?, at: property.entity })
}

/// Walks down a material definition.
fn gather<'a>(definition: Entity<'a>, depth: usize, see: &mut dyn FnMut(Entity<'a>)) {
    see(definition);
    if depth >= DEPTH {
        return;
    }
    for attribute in [
        "Materials",
        "ForProfileSet",
        "MaterialProfiles",
        "ForLayerSet",
        "MaterialLayers",
        "MaterialConstituents",
        "Material",
    ] {
        for inner in definition.entities(attribute) {
            gather(inner, depth + 1, see);
        }
    }
}
