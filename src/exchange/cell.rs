//! A value in eight bytes, because exchanges hold very many: a finite real is itself, everything else stands where a real
//! would be infinite or no number.

use super::Id;
use super::waiting::WAITING;

/// A value in a [`Store`](super::store::Store).
///
/// Where the exponent of a real has all its bits set, four bits tell which case it is, then 16 bits a length or type,
/// then 32 bits an index.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Cell(u64);

const EXPONENT: u64 = 0x7FF0 << 48;

/// What a cell that is no finite real is.
#[derive(Clone, Copy, PartialEq)]
pub(super) enum Case {
    Absent,
    Truth,
    Entity,
    /// Of up to 31 bits and a sign; the index.
    Integer,
    /// The index is in `wide`, as for all that follow with that word.
    WideInteger,
    /// A real that is not finite.
    WideNumber,
    Text,
    WideText,
    Token,
    WideToken,
    List,
    WideList,
    Typed,
}

impl Cell {
    pub const ABSENT: Self = Self(EXPONENT);
    pub const EMPTY_LIST: Self = Self::of(Case::List, 0, 0);

    #[inline]
    pub const fn of(case: Case, length: u16, index: u32) -> Self {
        Self(EXPONENT | (case as u64) << 48 | (length as u64) << 32 | index as u64)
    }

    #[inline]
    pub const fn entity(id: Id) -> Self {
        Self::of(Case::Entity, 0, id.0)
    }

    pub fn truth(truth: bool) -> Self {
        Self::of(Case::Truth, 0, u32::from(truth))
    }

    #[inline]
    pub fn is_absent(self) -> bool {
        self == Self::ABSENT
    }

    /// What it points to.
    #[inline]
    pub fn to_entity(self) -> Option<Id> {
        (self.case() == Some(Case::Entity)).then(|| Id(self.index()))
    }

    /// Replaces a waiting reference by its target; whether it has one.
    pub fn settle(&mut self, target: impl Fn(Id) -> Option<Id>) -> bool {
        match self.to_entity() {
            Some(id) if id.0 >= WAITING => match target(id) {
                Some(target) => *self = Self::entity(target),
                None => return false,
            },
            _ => {}
        }
        true
    }

    /// Makes it absent if it is a reference that still waits.
    pub fn drop_waiting(&mut self) {
        if self.to_entity().is_some_and(|id| id.0 >= WAITING) {
            *self = Self::ABSENT;
        }
    }

    #[inline]
    pub fn is_list(self) -> bool {
        matches!(self.case(), Some(Case::List | Case::WideList))
    }

    /// Whether it is an enumeration item or a truth.
    pub fn is_token(self) -> bool {
        matches!(self.case(), Some(Case::Token | Case::WideToken | Case::Truth))
    }

    /// `None` for a finite real, which is the cell itself.
    #[inline]
    pub fn case(self) -> Option<Case> {
        use Case::*;
        const CASES: [Case; 13] = [
            Absent,
            Truth,
            Entity,
            Integer,
            WideInteger,
            WideNumber,
            Text,
            WideText,
            Token,
            WideToken,
            List,
            WideList,
            Typed,
        ];
        if self.0 & EXPONENT != EXPONENT {
            return None;
        }
        Some(CASES.get((self.0 >> 48) as usize & 0xF).copied().unwrap_or(Absent))
    }

    /// The length or the type.
    #[inline]
    pub fn length(self) -> usize {
        (self.0 >> 32) as usize & 0xFFFF
    }

    /// Where the rest of it stands, or the value itself.
    #[inline]
    pub fn index(self) -> u32 {
        self.0 as u32
    }

    /// A real that is finite; others have no room.
    #[inline]
    pub fn real(number: f64) -> Option<Self> {
        number.is_finite().then(|| Self(number.to_bits()))
    }

    /// The real that it is, if it is one.
    #[inline]
    pub fn to_real(self) -> Option<f64> {
        self.case().is_none().then(|| f64::from_bits(self.0))
    }
}
