//! A quick look at plain XML: start tags with well-formed attributes, end tags, text, comments. At
//! anything else it gives up, and the whole document is read by the library's reader, which knows all of XML and says
//! what is wrong with it. So the two must agree in nothing but what is plain.

use memchr::{memchr2, memmem};

/// Something that is not plain.
pub(super) struct Unusual;

/// A piece of a document, in the order of the document.
pub(super) enum Piece<'x> {
    Start {
        name: &'x [u8],
        /// What stands between the brackets, but for a slash at its end.
        content: &'x [u8],
        /// Whether it is its own end.
        is_empty: bool,
    },
    End,
    /// Not empty; between two escapes and tags.
    Text(&'x [u8]),
    /// `&amp;` and its like.
    Escape(&'x [u8]),
    EndOfFile,
}

pub(super) struct Scanner<'x> {
    pub bytes: &'x [u8],
    /// Where the next piece starts.
    pub at: usize,
    /// The names of the open elements.
    pub open: Vec<&'x [u8]>,
    /// The attributes of the start tag that was read last, the values as they are written.
    pub attributes: Vec<(&'x [u8], &'x [u8])>,
}

impl<'x> Scanner<'x> {
    pub fn new(bytes: &'x [u8]) -> Self {
        Self { bytes, at: 0, open: Vec::new(), attributes: Vec::new() }
    }

    /// The same, further on, where the same elements are open.
    pub fn further_on(&self, at: usize) -> Self {
        Self { bytes: self.bytes, at, open: self.open.clone(), attributes: Vec::new() }
    }

    fn rest(&self) -> &'x [u8] {
        self.bytes.get(self.at..).unwrap_or_default()
    }

    /// The next piece.
    ///
    /// # Errors
    /// It is not plain.
    pub fn next(&mut self) -> Result<Piece<'x>, Unusual> {
        loop {
            let rest = self.rest();
            match rest {
                [] => return Ok(Piece::EndOfFile),
                [b'<', b'/', ..] => return self.end(),
                [b'<', b'!', b'-', b'-', b'-' | b'>', ..] => return Err(Unusual),
                [b'<', b'!', b'-', b'-', ..] => self.at += 4 + memmem::find(&rest[4..], b"-->").ok_or(Unusual)? + 3,
                [b'<', b'?', ..] => self.at += 2 + memmem::find(&rest[2..], b"?>").ok_or(Unusual)? + 2,
                [b'<', b'!', ..] => return Err(Unusual),
                [b'<', ..] => return self.start(),
                [b'&', after @ ..] => {
                    let name = after.iter().position(|byte| !byte.is_ascii_alphanumeric() && *byte != b'#');
                    let length = name.filter(|at| *at > 0 && after[*at] == b';').ok_or(Unusual)? + 2;
                    self.at += length;
                    return Ok(Piece::Escape(&rest[..length]));
                }
                _ => {
                    let blank = rest.iter().position(|byte| !matches!(byte, b'\n' | b' ')).unwrap_or(rest.len());
                    let more = match rest.get(blank) {
                        Some(b'<') | None => 0,
                        Some(_) => memchr2(b'<', b'&', &rest[blank..]).unwrap_or(rest.len() - blank),
                    };
                    let text = &rest[..blank + more];
                    self.at += text.len();
                    return Ok(Piece::Text(text));
                }
            }
        }
    }

    fn end(&mut self) -> Result<Piece<'x>, Unusual> {
        let name = self.open.pop().ok_or(Unusual)?;
        match self.rest()[2..].strip_prefix(name) {
            Some([b'>', ..]) => {
                self.at += 2 + name.len() + 1;
                Ok(Piece::End)
            }
            _ => Err(Unusual),
        }
    }

    fn start(&mut self) -> Result<Piece<'x>, Unusual> {
        let tag = &self.rest()[1..];
        let length = tag.iter().position(|byte| !is_of_name(*byte)).ok_or(Unusual)?;
        if length == 0 {
            return Err(Unusual);
        }
        let name = &tag[..length];
        self.attributes.clear();
        let mut at = length;
        loop {
            let blank = tag[at..].iter().position(|byte| !matches!(byte, b' ' | b'\n' | b'\r' | b'\t'));
            let blank = blank.ok_or(Unusual)?;
            at += blank;
            let is_empty = match &tag[at..] {
                [b'>', ..] => false,
                [b'/', b'>', ..] => true,
                _ if blank == 0 => return Err(Unusual),
                attribute => {
                    let length = attribute.iter().position(|byte| !is_of_name(*byte)).ok_or(Unusual)?;
                    let value = match &attribute[length..] {
                        [b'=', quote @ (b'"' | b'\''), value @ ..] if length > 0 => {
                            let end = memchr2(*quote, b'<', value).ok_or(Unusual)?;
                            if value[end] == b'<' {
                                return Err(Unusual);
                            }
                            &value[..end]
                        }
                        _ => return Err(Unusual),
                    };
                    self.attributes.push((&attribute[..length], value));
                    at += length + 2 + value.len() + 1;
                    continue;
                }
            };
            self.at += 1 + at + usize::from(is_empty) + 1;
            if !is_empty {
                self.open.push(name);
            }
            return Ok(Piece::Start { name, content: &tag[..at], is_empty });
        }
    }
}

/// Whether a byte may be part of a plain name; what is not ASCII is looked at by others.
#[inline]
fn is_of_name(byte: u8) -> bool {
    const OF_NAME: [bool; 256] = {
        let mut of_name = [false; 256];
        let mut byte = 0;
        while byte < 128 {
            of_name[byte] = (byte as u8).is_ascii_alphanumeric() || matches!(byte as u8, b'_' | b'-' | b'.' | b':');
            byte += 1;
        }
        of_name
    };
    OF_NAME[usize::from(byte)]
}
