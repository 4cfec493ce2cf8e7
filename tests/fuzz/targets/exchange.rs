//! Any bytes as an exchange, in whatever form they look like: read, or refused with one sentence.
#![no_main]

use libfuzzer_sys::fuzz_target;

fuzz_target!(|bytes: &[u8]| {
    if let Err(unreadable) = faying::exchange::read(bytes, "fuzz") {
        assert!(!unreadable.reason.is_empty() && !unreadable.reason.contains('\n'));
    }
});
