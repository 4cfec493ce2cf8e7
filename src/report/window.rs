//! A short window of the model's own text round a place: an exchange may well stand on one line of many megabytes.

use crate::origin::Place;

/// Characters of the window.
const WIDE: usize = 100;

/// Characters of the window before the place; most of what explains a place stands after its first character.
const BEFORE: usize = 20;

/// Where lines start, and the bytes they start in.
pub(super) struct Source<'a> {
    bytes: &'a [u8],
    starts: Vec<usize>,
}

impl<'a> Source<'a> {
    /// `None` for bytes that are no text of ASCII's family: an archive, UTF-16.
    pub(super) fn new(bytes: &'a [u8]) -> Option<Self> {
        if bytes.iter().take(1024).any(|&b| b == 0)
            || [&b"PK"[..], b"\xff\xfe", b"\xfe\xff"].iter().any(|m| bytes.starts_with(m))
        {
            return None;
        }
        let bytes = bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes);
        let ends = bytes.iter().enumerate().filter(|(_, b)| **b == b'\n').map(|(i, _)| i + 1);
        Some(Self { bytes, starts: std::iter::once(0).chain(ends).collect() })
    }

    /// The text round a place and the line below it that points at the place; `None` where the file has no such place.
    ///
    /// `width` bounds both, in characters; never more than about a hundred.
    pub(super) fn window(&self, place: &Place, width: usize) -> Option<(String, String)> {
        let wide = WIDE.min(width.max(2 * BEFORE));
        let line = usize::try_from(place.line).ok()?.checked_sub(1)?;
        let column = usize::try_from(place.column).ok()?.checked_sub(1)?;
        let rest = self.bytes.get(*self.starts.get(line)?..)?;
        let end = self.starts.get(line + 1).map_or(rest.len(), |next| next - self.starts[line]);
        let text = rest.get(..end)?;
        let text = text.strip_suffix(b"\n").unwrap_or(text);
        let text = text.strip_suffix(b"\r").unwrap_or(text);

        let first = column.saturating_sub(BEFORE);
        let from = byte_of(text, first)?;
        let cut = &text[from..];
        // Four bytes are the longest character; one more than fits, to see whether the line goes on.
        let piece = String::from_utf8_lossy(&cut[..cut.len().min(4 * (wide + 1))]).into_owned();
        let shown: String = piece.chars().take(wide).collect();
        if column - first >= shown.chars().count() {
            return None;
        }
        let goes_on = piece.chars().count() > wide;
        let lead = if first > 0 { "…" } else { "" };
        let tail = if goes_on { "…" } else { "" };
        let pointer = format!("{}^", " ".repeat(lead.chars().count() + column - first));
        Some((format!("{lead}{shown}{tail}"), pointer))
    }
}

/// The byte at which the character of that index (from 0) starts.
fn byte_of(text: &[u8], index: usize) -> Option<usize> {
    // A character starts at every byte that does not continue one.
    text.iter().enumerate().filter(|(_, b)| **b & 0xc0 != 0x80).map(|(i, _)| i).nth(index)
}
