//! What the takers of parts share: the graph, the units, who is related to whom, and the problems met on the way.

use std::cell::{Cell, RefCell};
use std::collections::HashMap;
use std::rc::Rc;
use std::sync::Arc;

use foldhash::fast::RandomState;
use glam::DAffine3;
use hashbrown::HashTable;

use super::Identity;
use super::kin::Kin;
use super::links::{Link, Links};
use super::properties::Property;
use super::solid::Solid;
use super::text::Text;
use super::units::Units;
use crate::exchange::{Entities, Entity, Exchange, Id, List, View};
use crate::origin::Problem;
use crate::rulebook::Rulebook;

/// The names of a part with what bears them.
pub(super) type Names<'a> = Rc<Vec<(&'static str, &'a str)>>;

/// One reading of an exchange, or of some of its elements. Its maps are only looked up, never walked.
pub(super) struct Reading<'a> {
    pub entities: &'a Entities,
    pub rulebook: &'a Rulebook,
    pub units: Units,
    pub links: Arc<Links>,
    /// World placements to which others are relative, and the one that was asked last.
    pub placements: RefCell<HashMap<Id, DAffine3, RandomState>>,
    pub last_placement: Cell<Option<(Id, DAffine3)>>,
    /// Solids of items that more than one part may use.
    pub solids_of: RefCell<HashMap<Id, Rc<Vec<Solid>>, RandomState>>,
    /// Texts that were already looked up.
    pub texts: RefCell<HashMap<Box<str>, Rc<Text<'a>>, RandomState>>,
    /// Kin that were already met, and the part that was asked last with its kin: it is asked for again and again.
    pub kins: RefCell<HashTable<Rc<Kin<'a>>>>,
    pub last_kin: RefCell<Option<(Id, Rc<Kin<'a>>)>>,
    pub hasher: RandomState,
    problems: RefCell<Vec<Problem>>,
}

/// What threads share of a reading.
#[derive(Clone)]
pub(super) struct Common<'a> {
    pub entities: &'a Entities,
    pub rulebook: &'a Rulebook,
    pub units: Units,
    pub links: Arc<Links>,
}

impl<'a> Common<'a> {
    /// Of an exchange; what is wrong with its units goes into the problems.
    pub fn of(exchange: &'a Exchange, rulebook: &'a Rulebook, problems: &mut Vec<Problem>) -> Self {
        let entities = &exchange.entities;
        Self { entities, rulebook, units: Units::read(exchange, problems), links: Arc::new(Links::of(entities)) }
    }

    /// A reading that shares it.
    pub fn reading(&self) -> Reading<'a> {
        Reading {
            entities: self.entities,
            rulebook: self.rulebook,
            units: self.units,
            links: self.links.clone(),
            placements: RefCell::default(),
            last_placement: Cell::default(),
            solids_of: RefCell::default(),
            texts: RefCell::default(),
            kins: RefCell::default(),
            last_kin: RefCell::default(),
            hasher: RandomState::default(),
            problems: RefCell::default(),
        }
    }
}

impl<'a> Reading<'a> {
    /// Notes what could not be understood.
    pub fn problem(&self, at: Entity<'_>, message: impl Into<String>) {
        self.problems.borrow_mut().push(Problem { at: Some(at.place()), message: message.into() });
    }

    /// All problems, as they were met.
    pub fn into_problems(self) -> Vec<Problem> {
        self.problems.into_inner()
    }

    /// How many problems were met.
    pub fn problems_met(&self) -> usize {
        self.problems.borrow().len()
    }

    /// Takes some solids off what may still be read; false once too many were asked for.
    pub fn spend(&self, solids: usize) -> bool {
        self.links.spend(solids)
    }

    /// The entities of a list attribute (or the single one it holds), one by one.
    pub fn each(&self, of: Entity<'a>, attribute: &str) -> impl Iterator<Item = Entity<'a>> + use<'a> {
        let mut value = of.value(attribute);
        while let View::Typed(_, inner) = value {
            value = inner.view();
        }
        let (list, one) = match value {
            View::List(items) => (Some(items), None),
            value => (None, value.entity()),
        };
        let entities = self.entities;
        list.into_iter().flat_map(List::iter).filter_map(View::entity).chain(one).map(|id| entities.get(id))
    }

    pub fn type_of(&self, object: Entity<'_>) -> Option<Entity<'a>> {
        self.links.types.of(object.id).next().map(|id| self.entities.get(id))
    }

    pub fn property_sets_of(&self, object: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.links.property_sets, object)
    }

    /// The object's own material definitions, else those of its type.
    pub fn materials_of(&self, object: Entity<'_>) -> Vec<Entity<'a>> {
        let own = self.several(&self.links.materials, object);
        match self.type_of(object) {
            Some(of_type) if own.is_empty() => self.several(&self.links.materials, of_type),
            _ => own,
        }
    }

    pub fn material_properties_of(&self, material: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.links.material_properties, material)
    }

    pub fn voids_of(&self, element: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.links.voids, element)
    }

    pub fn parts_of(&self, whole: Entity<'_>) -> Vec<Entity<'a>> {
        self.several(&self.links.parts, whole)
    }

    fn several(&self, link: &Link, key: Entity<'_>) -> Vec<Entity<'a>> {
        link.of(key.id).map(|id| self.entities.get(id)).collect()
    }

    /// The names that a part bears, with what bears them; the part's own first.
    pub fn names_of(&self, element: Entity<'_>) -> Names<'a> {
        self.kin(element).names.clone()
    }

    pub(super) fn names(&self, element: Entity<'a>, of_type: Option<Entity<'a>>) -> Names<'a> {
        let of_own = ["Name", "ObjectType", "Description"].map(|attribute| (attribute, element.text(attribute)));
        let of_type = of_type.into_iter().flat_map(|t| {
            [
                ("Name of its type", t.text("Name")),
                ("ElementType of its type", t.text("ElementType")),
                ("Description of its type", t.text("Description")),
            ]
        });
        Rc::new(of_own.into_iter().chain(of_type).filter_map(|(by, text)| Some((by, text?))).collect())
    }

    /// `PredefinedType` of the part, or of its type where the part leaves it open.
    pub fn predefined(&self, element: Entity<'_>) -> Option<&'a str> {
        self.kin(element).predefined
    }

    /// Who a part is. The mark is its Tag, else a property that means one; the tag of a type marks nothing.
    pub fn identity(&self, element: Entity<'_>) -> Identity {
        let mark = element.text("Tag").map(str::to_owned).or_else(|| {
            let by_property = || {
                let properties = self.properties_of(element);
                let marks =
                    |p: &&Property<'_>| p.means("mark") || (p.name == "Reference" && p.set.starts_with("Pset_"));
                let mark = properties.iter().filter(|p| !p.of_type).find(marks)?.text()?;
                Some(mark.into_owned())
            };
            self.kin(element).mark.get_or_init(by_property).clone()
        });
        Identity {
            guid: element.text("GlobalId").unwrap_or_default().to_owned(),
            class: element.class().to_owned(),
            name: element.text("Name").or(element.text("ObjectType")).unwrap_or_default().to_owned(),
            mark,
            place: element.place(),
        }
    }
}
