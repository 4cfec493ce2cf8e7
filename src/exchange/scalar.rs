//! Text of an XML attribute or element into a value of the kind that the schema asks for.

use super::cell::Cell;
use super::schema::{Base, Kind};
use super::store::Store;

/// The value of a text; lists are separated by white space, lists of lists flattened.
///
/// # Errors
/// What is wrong with it, in words that follow "…: ".
pub(super) fn parse(store: &mut Store, kind: Kind, text: &str) -> Result<Cell, String> {
    if kind.depth == 0 {
        return one(store, kind.base, text);
    }
    let start = store.next();
    for item in text.split_whitespace() {
        // no item of a text takes cells of its own, so that the items stand together
        match one(store, kind.base, item) {
            Ok(cell) => store.push(cell),
            Err(wrong) => {
                store.take_back(start);
                return Err(wrong);
            }
        }
    }
    let flat = store.listed(start);
    if kind.depth == 2 { rows(store, flat, usize::from(kind.row)) } else { Ok(flat) }
}

/// Nests a flattened list of lists; where the schema leaves the length of a row open the list stays flat.
///
/// # Errors
/// The rows do not come out even.
pub(super) fn rows(store: &mut Store, flat: Cell, row: usize) -> Result<Cell, String> {
    if row == 0 {
        return Ok(flat);
    }
    let length = store.items(flat).len();
    if !length.is_multiple_of(row) {
        return Err(format!("has {length} values, but rows of {row} are required"));
    }
    let rows = store.parts(flat, row);
    Ok(store.list(&rows))
}

fn one(store: &mut Store, base: Base, text: &str) -> Result<Cell, String> {
    match base {
        Base::Text | Base::Any | Base::Select | Base::Binary => Ok(store.text(text)),
        Base::Real => real(store, text.trim()),
        Base::Integer => integer(store, text.trim()),
        Base::Boolean | Base::Logical => truth(store, base, text.trim()),
        Base::Token => match text.trim().trim_matches('.') {
            "" => Err("is empty, an enumeration item is required".into()),
            token if token.bytes().any(|b| b.is_ascii_lowercase()) => Ok(store.token(&token.to_ascii_uppercase())),
            token => Ok(store.token(token)),
        },
        Base::Entity(_) => Err(format!("is the text {}, an entity is required", quoted(text.trim()))),
    }
}

fn real(store: &mut Store, word: &str) -> Result<Cell, String> {
    if let Some(number) = short(word.as_bytes()) {
        return Ok(store.number(number));
    }
    match word.parse::<f64>() {
        Ok(number) if number.is_finite() => Ok(store.number(number)),
        Ok(_) => Err(format!("is {}, a finite number is required", quoted(word))),
        Err(_) => Err(format!("is {}, a number is required", quoted(word))),
    }
}

/// A number of few digits without an exponent, exactly: both the digits and the power of ten are exact in a real, so
/// that their quotient is rounded once (W. D. Clinger, How to read floating point numbers accurately, 1990).
fn short(word: &[u8]) -> Option<f64> {
    const POWERS: [f64; 16] = [1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15];
    let (is_negative, digits) = match word {
        [b'-', digits @ ..] => (true, digits),
        digits => (false, digits),
    };
    if digits.len() > 16 || !digits.first()?.is_ascii_digit() {
        return None;
    }
    let mut all: u64 = 0;
    let mut point = None;
    for (at, byte) in digits.iter().enumerate() {
        match byte {
            b'0'..=b'9' => all = all * 10 + u64::from(byte - b'0'),
            b'.' if point.is_none() => point = Some(at),
            _ => return None,
        }
    }
    let behind = point.map_or(0, |at| digits.len() - at - 1);
    if all >= 1 << 53 {
        return None;
    }
    let number = all as f64 / POWERS.get(behind)?;
    Some(if is_negative { -number } else { number })
}

fn integer(store: &mut Store, word: &str) -> Result<Cell, String> {
    /// Integers up to here are exact in a real too.
    const EXACT: f64 = 9_007_199_254_740_992.0;
    if let Ok(integer) = word.parse::<i64>() {
        return Ok(store.integer(integer));
    }
    match word.parse::<f64>() {
        // some writers put "3." where an integer is meant
        Ok(real) if real.fract() == 0.0 && real.abs() <= EXACT => Ok(store.integer(real as i64)),
        _ => Err(format!("is {}, an integer is required", quoted(word))),
    }
}

fn truth(store: &mut Store, base: Base, word: &str) -> Result<Cell, String> {
    let is = |names: [&str; 3]| names.iter().any(|name| word.trim_matches('.').eq_ignore_ascii_case(name));
    if is(["true", "t", "1"]) {
        Ok(Cell::truth(true))
    } else if is(["false", "f", "0"]) {
        Ok(Cell::truth(false))
    } else if base == Base::Logical && is(["unknown", "u", "u"]) {
        Ok(store.token("UNKNOWN"))
    } else {
        Err(format!("is {}, true or false is required", quoted(word)))
    }
}

/// A text in quotes, cut where it is long: a problem must stay one readable line.
pub(super) fn quoted(text: &str) -> String {
    const LONGEST: usize = 40;
    let mut short = String::new();
    for c in text.chars().take(LONGEST) {
        match c {
            '\'' => short.push(c), // the quotes around are double ones
            c => short.extend(c.escape_debug()),
        }
    }
    if text.chars().nth(LONGEST).is_some() {
        short.push('…');
    }
    format!("\"{short}\"")
}
