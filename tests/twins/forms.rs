//! The sample building in every form.

use std::collections::BTreeMap;
use std::io::{Cursor, Write};

use faying::exchange::{Entity, Exchange, View, read};
use faying::report::json;

use super::{data, differences, reviewed, texts};
use crate::sample::boathouse::boathouse;
use crate::writer::Form::{self, *};
use crate::writer::bytes;
use crate::writer::ifcxml::Style;
use crate::writer::version::Version;

const NESTED: Form = IfcXml(Style { flat: false, prefixed: false });

/// Every form, what the reader calls it, and whether it is packed in a zip archive.
pub const FORMS: [(Form, &str, bool); 11] = [
    (NESTED, "IFC4 ifcXML", false),
    (IfcXml(Style { flat: true, prefixed: false }), "IFC4 ifcXML", false),
    (IfcXml(Style { flat: false, prefixed: true }), "IFC4 ifcXML", false),
    (FirstEdition, "IFC4 (first edition) ifcXML", false),
    (Step(Version::Ifc4), "IFC4 STEP", false),
    (NESTED, "IFC4 ifcXML", true),
    (Step(Version::Ifc4), "IFC4 STEP", true),
    (IfcXml4x3, "IFC4X3 ifcXML", false),
    (Step(Version::Ifc4x3), "IFC4X3 STEP", false),
    (Part28, "IFC2X3 ifcXML", false),
    (Step(Version::Ifc2x3), "IFC2X3 STEP", false),
];

/// What IFC2X3 can't say, and what the review says instead. It has no material profile sets (the profile of a member's
/// body tells the section in all forms), no types of fasteners with sizes and no PredefinedType of a weld; only the second
/// is seen in the review.
const LATER_THAN_2X3: [(&str, &str); 1] =
    [("NominalDiameter of the type of the fastener", "NominalDiameter of the fastener")];

/// The sample building; in an archive its name tells nothing of its form.
pub fn written(form: Form, zipped: bool) -> Vec<u8> {
    let plain = bytes(&boathouse(), form);
    if !zipped {
        return plain;
    }
    let mut zip = zip::ZipWriter::new(Cursor::new(Vec::new()));
    zip.start_file("model.ifc", zip::write::SimpleFileOptions::default()).expect("memory takes it");
    zip.write_all(&plain).expect("memory takes it");
    zip.finish().expect("memory takes it").into_inner()
}

/// The rooted entities, each written out up to the next rooted ones, which are named by their GlobalId, and how many
/// entities of each class there are. Lists of rooted entities are sets in all that is written here.
fn graph(exchange: &Exchange) -> Vec<String> {
    fn value(of: View, exchange: &Exchange) -> String {
        match of {
            View::Entity(id) => {
                let to = exchange.entities.get(id);
                to.text("GlobalId").map_or_else(|| attributes(to, exchange), |guid| format!("-> {guid}"))
            }
            View::List(items) => {
                let mut items: Vec<String> = items.iter().map(|item| value(item, exchange)).collect();
                if items.iter().all(|item| item.starts_with("->")) {
                    items.sort();
                }
                items.join(" ")
            }
            View::Typed(name, inner) => format!("{name}:{}", value(inner.view(), exchange)),
            other => format!("{other:?}"),
        }
    }
    fn attributes(entity: Entity, exchange: &Exchange) -> String {
        let given = entity.values().filter(|(_, value)| !value.is_absent());
        let given: Vec<String> = given.map(|(name, of)| format!("{name}={}", value(of, exchange))).collect();
        format!("{}[{}]", entity.class(), given.join(", "))
    }
    let mut all: Vec<String> = exchange.entities.of_class("IfcRoot").map(|e| attributes(e, exchange)).collect();
    let mut counts: BTreeMap<&str, usize> = BTreeMap::new();
    exchange.entities.all().for_each(|entity| *counts.entry(entity.class()).or_default() += 1);
    all.extend(counts.iter().map(|(class, count)| format!("{count} {class}")));
    all.sort();
    all
}

#[test]
fn forms_of_one_version_give_the_same_graph() {
    let mut first: BTreeMap<&str, Vec<String>> = BTreeMap::new();
    for (form, name, zipped) in FORMS {
        let exchange = read(&written(form, zipped), "model").expect("an exchange");
        assert_eq!((exchange.form.as_str(), &exchange.problems[..]), (name, &[][..]), "{form:?}");
        let graph = graph(&exchange);
        assert!(graph.len() > 600, "{form:?}: {}", graph.len());
        let version = name.split(' ').next().expect("a version");
        let twin = first.entry(version).or_insert_with(|| graph.clone());
        let apart = twin.iter().zip(&graph).find(|(a, b)| a != b);
        assert!(apart.is_none() && twin.len() == graph.len(), "{form:?}: {apart:#?}");
    }
    assert_eq!(first.len(), 3);
}

#[test]
fn every_form_gives_the_same_review() {
    let reports = |form, zipped| {
        let review = reviewed(&written(form, zipped));
        [data(json::review(&review)), data(json::survey(&review))]
    };
    let [review, survey] = reports(NESTED, false);
    assert!(review.to_string().contains(LATER_THAN_2X3[0].0));
    for (form, name, zipped) in &FORMS[1..] {
        let mut expected = review.clone();
        if name.starts_with("IFC2X3") {
            LATER_THAN_2X3.iter().for_each(|(from, to)| texts(&mut expected, &|text| text.replace(from, to)));
        }
        let [other_review, other_survey] = reports(*form, *zipped);
        let mut apart = differences(&expected, &other_review);
        apart.extend(differences(&survey, &other_survey));
        assert!(apart.is_empty(), "{form:?}: {} differences: {:#?}", apart.len(), &apart[..apart.len().min(8)]);
    }
}

/// Writes all forms for validators elsewhere: `cargo test write_every_form -- --ignored`.
#[test]
#[ignore = "writes into the target folder"]
fn write_every_form() {
    for (form, name, zipped) in FORMS {
        let kind =
            if let Step(_) | IfcXml(Style { flat: false, prefixed: false }) = form { "" } else { &format!("{form:?}") };
        let end = if zipped {
            "ifczip"
        } else if let Step(_) = form {
            "ifc"
        } else {
            "ifcxml"
        };
        let path = format!("{}/{name}{kind}.{end}", env!("CARGO_TARGET_TMPDIR"));
        std::fs::write(&path, written(form, zipped)).expect("the target folder can be written");
        println!("{path}");
    }
}
