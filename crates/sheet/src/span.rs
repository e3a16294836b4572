//! Places in the text.

use std::ops::Range;

/// A run of bytes in the text of a sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Span {
    /// First byte.
    pub start: u32,
    /// One past the last byte.
    pub end: u32,
}

impl Span {
    /// The span of those bytes. A sheet is at most 8 MiB: larger offsets do not occur.
    #[must_use]
    pub fn new(start: usize, end: usize) -> Span {
        let small = |n| u32::try_from(n).unwrap_or(u32::MAX);
        Span {
            start: small(start),
            end: small(end),
        }
    }

    /// The same as a range for slicing.
    #[must_use]
    pub fn range(self) -> Range<usize> {
        self.start as usize..self.end as usize
    }

    /// The span moved on by a number of bytes.
    #[must_use]
    pub fn moved(self, by: u32) -> Span {
        Span {
            start: self.start + by,
            end: self.end + by,
        }
    }

    /// Its first byte alone: a place in ASCII text, such as a bar line.
    #[must_use]
    pub(crate) fn first(self) -> Span {
        Span {
            start: self.start,
            end: self.start + 1,
        }
    }
}
