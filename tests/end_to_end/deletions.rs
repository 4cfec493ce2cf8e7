//! Each entity of what joint J1 is made of is left out once, whatever it is: the joint must not stay clear, unless the
//! table below says why it may.

use std::cell::{Cell, RefCell};
use std::collections::BTreeMap;

use faying::review::Outcome::{Clear, Comment};

use super::bench::{SCHEDULE, is, joint, review, shed, told, written_within};
use crate::writer::entity::Entity;

/// What J1 stands on; of its eight bolts the first and the last.
const PARTS: [&str; 8] = [
    "column C1",
    "beam B1",
    "beam B1/start/plate B1-1",
    "beam B1/start/bolt 1L",
    "beam B1/start/bolt 4R",
    "beam B1/start/weld upper flange",
    "beam B1/start/weld lower flange",
    "beam B1/start/weld web",
];

/// What may go without the joint losing its proof: of which part, class, how many of them, why.
const MAY_GO: [(&str, &str, usize, &str); 21] = [
    ("column C1", "IfcColumnType", 1, "what it is, its own name and shape say"),
    ("column C1", "IfcRelDefinesByType", 1, "the same"),
    ("column C1", "IfcDirection", 1, "the axis is the standard's default, Z"),
    ("beam B1", "IfcBeamType", 1, "what it is, its own name and shape say"),
    ("beam B1", "IfcRelDefinesByType", 1, "the same"),
    ("beam B1", "IfcDirection", 1, "the x direction is the standard's default for an axis along X"),
    ("beam B1", "IfcPropertySingleValue", 2, "a second statement of the section, and who bears loads"),
    ("beam B1", "IfcPropertySet", 1, "the same"),
    ("beam B1", "IfcRelDefinesByProperties", 1, "the same"),
    ("beam B1/start/plate B1-1", "IfcDirection", 1, "the x direction is the default here too"),
    ("beam B1/start/plate B1-1", "IfcCartesianPoint", 2, "a closed outline's first point stands in it twice"),
    ("beam B1/start/plate B1-1", "IfcCircle", 8, "a comment: a hole is not modelled, the others say its size"),
    ("beam B1/start/weld upper flange", "IfcPropertySingleValue", 2, "sort and length; not the throat"),
    ("beam B1/start/weld web", "IfcPropertySingleValue", 2, "the same"),
    ("beam B1/start/bolt 1L", "IfcMechanicalFastenerType", 1, "what it is, its own name and shape say"),
    ("beam B1/start/bolt 1L", "IfcRelDefinesByType", 1, "the same"),
    ("beam B1/start/bolt 1L", "IfcPropertySingleValue", 4, "thread, nuts and washers enter no check"),
    ("beam B1/start/bolt 1L", "IfcPropertySet", 1, "the same"),
    ("beam B1/start/bolt 1L", "IfcRelDefinesByProperties", 1, "the same"),
    ("beam B1/start/bolt 1L", "IfcDirection", 1, "the x direction of a round body"),
    ("beam B1/start/bolt 4R", "IfcDirection", 1, "the same"),
];

/// The model without the entity of that number within J1's parts, and which one it was; `None` past the last.
fn without(number: usize) -> Option<(String, String, &'static str)> {
    let at = Cell::new(0);
    let gone = RefCell::new(None);
    let within = RefCell::new("");
    let model = written_within(
        &shed(),
        &|product: &mut Entity| {
            let part = PARTS.iter().copied().find(|path| is(product, path));
            *within.borrow_mut() = part.unwrap_or("");
        },
        &|entity: &mut Entity| {
            if within.borrow().is_empty() {
                return true;
            }
            let own = at.replace(at.get() + 1);
            if own == number {
                *gone.borrow_mut() = Some((within.borrow().to_string(), entity.class));
            }
            own != number
        },
    );
    gone.into_inner().map(|(part, class)| (model, part, class))
}

#[test]
fn no_entity_of_a_joint_can_go_unnoticed() {
    let mut stayed: BTreeMap<(String, &str), Vec<String>> = BTreeMap::new();
    let mut tried = 0;
    while let Some((model, part, class)) = without(tried) {
        tried += 1;
        let Ok(review) = review(&model, Some(SCHEDULE)) else { continue };
        if joint(&review, "J1").is_some_and(|j| matches!(j.outcome, Clear | Comment)) {
            stayed.entry((part, class)).or_default().push(told(&review));
        }
    }
    assert!(tried > 100, "only {tried} entities");
    for ((part, class), reviews) in &stayed {
        let may = MAY_GO.iter().find(|(of, one, ..)| of == part && one == class).map_or(0, |(_, _, may, _)| *may);
        assert!(reviews.len() <= may, "{part} without {} of its {class}: {}", reviews.len(), reviews.join("\n"));
    }
}
