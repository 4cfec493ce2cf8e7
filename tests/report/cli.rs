//! The built program, from outside: wrong use, exit codes, and what it leaves behind.

use std::ffi::OsStr;
use std::fs;
use std::path::Path;
use std::process::{Command, Output, Stdio};

fn faying(args: impl IntoIterator<Item = impl AsRef<OsStr>>) -> Output {
    Command::new(env!("CARGO_BIN_EXE_faying")).args(args).output().unwrap()
}

/// Runs, expects exit code 2 with nothing on stdout, and gives stderr.
fn refused(args: &[&str]) -> String {
    let out = faying(args);
    let told = String::from_utf8(out.stderr).unwrap();
    assert_eq!((out.status.code(), out.stdout.len()), (Some(2), 0), "{args:?}: {told}");
    assert!(!told.contains("panicked"), "{told}");
    told
}

/// A folder that holds these files with nothing worth reading in them.
fn folder(files: &[&str]) -> tempfile::TempDir {
    let folder = tempfile::tempdir().unwrap();
    for file in files {
        let path = folder.path().join(file);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, "nothing").unwrap();
    }
    folder
}

fn text(path: &Path) -> &str {
    path.to_str().unwrap()
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

#[test]
fn wrong_inputs_are_refused_in_one_sentence() {
    let empty = folder(&[]);
    let two = folder(&["a.ifcxml", "b.IFC", "schedule.csv"]);
    let below = folder(&["old/a.ifcxml"]);
    let bare_rules = folder(&["a.ifcxml", "rules/notes.txt"]);
    let one = folder(&["a.ifcxml"]);
    let (a, rules) = (one.path().join("a.ifcxml"), bare_rules.path().join("rules"));
    let absent = one.path().join("absent.csv");
    for (args, said) in [
        (vec!["review", "absent.ifcxml"], "absent.ifcxml: there is no such file"),
        (vec!["survey", "absent.ifcxml"], "absent.ifcxml: there is no such file"),
        (vec!["review", text(empty.path())], "holds no shop model"),
        (vec!["survey", text(empty.path())], "holds no shop model"),
        (vec!["review", text(below.path())], "holds no shop model"),
        (vec!["review", text(two.path())], "must hold one shop model and holds 2: a.ifcxml, b.IFC"),
        (vec!["review", text(&a), "--schedule", text(&absent)], "can't read the schedule"),
        (vec!["review", text(&a), "--rules", text(&rules)], "holds no .toml or .csv file"),
        (vec!["review", text(&a), "--rules", text(&absent)], "can't read the rule folder"),
        (vec!["rules", "no-such-rule"], "no rule is called \"no-such-rule\""),
    ] {
        let told = refused(&args);
        assert!(told.contains(said), "{args:?} said {told:?}");
        assert_eq!(told.lines().count(), 1, "{args:?} said {told:?}");
    }
}

#[test]
fn wrong_arguments_are_refused_with_what_is_allowed() {
    for (args, said) in [
        (vec!["review", "a.ifcxml", "--format", "yaml"], "[possible values: text, json]"),
        (vec!["review", "a.ifcxml", "--color", "some"], "[possible values: auto, always, never]"),
        (vec!["review"], "PATH"),
        (vec!["inspect"], "inspect"),
        (vec!["completions", "abacus"], "bash"),
    ] {
        let told = refused(&args);
        assert!(told.contains(said), "{args:?} said {told:?}");
    }
}

#[test]
fn a_report_that_cannot_be_written_is_refused_and_leaves_nothing() {
    let folder = folder(&["a.ifcxml", "schedule.csv", "taken/b"]);
    let model = folder.path().join("a.ifcxml");
    let schedule = folder.path().join("schedule.csv");
    let before = names(folder.path());
    for (target, said) in [
        (folder.path().join("absent/report.txt"), "its folder does not exist"),
        (folder.path().join("taken"), "it is a folder"),
        (model.clone(), "it is one of the inputs"),
        (schedule.clone(), "it is one of the inputs"),
    ] {
        let told = refused(&["review", text(folder.path()), "-o", text(&target)]);
        assert!(told.contains(said) && told.contains(text(&target)), "{told}");
    }
    assert_eq!(names(folder.path()), before);
    assert_eq!(fs::read_to_string(model).unwrap(), "nothing");
    assert_eq!(fs::read_to_string(schedule).unwrap(), "nothing");
}

#[test]
fn a_refused_run_leaves_the_last_report_as_it_was() {
    let folder = folder(&["a.ifcxml", "report.txt"]);
    let (model, report) = (folder.path().join("a.ifcxml"), folder.path().join("report.txt"));
    refused(&["review", text(&model), "--schedule", "absent.csv", "-o", text(&report)]);
    assert_eq!(fs::read_to_string(&report).unwrap(), "nothing");
    assert_eq!(names(folder.path()), ["a.ifcxml", "report.txt"]);
}

#[test]
fn help_says_what_the_exit_codes_mean() {
    for args in [&["--help"][..], &["review", "--help"]] {
        let out = faying(args);
        let told = String::from_utf8(out.stdout).unwrap();
        assert_eq!(out.status.code(), Some(0));
        for said in ["Exit codes:", "  1  at least one joint is on hold", "a licensed engineer decide"] {
            assert!(told.contains(said), "{args:?}: {told}");
        }
        assert!(!told.contains('\u{1b}'), "no colour into a pipe");
    }
}

#[test]
fn every_rule_has_its_page_and_a_misspelt_one_names_it() {
    let list = String::from_utf8(faying(["rules"]).stdout).unwrap();
    for rule in faying::findings::RULES {
        assert!(list.lines().any(|line| line.split(' ').next() == Some(rule.id)), "{} in {list}", rule.id);
        assert_eq!(String::from_utf8(faying(["rules", rule.id]).stdout).unwrap().trim(), rule.page.trim());
        let told = refused(&["rules", &format!("{}r", rule.id)]);
        assert!(told.contains(&format!("near it: {}", rule.id)), "{told}");
    }
}

#[test]
fn a_closed_pipe_is_no_failure() {
    let (reader, writer) = std::io::pipe().unwrap();
    drop(reader);
    let mut command = Command::new(env!("CARGO_BIN_EXE_faying"));
    command.args(["completions", "bash"]).stdout(writer).stderr(Stdio::piped());
    let out = command.spawn().unwrap().wait_with_output().unwrap();
    assert_eq!((out.status.code(), String::from_utf8_lossy(&out.stderr).as_ref()), (Some(0), ""));
}

/// The factors of each annex reach the report, and the strength table, the rule for row forces and α follow the rules.
#[test]
fn annexes_and_readings_come_by_the_command_line() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let sample = root.join("sample-exchange");
    let basis = |more: &[&str]| {
        let out = faying([&["review", text(&sample), "--format", "json"], more].concat());
        let json: serde_json::Value = serde_json::from_slice(&out.stdout).unwrap();
        (json["basis"].clone(), json["joints"][0]["resistance"]["moment_knm"].as_f64())
    };
    let setting = |basis: &serde_json::Value, name: &str| {
        let all = basis["settings"].as_array().unwrap();
        all.iter().find(|s| s["name"] == name).unwrap_or_else(|| panic!("{name}"))["value"].as_str().unwrap().to_owned()
    };
    let (plain, as_it_is) = basis(&[]);
    assert_eq!(setting(&plain, "table of steel strengths"), "EN 10025-2");
    for (id, name, gamma_m0, gamma_m1) in [
        ("recommended", "recommended values", 1.0, 1.0),
        ("uk", "United Kingdom", 1.0, 1.0),
        ("de", "Germany", 1.0, 1.1),
        ("fr", "France", 1.0, 1.0),
        ("nl", "Netherlands", 1.0, 1.0),
        ("it", "Italy", 1.05, 1.05),
        ("es", "Spain", 1.05, 1.05),
    ] {
        let (basis, moment) = basis(&["--annex", id]);
        assert_eq!(basis["annex"], name);
        assert_eq!((basis["gamma_M0"].as_f64(), basis["gamma_M1"].as_f64()), (Some(gamma_m0), Some(gamma_m1)), "{id}");
        assert_eq!(setting(&basis, "row forces").contains("UK practice"), id == "uk", "{id}");
        assert!(gamma_m0 == 1.0 || moment < as_it_is, "{id}: {moment:?} {as_it_is:?}");
    }
    let rules = tempfile::tempdir().unwrap();
    let detailing = fs::read_to_string(root.join("rules/detailing.toml")).unwrap();
    let steel = fs::read_to_string(root.join("rules/steel.toml")).unwrap();
    let detailing = detailing.replace("alpha = \"chart\"", "alpha = \"draft-2024\"");
    fs::write(rules.path().join("detailing.toml"), detailing).unwrap();
    let steel = steel.replace("\ntable = \"EN 10025-2\"", "\ntable = \"EN 1993-1-1:2005 Table 3.1\"");
    fs::write(rules.path().join("steel.toml"), steel).unwrap();
    let (own, other) = basis(&["--rules", text(rules.path())]);
    assert_eq!(setting(&own, "table of steel strengths"), "EN 1993-1-1:2005 Table 3.1");
    assert!(setting(&own, "α beside stiffeners and flanges").contains("draft"));
    assert_ne!(other, as_it_is);
    let told = refused(&["review", text(&sample), "--annex", "xx"]);
    assert!(told.contains("annex \"xx\"; allowed is de, es, fr, it, nl, recommended, uk"), "{told}");
}

/// The stiffness is given whatever the schedule states; the class needs the span.
#[test]
fn a_report_says_the_stiffness_and_what_the_class_would_need() {
    let sample = Path::new(env!("CARGO_MANIFEST_DIR")).join("sample-exchange");
    let json = faying(["review", text(&sample), "--format", "json"]).stdout;
    let json: serde_json::Value = serde_json::from_slice(&json).unwrap();
    let all: Vec<_> = json["joints"]
        .as_array()
        .unwrap()
        .iter()
        .filter(|j| !j["stiffness"].is_null() && j["mark"].as_str() < Some("J30"))
        .collect();
    assert!(!all.is_empty());
    for stiffness in all.iter().map(|joint| &joint["stiffness"]) {
        assert!(stiffness["initial_knm_per_rad"].as_f64().is_some_and(|s| s > 0.0), "{stiffness}");
        // A class only where a limit stands beside it, and the other way round.
        let class = stiffness["class"].as_str().unwrap();
        assert_eq!(class.starts_with("not stated"), stiffness["rigid_from_knm_per_rad"].is_null(), "{stiffness}");
        let springs = stiffness["springs"].as_array().unwrap();
        assert_eq!(springs.last().unwrap()["title"], "rows in tension, keq");
    }
    let page = String::from_utf8(faying(["review", text(&sample)]).stdout).unwrap();
    assert!(page.contains("stiffness: Sj,ini "), "{page}");
}
