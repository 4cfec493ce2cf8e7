//! What is wrong with a schedule, and where.

use faying::intent::{MAX_BYTES, MAX_JOINTS, MAX_LINE_BYTES, ScheduleError, merge, read, read_all};
use miette::{GraphicalReportHandler, GraphicalTheme};

/// Place of the fault, what was given, what is allowed.
type Expected = (&'static str, &'static str, &'static str);

fn faults(files: &[(&str, &[u8])]) -> ScheduleError {
    read_all(files).map(|intent| panic!("{files:?} was read: {intent:?}")).unwrap_err()
}

/// Each text has exactly these faults, in this order.
fn check(file: &str, table: &[(&str, &[Expected])]) {
    for (text, expected) in table {
        let error = faults(&[(file, text.as_bytes())]);
        let found: Vec<String> = error.faults().map(ToString::to_string).collect();
        assert_eq!(found.len(), expected.len(), "{text:?}\n{found:#?}");
        for (found, (place, given, allowed)) in found.iter().zip(*expected) {
            assert!(found.starts_with(&format!("{file}:{place}: ")), "{text:?}\n{found}\nexpected at {place}");
            assert!(found.contains(given) && found.contains(allowed), "{text:?}\n{found}\nexpected {given}, {allowed}");
        }
    }
}

#[test]
fn faults_of_csv_files() {
    check(
        "s.csv",
        &[
            // Headings.
            (
                "joint,M_Ed_kip\nJ1,1\n",
                &[("1:7", "M_Ed has the unit \"kip\"", "allowed are Nmm, Nm, kNmm, kNcm, kNm, MNm")],
            ),
            ("joint,M_Ed\nJ1,1\n", &[("1:7", "M_Ed has no unit", "kNm")]),
            ("joint,M_Ed [kN]\nJ1,1\n", &[("1:7", "\"kN\"", "kNm")]),
            ("joint,M_Ed [kN/m]\nJ1,1\n", &[("1:7", "\"kN/m\"", "kNm")]),
            ("joint,M_Ed [N/mm²]\nJ1,1\n", &[("1:7", "\"N/mm²\"", "kNm")]),
            ("joint,M_Ed_mNm\nJ1,1\n", &[("1:7", "\"mNm\"", "MNm")]),
            ("joint,N_Ed_kNm\nJ1,1\n", &[("1:7", "N_Ed has the unit \"kNm\"", "allowed are N, kN, MN")]),
            ("joint,M_Ed_kNm (sagging +)\nJ1,1\n", &[("1:7", "sagging", "kNm")]),
            ("joint,M_Ed_kNm,V_de_kN\nJ1,1,2\n", &[("1:16", "\"V_de_kN\"", "V_Ed")]),
            ("joint,M_z,Ed\nJ1,1,2\n", &[("1:7", "\"M_z\"", "allowed are joint"), ("1:11", "\"Ed\"", "remark")]),
            ("joint,M_Ed_kNm,M_Ed_Nm\nJ1,1,2\n", &[("1:16", "\"M_Ed_Nm\" and \"M_Ed_kNm\"", "one column")]),
            ("joint,Mark\nJ1,J1\n", &[("1:7", "\"Mark\" and \"joint\"", "one column")]),
            ("case,M_Ed_kNm\nULS,1\n", &[("1:1", "neither joint", "nor supported")]),
            // A fault in a heading does not hide the cells below it, nor does it invent faults in them.
            ("jiont,M_Ed_kNm\nJ1,x\nJ2,3\n", &[("1:1", "\"jiont\"", "joint"), ("2:4", "\"x\"", "number")]),
            // Cells.
            ("joint,M_Ed_kNm\nJ1,abc\n", &[("2:4", "M_Ed: given \"abc\"", "finite number such as -185.5, or blank")]),
            ("joint,M_Ed_kNm\nJ1,NaN\n", &[("2:4", "\"NaN\"", "finite")]),
            ("joint,M_Ed_kNm\nJ1,-inf\n", &[("2:4", "\"-inf\"", "finite")]),
            ("joint,M_Ed_kNm\nJ1,1e999\n", &[("2:4", "\"1e999\"", "finite")]),
            ("joint,M_Ed_MNm\nJ1,1e300\n", &[("2:4", "\"1e300\"", "finite")]),
            ("joint,M_Ed_kNm\nJ1,-\n", &[("2:4", "\"-\"", "blank")]),
            ("joint,M_Ed_kNm\nJ1,12 kNm\n", &[("2:4", "\"12 kNm\"", "number")]),
            ("joint,M_Ed_kNm\nJ1,0x10\n", &[("2:4", "\"0x10\"", "number")]),
            ("joint,M_Ed_kNm\nJ1,1 234.5\n", &[("2:4", "\"1 234.5\"", "number")]),
            ("joint,M_Ed_kNm\nJ1,\"12,5\"\n", &[("2:4", "\"12,5\"", "number")]),
            ("joint;M_Ed_kNm\nJ1;1.234,5\n", &[("2:4", "\"1.234,5\"", "-185,5")]),
            ("joint;M_Ed_kNm\nJ1;12.5\nJ2;1,234\n", &[("3:4", "\"1,234\"", "the decimal mark '.' as in s.csv:2:4")]),
            ("joint,end\nJ1,left\n", &[("2:4", "end: given \"left\"", "start, end or blank")]),
            ("joint,M_Ed_kNm,\nJ1,1,x\n", &[("2:6", "\"x\" under no heading", "no heading")]),
            ("joint,supported,case\n,,ULS\n", &[("2:1", "names no joint", "neither")]),
            ("joint,case\n\"J\u{1b}[31m\",ULS\n", &[("2:1", "\"J\\u{1b}[31m\"", "control characters")]),
            // Columns are counted in characters.
            ("joint,case,M_Ed_kNm\nJü→,é,x\n", &[("2:7", "\"x\"", "number")]),
            // All cells at once, a quoted line break on the way.
            (
                "joint,end,M_Ed_kNm,V_Ed_kN,remark\nJ1,up,a,1,\"x\ny\"\nJ2,end,1,b,\n",
                &[("2:4", "\"up\"", "start"), ("2:7", "\"a\"", "number"), ("4:10", "\"b\"", "number")],
            ),
            // Lines that are too long or too short would put values under wrong headings.
            ("joint,M_Ed_kNm,V_Ed_kN,N_Ed_kN\nJ1,12,5,100,\n", &[("2:1", "5 cells", "decimal comma")]),
            ("joint,M_Ed_kNm,V_Ed_kN\nJ1,12\n", &[("2:1", "2 cells", "allowed are 3")]),
            ("joint;M_Ed_kNm\nJ1;1;;\n", &[("2:1", "4 cells", "allowed are 2")]),
            // Quotes.
            ("joint,case\n\"J1,a\nJ2,b\n", &[("2:1", "\"J1,a", "closing quote"), ("2:1", "1 cells", "2")]),
            ("joint,case\n\"J1\"x,a\n", &[("2:1", "J1", "closing quote")]),
            // Lines against each other.
            (
                "joint,case,M_Ed_kNm\nJ1,ULS 1,1\nJ2,ULS 1,1\nj1,uls 1,1\n",
                &[("4:1", "load case \"uls 1\"", "already at s.csv:2:1")],
            ),
            ("joint,M_Ed_kNm\nJ1,1\nJ1,2\n", &[("3:1", "\"(unnamed)\"", "once")]),
            (
                "joint,supporting,supported,end,detail,case\nJ1,C1,B1,start,A,1\nJ1,C2,B2,end,B,2\n",
                &[
                    ("2:16", "\"A\" is not defined", "no detail is defined"),
                    ("3:4", "supporting: given \"C2\"", "\"C1\" at s.csv:2:4"),
                    ("3:7", "supported: given \"B2\"", "\"B1\" at s.csv:2:7"),
                    ("3:10", "end: given \"end\"", "\"start\" at s.csv:2:10"),
                    ("3:14", "detail: given \"B\"", "\"A\" at s.csv:2:16"),
                    ("3:14", "\"B\" is not defined", "no detail is defined"),
                ],
            ),
        ],
    );
}

#[test]
fn faults_of_toml_files() {
    check(
        "s.toml",
        &[
            ("[[joint]]\nmark = 'J1'\nsuported = 'B1'\n", &[("3:1", "\"suported\"", "supporting, supported, end")]),
            ("[[joints]]\nmark = 'J1'\n", &[("1:3", "\"joints\"", "joint, detail")]),
            ("[joint]\nmark = 'J1'\n", &[("1:1", "joint: given", "[[joint]]")]),
            ("joint = [1]\n", &[("1:10", "given \"1\"", "[[joint]]")]),
            ("[[joint]]\nsupporting = 'C1'\n", &[("1:1", "not named", "mark nor supported")]),
            ("[[joint]]\nmark = 3\n", &[("2:8", "mark: given \"3\"", "text in quotes")]),
            ("[detail.A.stiffeners]\nweb_plates = { sides = 3 }\n", &[("2:24", "sides: given \"3\"", "1 or 2 sides")]),
            (
                "[detail.A.stiffeners]\ndiagonals = { form = 'X' }\n",
                &[("2:22", "form: given \"'X'\"", "\"N\" or \"K\"")],
            ),
            (
                "[detail.A.stiffeners]\nbacking_plates = { throat_mm = 5 }\n",
                &[("2:20", "throat_mm", "thickness_mm, grade")],
            ),
            ("[[joint]]\nmark = ' '\n", &[("2:8", "mark: given", "not stated")]),
            ("[[joint]]\nmark = 'J1'\nend = 'top'\n", &[("3:7", "end: given \"'top'\"", "\"start\" or \"end\"")]),
            ("[[joint]]\nmark = 'J1'\n[[joint.case]]\nM_Ed_kip = 1\n", &[("4:1", "\"kip\"", "kNm")]),
            ("[[joint]]\nmark = 'J1'\n[[joint.case]]\nM_Ed = 1\n", &[("4:1", "no unit", "kNm")]),
            ("[[joint]]\nmark = 'J1'\n[[joint.case]]\nV_de_kN = 1\n", &[("4:1", "\"V_de_kN\"", "V_Ed")]),
            (
                "[[joint]]\nmark = 'J1'\n[[joint.case]]\nM_Ed_kNm = 1\nM_Ed_Nm = 1\n",
                &[("5:1", "M_Ed is stated twice", "once")],
            ),
            (
                "[[joint]]\nmark = 'J1'\n[[joint.case]]\nM_Ed_kNm = 'x'\nV_Ed_kN = nan\nN_Ed_kN = 1e999\n",
                &[("4:12", "\"'x'\"", "finite"), ("5:11", "\"nan\"", "finite"), ("6:11", "\"1e999\"", "finite")],
            ),
            (
                "[[joint]]\nmark = 'J1'\ncase = [{ name = 'a' }, { name = 'A' }]\n",
                &[("3:25", "load case \"A\"", "already at s.toml:3:9")],
            ),
            ("[[joint]\n", &[("1:9", "no TOML", "]")]),
            ("[[joint]]\nmark = 'J1'\nmark = 'J2'\n", &[("3:1", "no TOML: duplicate key", "")]),
            // Details.
            (
                "[[joint]]\nmark = 'J1'\ndetail = 'M4'\n[detail.M3]\n",
                &[("3:10", "\"M4\" is not defined", "allowed: M3")],
            ),
            ("[detail.M3]\n[detail.'m 3']\n", &[("2:9", "\"m 3\" is defined already at s.toml:1:9", "once")]),
            ("[detail]\nM3 = 1\n", &[("2:6", "M3: given \"1\"", "[detail.NAME]")]),
            (
                "[detail.M3]\nplates = {}\n",
                &[("2:1", "\"plates\"", "bolts, plate, welds, stiffeners, haunch, members, exposed, base")],
            ),
            ("[detail.M3]\nplate = { thick = 1 }\n", &[("2:11", "\"thick\"", "thickness_mm")]),
            ("[detail.M3]\nplate = { thickness_mm = 0 }\n", &[("2:26", "\"0\"", "above 0")]),
            ("[detail.M3]\nplate = { top_mm = 1, bottom_mm = 1 }\n", &[("2:9", "top_mm 1.000 mm", "higher top")]),
            ("[detail.M3]\nbolts = { class = 8.8 }\n", &[("2:19", "\"8.8\"", "text in quotes")]),
            ("[detail.M3]\nbolts = { size = '24' }\n", &[("2:18", "\"'24'\"", "\"M24\"")]),
            ("[detail.M3]\nbolts = { size = 'M24x2' }\n", &[("2:18", "M24x2", "\"M24\"")]),
            ("[detail.M3]\nbolts = { rows_mm = [50, 150] }\n", &[("2:21", "[50, 150]", "from the top row down")]),
            ("[detail.M3]\nbolts = { rows_mm = [150, 150] }\n", &[("2:21", "[150, 150]", "from the top row down")]),
            ("[detail.M3]\nbolts = { rows_mm = [] }\n", &[("2:21", "[]", "list of heights")]),
            ("[detail.M3]\nbolts = { rows_mm = [1, inf] }\n", &[("2:25", "\"inf\"", "finite")]),
            ("[detail.M3]\nstiffeners = { top = 'no' }\n", &[("2:22", "\"'no'\"", "\"none\"")]),
            (
                "[detail.M3]\nwelds = { flange_throat_mm = -8, web_leg_mm = 5 }\n",
                &[("2:30", "\"-8\"", "above 0"), ("2:34", "\"web_leg_mm\"", "web_throat_mm")],
            ),
            ("[detail.M3]\nmembers = { supported_section = 1 }\n", &[("2:33", "\"1\"", "quotes")]),
        ],
    );
}

#[test]
fn faults_of_whole_files() {
    let long = format!("joint,case\nJ1,{}\n", "x".repeat(MAX_LINE_BYTES));
    let mark = format!("joint\n{}\n", "x".repeat(201));
    let rows = format!("joint,case\n{}", (0..=MAX_JOINTS).map(|i| format!("J1,{i}\n")).collect::<String>());
    let table: &[(&[u8], &str, &str)] = &[
        (b"", "1:1", "empty"),
        (b" \n\n", "1:1", "empty"),
        (b"\xff\xfej\0o\0", "1:1", "UTF-16"),
        (b"PK\x03\x04", "1:1", "zip"),
        (b"joint,M_Ed [kN\xb7m]\n", "1:15", "0xB7"),
        (b"joint\nJ\xfc1\n", "2:2", "UTF-8"),
        (&vec![b'x'; MAX_BYTES + 1], "1:1", "16777216"),
        (long.as_bytes(), "2:1", "65536"),
        (mark.as_bytes(), "2:1", "200"),
        (rows.as_bytes(), "100002:1", "100000"),
    ];
    for (bytes, place, said) in table {
        let error = faults(&[("s.csv", bytes)]).to_string();
        assert!(error.starts_with(&format!("s.csv:{place}: ")) && error.contains(said), "{error}");
    }
}

#[test]
fn faults_between_files() {
    let csv = b"joint,case,supported,M_Ed_kNm\nJ1,ULS,B1,10\n".as_slice();
    let toml = b"[[joint]]\nmark = 'J1'\nsupported = 'B2'\n[[joint.case]]\nname = 'ULS'\nM_Ed_kNm = 10\n".as_slice();
    let at_once = faults(&[("s.csv", csv), ("s.toml", toml)]);
    let found: Vec<String> = at_once.faults().map(ToString::to_string).collect();
    assert_eq!(found.len(), 2, "{found:#?}");
    assert!(
        found[0].starts_with("s.toml:3:13: supported: given \"B2\"") && found[0].contains("s.csv:2:8"),
        "{found:#?}"
    );
    assert!(found[1].starts_with("s.toml:4:1: load case \"ULS\"") && found[1].contains("s.csv:2:1"), "{found:#?}");
    let merged = merge(vec![read(csv, "s.csv").unwrap(), read(toml, "s.toml").unwrap()]).unwrap_err();
    let found: Vec<String> = merged.faults().map(ToString::to_string).collect();
    assert!(found.iter().any(|f| f.starts_with("s.toml:4:1: load case \"ULS\"")), "{found:#?}");
    assert!(found.iter().any(|f| f.starts_with("s.toml:1:1: supported: given \"B2\"")), "{found:#?}");
}

#[test]
fn an_undefined_detail_is_said_once_and_only_when_all_files_are_there() {
    let csv = b"joint,detail\nJ1,M3\nJ2,M3\n".as_slice();
    assert!(read(csv, "s.csv").is_ok());
    assert!(read_all(&[("s.csv", csv), ("s.toml", b"[detail.M3]\n")]).is_ok());
    let error = faults(&[("s.csv", csv)]);
    assert_eq!(error.faults().count(), 1);
    assert!(error.to_string().starts_with("s.csv:2:4: the detail \"M3\" is not defined"), "{error}");
    assert!(merge(vec![read(csv, "s.csv").unwrap()]).unwrap_err().to_string().starts_with("s.csv:2:1: "));
}

fn printed(error: &ScheduleError) -> String {
    let mut out = String::new();
    let handler = GraphicalReportHandler::new_themed(GraphicalTheme::unicode_nocolor()).with_width(160);
    handler.render_report(&mut out, error).unwrap();
    out
}

#[test]
fn the_printed_report_shows_each_faulty_line_with_its_place() {
    let error = faults(&[("s.csv", b"joint,M_Ed_kNm\nJ1,12\nJ2,abc\nJ3,def\n")]);
    assert!(error.to_string().ends_with(" (and 1 more)"), "{error}");
    let out = printed(&error);
    for part in ["[s.csv:3:4]", "3 │ J2,abc", "[s.csv:4:4]", "4 │ J3,def"] {
        assert!(out.contains(part), "{part}\n{out}");
    }
    let marked = out.lines().skip_while(|line| !line.contains("J2,abc")).nth(1).unwrap();
    let text = out.lines().find(|line| line.contains("J2,abc")).unwrap();
    let column = |line: &str, at: &str| line.split_once(at).unwrap().0.chars().count();
    assert_eq!(column(marked, "─┬─"), column(text, "abc"), "{out}");
}

#[test]
fn a_long_line_is_cut_to_a_window() {
    let text =
        format!("joint,remark,M_Ed_kNm,remark\nJ1,{},oops\u{1b}[31m,{}\n", "ä".repeat(20_000), "y".repeat(20_000));
    let error = faults(&[("s.csv", text.as_bytes())]);
    let out = printed(&error);
    assert!(out.len() < 2_000, "{} bytes", out.len());
    assert!(out.contains("[s.csv:2:20005]") && out.contains("oops") && out.contains('…'), "{out}");
    assert!(!out.contains('\u{1b}'), "{out:?}");
}

#[test]
fn very_many_faults_are_counted() {
    let text = format!("joint,M_Ed_kNm\n{}", (0..500).map(|i| format!("J{i},x\n")).collect::<String>());
    let error = faults(&[("s.csv", text.as_bytes())]);
    assert_eq!(error.faults().count(), 200);
    assert!(error.to_string().ends_with(" (and 499 more)"), "{error}");
}

/// The parser's own limit on nesting holds; each file is as deep as its size allows.
#[test]
fn deep_nesting_is_a_fault_and_no_overflow() {
    for text in ["joint = ".to_owned() + &"[\n".repeat(1 << 20), format!("[{}b]\n", "a.".repeat(30_000))] {
        let error = faults(&[("s.toml", text.as_bytes())]).to_string();
        assert!(error.contains("no TOML"), "{error}");
    }
}
