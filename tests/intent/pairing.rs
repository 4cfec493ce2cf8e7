//! Which joint of the steel a scheduled joint means.

use faying::intent::{Intent, Pairing, pair};
use faying::joints::{Joint, Joints, Kind};
use faying::origin::{Ask, Missing, Place};
use faying::shop::{Identity, Member, Shape, Steelwork};
use glam::{DVec2, DVec3};

use super::sound;

fn missing() -> Missing {
    Missing { what: "section".into(), reason: "this test needs none".into(), at: None, ask: Ask::Fabricator }
}

fn member(guid: &str, mark: Option<&str>) -> Member {
    let place = Place { file: "m.ifcxml".into(), line: 1, column: 1 };
    let mark = mark.map(str::to_owned);
    Member {
        identity: Identity { guid: guid.into(), class: "IfcBeam".into(), name: String::new(), mark, place },
        start: DVec3::ZERO,
        end: DVec3::X,
        along: DVec3::X,
        across: DVec3::Y,
        depth: DVec3::Z,
        shape: Shape::I,
        extents: DVec2::ONE,
        section: Err(missing()),
        grade: Err(missing()),
        notches: Vec::new(),
        not_assessed: None,
        disagreements: Vec::new(),
    }
}

/// A joint's mark, supporting and supported member by GlobalId, and the supported member's end.
pub type Met<'a> = (&'a str, Option<&'a str>, Option<&'a str>, Option<bool>);

/// Steel of these members (GlobalId and mark) and joints.
pub fn steel(members: &[(&str, Option<&str>)], joints: &[Met<'_>]) -> (Joints, Steelwork) {
    let index = |guid: Option<&str>| guid.and_then(|guid| members.iter().position(|(g, _)| *g == guid));
    let joint = |(mark, supporting, supported, at_end): &Met<'_>| Joint {
        mark: (*mark).into(),
        kind: Kind::EndPlateMoment,
        supporting: index(*supporting),
        supported: index(*supported),
        at_end: *at_end,
        bolts: Vec::new(),
        plates: Vec::new(),
        welds: Vec::new(),
        layout: Err("this test needs none".into()),
        opposite: None,
        opposite_unclear: None,
        disagreements: Vec::new(),
        place: None,
    };
    let joints = Joints { joints: joints.iter().map(joint).collect(), ..Joints::default() };
    let members = members.iter().map(|(guid, mark)| member(guid, *mark)).collect();
    (joints, Steelwork { members, ..Steelwork::default() })
}

/// A small frame. B1 runs from C1 to C2. The two B9 are identical pieces on four columns, two of which are marked alike.
/// B5 meets C5 twice. B6 and C6 have no marks; nobody knows which end of B6 is there.
const MEMBERS: &[(&str, Option<&str>)] = &[
    ("gC1", Some("C1")),
    ("gC2", Some("C2")),
    ("gB1", Some("B1")),
    ("gC7", Some("C7")),
    ("gC8", Some("C8")),
    ("gC8'", Some("C8")),
    ("gB9", Some("B9")),
    ("gB9'", Some("B9")),
    ("gC5", Some("C5")),
    ("gB5", Some("B5")),
    ("gC6", None),
    ("gB6", Some("B6")),
];

const JOINTS: &[Met<'_>] = &[
    ("B1 / C1", Some("gC1"), Some("gB1"), Some(false)),  // 0
    ("B1 / C2", Some("gC2"), Some("gB1"), Some(true)),   // 1
    ("B9 / C7", Some("gC7"), Some("gB9"), Some(false)),  // 2
    ("B9 / C8", Some("gC8"), Some("gB9"), Some(true)),   // 3
    ("B9 / C8", Some("gC8'"), Some("gB9'"), Some(true)), // 4
    ("J5a", Some("gC5"), Some("gB5"), Some(false)),      // 5
    ("J5b", Some("gC5"), Some("gB5"), Some(true)),       // 6
    ("J6", Some("gC6"), Some("gB6"), None),              // 7
];

/// What becomes of a scheduled joint.
#[derive(Debug, PartialEq)]
enum Becomes {
    Paired(usize),
    NotFound,
    Unclear,
}
use Becomes::{NotFound, Paired, Unclear};

fn becomes(pairing: &Pairing, scheduled: usize) -> Becomes {
    let paired = pairing.scheduled.iter().position(|s| *s == Some(scheduled));
    let listed = (pairing.not_found.contains(&scheduled), pairing.unclear.contains(&scheduled));
    match (paired, listed) {
        (Some(joint), (false, false)) => Paired(joint),
        (None, (true, false)) => NotFound,
        (None, (false, true)) => Unclear,
        other => panic!("a scheduled joint is paired, not found or unclear, one of the three: {other:?}"),
    }
}

fn schedule(lines: &str) -> Intent {
    sound("s.csv", &format!("joint,supporting,supported,end\n{lines}"))
}

/// One line by itself: joint, supporting, supported, end; what becomes of it; words of the problem.
#[test]
fn one_line() {
    let (joints, steelwork) = steel(MEMBERS, JOINTS);
    for (line, expected, said) in [
        // By GlobalId.
        (",gC1,gB1,", Paired(0), ""),
        (",gC8',gB9',", Paired(4), ""),
        (",,gB9',end", Paired(4), ""),
        (",C8,gB9',", Paired(4), ""),
        (",gC8',B9,", Paired(4), ""),
        (",gC1,gB9,", NotFound, ""),
        // By the joint's mark.
        ("B1/C1,,,", Paired(0), ""),
        (" b1 /  c1 ,,,", Paired(0), ""),
        ("J5b,,,", Paired(6), ""),
        ("J77,,,", NotFound, ""),
        ("B9 / C8,,,", Unclear, "its mark fits several joints: \"B9 / C8\" (gB9'), \"B9 / C8\" (gB9)"),
        // By the members' marks and the end.
        (",C1,B1,", Paired(0), ""),
        (",c 2,b 1,END", Paired(1), ""),
        (",,B1,start", Paired(0), ""),
        (",C7,B9,", Paired(2), ""),
        (",C5,B5,end", Paired(6), ""),
        (",C1,B5,", NotFound, ""),
        (",C77,B1,", NotFound, ""),
        (",C1,B77,", NotFound, ""),
        (",C8,B9,end", Unclear, "its members fit several joints"),
        (",C8,B9,", Unclear, "its members fit several joints"),
        (",C5,B5,", Unclear, "\"J5a\" (gB5), \"J5b\" (gB5)"),
        // One member has two ends: without end and support nobody knows which is meant, even if only one was found.
        (",,B1,", Unclear, "neither end nor supporting member"),
        (",,B6,", Unclear, "neither end nor supporting member"),
        // The wrong end of the right members, or members the wrong way round: perhaps a slip, not a missing joint.
        (",C1,B1,end", Unclear, "its members fit \"B1 / C1\" (gB1), its end does not"),
        (",B1,C1,", Unclear, "supporting and supported exchanged"),
        // Which end of B6 is there is not known: the only joint of these two, but not any joint of B6.
        (",gC6,B6,end", Paired(7), ""),
        (",,B6,end", Unclear, "its end does not"),
        // A member without a mark does not fit a mark.
        (",C6,B6,", NotFound, ""),
        // Mark and members together.
        ("B1 / C1,C1,B1,start", Paired(0), ""),
        ("B1 / C1,,,start", Paired(0), ""),
        ("B1 / C1,,B1,", Paired(0), ""),
        ("J6,C6,B6,start", Paired(7), ""),
        ("B9 / C8,gC8',,", Unclear, "its mark fits several"),
        ("B9 / C8,gC8',B9,", Paired(4), ""),
        ("J77,C1,B1,", Paired(0), ""),
        ("J77,C5,B5,", Unclear, "its members fit several"),
        ("J77,C1,,", NotFound, ""),
        ("B1 / C1,C2,B1,", Unclear, "its mark fits \"B1 / C1\" (gB1), its members fit \"B1 / C2\" (gB1)"),
        ("B1 / C1,,,end", Unclear, "but its members or end do not"),
        ("B1 / C1,C77,B77,", Unclear, "but its members or end do not"),
        ("B1 / C1,gC2,gB1,", Unclear, "its members fit"),
        ("B9 / C8,C1,B1,", Unclear, "its members fit"),
        // The GlobalId of some other export fits nothing, least of all a member without a mark.
        ("J6,1aaaaaaaaaaaaaaaaaaaaa,B6,", Unclear, "but its members or end do not"),
    ] {
        let pairing = pair(&schedule(&format!("{line}\n")), &joints, &steelwork);
        assert_eq!(becomes(&pairing, 0), expected, "{line}\n{:?}", pairing.problems);
        let problems: Vec<&str> = pairing.problems.iter().map(|p| p.message.as_str()).collect();
        assert_eq!(problems.len(), usize::from(expected == Unclear), "{line}\n{problems:?}");
        assert!(problems.iter().all(|p| p.contains(said)), "{line}\n{problems:?}");
        assert!(pairing.problems.iter().all(|p| p.at.as_ref().is_some_and(|at| at.line == 2)), "{line}");
    }
}

#[test]
fn two_lines_that_mean_one_joint_pair_with_none() {
    let (joints, steelwork) = steel(MEMBERS, JOINTS);
    let pairing = pair(&schedule("B1/C1,,,\n,C7,B9,\n,gC1,gB1,\n"), &joints, &steelwork);
    let all: Vec<Becomes> = (0..3).map(|i| becomes(&pairing, i)).collect();
    assert_eq!(all, [Unclear, Paired(2), Unclear]);
    let problems: Vec<&str> = pairing.problems.iter().map(|p| p.message.as_str()).collect();
    assert_eq!(
        problems,
        ["scheduled joint \"B1/C1\" (s.csv:2:1) and scheduled joint of \"gB1\" on \"gC1\" (s.csv:4:1) all mean \
          \"B1 / C1\" (gB1); none of them is paired"]
    );
}

#[test]
fn a_detail_that_nobody_defined_is_said() {
    let (joints, steelwork) = steel(MEMBERS, JOINTS);
    let mut intent = schedule("B1/C1,,,\n");
    intent.joints[0].detail = Some("M3".into());
    let pairing = pair(&intent, &joints, &steelwork);
    assert_eq!(becomes(&pairing, 0), Paired(0));
    assert!(pairing.problems[0].message.contains("\"M3\", which is not defined"), "{:?}", pairing.problems);
}

#[test]
fn without_steel_nothing_is_found_and_without_a_schedule_nothing_is_paired() {
    let (joints, steelwork) = steel(&[], &[]);
    let pairing = pair(&schedule("J1,,,\n"), &joints, &steelwork);
    assert_eq!((pairing.not_found, pairing.scheduled.len()), (vec![0], 0));
    let (joints, steelwork) = steel(MEMBERS, JOINTS);
    let pairing = pair(&Intent::default(), &joints, &steelwork);
    assert_eq!(pairing.scheduled, vec![None; JOINTS.len()]);
}

/// Candidates are named up to five.
#[test]
fn many_candidates_are_counted() {
    let many: Vec<Met<'_>> = vec![("M3", None, None, None); 12];
    let (joints, steelwork) = steel(&[], &many);
    let pairing = pair(&schedule("M3,,,\n"), &joints, &steelwork);
    assert!(pairing.problems[0].message.ends_with(" and 7 more"), "{:?}", pairing.problems);
}

/// For the property test of this room.
pub const FRAME: (&[(&str, Option<&str>)], &[Met<'_>]) = (MEMBERS, JOINTS);
