//! What is said of a part apart from its shape and place: parts by the thousand share it, so it is worked out once.

use std::cell::OnceCell;
use std::hash::BuildHasher;
use std::rc::Rc;

use super::bolt::BoltSaid;
use super::properties::Property;
use super::reading::{Names, Reading};
use super::weld::WeldSaid;
use super::words::Word;
use crate::exchange::{Entity, Id};
use crate::origin::{Known, Origin};
use crate::rulebook::Grade;

/// Kin that are kept at most; parts with names of their own must not fill the memory.
const KEPT: usize = 1 << 12;

/// What was worked out, and with which part of the kin: its place may stand in it.
pub(super) type Once<'a, T> = OnceCell<(Entity<'a>, T)>;

/// What tells parts apart besides their links; an own size is compared by its bits.
#[derive(Clone, Copy, PartialEq, Eq, Hash)]
struct Own<'a> {
    class: &'a str,
    name: Option<&'a str>,
    object_type: Option<&'a str>,
    description: Option<&'a str>,
    predefined: Option<&'a str>,
    sizes: [Option<u64>; 2],
    of_type: Option<Id>,
}

/// Parts of one class, with the same names, type, property sets and materials.
pub(super) struct Kin<'a> {
    own: Own<'a>,
    sets: Vec<Id>,
    materials: Vec<Id>,
    pub names: Names<'a>,
    pub predefined: Option<&'a str>,
    pub properties: OnceCell<Rc<Vec<Property<'a>>>>,
    pub mark: OnceCell<Option<String>>,
    pub called: OnceCell<Option<Word>>,
    pub is_weld: OnceCell<bool>,
    pub not_of_steel: OnceCell<Option<String>>,
    pub grade: Once<'a, Rc<Known<Grade>>>,
    pub bolt: Once<'a, Rc<BoltSaid<'a>>>,
    pub weld: Once<'a, Rc<WeldSaid>>,
}

impl<'a> Reading<'a> {
    /// The kin of a part.
    pub fn kin(&self, element: Entity<'_>) -> Rc<Kin<'a>> {
        if let Some((id, known)) = &*self.last_kin.borrow()
            && *id == element.id
        {
            return known.clone();
        }
        let element = self.entities.get(element.id);
        let of_type = self.type_of(element);
        let size = |attribute| element.number(attribute).map(f64::to_bits);
        let own = Own {
            class: element.class(),
            name: element.text("Name"),
            object_type: element.text("ObjectType"),
            description: element.text("Description"),
            predefined: element.token("PredefinedType"),
            sizes: [size("NominalDiameter"), size("NominalLength")],
            of_type: of_type.map(|of_type| of_type.id),
        };
        let sets = || self.links.property_sets.of(element.id);
        let materials = || self.links.materials.of(element.id);
        let is_kin = |kin: &Rc<Kin<'a>>| {
            kin.own == own && sets().eq(kin.sets.iter().copied()) && materials().eq(kin.materials.iter().copied())
        };
        let hash = self.hasher.hash_one(own);
        let mut kins = self.kins.borrow_mut();
        let kin = match kins.find(hash, is_kin) {
            Some(known) => known.clone(),
            None => {
                if kins.len() >= KEPT {
                    kins.clear();
                }
                let names = self.names(element, of_type);
                let predefined = own.predefined.filter(|t| *t != "NOTDEFINED");
                let predefined = predefined.or_else(|| of_type?.token("PredefinedType")).or(own.predefined);
                let new = Rc::new(Kin {
                    own,
                    sets: sets().collect(),
                    materials: materials().collect(),
                    names,
                    predefined,
                    properties: OnceCell::new(),
                    mark: OnceCell::new(),
                    called: OnceCell::new(),
                    is_weld: OnceCell::new(),
                    not_of_steel: OnceCell::new(),
                    grade: OnceCell::new(),
                    bolt: OnceCell::new(),
                    weld: OnceCell::new(),
                });
                kins.insert_unique(hash, new.clone(), |kin| self.hasher.hash_one(kin.own));
                new
            }
        };
        *self.last_kin.borrow_mut() = Some((element.id, kin.clone()));
        kin
    }

    /// What holds for all kin of a part, and the part with which it was worked out. What is a problem is told of each.
    pub fn once<T: Clone>(
        &self,
        element: Entity<'a>,
        known: &Once<'a, T>,
        work: impl FnOnce() -> T,
    ) -> (Entity<'a>, T) {
        if let Some(known) = known.get() {
            return known.clone();
        }
        let problems = self.problems_met();
        let new = (element, work());
        if self.problems_met() == problems {
            // Nobody else can have set it meanwhile but with the same.
            let _ = known.set(new.clone());
        }
        new
    }
}

/// What was worked out with one part, as said of another: what stood at the one stands at the other.
pub(super) fn said_of<T: Clone>(known: &Known<T>, with: Entity<'_>, of: Entity<'_>) -> Known<T> {
    let mut known = known.clone();
    let at = match &mut known {
        Ok(datum) => match &mut datum.origin {
            Origin::Modelled { at, .. } => at.as_mut(),
            _ => None,
        },
        Err(missing) => missing.at.as_mut(),
    };
    if let Some(at) = at.filter(|at| **at == with.place()) {
        *at = of.place();
    }
    known
}
