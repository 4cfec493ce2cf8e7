//! The sample's papers (schedule, expected outcomes, README) held against each other and against the building.

use std::collections::{BTreeMap, BTreeSet};

use toml::{Table, Value};

use super::boathouse::{NOT_SCHEDULED, boathouse, intended};
use super::folder;
use super::slip_house::SPLICES;
use crate::writer::building::{Detail, Level, Stiffener};

fn text(file: &str) -> String {
    std::fs::read_to_string(folder().join(file)).unwrap_or_else(|error| panic!("{file}: {error}"))
}

fn table(file: &str) -> Table {
    text(file).parse().unwrap_or_else(|error| panic!("{file}: {error}"))
}

/// A value by its path of keys, "bolts.size".
fn at<'a>(value: &'a Value, path: &str) -> &'a Value {
    path.split('.').fold(value, |value, key| value.get(key).unwrap_or_else(|| panic!("{path} is not stated")))
}

fn number(value: &Value) -> f64 {
    value.as_float().or(value.as_integer().map(|integer| integer as f64)).expect("a number")
}

fn word<'a>(value: &'a Value, path: &str) -> &'a str {
    at(value, path).as_str().unwrap_or_else(|| panic!("{path} is no text"))
}

fn scheduled() -> Vec<Value> {
    table("schedule.toml")["joint"].as_array().expect("[[joint]]").clone()
}

fn expected() -> BTreeMap<String, Value> {
    table("expected.toml")["joint"].as_table().expect("[joint]").clone().into_iter().collect()
}

/// Mark of each joint in the steel with its beam's mark, end and column's mark.
fn steel() -> BTreeMap<String, (String, &'static str, String)> {
    let building = boathouse();
    let mut joints = BTreeMap::new();
    for beam in &building.beams {
        for (end, name) in beam.ends.iter().zip(["start", "end"]) {
            if let crate::writer::building::End::Joint { column, joint } = end {
                let place = (beam.mark.clone(), name, building.columns[*column].mark.clone());
                assert!(joints.insert(joint.mark.clone(), place).is_none(), "{} stands twice", joint.mark);
            }
        }
    }
    for (mark, [supported, supporting]) in SPLICES {
        joints.insert(mark.into(), (supported.into(), "start", supporting.into()));
    }
    joints
}

#[test]
fn the_schedule_states_the_details_that_the_building_was_drawn_from() {
    let schedule = table("schedule.toml");
    for (name, stated) in schedule["detail"].as_table().expect("[detail]") {
        let Detail { plate, bolts, welds, stiffeners } = intended(name);
        assert_eq!(word(stated, "bolts.size"), format!("M{}", bolts.diameter), "{name}");
        assert_eq!(Some(word(stated, "bolts.class")), bolts.class.as_ref().map(|(class, _)| class.as_str()), "{name}");
        let rows: Vec<f64> = at(stated, "bolts.rows_mm").as_array().expect("a list").iter().map(number).collect();
        assert_eq!(rows, bolts.rows, "{name}");
        let welds = welds.expect("the engineer states welds");
        for (path, drawn) in [
            ("bolts.gauge_mm", bolts.gauge),
            ("plate.thickness_mm", plate.thickness),
            ("plate.width_mm", plate.width),
            ("plate.top_mm", plate.top),
            ("plate.bottom_mm", plate.bottom),
            ("welds.flange_throat_mm", welds.flange),
            ("welds.web_throat_mm", welds.web),
        ] {
            assert_eq!(number(at(stated, path)), drawn, "{name}: {path}");
        }
        assert!(plate.grade.starts_with(word(stated, "plate.grade")), "{name}");
        for (path, level) in [("stiffeners.top", Level::Top), ("stiffeners.bottom", Level::Bottom)] {
            let Some(stated) = path.split('.').try_fold(stated, |value, key| value.get(key)) else { continue };
            if stated.get("length_mm").is_some() {
                continue; // of partial depth: no stiffener of the detail
            }
            let drawn: Option<&Stiffener> = stiffeners.iter().find(|stiffener| stiffener.at == level);
            assert_eq!(stated.as_str() == Some("none"), drawn.is_none(), "{name}: {path}");
            if let Some(drawn) = drawn {
                assert_eq!(number(at(stated, "thickness_mm")), drawn.thickness, "{name}: {path}");
            }
        }
    }
}

#[test]
fn every_scheduled_joint_but_one_has_steel_where_the_schedule_says() {
    let steel = steel();
    let mut without = Vec::new();
    let mut named = BTreeSet::new();
    for joint in scheduled() {
        let mark = word(&joint, "mark").to_owned();
        let stated = (word(&joint, "supported"), word(&joint, "end"), word(&joint, "supporting"));
        match steel.get(&mark) {
            Some((beam, end, column)) => assert_eq!(stated, (beam.as_str(), *end, column.as_str()), "{mark}"),
            None => without.push(mark.clone()),
        }
        assert!(named.insert(mark.clone()), "{mark} is scheduled twice");
    }
    assert_eq!(without, ["J27"]);
    let unnamed: Vec<_> = steel.keys().filter(|mark| !named.contains(*mark)).collect();
    assert_eq!(unnamed, [NOT_SCHEDULED]);
}

#[test]
fn the_members_are_of_the_sections_that_the_schedule_states() {
    let building = boathouse();
    let details = table("schedule.toml");
    for joint in scheduled() {
        let members = at(&details["detail"], &format!("{}.members", word(&joint, "detail"))).clone();
        let Some(beam) = building.beams.iter().find(|beam| beam.mark == word(&joint, "supported")) else { continue };
        let supporting = word(&joint, "supporting");
        let columns = building.columns.iter().map(|column| (&column.mark, &column.section, &column.grade));
        let beams = building.beams.iter().map(|beam| (&beam.mark, &beam.section, &beam.grade));
        let (_, section, grade) = columns.chain(beams).find(|(own, ..)| *own == supporting).expect("a member");
        let mark = word(&joint, "mark");
        assert_eq!(word(&members, "supporting_section"), section.name, "{mark}");
        assert_eq!(word(&members, "supported_section") != beam.section.name, ["J23", "J24"].contains(&mark), "{mark}");
        assert!(grade.starts_with(word(&members, "supporting_grade")), "{mark}");
        assert!(beam.grade.starts_with(word(&members, "supported_grade")), "{mark}");
    }
}

#[test]
fn each_joint_has_one_expected_outcome_and_the_readme_tells_the_same() {
    let expected = expected();
    let mut marks: BTreeSet<String> = scheduled().iter().map(|joint| word(joint, "mark").to_owned()).collect();
    marks.insert(NOT_SCHEDULED.to_owned());
    assert_eq!(expected.keys().cloned().collect::<BTreeSet<_>>(), marks);
    let counts = table("expected.toml");
    assert_eq!(counts["joints_found"].as_integer(), Some(steel().len() as i64));
    assert_eq!(counts["joints_scheduled"].as_integer(), Some(scheduled().len() as i64));
    let readme = text("README.md");
    for (mark, says) in &expected {
        let outcome = word(says, "outcome");
        let line = readme.lines().rfind(|line| line.starts_with(&format!("| {mark} |"))).expect("a line a joint");
        assert!(line.ends_with(&format!("| {outcome} |")), "{mark}: {outcome}, README.md says {line}");
    }
}

#[test]
fn each_expected_rule_is_a_rule() {
    for (mark, says) in expected() {
        let may = says.get("may").and_then(Value::as_array).cloned().unwrap_or_default();
        for rule in at(&says, "rules").as_array().expect("a list").iter().chain(&may) {
            let id = rule.as_str().expect("a rule's id");
            assert!(faying::findings::rule(id).is_some(), "{mark}: {id} is no rule");
        }
    }
}
