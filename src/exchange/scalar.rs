//! Text of an XML attribute or element into a value of the kind that the schema asks for.

use super::Value;
use super::schema::{Base, Kind};

/// The value of a text; lists are separated by white space, lists of lists flattened.
///
/// # Errors
/// What is wrong with it, in words that follow "…: ".
pub(super) fn parse(kind: Kind, text: &str) -> Result<Value, String> {
    if kind.depth == 0 {
        return one(kind.base, text);
    }
    let mut items: Vec<Value> = text.split_whitespace().map(|item| one(kind.base, item)).collect::<Result<_, _>>()?;
    items.shrink_to_fit(); // most memory goes into short lists
    if kind.depth == 2 { rows(items, usize::from(kind.row)) } else { Ok(Value::List(items)) }
}

/// Nests a flattened list of lists; where the schema leaves the length of a row open the list stays flat.
///
/// # Errors
/// The rows do not come out even.
pub(super) fn rows(items: Vec<Value>, row: usize) -> Result<Value, String> {
    if row == 0 {
        return Ok(Value::List(items));
    }
    if !items.len().is_multiple_of(row) {
        return Err(format!("has {} values, but rows of {row} are required", items.len()));
    }
    let mut rows = Vec::with_capacity(items.len() / row);
    let mut items = items.into_iter().peekable();
    while items.peek().is_some() {
        rows.push(Value::List(items.by_ref().take(row).collect()));
    }
    Ok(Value::List(rows))
}

fn one(base: Base, text: &str) -> Result<Value, String> {
    let word = text.trim();
    match base {
        Base::Text | Base::Any | Base::Select | Base::Binary => Ok(Value::Text(text.into())),
        Base::Real => real(word),
        Base::Integer => integer(word),
        Base::Boolean | Base::Logical => truth(base, word),
        Base::Token => match word.trim_matches('.') {
            "" => Err("is empty, an enumeration item is required".into()),
            token => Ok(Value::Token(token.to_ascii_uppercase().into())),
        },
        Base::Entity(_) => Err(format!("is the text {}, an entity is required", quoted(word))),
    }
}

fn real(word: &str) -> Result<Value, String> {
    match word.parse::<f64>() {
        Ok(number) if number.is_finite() => Ok(Value::Number(number)),
        Ok(_) => Err(format!("is {}, a finite number is required", quoted(word))),
        Err(_) => Err(format!("is {}, a number is required", quoted(word))),
    }
}

fn integer(word: &str) -> Result<Value, String> {
    /// Integers up to here are exact in a real too.
    const EXACT: f64 = 9_007_199_254_740_992.0;
    match (word.parse::<i64>(), word.parse::<f64>()) {
        (Ok(integer), _) => Ok(Value::Integer(integer)),
        // some writers put "3." where an integer is meant
        (_, Ok(real)) if real.fract() == 0.0 && real.abs() <= EXACT => Ok(Value::Integer(real as i64)),
        _ => Err(format!("is {}, an integer is required", quoted(word))),
    }
}

fn truth(base: Base, word: &str) -> Result<Value, String> {
    match word.trim_matches('.').to_ascii_lowercase().as_str() {
        "true" | "t" | "1" => Ok(Value::Truth(true)),
        "false" | "f" | "0" => Ok(Value::Truth(false)),
        "unknown" | "u" if base == Base::Logical => Ok(Value::Token("UNKNOWN".into())),
        _ => Err(format!("is {}, true or false is required", quoted(word))),
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
