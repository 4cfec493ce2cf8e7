//! The section tables.

use std::collections::BTreeMap;

use serde::Deserialize;

use super::error::RuleError;
use super::load::RuleFile;
use super::{Section, names};
use crate::units::mm;

/// How far a printed property may lie off the one computed from the row's sizes before the row is refused: a slip of
/// the pen is larger, a maker's other root radius is smaller (up to 2.2 % in W).
const SLIP: f64 = 0.03;

/// All catalogue sections by [`compact`] designation, each with its source.
#[derive(Clone, Debug, Default)]
pub(super) struct Catalogue {
    sections: BTreeMap<String, (Section, String)>,
}

/// A row as printed: sizes mm, A and A_v,z cm², W cm³.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
#[allow(non_snake_case, reason = "the standard's symbols are the headings of the file")]
struct Row {
    designation: String,
    h: f64,
    b: f64,
    t_w: f64,
    t_f: f64,
    r: f64,
    A: Option<f64>,
    W_el_y: Option<f64>,
    W_pl_y: Option<f64>,
    A_v_z: Option<f64>,
    source: String,
}

impl Catalogue {
    /// Takes up the rows of one file.
    pub fn add(&mut self, file: RuleFile<'_>) -> Result<(), RuleError> {
        let mut reader =
            csv::ReaderBuilder::new().comment(Some(b'#')).trim(csv::Trim::All).from_reader(file.text.as_bytes());
        let wrong = |at: Option<u64>, message: String| {
            let start = at.and_then(|at| usize::try_from(at).ok()).filter(|&at| file.text.is_char_boundary(at));
            let span = start.map(|start| {
                let end = file.text[start..].find('\n').map_or(file.text.len(), |length| start + length);
                start..end
            });
            RuleError::new(file.name, file.text, span, message)
        };
        let headers = reader.headers().map_err(|e| wrong(e.position().map(|p| p.byte()), e.to_string()))?.clone();
        let mut record = csv::StringRecord::new();
        loop {
            match reader.read_record(&mut record) {
                Ok(true) => {}
                Ok(false) => return Ok(()),
                Err(e) => return Err(wrong(e.position().map(csv::Position::byte), said(&e, &headers))),
            }
            let at = record.position().map(|position| position.byte());
            let row: Row = record.deserialize(Some(&headers)).map_err(|e| wrong(at, said(&e, &headers)))?;
            let section = row.section().map_err(|message| wrong(at, message))?;
            if row.source.is_empty() || row.designation.is_empty() {
                return Err(wrong(at, "a row needs a designation and a source".into()));
            }
            if self.sections.insert(compact(&row.designation), (section, row.source)).is_some() {
                return Err(wrong(at, format!("{} stands twice; once is allowed", row.designation)));
            }
        }
    }

    pub fn all(&self) -> impl Iterator<Item = &(Section, String)> {
        self.sections.values()
    }

    /// The one section whose designation a name is or holds.
    pub fn find(&self, name: &str) -> Option<&(Section, String)> {
        if let Some(exact) = self.sections.get(&compact(name)) {
            return Some(exact);
        }
        let mut found: Option<&(Section, String)> = None;
        for designation in names::designations(name) {
            let candidates = match designation.strip_prefix('?') {
                Some(bare) => vec![format!("UB {bare}"), format!("UC {bare}")],
                None => vec![designation],
            };
            // A designation that is not in the catalogue counts too: the name then holds two, or another one.
            let one = candidates.iter().find_map(|candidate| self.sections.get(&compact(candidate)))?;
            if found.is_some_and(|other| other.0.designation != one.0.designation) {
                return None;
            }
            found = Some(one);
        }
        found
    }
}

impl Row {
    fn section(&self) -> Result<Section, String> {
        let (h, b, t_w, t_f, r) = (mm(self.h), mm(self.b), mm(self.t_w), mm(self.t_f), mm(self.r));
        let section = Section::from_sizes(&self.designation, h, b, t_w, t_f, Some(r), true)?;
        for (what, printed, computed) in [
            ("A", self.A, section.area.get() / 1e2),
            ("W_el_y", self.W_el_y, section.w_el_y.get() / 1e3),
            ("W_pl_y", self.W_pl_y, section.w_pl_y.get() / 1e3),
            ("A_v_z", self.A_v_z, section.a_v_z.get() / 1e2),
        ] {
            let Some(printed) = printed else { continue };
            let near = (printed / computed - 1.0).abs() <= SLIP;
            if !near {
                return Err(format!(
                    "{}: {what} = {printed}, but the sizes give {computed:.4}; at most {} % apart is allowed",
                    self.designation,
                    SLIP * 100.0
                ));
            }
        }
        Ok(section)
    }
}

/// What is wrong with a row, by the heading of the cell where it can be told.
fn said(error: &csv::Error, headers: &csv::StringRecord) -> String {
    match error.kind() {
        csv::ErrorKind::UnequalLengths { expected_len, len, .. } => {
            format!("the row has {len} cells; {expected_len} are needed")
        }
        csv::ErrorKind::Deserialize { err, .. } => {
            let field = err.field().and_then(|field| usize::try_from(field).ok());
            let heading = field.and_then(|field| headers.get(field));
            heading.map_or_else(|| err.kind().to_string(), |heading| format!("{heading}: {}", err.kind()))
        }
        _ => error.to_string(),
    }
}

/// Upper case letters and digits only, every multiplication sign an X.
fn compact(name: &str) -> String {
    name.chars()
        .map(|c| if matches!(c, '×' | '*') { 'X' } else { c })
        .filter(|c| c.is_alphanumeric() || *c == '.')
        .flat_map(char::to_uppercase)
        .collect()
}
