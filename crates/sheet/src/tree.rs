//! The tree: systems, rows, bars, cells and parts as index ranges in flat lists.
//!
//! A part takes eight bytes, a cell four, a bar twelve; nothing inside a system owns memory of its
//! own. Offsets in a system count from its first byte, so that a system that an edit only moved is
//! the same system.

use std::ops::Range;

use crate::chars::blank_at;
use crate::lines::RowKind;
use crate::{Problem, Span};

/// What a part is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(u8)]
pub(crate) enum PartKind {
    /// A pitch, struck.
    Note,
    /// A note whose octave figure nothing tells: its `step` is the letter alone.
    Unplaced,
    /// `-`
    Hold,
    /// `_`
    Rest,
    /// `?`
    Unwritten,
    /// Unreadable; a problem tells why, here or at the part that spoilt it.
    Spoilt,
    /// `=S`: its `step` is the octaves by which the copy is moved.
    Copy,
    /// A syllable, a chord or a stack of figures: read again from the text when it is lowered.
    Text,
    /// `D:` in front of a chord. It takes no share of its cell.
    Key,
}

const KINDS: [PartKind; 9] = [
    PartKind::Note,
    PartKind::Unplaced,
    PartKind::Hold,
    PartKind::Rest,
    PartKind::Unwritten,
    PartKind::Spoilt,
    PartKind::Copy,
    PartKind::Text,
    PartKind::Key,
];

/// A fermata stands on the part.
pub(crate) const FERMATA: u8 = 1;
/// A breath follows the part.
pub(crate) const BREATH: u8 = 2;
/// Footnote marks stand on the part.
pub(crate) const MARKED: u8 = 4;
/// The part fills a bar if it is alone in it, though it could not be read.
pub(crate) const THROUGHOUT: u8 = 8;
/// The octave figure was forgotten after a copied bar.
pub(crate) const AFTER_COPY: u8 = 16;

/// One part of a cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Part {
    /// Where it begins; where it ends is read off the text.
    pub(crate) start: u32,
    /// Letter position of a note; see [`PartKind`].
    pub(crate) step: i16,
    /// Kind in the low four bits, sign plus two in the high four.
    what: u8,
    /// Marks and hints.
    pub(crate) flags: u8,
}

impl Part {
    /// A part of that kind.
    pub(crate) fn new(start: usize, kind: PartKind, step: i16, sign: i8, flags: u8) -> Part {
        Part {
            start: u32::try_from(start).unwrap_or(u32::MAX),
            step,
            what: kind as u8 | (sign + 2).unsigned_abs() << 4,
            flags,
        }
    }

    /// What it is.
    pub(crate) fn kind(self) -> PartKind {
        let index = usize::from(self.what & 15);
        KINDS.get(index).copied().unwrap_or(PartKind::Spoilt)
    }

    /// Semitones its sign adds.
    pub(crate) fn sign(self) -> i8 {
        (self.what >> 4) as i8 - 2
    }
}

/// A section closes with the bar: `||`.
pub(crate) const DOUBLE: u8 = 1;
/// The row ended before the bar's line.
pub(crate) const OPEN: u8 = 2;
/// The bar is a copy of another voice's.
pub(crate) const COPIED: u8 = 4;

/// A bar of one row.
#[derive(Clone, Copy, Debug)]
pub(crate) struct RowBar {
    /// Its first cell; those up to the next bar's are its own.
    pub(crate) cells: u32,
    /// Where its closing bar line begins; the last part if there is none.
    pub(crate) line: u32,
    /// [`DOUBLE`], [`OPEN`], [`COPIED`].
    pub(crate) flags: u8,
}

/// A row of a system.
#[derive(Clone, Debug)]
pub(crate) struct Row {
    /// What it holds.
    pub(crate) kind: RowKind,
    /// Where its line begins and ends.
    pub(crate) line: Span,
    /// Its first word: the label of a music row.
    pub(crate) label: Span,
    /// Its first bar line.
    pub(crate) opening: Span,
    /// Its bars.
    pub(crate) bars: Range<u32>,
}

/// A problem of a part, with what it concerns.
#[derive(Clone, Debug)]
pub(crate) struct Slip {
    /// The part it stands at; parts come in the order of the text.
    pub(crate) part: u32,
    /// What is wrong, its spans counted from the start of the system.
    pub(crate) problem: Problem,
}

/// A system, read on its own.
#[derive(Clone, Debug)]
pub(crate) struct System {
    pub(crate) rows: Box<[Row]>,
    /// One more than there are: the last tells where the cells end.
    pub(crate) bars: Box<[RowBar]>,
    /// The first part of each cell, and the number of parts.
    pub(crate) cells: Box<[u32]>,
    pub(crate) parts: Box<[Part]>,
    /// In the order of their parts.
    pub(crate) slips: Box<[Slip]>,
}

/// A system while it is read: one for all systems of a sheet, so that its lists have room already.
#[derive(Debug, Default)]
pub(crate) struct Draft {
    pub(crate) rows: Vec<Row>,
    pub(crate) bars: Vec<RowBar>,
    pub(crate) cells: Vec<u32>,
    pub(crate) parts: Vec<Part>,
    pub(crate) slips: Vec<Slip>,
}

impl Draft {
    /// The system it has become; the draft is empty again.
    pub(crate) fn finish(&mut self) -> System {
        let count = |n: usize| u32::try_from(n).unwrap_or(u32::MAX);
        self.bars.push(RowBar {
            cells: count(self.cells.len()),
            line: 0,
            flags: 0,
        });
        self.cells.push(count(self.parts.len()));
        self.slips.sort_by_key(|slip| slip.part);
        let system = System {
            rows: self.rows.drain(..).collect(),
            bars: self.bars.as_slice().into(),
            cells: self.cells.as_slice().into(),
            parts: self.parts.as_slice().into(),
            slips: self.slips.drain(..).collect(),
        };
        self.bars.clear();
        self.cells.clear();
        self.parts.clear();
        system
    }
}

impl System {
    /// The cells of a bar, by index.
    pub(crate) fn cells_of(&self, bar: u32) -> Range<usize> {
        let at = |i: usize| self.bars.get(i).map_or(0, |b| b.cells as usize);
        let bar = bar as usize;
        at(bar)..at(bar + 1).max(at(bar))
    }

    /// The parts of a cell, by index.
    pub(crate) fn parts_of(&self, cell: usize) -> Range<usize> {
        let at = |i: usize| self.cells.get(i).map_or(0, |&p| p as usize);
        at(cell)..at(cell + 1).max(at(cell))
    }

    /// Bytes of memory it takes.
    pub(crate) fn bytes(&self) -> usize {
        size_of::<System>()
            + size_of_val(&*self.rows)
            + size_of_val(&*self.bars)
            + size_of_val(&*self.cells)
            + size_of_val(&*self.parts)
            + size_of_val(&*self.slips)
    }
}

/// Whether a part of a cell ends at an offset: before a dot, a blank, a bar line or a line end.
pub(crate) fn part_ends_at(text: &[u8], at: usize) -> bool {
    match text.get(at) {
        None | Some(b'.' | b'|' | b'\n') => true,
        Some(_) => blank_at(text, at) > 0,
    }
}

/// Where the part that begins at `start` ends, its marks included.
pub(crate) fn part_end(text: &[u8], start: usize) -> usize {
    let mut at = start;
    while !part_ends_at(text, at) {
        at += 1;
    }
    at
}

/// Where the part that begins at `start` ends without its marks.
pub(crate) fn unmarked_end(text: &[u8], start: usize) -> usize {
    let end = part_end(text, start);
    let body = text.get(start..end).unwrap_or_default();
    let marks = body.iter().skip(1).position(|b| b"^,*".contains(b));
    marks.map_or(end, |n| start + 1 + n)
}

/// Where the word that begins at `start` ends: at a blank, a bar line or a line end, a backslash
/// making the next character plain.
pub(crate) fn syllable_end(text: &[u8], start: usize) -> usize {
    let mut at = start;
    loop {
        match text.get(at) {
            None | Some(b'|' | b'\n') => return at,
            Some(b'\\') if !matches!(text.get(at + 1), None | Some(b'\n' | b'\r')) => {
                at += 2;
                while text.get(at).is_some_and(|b| b & 0xc0 == 0x80) {
                    at += 1;
                }
            }
            Some(_) if blank_at(text, at) > 0 => return at,
            Some(_) => at += 1,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_tree_is_small() {
        assert_eq!(size_of::<Part>(), 8);
        assert_eq!(size_of::<RowBar>(), 12);
    }

    #[test]
    fn parts_keep_kind_and_sign() {
        for (index, kind) in KINDS.into_iter().enumerate() {
            assert_eq!(kind as usize, index);
            for sign in -2..=2 {
                let part = Part::new(7, kind, -3, sign, FERMATA);
                assert_eq!((part.kind(), part.sign(), part.step), (kind, sign, -3));
            }
        }
    }
}
