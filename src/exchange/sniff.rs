//! Tells the forms of an exchange apart by their content.

use std::borrow::Cow;

use super::limits::Limits;
use super::problems::{Problems, Spot};
use super::scalar::quoted;

/// The text of a file as UTF-8, without a byte order mark.
///
/// # Errors
/// Why the file is of no form that is read, in one sentence without the file's name.
pub(super) fn decode<'a>(bytes: &'a [u8], limits: Limits, problems: &mut Problems) -> Result<Cow<'a, [u8]>, String> {
    if bytes.iter().all(u8::is_ascii_whitespace) {
        return Err("is empty".into());
    }
    if bytes.len() as u64 > limits.file {
        return Err(limits.file_too_large(bytes.len()));
    }
    if super::archive::is_archive(bytes) {
        return Err("is a zip archive within a zip archive, which is not read".into());
    }
    let text = match bytes {
        [0xEF, 0xBB, 0xBF, rest @ ..] => Cow::Borrowed(rest),
        [0xFF, 0xFE, rest @ ..] => utf16(rest, u16::from_le_bytes).into(),
        [0xFE, 0xFF, rest @ ..] => utf16(rest, u16::from_be_bytes).into(),
        _ => declared(bytes, problems),
    };
    if text.len() as u64 > limits.file {
        return Err(limits.file_too_large(text.len())); // another encoding can be shorter than UTF-8
    }
    let start = text.trim_ascii_start();
    if !start.starts_with(b"<") && !is_step(&text) {
        let shown = quoted(&String::from_utf8_lossy(&start[..start.len().min(32)]));
        return Err(format!("is no exchange: it starts with {shown}, ifcXML or STEP (ISO-10303-21) is required"));
    }
    Ok(text)
}

/// Whether a text is a STEP physical file: its first word after white space and comments says so.
pub(super) fn is_step(text: &[u8]) -> bool {
    const SIGN: &[u8] = b"ISO-10303-21";
    let mut rest = text.trim_ascii_start();
    while let Some(comment) = rest.strip_prefix(b"/*") {
        let Some(end) = memchr::memmem::find(comment, b"*/") else { return false };
        rest = comment[end + 2..].trim_ascii_start();
    }
    rest.get(..SIGN.len()).is_some_and(|start| start.eq_ignore_ascii_case(SIGN))
}

fn utf16(bytes: &[u8], unit: fn([u8; 2]) -> u16) -> Vec<u8> {
    let units = bytes.chunks(2).map(|pair| unit([pair[0], pair.get(1).copied().unwrap_or_default()]));
    char::decode_utf16(units).map(|c| c.unwrap_or(char::REPLACEMENT_CHARACTER)).collect::<String>().into_bytes()
}

/// The text by the encoding that the XML declaration names; UTF-8 where it names none.
fn declared<'a>(bytes: &'a [u8], problems: &mut Problems) -> Cow<'a, [u8]> {
    let declaration = bytes.strip_prefix(b"<?xml").and_then(|rest| rest.split(|&b| b == b'>').next());
    let Some(encoding) = declaration.and_then(|d| encoding(&String::from_utf8_lossy(d))) else { return bytes.into() };
    match encoding.as_str() {
        "utf-8" | "utf8" | "us-ascii" | "ascii" => bytes.into(),
        "iso-8859-1" | "latin1" => bytes.iter().map(|&b| char::from(b)).collect::<String>().into_bytes().into(),
        other => {
            problems.add("encoding that is not known", Spot { line: 1, column: 1 }, || {
                format!("the encoding {} is not known; UTF-8, UTF-16 and ISO-8859-1 are: read as UTF-8", quoted(other))
            });
            bytes.into()
        }
    }
}

fn encoding(declaration: &str) -> Option<String> {
    let value = declaration.split_once("encoding")?.1.trim_start().strip_prefix('=')?.trim_start();
    let quote = value.chars().next()?;
    Some(value[quote.len_utf8()..].split(quote).next()?.to_ascii_lowercase())
}
