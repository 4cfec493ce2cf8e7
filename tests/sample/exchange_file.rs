//! The written XML by itself, in every style: ids, references, GlobalIds.

use std::collections::{BTreeMap, BTreeSet};

use quick_xml::Reader;
use quick_xml::events::Event;

use super::boathouse::boathouse;
use crate::writer::frames::frames;
use crate::writer::guid::{ALPHABET, compress, global_id};
use crate::writer::ifcxml::Style;
use crate::writer::ifcxml_bytes;

const STYLES: [Style; 4] = [
    Style { flat: false, prefixed: false },
    Style { flat: true, prefixed: false },
    Style { flat: false, prefixed: true },
    Style { flat: true, prefixed: true },
];

/// One element: its type (the entity that it is or refers to) and its attributes.
struct Element {
    class: String,
    attributes: BTreeMap<String, String>,
}

fn elements(xml: &[u8]) -> Vec<Element> {
    let mut reader = Reader::from_reader(xml);
    let mut elements = Vec::new();
    loop {
        match reader.read_event().expect("well-formed XML") {
            Event::Start(start) | Event::Empty(start) => {
                let text = |bytes: &[u8]| String::from_utf8(bytes.to_vec()).expect("UTF-8");
                let attributes: BTreeMap<String, String> = start
                    .attributes()
                    .map(|attribute| attribute.expect("a sound attribute"))
                    .map(|attribute| (text(attribute.key.as_ref()), text(&attribute.value)))
                    .collect();
                let name = text(start.name().as_ref());
                let class = attributes.get("xsi:type").unwrap_or(&name);
                elements.push(Element { class: class.trim_start_matches("ifc:").to_owned(), attributes });
            }
            Event::Eof => return elements,
            _ => {}
        }
    }
}

fn values<'a>(elements: &'a [Element], attribute: &'a str) -> impl Iterator<Item = (&'a str, &'a str)> {
    elements.iter().filter_map(move |e| Some((e.class.as_str(), e.attributes.get(attribute)?.as_str())))
}

#[test]
fn the_writer_is_deterministic() {
    for style in STYLES {
        assert!(ifcxml_bytes(&boathouse(), style) == ifcxml_bytes(&boathouse(), style), "{style:?}");
    }
}

#[test]
fn ids_are_unique_and_references_resolve() {
    for style in STYLES {
        let xml = ifcxml_bytes(&boathouse(), style);
        let elements = elements(&xml);
        let mut defined = BTreeSet::new();
        for (class, id) in values(&elements, "id") {
            assert!(defined.insert(id), "{style:?}: {class} repeats {id}");
        }
        for (class, to) in values(&elements, "ref") {
            assert!(defined.contains(to), "{style:?}: {class} refers to {to}, which is nowhere");
        }
        assert!(values(&elements, "ref").count() > 100, "{style:?}");
    }
}

#[test]
fn global_ids_are_valid_unique_and_the_same_in_every_style() {
    let mut first: Option<BTreeSet<String>> = None;
    for style in STYLES {
        let xml = ifcxml_bytes(&boathouse(), style);
        let mut seen = BTreeSet::new();
        for (class, id) in values(&elements(&xml), "GlobalId") {
            assert_eq!(id.len(), 22, "{class} {id}");
            assert!(id.bytes().all(|byte| ALPHABET.contains(&byte)), "{class} {id}");
            assert!(matches!(id.as_bytes()[0], b'0'..=b'3'), "{class} {id}");
            assert!(seen.insert(id.to_owned()), "{class} repeats {id}");
        }
        assert!(seen.len() > 500, "{style:?}");
        assert!(first.get_or_insert_with(|| seen.clone()) == &seen, "{style:?}");
    }
}

#[test]
fn both_layouts_hold_the_same_entities() {
    let counts = |style| {
        let xml = ifcxml_bytes(&boathouse(), style);
        let mut counts = BTreeMap::<String, usize>::new();
        for element in elements(&xml).into_iter().filter(|e| e.attributes.contains_key("GlobalId")) {
            // A relation that is held through an inverse attribute goes by that attribute's name.
            let class = if element.class == "IsTypedBy" { "IfcRelDefinesByType".into() } else { element.class };
            let class = if class == "RelatingType" { panic!("a type without its class") } else { class };
            *counts.entry(class).or_default() += 1;
        }
        counts
    };
    let nested = counts(STYLES[0]);
    assert_eq!(nested, counts(STYLES[1]));
    // What boathouse.rs and slip_house.rs list: 12 + 6 columns; 9 + 5 + 8 beams. Bolts: M1 and what follows it and M3, M5, M7 have
    // 8 a joint, M2, M4 and M6 6.
    assert_eq!(nested["IfcColumn"], 18);
    assert_eq!(nested["IfcBeam"], 22);
    assert_eq!(nested["IfcMechanicalFastener"], 12 * 8 + 6 * 8 + 9 * 6 + 13 * 8 + 6);
    // 27 end plates, and pairs of stiffeners: 7 columns with one of M1, 4 columns with two of M3. In the slip house 12 + 4 end plates,
    // pairs of stiffeners at J40, J43, J44 (one) and J41, J42 (two); haunches of two plates, each with a pair in the beam and in
    // the column; web plates, diagonals and stiffeners of partial depth.
    assert_eq!(
        nested["IfcPlate"],
        27 + 2 * 7 + 4 * 4 + 12 + 4 + 3 * 2 + 2 * 4 + 2 * (2 + 2 + 2) + (4 + 1) + (2 + 1) + 2
    );
    assert_eq!(nested["IfcRelConnectsWithRealizingElements"], 12);
}

#[test]
fn names_are_written_digit_by_digit() {
    // Check values of the GlobalId's digits: first from the documentation of IFC4 (IfcGloballyUniqueId), then the ends.
    assert_eq!(compress(0xf70dd363_bfe3_495d_84a0_2c02dcb7d4d2), "3t3TDZl_D9NOIWB0BSjzJI");
    assert_eq!(compress(0), "0000000000000000000000");
    assert_eq!(compress(u128::MAX), "3$$$$$$$$$$$$$$$$$$$$$");
    assert_ne!(global_id("Boathouse/beam B1"), global_id("Boathouse/beam B2"));
}

#[test]
fn a_building_of_any_size_has_as_many_joints_as_asked() {
    for (asked, told) in [(1, true), (39, false), (100, true)] {
        let xml = ifcxml_bytes(&frames(asked, told), STYLES[0]);
        let elements = elements(&xml);
        let count = |class| values(&elements, "GlobalId").filter(|(of, _)| *of == class).count();
        let joints = asked + asked % 2;
        assert_eq!(count("IfcMechanicalFastener"), 8 * joints, "{asked}");
        assert_eq!(count("IfcRelConnectsWithRealizingElements"), if told { joints } else { 0 }, "{asked}");
        let ids: BTreeSet<_> = values(&elements, "GlobalId").map(|(_, id)| id).collect();
        assert_eq!(ids.len(), values(&elements, "GlobalId").count(), "{asked}");
    }
}
