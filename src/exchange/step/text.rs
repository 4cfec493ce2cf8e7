//! Strings of ISO 10303-21 into text.

/// The text of a string, and what is wrong with it, in words that follow "…: ".
pub(super) struct Text {
    pub text: String,
    pub wrong: Option<String>,
    /// Whether it holds bytes that are not UTF-8, which are read as ISO 8859-1.
    pub is_latin1: bool,
}

/// Decodes what stands between the quotes: doubled quotes and backslashes, `\X\`, `\X2\`, `\X4\`, `\S\` with `\P.\`.
/// A backslash that starts none of these stands for itself, because file names are often written so. Control
/// characters are left out: only the line breaks of long strings are such.
pub(super) fn decode(raw: &[u8]) -> Text {
    let (written, is_latin1) = match std::str::from_utf8(raw) {
        Ok(text) => (text.to_owned(), false),
        Err(_) => (raw.iter().map(|b| char::from(*b)).collect(), true),
    };
    let mut decoded = Text { text: String::new(), wrong: None, is_latin1 };
    if !written.contains(|c: char| c == '\\' || c == '\'' || c.is_control()) {
        decoded.text = written;
        return decoded;
    }
    decoded.text.reserve(written.len());
    let mut rest = written.as_str();
    let mut page = 'A';
    while let Some(at) = rest.find(|c: char| c == '\\' || c == '\'' || c.is_control()) {
        decoded.text.push_str(&rest[..at]);
        rest = &rest[at..];
        let taken = escape(rest, &mut page, &mut decoded);
        rest = &rest[taken..];
    }
    decoded.text.push_str(rest);
    decoded
}

/// Adds what an escape at the start of `rest` stands for; how many bytes it takes.
fn escape(rest: &str, page: &mut char, into: &mut Text) -> usize {
    if rest.starts_with("''") || rest.starts_with("\\\\") {
        into.text.push_str(&rest[..1]);
        return 2;
    }
    if let Some(after) = rest.strip_prefix("\\X2\\") {
        return wide(rest, after, 4, into);
    }
    if let Some(after) = rest.strip_prefix("\\X4\\") {
        return wide(rest, after, 8, into);
    }
    if let Some(byte) = rest.strip_prefix("\\X\\").and_then(|after| hex(after.get(..2)?)) {
        into.text.push(char::from_u32(byte).unwrap_or_default());
        return 5;
    }
    if let Some(c) = rest.strip_prefix("\\S\\").and_then(|after| after.chars().next()).filter(char::is_ascii) {
        if *page == 'A' {
            into.text.push(char::from(c as u8 | 0x80));
        } else {
            into.text.push(char::REPLACEMENT_CHARACTER);
            into.wrong = Some(format!("uses the code page \\P{page}\\; of these only \\PA\\ (ISO 8859-1) is read"));
        }
        return if c == '\'' { 5 } else { 4 }; // a quote stands doubled here too
    }
    if let [b'\\', b'P', c @ b'A'..=b'I', b'\\', ..] = rest.as_bytes() {
        *page = char::from(*c);
        return 4;
    }
    let first = rest.chars().next().unwrap_or_default();
    if !first.is_control() {
        into.text.push(first);
    }
    first.len_utf8()
}

/// `\X2\…\X0\` or `\X4\…\X0\`: characters of so many digits each.
fn wide(rest: &str, after: &str, digits: usize, into: &mut Text) -> usize {
    let written = after.find("\\X0\\").map(|end| &after[..end]);
    let text = written.and_then(|written| {
        let codes = written.as_bytes().chunks(digits).map(|code| {
            let code = std::str::from_utf8(code).ok().filter(|code| code.len() == digits)?;
            hex(code)
        });
        let codes: Vec<u32> = codes.collect::<Option<_>>()?;
        if digits == 4 {
            char::decode_utf16(codes.iter().map(|code| *code as u16)).collect::<Result<String, _>>().ok()
        } else {
            codes.into_iter().map(char::from_u32).collect()
        }
    });
    match (written, text) {
        (Some(written), Some(text)) => {
            into.text.push_str(&text);
            4 + written.len() + 4
        }
        _ => {
            let name = &rest[..4];
            into.wrong = Some(format!(
                "holds {name} without groups of {digits} hexadecimal digits and \\X0\\ after it; it is kept as it stands"
            ));
            into.text.push_str(name);
            4
        }
    }
}

fn hex(digits: &str) -> Option<u32> {
    if digits.bytes().all(|b| b.is_ascii_hexdigit()) { u32::from_str_radix(digits, 16).ok() } else { None }
}
