//! What a reader is told: questions go to whom they concern, assumptions are told where they were made.

use faying::origin::Ask;
use faying::report::{Options, survey, text};
use faying::review::Review;

use super::bench::{SCHEDULE, is, j1, joint, long_shed, one_case, origin, plain, review, shed, told, written};
use crate::writer::entity::Entity;
use crate::writer::frames::frames;

/// The text on one line, so that wrapping does not matter.
fn flat(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn surveyed(review: &Review) -> String {
    flat(&survey::render(review, &Options::default()))
}

fn printed(review: &Review) -> String {
    flat(&text::render(review, &Options::default(), None))
}

fn assumed(review: &Review, mark: &str) -> Vec<String> {
    let joint = joint(review, mark).unwrap_or_else(|| panic!("{mark} is not there: {}", told(review)));
    joint.assumptions.iter().filter(|text| text.starts_with('β')).cloned().collect()
}

#[test]
fn the_fabricator_is_asked_for_what_he_could_state_and_nothing_else() {
    let mut building = shed();
    j1(&mut building).bolts.class = None;
    j1(&mut building).welds = None;
    let review = review(&plain(&building), None).expect("a review");
    let text = surveyed(&review);
    let asked = text.split("WHAT TO ASK THE FABRICATOR FOR").nth(1).expect("the questions");
    assert!(
        asked.contains(
            "1. bolt class, weld at the bottom flange, weld at the top flange, weld at the web, 1 joint: B1 / C1"
        ),
        "{asked}"
    );
    assert!(!asked.contains("2. ") && !asked.contains("required actions"), "{asked}");
}

#[test]
fn a_limit_of_the_method_is_no_question() {
    // Two rows in the flange's way: nobody can state that away.
    let mut building = shed();
    j1(&mut building).bolts.rows = vec![518.0, 449.0, 302.0, 70.0];
    let review = review(&plain(&building), None).expect("a review");
    let text = surveyed(&review);
    assert!(text.contains("BEYOND WHAT IS ASSESSED: check these by other means moment with tension at the top (1 joint): B1 / C1 row 2 lies in the beam's flange"), "{text}");
    assert!(text.contains("WHAT TO ASK THE FABRICATOR FOR Nothing"), "{text}");
}

#[test]
fn each_gap_says_who_can_close_it() {
    let blank = SCHEDULE.replacen(", V_Ed_kN = 120", "", 1);
    let mut building = shed();
    j1(&mut building).welds = None;
    let review = review(&plain(&building), Some(&blank)).expect("a review");
    let missing = &joint(&review, "J1").expect("J1").missing;
    let ask = |what: &str| missing.iter().find(|gap| gap.what == what).map(|gap| gap.ask);
    assert_eq!(ask("proof of the shear"), Some(Ask::Engineer), "{missing:?}");
    assert_eq!(ask("weld at the top flange"), Some(Ask::Fabricator), "{missing:?}");
    // A blank cell is looked for in the schedule, a weld in the model.
    let files: Vec<_> = missing.iter().map(|gap| (gap.ask, gap.at.as_ref().map(|at| &*at.file))).collect();
    for (ask, file) in files {
        assert_eq!(file, Some(if ask == Ask::Engineer { "schedule.toml" } else { "model.ifcxml" }));
    }
}

#[test]
fn what_a_finding_says_is_not_said_again_as_missing() {
    let edit = |e: &mut Entity| {
        if is(e, "beam B1") {
            origin(e)[0] += 40.0; // 40 mm short of the plate
        }
        true
    };
    let review = review(&written(&shed(), &edit), Some(SCHEDULE)).expect("a review");
    for joint in &review.joints {
        for (i, reason) in joint.reasons.iter().enumerate() {
            let again = joint.reasons.iter().enumerate().any(|(k, other)| k != i && other.contains(reason.as_str()));
            assert!(!again, "{}: {:?}", joint.mark, joint.reasons);
        }
    }
}

#[test]
fn the_upper_bound_of_beta_is_told_where_it_was_used() {
    let model = plain(&long_shed());
    let both = [("J2", "C2", "B1", "end", 250.0), ("J3", "C2", "B2", "start", 250.0)];
    let stated = review(&model, Some(&one_case(&both))).expect("a review");
    let sagging = "β = 2, its upper bound (5.3(9)), for the moment resistance with tension at the bottom: no load case asks for it, and beams meet both column flanges";
    assert_eq!(assumed(&stated, "J2"), [sagging]);

    let reversed =
        one_case(&both).replacen("}]", "}, { name = \"LC2\", M_Ed_kNm = -20, V_Ed_kN = 9, N_Ed_kN = 0 }]", 1);
    let reversed = review(&model, Some(&reversed)).expect("a review");
    let in_lc2 = "β = 2, its upper bound (5.3(9)), in LC2: the moment on the column's other flange is not stated";
    assert_eq!(assumed(&reversed, "J2"), [in_lc2]);

    let alone = review(&model, Some(&one_case(&both[..1]))).expect("a review");
    assert!(
        assumed(&alone, "J2")[0].contains("in LC1: the moment on the column's other flange is not stated"),
        "{}",
        told(&alone)
    );

    let none = review(&model, None).expect("a review");
    let joint = none.joints.iter().find(|joint| joint.mark == "B1 / C2").expect("B1 / C2");
    assert!(joint.assumptions.iter().any(|text| text.contains("in both senses")), "{:?}", joint.assumptions);
    // One-sided joints have no β to assume.
    let one_sided = review(&plain(&shed()), Some(SCHEDULE)).expect("a review");
    assert!(assumed(&one_sided, "J1").is_empty());

    // Beams that are not level: the reason is another one.
    let mut lower = long_shed();
    lower.beams[1].top -= 150.0;
    let lower = review(&plain(&lower), Some(&one_case(&both))).expect("a review");
    assert!(assumed(&lower, "J2")[0].contains("in LC1: the flanges of the beams"), "{:?}", assumed(&lower, "J2"));
}

#[test]
fn a_joint_without_bolts_is_not_called_missing_steel() {
    let edit = |e: &mut Entity| !(e.class == "IfcMechanicalFastener" && origin(e)[0] < 3000.0);
    let review = review(&written(&shed(), &edit), Some(SCHEDULE)).expect("a review");
    let text = printed(&review);
    assert!(text.contains("J1: scheduled, its members have no bolted joint; required M 150.0 kNm"), "{text}");
}

/// A report that nobody can read to its end is none.
#[test]
fn a_large_building_prints_a_bounded_report() {
    let lines = |joints: usize| {
        let review = review(&plain(&frames(joints, false)), None).expect("a review");
        assert_eq!(review.counts.found, joints);
        (text::render(&review, &Options::default(), None).lines().count(), surveyed(&review).len())
    };
    let (few, many) = (lines(40), lines(120));
    assert!(many.0 <= few.0 + 2 && many.0 < 100, "{few:?} {many:?}");
    assert!(many.1 <= few.1 + 100, "{few:?} {many:?}");
}

#[test]
fn like_findings_at_like_joints_are_one() {
    // Half a pair of stiffeners, at both joints: no check credits it.
    let edit = |e: &mut Entity| !(is(e, "column C1/stiffener C1-1L") || is(e, "column C2/stiffener C2-1L"));
    let review = review(&written(&shed(), &edit), Some(SCHEDULE)).expect("a review");
    let [a, b] = ["J1", "J2"].map(|mark| joint(&review, mark).expect("a joint").assumptions.clone());
    assert!(a.iter().any(|text| text.contains("on one side of the web only")), "{a:?}");
    assert_eq!(a, b);
}
