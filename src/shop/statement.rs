//! What attributes and properties state of a length, with the words that held it.

use super::material::Said;
use super::properties::{By, Plausible, Property};
use super::reading::Reading;
use crate::exchange::Entity;
use crate::origin::Origin;

/// A stated value.
#[derive(Clone, Copy)]
pub(super) struct Statement<'a, T> {
    pub value: T,
    /// Which attribute or property.
    pub by: By<'a>,
    pub at: Entity<'a>,
}

impl<T> Statement<'_, T> {
    /// Its origin, for a statement of `what`.
    pub fn origin(&self, what: &str) -> Origin {
        Origin::Modelled { by: format!("{} of the {what}", self.by), at: Some(self.at.place()) }
    }
}

impl<'a> Reading<'a> {
    /// A length attribute of the type, then of the part; zero is "nothing stated".
    pub fn attribute_lengths(&self, element: Entity<'a>, attribute: &'static str) -> Vec<Statement<'a, f64>> {
        let of = |entity: Entity<'a>, of_type: bool| {
            let value = entity.number(attribute)? * self.units.length;
            let by = By::Attribute { name: attribute, of_type };
            (value > 0.0 && value.is_finite()).then_some(Statement { value, by, at: entity })
        };
        let of_type = self.type_of(element).and_then(|t| of(t, true));
        of_type.into_iter().chain(of(element, false)).collect()
    }

    /// The lengths that some properties state; zero is "nothing stated", what can't be read becomes a problem.
    pub fn property_lengths(
        &self,
        element: Entity<'a>,
        properties: &[Property<'a>],
        plausible: Plausible,
        wanted: impl Fn(&Property<'a>) -> bool,
    ) -> Vec<Statement<'a, f64>> {
        let mut all = Vec::new();
        for property in properties.iter().filter(|p| wanted(p)) {
            match self.length_of(property, plausible) {
                Some(Ok((value, by))) if value > 0.0 => all.push(Statement { value, by, at: property.entity }),
                Some(Err(reason)) => self.problem(element, format!("{reason}; it is not taken.")),
                _ => {}
            }
        }
        all
    }
}

/// Names as texts about a part.
pub(super) fn first_text<'a>(names: &[(&'static str, &'a str)], element: Entity<'a>) -> Vec<Said<'a>> {
    names.iter().map(|(by, text)| Said { by: By::Words(by), text: (*text).into(), at: element }).collect()
}
