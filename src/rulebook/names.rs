//! Finds designations, grades and bolt classes inside the names that people give to things.

/// What stands between a token and the one before it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Gap {
    /// Nothing: `HE|220`.
    Glued,
    /// Blanks, hyphens, underscores: still one name.
    Loose,
    /// Anything else, or the start of the text.
    Apart,
}

#[derive(Clone, Debug, PartialEq)]
enum Sort {
    /// Letters, upper case; a multiplication sign is the word `X`.
    Word,
    /// Digits, with decimals after a point.
    Number,
}

/// A run of letters or a number.
#[derive(Clone, Debug)]
pub(super) struct Token {
    sort: Sort,
    text: String,
    gap: Gap,
}

impl Token {
    fn is_word(&self, any_of: &[&str]) -> bool {
        self.sort == Sort::Word && any_of.contains(&self.text.as_str())
    }

    fn is_number(&self) -> bool {
        self.sort == Sort::Number
    }
}

/// Cuts a text into words and numbers. `8,8` is read as `8.8`; `1.2.3` is one token, which is no number of ours.
pub(super) fn tokens(text: &str) -> Vec<Token> {
    let mut found: Vec<Token> = Vec::new();
    let mut gap = Gap::Apart;
    let mut chars = text.chars().peekable();
    while let Some(c) = chars.next() {
        let c = if matches!(c, '×' | '*' | '✕' | '⨯' | 'х' | 'Х') { 'X' } else { c };
        let sort = if c.is_ascii_digit() {
            Sort::Number
        } else if c.is_alphabetic() {
            Sort::Word
        } else {
            gap = match (gap, c) {
                (Gap::Glued | Gap::Loose, ' ' | '\u{a0}' | '\t' | '-' | '_') => Gap::Loose,
                _ => Gap::Apart,
            };
            continue;
        };
        let mut run: String = c.to_uppercase().collect();
        if sort == Sort::Number {
            while let Some(&next) = chars.peek() {
                let mut ahead = chars.clone();
                ahead.next();
                let decimal = matches!(next, '.' | ',') && ahead.peek().is_some_and(char::is_ascii_digit);
                if !(next.is_ascii_digit() || decimal) {
                    break;
                }
                run.push(if decimal { '.' } else { next });
                chars.next();
            }
        } else {
            while let Some(next) = chars.next_if(|next| next.is_alphabetic()) {
                run.extend(next.to_uppercase());
            }
        }
        found.push(Token { sort, text: run, gap });
        gap = Gap::Glued;
    }
    found
}

/// The designations of the catalogue's rolled sections that a name holds, in the catalogue's spelling
/// (`IPE 300`, `HE 220 B`, `UB 457x191x67`, `UC …`); a bare `457x191x67` is given as `?457x191x67`.
pub(super) fn designations(text: &str) -> Vec<String> {
    let tokens = tokens(text);
    let mut found = Vec::new();
    let mut at = 0;
    while at < tokens.len() {
        match british(&tokens, at).or_else(|| european(&tokens, at)) {
            Some((name, end)) => {
                found.push(name);
                at = end;
            }
            None => at += 1,
        }
    }
    found
}

/// `UKB 457x191x67`, `457x191x67 UB`, `457x191x67` starting at a token; also where it ends.
fn british(tokens: &[Token], at: usize) -> Option<(String, usize)> {
    let prefix = tokens.get(at).and_then(family);
    let start = if prefix.is_some() { at + 1 } else { at };
    let parts = tokens.get(start..start + 5)?;
    let shaped = parts.iter().enumerate().all(|(i, t)| if i % 2 == 0 { t.is_number() } else { t.is_word(&["X"]) })
        && parts[1..].iter().all(|t| t.gap != Gap::Apart);
    if !shaped || (prefix.is_some() && parts[0].gap == Gap::Apart) {
        return None;
    }
    let before = at.checked_sub(1).and_then(|i| tokens.get(i)).filter(|_| tokens[at].gap != Gap::Apart);
    let mut end = start + 5;
    let mut after = tokens.get(end).filter(|t| t.gap != Gap::Apart);
    let suffix = after.and_then(family);
    if suffix.is_some() {
        end += 1;
        after = tokens.get(end).filter(|t| t.gap != Gap::Apart);
    }
    // A dimension goes on (`x 8`), or letters are stuck to it: some other name.
    if after.is_some_and(|t| t.is_word(&["X"]) || t.gap == Gap::Glued) {
        return None;
    }
    let family = match (prefix, suffix) {
        (Some(a), Some(b)) if a != b => return None,
        (Some(family), _) | (None, Some(family)) => family,
        (None, None) => {
            // A short word beside the bare numbers names another family: `RHS`, `UBP`, `W`.
            let foreign = |t: &Token| t.sort == Sort::Word && t.text.chars().count() <= 3;
            let grade_follows = || after.is_some_and(|t| t.is_word(&["S"]));
            if before.is_some_and(foreign) || (after.is_some_and(foreign) && !grade_follows()) {
                return None;
            }
            "?"
        }
    };
    if before.is_some_and(|t| t.is_word(&["X"]) || tokens[at].gap == Gap::Glued) {
        return None;
    }
    let numbers = format!("{}x{}x{}", parts[0].text, parts[2].text, parts[4].text);
    Some((if family == "?" { format!("?{numbers}") } else { format!("{family} {numbers}") }, end))
}

fn family(token: &Token) -> Option<&'static str> {
    match token.text.as_str() {
        "UB" | "UKB" => Some("UB"),
        "UC" | "UKC" => Some("UC"),
        _ => None,
    }
}

/// `IPE 300`, `HE 220 B`, `HEB 220`, `HE-B 220` starting at a token; also where it ends. Of another series the mark
/// is kept (`IPE 300 A`), so that it is not taken for the normal one.
fn european(tokens: &[Token], at: usize) -> Option<(String, usize)> {
    const SERIES: [&str; 3] = ["A", "B", "M"];
    /// Series beside the normal one: another section, whatever stands before.
    const OTHER: [&str; 8] = ["A", "AA", "B", "C", "M", "O", "R", "V"];
    let near = |i: usize| tokens.get(i).filter(|t| t.gap != Gap::Apart);
    if at > 0 && tokens[at].gap == Gap::Glued {
        return None;
    }
    let (name, end, open) = match tokens[at].text.as_str() {
        "IPE" => {
            let size = near(at + 1).filter(|t| t.is_number())?;
            (format!("IPE {}", size.text), at + 2, true)
        }
        "HEA" | "HEB" | "HEM" => {
            let size = near(at + 1).filter(|t| t.is_number())?;
            (format!("HE {} {}", size.text, &tokens[at].text[2..]), at + 2, true)
        }
        "HE" => {
            let (first, second) = (near(at + 1)?, near(at + 2)?);
            let (size, series) = if first.is_number() { (first, second) } else { (second, first) };
            if !(size.is_number() && series.is_word(&SERIES)) {
                return None;
            }
            (format!("HE {} {}", size.text, series.text), at + 3, !first.is_number())
        }
        _ => return None,
    };
    let other_section = |t: &Token| t.gap == Gap::Glued || t.is_word(&["X"]) && open || t.is_word(&OTHER) && open;
    match near(end).filter(|t| other_section(t)) {
        Some(mark) => Some((format!("{name} {}", mark.text), end + 1)),
        None => Some((name, end)),
    }
}

/// The grades that a text names by their own name (`S355` and a sub-grade), in the order of the text.
///
/// J and K qualities, delivery conditions, weathering and hollow-section marks leave a grade's strength as it is and
/// are dropped. N, M and Q grades have product standards and strengths of their own: `S275N`, `S355M`, `S460Q`; so has
/// any other mark written onto the number (`S355MC`), which is kept as it stands.
pub(super) fn grades(tokens: &[Token]) -> Vec<String> {
    let mut found = Vec::new();
    for (at, pair) in tokens.windows(2).enumerate() {
        let [s, number] = pair else { continue };
        let starts = s.is_word(&["S"]) && (s.gap != Gap::Glued);
        if !(starts && number.is_number() && number.text.len() == 3 && number.gap != Gap::Apart) {
            continue;
        }
        let quality = tokens.get(at + 2).filter(|t| t.sort == Sort::Word && t.gap != Gap::Apart);
        // `S355 M20`: that M belongs to a bolt.
        let bolt = tokens.get(at + 3).is_some_and(|t| t.is_number() && t.gap == Gap::Glued);
        let word = quality.filter(|_| !bolt).map_or("", |t| t.text.as_str());
        let glued = quality.is_some_and(|t| t.gap == Gap::Glued);
        let kept = match word {
            "N" | "NL" | "NH" | "NLH" => "N",
            "M" | "ML" | "MH" | "MLH" => "M",
            "Q" => "Q",
            "MC" | "NC" => word,
            _ => match quality.map_or("", |t| t.text.as_str()) {
                "QL" | "QH" | "QLH" => "Q",
                other if glued && !other.starts_with(['J', 'K', 'W', 'H', 'G']) && !other.starts_with("AR") => other,
                _ => "",
            },
        };
        found.push(format!("S{}{kept}", number.text));
    }
    found
}

/// Whether the tokens of `name` stand somewhere in `text`, as a name of its own.
pub(super) fn holds(text: &[Token], name: &[Token]) -> bool {
    !name.is_empty()
        && text.windows(name.len()).any(|window| {
            window[0].gap != Gap::Glued
                && window
                    .iter()
                    .zip(name)
                    .enumerate()
                    .all(|(i, (a, b))| a.text == b.text && (i == 0 || a.gap != Gap::Apart))
        })
}

/// Numbers of a text that could be a strength class: not part of a dimension (`10x8.8`) and without a unit (`4.6 mm`).
pub(super) fn bare_numbers(text: &str) -> Vec<String> {
    const UNITS: [&str; 7] = ["MM", "CM", "M", "IN", "KG", "KN", "N"];
    let tokens = tokens(text);
    let free = |i: usize| {
        let dimension = i > 0 && tokens[i - 1].is_word(&["X"]) && tokens[i].gap != Gap::Apart;
        let next = tokens.get(i + 1).filter(|t| t.gap != Gap::Apart);
        let bolt = tokens.get(i + 2).is_some_and(|t| t.is_number() && t.gap == Gap::Glued);
        !dimension && !next.is_some_and(|t| t.is_word(&["X"]) || (t.is_word(&UNITS) && !bolt))
    };
    (0..tokens.len()).filter(|&i| tokens[i].is_number() && free(i)).map(|i| tokens[i].text.clone()).collect()
}
