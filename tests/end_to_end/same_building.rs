//! The same building in other units, elsewhere, turned or written otherwise: the same review.

use faying::review::{JointReview, Resistance, Review};

use super::bench::{owned, review, simple, written, written_as};
use crate::sample::boathouse::boathouse;
use crate::sample::folder;
use crate::writer::building::Building;
use crate::writer::entity::{Declared::*, Entity, Field, Link, Simple};
use crate::writer::ifcxml::Style;

/// Attributes of the written classes that are lengths.
const LENGTHS: [&str; 14] = [
    "Coordinates",
    "OverallWidth",
    "OverallDepth",
    "WebThickness",
    "FlangeThickness",
    "FilletRadius",
    "Depth",
    "Radius",
    "Elevation",
    "NominalDiameter",
    "NominalLength",
    "Precision",
    "XDim",
    "YDim",
];

/// All lengths in a unit of so many mm.
fn scale(entity: &mut Entity, unit: f64) {
    for field in &mut entity.fields {
        match field {
            Field::Simple(name, Simple::Real(value)) if LENGTHS.contains(name) => *value /= unit,
            Field::Simple(name, Simple::Reals(values)) if LENGTHS.contains(name) => {
                values.iter_mut().for_each(|value| *value /= unit);
            }
            Field::Typed(_, "IfcPositiveLengthMeasure", Simple::Real(value)) => *value /= unit,
            _ => {}
        }
    }
}

fn is_length_unit(entity: &mut Entity) -> bool {
    entity.class == "IfcSIUnit" && matches!(simple(entity, "UnitType"), Some(Simple::Token("LENGTHUNIT")))
}

fn in_metres(entity: &mut Entity) -> bool {
    scale(entity, 1000.0);
    if is_length_unit(entity) {
        entity.fields.retain(|field| !matches!(field, Field::Simple("Prefix", _)));
    }
    true
}

/// 25.4 mm by definition.
fn in_inches(entity: &mut Entity) -> bool {
    scale(entity, 25.4);
    if is_length_unit(entity) {
        let millimetre = std::mem::replace(entity, Entity::new("IfcConversionBasedUnit"));
        let exponents = [
            "LengthExponent",
            "MassExponent",
            "TimeExponent",
            "ElectricCurrentExponent",
            "ThermodynamicTemperatureExponent",
            "AmountOfSubstanceExponent",
            "LuminousIntensityExponent",
        ];
        let exponents = exponents.iter().fold(Entity::new("IfcDimensionalExponents"), |of, name| {
            of.integer(name, i64::from(*name == "LengthExponent"))
        });
        let measure = Entity::new("IfcMeasureWithUnit")
            .field(Field::Typed("ValueComponent", "IfcLengthMeasure", Simple::Real(25.4)))
            .one("UnitComponent", Select, millimetre);
        *entity = Entity::new("IfcConversionBasedUnit")
            .one("Dimensions", Exactly, exponents)
            .token("UnitType", "LENGTHUNIT")
            .text("Name", "INCH")
            .one("ConversionFactor", Exactly, measure);
    }
    true
}

/// Turned by 33.7° about the vertical.
fn turned(entity: &mut Entity) -> bool {
    if entity.class == "IfcSite" {
        let (sine, cosine) = 33.7_f64.to_radians().sin_cos();
        let axes =
            owned(entity, "ObjectPlacement").and_then(|place| owned(place, "RelativePlacement")).expect("placed");
        let direction = |of: [f64; 3]| Link::Own(Entity::new("IfcDirection").reals("DirectionRatios", &of));
        axes.fields.push(Field::One("Axis", Exactly, direction([0.0, 0.0, 1.0])));
        axes.fields.push(Field::One("RefDirection", Exactly, direction([cosine, sine, 0.0])));
    }
    true
}

fn reviewed(model: &str) -> Review {
    let schedule = std::fs::read_to_string(folder().join("schedule.toml")).expect("the sample's schedule");
    review(model, Some(&schedule)).expect("a review")
}

/// Everything that a joint's review says in words.
fn words(joint: &JointReview) -> Vec<String> {
    let mut words = vec![format!("{} {} {:?} {:?}", joint.mark, joint.kind, joint.outcome, joint.detail)];
    words.extend(joint.reasons.iter().chain(&joint.assumptions).cloned());
    words.extend(joint.findings.iter().map(|f| format!("{} {} {:?}", f.rule, f.message, f.elements)));
    words.extend(joint.inputs.iter().map(|(name, value, _)| format!("{name} {value}")));
    words.extend(joint.checks.iter().map(|c| format!("{} {} {} {}", c.id, c.title, c.clause, c.outcome)));
    words.extend(joint.plates.iter().map(|plate| format!("{} {:?} {:?}", plate.guid, plate.mark, plate.grade)));
    words.extend(joint.rows.iter().map(|row| format!("{} {}", row.row, row.governed_by)));
    words.extend(joint.difference.iter().flat_map(|(a, b)| a.iter().chain(b)).cloned());
    words.push(format!("{:?}", joint.resistance.governed_by));
    words
}

/// Every number of a joint's review.
fn numbers(joint: &JointReview) -> Vec<f64> {
    let of = |r: &Resistance| [r.moment_knm, r.moment_reversed_knm, r.shear_kn];
    let bolts = joint.bolts.iter();
    let mut numbers: Vec<f64> =
        bolts.flat_map(|bolts| bolts.row_heights_mm.iter().chain(&bolts.diameter_mm)).copied().collect();
    numbers.extend(of(&joint.resistance).into_iter().flatten());
    numbers.extend(joint.intended_resistance.iter().flat_map(of).flatten());
    numbers.extend(joint.required.iter().flat_map(|r| [r.utilisation, r.moment_resistance_knm]).flatten());
    numbers.extend(joint.checks.iter().flat_map(|c| [c.resistance, c.action, c.utilisation]).flatten());
    numbers.extend(joint.rows.iter().flat_map(|row| [row.lever_arm_mm, row.potential_kn, row.force_kn]));
    numbers.extend(joint.plates.iter().flat_map(|plate| [plate.thickness_mm, plate.width_mm, plate.depth_mm]));
    numbers.extend(joint.welds.iter().filter_map(|weld| weld.throat_mm));
    numbers
}

fn differences(a: &JointReview, b: &JointReview, relative: f64) -> Vec<String> {
    let (own, other) = (words(a), words(b));
    let mut found: Vec<String> = vec![format!("{} and {} sentences", own.len(), other.len())];
    found.retain(|_| own.len() != other.len());
    found.extend(own.iter().zip(&other).filter(|(a, b)| a != b).map(|(a, b)| format!("{a} | {b}")));
    let (own, other) = (numbers(a), numbers(b));
    assert_eq!(own.len(), other.len(), "{}", a.mark);
    let apart = |(x, y): &(&f64, &f64)| !((*x - *y).abs() <= relative * x.abs().max(1.0));
    found.extend(own.iter().zip(&other).filter(apart).map(|(x, y)| format!("{x} | {y}")));
    found.iter().map(|what| format!("{}: {what}", a.mark)).collect()
}

#[test]
fn the_review_is_of_the_building_not_of_its_text() {
    let flat = Style { flat: true, prefixed: false };
    let prefixed = Style { flat: false, prefixed: true };
    let at = |site: [f64; 3]| Building { site, ..boathouse() };
    let plain = reviewed(&written(&boathouse(), &|_| true));
    let far = |entity: &mut Entity| turned(entity) && in_metres(entity);
    // The writer writes millionths of the unit: of an inch that is 1.3e-5 mm in each of several added placements, 1e-6 of
    // a bolt's edge distance.
    let others = [
        ("in metres", written(&boathouse(), &in_metres), 1e-6),
        ("in inches", written(&boathouse(), &in_inches), 1e-5),
        ("flat", written_as(flat, &boathouse(), &|_| true), 1e-6),
        ("with a prefix", written_as(prefixed, &boathouse(), &|_| true), 1e-6),
        ("at the origin", written(&at([0.0; 3]), &|_| true), 1e-6),
        ("in a national grid", written(&at([4.3e8, 5.6e9, 1.2e5]), &|_| true), 1e-6),
        ("turned", written(&boathouse(), &turned), 1e-6),
        ("turned far away, in metres", written(&at([7e8, -7e8, 0.0]), &far), 1e-6),
    ];
    let mut wrong = Vec::new();
    for (how, model, relative) in others {
        let other = reviewed(&model);
        assert_eq!(plain.counts, other.counts, "{how}");
        assert_eq!(other.problems, [], "{how}");
        let pairs = plain.joints.iter().zip(&other.joints);
        let found: Vec<String> = pairs.flat_map(|(a, b)| differences(a, b, relative)).collect();
        if !found.is_empty() {
            wrong.push(format!("{how}: {} differences: {:#?}", found.len(), &found[..found.len().min(8)]));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
