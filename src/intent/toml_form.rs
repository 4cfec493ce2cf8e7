//! A schedule as TOML: joints with their load cases, and intended details.

use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::actions::{action, decimal};
use super::fault::Faults;
use super::frame::Word;
use super::gather::{Line, Stated, written};
use super::source::{Source, given, tidy};
use super::{IntendedDetail, LoadCase, MAX_JOINTS, UNNAMED_CASE};
use crate::units::{Length, mm};

/// Reads the lines and the details of a schedule, both in the order of the file.
pub(super) fn lines(source: &Source, faults: &mut Faults) -> (Vec<Line>, Vec<IntendedDetail>) {
    let (document, errors) = DeTable::parse_recoverable(&source.text);
    let mut reader = Reader { source, faults };
    for error in &errors {
        reader.fault(error.span().unwrap_or(0..0), format!("no TOML: {}", error.message()));
    }
    if !errors.is_empty() {
        return (Vec::new(), Vec::new());
    }
    let root = Table { table: document.get_ref(), span: 0..0, name: "a schedule".into() };
    reader.known(&root, &["joint", "detail"]);
    let mut lines = Vec::new();
    for joint in reader.tables(&root, "joint", "[[joint]]") {
        reader.joint(&joint, &mut lines);
        if lines.len() > MAX_JOINTS {
            reader.fault(joint.span, format!("the schedule has more load cases; allowed are {MAX_JOINTS}"));
            break;
        }
    }
    let details = reader.inner(&root, "detail").map_or(Vec::new(), |table| {
        let mut named: Vec<_> = table.table.iter().collect();
        named.sort_by_key(|(name, _)| name.span().start);
        named.into_iter().filter_map(|(name, value)| reader.detail(name, value)).collect()
    });
    (lines, details)
}

/// A table of the file: its entries, its place and what it is called in messages.
pub(super) struct Table<'t> {
    pub table: &'t DeTable<'t>,
    pub span: Range<usize>,
    pub name: String,
}

/// Whether a size may be zero or negative.
#[derive(Clone, Copy, PartialEq)]
pub(super) enum Sign {
    Positive,
    Any,
}

/// Reads values out of tables and notes what is wrong with them.
pub(super) struct Reader<'a> {
    pub source: &'a Source,
    pub faults: &'a mut Faults,
}

impl<'a> Reader<'a> {
    /// Notes a fault at a byte range.
    pub fn fault(&mut self, span: Range<usize>, message: String) {
        self.faults.push(self.source.place(span.start), self.source.width(span), message);
    }

    /// Notes that a value is not what is allowed.
    pub fn wrong(&mut self, value: &Spanned<DeValue<'_>>, name: &str, allowed: &str) {
        let written = self.source.text.get(value.span()).unwrap_or(value.get_ref().type_str()).to_owned();
        self.fault(value.span(), format!("{name}: given {}; allowed is {allowed}", given(&written)));
    }

    /// Faults every key that is not allowed: a misspelt key would be an action or size that silently is not there.
    pub fn known(&mut self, table: &Table<'_>, allowed: &[&str]) {
        for key in table.table.keys().filter(|key| !allowed.contains(&key.get_ref().as_ref())) {
            let message = format!(
                "no known key of {}: given {}; allowed are {}",
                table.name,
                given(key.get_ref()),
                allowed.join(", ")
            );
            self.fault(key.span(), message);
        }
    }

    /// A table in a table.
    pub fn inner<'t>(&mut self, table: &Table<'t>, key: &str) -> Option<Table<'t>> {
        let value = table.table.get(key)?;
        let DeValue::Table(inner) = value.get_ref() else {
            self.wrong(value, key, "a table");
            return None;
        };
        Some(Table { table: inner, span: value.span(), name: key.into() })
    }

    /// A list of tables, in the order of the file.
    fn tables<'t>(&mut self, table: &Table<'t>, key: &str, written: &str) -> Vec<Table<'t>> {
        let Some(value) = table.table.get(key) else { return Vec::new() };
        let DeValue::Array(items) = value.get_ref() else {
            self.wrong(value, key, &format!("a list of tables, each under {written}"));
            return Vec::new();
        };
        let mut tables = Vec::new();
        for item in items.iter() {
            match item.get_ref() {
                DeValue::Table(inner) => tables.push(Table { table: inner, span: item.span(), name: written.into() }),
                _ => self.wrong(item, key, &format!("a list of tables, each under {written}")),
            }
        }
        tables
    }

    fn words(&mut self, value: &Spanned<DeValue<'_>>, key: &str) -> Option<Stated> {
        let Some(text) = value.get_ref().as_str() else {
            self.wrong(value, key, "text in quotes");
            return None;
        };
        match tidy(text) {
            Ok(text) if text.is_empty() => self.wrong(value, key, "text, or no such line for \"not stated\""),
            Ok(text) => {
                let (at, width) = (self.source.place(value.span().start), self.source.width(value.span()));
                return Some(Stated { text, at, width });
            }
            Err(message) => self.fault(value.span(), format!("{key}: {message}")),
        }
        None
    }

    fn stated(&mut self, table: &Table<'_>, key: &str) -> Option<Stated> {
        self.words(table.table.get(key)?, key)
    }

    /// Text, if stated.
    pub fn text(&mut self, table: &Table<'_>, key: &str) -> Option<String> {
        self.stated(table, key).map(|stated| stated.text)
    }

    /// True or false, if stated.
    pub fn truth(&mut self, table: &Table<'_>, key: &str) -> Option<bool> {
        let value = table.table.get(key)?;
        let truth = value.get_ref().as_bool();
        if truth.is_none() {
            self.wrong(value, key, "true or false");
        }
        truth
    }

    /// A finite number times `size`.
    pub fn number(&mut self, value: &Spanned<DeValue<'_>>, key: &str, size: f64, sign: Sign) -> Option<f64> {
        let number = match value.get_ref() {
            DeValue::Integer(integer) if integer.radix() == 10 => decimal(integer.as_str(), false),
            DeValue::Float(float) => decimal(float.as_str(), false),
            _ => None,
        };
        let number = number.map(|number| number * size).filter(|number| number.is_finite());
        let number = number.filter(|number| sign == Sign::Any || *number > 0.0);
        if number.is_none() {
            let allowed = if sign == Sign::Any { "a finite number" } else { "a finite number above 0" };
            self.wrong(value, key, allowed);
        }
        number
    }

    /// A length in mm, if stated.
    pub fn length(&mut self, table: &Table<'_>, key: &str, sign: Sign) -> Option<Length> {
        self.number(table.table.get(key)?, key, 1.0, sign).map(mm)
    }

    fn joint(&mut self, joint: &Table<'_>, lines: &mut Vec<Line>) {
        self.known(
            joint,
            &["mark", "supporting", "supported", "end", "detail", "span_m", "span_mm", "frame", "class", "case"],
        );
        let mut line = Line::new(self.source.place(joint.span.start));
        line.mark = self.stated(joint, "mark");
        line.supporting = self.stated(joint, "supporting");
        line.supported = self.stated(joint, "supported");
        line.end = self.stated(joint, "end");
        line.detail = self.stated(joint, "detail");
        line.span = self.span(joint);
        line.braced = self.word(joint, Word::Braced);
        line.class = self.word(joint, Word::Class);
        if let (Some(end), Some(value)) = (&line.end, joint.table.get("end"))
            && super::pairing::end(&end.text).is_none()
        {
            self.wrong(value, "end", "\"start\" or \"end\"");
        }
        if !joint.table.contains_key("mark") && !joint.table.contains_key("supported") {
            let message = "the joint is not named: neither mark nor supported is stated; allowed is one or both";
            self.fault(joint.span.clone(), message.into());
        }
        let cases = self.tables(joint, "case", "[[joint.case]]");
        if cases.is_empty() {
            lines.push(line);
            return;
        }
        for case in cases {
            let case = Some(self.case(&case));
            lines.push(Line { case, ..line.clone() });
        }
    }

    /// The span as its lines hold it.
    fn span(&mut self, joint: &Table<'_>) -> Option<Stated> {
        let keys: Vec<_> =
            [("span_m", 1e3), ("span_mm", 1.0)].into_iter().filter(|(key, _)| joint.table.contains_key(*key)).collect();
        if keys.len() > 1 {
            self.fault(joint.span.clone(), "span_m and span_mm mean the same; allowed is one of them".into());
        }
        let (key, size) = *keys.first()?;
        let value = joint.table.get(key)?;
        let text = written(mm(self.number(value, key, size, Sign::Positive)?));
        Some(Stated { text, at: self.source.place(value.span().start), width: self.source.width(value.span()) })
    }

    /// A word about the joint in its frame.
    fn word(&mut self, joint: &Table<'_>, word: Word) -> Option<Stated> {
        let stated = self.stated(joint, word.key())?;
        match word.read(&stated.text) {
            Ok(read) => Some(Stated { text: read.into(), ..stated }),
            Err(message) => {
                let span = joint.table.get(word.key()).map_or(joint.span.clone(), Spanned::span);
                self.fault(span, message);
                None
            }
        }
    }

    fn case(&mut self, table: &Table<'_>) -> LoadCase {
        let at = self.source.place(table.span.start);
        let name = self.text(table, "name").unwrap_or_else(|| UNNAMED_CASE.into());
        let mut case = LoadCase::blank(&name, at);
        let mut entries: Vec<_> = table.table.iter().filter(|(key, _)| key.get_ref() != "name").collect();
        entries.sort_by_key(|(key, _)| key.span().start);
        let mut seen = Vec::new();
        for (key, value) in entries {
            let name = key.get_ref();
            match action(name) {
                None => {
                    let given = given(name);
                    let allowed = "name, M_Ed, V_Ed and N_Ed with their units (M_Ed_kNm, V_Ed_kN, N_Ed_kN), F_tie_Ed, N_col_Ed and M_col_Ed likewise";
                    let message = format!("no known key of {}: given {given}; allowed are {allowed}", table.name);
                    self.fault(key.span(), message);
                }
                Some(Err(message)) => self.fault(key.span(), message),
                Some(Ok((action, _))) if seen.contains(&action) => {
                    let message = format!("{} is stated twice in one case; allowed is once", action.symbol());
                    self.fault(key.span(), message);
                }
                Some(Ok((action, size))) => {
                    seen.push(action);
                    if let Some(value) = self.number(value, name, size, Sign::Any) {
                        action.put(value, &mut case);
                    }
                }
            }
        }
        case
    }
}
