//! Properties and quantities of a part, and the lengths they state.

use std::borrow::Cow;
use std::fmt;
use std::rc::Rc;

use super::reading::Reading;
use super::text::Text;
use super::units::length_unit;
use crate::exchange::{Entity, View};

/// Complex properties nest; deeper than this nobody looks.
const DEPTH: usize = 4;
/// A set of more properties than this is a mistake (or an attack: nested sets can multiply).
const PROPERTIES: usize = 10_000;

/// One property of a part or a material.
pub(super) struct Property<'a> {
    /// The name of its set.
    pub set: &'a str,
    /// Its own name.
    pub name: &'a str,
    value: View<'a>,
    /// mm per unit, where it overrides the project's unit.
    unit: Option<f64>,
    /// Whether the part's type holds it.
    pub of_type: bool,
    /// Itself.
    pub entity: Entity<'a>,
    /// Its name, to be asked.
    words: Rc<Text<'a>>,
}

/// What holds a text, for people.
#[derive(Clone, Copy, Debug)]
pub(super) enum By<'a> {
    /// An attribute.
    Words(&'static str),
    /// A property.
    Property { set: &'a str, name: &'a str, of_type: bool },
    /// A property whose number has no unit, read as mm.
    Unitless { set: &'a str, name: &'a str, of_type: bool },
    /// An attribute, and the text that it holds.
    Named(&'static str, &'a str),
    /// An attribute of the part, or of its type.
    Attribute { name: &'static str, of_type: bool },
}

impl fmt::Display for By<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Words(words) => f.write_str(words),
            Self::Property { set, name, of_type } => {
                let of_type = if *of_type { " of the type" } else { "" };
                write!(f, "property \"{name}\" in \"{set}\"{of_type}")
            }
            Self::Unitless { set, name, of_type } => {
                let property = By::Property { set, name, of_type: *of_type };
                write!(f, "{property}, a number without unit read as mm")
            }
            Self::Named(by, text) => write!(f, "{by} \"{text}\""),
            Self::Attribute { name, of_type } => write!(f, "{name}{}", if *of_type { " of the type" } else { "" }),
        }
    }
}

/// Sizes that are plausible for what a property says, mm: they decide how a number without a unit is read.
#[derive(Clone, Copy)]
pub(super) struct Plausible(pub f64, pub f64);

impl<'a> Reading<'a> {
    /// A part's own properties, then those of its type that the part does not override.
    pub fn properties_of(&self, element: Entity<'_>) -> Rc<Vec<Property<'a>>> {
        self.kin(element).properties.get_or_init(|| Rc::new(self.collect_properties(element))).clone()
    }

    fn collect_properties(&self, element: Entity<'_>) -> Vec<Property<'a>> {
        let mut properties = Vec::new();
        for set in self.property_sets_of(element) {
            self.collect(set, false, &mut properties);
        }
        if let Some(of_type) = self.type_of(element) {
            let mut inherited = Vec::new();
            for set in of_type.entities("HasPropertySets") {
                self.collect(set, true, &mut inherited);
            }
            inherited.retain(|p| !properties.iter().any(|own| own.set == p.set && own.name == p.name));
            properties.append(&mut inherited);
        }
        properties
    }

    /// Properties of a material.
    pub fn properties_of_material(&self, material: Entity<'_>) -> Vec<Property<'a>> {
        let mut properties = Vec::new();
        for set in self.material_properties_of(material) {
            self.collect(set, false, &mut properties);
        }
        properties
    }

    /// What a property means as a length in mm, and a word on how it was read; an error if it is a number that can
    /// be read in two ways or in none, `None` if it is not a number at all. Zero stays zero.
    pub fn length_of(&self, property: &Property<'a>, plausible: Plausible) -> Option<Result<(f64, By<'a>), String>> {
        let (number, is_length) = property.number()?;
        let by = property.by();
        let unitless = By::Unitless { set: property.set, name: property.name, of_type: property.of_type };
        if !number.is_finite() {
            return Some(Err(format!("{by} is no finite number")));
        }
        let (low, high) = (plausible.0, plausible.1);
        let sane = |mm: f64| mm == 0.0 || (mm >= low && mm <= high);
        let strange = |mm: f64| Err(format!("{by} is {mm:.3} mm; plausible is {low} to {high} mm"));
        let as_project = number * property.unit.unwrap_or(self.units.length);
        // A plain number has no unit. Where the project counts in mm both readings are one.
        if property.unit.is_some() || is_length || (self.units.length - 1.0).abs() < 1e-9 {
            return Some(if sane(as_project) { Ok((as_project, by)) } else { strange(as_project) });
        }
        Some(match (sane(as_project), sane(number)) {
            (true, false) => Ok((as_project, by)),
            (false, true) => Ok((number, unitless)),
            (true, true) if number == 0.0 => Ok((0.0, by)),
            (true, true) => {
                Err(format!("{by} is {number} without a unit: it could be mm or the project's length unit"))
            }
            (false, false) => strange(as_project),
        })
    }
}

impl<'a> Property<'a> {
    /// How a report names it.
    pub fn by(&self) -> By<'a> {
        By::Property { set: self.set, name: self.name, of_type: self.of_type }
    }

    /// Whether its name stands for a concept of the vocabulary.
    pub fn means(&self, concept: &str) -> bool {
        self.words.words().means(concept)
    }

    /// Its value as text, trimmed, if there is any.
    pub fn text(&self) -> Option<Cow<'a, str>> {
        text(self.value).filter(|t| !t.is_empty())
    }

    /// Its value as a plain number.
    pub fn count(&self) -> Option<f64> {
        self.number().map(|(number, _)| number)
    }

    /// Its value as a number, and whether the exchange says that it is a length in the project's unit.
    fn number(&self) -> Option<(f64, bool)> {
        match self.value {
            View::Typed(of, inner) if of.ends_with("LengthMeasure") => inner.view().number().map(|n| (n, true)),
            value => value.number().map(|n| (n, false)).or_else(|| Some((number_in(&text(value)?)?, false))),
        }
    }
}

fn text(value: View<'_>) -> Option<Cow<'_, str>> {
    match value {
        View::Text(text) => Some(text.trim().into()),
        View::Token(token) => Some(token.into()),
        View::Number(number) => Some(number.to_string().into()),
        View::Integer(number) => Some(number.to_string().into()),
        View::Typed(_, inner) => match inner.view() {
            View::Typed(..) => None,
            inner => text(inner),
        },
        View::List(items) if items.len() == 1 => items.get(0).and_then(|item| match item {
            View::List(_) => None,
            item => text(item),
        }),
        _ => None,
    }
}

/// The number of a text that is nothing but a number, perhaps with "M" before or "mm" after it: `M20`, `22,0 mm`.
fn number_in(text: &str) -> Option<f64> {
    let bare = text.trim().trim_start_matches(['M', 'm', 'Ø', 'ø', '⌀']).trim();
    let bare = bare.strip_suffix("mm").unwrap_or(bare).trim().replace(',', ".");
    bare.parse().ok()
}

impl<'a> Reading<'a> {
    fn collect(&self, set: Entity<'a>, of_type: bool, into: &mut Vec<Property<'a>>) {
        let name = set.text("Name").unwrap_or_default();
        let mut budget = PROPERTIES;
        for list in ["HasProperties", "Properties", "Quantities"] {
            for property in set.entities(list) {
                self.flatten((name, of_type), property, 0, &mut budget, into);
            }
        }
    }

    fn flatten(
        &self,
        (set, of_type): (&'a str, bool),
        property: Entity<'a>,
        depth: usize,
        budget: &mut usize,
        into: &mut Vec<Property<'a>>,
    ) {
        let Some(left) = budget.checked_sub(1) else { return };
        *budget = left;
        for inner in property.entities("HasProperties") {
            if depth < DEPTH {
                self.flatten((set, of_type), inner, depth + 1, budget, into);
            }
        }
        let value = ["NominalValue", "EnumerationValues", "SetPointValue", "LengthValue", "CountValue"]
            .into_iter()
            .map(|attribute| property.value(attribute))
            .find(|value| !value.is_absent());
        if let (Some(value), Some(name)) = (value, property.text("Name")) {
            let unit = property.entity("Unit").and_then(length_unit);
            into.push(Property { set, name, value, unit, of_type, entity: property, words: self.text(name) });
        }
    }
}
