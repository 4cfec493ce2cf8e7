//! Reports, drawn from reviews that are built by hand.

mod build;
mod cli;
mod sheet;

use std::ffi::OsStr;
use std::fmt::Write;

use build::{MODEL, finding, joint, missing, place, review, small, thin, used};
use faying::report::json::{self, document};
use faying::report::{Options, in_colour, survey, text};
use faying::review::{CAUTION, JointReview, Outcome, Review};
use proptest::prelude::*;
use serde_json::{Value, json};

fn drawn(review: &Review) -> String {
    text::render(review, &Options::default(), Some(MODEL.as_bytes()))
}

/// What stands between two headings.
fn section(text: &str, heading: &str) -> String {
    let rest = text.split_once(&format!("\n\n{heading}")).unwrap_or_else(|| panic!("no {heading} in {text}")).1;
    let end = rest.match_indices("\n\n").find(|(at, _)| rest[at + 2..].bytes().take(2).all(|b| b.is_ascii_uppercase()));
    rest[..end.map_or(rest.len(), |(at, _)| at)].to_owned()
}

#[test]
fn a_small_review_reads_from_what_can_hurt_to_what_it_stands_on() {
    let expected = r#"Review of hall.ifcxml (IFC4 ifcXML) against schedule.csv
7 joints: 3 on hold, 2 unproven, 1 with a comment, 1 clear.

ON HOLD: 3 joints, worst first
B1/C1: utilisation 1.31, governed by end plate in bending, rows 1-2 (mode 1)
   B1 (IPE 400, S355) on C1 (HEB 260, S355); end-plate-moment, intended detail M3
   required (LC1): M 262.0 kNm, V 120.0 kN, N not stated
   resistance: M 200.0 kNm, V 400.0 kN
   as intended it would resist M 270.1 kNm, V 400.0 kN
   moment-short: M_Ed = 262.0 kNm is 1.31 of the resistance
   plate-thinner: the end plate is thinner than intended (intended 20 mm, detailed 15 mm)
     part P1 (GlobalId guid-P1)
     intended               detailed
     end plate 20 mm S275 ≠ end plate 15 mm S275
                          + backing plate
   look at hall.ifcxml:2:27
     …Plate id="i7" Name="end plate" Tag="P1"><x/></IfcPlate>
                          ^
   the same faults at 1 more joint: B2/C2 (1.02, part P2)

Scheduled, but without steel (see MISSING): B4/C4

UNPROVEN: 2 joints, by what is missing
   bolt class (1 joint): B3/C3
     no material, name or property of the bolts states one; first at hall.ifcxml:103:3
   Without required actions (see MISSING): B5/C5

MISSING: 1 scheduled joint without steel, 1 joint of the steel without required actions
   B4/C4: scheduled, no steel found; required M 80.0 kNm, V 120.0 kN, N not stated, schedule.csv:5:1
   No schedule line states actions for these:
   end-plate-moment, IPE 400 on HEB 260
     1 joint: B5/C5; first at hall.ifcxml:105:3

DEVIATES BUT CARRIES: 1 joint, utilisation up to 0.75
   plate-thicker: the end plate is thicker than intended (intended 20 mm, detailed 25 mm)
     1 joint: B6/C6; first at hall.ifcxml:106:3

CLEAR: 1 joint, utilisation up to 0.97, the most used first: B7/C7

JOINTS, worst first; M and V of the case that governs
joint  outcome   util.  governed by                               M_Ed   M_Rd   V_Ed   V_Rd  detail
                                                                   kNm    kNm     kN     kN
------ --------- ------ ---------------------------------------- ------ ------ ------ ------ -------
B1/C1  hold       1.31  end plate in bending, rows 1-2 (mode 1)  262.0  200.0  120.0  400.0  M3
B2/C2  hold       1.02  end plate in bending, rows 1-2 (mode 1)  205.0  200.0  120.0  400.0  M3
B4/C4  hold          -  no steel found                            80.0      -  120.0      -  -
B3/C3  unproven   0.60  end plate in bending, rows 1-2 (mode 1)  120.0  200.0  120.0  400.0  -
B5/C5  unproven      -  end plate in bending, rows 1-2 (mode 1)      -  200.0      -  400.0  -
B6/C6  comment    0.75  end plate in bending, rows 1-2 (mode 1)  180.0  240.0  120.0  400.0  -
B7/C7  clear      0.97  end plate in bending, rows 1-2 (mode 1)  194.0  200.0  120.0  400.0  -

COUNTS
   joints found 6, scheduled 6, paired 5, assessed 6; clear 1, comment 1, hold 3, unproven 2

BASIS
   EN 1993-1-8:2005, recommended values (EN 1993-1-8:2005 Table 2.1)
   γM0 = 1.00, γM1 = 1.00, γM2 = 1.25
   row forces: in proportion beyond 1.9 Ft,Rd
   M is positive with tension at the top of the joint, N in tension; V by magnitude.
   model hall.ifcxml, SHA-256 ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12ab12

ASSUMED
   thread in the shear plane (rule file): at B6/C6, B7/C7

PROBLEMS in model and schedule: 2
   hall.ifcxml:9:5 the length "abc" is no number
   the schedule states no intended detail M9

An aid to review, not a design: local codes, national annexes and a licensed engineer decide.
"#;
    assert_eq!(drawn(&small()), expected);
}

#[test]
fn a_review_without_joints_says_that_nothing_is_proven() {
    let text = drawn(&review(Vec::new()));
    assert!(text.contains("No joint was found and none is scheduled: nothing is proven."), "{text}");
    assert!(text.contains("joints found 0, scheduled 0, paired 0, assessed 0;"), "{text}");
    assert_eq!(review(Vec::new()).exit_code(), 3);
}

#[test]
fn one_clear_joint_is_told_as_one() {
    let text = drawn(&review(vec![used(joint(1, Outcome::Clear), 200.0, 100.0)]));
    assert!(text.contains("\n1 joint: 0 on hold, 0 unproven, 0 with a comment, 1 clear.\n"), "{text}");
    assert!(text.contains("\nON HOLD: none\n\nUNPROVEN: none\n\nMISSING: none\n"), "{text}");
    assert!(text.contains("\nCLEAR: 1 joint, utilisation up to 0.50, the most used first: B1/C1\n"), "{text}");
}

#[test]
fn without_a_schedule_every_joint_wants_for_actions_and_none_is_called_unscheduled() {
    let mut bare = joint(1, Outcome::Unproven);
    bare.missing = vec![missing("required actions", "no schedule was given", None)];
    let mut without = review(vec![bare]);
    without.schedule = None;
    let text = drawn(&without);
    assert!(text.contains("without a schedule: resistances only, no joint can be proven"), "{text}");
    assert!(section(&text, "UNPROVEN").contains("required actions (1 joint): B1/C1\n     no schedule was given"));
    assert!(text.contains("\nMISSING: no schedule was given to hold the steel against\n"), "{text}");
}

/// Four thousand joints: half on hold with two faults, a quarter unproven, a quarter clear.
fn many() -> Review {
    let one = |n: usize| match n % 4 {
        0 => thin(n, 201.0 + f64::from(u32::try_from(n).unwrap()) / 100.0),
        1 => used(joint(n, Outcome::Hold), 200.0, 210.0),
        2 => used(joint(n, Outcome::Clear), 200.0, 120.0),
        _ => {
            let mut joint = used(joint(n, Outcome::Unproven), 200.0, 120.0);
            joint.missing = vec![missing("bolt class", "nothing states one", joint.at.clone())];
            joint
        }
    };
    review((0..4000).map(one).collect())
}

#[test]
fn four_thousand_joints_stay_short_unless_all_are_asked_for() {
    let review = many();
    let short = drawn(&review);
    assert!(short.lines().count() < 150, "{} lines", short.lines().count());
    for said in [
        "4000 joints: 2000 on hold, 1000 unproven, 0 with a comment, 1000 clear.",
        "the same faults at 999 more joints: B3992/C3992",
        "and 988 more",
        "and 3970 more joints",
        "Long lists are cut short; --all shows them in full.",
    ] {
        assert!(short.contains(said), "no {said:?} in {short}");
    }
    let long = text::render(&review, &Options { all: true, ..Options::default() }, Some(MODEL.as_bytes()));
    assert!(!long.contains("more joints;") && !long.contains("cut short"));
    for joint in &review.joints {
        assert!(long.contains(&joint.mark), "{} is not told", joint.mark);
    }
}

#[test]
fn like_faults_are_told_once_and_unlike_ones_apart() {
    let mut thicker_fault = thin(3, 230.0);
    thicker_fault.findings[1].detailed = Some("12 mm".into());
    let mut other_governs = thin(4, 240.0);
    other_governs.required[0].governed_by = Some("column web panel in shear".into());
    let holds = section(&drawn(&review(vec![thin(1, 262.0), thin(2, 205.0), thicker_fault, other_governs])), "ON HOLD");
    assert_eq!(holds.matches("plate-thinner: ").count(), 3, "{holds}");
    assert!(holds.contains("at 1 more joint: B2/C2 (1.02, part P2)"), "{holds}");
    // Worst first.
    let order: Vec<usize> = ["B1/C1: ", "B4/C4: ", "B3/C3: "].iter().map(|mark| holds.find(mark).unwrap()).collect();
    assert!(order.is_sorted(), "{holds}");
}

#[test]
fn a_value_that_the_message_gives_is_not_said_twice() {
    for (message, said) in [
        ("the plate is thinner: 20 mm instead of 25 mm", "the plate is thinner: 20 mm instead of 25 mm\n"),
        ("the plate of 125 mm is thinner: 20 mm", "the plate of 125 mm is thinner: 20 mm (intended 25 mm)\n"),
        ("the plate is thinner", "the plate is thinner (intended 25 mm, detailed 20 mm)\n"),
    ] {
        let mut held = used(joint(1, Outcome::Hold), 200.0, 250.0);
        held.findings = vec![finding("plate-thinner", Outcome::Hold, message, Some(("25 mm", "20 mm")))];
        let text = drawn(&review(vec![held]));
        assert!(text.contains(&format!("plate-thinner: {said}")), "{text}");
    }
}

#[test]
fn an_edge_distance_is_a_fault_of_its_own_and_a_moment_is_not() {
    let short = |n, rule, message: &str| {
        let mut held = used(joint(n, Outcome::Hold), 200.0, 250.0);
        held.findings = vec![finding(rule, Outcome::Hold, message, None)];
        held
    };
    for (rule, groups) in [("edge-distance-short", 2), ("moment-short", 1)] {
        let text = drawn(&review(vec![short(1, rule, "20 instead of 24"), short(2, rule, "22 instead of 24")]));
        assert_eq!(section(&text, "ON HOLD").matches(&format!("{rule}: ")).count(), groups, "{text}");
    }
}

#[test]
fn what_the_lines_above_say_is_not_said_again() {
    let mut held = used(joint(1, Outcome::Hold), 200.0, 250.0);
    let message =
        "the joint does not carry the moment: utilisation 1.25, governed by end plate in bending, rows 1-2 (mode 1)";
    held.findings = vec![finding("moment-short", Outcome::Hold, message, Some(("250.0 kNm", "200.0 kNm")))];
    assert!(drawn(&review(vec![held.clone()])).contains("\n   moment-short: as said above\n"));
    // Another component governs the moment than the case: both are said.
    held.required[0].governed_by = Some("weld at the tension flange".into());
    assert!(drawn(&review(vec![held])).contains("\n   moment-short: the joint does not carry the moment"));
}

#[test]
fn one_question_settles_many_joints_and_names_the_held_ones_too() {
    let lacking = |n: usize, outcome, what: &[&str]| {
        let mut joint = used(joint(n, outcome), 200.0, 250.0);
        joint.missing = what.iter().map(|what| missing(what, "nothing states it", joint.at.clone())).collect();
        joint
    };
    let text = drawn(&review(vec![
        lacking(1, Outcome::Unproven, &["weld throat", "bolt class"]),
        lacking(2, Outcome::Unproven, &["bolt class"]),
        lacking(3, Outcome::Hold, &["bolt class"]),
    ]));
    let unproven = section(&text, "UNPROVEN");
    let class = unproven.find("bolt class (2 joints): B1/C1, B2/C2; and on hold: B3/C3").expect(&unproven);
    assert!(class < unproven.find("weld throat (1 joint): B1/C1").expect(&unproven), "{unproven}");
}

#[test]
fn nothing_unproven_goes_unexplained() {
    let mut by_reason = joint(1, Outcome::Unproven);
    by_reason.reasons = vec!["fin plates are not assessed yet".into()];
    let mut by_finding = joint(2, Outcome::Unproven);
    by_finding.findings = vec![finding("weld-not-found", Outcome::Unproven, "no weld at the upper flange", None)];
    by_finding.reasons = vec!["no weld at the upper flange".into()];
    let mut deviating = joint(3, Outcome::Unproven);
    deviating.findings = vec![finding("plate-thicker", Outcome::Comment, "the end plate is thicker", None)];
    let mut all = review(vec![by_reason, by_finding, deviating]);
    all.schedule = None;
    let unproven = section(&drawn(&all), "UNPROVEN");
    for said in [
        "fin plates are not assessed yet\n     1 joint: B1/C1",
        "weld-not-found: no weld at the upper flange\n     1 joint: B2/C2",
        "no reason is recorded\n     1 joint: B3/C3",
        "not proven to carry:\n   plate-thicker: the end plate is thicker\n     1 joint: B3/C3",
    ] {
        assert!(unproven.contains(said), "no {said:?} in {unproven}");
    }
    assert_eq!(unproven.matches("no weld at the upper flange").count(), 1, "told once: {unproven}");
}

#[test]
fn what_was_done_without_on_the_safe_side_is_said() {
    let mut carries = used(joint(1, Outcome::Clear), 200.0, 100.0);
    carries.missing = vec![missing("root radius", "the profile states none", None)];
    let assumed = section(&drawn(&review(vec![carries])), "ASSUMED");
    assert!(assumed.contains("on the safe side without the root radius at B1/C1\n     the profile states none"));
}

#[test]
fn an_excess_never_reads_as_full() {
    for (moment, said) in [
        (194.0, "0.97"),
        (199.9, "1.00"),
        (200.0, "1.00"),
        (200.002, "1.00001"),
        (200.1, "1.0005"),
        (200.6, "1.003"),
        (201.0, "1.005"),
        (202.0, "1.01"),
        (262.0, "1.31"),
        (f64::INFINITY, "no resistance"),
        (f64::NAN, "not a number"),
    ] {
        let text = drawn(&review(vec![used(joint(1, Outcome::Hold), 200.0, moment)]));
        assert!(text.contains(&format!("B1/C1: utilisation {said},")), "{moment}: {text}");
    }
}

#[test]
fn a_part_is_named_even_where_no_finding_names_one() {
    let mut short = used(joint(1, Outcome::Hold), 200.0, 250.0);
    short.plates = vec![build::plate(1, 15.0)];
    let text = text::render(&review(vec![short]), &Options { width: 140, ..Options::default() }, None);
    let said = "parts: end-plate P1 (GlobalId guid-P1), member B1 (GlobalId guid-B1), member C1 (GlobalId guid-C1)";
    assert!(text.contains(said), "{text}");
}

#[test]
fn the_window_is_short_and_points_at_the_place() {
    let long = format!("<a>\r\n{}<IfcPlate Tag=\"P1\"/>{}\r\n</a>", "ä".repeat(50_000), "x".repeat(50_000));
    let mut held = used(joint(1, Outcome::Hold), 200.0, 250.0);
    held.at = Some(place("hall.ifcxml", 2, 50_001));
    let text = text::render(&review(vec![held.clone()]), &Options::default(), Some(long.as_bytes()));
    let lines: Vec<&str> = text.lines().collect();
    let at = lines.iter().position(|line| line.contains("<IfcPlate")).unwrap();
    assert!(lines[at].chars().count() <= 105, "{}", lines[at]);
    let column = lines[at + 1].chars().position(|c| c == '^').unwrap();
    assert_eq!(lines[at].chars().skip(column).take(9).collect::<String>(), "<IfcPlate");

    // A place that the file does not have, an archive, UTF-16: no window, no harm.
    for (line, column, bytes) in [
        (0, 0, MODEL.as_bytes()),
        (2, 900, MODEL.as_bytes()),
        (9, 1, MODEL.as_bytes()),
        (u32::MAX, u32::MAX, MODEL.as_bytes()),
        (1, 1, b"PK\x03\x04<IfcPlate"),
        (1, 1, b"\xff\xfe<\0I\0"),
        (1, 1, b""),
    ] {
        held.at = Some(place("hall.ifcxml", line, column));
        let text = text::render(&review(vec![held.clone()]), &Options::default(), Some(bytes));
        assert!(!text.contains('^'), "{line}:{column}: {text}");
    }
    // The schedule's places are not looked up in the model.
    held.at = Some(place("schedule.csv", 2, 1));
    assert!(!drawn(&review(vec![held])).contains('^'));
}

#[test]
fn the_difference_shows_only_what_changed() {
    let mut same = thin(1, 262.0);
    let intended = same.difference.clone().unwrap().0;
    same.difference = Some((intended.clone(), intended));
    assert!(!drawn(&review(vec![same.clone()])).contains("     intended "));
    same.difference = Some((vec!["row 1 450 mm".into(), "row 2 345 mm".into()], vec!["row 2 345 mm".into()]));
    let text = drawn(&review(vec![same]));
    assert!(text.contains("     row 1 450 mm −\n"), "{text}");
    assert!(!text.contains("row 2"), "{text}");
}

#[test]
fn colour_only_adds_escapes() {
    let plain = drawn(&small());
    let options = Options { colour: true, ..Options::default() };
    let coloured = text::render(&small(), &options, Some(MODEL.as_bytes()));
    assert!(!plain.contains('\u{1b}') && coloured.contains("\u{1b}[1m\u{1b}[31mB1/C1: "), "{coloured:?}");
    let mut stripped = String::new();
    for (n, piece) in coloured.split('\u{1b}').enumerate() {
        stripped.push_str(if n == 0 { piece } else { piece.split_once('m').unwrap().1 });
    }
    assert_eq!(stripped, plain);
}

#[test]
fn colour_is_for_terminals_without_no_color() {
    let no_color = Some(OsStr::new("1"));
    for (asked, terminal, no_color, coloured) in [
        (None, true, None, true),
        (None, true, Some(OsStr::new("")), true),
        (None, true, no_color, false),
        (None, false, None, false),
        (Some(true), false, no_color, true),
        (Some(false), true, None, false),
    ] {
        assert_eq!(in_colour(asked, terminal, no_color), coloured, "{asked:?} {terminal} {no_color:?}");
    }
}

#[test]
fn the_text_keeps_to_its_width() {
    for width in [80, 100, 140] {
        let text = text::render(&small(), &Options { width, ..Options::default() }, Some(MODEL.as_bytes()));
        let longest = text.lines().filter(|line| !line.contains("SHA-256")).map(|l| l.chars().count()).max().unwrap();
        assert!(longest <= width, "{longest} > {width}\n{text}");
    }
}

#[test]
fn the_json_has_the_keys_of_version_one() {
    let text = json::review(&small()).unwrap();
    let value: Value = serde_json::from_str(&text).unwrap();
    for (pointer, expected) in [
        ("/schema", json!("faying-review/1")),
        ("/tool/name", json!("faying")),
        ("/model/file", json!("hall.ifcxml")),
        ("/model/exchange", json!("IFC4 ifcXML")),
        ("/basis/standard", json!("EN 1993-1-8:2005")),
        ("/basis/annex", json!("recommended values")),
        ("/basis/gamma_M0", json!(1.0)),
        ("/basis/gamma_M1", json!(1.0)),
        ("/basis/gamma_M2", json!(1.25)),
        (
            "/counts",
            json!({"found": 6, "scheduled": 6, "paired": 5, "assessed": 6, "clear": 1, "comment": 1, "hold": 3,
                   "unproven": 2}),
        ),
        ("/joints/0/mark", json!("B1/C1")),
        ("/joints/0/kind", json!("end-plate-moment")),
        ("/joints/0/outcome", json!("hold")),
        ("/joints/0/reasons/1", json!("the end plate is thinner than intended")),
        ("/joints/0/supporting", json!({"guid": "guid-C1", "mark": "C1", "section": "HEB 260", "grade": "S355"})),
        ("/joints/0/supported/guid", json!("guid-B1")),
        ("/joints/0/bolts", Value::Null),
        (
            "/joints/0/plates/0",
            json!({"guid": "guid-P1", "mark": "P1", "role": "end-plate", "thickness_mm": 15.0, "width_mm": 180.0,
                   "depth_mm": 510.0, "grade": "S275"}),
        ),
        (
            "/joints/0/resistance",
            json!({"moment_knm": 200.0, "moment_reversed_knm": 90.0, "moment_without_welds_knm": 262.0, "shear_kn": 400.0, "axial_kn": null,
                   "governed_by": "end plate in bending, rows 1-2 (mode 1)"}),
        ),
        ("/joints/0/intended_resistance/moment_knm", json!(270.14)),
        ("/joints/0/required/0/case", json!("LC1")),
        ("/joints/0/required/0/moment_knm", json!(262.0)),
        ("/joints/0/required/0/shear_kn", json!(120.0)),
        ("/joints/0/required/0/axial_kn", Value::Null),
        ("/joints/0/required/0/utilisation", json!(1.31)),
        (
            "/joints/0/findings/1",
            json!({"rule": "plate-thinner", "severity": "hold", "message": "the end plate is thinner than intended",
                   "intended": "20 mm", "detailed": "15 mm", "elements": ["guid-P1"],
                   "at": {"file": "hall.ifcxml", "line": 2, "column": 27}}),
        ),
        ("/joints/0/difference/detailed/3", json!("backing plate")),
        ("/joints/2/missing/0/what", json!("bolt class")),
        ("/joints/3/kind", json!("not-found")),
        ("/joints/3/supporting", Value::Null),
        ("/joints/3/resistance/moment_knm", Value::Null),
        ("/joints/6/intended_resistance", Value::Null),
        // Rounded to 0.001 mm from 450.40004.
        (
            "/joints/6/bolts",
            json!({"count": 6, "diameter_mm": 20.0, "class": "8.8", "gauge_mm": 100.0,
                   "rows": [{"height_mm": 450.4}, {"height_mm": 345.0}, {"height_mm": 73.0}]}),
        ),
        ("/joints/6/welds", json!([{"role": "flange-top", "throat_mm": 7.0}, {"role": "web", "throat_mm": null}])),
        (
            "/joints/6/rows/0",
            json!({"row": 1, "lever_arm_mm": 443.6, "potential_kn": 196.4, "force_kn": 196.4,
                   "governed_by": "end plate in bending (mode 2)"}),
        ),
        (
            "/joints/6/checks/0",
            json!({"id": "column-web-in-compression", "title": "column web in compression",
                   "clause": "EN 1993-1-8:2005 6.2.6.2", "resistance": 885.6, "action": 437.3, "unit": "kN",
                   // 437.3 / 885.6 = 0.4937895…, own arithmetic.
                   "utilisation": 0.49379, "outcome": "met"}),
        ),
        ("/joints/6/inputs/0", json!({"name": "bolt class", "value": "8.8", "origin": "modelled: name of the bolts"})),
        ("/joints/6/assumptions/0", json!("thread in the shear plane (rule file)")),
        ("/problems/0/at/column", json!(5)),
        ("/problems/1", json!({"message": "the schedule states no intended detail M9", "at": null})),
        ("/caution", json!(CAUTION)),
    ] {
        assert_eq!(value.pointer(pointer), Some(&expected), "{pointer}");
    }
}

#[test]
fn the_json_comes_back_as_it_went() {
    for review in [small(), surveyed(), review(Vec::new())] {
        let text = json::review(&review).unwrap();
        let document: document::Review = serde_json::from_str(&text).unwrap();
        assert_eq!(serde_json::to_string_pretty(&document).unwrap() + "\n", text);
        let text = json::survey(&review).unwrap();
        let document: document::Survey = serde_json::from_str(&text).unwrap();
        assert_eq!(serde_json::to_string_pretty(&document).unwrap() + "\n", text);
    }
}

#[test]
fn what_is_not_finite_is_null_and_nothing_is_never_negative() {
    let mut odd = used(joint(1, Outcome::Unproven), 200.0, -0.000_01);
    odd.resistance.moment_knm = Some(f64::NAN);
    odd.resistance.shear_kn = Some(f64::INFINITY);
    let value: Value = serde_json::from_str(&json::review(&review(vec![odd])).unwrap()).unwrap();
    assert_eq!(value.pointer("/joints/0/resistance/moment_knm"), Some(&Value::Null));
    assert_eq!(value.pointer("/joints/0/resistance/shear_kn"), Some(&Value::Null));
    assert_eq!(value.pointer("/joints/0/required/0/moment_knm").unwrap().to_string(), "0.0");
}

#[test]
fn the_same_review_gives_the_same_bytes() {
    let all = |review: &Review| {
        let survey = survey::render(review, &Options::default());
        [drawn(review), survey, json::review(review).unwrap(), json::survey(review).unwrap()]
    };
    assert_eq!(all(&small()), all(&small()));
    assert_eq!(all(&many()), all(&many()));
}

/// A survey with everything in it.
fn surveyed() -> Review {
    let mut lacking = joint(1, Outcome::Unproven);
    lacking.missing = vec![
        missing("bolt class", "nothing states one", lacking.at.clone()),
        missing("required actions", "no schedule was given", None),
    ];
    let mut fin = joint(2, Outcome::Unproven);
    fin.kind = "fin-plate".into();
    let mut review = review(vec![used(lacking, 200.0, 0.0), fin]);
    review.schedule = None;
    review.survey.members = 4;
    review.survey.plates = 1;
    review.survey.bolts = 6;
    review.survey.pieces = 2;
    review.survey.loose_bolts = vec![("guid-L".into(), place("hall.ifcxml", 30, 2))];
    let rail = |n: u32| (format!("rail R{n}"), "the body is no straight solid".into(), place("hall.ifcxml", n, 1));
    review.survey.rejected = vec![rail(41), rail(42)];
    review
}

#[test]
fn a_survey_ends_with_what_to_ask_for() {
    let expected = "\
Survey of hall.ifcxml (IFC4 ifcXML)

RECOGNISED
   4 members, 1 plate, 6 bolts, 0 welds, 2 shipping pieces, 2 joints
   end-plate-moment (1 joint, resistance computed for 1): B1/C1
   fin-plate (1 joint, resistance computed for 0): B2/C2

NOT TAKEN UP: 2 parts
   the body is no straight solid (2 parts): rail R41 (hall.ifcxml:41:1), rail R42 (hall.ifcxml:42:1)

BOLTS THROUGH FEWER THAN TWO PLIES: 1
   GlobalId guid-L, hall.ifcxml:30:2

MISSING FOR A FULL ASSESSMENT
   bolt class (1 joint): B1/C1
     nothing states one; first at hall.ifcxml:101:3

WHAT TO ASK THE FABRICATOR FOR
   1. bolt class, 1 joint: B1/C1
   2. what is held together by 1 bolt that passes through fewer than two plies
   3. drawings of the 2 parts that were not taken up, or an export that holds them as straight
     solids

An aid to review, not a design: local codes, national annexes and a licensed engineer decide.
";
    assert_eq!(survey::render(&surveyed(), &Options::default()), expected);
}

#[test]
fn the_survey_as_json() {
    let value: Value = serde_json::from_str(&json::survey(&surveyed()).unwrap()).unwrap();
    for (pointer, expected) in [
        ("/schema", json!("faying-survey/1")),
        ("/recognised", json!({"members": 4, "plates": 1, "bolts": 6, "welds": 0, "pieces": 2, "joints": 2})),
        ("/kinds/1", json!({"kind": "fin-plate", "assessed": 0, "joints": ["B2/C2"]})),
        ("/rejected/0/parts/1/at/line", json!(42)),
        ("/loose_bolts/0/part", json!("guid-L")),
        ("/missing/0/what", json!("bolt class")),
        ("/missing/1", Value::Null),
        ("/ask/0", json!({"what": "bolt class", "joints": ["B1/C1"]})),
    ] {
        assert_eq!(value.pointer(pointer).unwrap_or(&Value::Null), &expected, "{pointer}");
    }
}

fn any_text() -> impl Strategy<Value = String> {
    proptest::collection::vec(any::<char>(), 0..24).prop_map(String::from_iter)
}

fn any_outcome() -> impl Strategy<Value = Outcome> {
    prop_oneof![Just(Outcome::Hold), Just(Outcome::Unproven), Just(Outcome::Comment), Just(Outcome::Clear)]
}

fn any_joint() -> impl Strategy<Value = JointReview> {
    (any_outcome(), any::<f64>(), any::<f64>(), proptest::collection::vec(any_text(), 8), any::<[u32; 2]>()).prop_map(
        |(outcome, resistance, moment, texts, [line, column])| {
            let mut joint = used(joint(1, outcome), resistance, moment);
            joint.mark.clone_from(&texts[0]);
            joint.kind.clone_from(&texts[1]);
            joint.reasons = vec![texts[2].clone()];
            joint.findings = vec![finding("plate-thinner", outcome, &texts[3], Some((&texts[4], &texts[5])))];
            joint.missing = vec![missing(&texts[6], &texts[7], Some(place("hall.ifcxml", line % 5, column % 90)))];
            joint.difference = Some((texts[..3].to_vec(), texts[2..].to_vec()));
            joint.at = Some(place("hall.ifcxml", line % 5, column % 90));
            joint
        },
    )
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(128))]

    #[test]
    fn nothing_from_a_file_steers_the_terminal(joints in proptest::collection::vec(any_joint(), 0..4),
                                               model in proptest::collection::vec(any::<u8>(), 0..400)) {
        let review = review(joints);
        let options = Options { width: 40, ..Options::default() };
        for text in [text::render(&review, &options, Some(&model)), survey::render(&review, &options)] {
            prop_assert!(text.chars().all(|c| c == '\n' || !c.is_control()), "{text:?}");
        }
        let mut round = String::new();
        write!(round, "{}", json::review(&review).unwrap()).unwrap();
        prop_assert!(serde_json::from_str::<document::Review>(&round).is_ok());
    }
}
