//! The sample through the built program: what README.md promises.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::Path;
use std::process::{Command, Output};

use serde_json::Value;

use crate::sample::folder;

fn faying(at: &Path, args: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_faying")).args(args).current_dir(at).output().expect("the program runs")
}

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// What a run prints, with its exit code.
fn printed(at: &Path, args: &[&str]) -> (Option<i32>, String) {
    let out = faying(at, args);
    assert_eq!(String::from_utf8_lossy(&out.stderr), "", "{args:?}");
    (out.status.code(), String::from_utf8(out.stdout).expect("UTF-8"))
}

fn json(args: &[&str], code: i32) -> Value {
    let (exit, text) = printed(root(), &[args, &["--format", "json"]].concat());
    assert_eq!(exit, Some(code), "{args:?}");
    serde_json::from_str(&text).expect("one JSON document")
}

fn list<'a>(value: &'a Value, key: &str) -> &'a Vec<Value> {
    value[key].as_array().unwrap_or_else(|| panic!("{key} is no list: {}", value[key]))
}

fn word<'a>(value: &'a Value, key: &str) -> &'a str {
    value[key].as_str().unwrap_or_else(|| panic!("{key} is no text: {}", value[key]))
}

#[test]
fn each_joint_ends_as_expected_with_the_rules_that_are_expected() {
    let expected: toml::Table =
        fs::read_to_string(folder().join("expected.toml")).expect("it is there").parse().expect("TOML");
    let review = json(&["review", "sample-exchange"], 1);
    for (count, key) in [("found", "joints_found"), ("scheduled", "joints_scheduled"), ("paired", "joints_paired")] {
        assert_eq!(review["counts"][count].as_i64(), expected[key].as_integer(), "{count}");
    }
    let mut left: BTreeMap<&str, &toml::Value> =
        expected["joint"].as_table().expect("[joint]").iter().map(|(mark, says)| (mark.as_str(), says)).collect();
    for joint in list(&review, "joints") {
        let mark = word(joint, "mark");
        let says = left.remove(mark).unwrap_or_else(|| panic!("{mark} is not expected, or stands twice"));
        let ids = |key: &str| -> BTreeSet<&str> {
            says.get(key)
                .and_then(toml::Value::as_array)
                .into_iter()
                .flatten()
                .filter_map(toml::Value::as_str)
                .collect()
        };
        let found: BTreeSet<&str> = list(joint, "findings").iter().map(|finding| word(finding, "rule")).collect();
        let allowed: BTreeSet<&str> = ids("rules").union(&ids("may")).copied().collect();
        assert_eq!(Some(word(joint, "outcome")), says["outcome"].as_str(), "{mark}");
        assert!(ids("rules").is_subset(&found) && found.is_subset(&allowed), "{mark}: {found:?}");
    }
    assert!(left.is_empty(), "no joint is called {left:?}");
}

/// Joints that end and the ends by which they are counted.
fn add_up(review: &Value) {
    let count = |key: &str| review["counts"][key].as_u64().unwrap_or_else(|| panic!("{key} is no count"));
    let joints = list(review, "joints");
    let of = |test: &dyn Fn(&&Value) -> bool| joints.iter().filter(test).count() as u64;
    let bare = of(&|j| matches!(word(j, "kind"), "not-found" | "not-paired"));
    assert_eq!(count("found") + bare, count("clear") + count("comment") + count("hold") + count("unproven"));
    for end in ["clear", "comment", "hold", "unproven"] {
        assert_eq!(count(end), of(&|j| word(j, "outcome") == end), "{end}");
    }
    assert_eq!(count("paired") + bare, count("scheduled"), "each line has steel or is listed without");
}

#[test]
fn the_counts_add_up() {
    add_up(&json(&["review", "sample-exchange"], 1));
    add_up(&json(&["review", "sample-exchange/model.ifcxml"], 1));
}

#[test]
fn without_a_schedule_every_joint_is_unproven_and_still_resists() {
    let review = json(&["review", "sample-exchange/model.ifcxml"], 1);
    assert_eq!(review["schedule"], Value::Null);
    assert_eq!(list(&review, "joints").len(), 41);
    for joint in list(&review, "joints") {
        let mark = word(joint, "mark");
        // B18 / S6 is J44: that its bolts are too short shows without a schedule.
        let outcome = if mark == "B18 / S6" { "hold" } else { "unproven" };
        assert_eq!(word(joint, "outcome"), outcome, "{mark}");
        assert!(list(joint, "missing").iter().any(|missing| word(missing, "what") == "required actions"), "{mark}");
        // W1 / K2 is J14: its bolts have no class. B12 / S2 is J33: nothing is credited with its haunch.
        let resists = joint["resistance"]["moment_knm"].as_f64().is_some_and(|m| m > 0.0);
        assert_eq!(resists, !["W1 / K2", "B12 / S2"].contains(&mark), "{mark}");
    }
    let (code, text) = printed(root(), &["review", "sample-exchange/model.ifcxml"]);
    assert_eq!(code, Some(1));
    let text = text.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(text.contains("without a schedule: resistances only, no joint can be proven"), "{text}");
    assert_eq!(printed(root(), &["review", "sample-exchange/model.ifcxml", "--allow-unproven"]).0, Some(1));
}

#[test]
fn the_same_input_gives_the_same_bytes() {
    for args in [
        &["review", "sample-exchange"][..],
        &["review", "sample-exchange", "--format", "json"],
        &["review", "sample-exchange", "--all"],
        &["survey", "sample-exchange"],
        &["survey", "sample-exchange", "--format", "json"],
    ] {
        let first = printed(root(), args);
        assert_eq!(first, printed(root(), args), "{args:?}");
        assert!(!first.1.contains('\u{1b}') && !first.1.contains('\r'), "{args:?}: no colour into a pipe");
        assert!(!first.1.contains(env!("CARGO_MANIFEST_DIR")), "{args:?}: no absolute path");

        // Elsewhere, with another environment, the same relative path leads to a copy.
        let elsewhere = tempfile::tempdir().expect("a folder");
        let copy = elsewhere.path().join("sample-exchange");
        fs::create_dir(&copy).expect("a folder");
        for file in ["model.ifcxml", "schedule.toml"] {
            fs::copy(folder().join(file), copy.join(file)).expect("a copy");
        }
        let mut command = Command::new(env!("CARGO_BIN_EXE_faying"));
        command.args(args).current_dir(elsewhere.path()).env_clear();
        let environment = [
            ("NO_COLOR", "1"),
            ("CLICOLOR_FORCE", "1"),
            ("COLUMNS", "40"),
            ("LANG", "de_DE"),
            ("TZ", "Asia/Tokyo"),
            ("TERM", "xterm"),
        ];
        let out = command.envs(environment).output().expect("the program runs");
        assert_eq!(first.1.as_bytes(), out.stdout, "{args:?}");
    }
}

#[test]
fn a_report_in_a_file_is_the_report_on_the_terminal() {
    let to = tempfile::tempdir().expect("a folder");
    let file = to.path().join("review.json");
    let args = ["review", "sample-exchange", "--format", "json"];
    let (code, text) = printed(root(), &[&args[..], &["-o", file.to_str().expect("UTF-8")]].concat());
    assert_eq!((code, text.as_str()), (Some(1), ""));
    assert_eq!(fs::read_to_string(&file).expect("it was written"), printed(root(), &args).1);
    assert_eq!(fs::read_dir(to.path()).expect("a folder").count(), 1, "nothing beside it");
}

/// A type that a key of the document must have.
#[derive(Clone, Copy, Debug)]
enum Is {
    Text,
    Number,
    Count,
    /// A number or nothing.
    MayNumber,
    /// A text or nothing.
    MayText,
    /// An object with these keys.
    One(&'static [Key]),
    /// The same, or nothing.
    MayOne(&'static [Key]),
    /// A list of such objects.
    Many(&'static [Key]),
    /// A list of texts.
    Texts,
}
use Is::*;

type Key = (&'static str, Is);

// The JSON review, version 1: it only ever grows.
const PLACE: &[Key] = &[("file", Text), ("line", Count), ("column", Count)];
const MEMBER: &[Key] = &[("guid", Text), ("mark", MayText), ("section", MayText), ("grade", MayText)];
const RESISTANCE: &[Key] =
    &[("moment_knm", MayNumber), ("moment_reversed_knm", MayNumber), ("shear_kn", MayNumber), ("governed_by", MayText)];
const JOINT: &[Key] = &[
    ("mark", Text),
    ("kind", Text),
    ("outcome", Text),
    ("reasons", Texts),
    ("supporting", MayOne(MEMBER)),
    ("supported", MayOne(MEMBER)),
    (
        "bolts",
        MayOne(&[
            ("count", Count),
            ("diameter_mm", MayNumber),
            ("class", MayText),
            ("gauge_mm", MayNumber),
            ("rows", Many(&[("height_mm", Number)])),
        ]),
    ),
    (
        "plates",
        Many(&[
            ("guid", Text),
            ("role", Text),
            ("thickness_mm", Number),
            ("width_mm", Number),
            ("depth_mm", Number),
            ("grade", MayText),
        ]),
    ),
    ("welds", Many(&[("role", Text), ("throat_mm", MayNumber)])),
    ("resistance", One(RESISTANCE)),
    ("intended_resistance", MayOne(RESISTANCE)),
    (
        "required",
        Many(&[
            ("case", Text),
            ("moment_knm", MayNumber),
            ("shear_kn", MayNumber),
            ("axial_kn", MayNumber),
            ("utilisation", MayNumber),
        ]),
    ),
    (
        "rows",
        Many(&[
            ("row", Count),
            ("lever_arm_mm", Number),
            ("potential_kn", Number),
            ("force_kn", Number),
            ("governed_by", Text),
        ]),
    ),
    (
        "checks",
        Many(&[
            ("id", Text),
            ("clause", Text),
            ("resistance", MayNumber),
            ("action", MayNumber),
            ("unit", Text),
            ("utilisation", MayNumber),
            ("outcome", Text),
        ]),
    ),
    (
        "findings",
        Many(&[
            ("rule", Text),
            ("severity", Text),
            ("message", Text),
            ("intended", MayText),
            ("detailed", MayText),
            ("elements", Texts),
            ("at", MayOne(PLACE)),
        ]),
    ),
];
const REVIEW: &[Key] = &[
    ("schema", Text),
    ("tool", One(&[("name", Text), ("version", Text)])),
    ("model", One(&[("file", Text), ("exchange", Text), ("sha256", Text)])),
    (
        "basis",
        One(&[("standard", Text), ("annex", Text), ("gamma_M0", Number), ("gamma_M1", Number), ("gamma_M2", Number)]),
    ),
    (
        "counts",
        One(&[
            ("found", Count),
            ("scheduled", Count),
            ("paired", Count),
            ("clear", Count),
            ("comment", Count),
            ("hold", Count),
            ("unproven", Count),
        ]),
    ),
    ("joints", Many(JOINT)),
    ("problems", Many(&[("message", Text), ("at", MayOne(PLACE))])),
];

fn has(value: &Value, keys: &[Key], at: &str) {
    for (key, is) in keys {
        let at = format!("{at}.{key}");
        let own = value.get(key).unwrap_or_else(|| panic!("{at} is not there"));
        let right = match is {
            Text => own.is_string(),
            Number => own.is_number(),
            Count => own.is_u64(),
            MayNumber => own.is_number() || own.is_null(),
            MayText => own.is_string() || own.is_null(),
            Texts => own.as_array().is_some_and(|all| all.iter().all(Value::is_string)),
            MayOne(_) if own.is_null() => true,
            One(keys) | MayOne(keys) => {
                has(own, keys, &at);
                own.is_object()
            }
            Many(keys) => own.as_array().is_some_and(|all| {
                all.iter().enumerate().for_each(|(index, one)| has(one, keys, &format!("{at}[{index}]")));
                true
            }),
        };
        assert!(right, "{at} is {own}, not {is:?}");
    }
}

#[test]
fn the_document_has_every_key_of_version_1() {
    let review = json(&["review", "sample-exchange"], 1);
    has(&review, REVIEW, "review");
    assert_eq!(review["schema"], "faying-review/1");
    assert_eq!(review["tool"]["name"], "faying");
    let words =
        |key: &str| -> BTreeSet<&str> { list(&review, "joints").iter().map(|joint| word(joint, key)).collect() };
    assert_eq!(words("outcome"), BTreeSet::from(["clear", "comment", "hold", "unproven"]));
    assert_eq!(words("kind"), BTreeSet::from(["end-plate-moment", "end-plate-splice", "not-found"]));
    let sum = review["model"]["sha256"].as_str().expect("a sum");
    assert!(sum.len() == 64 && sum.bytes().all(|b| b.is_ascii_hexdigit()), "{sum}");
    // Every list of the list above has been seen with something in it.
    for key in ["plates", "welds", "required", "rows", "checks", "findings"] {
        assert!(list(&review, "joints").iter().any(|joint| !list(joint, key).is_empty()), "{key}");
    }
    has(&json(&["review", "sample-exchange/model.ifcxml"], 1), REVIEW, "review");
}

/// J01 once by hand: marks, sizes and signs arrive where they belong.
#[test]
fn the_document_says_of_j01_what_was_drawn() {
    let review = json(&["review", "sample-exchange"], 1);
    let j01 = list(&review, "joints").iter().find(|joint| word(joint, "mark") == "J01").expect("J01");
    assert_eq!((word(&j01["supporting"], "mark"), word(&j01["supported"], "mark")), ("C1", "B1"));
    assert_eq!((j01["bolts"]["count"].as_u64(), j01["bolts"]["diameter_mm"].as_f64()), (Some(8), Some(24.0)));
    assert_eq!((word(&j01["bolts"], "class"), j01["bolts"]["gauge_mm"].as_f64()), ("8.8", Some(100.0)));
    let heights: Vec<f64> = list(&j01["bolts"], "rows").iter().filter_map(|row| row["height_mm"].as_f64()).collect();
    assert_eq!(heights, [502.0, 392.0, 302.0, 70.0]);
    let throats: Vec<(&str, Option<f64>)> =
        list(j01, "welds").iter().map(|weld| (word(weld, "role"), weld["throat_mm"].as_f64())).collect();
    assert_eq!(throats, [("flange-top", Some(10.0)), ("flange-bottom", Some(10.0)), ("web", Some(6.0))]);
    let moments: Vec<Option<f64>> = list(j01, "required").iter().map(|case| case["moment_knm"].as_f64()).collect();
    assert_eq!(moments, [Some(212.0), Some(150.0), Some(-70.0)]);
}
