//! How much of a file is read. What lies beyond is refused in one sentence or left out with a problem; it is never read
//! in part without a word.

use super::problems::Spot;

/// Limits of one reading, each with what is said beyond it. The defaults are far above what a shop model needs; they
/// can be lowered, not raised, because memory and stack are what they guard.
///
/// A line has no limit of its own: a whole file on one line is read as any other.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Limits {
    /// Bytes of a file (4 GiB): the graph counts in 32 bits.
    pub file: u64,
    /// Bytes to which the model in an archive inflates (1 GiB), because all of it lies in memory.
    pub inflated: u64,
    /// Entities: some ten times those of ten thousand joints.
    pub entities: usize,
    /// Elements of ifcXML within one another. Shop models stay below 200.
    pub depth: usize,
    /// Lists and typed values of STEP within one another. The schema asks for three.
    pub nesting: usize,
    /// Bytes of one record of STEP (64 MiB): the longest ones list the points of one surface.
    pub record: usize,
    /// Bytes of one string of STEP as it is written (1 MiB): a longer one has lost its closing quote.
    pub string: usize,
    /// Bytes that are worth a thread of their own (512 KiB). What is read does not depend on it.
    pub part: usize,
}

impl Default for Limits {
    fn default() -> Self {
        Self {
            file: u32::MAX as u64,
            inflated: 1 << 30,
            entities: 40_000_000,
            depth: 1000,
            nesting: 64,
            record: 1 << 26,
            string: 1 << 20,
            part: 1 << 19,
        }
    }
}

impl Limits {
    /// These, but none above the default.
    pub(super) fn lowered(self) -> Self {
        let most = Self::default();
        Self {
            file: self.file.min(most.file),
            inflated: self.inflated.min(most.inflated),
            entities: self.entities.min(most.entities),
            depth: self.depth.min(most.depth),
            nesting: self.nesting.min(most.nesting),
            record: self.record.min(most.record),
            string: self.string.min(most.string),
            part: self.part.min(most.part),
        }
    }

    /// Into how many parts so many bytes are cut, to be read at the same time.
    pub(super) fn parts(self, bytes: usize) -> usize {
        (bytes / self.part.max(1)).min(rayon::current_num_threads().clamp(2, 16)).max(1)
    }

    /// Why a file is not read.
    pub(super) fn file_too_large(self, given: usize) -> String {
        format!("has {given} bytes, {} are allowed", self.file)
    }

    /// Why an archive is not read; follows the member's name.
    pub(super) fn inflates_too_far(self, stated: u64) -> String {
        format!("inflates to {stated} bytes, {} are allowed; read it unpacked", self.inflated)
    }

    /// Why a file is not read any further.
    pub(super) fn too_many_entities(self, spot: Spot) -> String {
        let Spot { line, column } = spot;
        format!(
            "holds more entities than are read: {} are allowed, the next stands at line {line}, column {column}",
            self.entities
        )
    }

    /// Why an element is left out.
    pub(super) fn too_deep(self, name: &str) -> String {
        format!("{name} is nested deeper than {} elements and is not read", self.depth)
    }

    /// Why the rest of a record is left out; follows the record's name, as the next two do.
    pub(super) fn nested_too_far(self) -> String {
        format!("nests values deeper than {}", self.nesting)
    }

    /// See [`Limits::nested_too_far`].
    pub(super) fn record_too_long(self) -> String {
        format!("is longer than {} bytes", self.record)
    }

    /// See [`Limits::nested_too_far`].
    pub(super) fn string_not_closed(self) -> String {
        format!("holds a string that is not closed (or longer than {} bytes)", self.string)
    }
}
