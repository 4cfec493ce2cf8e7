//! The bytes of a STEP file and where in them the reading stands: blanks, words, strings, and the way back after
//! something broken.

use std::borrow::Cow;

use memchr::memmem;

use super::super::source::Source;

pub(super) struct Cursor<'a> {
    pub bytes: &'a [u8],
    pub source: Source<'a>,
    pub at: usize,
    /// In bytes as written.
    longest_string: usize,
    /// Whether `*/` was looked for in vain: looking again before each `/*` would take quadratic time.
    no_comment_ends: bool,
}

impl<'a> Cursor<'a> {
    pub fn new(bytes: &'a [u8], longest_string: usize) -> Self {
        Self { bytes, source: Source::new(bytes), at: 0, longest_string, no_comment_ends: false }
    }

    /// One that stands further on.
    pub fn further_on(&self, at: usize) -> Self {
        Self { at, ..*self }
    }

    pub fn rest(&self) -> &'a [u8] {
        self.bytes.get(self.at..).unwrap_or_default()
    }

    /// The next byte that is neither blank nor comment; `None` at the end of the file.
    #[inline]
    pub fn peek(&mut self) -> Option<u8> {
        match self.bytes.get(self.at) {
            Some(byte @ (b'!'..=b'.' | b'0'..=b'~')) => Some(*byte), // nothing that starts a blank or a comment
            _ => self.peek_on(),
        }
    }

    fn peek_on(&mut self) -> Option<u8> {
        loop {
            match self.rest() {
                [] => return None,
                [0..=b' ' | 0x7F, ..] => self.at += 1,
                [0xC2, 0xA0, ..] => self.at += 2, // a no-break space is a blank too, in UTF-8 and in Latin-1
                [0xA0, ..] => self.at += 1,
                [b'/', b'*', ..] if !self.no_comment_ends => match memmem::find(self.rest(), b"*/") {
                    Some(end) => self.at += end + 2,
                    None => self.no_comment_ends = true,
                },
                [byte, ..] => return Some(*byte),
            }
        }
    }

    /// Takes the byte if it comes next, blanks and comments aside.
    #[inline]
    pub fn eat(&mut self, byte: u8) -> bool {
        let comes = self.peek() == Some(byte);
        self.at += usize::from(comes);
        comes
    }

    /// The bytes that come next, blanks and comments aside, as long as `is` holds.
    #[inline]
    pub fn take_while(&mut self, is: impl Fn(u8) -> bool) -> &'a [u8] {
        self.peek();
        let rest = self.rest();
        let taken = &rest[..rest.iter().position(|byte| !is(*byte)).unwrap_or(rest.len())];
        self.at += taken.len();
        taken
    }

    /// The name of an entity, type or section, which may be empty.
    pub fn keyword(&mut self) -> &'a [u8] {
        self.take_while(|b| b.is_ascii_alphanumeric() || matches!(b, b'_' | b'-' | b'!'))
    }

    /// Everything up to the next mark or blank, which may be empty.
    pub fn word(&mut self) -> &'a [u8] {
        const ENDS: [bool; 256] = {
            let mut ends = [false; 256];
            let mut byte = 0;
            while byte < 256 {
                ends[byte] =
                    byte <= 0x20 || matches!(byte as u8, b',' | b'(' | b')' | b';' | b'\'' | b'"' | b'/' | 0xA0 | 0xC2);
                byte += 1;
            }
            ends
        };
        self.take_while(|b| !ENDS[usize::from(b)])
    }

    /// What stands between the quotes, the first of which comes next; quotes as they are written.
    ///
    /// A quote ends a string only where the record can go on after it: one that should have been doubled, as in
    /// `'Beam's end',`, is part of the text. A string is taken for one that lost its closing quote where it holds the
    /// start of another record and either a line break or a quote that does not end it.
    ///
    /// `None` where it is not closed; the reading then stands where the record seems to end.
    pub fn string(&mut self) -> Option<Quoted<'a>> {
        let start = self.bytes.len().min(self.at + 1);
        let window = &self.bytes[start..self.bytes.len().min(start + self.longest_string + 1)];
        let mut is_doubled = true;
        // the usual string: short, on one line, a mark right after its quote
        if let Some(length) = window.iter().take(64).position(|byte| matches!(byte, b'\'' | b'\n' | b'\r'))
            && let [b'\'', b',' | b')', ..] = window[length..]
        {
            self.at = start + length + 1;
            return Some(Quoted { raw: &window[..length], is_doubled });
        }
        let mut at = 0; // up to where each piece between quotes has been looked at
        while let Some(length) = memchr::memchr(b'\'', &window[at..]) {
            let (piece, quote) = (&window[at..at + length], at + length);
            let after = &self.bytes[start + quote + 1..];
            let doubled = after.starts_with(b"'");
            let ends = !doubled && may_follow_string(after);
            if (!ends || memchr::memchr2(b'\n', b'\r', piece).is_some())
                && let Some(lost) = record_end(piece)
            {
                self.at = start + at + lost;
                return None;
            }
            if ends {
                self.at = start + quote + 1;
                return Some(Quoted { raw: &window[..quote], is_doubled });
            }
            is_doubled &= doubled;
            at = window.len().min(quote + 1 + usize::from(doubled));
        }
        let rest = start + at;
        self.at = record_end(&self.bytes[rest..]).map_or(self.bytes.len(), |lost| rest + lost);
        None
    }

    /// The number of a reference that comes next, if it is written in the usual way: `#12` and a mark at once.
    #[inline]
    pub fn reference(&mut self) -> Option<u64> {
        let digits = self.rest().strip_prefix(b"#")?;
        let mut number = 0;
        for (length, byte) in digits.iter().take(19).enumerate() {
            match byte {
                b'0'..=b'9' => number = number * 10 + u64::from(byte - b'0'),
                b',' | b')' if length > 0 => {
                    self.at += 1 + length;
                    return Some(number);
                }
                _ => return None,
            }
        }
        None
    }

    /// A piece as text; what is not UTF-8 is replaced.
    #[inline]
    pub fn text(&self, piece: &'a [u8]) -> Cow<'a, str> {
        self.source.text(piece).map_or_else(|| String::from_utf8_lossy(piece), Cow::Borrowed)
    }

    /// Leaves a record: past the `;` that ends it, or up to where another record plainly starts.
    pub fn skip_record(&mut self) {
        while let Some(byte) = self.peek() {
            match byte {
                b'\'' => drop(self.string()),
                b';' => return self.at += 1,
                b'#' if starts_record(self.rest()) => return,
                _ => self.at += 1,
            }
        }
    }
}

/// What stands between the quotes of a string.
pub(super) struct Quoted<'a> {
    pub raw: &'a [u8],
    /// Whether all quotes in it are doubled, as they must be.
    pub is_doubled: bool,
}

/// Whether a record can go on so after a string: with a mark or a comment, or not at all.
fn may_follow_string(bytes: &[u8]) -> bool {
    let mut rest = bytes;
    loop {
        rest = match rest {
            [] | [b',' | b')' | b';', ..] | [b'/', b'*', ..] => return true,
            [0..=b' ' | 0x7F | 0xA0, after @ ..] | [0xC2, 0xA0, after @ ..] => after,
            _ => return false,
        };
    }
}

/// Whether bytes start with `#12=`.
pub(super) fn starts_record(bytes: &[u8]) -> bool {
    let Some(bytes) = bytes.strip_prefix(b"#") else { return false };
    let digits = bytes.iter().take_while(|b| b.is_ascii_digit()).count();
    digits > 0 && bytes[digits..].trim_ascii_start().starts_with(b"=")
}

/// The place of a `;` after which a record starts or the section ends.
fn record_end(text: &[u8]) -> Option<usize> {
    memchr::memchr_iter(b';', text).find(|&at| {
        let next = text[at + 1..].trim_ascii_start();
        starts_record(next) || next.starts_with(b"ENDSEC;")
    })
}
