//! Each limit lets pass what it allows and says what it does not.

use std::io::Write;

use faying::exchange::{Limits, read_within};

use super::*;

fn step(records: &str) -> Vec<u8> {
    format!(
        "ISO-10303-21;HEADER;FILE_SCHEMA(('IFC4'));ENDSEC;DATA;\n{records}\n#99=IFCMATERIAL('kept',$,$);\n\
         ENDSEC;END-ISO-10303-21;"
    )
    .into()
}

fn zipped(model: &[u8]) -> Vec<u8> {
    let mut zip = zip::ZipWriter::new(std::io::Cursor::new(Vec::new()));
    zip.start_file("m.ifc", zip::write::SimpleFileOptions::default()).unwrap();
    zip.write_all(model).unwrap();
    zip.finish().unwrap().into_inner()
}

/// A model, the limits that just let it pass, those that just do not, and what is then said.
type Case = (Vec<u8>, Limits, Limits, String);

fn refused() -> Vec<Case> {
    let all = Limits::default();
    let small = step("");
    let bytes = small.len() as u64;
    let two = step("#1=IFCMATERIAL('a',$,$);");
    let xml: Vec<u8> = document("<IfcMaterial Name='a'/><IfcMaterial Name='b'/>").into();
    let wide = format!("<?xml version='1.0' encoding='ISO-8859-1'?>\n{}", document("<!-- ~ -->"));
    let wide: Vec<u8> = wide.bytes().map(|b| if b == b'~' { 0xE4 } else { b }).collect();
    let decoded = wide.len() as u64 + 1;
    vec![
        (
            small.clone(),
            Limits { file: bytes, ..all },
            Limits { file: bytes - 1, ..all },
            format!("m: the file has {bytes} bytes, {} are allowed", bytes - 1),
        ),
        (
            wide,
            Limits { file: decoded, ..all },
            Limits { file: decoded - 1, ..all },
            format!("m: the file has {decoded} bytes, {} are allowed", decoded - 1),
        ),
        (
            zipped(&small),
            Limits { inflated: bytes, ..all },
            Limits { inflated: bytes - 1, ..all },
            format!(
                "m: the file is a zip archive whose member m.ifc inflates to {bytes} bytes, {} are allowed; read it unpacked",
                bytes - 1
            ),
        ),
        (
            two,
            Limits { entities: 2, ..all },
            Limits { entities: 1, ..all },
            "m: the file holds more entities than are read: 1 are allowed, the next stands at line 3, column 1".into(),
        ),
        (
            xml,
            Limits { entities: 2, ..all },
            Limits { entities: 1, ..all },
            "m: the file holds more entities than are read: 1 are allowed, the next stands at line 2, column 24".into(),
        ),
    ]
}

#[test]
fn a_file_beyond_a_limit_is_refused_in_one_sentence() {
    for (bytes, fits, exceeds, said) in refused() {
        read_within(&bytes, "m", fits).unwrap();
        assert_eq!(read_within(&bytes, "m", exceeds).unwrap_err().to_string(), said);
    }
}

fn left_out() -> Vec<Case> {
    let all = Limits::default();
    let deep = document("<IfcLocalPlacement><PlacementRelTo xsi:type='IfcLocalPlacement' id='p'/></IfcLocalPlacement>");
    vec![
        (
            deep.into(),
            Limits { depth: 3, ..all },
            Limits { depth: 2, ..all },
            "2:20 PlacementRelTo is nested deeper than 2 elements and is not read".into(),
        ),
        (
            step("#1=IFCCARTESIANPOINTLIST2D(((0.,0.)));"),
            Limits { nesting: 2, ..all },
            Limits { nesting: 1, ..all },
            "2:1 IfcCartesianPointList2D #1 nests values deeper than 1; what follows in it is not read".into(),
        ),
        (
            step("#1=IFCMATERIAL('aaaaaaaaaaaaa',$,$);"),
            Limits { record: 34, ..all },
            Limits { record: 32, ..all },
            "2:1 IfcMaterial #1 is longer than 32 bytes; what follows in it is not read".into(),
        ),
        (
            step("#1=IFCMATERIAL('it''s',$,$);"),
            Limits { string: 5, ..all },
            Limits { string: 4, ..all },
            "2:1 IfcMaterial #1 holds a string that is not closed (or longer than 4 bytes); what follows in it is not read".into(),
        ),
    ]
}

#[test]
fn what_lies_beyond_a_limit_is_left_out_with_a_problem() {
    for (bytes, fits, exceeds, said) in left_out() {
        assert_eq!(problems_of(&read_within(&bytes, "m", fits).unwrap()), [""; 0], "{said}");
        let exchange = read_within(&bytes, "m", exceeds).unwrap();
        assert_eq!(problems_of(&exchange), [said.as_str()]);
        let kept = exchange.entities.all().last().unwrap();
        assert!(kept.class() == "IfcLocalPlacement" || kept.text("Name") == Some("kept"), "{said}");
    }
}

#[test]
fn limits_can_only_be_lowered() {
    let deep = format!("#1=IFCX({}1{});", "(".repeat(100_000), ")".repeat(100_000));
    let exchange = read_within(&step(&deep), "m", Limits { nesting: usize::MAX, ..Limits::default() }).unwrap();
    assert!(problems_of(&exchange)[1].contains("nests values deeper than 64"), "{:?}", problems_of(&exchange));
}

#[test]
fn a_file_on_one_line_is_read_as_any_other() {
    let records: String = (1..200_000).map(|i| format!("#{i}=IFCMATERIAL('{i}',$,$);")).collect();
    let one = step("").iter().map(|b| if *b == b'\n' { b' ' } else { *b }).collect::<Vec<u8>>();
    let one = String::from_utf8(one).unwrap().replace("#99=", "#200000=").replace("DATA;", &format!("DATA;{records}"));
    let exchange = read(one.as_bytes(), "m").unwrap();
    assert_eq!((exchange.entities.len(), &*exchange.problems), (200_000, &[][..]));
    let last = exchange.entities.all().last().unwrap().place();
    assert_eq!((last.line, last.column as usize), (1, one.find("#200000").unwrap() + 1));
}
