//! Properties and quantities of a part, and the lengths they state.

use super::reading::Reading;
use super::units::length_unit;
use crate::exchange::{Entity, View};
use crate::origin::Place;

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
    /// Where it stands.
    pub place: Place,
}

/// Sizes that are plausible for what a property says, mm: they decide how a number without a unit is read.
#[derive(Clone, Copy)]
pub(super) struct Plausible(pub f64, pub f64);

impl<'a> Reading<'a> {
    /// A part's own properties, then those of its type that the part does not override.
    pub fn properties_of(&self, element: Entity<'_>) -> Vec<Property<'a>> {
        let mut properties = Vec::new();
        for set in self.property_sets_of(element) {
            collect(set, false, &mut properties);
        }
        if let Some(of_type) = self.type_of(element) {
            let mut inherited = Vec::new();
            for set in of_type.entities("HasPropertySets") {
                collect(set, true, &mut inherited);
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
            collect(set, false, &mut properties);
        }
        properties
    }

    /// What a property means as a length in mm, and a word on how it was read; an error if it is a number that can
    /// be read in two ways or in none, `None` if it is not a number at all. Zero stays zero.
    pub fn length_of(&self, property: &Property<'_>, plausible: Plausible) -> Option<Result<(f64, String), String>> {
        let by = property.by();
        let (number, is_length) = property.number()?;
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
            (false, true) => Ok((number, format!("{by}, a number without unit read as mm"))),
            (true, true) if number == 0.0 => Ok((0.0, by)),
            (true, true) => {
                Err(format!("{by} is {number} without a unit: it could be mm or the project's length unit"))
            }
            (false, false) => strange(as_project),
        })
    }
}

impl Property<'_> {
    /// How a report names it.
    pub fn by(&self) -> String {
        let of_type = if self.of_type { " of the type" } else { "" };
        format!("property \"{}\" in \"{}\"{of_type}", self.name, self.set)
    }

    /// Its value as text, trimmed, if there is any.
    pub fn text(&self) -> Option<String> {
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

fn text(value: View) -> Option<String> {
    match value {
        View::Text(text) => Some(text.trim().to_owned()),
        View::Token(token) => Some(token.to_string()),
        View::Number(number) => Some(number.to_string()),
        View::Integer(number) => Some(number.to_string()),
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

fn collect<'a>(set: Entity<'a>, of_type: bool, into: &mut Vec<Property<'a>>) {
    let name = set.text("Name").unwrap_or_default();
    let mut budget = PROPERTIES;
    for list in ["HasProperties", "Properties", "Quantities"] {
        for property in set.entities(list) {
            flatten(name, property, of_type, 0, &mut budget, into);
        }
    }
}

fn flatten<'a>(
    set: &'a str,
    property: Entity<'a>,
    of_type: bool,
    depth: usize,
    budget: &mut usize,
    into: &mut Vec<Property<'a>>,
) {
    let Some(left) = budget.checked_sub(1) else { return };
    *budget = left;
    for inner in property.entities("HasProperties") {
        if depth < DEPTH {
            flatten(set, inner, of_type, depth + 1, budget, into);
        }
    }
    let value = ["NominalValue", "EnumerationValues", "SetPointValue", "LengthValue", "CountValue"]
        .into_iter()
        .map(|attribute| property.value(attribute))
        .find(|value| !value.is_absent());
    if let (Some(value), Some(name)) = (value, property.text("Name")) {
        let unit = property.entity("Unit").and_then(length_unit);
        into.push(Property { set, name, value, unit, of_type, place: property.place() });
    }
}
