//! Models in a zip archive.

use std::io::{Cursor, Write};

use zip::write::SimpleFileOptions;
use zip::{CompressionMethod, ZipWriter};

use super::*;

const MODEL: &str = "<ifcXML xmlns='ifc4/add2'>\n<IfcMaterial id='m' Name='S355'/></ifcXML>";

/// An archive of members, each a name and its text.
fn archive(members: &[(&str, &str)]) -> Vec<u8> {
    packed(CompressionMethod::Deflated, members)
}

fn packed(method: CompressionMethod, members: &[(&str, &str)]) -> Vec<u8> {
    let mut zip = ZipWriter::new(Cursor::new(Vec::new()));
    let options = SimpleFileOptions::default().compression_method(method);
    for (name, text) in members {
        match name.strip_suffix('/') {
            Some(name) => zip.add_directory(name, options).unwrap(),
            None => {
                zip.start_file(*name, options).unwrap();
                zip.write_all(text.as_bytes()).unwrap();
            }
        }
    }
    zip.finish().unwrap().into_inner()
}

/// Changes a field of a member's record in the directory of the archive (APPNOTE.TXT 4.3.12: flags at 8, method at 10,
/// inflated size at 24).
fn patched(mut bytes: Vec<u8>, at: usize, value: &[u8]) -> Vec<u8> {
    let record = bytes.windows(4).position(|sign| sign == b"PK\x01\x02").unwrap();
    bytes[record + at..record + at + value.len()].copy_from_slice(value);
    bytes
}

fn refused(bytes: &[u8]) -> String {
    read(bytes, "dir/model.ifczip").unwrap_err().to_string()
}

#[test]
fn the_one_model_is_read_with_places_in_the_archive() {
    for method in [CompressionMethod::Deflated, CompressionMethod::Stored] {
        for name in ["model.ifcxml", "Model.IfcXML", "a b/c/model.IFC", "a\\b.ifc"] {
            let exchange = read(&packed(method, &[("a/", ""), (name, MODEL)]), "dir/model.ifczip").unwrap();
            assert_eq!((exchange.form.as_str(), &*exchange.problems), ("IFC4 ifcXML", &[][..]), "{name}");
            let place = labelled(&exchange, "m").place().to_string();
            assert_eq!(place, format!("dir/model.ifczip/{}:2:1", name.replace('\\', "/")));
        }
    }
}

#[test]
fn a_step_file_in_an_archive_is_read_by_its_content() {
    let step = "ISO-10303-21;HEADER;FILE_DESCRIPTION((''),'2;1');FILE_NAME('','',(''),(''),'','','');FILE_SCHEMA(('IFC2X3'));ENDSEC;\nDATA;\n#1=IFCMATERIAL('S355');\nENDSEC;END-ISO-10303-21;";
    let exchange = read(&archive(&[("m.ifc", step)]), "m.ifczip").unwrap();
    assert_eq!((exchange.form.as_str(), &*exchange.problems), ("IFC2X3 STEP", &[][..]));
    assert_eq!(labelled(&exchange, "#1").place().to_string(), "m.ifczip/m.ifc:3:1");
}

#[test]
fn every_other_member_is_said() {
    let members = [("read me.txt", "x"), ("m.ifcxml", MODEL), ("__MACOSX/._m.ifcxml", "x"), ("\u{1b}\n/ifc", "x")];
    let exchange = read(&archive(&members), "m.ifczip").unwrap();
    let said =
        |name: &str| format!("1:1 the archive holds \"{name}\" too, which is not read: only its .ifc or .ifcxml is");
    assert_eq!(problems_of(&exchange), ["read me.txt", "__MACOSX/._m.ifcxml", "\u{fffd}\u{fffd}/ifc"].map(said));
    assert!(exchange.problems.iter().all(|p| &*p.at.as_ref().unwrap().file == "m.ifczip"));
    assert!(exchange.entities.all().any(|e| e.label() == "m"));
}

#[test]
fn an_archive_without_exactly_one_model_is_unreadable() {
    for (members, reason) in [
        (&[][..], "is a zip archive without a model: exactly one .ifc or .ifcxml is required in it"),
        (
            &[("m.txt", MODEL), ("ifc", MODEL), ("x.ifc/", "")],
            "is a zip archive without a model: exactly one .ifc or .ifcxml is required in it",
        ),
        (
            &[("a.ifc", MODEL), ("b.ifcXML", MODEL)],
            "is a zip archive with 2 models (\"a.ifc\", \"b.ifcXML\"); exactly one .ifc or .ifcxml is required in it",
        ),
        (
            &[("a.ifc", MODEL), ("b.ifc", MODEL), ("c.ifc", MODEL)],
            "is a zip archive with 3 models (\"a.ifc\", \"b.ifc\", …); exactly one .ifc or .ifcxml is required in it",
        ),
    ] {
        assert_eq!(refused(&archive(members)), format!("dir/model.ifczip: the file {reason}"));
    }
    let mut twice = archive(&[("a.ifc", MODEL), ("b.ifc", MODEL)]);
    for at in 0..twice.len() - 5 {
        if &twice[at..at + 5] == b"b.ifc" {
            twice[at] = b'a';
        }
    }
    assert_eq!(
        refused(&twice),
        "dir/model.ifczip: the file is a zip archive with two members of one name; exactly one model is required"
    );
}

#[test]
fn a_member_that_cannot_be_taken_out_says_why() {
    let plain = archive(&[("d/m.ifc", MODEL)]);
    let short = MODEL.len() as u32 - 1;
    for (bytes, reason) in [
        (patched(plain.clone(), 8, &[1, 0]), "is encrypted; a model without a password is required"),
        (
            patched(plain.clone(), 10, &[14, 0]),
            "is compressed in a way that is not read; stored and deflated members are",
        ),
        (
            patched(plain.clone(), 24, &0x4000_0001_u32.to_le_bytes()),
            "inflates to 1073741825 bytes, 1073741824 are allowed; read it unpacked",
        ),
        // more or less inside than the archive states: neither may pass, or the limit would be none
        (
            patched(plain.clone(), 24, &short.to_le_bytes()),
            "is damaged: it does not inflate to the 68 bytes that the archive states",
        ),
        (
            patched(plain.clone(), 24, &(short + 2).to_le_bytes()),
            "is damaged: it does not inflate to the 70 bytes that the archive states",
        ),
    ] {
        assert_eq!(
            refused(&bytes),
            format!("dir/model.ifczip: the file is a zip archive whose member d/m.ifc {reason}")
        );
    }
    let mut flipped = packed(CompressionMethod::Stored, &[("m.ifc", MODEL)]);
    let at = flipped.windows(4).position(|w| w == b"S355").unwrap();
    flipped[at + 1] = b'2';
    assert!(refused(&flipped).contains("member m.ifc is damaged: "), "a checksum that is wrong");
}

#[test]
fn what_is_wrong_with_the_model_is_said_of_the_member() {
    assert_eq!(refused(&archive(&[("m.ifcxml", " ")])), "dir/model.ifczip/m.ifcxml: the file is empty");
    let exchange = read(&archive(&[("m.ifcxml", "<ifcXML/>")]), "m.ifczip").unwrap();
    assert_eq!(exchange.problems[0].at.as_ref().unwrap().to_string(), "m.ifczip/m.ifcxml:1:1");
}

#[test]
fn every_beginning_of_an_archive_is_unreadable_and_no_damage_panics() {
    let whole = archive(&[("x.txt", "x"), ("m.ifcxml", MODEL)]);
    assert!(read(&whole, "t").is_ok());
    for end in 0..whole.len() {
        assert!(read(&whole[..end], "t").is_err(), "{end}");
    }
    for at in 0..whole.len() {
        for value in [0, 1, 0x7f, 0xff] {
            let mut bytes = whole.clone();
            bytes[at] = value;
            let _ = read(&bytes, "t");
        }
    }
}
