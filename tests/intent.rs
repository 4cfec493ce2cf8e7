//! The schedule: how it is read, what is said about its faults, and which joint each line means.

mod bases;
mod details;
mod faults;
mod laws;
mod pairing;
mod reading;

use faying::intent::{Intent, read_all};

/// Reads one file that must be sound.
fn sound(file: &str, text: &str) -> Intent {
    read_all(&[(file, text.as_bytes())]).unwrap_or_else(|error| panic!("{error}\n{text}"))
}

/// M, V, N of every case in kNm and kN, by joint mark (or supported member) and case name, in the order of the file.
fn actions(intent: &Intent) -> Vec<(String, String, [Option<f64>; 3])> {
    let mut all = Vec::new();
    for joint in &intent.joints {
        let name = joint.mark.clone().or(joint.supported.clone()).unwrap_or_default();
        for case in &joint.cases {
            let values = [case.moment.map(|m| m.knm()), case.shear.map(|v| v.kn()), case.axial.map(|n| n.kn())];
            all.push((name.clone(), case.name.clone(), values));
        }
    }
    all
}
