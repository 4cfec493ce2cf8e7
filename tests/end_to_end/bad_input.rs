//! Input that is none: one sentence on stderr, exit code 2, nothing on stdout, nothing written.

use std::fs;
use std::path::Path;
use std::process::Command;

use super::bench::{SCHEDULE, plain, shed};

/// Files of a folder by name.
type Files = Vec<(&'static str, Vec<u8>)>;

fn text(of: &str) -> Vec<u8> {
    of.as_bytes().to_vec()
}

fn model() -> Vec<u8> {
    plain(&shed()).into_bytes()
}

fn folder(files: &Files) -> tempfile::TempDir {
    let folder = tempfile::tempdir().expect("a folder");
    for (name, bytes) in files {
        let path = folder.path().join(name);
        fs::create_dir_all(path.parent().expect("it has one")).expect("a folder");
        fs::write(path, bytes).expect("a file");
    }
    folder
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("a folder")
        .filter_map(|entry| entry.ok()?.file_name().into_string().ok())
        .collect();
    names.sort();
    names
}

/// What stderr says of a run that must be refused and leave nothing behind.
fn refused(files: &Files, args: &[&str]) -> String {
    let folder = folder(files);
    let before = names(folder.path());
    for command in [args.to_vec(), [args, &["-o", "report.txt"]].concat()] {
        let out = Command::new(env!("CARGO_BIN_EXE_faying"))
            .args(&command)
            .current_dir(folder.path())
            .output()
            .expect("the program runs");
        let told = String::from_utf8(out.stderr).expect("UTF-8");
        assert_eq!((out.status.code(), out.stdout.len()), (Some(2), 0), "{command:?}: {told}");
        assert!(!told.contains("panicked"), "{told}");
        assert_eq!(names(folder.path()), before, "{command:?}");
        if command.len() > args.len() {
            return told;
        }
    }
    unreachable!("the second command returns")
}

#[test]
#[rustfmt::skip]
fn a_model_that_is_none_is_refused_in_one_sentence() {
    let entities = format!("<!DOCTYPE ifcXML [<!ENTITY a \"{}\"><!ENTITY b \"{}\">]><ifcXML>&b;</ifcXML>", "a".repeat(1000), "&a;".repeat(1000));
    let outside = "<?xml version=\"1.0\"?><!DOCTYPE ifcXML SYSTEM \"file:///etc/passwd\"><ifcXML/>".to_owned();
    let whole = model();
    let cases: Vec<(&str, Vec<u8>, &str)> = vec![
        ("an empty file", text(""), "empty"),
        ("white space", text(" \n\n "), "empty"),
        ("a sentence", text("This is no model.\n"), "ifcXML or STEP (ISO-10303-21) is required"),
        ("XML of something else", text("<?xml version=\"1.0\"?><html><body/></html>"), "html"),
        ("entities that grow", text(&entities), ""),
        ("an entity from outside", text(&outside), ""),
        ("a zip archive", text("PK\u{3}\u{4}\u{14}\0\0\0\u{8}\0"), "archive"),
        ("STEP", text("ISO-10303-21;\nHEADER;\nFILE_SCHEMA(('IFC4'));\nENDSEC;\nEND-ISO-10303-21;\n"), "no DATA section"),
        ("nulls", vec![0; 4096], ""),
        ("a picture", text("\u{89}PNG\r\n\u{1a}\n\0\0\0\rIHDR"), ""),
        ("half a model", whole[..whole.len() / 2].to_vec(), ""),
        ("all but the last bracket", whole[..whole.len() - 3].to_vec(), ""),
        ("UTF-16 that ends within a character", [&[0xff, 0xfe][..], &[b'<', 0, b'i']].concat(), ""),
    ];
    for (what, bytes, says) in cases {
        for command in ["review", "survey"] {
            let told = refused(&vec![("a.ifcxml", bytes.clone())], &[command, "a.ifcxml"]);
            assert_eq!(told.lines().count(), 1, "{what}: {told}");
            assert!(told.starts_with("faying: a.ifcxml") && told.contains(says), "{what}: {told}");
        }
    }
}

#[test]
#[rustfmt::skip]
fn a_wrong_call_is_refused_in_one_sentence() {
    let two = || vec![("a.ifcxml", model()), ("b.ifcxml", model())];
    let one = || vec![("a.ifcxml", model()), ("schedule.toml", text(SCHEDULE))];
    let none = || vec![("schedule.toml", text(SCHEDULE))];
    for (files, args, says) in [
        (two(), &["review", "."][..], "must hold one shop model and holds 2"),
        (none(), &["review", "."], "holds no shop model"),
        (none(), &["survey", "."], "holds no shop model"),
        (one(), &["review", "absent.ifcxml"], "absent.ifcxml: there is no such file"),
        (one(), &["review", "a.ifcxml", "--schedule", "absent.toml"], "absent.toml: there is no such file"),
        (one(), &["review", "a.ifcxml", "--schedule", "."], "it is a folder"),
        (one(), &["review", "schedule.toml"], "schedule.toml"),
        (one(), &["review", "a.ifcxml", "--rules", "absent"], "absent"),
        (one(), &["review", "a.ifcxml", "--rules", "a.ifcxml"], "a.ifcxml: it is no folder"),
    ] {
        let told = refused(&files, args);
        assert_eq!(told.lines().count(), 1, "{args:?}: {told}");
        assert!(told.contains(says), "{args:?}: {told}");
    }
}

/// What is wrong, the file and what it holds, the call, what must be said, and the place.
type Fault<'a> = (&'a str, &'static str, Vec<u8>, &'a [&'a str], &'a str, &'a str);

/// A fault in a paper that people write: its place, its line, what is wrong and what is allowed.
#[test]
#[rustfmt::skip]
fn a_fault_in_schedule_or_rules_is_shown_with_its_line() {
    let csv = "joint,supporting,supported,end,load case,M_Ed [kNm],V_Ed [kN],N_Ed [kN]\n";
    let toml = |line: &str| text(&SCHEDULE.replacen("{ name = \"LC1\", M_Ed_kNm = 150, V_Ed_kN = 120, N_Ed_kN = -10 }", line, 1));
    let review = &["review", "."][..];
    let with_rules = &["review", ".", "--rules", "rules"][..];
    let cases: Vec<Fault> = vec![
        ("a wrong unit", "schedule.csv", text("joint,M_Ed [kN],V_Ed [kN],N_Ed [kN]\nJ1,1,2,3\n"), review, "kN", "schedule.csv:1:"),
        ("no unit", "schedule.csv", text("joint,M_Ed,V_Ed [kN],N_Ed [kN]\nJ1,1,2,3\n"), review, "unit", "schedule.csv:1:"),
        ("a bad cell", "schedule.csv", text(&format!("{csv}J1,C1,B1,start,LC1,abc,120,0\n")), review, "abc", "schedule.csv:2:"),
        ("NaN in a cell", "schedule.csv", text(&format!("{csv}J1,C1,B1,start,LC1,NaN,120,0\n")), review, "NaN", "schedule.csv:2:"),
        ("too many cells", "schedule.csv", text(&format!("{csv}J1,C1,B1,start,LC1,1,120,0,9\n")), review, "", "schedule.csv:2:"),
        ("an unknown heading", "schedule.csv", text("joint,M_Ed [kNm],W_Ed [kN],N_Ed [kN]\nJ1,1,2,3\n"), review, "W_Ed", "schedule.csv:1:"),
        ("an unknown key", "schedule.toml", toml("{ name = \"LC1\", M_Ed_kNm = 150, V_Ed_kN = 120, N_Ed_kn = -10, T = 3 }"), review, "", "schedule.toml:"),
        ("a key without a unit", "schedule.toml", toml("{ name = \"LC1\", M_Ed = 150 }"), review, "M_Ed", "schedule.toml:"),
        ("a moment that is a text", "schedule.toml", toml("{ name = \"LC1\", M_Ed_kNm = \"150\" }"), review, "", "schedule.toml:"),
        ("a moment that is NaN", "schedule.toml", toml("{ name = \"LC1\", M_Ed_kNm = nan }"), review, "", "schedule.toml:"),
        ("a moment without end", "schedule.toml", toml("{ name = \"LC1\", M_Ed_kNm = inf }"), review, "", "schedule.toml:"),
        ("two cases of one name", "schedule.toml", toml("{ name = \"LC2\", M_Ed_kNm = 1 }"), review, "LC2", "schedule.toml:"),
        ("two joints of one mark", "schedule.toml", text(&SCHEDULE.replacen("\"J2\"", "\"J1\"", 1)), review, "but the same joint has", "schedule.toml:"),
        ("a detail that nobody defines", "schedule.toml", text(&SCHEDULE.replacen("end = \"start\"", "end = \"start\"\ndetail = \"M9\"", 1)), review, "M9", "schedule.toml:"),
        ("an end that is none", "schedule.toml", text(&SCHEDULE.replacen("\"start\"", "\"left\"", 1)), review, "left", "schedule.toml:"),
        ("no TOML", "schedule.toml", text("[[joint]\nmark = \"J1\"\n"), review, "", "schedule.toml:1:"),
        ("no text", "schedule.csv", vec![0xff, 0xfe, 0x00, 0x9f], review, "", "schedule.csv"),
        ("a model", "schedule.csv", model(), review, "allowed is CSV or TOML text", "schedule.csv:1:1"),
        ("a model called TOML", "schedule.toml", model(), review, "allowed is CSV or TOML text", "schedule.toml:1:1"),
        ("a thousand bad lines", "schedule.csv", text(&format!("{csv}{}", "J1,C1,B1,start,LC1,abc,120,0\n".repeat(1000))), review, "the first 20 are shown", "schedule.csv:2:"),
        ("an empty schedule", "schedule.csv", text(""), review, "", "schedule.csv"),
        ("a broken rule file", "rules/tolerances.toml", text("position_mm = \n"), with_rules, "", "tolerances.toml:1:"),
        ("an unknown rule file", "rules/joints.toml", text("a = 1\n"), with_rules, "joints.toml", "joints.toml"),
    ];
    for (what, name, bytes, args, says, at) in cases {
        let files: Files = vec![("a.ifcxml", model()), (name, bytes)];
        let told = refused(&files, args);
        assert!(told.contains(says) && told.contains(at) && !told.contains("Error"), "{what}: {told}");
        assert!(told.lines().count() < 130, "{what}: {told}");
    }
}
