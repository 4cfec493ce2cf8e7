//! ifcXML of every version: a stream of elements into the entity graph.
//!
//! Elements alternate between an entity and its attributes. An attribute's element either *is* the entity
//! (`<Location Coordinates="0 0 0"/>`) or holds entities and wrapped values (`<Items><IfcExtrudedAreaSolid/></Items>`);
//! which of the two is told by its XML attributes or, failing those, by its first child. ISO 10303-28 as IFC2X3 uses it
//! has the second form only and plain values as elements too, so that it needs nothing but a document of its own.

mod dialect;
mod head;
mod memory;
mod parser;
mod plain;
mod resolve;
mod scan;
mod slot;

use std::sync::Arc;

use quick_xml::Reader;
use quick_xml::errors::Error;
use quick_xml::events::Event;

use self::dialect::{Around, Dialect};
use self::head::Head;
use self::parser::Parser;
use super::Exchange;
use super::limits::Limits;
use super::problems::{Problems, Ruler, Spot};
use super::source::Source;

/// Reads a document.
///
/// # Errors
/// Why it is no ifcXML at all, in one sentence.
pub(super) fn read(bytes: &[u8], problems: Problems, file: Arc<str>, limits: Limits) -> Result<Exchange, String> {
    match plain::read(bytes, &problems, &file, limits) {
        Ok(exchange) => Ok(exchange),
        Err(scan::Unusual) => read_any(bytes, problems, file, limits),
    }
}

/// As [`read`], whatever of XML the document makes use of.
fn read_any(bytes: &[u8], problems: Problems, file: Arc<str>, limits: Limits) -> Result<Exchange, String> {
    let document = Source::new(bytes);
    let mut xml = Reader::from_reader(bytes);
    xml.config_mut().allow_dangling_amp = true; // one badly written name must not lose the file
    let mut ruler = Ruler::new(bytes);
    let mut parser = Parser::new(document, file, problems, limits);
    let mut dialect = Dialect::default();
    let mut started = false;
    let mut head = Head::default();
    loop {
        let offset = xml.buffer_position() as usize;
        let event = match xml.read_event() {
            Ok(event) => event,
            Err(error) => {
                let spot = Ruler::new(bytes).spot(xml.error_position() as usize);
                return Err(not_well_formed(&error, spot));
            }
        };
        if let Event::Eof = event {
            let spot = ruler.spot(bytes.len());
            if started && !parser.is_done() {
                return Err(format!(
                    "breaks off at line {}, column {}: an element is not closed, the file is truncated",
                    spot.line, spot.column
                ));
            }
            return match dialect.form {
                Some(form) => Ok(resolve::resolve(parser, form)),
                None if started => Err("is ifcXML by ISO 10303-28 without a uos, which would hold the entities".into()),
                None => Err("holds no XML element".into()),
            };
        }
        let is_blank = match &event {
            Event::End(_) => true,
            Event::Text(text) => text.iter().all(u8::is_ascii_whitespace) && !parser.is_in_text(),
            _ => false,
        };
        let spot = if parser.is_skipping() || is_blank { Spot::default() } else { ruler.spot(offset) };
        let done = started && parser.is_done();
        match event {
            Event::Start(_) | Event::Empty(_) if done => {
                let spot = ruler.spot(offset);
                return Err(format!("has a second document element at line {}, column {}", spot.line, spot.column));
            }
            Event::Start(_) if parser.is_skipping() => parser.skip(),
            Event::Empty(_) if parser.is_skipping() => {}
            Event::Start(ref start) | Event::Empty(ref start) => {
                if !parser.is_in_document() {
                    match dialect.start(start, !started, spot, &mut parser.problems)? {
                        Around::Envelope => parser.start_envelope(),
                        Around::Entities(schema) => parser.start_document(schema),
                        Around::Other => parser.skip(),
                    }
                    started = true;
                } else {
                    head.read(document, start, spot, &mut parser.problems).map_err(|error| {
                        format!("is not well-formed XML at line {}, column {}: {error}", spot.line, spot.column)
                    })?;
                    parser.start(&head);
                    if parser.entities.len() > limits.entities {
                        return Err(limits.too_many_entities(spot));
                    }
                }
                if let Event::Empty(_) = event {
                    parser.end();
                }
            }
            Event::End(_) => parser.end(),
            _ if parser.is_skipping() && !matches!(event, Event::End(_) | Event::DocType(_)) => {}
            Event::Text(_) if is_blank => {}
            Event::Text(text) => {
                let raw = head::within(document, &text).unwrap_or_default();
                let text = head::text(document, raw, spot, &mut parser.problems);
                parser.text(text, spot);
            }
            Event::CData(data) => {
                let raw = head::within(document, &data).unwrap_or_default();
                let text = head::decode(raw, spot, &mut parser.problems);
                parser.text(text, spot);
            }
            Event::GeneralRef(reference) => {
                let escape = [b"&", &reference[..], b";"].concat();
                let text = head::text(document, &escape, spot, &mut parser.problems).into_owned();
                parser.text(text.into(), spot);
            }
            Event::DocType(_) => {
                return Err(format!(
                    "holds a document type declaration (DTD) at line {}, column {}, which is not allowed in an exchange",
                    spot.line, spot.column
                ));
            }
            Event::Comment(_) | Event::PI(_) | Event::Decl(_) | Event::Eof => {}
        }
    }
}

fn not_well_formed(error: &Error, spot: Spot) -> String {
    let Spot { line, column } = spot;
    match error {
        Error::Syntax(error) => format!("breaks off inside the markup at line {line}, column {column}: {error}"),
        error => format!("is not well-formed XML at line {line}, column {column}: {error}"),
    }
}
