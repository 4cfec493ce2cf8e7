//! A schedule as CSV: one line a joint and load case.

use super::actions::{Action, action, decimal};
use super::csv_cells::{Cell, Records};
use super::fault::Faults;
use super::frame::{Word, span};
use super::gather::{Line, Stated, written};
use super::source::{Source, given, tidy};
use super::{LoadCase, MAX_JOINTS};
use crate::origin::Place;
use crate::units::mm;

/// What a column holds.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Column {
    Mark,
    Supporting,
    Supported,
    End,
    Case,
    Detail,
    /// A word about the joint in its frame.
    Frame(Word),
    /// The span of the supported member; its unit's size in mm.
    Span(f64),
    /// An action; its unit's size in N·mm or N.
    Action(Action, f64),
    /// Remarks.
    Ignored,
    /// No heading: its cells must be blank.
    Blank,
    /// Its heading was not understood.
    Faulty,
}

/// Folded headings of the columns without a unit.
const HEADINGS: &[(Column, &[&str])] = &[
    (Column::Mark, &["joint", "jointmark", "mark"]),
    (
        Column::Supporting,
        &["supporting", "supportingmark", "supportingmember", "supportingmembermark", "supportingglobalid"],
    ),
    (Column::Supported, &["supported", "supportedmark", "supportedmember", "supportedmembermark", "supportedglobalid"]),
    (Column::End, &["end", "memberend", "supportedend", "supportedmemberend"]),
    (Column::Case, &["case", "loadcase", "combination", "loadcombination"]),
    (Column::Detail, &["detail", "detailtype", "intendeddetail"]),
    (Column::Frame(Word::Braced), &["frame", "bracing", "framebracing"]),
    (Column::Frame(Word::Class), &["class", "jointclass", "assumedclass", "assumedas"]),
];

/// What the reader is told when a heading is not known.
const KNOWN: &str = "joint, supporting, supported, end, case, M_Ed, V_Ed and N_Ed with their units (M_Ed_kNm, V_Ed_kN, \
                     N_Ed_kN), F_tie_Ed, N_col_Ed and M_col_Ed likewise, detail, span_m, frame, class, and remarks (a heading that starts with note, remark or comment)";

/// Reads the lines of a schedule.
pub(super) fn lines(source: &Source, faults: &mut Faults) -> Vec<Line> {
    let heading = source.text.trim_start_matches('\n').lines().next().unwrap_or("");
    let separator = separator(heading);
    let mut records = Records::new(source, separator);
    let Some(headings) = records.next(faults) else { return Vec::new() };
    let before = faults.len();
    let columns = columns(&headings, source, faults);
    let mut table = Table { source, headings, columns, commas: separator != b',', mark: None, faults };
    let headings_stand = table.faults.len() == before;
    let mut lines = Vec::new();
    while let Some(cells) = records.next(table.faults) {
        if cells.iter().all(|cell| cell.value.trim().is_empty()) {
            continue;
        }
        if lines.len() == MAX_JOINTS {
            let at = source.place(cells.first().map_or(0, |cell| cell.range.start));
            table.faults.push(at, 1, format!("the schedule has more lines; allowed are {MAX_JOINTS}"));
            break;
        }
        if let Some(line) = table.line(&cells, headings_stand) {
            lines.push(line);
        }
    }
    lines
}

/// The separator that the heading line uses outside quotes: a tab or semicolon wins, since headings hold commas too.
fn separator(heading: &str) -> u8 {
    let plain: String = heading.split('"').step_by(2).collect();
    [b'\t', b';'].into_iter().find(|b| plain.as_bytes().contains(b)).unwrap_or(b',')
}

/// What each column holds.
fn columns(headings: &[Cell], source: &Source, faults: &mut Faults) -> Vec<Column> {
    let mut columns: Vec<Column> = Vec::new();
    for cell in headings {
        let folded: String = cell.value.chars().filter(|c| c.is_alphanumeric()).collect::<String>().to_lowercase();
        let plain = HEADINGS.iter().find(|(_, names)| names.contains(&folded.as_str()));
        let ignored = ["note", "remark", "comment"].iter().any(|word| folded.starts_with(word));
        let mut faulty = |message: String| {
            faults.push(source.place(cell.range.start), source.width(cell.range.clone()), message);
            Column::Faulty
        };
        let column = match (plain, action(&cell.value)) {
            _ if cell.value.trim().is_empty() => Column::Blank,
            _ if ignored => Column::Ignored,
            (Some((column, _)), _) => *column,
            (None, Some(Ok((action, size)))) => Column::Action(action, size),
            (None, Some(Err(message))) => faulty(message),
            (None, None) => match span(&cell.value) {
                Some(Ok(size)) => Column::Span(size),
                Some(Err(message)) => faulty(message),
                None => faulty(format!("no known column: given {}; allowed are {KNOWN}", given(&cell.value))),
            },
        };
        let twice = |other: &Column| match (column, *other) {
            (Column::Action(a, _), Column::Action(b, _)) => a == b,
            (Column::Span(_), Column::Span(_)) => true,
            (Column::Ignored | Column::Blank | Column::Faulty, _) => false,
            (a, b) => a == b,
        };
        let first = columns.iter().position(twice).and_then(|index| headings.get(index));
        columns.push(match first {
            Some(first) => {
                let (other, this) = (given(&first.value), given(&cell.value));
                faulty(format!("{this} and {other} mean the same; allowed is one column of each"))
            }
            None => column,
        });
    }
    if !columns.iter().any(|column| matches!(column, Column::Mark | Column::Supported | Column::Faulty)) {
        let at = source.place(headings.first().map_or(0, |cell| cell.range.start));
        faults.push(at, 1, "no column names the joints: neither joint (its mark) nor supported (its member)".into());
    }
    columns
}

/// What a line is read with.
struct Table<'a> {
    source: &'a Source,
    headings: Vec<Cell>,
    columns: Vec<Column>,
    /// Whether a decimal comma is allowed: the separator is no comma.
    commas: bool,
    /// The first decimal mark of the file and where it stands.
    mark: Option<(char, Place)>,
    faults: &'a mut Faults,
}

impl Table<'_> {
    /// One line; `None` if it is faulty. Without sound headings only the cells are looked at.
    fn line(&mut self, cells: &[Cell], headings_stand: bool) -> Option<Line> {
        let at = self.source.place(cells.first()?.range.start);
        let (found, asked) = (cells.len(), self.columns.len());
        if found != asked {
            // One separator too few or too many moves values under wrong headings, so nothing of the line is taken.
            let hint = if self.commas { "" } else { " (a decimal comma needs semicolons or tabs between the cells)" };
            let message = format!("this line has {found} cells, the heading line {asked}; allowed are {asked}{hint}");
            self.faults.push(at, self.source.width(self.source.row(cells.first()?.range.start)), message);
            return None;
        }
        let before = self.faults.len();
        let mut line = Line::new(at.clone());
        let mut name = None;
        let mut stated = false;
        let mut case = LoadCase::blank(super::UNNAMED_CASE, at.clone());
        for (index, cell) in cells.iter().enumerate() {
            if cell.value.trim().is_empty() {
                continue;
            }
            match *self.columns.get(index)? {
                Column::Mark => line.mark = self.text(index, cell),
                Column::Supporting => line.supporting = self.text(index, cell),
                Column::Supported => line.supported = self.text(index, cell),
                Column::End => line.end = self.end(index, cell),
                Column::Detail => line.detail = self.text(index, cell),
                Column::Case => name = self.text(index, cell),
                Column::Frame(word) => {
                    let stated = self.word(word, index, cell);
                    match word {
                        Word::Braced => line.braced = stated,
                        Word::Class => line.class = stated,
                    }
                }
                Column::Span(size) => {
                    let number = self.number("span", size, cell);
                    if number.is_some_and(|span| !(span > 0.0)) {
                        let message =
                            format!("span: given {}; allowed is a number above 0, or blank", given(&cell.value));
                        self.fault(cell, message);
                    }
                    line.span =
                        number.and_then(|span| Some(Stated { text: written(mm(span)), ..self.text(index, cell)? }));
                }
                Column::Action(action, size) => {
                    if let Some(value) = self.number(action.symbol(), size, cell) {
                        action.put(value, &mut case);
                        stated = true;
                    }
                }
                Column::Blank => self.fault(cell, format!("given {} under no heading", given(&cell.value))),
                Column::Ignored | Column::Faulty => {}
            }
        }
        if headings_stand && self.faults.len() == before && line.mark.is_none() && line.supported.is_none() {
            let message = "the line names no joint: neither the joint's mark nor the supported member is stated";
            self.faults.push(at, self.source.width(self.source.row(cells.first()?.range.start)), message.into());
        }
        stated |= name.is_some();
        if let Some(name) = name {
            case.name = name.text;
        }
        line.case = stated.then_some(case);
        (self.faults.len() == before).then_some(line)
    }

    fn fault(&mut self, cell: &Cell, message: String) {
        self.faults.push(self.source.place(cell.range.start), self.source.width(cell.range.clone()), message);
    }

    fn heading(&self, index: usize) -> String {
        self.headings.get(index).map_or(String::new(), |cell| tidy(&cell.value).unwrap_or_default())
    }

    fn text(&mut self, index: usize, cell: &Cell) -> Option<Stated> {
        match tidy(&cell.value) {
            Ok(text) => {
                let width = self.source.width(cell.range.clone());
                Some(Stated { text, at: self.source.place(cell.range.start), width })
            }
            Err(message) => {
                let heading = self.heading(index);
                self.fault(cell, format!("{heading}: {message}"));
                None
            }
        }
    }

    fn end(&mut self, index: usize, cell: &Cell) -> Option<Stated> {
        let end = self.text(index, cell)?;
        if super::pairing::end(&end.text).is_none() {
            let (heading, given) = (self.heading(index), given(&end.text));
            self.fault(cell, format!("{heading}: given {given}; allowed are start, end or blank"));
            return None;
        }
        Some(end)
    }

    /// A word about the joint in its frame.
    fn word(&mut self, word: Word, index: usize, cell: &Cell) -> Option<Stated> {
        let stated = self.text(index, cell)?;
        match word.read(&stated.text) {
            Ok(read) => Some(Stated { text: read.into(), ..stated }),
            Err(message) => {
                self.fault(cell, message + ", or blank");
                None
            }
        }
    }

    /// A number in N·mm, N or mm.
    fn number(&mut self, symbol: &str, size: f64, cell: &Cell) -> Option<f64> {
        let text = cell.value.trim();
        let value = decimal(text, self.commas).map(|value| value * size).filter(|value| value.is_finite());
        let Some(value) = value else {
            let example = if self.commas { "-185.5 or -185,5" } else { "-185.5" };
            let given = given(text);
            let message = format!("{symbol}: given {given}; allowed is a finite number such as {example}, or blank");
            self.fault(cell, message);
            return None;
        };
        // "1,234" beside "12.5" may mean a thousand; one file has one decimal mark.
        if let Some(mark) = text.chars().find(|c| matches!(c, '.' | ',')) {
            let at = self.source.place(cell.range.start);
            let (first, place) = self.mark.get_or_insert((mark, at));
            if *first != mark {
                let given = given(text);
                let message = format!("{symbol}: given {given}; allowed is the decimal mark '{first}' as in {place}");
                self.fault(cell, message);
                return None;
            }
        }
        Some(value)
    }
}
