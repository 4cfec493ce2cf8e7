//! The project's units, as factors to mm and radians.

use crate::exchange::{Entity, Exchange, View};
use crate::origin::Problem;

/// Conversion-based units may stand on one another; deeper than this is no unit.
const DEPTH: usize = 4;

/// What a number of the exchange is multiplied by.
#[derive(Clone, Copy, Debug)]
pub(super) struct Units {
    /// mm per length unit.
    pub length: f64,
    /// Radians per plane angle unit.
    pub angle: f64,
}

impl Units {
    /// The units of the first project's `UnitsInContext`; units that merely lie in the file do not count.
    pub fn read(exchange: &Exchange, problems: &mut Vec<Problem>) -> Self {
        let project = exchange.entities.of_class("IfcProject").next();
        let units = project.and_then(|p| p.entity("UnitsInContext")).map(|a| a.entities("Units")).unwrap_or_default();
        let of_type = |wanted: &str| units.iter().copied().find(|u| measures(*u) == Some(wanted));
        let length = of_type("LENGTHUNIT");
        let metres = length.and_then(|unit| si_factor(unit, 0)).filter(|f| *f > 0.0 && f.is_finite());
        if metres.is_none() {
            problems.push(Problem {
                at: length.or(project).map(Entity::place),
                message: match length {
                    Some(unit) => format!(
                        "The length unit {} can't be understood; allowed are the metre with an SI prefix and units converted to it. \
                         The metre is assumed.",
                        unit.text("Name").or(unit.token("Name")).unwrap_or("without a name")
                    ),
                    None => "The project states no length unit; the SI metre is assumed, as the IFC standard says.".into(),
                },
            });
        }
        let angle = of_type("PLANEANGLEUNIT").and_then(|unit| si_factor(unit, 0)).filter(|f| *f > 0.0 && f.is_finite());
        Self { length: metres.unwrap_or(1.0) * 1e3, angle: angle.unwrap_or(1.0) }
    }
}

/// mm per length unit of a property's own unit.
pub(super) fn length_unit(unit: Entity<'_>) -> Option<f64> {
    if measures(unit) != Some("LENGTHUNIT") {
        return None;
    }
    si_factor(unit, 0).map(|metres| metres * 1e3)
}

/// What a unit measures; an SI unit says it by its name where an export left `UnitType` out.
fn measures(unit: Entity<'_>) -> Option<&str> {
    unit.token("UnitType").or_else(|| match unit.token("Name") {
        Some("METRE") => Some("LENGTHUNIT"),
        Some("RADIAN") => Some("PLANEANGLEUNIT"),
        _ => None,
    })
}

/// The factor to the SI unit without prefix: metre, radian.
fn si_factor(unit: Entity<'_>, depth: usize) -> Option<f64> {
    if depth > DEPTH {
        return None;
    }
    if unit.is_a("IfcSIUnit") {
        return match unit.token("Name")? {
            "METRE" | "RADIAN" => prefix(unit.value("Prefix")),
            _ => None,
        };
    }
    if unit.is_a("IfcConversionBasedUnit") {
        let stated = unit.entity("ConversionFactor").and_then(|factor| {
            let base = si_factor(factor.entity("UnitComponent")?, depth + 1)?;
            Some(factor.number("ValueComponent")? * base)
        });
        return stated.or_else(|| by_name(unit.text("Name")?));
    }
    None
}

/// The international inch and foot (exact by definition), for a unit that lost its factor.
fn by_name(name: &str) -> Option<f64> {
    match name.to_ascii_lowercase().as_str() {
        "inch" => Some(0.0254),
        "foot" => Some(0.3048),
        _ => None,
    }
}

/// SI prefixes of `IfcSIPrefix`; an unknown one is no unit.
fn prefix(value: View) -> Option<f64> {
    let View::Token(prefix) = value else { return Some(1.0) };
    Some(match prefix {
        "EXA" => 1e18,
        "PETA" => 1e15,
        "TERA" => 1e12,
        "GIGA" => 1e9,
        "MEGA" => 1e6,
        "KILO" => 1e3,
        "HECTO" => 1e2,
        "DECA" => 1e1,
        "DECI" => 1e-1,
        "CENTI" => 1e-2,
        "MILLI" => 1e-3,
        "MICRO" => 1e-6,
        "NANO" => 1e-9,
        "PICO" => 1e-12,
        "FEMTO" => 1e-15,
        "ATTO" => 1e-18,
        _ => return None,
    })
}
