//! The quick way through a document that is plain XML, which nearly all are.

use std::sync::Arc;

use quick_xml::events::BytesStart;

use super::super::Exchange;
use super::super::limits::Limits;
use super::super::problems::{Problems, Ruler};
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
    let mut dialect = Dialect::default();
    let mut reader = Reader {
        scanner: Scanner::new(bytes),
        ruler: Ruler::new(bytes),
        parser: Parser::new(file.clone(), problems.clone(), limits),
        head: Head::default(),
        started: false,
        limits,
    };
    while reader.step(Some(&mut dialect))? {}
    Ok(resolve(reader.parser, dialect.form.ok_or(Unusual)?))
}

struct Reader<'x> {
    scanner: Scanner<'x>,
    ruler: Ruler<'x>,
    parser: Parser<'x>,
    head: Head<'x>,
    /// Whether the document element has.
    started: bool,
    limits: Limits,
}

impl<'x> Reader<'x> {
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
                    self.head.fill(name, attributes, spot, &mut parser.problems)?;
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
                    let text = head::text(text, spot, &mut parser.problems);
                    parser.text(text, spot);
                }
            }
            Piece::EndOfFile => return if self.scanner.open.is_empty() { Ok(false) } else { Err(Unusual) },
        }
        Ok(true)
    }
}
