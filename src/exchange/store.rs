//! The values of a graph: their cells, and what has no room in these.

use std::collections::HashMap;

use rayon::prelude::*;

use super::Id;
use super::cell::{Case, Cell};
use super::schema::{Schema, TypeId};
use super::value::{Inner, List, Value, View};

/// So many cells are settled by one thread in a go.
const GO: usize = 1 << 15;

/// Where the values of another store are that was taken over.
pub(super) struct Moved {
    cells: usize,
    text: usize,
    /// The numbers of the types that the schema does not know.
    types: Vec<TypeId>,
}

/// All values.
#[derive(Debug)]
pub(super) struct Store {
    schema: &'static Schema,
    cells: Vec<Cell>,
    text: String,
    /// What has no room in a cell: integers and lengths.
    wide: Vec<u64>,
    /// Names of types that the schema does not know; their numbers follow the schema's.
    strangers: Vec<Box<str>>,
    stranger_ids: HashMap<Box<str>, TypeId>,
}

impl Store {
    pub fn new(schema: &'static Schema) -> Self {
        Self {
            schema,
            cells: Vec::new(),
            text: String::new(),
            wide: Vec::new(),
            strangers: Vec::new(),
            stranger_ids: HashMap::new(),
        }
    }

    pub fn number(&mut self, number: f64) -> Cell {
        Cell::real(number).unwrap_or_else(|| self.wide(Case::WideNumber, &[number.to_bits()]))
    }

    pub fn integer(&mut self, integer: i64) -> Cell {
        match i32::try_from(integer) {
            Ok(small) => Cell::of(Case::Integer, 0, small as u32),
            Err(_) => self.wide(Case::WideInteger, &[integer as u64]),
        }
    }

    pub fn text(&mut self, text: &str) -> Cell {
        self.letters(text, Case::Text, Case::WideText)
    }

    /// An enumeration item, which comes in upper case.
    pub fn token(&mut self, token: &str) -> Cell {
        self.letters(token, Case::Token, Case::WideToken)
    }

    pub fn list(&mut self, items: &[Cell]) -> Cell {
        let start = self.cells.len();
        self.cells.extend_from_slice(items);
        self.listed(start)
    }

    /// The list of all cells from there on.
    pub fn listed(&mut self, start: usize) -> Cell {
        self.range(start, self.cells.len() - start, Case::List, Case::WideList)
    }

    /// Where the next cell will stand.
    pub fn next(&self) -> usize {
        self.cells.len()
    }

    /// Adds a cell to the list that is being made.
    pub fn push(&mut self, cell: Cell) {
        self.cells.push(cell);
    }

    /// Takes back the cells from there on.
    pub fn take_back(&mut self, start: usize) {
        self.cells.truncate(start);
    }

    pub fn typed(&mut self, name: TypeId, value: Cell) -> Cell {
        let index = self.cells.len() as u32;
        self.cells.push(value);
        Cell::of(Case::Typed, name, index)
    }

    /// The number of a type, also of one that the schema does not know.
    pub fn type_id(&mut self, name: &str) -> TypeId {
        if let Some(known) = self.schema.find_type(name).map(|(id, _)| id).or(self.stranger_ids.get(name).copied()) {
            return known;
        }
        let Ok(id) = TypeId::try_from(self.schema.types() + self.strangers.len()) else {
            return TypeId::MAX; // beyond 64 thousand unknown types the last one stands for the rest
        };
        self.strangers.push(name.into());
        self.stranger_ids.insert(name.into(), id);
        id
    }

    /// Room for the attributes of one entity, absent at first; where it starts.
    pub fn room(&mut self, attributes: usize) -> u32 {
        let start = self.cells.len();
        self.cells.resize(start + attributes, Cell::ABSENT);
        start as u32
    }

    pub fn cells(&self, start: usize, length: usize) -> &[Cell] {
        self.cells.get(start..start + length).unwrap_or_default()
    }

    pub fn cell(&self, at: usize) -> Option<&Cell> {
        self.cells.get(at)
    }

    pub fn cell_mut(&mut self, at: usize) -> Option<&mut Cell> {
        self.cells.get_mut(at)
    }

    #[inline]
    pub fn view(&self, cell: Cell) -> View<'_> {
        let Some(case) = cell.case() else { return cell.to_real().map_or(View::Absent, View::Number) };
        match case {
            Case::Absent => View::Absent,
            Case::Truth => View::Truth(cell.index() != 0),
            Case::Entity => View::Entity(Id(cell.index())),
            Case::Integer => View::Integer(i64::from(cell.index() as i32)),
            Case::WideInteger => View::Integer(self.out(cell, 0) as i64),
            Case::WideNumber => View::Number(f64::from_bits(self.out(cell, 0))),
            Case::Text | Case::WideText => View::Text(self.letters_of(cell)),
            Case::Token | Case::WideToken => View::Token(self.letters_of(cell)),
            Case::List | Case::WideList => View::List(List::new(self, self.items(cell))),
            Case::Typed => {
                let inner = self.cells.get(cell.index() as usize).copied().unwrap_or(Cell::ABSENT);
                View::Typed(self.type_name(cell.length() as TypeId), Inner::new(self, inner))
            }
        }
    }

    /// The items of a list.
    pub fn items(&self, cell: Cell) -> &[Cell] {
        let (start, length) = self.range_of(cell, Case::WideList);
        self.cells.get(start..start + length).unwrap_or_default()
    }

    /// The items of a list, or the one value that is none; out of their types, if any.
    pub fn flat<'a>(&'a self, mut cell: &'a Cell) -> &'a [Cell] {
        while let (Some(Case::Typed), Some(inner)) = (cell.case(), self.cells.get(cell.index() as usize)) {
            cell = inner;
        }
        if cell.is_list() { self.items(*cell) } else { std::slice::from_ref(cell) }
    }

    /// The parts of a list, each of that many items (at least one) and in its place.
    pub fn parts(&mut self, list: Cell, of: usize) -> Vec<Cell> {
        let (start, length) = self.range_of(list, Case::WideList);
        let part = |at| self.range(start + at, of.min(length - at), Case::List, Case::WideList);
        (0..length).step_by(of.max(1)).map(part).collect()
    }

    /// Puts a value that stands by itself.
    pub fn put(&mut self, value: &Value) -> Cell {
        match value {
            Value::Absent => Cell::ABSENT,
            Value::Text(text) => self.text(text),
            Value::Number(number) => self.number(*number),
            Value::Integer(integer) => self.integer(*integer),
            Value::Truth(truth) => Cell::truth(*truth),
            Value::Token(token) => self.token(token),
            Value::Entity(id) => Cell::entity(*id),
            Value::List(items) => {
                let cells: Vec<Cell> = items.iter().map(|item| self.put(item)).collect();
                self.list(&cells)
            }
            Value::Typed(name, inner) => {
                let (name, inner) = (self.type_id(name), self.put(inner));
                self.typed(name, inner)
            }
        }
    }

    /// All entities that a value points to, in lists and types too.
    pub fn each_entity(&self, cell: Cell, with: &mut impl FnMut(Id)) {
        match cell.case() {
            Some(Case::Entity) => with(Id(cell.index())),
            Some(Case::List | Case::WideList) => self.items(cell).iter().for_each(|item| self.each_entity(*item, with)),
            Some(Case::Typed) => {
                self.cells.get(cell.index() as usize).iter().for_each(|inner| self.each_entity(**inner, with));
            }
            _ => {}
        }
    }

    /// Replaces waiting references by their targets; whether some have none, which are left as they are.
    pub fn settle(&mut self, target: impl Fn(Id) -> Option<Id> + Sync) -> bool {
        let settle = |cells: &mut [Cell]| cells.iter_mut().fold(false, |missing, cell| missing | !cell.settle(&target));
        self.cells.par_chunks_mut(GO).map(settle).reduce(|| false, |a, b| a | b)
    }

    /// Makes the references absent that still wait, or takes them out of the list they stand in.
    pub fn drop_waiting(&mut self) {
        for cell in &mut self.cells {
            cell.drop_waiting();
        }
        for at in 0..self.cells.len() {
            let list = self.cells[at];
            if list.is_list() {
                self.cells[at] = self.without_gaps(list);
            }
        }
    }

    /// Takes over all values of another store, whose references become what `id` makes of them; where they are then.
    pub fn absorb(&mut self, other: &Self, id: &impl Fn(Id) -> Id) -> Moved {
        let types = other.strangers.iter().map(|name| self.type_id(name)).collect();
        let moved = Moved { cells: self.cells.len(), text: self.text.len(), types };
        self.text.reserve_exact(other.text.len());
        self.text.push_str(&other.text);
        self.cells.reserve_exact(other.cells.len());
        for cell in &other.cells {
            let cell = self.moved(other, *cell, &moved, id);
            self.cells.push(cell);
        }
        moved
    }

    /// A cell of a store that was taken over.
    pub fn moved(&mut self, other: &Self, cell: Cell, to: &Moved, id: &impl Fn(Id) -> Id) -> Cell {
        use Case::*;
        let Some(case) = cell.case() else { return cell };
        let range = |wide| other.range_of(cell, wide);
        match case {
            Absent | Truth | Integer => cell,
            Entity => Cell::entity(id(Id(cell.index()))),
            WideInteger | WideNumber => self.wide(case, &[other.out(cell, 0)]),
            Text | WideText => {
                let (start, length) = range(WideText);
                self.range(to.text + start, length, Text, WideText)
            }
            Token | WideToken => {
                let (start, length) = range(WideToken);
                self.range(to.text + start, length, Token, WideToken)
            }
            List | WideList => {
                let (start, length) = range(WideList);
                self.range(to.cells + start, length, List, WideList)
            }
            Typed => {
                let name = cell.length().checked_sub(self.schema.types()).and_then(|name| to.types.get(name));
                Cell::of(Typed, name.map_or(cell.length() as TypeId, |name| *name), cell.index() + to.cells as u32)
            }
        }
    }

    /// The list without what has become absent.
    pub fn without_gaps(&mut self, list: Cell) -> Cell {
        let (start, length) = self.range_of(list, Case::WideList);
        if !self.items(list).iter().any(|item| item.is_absent()) {
            return list;
        }
        let mut left = start;
        for at in start..start + length {
            if !self.cells[at].is_absent() {
                self.cells[left] = self.cells[at];
                left += 1;
            }
        }
        self.range(start, left - start, Case::List, Case::WideList)
    }

    fn letters(&mut self, text: &str, short: Case, long: Case) -> Cell {
        let start = self.text.len();
        self.text.push_str(text);
        self.range(start, text.len(), short, long)
    }

    fn letters_of(&self, cell: Cell) -> &str {
        let wide = if cell.case() == Some(Case::WideText) { Case::WideText } else { Case::WideToken };
        let (start, length) = self.range_of(cell, wide);
        self.text.get(start..start + length).unwrap_or_default()
    }

    fn range(&mut self, start: usize, length: usize, short: Case, long: Case) -> Cell {
        match (u16::try_from(length), u32::try_from(start)) {
            (Ok(length), Ok(start)) => Cell::of(short, length, start),
            _ => self.wide(long, &[start as u64, length as u64]),
        }
    }

    fn range_of(&self, cell: Cell, wide: Case) -> (usize, usize) {
        match cell.case() {
            Some(case) if case == wide => (self.out(cell, 0) as usize, self.out(cell, 1) as usize),
            _ => (cell.index() as usize, cell.length()),
        }
    }

    fn wide(&mut self, case: Case, what: &[u64]) -> Cell {
        let index = self.wide.len() as u32;
        self.wide.extend_from_slice(what);
        Cell::of(case, 0, index)
    }

    fn out(&self, cell: Cell, offset: usize) -> u64 {
        self.wide.get(cell.index() as usize + offset).copied().unwrap_or_default()
    }

    fn type_name(&self, id: TypeId) -> &str {
        match self.schema.type_name(id) {
            Some(name) => name,
            None => usize::from(id)
                .checked_sub(self.schema.types())
                .and_then(|index| self.strangers.get(index))
                .map_or("", |name| name),
        }
    }
}
