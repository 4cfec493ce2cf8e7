//! Values as they are given to a graph and as they are seen in one.

use super::Id;
use super::cell::Cell;
use super::store::Store;

/// A value by itself, to build small graphs by hand and to compare with.
#[derive(Clone, Debug, PartialEq, Default)]
pub enum Value {
    /// Not given, or derived.
    #[default]
    Absent,
    /// A string.
    Text(Box<str>),
    /// A finite real.
    Number(f64),
    /// An integer.
    Integer(i64),
    /// A BOOLEAN, or a LOGICAL that is not unknown.
    Truth(bool),
    /// An enumeration item, upper case without dots.
    Token(Box<str>),
    /// Another entity.
    Entity(Id),
    /// A list, set or array; lists of lists nest.
    List(Vec<Value>),
    /// A defined type chosen in a SELECT: `IfcLabel`, with its value.
    Typed(Box<str>, Box<Value>),
}

/// A value in a graph; the cases of [`Value`].
#[derive(Clone, Copy, Debug)]
pub enum View<'a> {
    /// Not given, or derived.
    Absent,
    /// A string.
    Text(&'a str),
    /// A finite real.
    Number(f64),
    /// An integer.
    Integer(i64),
    /// A BOOLEAN, or a LOGICAL that is not unknown.
    Truth(bool),
    /// An enumeration item, upper case without dots.
    Token(&'a str),
    /// Another entity.
    Entity(Id),
    /// A list, set or array; lists of lists nest.
    List(List<'a>),
    /// A defined type chosen in a SELECT: `IfcLabel`, with its value.
    Typed(&'a str, Inner<'a>),
}

impl<'a> View<'a> {
    /// A number, also inside a typed value.
    pub fn number(self) -> Option<f64> {
        match self {
            Self::Number(number) => Some(number),
            Self::Integer(integer) => Some(integer as f64),
            Self::Typed(_, inner) => inner.view().number(),
            _ => None,
        }
    }

    /// The items of a list.
    pub fn list(self) -> Option<List<'a>> {
        if let Self::List(list) = self { Some(list) } else { None }
    }

    /// The entity it points to.
    pub fn entity(self) -> Option<Id> {
        if let Self::Entity(id) = self { Some(id) } else { None }
    }

    /// Whether there is none.
    pub fn is_absent(self) -> bool {
        matches!(self, Self::Absent)
    }

    /// A copy that stands by itself.
    pub fn to_value(self) -> Value {
        match self {
            Self::Absent => Value::Absent,
            Self::Text(text) => Value::Text(text.into()),
            Self::Number(number) => Value::Number(number),
            Self::Integer(integer) => Value::Integer(integer),
            Self::Truth(truth) => Value::Truth(truth),
            Self::Token(token) => Value::Token(token.into()),
            Self::Entity(id) => Value::Entity(id),
            Self::List(items) => Value::List(items.iter().map(View::to_value).collect()),
            Self::Typed(name, inner) => Value::Typed(name.into(), inner.view().to_value().into()),
        }
    }
}

impl PartialEq<Value> for View<'_> {
    fn eq(&self, other: &Value) -> bool {
        self.to_value() == *other
    }
}

/// The items of a list.
#[derive(Clone, Copy)]
pub struct List<'a> {
    store: &'a Store,
    cells: &'a [Cell],
}

impl<'a> List<'a> {
    pub(super) fn new(store: &'a Store, cells: &'a [Cell]) -> Self {
        Self { store, cells }
    }

    /// How many there are.
    pub fn len(self) -> usize {
        self.cells.len()
    }

    /// Whether there are none.
    pub fn is_empty(self) -> bool {
        self.cells.is_empty()
    }

    /// One.
    pub fn get(self, index: usize) -> Option<View<'a>> {
        Some(self.store.view(*self.cells.get(index)?))
    }

    /// All in their order.
    pub fn iter(self) -> impl ExactSizeIterator<Item = View<'a>> {
        self.cells.iter().map(move |cell| self.store.view(*cell))
    }

    /// All as numbers; `None` if any item is none.
    pub fn numbers(self) -> Option<Vec<f64>> {
        self.iter().map(View::number).collect()
    }
}

impl std::fmt::Debug for List<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_list().entries(self.iter()).finish()
    }
}

/// What a defined type holds.
#[derive(Clone, Copy)]
pub struct Inner<'a> {
    store: &'a Store,
    cell: Cell,
}

impl<'a> Inner<'a> {
    pub(super) fn new(store: &'a Store, cell: Cell) -> Self {
        Self { store, cell }
    }

    /// The value.
    pub fn view(self) -> View<'a> {
        self.store.view(self.cell)
    }
}

impl std::fmt::Debug for Inner<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        self.view().fmt(f)
    }
}
