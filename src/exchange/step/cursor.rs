//! The bytes of a STEP file and where in them the reading stands: blanks, words, strings, and the way back after
//! something broken.

use memchr::memmem;

/// The longest string that is read, in bytes as written; what is longer has lost its closing quote.
pub(super) const LONGEST_STRING: usize = 1 << 20;

pub(super) struct Cursor<'a> {
    pub bytes: &'a [u8],
    pub at: usize,
    /// Whether `*/` was looked for in vain: looking again before each `/*` would take quadratic time.
    no_comment_ends: bool,
}

impl<'a> Cursor<'a> {
    pub fn new(bytes: &'a [u8]) -> Self {
        Self { bytes, at: 0, no_comment_ends: false }
    }

    pub fn rest(&self) -> &'a [u8] {
        self.bytes.get(self.at..).unwrap_or_default()
    }

    /// The next byte that is neither blank nor comment; `None` at the end of the file.
    pub fn peek(&mut self) -> Option<u8> {
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
    pub fn eat(&mut self, byte: u8) -> bool {
        let comes = self.peek() == Some(byte);
        self.at += usize::from(comes);
        comes
    }

    /// The bytes that come next, blanks and comments aside, as long as `is` holds.
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
        self.take_while(|b| b > b' ' && !matches!(b, b',' | b'(' | b')' | b';' | b'\'' | b'"' | b'/' | 0xA0 | 0xC2))
    }

    /// What stands between the quotes, the first of which comes next; doubled quotes as they are written.
    ///
    /// # Errors
    /// It is not closed. The reading then stands where the record seems to end.
    pub fn string(&mut self) -> Result<&'a [u8], String> {
        let start = self.at + 1;
        let window = &self.bytes[start.min(self.bytes.len())..self.bytes.len().min(start + LONGEST_STRING + 1)];
        let mut end = 0;
        let closed = loop {
            let Some(quote) = memchr::memchr(b'\'', &window[end..]) else { break false };
            end += quote;
            if window.get(end + 1) != Some(&b'\'') {
                break true;
            }
            end += 2;
        };
        let text = if closed { &window[..end] } else { &self.bytes[start.min(self.bytes.len())..] };
        // a string that runs into the next record has lost its closing quote
        if let Some(lost) = record_end(text) {
            self.at = start + lost;
        } else if closed {
            self.at = start + end + 1;
            return Ok(text);
        } else {
            self.at = self.bytes.len();
        }
        Err(format!("holds a string that is not closed (or longer than {LONGEST_STRING} bytes)"))
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
