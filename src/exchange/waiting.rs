//! References whose target was not known when they were read.

/// Ids from here on stand for such references; the reader of each form knows for which.
pub(super) const WAITING: u32 = 1 << 31;
