//! A working line by line: what was given, then each step in symbols, in numbers, with its value and clause.

use super::code::Values;
use super::formula::{Line, Piece, printed, text};
use crate::units::Shown;
use crate::working::Working;

/// A line of a printed working.
#[derive(Clone, Debug)]
pub(super) enum WorkLine {
    /// What the following lines are about.
    Heading(String),
    /// Which other working this one begins like.
    As(Line),
    /// Values given from outside: what they are, and "t_f = 25.00 mm; m = 40.00 mm".
    Given(&'static str, Line),
    /// One evaluated step.
    Step {
        /// What is computed.
        symbol: Line,
        /// In symbols.
        formula: Line,
        /// In numbers; `None` where the formula is a number already, or something in it is not on the page.
        numbers: Option<Line>,
        /// The value with its unit.
        value: String,
        /// Clause, table or figure.
        clause: &'static str,
    },
}

/// A value for reading; what is no number says so.
pub(super) fn shown(value: Shown) -> String {
    if value.value.is_finite() { value.to_string() } else { "no number".into() }
}

/// Fewer steps than this are written again where another working began with them.
const WORTH_A_REFERENCE: usize = 5;

/// The lines of a working. One that begins like one of the `earlier` ones refers to it; `common` are values that stand once
/// for the whole sheet.
pub(super) fn lines(
    working: &Working,
    earlier: &[(String, &Working)],
    common: &[(&'static str, f64)],
) -> Vec<WorkLine> {
    let mut lines: Vec<WorkLine> = Vec::new();
    let shared = |other: &Working| working.steps.iter().zip(&other.steps).take_while(|(a, b)| a == b).count();
    // The first of several that share as much.
    let likest = earlier.iter().rev().max_by_key(|(_, other)| shared(other));
    let known = likest.map_or(0, |(_, other)| shared(other));
    let from = if known >= WORTH_A_REFERENCE { known } else { 0 };
    if let Some(((called, _), last)) = likest.zip(from.checked_sub(1).and_then(|last| working.steps.get(last))) {
        let last = [Piece::Symbol(last.symbol.to_owned()), Piece::Text(format!(" = {}", shown(last.value)))];
        let said = text(format!("As in {called}, down to ")).into_iter().chain(last);
        lines.push(WorkLine::As(said.collect()));
    }
    for (i, step) in working.steps.iter().enumerate().skip(from) {
        lines.extend(step.heading.clone().map(WorkLine::Heading));
        let symbol = vec![Piece::Symbol(step.symbol.to_owned())];
        match printed(step, &Values::before(&working.steps[..i], common)) {
            Some((formula, numbers)) => {
                lines.push(WorkLine::Step { symbol, formula, numbers, value: shown(step.value), clause: step.clause })
            }
            None => {
                let value = symbol.into_iter().chain(text(format!(" = {}", shown(step.value))));
                match lines.last_mut() {
                    Some(WorkLine::Given(what, line)) if *what == step.clause => {
                        line.push(Piece::Text("; ".into()));
                        line.extend(value);
                    }
                    _ => lines.push(WorkLine::Given(step.clause, value.collect())),
                }
            }
        }
    }
    lines
}
