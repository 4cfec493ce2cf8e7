//! What is read from sound files.

use super::{actions, sound};
use faying::intent::{merge, read, read_all};

/// Heading, cell, M_Ed in N·mm. Sizes of the units are SI prefixes: own arithmetic.
#[test]
fn a_moment_is_read_in_the_unit_of_its_heading() {
    for (heading, cell, expected) in [
        ("M_Ed_kNm", "185.5", 185.5e6),
        ("M_Ed [kNm]", "-185.5", -185.5e6),
        ("M Ed (kN·m)", "+1", 1e6),
        ("m_ed_knm", "1e2", 1e8),
        ("M_ED_KNM", "2", 2e6),
        ("M_Ed / kNm", "2", 2e6),
        ("M_{Ed} [kN m]", ".5", 0.5e6),
        ("M_Ed_Nm", "1000", 1e6),
        ("M_Ed (N·mm)", "1000000", 1e6),
        ("M_Ed_kNmm", "1000", 1e6),
        ("M_Ed_kNcm", "100", 1e6),
        ("M_Ed_MNm", "0.25", 250e6),
        ("M_Ed_kNm", "\u{2212}3", -3e6),
        ("M_Ed_kNm", "0", 0.0),
    ] {
        let intent = sound("s.csv", &format!("joint,{heading}\nJ1,{cell}\n"));
        assert_eq!(intent.joints[0].cases[0].moment.map(|m| m.get()), Some(expected), "{heading} {cell}");
    }
}

#[test]
fn a_force_is_read_in_the_unit_of_its_heading() {
    for (heading, expected) in
        [("V_Ed_kN", 12.5e3), ("V_Ed [N]", 12.5), ("V Ed (MN)", 12.5e6), ("N_Ed_kN", 12.5e3), ("n.ed.kn", 12.5e3)]
    {
        let intent = sound("s.csv", &format!("joint,{heading}\nJ1,12.5\n"));
        let case = &intent.joints[0].cases[0];
        assert_eq!(case.shear.or(case.axial).map(|force| force.get()), Some(expected), "{heading}");
        assert_eq!(case.shear.is_some(), heading.starts_with('V'), "{heading}");
    }
}

#[test]
fn the_separator_is_that_of_the_heading_line() {
    for text in [
        "joint,supported,case,M_Ed_kNm,V_Ed_kN\nJ1,B1,ULS,-185.5,60\n",
        "joint;supported;case;M_Ed_kNm;V_Ed_kN\nJ1;B1;ULS;-185,5;60\n",
        "joint;supported;case;M_Ed_kNm;V_Ed_kN\nJ1;B1;ULS;-185.5;60\n",
        "joint\tsupported\tcase\tM_Ed_kNm\tV_Ed_kN\nJ1\tB1\tULS\t-185,5\t60\n",
        "joint;supported;case;M,Ed [kNm];V,Ed [kN]\nJ1;B1;ULS;-185,5;60\n",
        "\u{feff}joint,supported,case,M_Ed_kNm,V_Ed_kN\r\nJ1,B1,ULS,-185.5,60\r\n",
        "joint,supported,case,M_Ed_kNm,V_Ed_kN\rJ1,B1,ULS,-185.5,60",
        "\n\njoint,supported,case,M_Ed_kNm,V_Ed_kN\n\n,,,,\nJ1,B1,ULS,-185.5,60\n,,,,\n",
        "\"joint\",\"supported\",\"case\",\"M_Ed_kNm\",\"V_Ed_kN\"\n\"J1\",\"B1\",\"ULS\",\"-185.5\",\"60\"\n",
        "V_Ed [kN],M_Ed [kNm],CASE,Supported Member,Joint mark,Remarks,,note 2\n60,-185.5,ULS,B1,J1,\"a, \"\"b\"\"\",,\n",
    ] {
        let intent = sound("s.csv", text);
        let expected = vec![("J1".to_owned(), "ULS".to_owned(), [Some(-185.5), Some(60.0), None])];
        assert_eq!(actions(&intent), expected, "{text:?}");
        assert_eq!(intent.joints[0].supported.as_deref(), Some("B1"), "{text:?}");
    }
}

#[test]
fn blank_is_not_stated_and_zero_is_zero() {
    let intent = sound("s.csv", "joint,case,M_Ed_kNm,V_Ed_kN,N_Ed_kN\nJ1,a, ,0,\nJ2,,,,\nJ3,b,,,\nJ4,,,,-7\n");
    let expected = vec![
        ("J1".to_owned(), "a".to_owned(), [None, Some(0.0), None]),
        ("J3".to_owned(), "b".to_owned(), [None, None, None]),
        ("J4".to_owned(), "(unnamed)".to_owned(), [None, None, Some(-7.0)]),
    ];
    assert_eq!(actions(&intent), expected);
    assert_eq!(intent.joints.len(), 4);
    assert!(intent.joints[1].cases.is_empty());
}

#[test]
fn lines_of_one_joint_are_gathered_and_blanks_inherit() {
    let text = "joint,supporting,supported,end,case,M_Ed_kNm\n\
                J1,,B1,,ULS 1,1\n\
                ,C2,B2,start,ULS 1,2\n\
                j 1,C1,,START,ULS 2,3\n\
                ,c2,b 2,Start,ULS 2,4\n\
                ,C2,B2,end,ULS 1,5\n";
    let intent = sound("s.csv", text);
    let joints: Vec<_> = intent
        .joints
        .iter()
        .map(|j| {
            let cases: Vec<(u32, u32)> = j.cases.iter().map(|c| (c.at.line, c.at.column)).collect();
            (j.mark.as_deref(), j.supporting.as_deref(), j.supported.as_deref(), j.end.as_deref(), j.at.line, cases)
        })
        .collect();
    assert_eq!(
        joints,
        [
            (Some("J1"), Some("C1"), Some("B1"), Some("START"), 2, vec![(2, 1), (4, 1)]),
            (None, Some("C2"), Some("B2"), Some("start"), 3, vec![(3, 1), (5, 1)]),
            (None, Some("C2"), Some("B2"), Some("end"), 6, vec![(6, 1)]),
        ]
    );
}

#[test]
fn global_ids_that_differ_in_case_only_are_two_members() {
    let text = "supporting,supported,M_Ed_kNm\nC1,0aBCDEFGHIJKLMNOPQRSTU,1\nC1,0ABCDEFGHIJKLMNOPQRSTU,2\n";
    assert_eq!(sound("s.csv", text).joints.len(), 2);
}

#[test]
fn toml_is_read_with_places() {
    let text = "[[joint]]\nmark = 'J1'\nsupported = 'B1'\nend = 'end'\n\n  [[joint.case]]\nname = 'ULS'\nM_Ed_Nm = -2500\n\
                V_Ed_kN = 6.5\n\n[[joint]]\nsupporting = 'C1'\nsupported = 'B2'\ncase = [{ name = 'a', N_Ed_MN = 0.5 }, { \
                name = 'b' }]\n";
    for file in ["schedule.toml", "schedule"] {
        let intent = sound(file, text);
        let expected = vec![
            ("J1".to_owned(), "ULS".to_owned(), [Some(-2.5), Some(6.5), None]),
            ("B2".to_owned(), "a".to_owned(), [None, None, Some(500.0)]),
            ("B2".to_owned(), "b".to_owned(), [None, None, None]),
        ];
        assert_eq!(actions(&intent), expected);
        let places: Vec<String> = intent.joints.iter().flat_map(|j| &j.cases).map(|case| case.at.to_string()).collect();
        assert_eq!(places, [format!("{file}:6:3"), format!("{file}:14:9"), format!("{file}:14:40")]);
        assert_eq!(intent.joints[0].at.to_string(), format!("{file}:1:1"));
        assert_eq!(intent.joints[1].at.to_string(), format!("{file}:11:1"));
    }
}

#[test]
fn actions_of_one_file_and_details_of_the_other_become_one_schedule() {
    let csv = b"joint,case,M_Ed_kNm,detail\nJ1,ULS 1,10,m 3\nJ1,ULS 2,20,\n".as_slice();
    let toml = b"[[joint]]\nmark = 'j1'\nsupported = 'B1'\n[[joint.case]]\nname = 'ULS 3'\nM_Ed_kNm = 30\n\
                 [detail.M3]\n[detail.M4]\n"
        .as_slice();
    let at_once = read_all(&[("a.csv", csv), ("a.toml", toml)]).unwrap();
    let one_by_one = merge(vec![read(csv, "a.csv").unwrap(), read(toml, "a.toml").unwrap()]).unwrap();
    for intent in [&at_once, &one_by_one] {
        let moments: Vec<_> = actions(intent).into_iter().map(|(_, case, [m, _, _])| (case, m)).collect();
        let expected = [("ULS 1", 10.0), ("ULS 2", 20.0), ("ULS 3", 30.0)].map(|(c, m)| (c.to_owned(), Some(m)));
        assert_eq!(moments, expected);
        assert_eq!(intent.joints.len(), 1);
        assert_eq!(intent.joints[0].supported.as_deref(), Some("B1"));
        // The definition's own spelling, so that a look-up by name finds it.
        assert_eq!(intent.joints[0].detail.as_deref(), Some("M3"));
        let problems: Vec<String> =
            intent.problems.iter().map(|p| format!("{} {}", p.at.as_ref().unwrap(), p.message)).collect();
        assert_eq!(problems, ["a.toml:8:9 the detail \"M4\" is used by no scheduled joint"]);
    }
}

/// The page shows one CSV and one TOML block; they are one schedule.
#[test]
fn the_example_on_the_page_is_read() {
    let page = include_str!("../../rules/schedule.md");
    let block = |form: &str| {
        let start = page.split_once(&format!("```{form}\n")).unwrap().1;
        start.split_once("```").unwrap().0.to_owned()
    };
    let (csv, toml) = (block("csv"), block("toml"));
    let intent = read_all(&[("schedule.csv", csv.as_bytes()), ("schedule.toml", toml.as_bytes())]).unwrap();
    assert_eq!((intent.joints.len(), intent.details.len(), intent.problems.len()), (3, 1, 0));
    assert_eq!(intent.joints[0].cases[1].axial, None);
    assert_eq!(intent.joints[1].cases[0].moment.map(|m| m.knm()), Some(185.5));
}

/// One joint of CSV, and its frame.
fn framed(heading: &str, cell: &str) -> faying::intent::InFrame {
    sound("s.csv", &format!("joint;{heading}\nJ1;{cell}\n")).joints[0].frame
}

#[test]
fn the_joint_in_its_frame_is_read() {
    use faying::intent::{InFrame, JointClass};
    for (heading, cell, expected) in [
        ("span_m", "7.2", 7200.0),
        ("Span [m]", "7,2", 7200.0),
        ("beam span / mm", "7200", 7200.0),
        ("span (mm)", "7200.5", 7200.5),
    ] {
        assert_eq!(framed(heading, cell).span.map(|l| l.get()), Some(expected), "{heading} {cell}");
    }
    for (heading, cell, expected) in [("frame", "braced", true), ("Bracing", "Unbraced", false)] {
        assert_eq!(framed(heading, cell).braced, Some(expected), "{heading} {cell}");
    }
    for (cell, expected) in
        [("rigid", JointClass::Rigid), ("Semi rigid", JointClass::SemiRigid), ("PINNED", JointClass::Pinned)]
    {
        assert_eq!(framed("class", cell).class, Some(expected), "{cell}");
    }
    assert_eq!(framed("span_m", ""), InFrame::default());
    let toml = "[[joint]]\nmark = \"J1\"\nspan_m = 7.2\nframe = \"braced\"\nclass = \"semi-rigid\"\n";
    let stated =
        InFrame { span: Some(faying::units::mm(7200.0)), braced: Some(true), class: Some(JointClass::SemiRigid) };
    assert_eq!(sound("s.toml", toml).joints[0].frame, stated);
    // What another file states of the joint stays with it.
    let csv = read("joint,M_Ed_kNm\nJ1,12\n".as_bytes(), "s.csv").unwrap();
    let merged = merge(vec![csv, read(toml.as_bytes(), "s.toml").unwrap()]).unwrap();
    assert_eq!(merged.joints[0].frame, stated);
}

#[test]
fn the_frame_of_a_joint_is_stated_in_allowed_words_and_once() {
    for (file, text, part) in [
        ("s.csv", "joint,span\nJ1,7\n", "span has no unit; allowed are m, mm"),
        ("s.csv", "joint,span_ft\nJ1,7\n", "span has the unit \"ft\"; allowed are m, mm"),
        ("s.csv", "joint,span_m\nJ1,0\n", "allowed is a number above 0"),
        ("s.csv", "joint,spanner_m\nJ1,7\n", "no known column"),
        ("s.csv", "joint,span_m,span_mm\nJ1,7,7000\n", "mean the same"),
        ("s.csv", "joint,frame\nJ1,sway\n", "allowed are braced, unbraced"),
        ("s.csv", "joint,class\nJ1,stiff\n", "allowed are rigid, semi-rigid, pinned"),
        ("s.csv", "joint,case,class\nJ1,a,rigid\nJ1,b,pinned\n", "its lines must agree"),
        ("s.csv", "joint,case,span_m\nJ1,a,7\nJ1,b,8\n", "given \"8000 mm\", but the same joint has \"7000 mm\""),
        ("s.toml", "[[joint]]\nmark = \"J1\"\nspan_m = -1\n", "a finite number above 0"),
        ("s.toml", "[[joint]]\nmark = \"J1\"\nspan_m = 7\nspan_mm = 7000\n", "mean the same"),
        ("s.toml", "[[joint]]\nmark = \"J1\"\nclass = \"stiff\"\n", "allowed are rigid, semi-rigid, pinned"),
    ] {
        let error = read(text.as_bytes(), file).unwrap_err().to_string();
        let detail = format!("{:?}", read(text.as_bytes(), file).unwrap_err());
        assert!(error.contains(part) || detail.contains(part), "{text}: {error} {detail}");
    }
}

#[test]
fn the_actions_in_the_column_are_read_beside_those_of_the_beam() {
    let text = "joint,N_Ed_kN,N_col_Ed_kN,M_col_Ed [kNm]\nJ1,1,-850,42\n";
    let case = &sound("s.csv", text).joints[0].cases[0];
    let found = (case.axial.map(|n| n.kn()), case.column_axial.map(|n| n.kn()), case.column_moment.map(|m| m.knm()));
    assert_eq!(found, (Some(1.0), Some(-850.0), Some(42.0)));
    assert_eq!(case.moment, None);
    let toml = "[[joint]]\nmark = \"J1\"\n[[joint.case]]\nN_col_Ed_kN = -850\nM_col_Ed_kNm = 42\n";
    let case = &sound("s.toml", toml).joints[0].cases[0];
    assert_eq!((case.column_axial.map(|n| n.kn()), case.column_moment.map(|m| m.knm())), (Some(-850.0), Some(42.0)));
    assert!(read(b"joint,V_col_Ed_kN\nJ1,1\n", "s.csv").is_err());
    assert!(read(b"joint,N_col_Ed\nJ1,1\n", "s.csv").is_err());
}

#[test]
fn a_tying_force_is_read_from_both_forms() {
    let read_one = |file: &str, text: &str| sound(file, text).joints[0].cases[0].tying.map(|force| force.kn());
    assert_eq!(read_one("s.csv", "joint,V_Ed_kN,F_tie_Ed [kN]\nJ1,100,75\n"), Some(75.0));
    assert_eq!(read_one("s.csv", "joint,V_Ed_kN,f tie ed / MN\nJ1,100,0.075\n"), Some(75.0));
    assert_eq!(read_one("s.csv", "joint,V_Ed_kN,F_tie_Ed_kN\nJ1,100,\n"), None);
    assert_eq!(read_one("s.toml", "[[joint]]\nmark = \"J1\"\n[[joint.case]]\nF_tie_Ed_kN = 75\n"), Some(75.0));
    for heading in ["F_tie_Ed", "F_tie_Ed_kNm", "F_Ed_kN", "tie_Ed_kN"] {
        assert!(read(format!("joint,{heading}\nJ1,1\n").as_bytes(), "s.csv").is_err(), "{heading}");
    }
}
