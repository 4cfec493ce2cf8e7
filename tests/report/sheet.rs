//! The calculation sheet: of the sample through the built program, and of reviews that are built by hand.

use std::collections::BTreeMap;
use std::fs;
use std::path::Path;
use std::process::Command;

use faying::report::{Options, sheet};
use faying::review::sketch::{Against, BeamEnd, ColumnPart, PlateFace, Profile, Sketch, SketchDiagonal, SketchRow};
use faying::review::{CheckResult, JointReview, Outcome, Review, RowBasis, RowResult};
use faying::units::{Force, Length, kn, mm};
use faying::working::Working;
use faying::{given, step};
use quick_xml::Reader;
use quick_xml::events::Event;
use serde_json::Value;

use super::build::{finding, joint, missing, review, used};

/// Exit code, stdout, stderr of a run at the project's root.
fn run(args: &[&str]) -> (Option<i32>, String, String) {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let out = Command::new(env!("CARGO_BIN_EXE_faying")).args(args).current_dir(root).output().unwrap();
    let text = |bytes| String::from_utf8(bytes).unwrap();
    (out.status.code(), text(out.stdout), text(out.stderr))
}

fn sample(mark: &str, rest: &[&str]) -> (Option<i32>, String, String) {
    run(&[&["sheet", "sample-exchange", "--joint", mark], rest].concat())
}

/// The sample's joints as the review has them, by mark.
fn reviewed() -> BTreeMap<String, Value> {
    let (_, json, _) = run(&["review", "sample-exchange", "--format", "json"]);
    let review: Value = serde_json::from_str(&json).unwrap();
    let joints = review["joints"].as_array().unwrap().iter();
    joints.map(|joint| (joint["mark"].as_str().unwrap().to_owned(), joint.clone())).collect()
}

/// What a page of HTML holds; reading it proves that its elements are nested as they should be.
#[derive(Default)]
struct Page {
    /// How many of each element, and of each element with a class: "circle", "circle.bolt".
    elements: BTreeMap<String, usize>,
    /// Rows of all tables, cell by cell.
    rows: Vec<Vec<String>>,
    headings: Vec<(u8, String)>,
    /// Tags of header cells without a scope.
    unscoped: usize,
    text: String,
}

impl Page {
    fn read(html: &str) -> Self {
        let mut page = Self::default();
        let mut reader = Reader::from_str(html.strip_prefix("<!DOCTYPE html>").expect("a doctype"));
        // Elements of HTML that have no end; all others are checked.
        reader.config_mut().check_end_names = false;
        let mut open: Vec<String> = Vec::new();
        loop {
            match reader.read_event().expect("it can be read") {
                Event::Start(start) => {
                    let name = String::from_utf8(start.name().0.to_vec()).unwrap();
                    *page.elements.entry(name.clone()).or_default() += 1;
                    let attributes: BTreeMap<String, String> = (start.attributes())
                        .map(|a| a.expect("an attribute in quotes"))
                        .map(|a| {
                            (String::from_utf8(a.key.0.to_vec()).unwrap(), a.unescape_value().unwrap().into_owned())
                        })
                        .collect();
                    if let Some(class) = attributes.get("class") {
                        *page.elements.entry(format!("{name}.{class}")).or_default() += 1;
                    }
                    page.unscoped += usize::from(name == "th" && !attributes.contains_key("scope"));
                    match name.as_str() {
                        "tr" => page.rows.push(Vec::new()),
                        "td" | "th" => page.rows.last_mut().unwrap().push(String::new()),
                        "h1" | "h2" | "h3" => page.headings.push((name.as_bytes()[1] - b'0', String::new())),
                        _ => {}
                    }
                    if name != "meta" {
                        open.push(name);
                    }
                }
                Event::End(end) => {
                    assert_eq!(open.pop().unwrap().as_bytes(), end.name().0, "nested");
                }
                Event::Text(text) => page.said(&open, &text.decode().unwrap()),
                Event::GeneralRef(entity) => {
                    let said = match &*entity.decode().unwrap() {
                        "lt" => "<",
                        "gt" => ">",
                        "amp" => "&",
                        "quot" => "\"",
                        other => panic!("&{other};"),
                    };
                    page.said(&open, said);
                }
                Event::Eof => break,
                other => panic!("{other:?}"),
            }
        }
        assert_eq!(open, [] as [String; 0], "all are closed");
        page
    }

    fn said(&mut self, open: &[String], text: &str) {
        self.text.push_str(text);
        if let Some(cell) = self.rows.last_mut().and_then(|row| row.last_mut())
            && open.iter().any(|name| name == "td" || name == "th")
        {
            cell.push_str(text);
        }
        if let Some((_, heading)) =
            self.headings.last_mut().filter(|_| open.iter().any(|n| n.starts_with('h') && n.len() == 2))
        {
            heading.push_str(text);
        }
    }

    fn count(&self, element: &str) -> usize {
        self.elements.get(element).copied().unwrap_or(0)
    }

    /// The row that begins and ends so.
    fn row(&self, first: &str, last: &str) -> Option<&[String]> {
        let fits =
            |row: &&Vec<String>| row.first().is_some_and(|c| c == first) && row.last().is_some_and(|c| c == last);
        self.rows.iter().find(fits).map(Vec::as_slice)
    }

    fn has_row(&self, cells: &[String]) -> bool {
        self.rows.iter().any(|row| row == cells)
    }
}

/// With one space where there were any, so that wrapping does not matter.
fn unwrapped(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

/// Whether a cell says a number of the JSON to one decimal; the JSON itself is rounded to a thousandth.
fn says(cell: &str, value: f64) -> bool {
    cell.parse::<f64>().is_ok_and(|said| (said - value).abs() <= 0.0506)
        && cell.split('.').nth(1).map(str::len) == Some(1)
}

/// The joints that stand for the others: on hold, with rows cut short, unproven for want of a class, extended both ways,
/// without steel, unscheduled.
const JOINTS: [&str; 6] = ["J02", "J10", "J14", "J21", "J27", "W5 / K1"];

#[test]
fn a_sheet_says_what_the_review_says_in_text_and_in_html() {
    for (mark, joint) in reviewed().iter().filter(|(mark, _)| JOINTS.contains(&mark.as_str())) {
        let code = match joint["outcome"].as_str().unwrap() {
            "hold" => 1,
            "unproven" => 3,
            _ => 0,
        };
        let (exit, text, said) = sample(mark, &[]);
        assert_eq!((exit, said.as_str()), (Some(code), ""), "{mark}");
        let (exit, html, said) = sample(mark, &["--format", "html"]);
        assert_eq!((exit, said.as_str()), (Some(code), ""), "{mark}");
        for line in text.lines() {
            assert!(line.chars().count() <= 100, "{mark}: {line}");
        }
        let (text, page) = (unwrapped(&text), Page::read(&html));
        for whole in [&text, &page.text] {
            assert!(!whole.contains("NaN") && !whole.contains("inf "), "{mark}");
            for said in joint["reasons"].as_array().unwrap().iter().chain(joint["assumptions"].as_array().unwrap()) {
                assert!(whole.contains(said.as_str().unwrap()), "{mark}: {said}");
            }
        }
        for (i, check) in joint["checks"].as_array().unwrap().iter().enumerate() {
            let (title, clause) = (check["title"].as_str().unwrap(), check["clause"].as_str().unwrap());
            let row = page.rows.iter().find(|row| row.len() == 8 && row[0] == (i + 1).to_string() && row[1] == title);
            let row = row.unwrap_or_else(|| panic!("{mark}: no {title}"));
            for (cell, key) in [(&row[2], "resistance"), (&row[3], "action")] {
                let right = check[key].as_f64().map_or(cell == "-", |value| says(cell, value));
                assert!(right, "{mark}: {title}: {cell}, {}", check[key]);
            }
            assert!(row[6].starts_with(check["outcome"].as_str().unwrap()), "{mark}: {title}");
            assert!(clause.ends_with(&row[7]) && !row[7].is_empty(), "{mark}: {title}: {}", row[7]);
            // Those that are made of other checks have no steps of their own.
            if !["moment", "shear"].contains(&check["id"].as_str().unwrap()) {
                let unit = check["unit"].as_str().unwrap();
                let line = format!("{title} {clause}: resistance {} {unit}", row[2]);
                assert!(text.contains(&line), "{mark}: {line}");
            }
        }
        for row in joint["rows"].as_array().unwrap() {
            let (arm, force) = (row["lever_arm_mm"].as_f64().unwrap(), row["force_kn"].as_f64().unwrap());
            let cells = page.row(&row["row"].to_string(), row["governed_by"].as_str().unwrap());
            let numbers = [arm, row["potential_kn"].as_f64().unwrap(), force, arm * force / 1e3];
            let right = cells.is_some_and(|cells| cells[1..5].iter().zip(numbers).all(|(cell, n)| says(cell, n)));
            assert!(right, "{mark}: {cells:?}, {numbers:?}");
        }
        for input in joint["inputs"].as_array().unwrap() {
            let cell = |key: &str| input[key].as_str().unwrap().replace("sample-exchange/", "");
            assert!(page.has_row(&[cell("name"), cell("value"), cell("origin")]), "{mark}: {input}");
        }
        let rows = joint["bolts"]["rows"].as_array().map_or(0, Vec::len);
        assert_eq!(page.count("circle.bolt"), 2 * rows, "{mark}: two bolts a row");
        let forces = joint["rows"].as_array().unwrap().iter().filter(|r| r["force_kn"].as_f64() > Some(0.0)).count();
        // Their sum presses at the other flange.
        assert_eq!(page.count("polygon.force"), if forces == 0 { 0 } else { forces + 1 }, "{mark}: an arrow a row");
        for (element, times) in [("svg", usize::from(rows > 0)), ("script", 0), ("link", 0), ("img", 0), ("h1", 1)] {
            assert_eq!(page.count(element), times, "{mark}: {element}");
        }
        assert_eq!(page.count("desc"), page.count("svg"), "each drawing is described");
        assert_eq!(page.unscoped, 0, "{mark}: every header cell has a scope");
        assert!(
            html.contains("<html lang=\"en\">") && !html.replace("http://www.w3.org/2000/svg", "").contains("http")
        );
        let levels: Vec<u8> = page.headings.iter().map(|(level, _)| *level).collect();
        assert!(levels[0] == 1 && levels.windows(2).all(|pair| pair[1] <= pair[0] + 1), "{mark}: {levels:?}");
        for said in ["Checked by", "Date", "a licensed engineer decide", "626f9430726e8647"] {
            assert!(text.contains(said) && page.text.contains(said), "{mark}: {said}");
        }
    }
}

#[test]
fn the_worst_of_several_joints_gives_the_exit_code() {
    for (joints, rest, code) in [
        (&["J21"][..], &[][..], 0),
        (&["J12"], &[], 0),
        (&["J14"], &[], 3),
        (&["J14"], &["--allow-unproven"], 0),
        (&["J21", "J14"], &[], 3),
        (&["J21", "J14", "J02"], &["--allow-unproven"], 1),
        (&["J27"], &[], 1),
    ] {
        let asked = joints.iter().flat_map(|mark| ["--joint", mark]);
        let args: Vec<&str> =
            ["sheet", "sample-exchange"].into_iter().chain(asked).chain(rest.iter().copied()).collect();
        let (exit, text, _) = run(&args);
        assert_eq!(exit, Some(code), "{joints:?}");
        for mark in joints {
            assert!(text.contains(&format!("Calculation sheet, joint {mark}\n")), "{joints:?}");
        }
    }
}

#[test]
fn a_joint_is_found_by_its_mark_or_by_a_part_that_no_other_has() {
    let joints = reviewed();
    let plate = joints["J02"]["plates"][0]["guid"].as_str().unwrap();
    for (asked, mark) in [("J02", "J02"), ("j02", "J02"), (plate, "J02"), ("w5/k1", "W5 / K1")] {
        assert!(sample(asked, &[]).1.contains(&format!("Calculation sheet, joint {mark}\n")), "{asked}");
    }
    // Asked for twice it is drawn once.
    assert_eq!(sample("J02", &["--joint", plate]).1, sample("J02", &[]).1);
    let beam = joints["J02"]["supported"]["mark"].as_str().unwrap();
    let both: Vec<&String> = (joints.iter())
        .filter(|(_, joint)| joint["supported"]["mark"] == beam || joint["supporting"]["mark"] == beam)
        .map(|(mark, _)| mark)
        .collect();
    assert_eq!(both.len(), 2, "a beam has two ends");
    for (asked, said) in [
        ("J2", vec!["no joint is called \"J2\"; near it: J02"]),
        ("?", vec!["no joint is called \"?\"; there are: J01, J02", "and 37 more"]),
        (beam, vec!["fits 2 joints: ", both[0], both[1]]),
    ] {
        let (exit, out, told) = sample(asked, &[]);
        assert_eq!((exit, out.as_str(), told.lines().count()), (Some(2), "", 1), "{told}");
        said.iter().for_each(|said| assert!(told.contains(said), "{asked}: {told}"));
    }
}

#[test]
fn a_sheet_is_written_whole_or_not_at_all() {
    let folder = tempfile::tempdir().unwrap();
    let path = |name: &str| folder.path().join(name).to_str().unwrap().to_owned();
    for (mark, target, said) in [
        ("J02", path("absent/sheet.html"), "its folder does not exist"),
        ("J02", path(""), "it is a folder"),
        ("J99", path("sheet.html"), "no joint is called"),
    ] {
        let (exit, out, told) = sample(mark, &["--format", "html", "-o", &target]);
        assert_eq!((exit, out.as_str(), told.lines().count()), (Some(2), "", 1), "{told}");
        assert!(told.contains(said), "{told}");
    }
    assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 0, "nothing is left");
    assert_eq!(sample("J02", &["--format", "html", "-o", &path("sheet.html")]).0, Some(1));
    let again = sample("J02", &["--format", "html"]).1;
    assert_eq!(fs::read_to_string(path("sheet.html")).unwrap(), again, "the same bytes again");
}

#[test]
fn what_a_sheet_may_be_is_said_in_the_help() {
    let (exit, help, _) = run(&["sheet", "--help"]);
    assert_eq!(exit, Some(0));
    for said in ["--joint <MARK>", "text", "html", "Exit codes:", "a mark that fits no joint or several"] {
        assert!(help.contains(said), "{said} in {help}");
    }
    assert_eq!(run(&["sheet", "sample-exchange"]).0, Some(2), "a joint must be named");
    assert!(run(&["completions", "bash"]).1.contains("sheet"));
}

fn both_forms(review: &Review, joint: &JointReview) -> [String; 2] {
    [sheet::text(review, &[joint], &Options::default()), sheet::html(review, &[joint])]
}

fn checked(title: &str, working: Working) -> CheckResult {
    CheckResult {
        id: "end-plate-in-bending".into(),
        title: title.into(),
        clause: "EN 1993-1-8:2005 6.2.6.5".into(),
        resistance: Some(100.0),
        action: Some(50.0),
        unit: "kN",
        utilisation: Some(0.5),
        outcome: "met",
        needed_throat_mm: None,
        working: working.into(),
    }
}

/// What the sheet prints for one step: symbols, then numbers.
fn printed(working: Working) -> String {
    let mut joint = joint(1, Outcome::Clear);
    joint.checks = [checked("end plate in bending", working)].into();
    let review = review(vec![joint]);
    unwrapped(&both_forms(&review, &review.joints[0])[0])
}

#[test]
#[allow(non_snake_case)]
fn formulas_are_printed_as_they_were_computed() {
    // Own arithmetic throughout.
    let (m, t_f, F_T_Rd, beta, sum_F_t_Rd) = (mm(40.0), mm(20.0), kn(100.0), 0.5, kn(400.0));
    let given = || {
        let mut w = Working::default();
        given!(w, "plate"; m, t_f, F_T_Rd, beta, sum_F_t_Rd);
        w
    };
    let mut cases: Vec<(Working, &str)> = Vec::new();
    let mut w = given();
    step!(w, "a", l_eff_1 = 2.0 * std::f64::consts::PI * m);
    cases.push((w, "l_eff,1 = 2 · π · m [a] = 2 · π · 40.00 mm = 251.3 mm"));
    let mut w = given();
    step!(w, "a", F = F_T_Rd / (1.0 - (beta / 2.0)));
    cases.push((w, "F = F_T,Rd / (1 − β / 2) [a] = 100.0 kN / (1 − 0.500 / 2) = 133.3 kN"));
    let mut w = given();
    step!(w, "a", m_2 = (m - (t_f - m)).min(t_f).min(2.0 * m));
    cases.push((w, "m_2 = min(m − (t_f − m); t_f; 2 · m) [a]"));
    let mut w = given();
    step!(w, "a", omega = 1.0 / (1.0 + 1.3 * (beta / 4.0).powi(2)).sqrt());
    cases.push((w, "ω = 1 / √(1 + 1.3 · (β / 4)²) [a] = 1 / √(1 + 1.3 · (0.500 / 4)²) = 0.990"));
    let mut w = given();
    step!(w, "a", rho = (beta - 0.2) / (beta * beta));
    cases.push((w, "ρ = (β − 0.2) / β² [a] = (0.500 − 0.2) / (0.500)² = 1.200"));
    let mut w = given();
    step!(w, "a", leg = 2.0_f64.sqrt() * t_f);
    cases.push((w, "leg = √2 · t_f [a] = √2 · 20.00 mm = 28.28 mm"));
    let mut w = given();
    step!(w, "a", F_T_3_Rd = sum_F_t_Rd);
    cases.push((w, "F_T,3,Rd = ΣF_t,Rd [a] = 400.0 kN"));
    let mut w = given();
    step!(w, "a", M_pl = m * F_T_Rd);
    cases.push((w, "M_pl = m · F_T,Rd [a] = 40.00 mm · 100.0 kN = 4.000 kNm"));
    // What is no formula stands as it is.
    let mut w = given();
    let least = |of: &[f64]| of.iter().copied().fold(f64::INFINITY, f64::min);
    step!(w, "a", x = least(&[beta, 2.0]));
    cases.push((w, "x = least(&[beta, 2.0]) [a] = 0.500"));
    for (working, expected) in cases {
        let text = printed(working);
        assert!(text.contains(expected), "no {expected:?} in {text}");
    }
}

#[test]
#[allow(non_snake_case)]
fn a_name_that_meant_something_else_never_lends_its_number() {
    let m: Length = mm(40.0);
    let mut w = Working::default();
    {
        let m = mm(50.0);
        given!(w, "another part"; m);
    }
    step!(w, "a", l = 2.0 * m);
    let text = printed(w);
    assert!(text.contains("l = 2 · m [a] = 80.00 mm") && !text.contains("2 · 50"), "{text}");
}

#[test]
fn a_working_that_begins_like_another_refers_to_it() {
    let working = |last: f64| {
        let mut w = Working::default();
        let (a, b, c, d, e) = (1.0, 2.0, 3.0, 4.0, 5.0);
        given!(w, "all"; a, b, c, d, e);
        step!(w, "x", sum = a + b + c + d + e + last);
        w
    };
    let mut joint = joint(1, Outcome::Clear);
    joint.checks = [checked("first", working(1.0)), checked("second", working(2.0))].into();
    let review = review(vec![joint]);
    let [text, html] = both_forms(&review, &review.joints[0]).map(|form| unwrapped(&form));
    assert!(text.contains("As in 3.1, down to e = 5.000 sum = a + b + c + d + e + last"), "{text}");
    assert_eq!(html.matches(">given<").count(), 1);
}

/// A sketch with two rows; `odd` stands for one of its heights.
fn sketched(odd: f64) -> Sketch {
    let profile = |label: &str| Profile {
        label: label.into(),
        depth_mm: 400.0,
        width_mm: 180.0,
        web_mm: Some(9.0),
        flange_mm: Some(14.0),
    };
    let row = |height_mm| SketchRow { height_mm, gauge_mm: 100.0, edge_plate_mm: 40.0, edge_other_mm: 80.0 };
    Sketch {
        end: BeamEnd {
            beam: profile("B1"),
            soffit_mm: 0.0,
            plate: PlateFace {
                label: "P1".into(),
                thickness_mm: 20.0,
                width_mm: 180.0,
                bottom_mm: -20.0,
                top_mm: 420.0,
            },
            throats_mm: [Some(8.0), None, Some(8.0)],
        },
        against: Against::Column(ColumnPart {
            column: profile("C1"),
            top_mm: None,
            bottom_mm: Some(-3000.0),
            stiffeners: Vec::new(),
            web_plates: Vec::new(),
            diagonals: vec![SketchDiagonal { thickness_mm: 10.0, near_mm: 7.0, far_mm: odd, both_sides: true }],
            backing: Vec::new(),
        }),
        bolts: "M20 8.8".into(),
        bolt_mm: Some(20.0),
        rows: vec![row(340.0), row(odd)],
    }
}

#[test]
fn what_is_no_number_is_never_printed_as_one() {
    for odd in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        let mut w = Working::default();
        let (f, force) = (odd, Force(odd));
        given!(w, "odd"; f, force);
        step!(w, "x", twice = 2.0 * f);
        let mut joint = used(joint(1, Outcome::Unproven), odd, odd);
        joint.checks =
            [CheckResult { resistance: Some(odd), action: Some(odd), utilisation: Some(odd), ..checked("odd", w) }]
                .into();
        joint.rows = vec![RowResult {
            row: 1,
            lever_arm_mm: odd,
            potential_kn: odd,
            force_kn: odd,
            governed_by: "nothing".into(),
        }];
        joint.row_basis = Some(RowBasis {
            case: None,
            tension_at_top: true,
            beta: odd,
            of_rows_knm: odd,
            moment_knm: odd,
            notes: Vec::new(),
        });
        joint.sketch = Some(sketched(odd).into());
        let review = review(vec![joint]);
        for form in both_forms(&review, &review.joints[0]) {
            for word in ["NaN", "inf ", "inf<", "inf\""] {
                assert!(!form.contains(word), "{word} in {form}");
            }
        }
    }
}

#[test]
fn nothing_from_a_file_becomes_markup_or_style() {
    const EVIL: &str = "\"';}</style></title><script>alert(1)</script><svg onload=x>&amp;\\3c\u{7}";
    let mut joint = used(joint(1, Outcome::Hold), 100.0, 120.0);
    joint.mark = EVIL.into();
    joint.reasons = vec![EVIL.into()];
    joint.detail = Some(EVIL.into());
    joint.assumptions = vec![EVIL.into()];
    joint.inputs = vec![(EVIL.into(), EVIL.into(), EVIL.into())];
    joint.difference = Some((vec![EVIL.into()], vec!["other".into()]));
    joint.findings = vec![finding("plate-thinner", Outcome::Hold, EVIL, Some((EVIL, EVIL)))];
    joint.missing = vec![missing(EVIL, EVIL, None)];
    joint.required[0].case = EVIL.into();
    joint.supported.as_mut().unwrap().mark = Some(EVIL.into());
    let mut sketch = sketched(60.0);
    sketch.end.beam.label = EVIL.into();
    sketch.end.plate.label = EVIL.into();
    sketch.bolts = EVIL.into();
    joint.sketch = Some(sketch.into());
    let mut check = checked(EVIL, Working::default());
    check.clause = EVIL.into();
    joint.checks = [check].into();
    let mut review = review(vec![joint]);
    review.file = EVIL.into();
    review.schedule = Some(EVIL.into());
    let [text, html] = both_forms(&review, &review.joints[0]);
    assert!(!text.contains('\u{7}'));
    let page = Page::read(&html);
    for (element, times) in [("script", 0), ("style", 1), ("title", 2), ("svg", 1)] {
        assert_eq!(page.count(element), times, "{element}");
    }
    assert!(!html.contains("<script") && !html.contains("onload=x>&amp;amp;\\3c\u{7}"));
    assert!(page.text.contains("<script>alert(1)</script>"), "it is shown as it is");
}

#[test]
fn a_splice_is_drawn_with_both_its_ends() {
    let mut sketch = sketched(60.0);
    let other = BeamEnd { soffit_mm: -30.0, throats_mm: [None, Some(6.0), Some(8.0)], ..sketch.end.clone() };
    sketch.against = Against::Beam(other);
    let mut joint = used(joint(1, Outcome::Clear), 100.0, 80.0);
    joint.sketch = Some(sketch.into());
    let review = review(vec![joint]);
    let [text, html] = both_forms(&review, &review.joints[0]);
    let page = Page::read(&html);
    // Plates: one in the elevation for each end, and the one in view.
    assert_eq!((page.count("circle.bolt"), page.count("rect.plate")), (4, 3));
    for said in ["other end plate", "other welds", "edge of other plate", "top flange not known; web throat 6 mm"] {
        assert!(text.contains(said) && page.text.contains(said), "{said}");
    }
}
