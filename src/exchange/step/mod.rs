//! STEP physical files (ISO 10303-21): records into the entity graph, by the positions of the schema's attributes.
//!
//! One pass over the bytes; references are resolved after it. What is broken costs its own record at most.

mod cursor;
mod header;
mod numbers;
mod parts;
mod record;
mod text;
mod value;

use std::sync::Arc;

use self::cursor::Cursor;
use self::numbers::Numbers;
use super::cell::Cell;
use super::limits::Limits;
use super::problems::{Problems, Ruler, Spot};
use super::schema::Schema;
use super::{Entities, Exchange, Id, conform};

/// Where in the file the reading stands.
#[derive(Clone, Copy, PartialEq)]
enum Section {
    /// Before, between and after the others.
    None,
    Header,
    Data,
    /// One that is not read.
    Other,
}

struct Reader<'a> {
    cursor: Cursor<'a>,
    ruler: Ruler<'a>,
    schema: &'static Schema,
    entities: Entities,
    problems: Problems,
    /// The items of the lists that are being read, those of the innermost last.
    items: Vec<Cell>,
    /// The numbers in references that have no room in one.
    large: Vec<u64>,
    /// The references in the attribute that is being read.
    recent: Vec<u64>,
    /// References in values that were not kept, and who refers.
    dropped: Vec<(Id, u64)>,
    /// Where the first text that is not UTF-8 stands, and how many there are.
    latin1: Option<(Spot, usize)>,
    limits: Limits,
    /// Where the record starts that is being read.
    started: usize,
}

/// Reads a file.
///
/// # Errors
/// Why it is no exchange at all, in one sentence.
pub(super) fn read(bytes: &[u8], problems: Problems, file: Arc<str>, limits: Limits) -> Result<Exchange, String> {
    let mut reader = Reader {
        cursor: Cursor::new(bytes, limits.string),
        ruler: Ruler::new(bytes),
        schema: Schema::ifc4(),
        entities: Entities::new(Schema::ifc4(), file),
        problems,
        items: Vec::new(),
        large: Vec::new(),
        recent: Vec::new(),
        dropped: Vec::new(),
        latin1: None,
        limits,
        started: 0,
    };
    reader.sections()?;
    Ok(reader.finish())
}

impl Reader<'_> {
    fn spot(&mut self) -> Spot {
        self.ruler.spot(self.cursor.at)
    }

    fn sections(&mut self) -> Result<(), String> {
        let mut section = Section::None;
        let mut named = false; // whether a schema was
        let mut data = false;
        while let Some(next) = self.cursor.peek() {
            if next == b'#' {
                if section == Section::Other {
                    self.cursor.at += 1;
                    self.cursor.skip_record();
                    continue;
                }
                if section != Section::Data {
                    let spot = self.spot();
                    self.problems.add("record outside a section", spot, || {
                        "a record stands outside a DATA section; it is read all the same".into()
                    });
                }
                data = true;
                if self.entities.len() >= self.limits.entities {
                    let spot = self.spot();
                    return Err(self.limits.too_many_entities(spot));
                }
                self.record();
                continue;
            }
            let spot = self.spot();
            let keyword = String::from_utf8_lossy(self.cursor.keyword()).to_ascii_uppercase();
            match (section, keyword.as_str()) {
                (_, "ISO-10303-21") => {}
                (_, "HEADER") => section = Section::Header,
                (Section::Header, "FILE_SCHEMA") => {
                    self.file_schema(spot)?;
                    named = true;
                }
                (Section::Header, "FILE_DESCRIPTION" | "FILE_NAME" | "FILE_POPULATION") => {}
                (Section::Header, "SECTION_LANGUAGE" | "SECTION_CONTEXT" | "SCHEMA_POPULATION") => {}
                (_, "DATA") => {
                    data = true;
                    section = Section::Data;
                    if !named {
                        named = true;
                        self.problems.add("no schema", spot, || "FILE_SCHEMA is missing: read as IFC4".into());
                    }
                    self.cursor.skip_record();
                    self.parts();
                    continue;
                }
                (_, "ANCHOR" | "REFERENCE" | "SIGNATURE") => {
                    section = Section::Other;
                    self.problems.add("section that is not read", spot, || {
                        format!("the section {keyword} is not read: HEADER and DATA are")
                    });
                }
                (_, "ENDSEC") => section = Section::None,
                (_, "END-ISO-10303-21") => {
                    self.cursor.skip_record();
                    self.trailer();
                    return if data { Ok(()) } else { Err("holds no DATA section".into()) };
                }
                (Section::Other, _) => {}
                _ if self.cursor.rest().starts_with(b"/*") => {
                    self.problems.add("comment that is not closed", spot, || {
                        "a comment starts here and is not closed; it is read as if it were none".into()
                    });
                }
                _ => {
                    let shown = super::scalar::quoted(&keyword);
                    self.problems.add("statement that is not understood", spot, || {
                        format!("the statement {shown} is not read: records #1=… and sections are allowed here")
                    });
                }
            }
            self.cursor.skip_record();
        }
        if !data {
            return Err("breaks off before its DATA section: the file is truncated".into());
        }
        let spot = self.spot();
        self.problems.add("end that is missing", spot, || match section {
            Section::None => "the file ends without END-ISO-10303-21; what may have followed is not read".into(),
            _ => "the file breaks off: ENDSEC and END-ISO-10303-21 are missing, what followed is not read".into(),
        });
        Ok(())
    }

    fn trailer(&mut self) {
        if self.cursor.peek().is_some() && !self.cursor.rest().starts_with(b"SIGNATURE") {
            let spot = self.spot();
            self.problems.add("text after the end", spot, || "what follows END-ISO-10303-21 is not read".into());
        }
    }

    fn finish(mut self) -> Exchange {
        if let Some((spot, count)) = self.latin1 {
            self.problems.add("text that is not UTF-8", spot, || {
                format!("texts with bytes that are not UTF-8, {count} from here on, are read as Windows-1252")
            });
        }
        let numbers = Numbers::of(&self.entities, &mut self.problems);
        let large = self.large;
        let number = |id: Id| numbers::number(id, &large);
        let is_missing = self.entities.settle(|id| numbers.find(number(id)?));
        self.dropped.retain(|(_, number)| numbers.find(*number).is_none());
        if is_missing || !self.dropped.is_empty() {
            let mut dropped = self.dropped.as_slice();
            for from in (0..self.entities.len() as u32).map(Id) {
                let entity = self.entities.get(from);
                let mut missing = Vec::new();
                self.entities.each_reference(from, &mut |id| missing.extend(number(id)));
                while let Some(((_, number), others)) = dropped.split_first().filter(|((id, _), _)| *id == from) {
                    missing.push(*number);
                    dropped = others;
                }
                for number in missing {
                    self.problems.add("reference to nothing", entity.spot(), || {
                        format!("{} {} refers to #{number}, but no entity has that id", entity.class(), entity.label())
                    });
                }
            }
            self.entities.drop_waiting();
        }
        conform::check(&self.entities, &mut self.problems);
        Exchange {
            form: format!("{} STEP", self.schema.name),
            entities: self.entities,
            problems: self.problems.finish(),
        }
    }
}
