//! Broken and strange files, each with what must come of it, through the program itself: `broken/expected.toml` says so.
//! Files that are too large to be kept are made here.

use std::collections::BTreeMap;
use std::fs;
use std::io::{Cursor, Write};
use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::{Duration, Instant};

use serde::Deserialize;
use zip::write::SimpleFileOptions;

/// What must come of the files.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Table {
    file: Vec<Expected>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Expected {
    name: String,
    /// What is wrong with it, for people.
    about: String,
    /// The one sentence of exit code 2, behind "faying: ".
    refused: Option<String>,
    /// The problems of the review, each as "line:column message".
    #[serde(default)]
    problems: Vec<String>,
    /// Why parts of the model were not taken up, as the survey has it.
    #[serde(default)]
    left_out: Vec<String>,
}

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/exchange/broken")
}

fn sound(form: &str) -> String {
    fs::read_to_string(folder().join("sound").with_extension(form)).unwrap()
}

fn zipped(members: &[(&str, &[u8])]) -> Vec<u8> {
    let mut zip = zip::ZipWriter::new(Cursor::new(Vec::new()));
    for (name, bytes) in members {
        zip.start_file(*name, SimpleFileOptions::default()).unwrap();
        zip.write_all(bytes).unwrap();
    }
    zip.finish().unwrap().into_inner()
}

/// The files that are not kept.
fn made() -> BTreeMap<&'static str, Vec<u8>> {
    let (step, xml) = (sound("ifc"), sound("ifcxml"));
    let in_step =
        |records: &str| step.replace("ENDSEC;\nEND-ISO", &format!("{records}\nENDSEC;\nEND-ISO")).into_bytes();
    let in_xml = |entities: &str| xml.replace("</ifcXML>", &format!("{entities}\n</ifcXML>")).into_bytes();
    let elements = |depth: usize| {
        let (open, close) = ("<IfcLocalPlacement><PlacementRelTo>", "</PlacementRelTo></IfcLocalPlacement>");
        open.repeat(depth) + &close.repeat(depth)
    };
    let records: String = (100..60_000).map(|i| format!("#{i}=IFCMATERIAL('{i}',$,$);")).collect();
    let unions: String = (100..40_000).map(|i| format!("#{i}=IFCBOOLEANRESULT(.UNION.,#{},#14);\n", i + 1)).collect();
    let unions = format!("{unions}#40000=IFCBOOLEANRESULT(.UNION.,#14,#14);");
    let chain: String = (100..40_000).map(|i| format!("#{i}=IFCLOCALPLACEMENT(#{},#5);\n", i + 1)).collect();
    let chain = format!("{chain}#40000=IFCLOCALPLACEMENT($,#5);");
    // APPNOTE.TXT 4.3.12: the inflated size stands at 24 in a member's record of the directory
    let stating = |size: u32| {
        let mut archive = zipped(&[("model.ifc", &[b' '; 1 << 16])]);
        let record = archive.windows(4).position(|sign| sign == b"PK\x01\x02").unwrap();
        archive[record + 24..record + 28].copy_from_slice(&size.to_le_bytes());
        archive
    };
    let archive = zipped(&[("model.ifc", step.as_bytes())]);
    BTreeMap::from([
        ("deep-elements.ifcxml", in_xml(&elements(100_000))),
        ("deep-lists.ifc", in_step(&format!("#90=IFCX({}1{});", "(".repeat(100_000), ")".repeat(100_000)))),
        ("deep-unions.ifc", {
            let records = in_step(&unions);
            String::from_utf8(records).unwrap().replace("'SweptSolid',(#14)", "'CSG',(#100)").into()
        }),
        ("long-placement-chain.ifc", {
            let records = in_step(&chain);
            String::from_utf8(records).unwrap().replace("#11=IFCLOCALPLACEMENT($", "#11=IFCLOCALPLACEMENT(#100").into()
        }),
        ("one-long-line.ifc", String::from_utf8(in_step(&records)).unwrap().replace('\n', "").into()),
        ("one-long-line.ifcxml", {
            let many = "<IfcMaterial Name=\"S355\"/>".repeat(60_000);
            String::from_utf8(in_xml(&many)).unwrap().replace('\n', "").into()
        }),
        ("long-string.ifc", in_step(&format!("#90=IFCMATERIAL('{}',$,$);", "x".repeat(1 << 21)))),
        ("bomb.ifczip", stating((1 << 30) + 1)),
        ("forged-size.ifczip", stating(1)),
        ("archive-in-an-archive.ifczip", zipped(&[("model.ifc", &archive)])),
        ("two-models.ifczip", zipped(&[("a.ifc", step.as_bytes()), ("b.ifcxml", xml.as_bytes())])),
        ("cut-archive.ifczip", archive[..archive.len() / 2].to_vec()),
    ])
}

/// What the program made of a file: the exit code, what it said, and its report.
fn told(at: &Path, command: &str, name: &str) -> (Option<i32>, String, serde_json::Value) {
    let begun = Instant::now();
    let out = Command::new(env!("CARGO_BIN_EXE_faying"))
        .args([command, "--format", "json", name])
        .current_dir(at)
        .output()
        .unwrap();
    // far above what any of them takes: what never ends must not hold up everything
    assert!(begun.elapsed() < Duration::from_secs(300), "{name} takes too long");
    let report = serde_json::from_slice(&out.stdout).unwrap_or_default();
    (out.status.code(), String::from_utf8(out.stderr).unwrap(), report)
}

fn problems(review: &serde_json::Value) -> Vec<String> {
    let problem = |problem: &serde_json::Value| {
        let message = problem["message"].as_str().unwrap();
        match &problem["at"] {
            serde_json::Value::Null => message.to_owned(),
            at => format!("{}:{} {message}", at["line"], at["column"]),
        }
    };
    review["problems"].as_array().unwrap().iter().map(problem).collect()
}

fn left_out(survey: &serde_json::Value) -> Vec<&str> {
    survey["rejected"].as_array().unwrap().iter().map(|part| part["reason"].as_str().unwrap()).collect()
}

#[test]
fn what_must_come_of_each_file_comes_of_it() {
    let at = tempfile::tempdir().unwrap();
    let mut there: Vec<String> = Vec::new();
    for entry in fs::read_dir(folder()).unwrap().map(Result::unwrap) {
        let name = entry.file_name().into_string().unwrap();
        if name != "expected.toml" {
            fs::copy(entry.path(), at.path().join(&name)).unwrap();
            there.push(name);
        }
    }
    for (name, bytes) in made() {
        fs::write(at.path().join(name), bytes).unwrap();
        there.push(name.to_owned());
    }
    there.sort();
    let table = fs::read_to_string(folder().join("expected.toml")).unwrap();
    let table: Table = toml::from_str(&table).unwrap();
    let mut named: Vec<&String> = table.file.iter().map(|file| &file.name).collect();
    named.sort();
    assert_eq!(named, there.iter().collect::<Vec<_>>(), "the table names each file once");
    for expected in &table.file {
        let (name, about) = (&expected.name, &expected.about);
        let (code, said, review) = told(at.path(), "review", name);
        if let Some(sentence) = &expected.refused {
            assert_eq!((code, said), (Some(2), format!("faying: {sentence}\n")), "{about}");
            continue;
        }
        assert!(code.is_some_and(|code| code != 2), "{name}, {about}: {code:?} {said}");
        assert_eq!(problems(&review), expected.problems, "{name}, {about}");
        let (_, _, survey) = told(at.path(), "survey", name);
        assert_eq!(left_out(&survey), expected.left_out, "{name}, {about}");
    }
}
