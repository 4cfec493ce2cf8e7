//! The sample building: that the committed files are what the writer writes, and that they are sound.

pub mod boathouse;
mod detailing;
mod exchange_file;
mod jetty;
mod papers;
mod slip_house;

use std::path::PathBuf;

use crate::writer::ifcxml::Style;
use crate::writer::ifcxml_bytes;
use boathouse::boathouse;

pub fn folder() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("sample-exchange")
}

fn sample() -> Vec<u8> {
    ifcxml_bytes(&boathouse(), Style::default())
}

/// Writes the committed exchange anew: `cargo test write_the_sample_building -- --ignored`.
#[test]
#[ignore = "writes into the repository"]
fn write_the_sample_building() {
    std::fs::write(folder().join("model.ifcxml"), sample()).expect("sample-exchange/ can be written");
}

#[test]
fn the_committed_exchange_is_what_the_writer_writes() {
    let committed = std::fs::read(folder().join("model.ifcxml")).expect("sample-exchange/model.ifcxml is committed");
    // No assert_eq: it would print a megabyte.
    assert!(
        committed == sample(),
        "run `cargo test write_the_sample_building -- --ignored` and look at the difference"
    );
}
