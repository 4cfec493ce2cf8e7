//! The quick way through a document that is plain XML, which nearly all are.

use std::sync::Arc;

use memchr::memmem;
use quick_xml::events::BytesStart;
use rayon::prelude::*;

use super::super::Exchange;
use super::super::limits::Limits;
use super::super::problems::{Problems, Ruler};
use super::super::source::Source;
use super::dialect::{Around, Dialect};
use super::head::{self, Head};
use super::parser::Parser;
use super::resolve::resolve;
use super::scan::{Piece, Scanner, Unusual};

/// Reads a document.
///
/// # Errors
/// It is not plain XML or no exchange; nothing has been read then.
pub(super) fn read(bytes: &[u8], problems: &Problems, file: &Arc<str>, limits: Limits) -> Result<Exchange, Unusual> {
    match limits.parts(bytes.len()) {
        1 => read_in(1, bytes, problems, file, limits),
        parts => read_in(parts, bytes, problems, file, limits).or_else(|_| read_in(1, bytes, problems, file, limits)),
    }
}

/// Reads a document in parts, as many of them at the same time.
///
/// A part starts where an element seems to start among those that hold the entities. Whether one does is known when the
/// part before has been read, which must end just there.
///
/// # Errors
/// As of [`read`], and where the document can't be cut so.
fn read_in(
    parts: usize,
    bytes: &[u8],
    problems: &Problems,
    file: &Arc<str>,
    limits: Limits,
) -> Result<Exchange, Unusual> {
    let mut dialect = Dialect::default();
    let document = Source::new(bytes);
    let mut first = Reader {
        document,
        scanner: Scanner::new(bytes),
        ruler: Ruler::new(bytes),
        parser: Parser::new(document, file.clone(), problems.clone(), limits),
        head: Head::default(),
        started: false,
        limits,
    };
    while !(first.started && first.parser.is_in_document()) && first.step(Some(&mut dialect))? {}
    if parts > 1 {
        let starts = starts(&first.scanner, parts);
        let mut readers: Vec<Reader> = starts.iter().map(|start| first.further_on(*start)).collect();
        let ends = starts.iter().copied().chain([bytes.len()]);
        let mut all: Vec<_> = std::iter::once(&mut first).chain(&mut readers).zip(ends).collect();
        all.par_iter_mut().try_for_each(|(reader, end)| reader.read_up_to(*end))?;
        drop(all);
        readers.into_iter().try_for_each(|reader| first.parser.absorb(reader.parser))?;
        if first.parser.entities.len() > limits.entities {
            return Err(Unusual);
        }
    } else {
        while first.step(Some(&mut dialect))? {}
    }
    Ok(resolve(first.parser, dialect.form.ok_or(Unusual)?))
}

/// Where the parts after the first one may start: at elements that are indented as the first one that comes next.
fn starts(scanner: &Scanner, parts: usize) -> Vec<usize> {
    let rest = scanner.bytes.get(scanner.at..).unwrap_or_default();
    let Some(first) = memchr::memchr(b'<', rest) else { return Vec::new() };
    let Some(line) = memchr::memrchr(b'\n', &rest[..first]) else { return Vec::new() };
    let indent = &rest[line..=first];
    // where nothing is indented it does not tell how deep an element stands
    let is_indented = |line: &[u8]| matches!(line, [b'\n', b' ' | b'\t']);
    if indent.len() == 2 && !rest[..rest.len().min(1 << 14)].windows(2).any(is_indented) {
        return Vec::new();
    }
    let element = memmem::Finder::new(indent);
    let is_start = |at: &usize| rest.get(at + indent.len()).is_some_and(u8::is_ascii_alphabetic);
    let start_near = |near: usize| {
        let rest = rest.get(near..)?;
        let start = element.find_iter(rest).map(|at| near + at).find(is_start)?;
        Some(scanner.at + start + indent.len() - 1)
    };
    let mut starts: Vec<usize> = (1..parts).filter_map(|part| start_near(rest.len() / parts * part)).collect();
    starts.dedup();
    starts
}

struct Reader<'x> {
    document: Source<'x>,
    scanner: Scanner<'x>,
    ruler: Ruler<'x>,
    parser: Parser<'x>,
    head: Head<'x>,
    /// Whether the document element has.
    started: bool,
    limits: Limits,
}

impl<'x> Reader<'x> {
    /// One for a part of the document that starts there.
    fn further_on(&self, start: usize) -> Self {
        Self {
            document: self.document,
            scanner: self.scanner.further_on(start),
            ruler: self.ruler.further_on(start),
            parser: self.parser.further_on(),
            head: Head::default(),
            started: true,
            limits: self.limits,
        }
    }

    /// Reads what starts before `end`.
    fn read_up_to(&mut self, end: usize) -> Result<(), Unusual> {
        let depth = self.scanner.open.len();
        while self.scanner.at < end && self.step(None)? {}
        let is_whole = if end == self.scanner.bytes.len() {
            self.scanner.open.is_empty()
        } else {
            self.scanner.at == end && self.parser.is_among_entities(depth)
        };
        if is_whole { Ok(()) } else { Err(Unusual) }
    }

    /// Reads one piece; whether another one follows.
    fn step(&mut self, dialect: Option<&mut Dialect>) -> Result<bool, Unusual> {
        let parser = &mut self.parser;
        match self.scanner.next()? {
            Piece::Start { is_empty, .. } if parser.is_skipping() => {
                if !is_empty {
                    parser.skip();
                }
            }
            Piece::Start { name, content, is_empty } => {
                // comments may stand before it
                let spot = self.ruler.spot(content.as_ptr() as usize - self.scanner.bytes.as_ptr() as usize - 1);
                if parser.is_in_document() {
                    let attributes = self.scanner.attributes.iter().map(|attribute| Ok::<_, Unusual>(*attribute));
                    self.head.fill(self.document, name, attributes, spot, &mut parser.problems)?;
                    parser.start(&self.head);
                    if parser.entities.len() > self.limits.entities {
                        return Err(Unusual);
                    }
                } else {
                    let is_root = !std::mem::replace(&mut self.started, true);
                    if !is_root && parser.is_done() {
                        return Err(Unusual);
                    }
                    let content = std::str::from_utf8(content).map_err(|_| Unusual)?;
                    let element = BytesStart::from_content(content, name.len());
                    match dialect.ok_or(Unusual)?.start(&element, is_root, spot, &mut parser.problems) {
                        Ok(Around::Envelope) => parser.start_envelope(),
                        Ok(Around::Entities(schema)) => parser.start_document(schema),
                        Ok(Around::Other) => parser.skip(),
                        Err(_) => return Err(Unusual),
                    }
                }
                if is_empty {
                    parser.end();
                }
            }
            Piece::End => parser.end(),
            Piece::Text(text) => {
                let is_blank = || text.iter().all(u8::is_ascii_whitespace) && !parser.is_in_text();
                if !parser.is_skipping() && !is_blank() {
                    let spot = self.ruler.spot(self.scanner.at - text.len());
                    let text = head::text(self.document, text, spot, &mut parser.problems);
                    parser.text(text, spot);
                }
            }
            Piece::Escape(escape) => {
                if !parser.is_skipping() {
                    let spot = self.ruler.spot(self.scanner.at - escape.len());
                    let text = head::text(self.document, escape, spot, &mut parser.problems);
                    parser.text(text, spot);
                }
            }
            Piece::EndOfFile => return if self.scanner.open.is_empty() { Ok(false) } else { Err(Unusual) },
        }
        Ok(true)
    }
}
