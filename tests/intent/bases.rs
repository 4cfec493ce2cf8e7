//! What a schedule states below a column.

use super::sound;
use faying::intent::read;
use faying::joints::{Foundation, Spread};
use faying::units::{mm, mpa};

const JOINT: &str = "[[joint]]\nmark = 'C1'\ndetail = 'F1'\n[detail.F1]\n";

#[test]
fn every_field_is_read() {
    let text = format!(
        "{JOINT}base = {{ concrete = 'c30/37', gamma_c = 1.5, alpha_cc = 0.85, bed_mm = 30, bed_strength_MPa = 20, \
         foundation = {{ beyond_depth_mm = 200, beyond_width_mm = 150, depth_mm = 600 }}, anchors_held = true }}\n"
    );
    let intent = sound("s.toml", &text);
    let expected = Foundation {
        concrete: Some(("C30/37".into(), mpa(30.0))),
        gamma_c: Some(1.5),
        alpha_cc: Some(0.85),
        bed: Some(mm(30.0)),
        bed_strength: Some(mpa(20.0)),
        spread: Some(Spread::Foundation { e_h: mm(200.0), e_b: mm(150.0), depth: mm(600.0) }),
        anchors_held: Some(true),
    };
    assert_eq!(intent.details[0].base, Some(expected));
    assert!(!intent.details[0].states_steel());
    let more = sound("s.toml", &format!("{JOINT}base = {{ concentration = 1.5 }}\nplate = {{ thickness_mm = 20 }}\n"));
    assert_eq!(more.details[0].base.as_ref().and_then(|b| b.spread), Some(Spread::Ratio(1.5)));
    assert!(more.details[0].states_steel());
}

#[test]
fn what_is_wrong_is_told() {
    for (base, words) in [
        ("concrete = 'C31/40'", "concrete: given"),
        ("gamma_c = 0.9", "a number from 1 to 2"),
        ("alpha_cc = 1.2", "a number from 0.8 to 1"),
        ("concentration = 4", "a number from 1 to 3"),
        (
            "concentration = 1.5, foundation = { beyond_depth_mm = 1, beyond_width_mm = 1, depth_mm = 1 }",
            "without a concentration",
        ),
        ("foundation = { beyond_depth_mm = 100 }", "all of beyond_depth_mm"),
        ("bed = 30", "no known key"),
        ("anchors_held = 'yes'", "true or false"),
    ] {
        let fault = read(format!("{JOINT}base = {{ {base} }}\n").as_bytes(), "s.toml").unwrap_err().to_string();
        assert!(fault.contains(words), "{base}: {fault}");
    }
}
