//! The one test harness; each module holds the tests of one room, through its public door.

mod assess;
mod coverage;
mod end_to_end;
mod eurocode;
mod exchange;
mod findings;
mod intent;
mod joints;
mod report;
mod rulebook;
mod sample;
mod shop;
mod twins;
mod worked;
mod writer;

/// Within a tolerance; says both values where it is not.
#[track_caller]
fn close(got: f64, expected: f64, tolerance: f64) {
    assert!((got - expected).abs() <= tolerance, "got {got}, expected {expected} ± {tolerance}");
}
