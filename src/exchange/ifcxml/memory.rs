//! What texts were read as before: coordinates, directions and names come again and again, and take time to read and
//! room to keep.

use super::super::cell::Cell;
use super::super::schema::{Base, Kind};

/// How many texts are remembered, a power of two; a new one takes the place of an older one.
const PLACES: usize = 1 << 12;
/// Longer texts than this hardly come twice.
const LONGEST: usize = 48;

pub(super) struct Memory<'x> {
    places: Vec<Option<(&'x [u8], Kind, Cell)>>,
}

impl<'x> Memory<'x> {
    pub fn new() -> Self {
        Self { places: vec![None; PLACES] }
    }

    /// What a text of that kind was read as, and where it is to be remembered; `None` where it is not worth it.
    pub fn recall(&self, kind: Kind, raw: &[u8]) -> (Option<Cell>, Option<usize>) {
        if raw.len() > LONGEST || matches!(kind.base, Base::Entity(_)) {
            return (None, None);
        }
        let place = place(raw);
        match self.places.get(place) {
            Some(Some((same, of, cell))) if *same == raw && *of == kind => (Some(*cell), None),
            _ => (None, Some(place)),
        }
    }

    pub fn remember(&mut self, place: usize, kind: Kind, raw: &'x [u8], cell: Cell) {
        if let Some(free) = self.places.get_mut(place) {
            *free = Some((raw, kind, cell));
        }
    }
}

fn place(raw: &[u8]) -> usize {
    let (eights, rest) = raw.as_chunks::<8>();
    let mut last = [0; 8];
    last[..rest.len()].copy_from_slice(rest);
    let mix = |hash: u64, eight: u64| (hash.rotate_left(5) ^ eight).wrapping_mul(0x9E37_79B9_7F4A_7C15);
    let hash = eights.iter().chain([&last]).fold(raw.len() as u64, |hash, eight| mix(hash, u64::from_le_bytes(*eight)));
    (hash >> 40) as usize % PLACES
}
