//! The same joints, shaped as different programs shape them.

use std::collections::BTreeMap;

use faying::report::json;
use serde_json::Value;

use super::{data, differences, reviewed, texts};
use crate::sample::boathouse::boathouse;
use crate::writer::Form::Step;
use crate::writer::building::{BoltBody, Building, End, PlateAs};
use crate::writer::bytes;
use crate::writer::guid::global_id;
use crate::writer::version::Version;

fn shaped(body: BoltBody, plates: PlateAs) -> Building {
    let mut building = Building { plates, ..boathouse() };
    for end in building.beams.iter_mut().flat_map(|beam| &mut beam.ends) {
        if let End::Joint { joint, .. } = end {
            joint.detail.bolts.body = body;
        }
    }
    building.boltings.iter_mut().filter(|bolting| !bolting.anchors).for_each(|bolting| bolting.body = body);
    building
}

/// The GlobalId of each bolt, with that of the group of its joint.
fn groups(building: &Building) -> BTreeMap<String, String> {
    let mut groups = BTreeMap::new();
    for beam in &building.beams {
        for (end, which) in beam.ends.iter().zip(["start", "end"]) {
            let End::Joint { joint, .. } = end else { continue };
            let owner = format!("{}/beam {}/{which}", building.name, beam.mark);
            for row in 1..=joint.detail.bolts.rows.len() {
                for hand in ['L', 'R'] {
                    groups
                        .insert(global_id(&format!("{owner}/bolt {row}{hand}")), global_id(&format!("{owner}/bolts")));
                }
            }
        }
    }
    for bolting in building.boltings.iter().filter(|bolting| !bolting.anchors) {
        let group = global_id(&format!("{}/{}/bolts", building.name, bolting.path));
        let bolt = |(name, _): &(String, _)| global_id(&format!("{}/{}/{name}", building.name, bolting.path));
        groups.extend(bolting.at.iter().map(|place| (bolt(place), group.clone())));
    }
    groups
}

/// In lists of elements the groups stand instead of their bolts.
fn group(data: &mut Value, groups: &BTreeMap<String, String>) {
    match data {
        Value::Array(items) => items.iter_mut().for_each(|item| group(item, groups)),
        Value::Object(fields) => fields.iter_mut().for_each(|(key, field)| match field {
            Value::Array(elements) if key == "elements" => {
                for element in elements.iter_mut() {
                    if let Some(group) = element.as_str().and_then(|bolt| groups.get(bolt)) {
                        *element = group.as_str().into();
                    }
                }
                elements.dedup();
            }
            _ => group(field, groups),
        }),
        _ => {}
    }
}

/// Where the size of a bolt is said, and its thread: by its type, in IFC2X3 by itself, of a proxy in its name.
fn said_by(body: BoltBody, version: Version, origin: &str) -> String {
    // A proxy has no property set for its thread.
    if let (BoltBody::Proxies, Some(thread)) = (body, origin.strip_suffix(", by the bolts' length and thread")) {
        return format!("{thread}: no model says where it ends");
    }
    let Some((before, after)) = origin.split_once("NominalDiameter of the type of the fastener") else {
        return origin.into();
    };
    match (body, version) {
        (BoltBody::Proxies, _) => {
            let name = after.trim_start().trim_end_matches(" ()");
            format!("{before}Name {name} of the fastener{after}")
        }
        (_, Version::Ifc2x3) => format!("{before}NominalDiameter of the fastener{after}"),
        _ => origin.into(),
    }
}

/// Bolts one by one, as one fastener a joint, and as a proxy for each bolt, washer and nut; plates as such and as beams and
/// columns with faces: nothing differs but who the bolts are and where their size is said.
#[test]
fn every_shape_of_a_joint_gives_the_same_review() {
    let of = |body, plates, version| data(json::review(&reviewed(&bytes(&shaped(body, plates), Step(version)))));
    let first = of(BoltBody::Mapped, PlateAs::Plate, Version::Ifc4);
    let groups = groups(&boathouse());
    for (body, plates, version) in [
        (BoltBody::Group, PlateAs::Plate, Version::Ifc4),
        (BoltBody::Proxies, PlateAs::Plate, Version::Ifc4),
        (BoltBody::Mapped, PlateAs::Member, Version::Ifc4),
        (BoltBody::Group, PlateAs::Member, Version::Ifc2x3),
        (BoltBody::Proxies, PlateAs::Member, Version::Ifc2x3),
    ] {
        let mut expected = first.clone();
        texts(&mut expected, &|text| said_by(body, version, text));
        if body == BoltBody::Group {
            group(&mut expected, &groups);
            assert!(!differences(&expected, &first).is_empty(), "some finding names bolts");
        }
        let apart = differences(&expected, &of(body, plates, version));
        let shown = &apart[..apart.len().min(8)];
        assert!(apart.is_empty(), "{body:?} {plates:?} {version:?}: {} differences: {shown:#?}", apart.len());
    }
}

/// Writes the shapes that differ most for validators elsewhere: `cargo test write_every_shape -- --ignored`.
#[test]
#[ignore = "writes into the target folder"]
fn write_every_shape() {
    for body in [BoltBody::Group, BoltBody::Proxies] {
        for version in [Version::Ifc2x3, Version::Ifc4] {
            let path = format!("{}/{body:?} {}.ifc", env!("CARGO_TARGET_TMPDIR"), version.name());
            std::fs::write(&path, bytes(&shaped(body, PlateAs::Member), Step(version))).expect("it can be written");
            println!("{path}");
        }
    }
}
