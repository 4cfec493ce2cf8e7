//! The values in a record, by the kinds that the schema asks for.

use super::super::Id;
use super::super::cell::Cell;
use super::super::scalar::{self, quoted};
use super::super::schema::{Base, Kind};
use super::super::store::Store;
use super::super::value::View;
use super::Reader;
use super::cursor::starts_record;
use super::numbers;
use super::record::At;
use super::text;

/// Why there is no value.
enum Trouble {
    /// The record cannot be followed any further.
    Broken(String),
    /// The value is not understood, but where it ends is.
    Wrong(String),
}

type Read<T> = Result<T, Trouble>;

impl Reader<'_> {
    /// The value of an attribute; absent, with a problem, where it is not understood.
    ///
    /// # Errors
    /// The record is broken here.
    pub(super) fn attribute(&mut self, kind: Kind, at: At) -> Result<Cell, String> {
        self.recent.clear();
        match self.value(kind, at, 0) {
            Ok(value) => Ok(value),
            Err(Trouble::Broken(wrong)) => {
                self.drop_recent(at.id);
                Err(wrong)
            }
            Err(Trouble::Wrong(wrong)) => {
                self.drop_recent(at.id);
                self.note("value that is not understood", at, |named| format!("{named} {wrong}"));
                Ok(Cell::ABSENT)
            }
        }
    }

    /// Notes that the attribute that was read last is not kept: what it refers to is looked for all the same.
    pub(super) fn drop_recent(&mut self, from: Id) {
        self.dropped.extend(self.recent.drain(..).map(|number| (from, number)));
    }

    fn value(&mut self, kind: Kind, at: At, level: usize) -> Read<Cell> {
        if level > self.limits.nesting {
            return Err(Trouble::Broken(self.limits.nested_too_far()));
        }
        if self.cursor.at - self.started > self.limits.record {
            return Err(Trouble::Broken(self.limits.record_too_long()));
        }
        let next = self.cursor.peek();
        match next {
            Some(b'(') => self.list(kind, at, level),
            Some(b'$' | b'*') => {
                self.cursor.at += 1;
                Ok(Cell::ABSENT)
            }
            None => Err(Trouble::Broken(self.unexpected("a value"))),
            Some(_) if kind.depth > 0 => {
                let value = self.value(Kind { depth: kind.depth - 1, ..kind }, at, level + 1)?;
                if value.is_absent() {
                    return Ok(value);
                }
                self.note("single value for a list", at, |named| {
                    format!("{named} is a single value, a list in ( ) is required; read as a list of one")
                });
                Ok(self.entities.store.list(&[value]))
            }
            Some(b'#') => self.reference(),
            Some(b'\'') => self.text(kind.base, at),
            Some(b'"') => self.binary(kind.base),
            Some(b'a'..=b'z' | b'A'..=b'Z' | b'!') => self.typed(kind, at, level),
            Some(_) => self.word(kind.base, at),
        }
    }

    fn list(&mut self, kind: Kind, at: At, level: usize) -> Read<Cell> {
        self.cursor.at += 1;
        let is_open = matches!(kind.base, Base::Any | Base::Select);
        // a scalar's list is read to its end, so that the record can go on
        let (inner, wrong) = match kind.depth {
            0 if is_open => (kind, None),
            0 => (Kind::ANY, Some("is a list, a single value is required".to_owned())),
            depth => (Kind { depth: depth - 1, ..kind }, None),
        };
        let start = self.items.len();
        let list = self.items(kind, inner, wrong, at, level);
        let list = list.map(|()| self.entities.store.list(&self.items[start..]));
        self.items.truncate(start);
        list
    }

    /// The items of a list and its end.
    fn items(&mut self, kind: Kind, inner: Kind, mut wrong: Option<String>, at: At, level: usize) -> Read<()> {
        let start = self.items.len();
        let mut absent = false;
        let mut is_first = true;
        while !(is_first && self.cursor.eat(b')')) {
            is_first = false;
            match self.value(inner, at, level + 1) {
                Ok(Cell::ABSENT) => absent = true,
                Ok(value) => self.items.push(value),
                Err(Trouble::Wrong(what)) => wrong = wrong.or(Some(what)),
                Err(broken) => return Err(broken),
            }
            if self.cursor.eat(b')') {
                break;
            }
            if !self.cursor.eat(b',') {
                return Err(Trouble::Broken(self.unexpected(", or )")));
            }
        }
        if let Some(wrong) = wrong {
            return Err(Trouble::Wrong(wrong));
        }
        if absent && matches!(kind.base, Base::Real | Base::Integer) {
            return Err(Trouble::Wrong("has $ in a list of numbers".into())); // the others would change their places
        }
        if absent {
            self.note("list with gaps", at, |named| format!("{named} has $ in its list; the others are read"));
        }
        let (row, length) = (usize::from(kind.row), self.items.len() - start);
        if kind.depth == 1 && row > 0 && length != row {
            return Err(Trouble::Wrong(format!("has a row of {length} values, but rows of {row} are required")));
        }
        Ok(())
    }

    fn reference(&mut self) -> Read<Cell> {
        let number = match self.cursor.reference() {
            Some(number) => number,
            None => self.odd_reference()?,
        };
        self.recent.push(number);
        Ok(Cell::entity(numbers::reference(number, &mut self.large)))
    }

    /// The number of a reference in whatever way it is written.
    fn odd_reference(&mut self) -> Read<u64> {
        if starts_record(self.cursor.rest()) {
            return Err(Trouble::Broken(self.unexpected("a value")));
        }
        self.cursor.at += 1;
        let digits = self.cursor.word();
        let digits = self.cursor.text(digits);
        let number = digits.parse().ok().filter(|_| digits.bytes().all(|b| b.is_ascii_digit()));
        number.ok_or_else(|| {
            let shown = quoted(&format!("#{digits}"));
            Trouble::Wrong(format!("refers to {shown}, which is no id"))
        })
    }

    fn text(&mut self, base: Base, at: At) -> Read<Cell> {
        let string = self.cursor.string().ok_or_else(|| Trouble::Broken(self.limits.string_not_closed()))?;
        let decoded = text::decode(string.raw, self.cursor.source.text(string.raw));
        if !string.is_doubled {
            let text = quoted(&decoded.text);
            self.note("quote that is not doubled", at, |named| {
                format!("{named} has a single ' in its text; it is read as {text}")
            });
        }
        if decoded.is_latin1 {
            self.latin1.get_or_insert((at.spot, 0)).1 += 1;
        }
        if let Some(wrong) = decoded.wrong {
            self.note("escape that is not understood", at, |named| format!("{named} {wrong}"));
        }
        match base {
            Base::Text | Base::Any => {}
            Base::Select => self.untyped(at),
            _ => return Err(Trouble::Wrong(format!("is the text {}, {}", quoted(&decoded.text), required(base)))),
        }
        Ok(self.entities.store.text(&decoded.text))
    }

    /// A binary literal, kept as its digits.
    fn binary(&mut self, base: Base) -> Read<Cell> {
        self.cursor.at += 1;
        let digits = self.cursor.take_while(|b| b.is_ascii_hexdigit());
        if !self.cursor.eat(b'"') {
            return Err(Trouble::Broken(self.unexpected("the end of a binary")));
        }
        let digits = self.cursor.text(digits);
        match base {
            Base::Binary | Base::Any | Base::Select => Ok(self.entities.store.text(&digits)),
            _ => Err(Trouble::Wrong(format!("is the binary {}, {}", quoted(&digits), required(base)))),
        }
    }

    /// `IFCLABEL('x')`; the type is kept only where the schema leaves a choice.
    fn typed(&mut self, kind: Kind, at: At, level: usize) -> Read<Cell> {
        let start = self.cursor.at;
        let name = self.cursor.keyword();
        let name = self.cursor.text(name);
        if !self.cursor.eat(b'(') {
            self.cursor.at = start;
            return self.word(kind.base, at);
        }
        let found = self.schema.find_type(&name);
        let inner = found.as_ref().map_or(Kind::ANY, |(_, kind)| *kind);
        let value = self.value(inner, at, level + 1);
        if let Err(Trouble::Broken(_)) = value {
            return value;
        }
        if !self.cursor.eat(b')') {
            return Err(Trouble::Broken(self.unexpected(") after a typed value")));
        }
        let value = value?;
        // types that are enumerations are not in the tables; only they hold tokens
        if found.is_none() && !value.is_token() {
            return Err(Trouble::Wrong(format!("holds {name}, which is no type of the schema")));
        }
        if value.is_absent() || !matches!(kind.base, Base::Select | Base::Any) {
            return self.unwrapped(kind.base, value);
        }
        let name = found.map_or_else(|| self.entities.store.type_id(&name), |(name, _)| name);
        Ok(self.entities.store.typed(name, value))
    }

    /// The value of a type where the schema leaves no choice of types.
    fn unwrapped(&mut self, base: Base, value: Cell) -> Read<Cell> {
        match (base, self.entities.store.view(value)) {
            (Base::Real, View::Integer(integer)) => Ok(self.entities.store.number(integer as f64)),
            (_, View::Absent)
            | (Base::Text | Base::Binary, View::Text(_))
            | (Base::Real, View::Number(_))
            | (Base::Integer, View::Integer(_))
            | (Base::Boolean | Base::Logical, View::Truth(_))
            | (Base::Logical | Base::Token, View::Token(_)) => Ok(value),
            _ => Err(Trouble::Wrong(format!("is a typed value of another kind, {}", required(base)))),
        }
    }

    /// A number, or a token between dots.
    fn word(&mut self, base: Base, at: At) -> Read<Cell> {
        let start = self.cursor.at;
        let word = self.cursor.word();
        let word = self.cursor.text(word);
        if word.is_empty() && !matches!(self.cursor.peek(), Some(b',' | b')')) {
            self.cursor.at = start;
            return Err(Trouble::Broken(self.unexpected("a value")));
        }
        let is_token = word.len() > 2 && word.starts_with('.') && word.ends_with('.');
        let plain = Kind::one(base);
        let value = match base {
            Base::Any | Base::Select => {
                let value = open(&mut self.entities.store, &word);
                if base == Base::Select && value.is_ok() {
                    self.untyped(at);
                }
                value
            }
            Base::Real | Base::Integer => scalar::parse(&mut self.entities.store, plain, &word),
            Base::Boolean | Base::Logical | Base::Token if is_token => {
                scalar::parse(&mut self.entities.store, plain, &word)
            }
            _ => Err(format!("is {}, {}", quoted(&word), required(base))),
        };
        value.map_err(Trouble::Wrong)
    }

    fn untyped(&mut self, at: At) {
        self.note("value without a type", at, |named| {
            format!("{named} holds a bare value; a type such as IFCLABEL('…') is required around it")
        });
    }
}

/// The value of a word where the schema does not say of which kind it is.
fn open(store: &mut Store, word: &str) -> Result<Cell, String> {
    match word {
        ".T." | ".t." => return Ok(Cell::truth(true)),
        ".F." | ".f." => return Ok(Cell::truth(false)),
        _ if word.len() > 2 && word.starts_with('.') && word.ends_with('.') => {
            return scalar::parse(store, Kind::one(Base::Token), word);
        }
        _ => {}
    }
    match word.parse() {
        Ok(integer) => Ok(store.integer(integer)),
        Err(_) => scalar::parse(store, Kind::one(Base::Real), word),
    }
}

fn required(base: Base) -> &'static str {
    match base {
        Base::Text => "a text in quotes is required",
        Base::Real => "a number is required",
        Base::Integer => "an integer is required",
        Base::Boolean | Base::Logical => ".T. or .F. is required",
        Base::Token => "an enumeration item between dots is required",
        Base::Binary => "a binary in double quotes is required",
        Base::Entity(_) => "an entity #1 is required",
        Base::Select | Base::Any => "a value is required",
    }
}
