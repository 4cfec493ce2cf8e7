//! The sample building in every form.

use std::collections::BTreeMap;
use std::io::{Cursor, Write};

use faying::exchange::{Entity, Exchange, Value, read};

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
