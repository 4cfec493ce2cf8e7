//! The text of a schedule file and the places in it.

use std::ops::Range;
use std::sync::Arc;

use super::fault::Faults;
use crate::origin::Place;

/// Largest schedule file, bytes.
pub const MAX_BYTES: usize = 16 << 20;

/// Longest line of a schedule file, bytes.
pub const MAX_LINE_BYTES: usize = 64 << 10;

/// A schedule's text: UTF-8, no byte order mark, lines ended by `\n`.
#[derive(Debug)]
pub(super) struct Source {
    pub file: Arc<str>,
    pub text: String,
    starts: Vec<usize>,
}

impl Source {
    /// The text of a file; what is wrong with it goes to `faults`, with as much of the text as could be read.
    pub fn new(bytes: &[u8], file: &str, faults: &mut Faults) -> Self {
        let mut wrong = None;
        let mut text = "";
        if bytes.len() > MAX_BYTES {
            wrong = Some(format!("the file has {} bytes; allowed are {MAX_BYTES}", bytes.len()));
        } else if bytes.starts_with(b"PK\x03\x04") {
            wrong = Some("the file is a zip archive, perhaps a workbook; allowed is CSV or TOML text".into());
        } else if bytes.starts_with(b"\xff\xfe") || bytes.starts_with(b"\xfe\xff") {
            wrong = Some("the file is UTF-16 text; allowed is UTF-8".into());
        } else if bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes).trim_ascii_start().starts_with(b"<") {
            // Each of its lines would be a fault.
            wrong = Some("the file is XML, perhaps a model or a web page; allowed is CSV or TOML text".into());
        } else {
            let bytes = bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes);
            let valid = bytes.utf8_chunks().next().map_or("", |chunk| chunk.valid());
            if let Some(byte) = bytes.get(valid.len()) {
                wrong = Some(format!("the byte 0x{byte:02X} is no UTF-8; allowed is UTF-8 text"));
            }
            text = valid;
        }
        let text = text.replace("\r\n", "\n").replace('\r', "\n");
        let starts = std::iter::once(0).chain(text.match_indices('\n').map(|(at, _)| at + 1)).collect();
        let source = Self { file: file.into(), text, starts };
        if let Some(message) = wrong {
            faults.push(source.place(source.text.len()), 0, message);
        } else if source.text.trim().is_empty() {
            faults.push(source.place(0), 0, "the file is empty; a schedule has at least a heading line".into());
        }
        for (number, line) in source.text.split('\n').enumerate().filter(|(_, line)| line.len() > MAX_LINE_BYTES) {
            let at = source.place(source.starts.get(number).copied().unwrap_or(0));
            faults.push(at, 1, format!("this line has {} bytes; allowed are {MAX_LINE_BYTES}", line.len()));
        }
        source
    }

    /// The place of a byte offset.
    pub fn place(&self, offset: usize) -> Place {
        let line = self.starts.partition_point(|start| *start <= offset);
        let start = line.checked_sub(1).and_then(|index| self.starts.get(index)).copied().unwrap_or(0);
        let column = self.text.get(start..offset).map_or(0, |before| before.chars().count()) + 1;
        Place { file: Arc::clone(&self.file), line: to_u32(line), column: to_u32(column) }
    }

    /// Characters of a byte range, up to the end of its first line.
    pub fn width(&self, range: Range<usize>) -> usize {
        self.text.get(range).and_then(|words| words.lines().next()).map_or(0, |words| words.chars().count())
    }

    /// From a byte offset to the end of its line.
    pub fn row(&self, offset: usize) -> Range<usize> {
        let rest = self.text.get(offset..).unwrap_or("");
        offset..offset + rest.find('\n').unwrap_or(rest.len())
    }

    /// A line, from 1.
    pub fn line(&self, number: u32) -> Option<&str> {
        let start = *self.starts.get(usize::try_from(number).ok()?.checked_sub(1)?)?;
        self.text.get(start..)?.split('\n').next()
    }
}

fn to_u32(count: usize) -> u32 {
    u32::try_from(count).unwrap_or(u32::MAX)
}

/// What was given, quoted and cut, with control characters escaped.
pub(super) fn given(text: &str) -> String {
    let mut chars = text.chars();
    let mut quoted = String::from("\"");
    for c in chars.by_ref().take(40) {
        if c.is_control() { quoted.extend(c.escape_debug()) } else { quoted.push(c) }
    }
    quoted + if chars.next().is_some() { "…\"" } else { "\"" }
}

/// A mark, case or detail name without surplus white space; `Err` says what is wrong with it.
pub(super) fn tidy(text: &str) -> Result<String, String> {
    let tidy = text.split_whitespace().collect::<Vec<_>>().join(" ");
    let length = tidy.chars().count();
    if length > super::MAX_TEXT {
        Err(format!("given {length} characters ({}); allowed are {}", given(&tidy), super::MAX_TEXT))
    } else if tidy.chars().any(char::is_control) {
        Err(format!("given {}; allowed is text without control characters", given(&tidy)))
    } else {
        Ok(tidy)
    }
}

/// The form in which marks are compared: white space and case do not count.
pub(crate) fn fold(mark: &str) -> String {
    mark.split_whitespace().collect::<String>().to_uppercase()
}

/// Whether a text has the form of a GlobalId: 22 characters of the base 64 of ISO 16739, the first at most 3.
pub(super) fn is_global_id(text: &str) -> bool {
    text.len() == 22
        && text.starts_with(['0', '1', '2', '3'])
        && text.bytes().all(|b| b.is_ascii_alphanumeric() || b == b'_' || b == b'$')
}

/// The form in which members are compared: a GlobalId letter by letter, a mark folded.
pub(super) fn member_key(text: &str) -> String {
    if is_global_id(text) { text.to_owned() } else { fold(text) }
}
