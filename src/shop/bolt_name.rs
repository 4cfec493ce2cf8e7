//! The size of a bolt in its name.

/// Diameter and length that a name states: `M20 x 60`, `HV M24x85`, `M 16`.
pub(super) fn size_in(text: &str) -> Option<(f64, Option<f64>)> {
    let starts = text
        .char_indices()
        .filter(|(i, c)| matches!(c, 'M' | 'm') && !text[..*i].chars().next_back().is_some_and(char::is_alphanumeric));
    for (start, _) in starts {
        let Some((d, rest)) = number_at(text[start + 1..].trim_start()) else { continue };
        if !(5.0..=100.0).contains(&d)
            || rest.chars().next().is_some_and(|c| c.is_alphabetic() && !matches!(c, 'x' | 'X'))
        {
            continue;
        }
        let times = rest.trim_start().strip_prefix(['x', 'X', '×', '*']);
        let length = times.and_then(|r| number_at(r.trim_start())).map(|(length, _)| length);
        return Some((d, length.filter(|l| *l >= 10.0)));
    }
    None
}

/// The decimal number at the start of a text and what follows it.
fn number_at(text: &str) -> Option<(f64, &str)> {
    let digits = text.find(|c: char| !c.is_ascii_digit()).unwrap_or(text.len());
    let end = match text[digits..].strip_prefix(['.', ',']) {
        Some(rest) if rest.starts_with(|c: char| c.is_ascii_digit()) => {
            digits + 1 + rest.find(|c: char| !c.is_ascii_digit()).unwrap_or(rest.len())
        }
        _ => digits,
    };
    Some((text[..end].replace(',', ".").parse().ok()?, &text[end..]))
}
