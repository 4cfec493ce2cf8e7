//! The bytes of a file, of which most pieces are text: whether they are is asked once and not piece by piece.

/// A file's bytes.
#[derive(Clone, Copy)]
pub(super) struct Source<'a> {
    pub bytes: &'a [u8],
    /// The same, where all of it is UTF-8.
    text: Option<&'a str>,
}

impl<'a> Source<'a> {
    pub fn new(bytes: &'a [u8]) -> Self {
        Self { bytes, text: std::str::from_utf8(bytes).ok() }
    }

    /// Where a piece of the file stands in it; `None` for what is no piece of it.
    pub fn offset(self, piece: &[u8]) -> Option<usize> {
        let start = (piece.as_ptr() as usize).checked_sub(self.bytes.as_ptr() as usize)?;
        (start.checked_add(piece.len())? <= self.bytes.len()).then_some(start)
    }

    /// A piece as text; `None` where it is not UTF-8.
    #[inline]
    pub fn text<'b>(self, piece: &'b [u8]) -> Option<&'b str>
    where
        'a: 'b,
    {
        let known = self.text.zip(self.offset(piece)).and_then(|(text, at)| text.get(at..at + piece.len()));
        known.or_else(|| std::str::from_utf8(piece).ok())
    }
}
