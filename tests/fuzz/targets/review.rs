//! Any bytes as a model, reviewed to the end against a small schedule and drawn as text and JSON.
#![no_main]

use faying::review::Outcome;
use faying::run::{Inputs, run};
use libfuzzer_sys::fuzz_target;

const SCHEDULE: &str = "joint,case,M_Ed_kNm,V_Ed_kN,N_Ed_kN\nJ1,LC1,50,40,0\nT1,LC1,50,40,0\n";

fuzz_target!(|bytes: &[u8]| {
    let schedules = vec![("schedule.csv", SCHEDULE.as_bytes())];
    let Ok(review) = run(&Inputs { model: ("fuzz", bytes), schedules, rules: Vec::new() }) else { return };
    let ends = review.counts.clear + review.counts.comment + review.counts.hold + review.counts.unproven;
    assert_eq!(ends, review.joints.len());
    for joint in &review.joints {
        // Nothing is clear without a resistance that stands above what is required.
        if matches!(joint.outcome, Outcome::Clear | Outcome::Comment) {
            assert!(joint.found() && joint.missing.is_empty());
            assert!(joint.utilisation().is_some_and(|used| used <= 1.0));
        }
    }
});
