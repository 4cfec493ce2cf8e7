//! The cells of a CSV file with their places.

use std::ops::Range;

use csv_core::{ReadFieldResult, Reader, ReaderBuilder};

use super::fault::Faults;
use super::source::{Source, given};

/// A cell: its value and where it is written.
#[derive(Debug)]
pub(super) struct Cell {
    pub value: String,
    pub range: Range<usize>,
}

/// The records of a file, one at a time, each cell with its place.
pub(super) struct Records<'a> {
    source: &'a Source,
    reader: Reader,
    separator: u8,
    offset: usize,
    /// Holds one cell, which may be as long as the rest of the file.
    buffer: Vec<u8>,
}

impl<'a> Records<'a> {
    /// Of a source, from its first line.
    pub fn new(source: &'a Source, separator: u8) -> Self {
        let reader = ReaderBuilder::new().delimiter(separator).build();
        Self { source, reader, separator, offset: 0, buffer: vec![0; source.text.len() + 1] }
    }

    /// The next record; blank lines are passed over.
    pub fn next(&mut self, faults: &mut Faults) -> Option<Vec<Cell>> {
        let text = &self.source.text;
        let mut cells: Vec<Cell> = Vec::new();
        loop {
            if cells.is_empty() {
                self.offset += text.get(self.offset..)?.bytes().take_while(|b| *b == b'\n').count();
            }
            let start = self.offset;
            let mut written = 0;
            let result = loop {
                let rest = text.as_bytes().get(self.offset..)?;
                let (result, read, wrote) = self.reader.read_field(rest, self.buffer.get_mut(written..)?);
                self.offset += read;
                written += wrote;
                if result != ReadFieldResult::InputEmpty {
                    break result;
                }
            };
            let ReadFieldResult::Field { record_end } = result else { return None };
            let raw = text.get(start..self.offset)?;
            let raw = raw.strip_suffix(['\n', char::from(self.separator)]).unwrap_or(raw);
            let range = start..start + raw.len();
            // The reader takes anything; a quote left open would swallow the lines below it.
            let quoted = raw.strip_prefix('"');
            let sound = quoted.is_none_or(|rest| rest.strip_suffix('"').is_some_and(|s| !unpaired(s)));
            if !sound {
                let message =
                    format!("given {}; allowed is a closing quote at the cell's end, \"\" within", given(raw));
                faults.push(self.source.place(start), self.source.width(range.clone()), message);
            }
            let value = String::from_utf8_lossy(self.buffer.get(..written)?).into_owned();
            cells.push(Cell { value, range });
            if record_end {
                return Some(cells);
            }
        }
    }
}

/// Whether a quote stands alone.
fn unpaired(inner: &str) -> bool {
    inner.replace("\"\"", "").contains('"')
}
