//! How findings are put into words.

use super::context::Parts;
use crate::review::{Finding, Outcome};
use crate::units::Length;

impl Finding {
    /// A finding that stands on no part yet.
    pub(super) fn new(rule: &'static str, severity: Outcome, message: impl Into<String>) -> Self {
        let message = message.into();
        Self { rule, severity, message, intended: None, detailed: None, elements: Vec::new(), at: None }
    }

    /// What was intended and what was detailed.
    pub(super) fn against(self, intended: impl Into<String>, detailed: impl Into<String>) -> Self {
        Self { intended: Some(intended.into()), detailed: Some(detailed.into()), ..self }
    }

    /// The parts it stands on.
    pub(super) fn on(self, (elements, at): Parts) -> Self {
        Self { elements, at, ..self }
    }
}

/// A length to a tenth of a millimetre: "25 mm", "8.4 mm".
pub(super) fn mm(length: Length) -> String {
    format!("{} mm", tenths(length))
}

/// The number alone, to a tenth; minus nought is nought.
fn tenths(length: Length) -> f64 {
    (10.0 * length.get()).round() / 10.0 + 0.0
}

/// Heights in one unit: "573.1, 473.1, 73.1 mm".
pub(super) fn heights(lengths: impl IntoIterator<Item = Length>) -> String {
    let numbers: Vec<String> = lengths.into_iter().map(|length| tenths(length).to_string()).collect();
    if numbers.is_empty() { "none".into() } else { format!("{} mm", numbers.join(", ")) }
}

/// "a", "a and b", "a, b and c".
pub(super) fn and(words: &[String]) -> String {
    match words {
        [] => String::new(),
        [one] => one.clone(),
        [most @ .., last] => format!("{} and {last}", most.join(", ")),
    }
}
