//! Any bytes as a schedule: the first byte chooses the name, the rest is the file.
#![no_main]

use libfuzzer_sys::fuzz_target;

fuzz_target!(|bytes: &[u8]| {
    let Some((first, text)) = bytes.split_first() else { return };
    let file = if first % 2 == 0 { "schedule.csv" } else { "schedule.toml" };
    if let Ok(intent) = faying::intent::read_all(&[(file, text)]) {
        let finite = |case: &faying::intent::LoadCase| {
            case.moment.is_none_or(|m| m.get().is_finite())
                && case.shear.is_none_or(|v| v.get().is_finite())
                && case.axial.is_none_or(|n| n.get().is_finite())
        };
        assert!(intent.joints.iter().flat_map(|joint| &joint.cases).all(finite));
    }
});
