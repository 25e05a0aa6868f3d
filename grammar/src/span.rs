//! Places in a text.

/// A half-open range of bytes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Default)]
pub struct Span {
    /// First byte.
    pub start: u32,
    /// One past the last byte.
    pub end: u32,
}

impl Span {
    /// The range from `start` to `end`.
    pub const fn new(start: u32, end: u32) -> Self {
        Self { start, end }
    }

    /// The same range, `offset` bytes further on.
    #[must_use]
    pub const fn shifted(self, offset: u32) -> Self {
        Self { start: self.start + offset, end: self.end + offset }
    }

    /// Bytes in it.
    pub const fn len(self) -> u32 {
        self.end - self.start
    }

    /// Whether it holds no byte.
    pub const fn is_empty(self) -> bool {
        self.start == self.end
    }

    /// Its text; empty if it does not lie within `text` on character borders.
    pub fn of(self, text: &str) -> &str {
        text.get(self.start as usize..self.end as usize).unwrap_or("")
    }

    /// Whether `offset` lies in it or at its end.
    pub const fn touches(self, offset: u32) -> bool {
        self.start <= offset && offset <= self.end
    }
}

impl From<pest::Span<'_>> for Span {
    fn from(span: pest::Span<'_>) -> Self {
        Self::new(span.start() as u32, span.end() as u32)
    }
}
