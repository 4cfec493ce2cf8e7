//! Numbers as engineers read them.

/// A utilisation: two decimals; more where two would make an excess over 1 read as 1.00.
pub(super) fn utilisation(ratio: f64) -> String {
    if ratio.is_nan() {
        return "not a number".into();
    }
    if ratio.is_infinite() {
        return "no resistance".into();
    }
    let digits = if ratio > 1.0 { (2..6).find(|&digits| shown_above_one(ratio, digits)).unwrap_or(2) } else { 2 };
    format!("{ratio:.digits$}")
}

fn shown_above_one(ratio: f64, digits: usize) -> bool {
    format!("{ratio:.digits$}").parse::<f64>().is_ok_and(|shown| shown > 1.0)
}

/// A force or moment with one decimal and its unit, or the word for "nobody said".
pub(super) fn action(value: Option<f64>, unit: &str, unknown: &str) -> String {
    value.filter(|v| v.is_finite()).map_or_else(|| unknown.to_owned(), |v| format!("{} {unit}", one_decimal(v)))
}

/// One decimal, and never a minus before nothing.
pub(super) fn one_decimal(value: f64) -> String {
    let shown = format!("{value:.1}");
    if shown == "-0.0" { "0.0".into() } else { shown }
}

/// A partial factor: two decimals at least, all that it has.
pub(super) fn factor(value: f64) -> String {
    let (short, full) = (format!("{value:.2}"), value.to_string());
    if full.len() > short.len() { full } else { short }
}

/// "1 joint", "3 joints".
pub(super) fn count(number: usize, one: &str, many: &str) -> String {
    format!("{number} {}", if number == 1 { one } else { many })
}
