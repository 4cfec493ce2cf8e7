//! One record: `#12=IFCBEAM('…',#5,$);`.

use super::super::Id;
use super::super::problems::{Sort, Spot};
use super::super::scalar::quoted;
use super::super::schema::{Attribute, Kind};
use super::Reader;
use super::cursor::starts_record;

/// The class of a record that gives an entity several classes at once.
const COMPLEX: &str = "complex instance";

/// The record that is being read.
#[derive(Clone, Copy)]
pub(super) struct At<'a> {
    pub id: Id,
    pub spot: Spot,
    /// The attribute, or its position from 1 where the schema has none there.
    pub attribute: &'a str,
}

impl Reader<'_> {
    /// Reads the record whose `#` comes next; at least that is taken.
    pub(super) fn record(&mut self) {
        let spot = self.spot();
        self.started = self.cursor.at;
        self.cursor.at += 1;
        let digits = self.cursor.take_while(|b| b.is_ascii_digit());
        let digits = self.cursor.text(digits);
        if digits.is_empty() || !self.cursor.eat(b'=') {
            return self.give_up("record that is not understood", spot, format!("#{digits} starts no record #1=…"));
        }
        let label = match self.cursor.bytes.get(self.started..self.started + 1 + digits.len()) {
            Some(label) if label.ends_with(digits.as_bytes()) => self.cursor.text(label),
            _ => format!("#{digits}").into(), // blanks stand between
        };
        if self.cursor.peek() == Some(b'(') {
            let class = self.entities.class_id(COMPLEX);
            self.open(class, &label, &digits, spot);
            return self.give_up(
                "complex instance",
                spot,
                format!("{label} is of several classes at once; it is kept, but nothing of it is understood"),
            );
        }
        let name = self.cursor.keyword();
        let name = self.cursor.text(name);
        if name.is_empty() {
            return self.give_up("record that is not understood", spot, format!("{label} names no entity after its ="));
        }
        let class = self.entities.class_id(&name);
        let id = self.open(class, &label, &digits, spot);
        match self.schema.class(class) {
            None => self.problems.add("unknown entity", spot, || {
                format!("{name} is no entity of the schema; it is kept, but nothing of it is understood")
            }),
            Some(known) if known.is_abstract => self.problems.add("abstract entity", spot, || {
                format!("{} is abstract: one of its subtypes is required", known.name)
            }),
            Some(_) => {}
        }
        self.attributes(id, spot);
    }

    fn open(&mut self, class: u16, label: &str, digits: &str, spot: Spot) -> Id {
        let id = self.entities.open(class, label, spot);
        if digits.parse::<u64>().is_err() {
            self.problems.add("id that is too large", spot, || {
                format!("the id {label} is larger than {}: nothing can refer to it", u64::MAX)
            });
        }
        id
    }

    /// The attributes of a record and its end.
    fn attributes(&mut self, id: Id, spot: Spot) {
        let known: &'static [Attribute] = self.entities.attributes(id);
        let mut given = 0;
        let broken = self.positions(id, spot, known, &mut given).err();
        let is_known = self.schema.class(self.entities.class(id)).is_some();
        let at = At { id, spot, attribute: "" };
        if let Some(wrong) = broken {
            self.note("record that breaks off", at, |named| format!("{named} {wrong}; what follows in it is not read"));
            self.cursor.skip_record();
        } else if is_known && given != known.len() {
            self.note("wrong number of attributes", at, |named| {
                format!("{named} has {given} attributes, {} are required; those that are there are read", known.len())
            });
        }
    }

    fn positions(&mut self, id: Id, spot: Spot, known: &'static [Attribute], given: &mut usize) -> Result<(), String> {
        if !self.cursor.eat(b'(') {
            return Err(self.unexpected("( after the class"));
        }
        let mut is_first = true;
        while !(is_first && self.cursor.eat(b')')) {
            is_first = false;
            match known.get(*given) {
                Some(attribute) => {
                    let value = self.attribute(attribute.kind, At { id, spot, attribute: attribute.name })?;
                    if attribute.derived {
                        self.drop_recent(id);
                    } else {
                        self.entities.set(id, *given, value);
                    }
                }
                None => {
                    let name = (*given + 1).to_string();
                    let value = self.attribute(Kind::ANY, At { id, spot, attribute: &name })?;
                    self.entities.add_extra(id, &name, value);
                }
            }
            *given += 1;
            if self.cursor.eat(b')') {
                break;
            }
            if !self.cursor.eat(b',') {
                return Err(self.unexpected(", or )"));
            }
        }
        if self.cursor.eat(b';') {
            return Ok(());
        }
        // where the next thing plainly starts only the mark itself is missing
        let wrong = self.unexpected("; at its end");
        let rest = self.cursor.rest();
        if !starts_record(rest) && !rest.starts_with(b"ENDSEC") {
            return Err(wrong);
        }
        self.note("record without its end", At { id, spot, attribute: "" }, |named| format!("{named} {wrong}"));
        Ok(())
    }

    /// What comes next where something else is required.
    pub(super) fn unexpected(&mut self, required: &str) -> String {
        match self.cursor.peek() {
            None => format!("breaks off at the end of the file, {required} is required"),
            Some(_) => {
                let rest = self.cursor.rest();
                let shown = String::from_utf8_lossy(&rest[..rest.len().min(20)]);
                let shown = quoted(shown.lines().next().unwrap_or_default());
                format!("has {shown} where {required} is required")
            }
        }
    }

    /// Notes a problem with a record; the message is given what the record is called.
    pub(super) fn note(&mut self, sort: Sort, at: At, message: impl FnOnce(String) -> String) {
        let entity = self.entities.get(at.id);
        self.problems.add(sort, at.spot, || {
            let class = format!("{} {}", entity.class(), entity.label());
            message(if at.attribute.is_empty() { class } else { format!("{} of {class}", at.attribute) })
        });
    }

    fn give_up(&mut self, sort: Sort, spot: Spot, message: String) {
        self.problems.add(sort, spot, || message);
        self.cursor.skip_record();
    }
}
