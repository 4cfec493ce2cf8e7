//! Strings of ISO 10303-21 into text.

use std::borrow::Cow;

use encoding_rs as enc;

/// The text of a string, and what is wrong with it, in words that follow "…: ".
pub(super) struct Text<'a> {
    pub text: Cow<'a, str>,
    pub wrong: Option<String>,
    /// Whether it holds bytes that are not UTF-8, which are read as Windows-1252: ISO 8859-1 and what programs add to it.
    pub is_latin1: bool,
}

/// Decodes what stands between the quotes: doubled quotes and backslashes, `\X\`, `\X2\`, `\X4\`, `\S\` with `\P.\`.
/// A backslash that starts none of these stands for itself, because file names are often written so. Control
/// characters are left out: only the line breaks of long strings are such.
///
/// `text` are the same bytes where they are UTF-8.
pub(super) fn decode<'a>(raw: &'a [u8], text: Option<&'a str>) -> Text<'a> {
    let (written, is_latin1) = match text {
        Some(text) => (Cow::Borrowed(text), false),
        None => (enc::WINDOWS_1252.decode_without_bom_handling(raw).0, true),
    };
    let is_plain = |byte: u8| matches!(byte, b' '..=b'~') && byte != b'\\' && byte != b'\'';
    if raw.iter().all(|byte| is_plain(*byte)) || !written.contains(|c: char| c == '\\' || c == '\'' || c.is_control()) {
        return Text { text: written, wrong: None, is_latin1 };
    }
    let mut decoded = Text { text: String::with_capacity(written.len()).into(), wrong: None, is_latin1 };
    let mut rest = &*written;
    let mut page = 'A';
    while let Some(at) = rest.find(|c: char| c == '\\' || c == '\'' || c.is_control()) {
        decoded.text.to_mut().push_str(&rest[..at]);
        rest = &rest[at..];
        let taken = escape(rest, &mut page, &mut decoded);
        rest = &rest[taken..];
    }
    decoded.text.to_mut().push_str(rest);
    decoded
}

/// Adds what an escape at the start of `rest` stands for; how many bytes it takes.
fn escape(rest: &str, page: &mut char, into: &mut Text) -> usize {
    if rest.starts_with("''") || rest.starts_with("\\\\") {
        into.text.to_mut().push_str(&rest[..1]);
        return 2;
    }
    if let Some(after) = rest.strip_prefix("\\X2\\") {
        return wide(rest, after, 4, into);
    }
    if let Some(after) = rest.strip_prefix("\\X4\\") {
        return wide(rest, after, 8, into);
    }
    if let Some(byte) = rest.strip_prefix("\\X\\").and_then(|after| hex(after.get(..2)?)) {
        into.text.to_mut().push(char::from_u32(byte).unwrap_or_default());
        return 5;
    }
    if let Some(c) = rest.strip_prefix("\\S\\").and_then(|after| after.chars().next()).filter(char::is_ascii) {
        let byte = c as u8 | 0x80;
        match in_page(*page, byte) {
            Some(text) => into.text.to_mut().push(text),
            None => {
                into.text.to_mut().push(char::REPLACEMENT_CHARACTER);
                into.wrong = Some(format!("holds \\S\\{c}, which the code page \\P{page}\\ does not have"));
            }
        }
        return if c == '\'' { 5 } else { 4 }; // a quote stands doubled here too
    }
    if let [b'\\', b'P', c @ b'A'..=b'I', b'\\', ..] = rest.as_bytes() {
        *page = char::from(*c);
        return 4;
    }
    let first = rest.chars().next().unwrap_or_default();
    if !first.is_control() {
        into.text.to_mut().push(first);
    }
    first.len_utf8()
}

/// The character of a byte in the upper half of a code page: A to I are ISO 8859-1 to 8859-9.
fn in_page(page: char, byte: u8) -> Option<char> {
    let encoding = match page {
        'A' => return Some(char::from(byte)),
        'B' => enc::ISO_8859_2,
        'C' => enc::ISO_8859_3,
        'D' => enc::ISO_8859_4,
        'E' => enc::ISO_8859_5,
        'F' => enc::ISO_8859_6,
        'G' => enc::ISO_8859_7,
        'H' => enc::ISO_8859_8,
        'I' => enc::WINDOWS_1254, // the same as ISO 8859-9 from 0xA0 on
        _ => return None,
    };
    let text = encoding.decode_without_bom_handling_and_without_replacement(std::slice::from_ref(&byte))?;
    text.chars().next()
}

/// `\X2\…\X0\` or `\X4\…\X0\`: characters of so many digits each, which a line break may part.
fn wide(rest: &str, after: &str, digits: usize, into: &mut Text) -> usize {
    let end = after.bytes().take_while(|b| b.is_ascii_hexdigit() || b.is_ascii_control()).count();
    let written = &after[..end];
    let codes: String = written.chars().filter(char::is_ascii_hexdigit).collect();
    let codes = codes.as_bytes().chunks(digits).map(|code| {
        let code = std::str::from_utf8(code).ok().filter(|code| code.len() == digits)?;
        u32::from_str_radix(code, 16).ok()
    });
    let codes: Option<Vec<u32>> = codes.collect();
    let text = codes.filter(|_| after[end..].starts_with("\\X0\\")).and_then(|codes| match digits {
        4 => char::decode_utf16(codes.iter().map(|code| *code as u16)).collect::<Result<String, _>>().ok(),
        _ => codes.into_iter().map(char::from_u32).collect(),
    });
    match text {
        Some(text) => {
            into.text.to_mut().push_str(&text);
            4 + end + 4
        }
        None => {
            let name = &rest[..4];
            into.wrong = Some(format!(
                "holds {name} without groups of {digits} hexadecimal digits and \\X0\\ after it; it is kept as it stands"
            ));
            into.text.to_mut().push_str(name);
            4
        }
    }
}

fn hex(digits: &str) -> Option<u32> {
    if digits.bytes().all(|b| b.is_ascii_hexdigit()) { u32::from_str_radix(digits, 16).ok() } else { None }
}
