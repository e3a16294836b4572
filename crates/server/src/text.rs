//! A document's text, its lines, and places in it as editors count them.

use std::fmt;
use std::ops::Range;
use std::sync::OnceLock;

/// What a column counts.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(crate) enum Columns {
    /// Bytes of UTF-8.
    Utf8,
    /// Code units of UTF-16.
    #[default]
    Utf16,
}

/// A place in a text; both figures from 0.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Place {
    /// The line.
    pub(crate) line: usize,
    /// The column.
    pub(crate) column: usize,
}

/// Why a place or a range is none in this text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum BadPlace {
    /// The text has fewer lines.
    NoSuchLine(Place),
    /// It falls inside a character.
    InsideCharacter(Place),
    /// The end stands before the start.
    Reversed(Place, Place),
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "line {}, column {}", self.line, self.column)
    }
}

impl fmt::Display for BadPlace {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            BadPlace::NoSuchLine(place) => write!(f, "{place} lies past the end of the text"),
            BadPlace::InsideCharacter(place) => write!(f, "{place} lies inside a character"),
            BadPlace::Reversed(start, end) => {
                write!(f, "the range from {start} ends before, at {end}")
            }
        }
    }
}

/// Lines up to this many bytes are simply walked through; a longer one uses the table of units.
const SHORT: usize = 1 << 12;
/// Bytes between two entries of the table of units.
const STRIDE: usize = 1 << 10;

/// A text with its lines, which end with `\n`, `\r\n` or `\r` (LSP 3.17, "Text Documents").
#[derive(Clone, Debug)]
pub(crate) struct Text {
    string: String,
    /// Where lines begin; the first is 0.
    starts: Vec<usize>,
    /// UTF-16 code units before every [`STRIDE`]th byte; made when a long line asks for it.
    units: OnceLock<Vec<usize>>,
}

impl Text {
    /// A text.
    pub(crate) fn new(string: String) -> Text {
        let mut starts = vec![0];
        find_starts(string.as_bytes(), 0..string.len(), &mut starts);
        Text {
            string,
            starts,
            units: OnceLock::new(),
        }
    }

    /// All of it.
    pub(crate) fn as_str(&self) -> &str {
        &self.string
    }

    /// The bytes of a line without its end; empty past the last line.
    pub(crate) fn line(&self, line: usize) -> Range<usize> {
        let len = self.string.len();
        let start = self.starts.get(line).copied().unwrap_or(len);
        let end = self.starts.get(line + 1).copied().unwrap_or(len);
        let content = self.string.get(start..end).unwrap_or_default();
        let content = content.strip_suffix('\n').unwrap_or(content);
        let content = content.strip_suffix('\r').unwrap_or(content);
        start..start + content.len()
    }

    /// The bytes from an offset to the end of its line.
    pub(crate) fn line_from(&self, offset: usize) -> Range<usize> {
        let line = self
            .starts
            .partition_point(|&start| start <= offset)
            .saturating_sub(1);
        offset..self.line(line).end.max(offset)
    }

    /// The bytes from a column of a line, in characters from 0, to the end of that line.
    pub(crate) fn line_from_column(&self, line: usize, column: usize) -> Range<usize> {
        let line = self.line(line);
        let content = self.string.get(line.clone()).unwrap_or_default();
        let into = content.char_indices().nth(column);
        line.start + into.map_or(content.len(), |(at, _)| at)..line.end
    }

    /// The byte offset of a place. A column past the end of its line counts as that end, and the
    /// line after the last as the end of the text (LSP 3.17, `Position`).
    ///
    /// # Errors
    /// Where the line lies further out, or the place inside a character.
    pub(crate) fn offset(&self, place: Place, columns: Columns) -> Result<usize, BadPlace> {
        if place.line > self.starts.len() {
            return Err(BadPlace::NoSuchLine(place));
        }
        let line = self.line(place.line);
        let found = match columns {
            Columns::Utf8 => Ok(line.start.saturating_add(place.column).min(line.end)),
            Columns::Utf16 => self.offset_of_units(&line, place.column),
        };
        let inside = BadPlace::InsideCharacter(place);
        found
            .ok()
            .filter(|&at| self.string.is_char_boundary(at))
            .ok_or(inside)
    }

    /// The same for a place that need not be exact: inside a character counts as before it, and
    /// past the text as its end.
    pub(crate) fn offset_near(&self, place: Place, columns: Columns) -> usize {
        // A character is at most four bytes of UTF-8 long, and two units of UTF-16.
        let back = |by| Place {
            column: place.column.saturating_sub(by),
            ..place
        };
        (0..4)
            .find_map(|by| self.offset(back(by), columns).ok())
            .unwrap_or(self.string.len())
    }

    /// The bytes of a range.
    ///
    /// # Errors
    /// Where it lies outside the text, inside a character, or is reversed.
    pub(crate) fn range(
        &self,
        start: Place,
        end: Place,
        columns: Columns,
    ) -> Result<Range<usize>, BadPlace> {
        let (from, to) = (self.offset(start, columns)?, self.offset(end, columns)?);
        // Places are compared, not offsets: past the end of a line even a reversed range is empty.
        if start > end {
            return Err(BadPlace::Reversed(start, end));
        }
        Ok(from..to)
    }

    /// The place of a byte offset; past the end counts as the end, inside a character as before
    /// it, inside a line's end as the end of that line.
    pub(crate) fn place(&self, offset: usize, columns: Columns) -> Place {
        let mut offset = offset.min(self.string.len());
        while !self.string.is_char_boundary(offset) {
            offset -= 1;
        }
        let line = self
            .starts
            .partition_point(|&start| start <= offset)
            .saturating_sub(1);
        let content = self.line(line);
        let offset = offset.min(content.end);
        let column = match columns {
            Columns::Utf8 => offset - content.start,
            Columns::Utf16 if content.len() <= SHORT => units(self.bytes(content.start..offset)),
            Columns::Utf16 => self.units_before(offset) - self.units_before(content.start),
        };
        Place { line, column }
    }

    /// Puts `new` in the place of a range of bytes; a range that is none of this text changes
    /// nothing.
    pub(crate) fn replace(&mut self, range: Range<usize>, new: &str) {
        if self.string.get(range.clone()).is_none() {
            return;
        }
        // From the line of the byte before, whose `\r` may gain or lose its `\n`, to the end of
        // the line in which the range ends, the lines are found anew; later ones only move.
        let line_of = |at: usize| self.starts.partition_point(|&s| s <= at).saturating_sub(1);
        let (first, last) = (line_of(range.start.saturating_sub(1)), line_of(range.end));
        let from = self.starts.get(first).copied().unwrap_or(0);
        let until = self
            .starts
            .get(last + 1)
            .copied()
            .unwrap_or(self.string.len());
        let moved = |at: usize| at - range.len() + new.len();
        self.string.replace_range(range.clone(), new);
        self.units = OnceLock::new();

        let mut fresh = Vec::new();
        find_starts(self.string.as_bytes(), from..moved(until), &mut fresh);
        let later = (last + 2).min(self.starts.len());
        for start in self.starts.iter_mut().skip(later) {
            *start = moved(*start);
        }
        self.starts.splice((first + 1).min(later)..later, fresh);
    }

    fn bytes(&self, range: Range<usize>) -> &[u8] {
        self.string.as_bytes().get(range).unwrap_or_default()
    }

    fn offset_of_units(&self, line: &Range<usize>, column: usize) -> Result<usize, ()> {
        let (mut at, mut count, goal) = if line.len() <= SHORT {
            (line.start, 0, column)
        } else {
            let before = self.units_before(line.start);
            let goal = before.saturating_add(column);
            let table = self.unit_table();
            let entry = table.partition_point(|&u| u <= goal).saturating_sub(1);
            match (entry * STRIDE, table.get(entry)) {
                (at, Some(&count)) if at > line.start => (at, count, goal),
                _ => (line.start, before, goal),
            }
        };
        // The last entry of the table may stand past the end.
        while at < self.string.len() && !self.string.is_char_boundary(at) {
            at += 1;
        }
        let rest = self.string.get(at..line.end).unwrap_or_default();
        for c in rest.chars() {
            if count >= goal {
                break;
            }
            count += c.len_utf16();
            at += c.len_utf8();
        }
        if count > goal {
            Err(())
        } else {
            Ok(at.min(line.end))
        }
    }

    /// UTF-16 code units before a byte offset, a character counted with its first byte.
    fn units_before(&self, offset: usize) -> usize {
        let entry = offset / STRIDE;
        let known = self.unit_table().get(entry).copied().unwrap_or_default();
        known + units(self.bytes(entry * STRIDE..offset))
    }

    fn unit_table(&self) -> &[usize] {
        self.units.get_or_init(|| {
            let mut total = 0;
            let chunks = self.string.as_bytes().chunks(STRIDE).map(|chunk| {
                let before = total;
                total += units(chunk);
                before
            });
            let mut table: Vec<usize> = chunks.collect();
            table.push(total);
            table
        })
    }
}

/// UTF-16 code units of characters whose first byte is among these.
fn units(bytes: &[u8]) -> usize {
    bytes
        .iter()
        .map(|&byte| match byte {
            0x80..=0xbf => 0,
            0xf0.. => 2,
            _ => 1,
        })
        .sum()
}

/// Where lines begin that the line ends in a range of bytes cause.
fn find_starts(bytes: &[u8], range: Range<usize>, starts: &mut Vec<usize>) {
    let offset = range.start;
    for (i, &byte) in bytes.get(range).unwrap_or_default().iter().enumerate() {
        let next = offset + i + 1;
        if byte == b'\n' || (byte == b'\r' && bytes.get(next) != Some(&b'\n')) {
            starts.push(next);
        }
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn at(line: usize, column: usize) -> Place {
        Place { line, column }
    }

    #[test]
    fn columns_in_both_encodings() {
        // é is 2 bytes and 1 unit, 𝄪 is 4 bytes and 2 units (Unicode 15).
        let text = Text::new("é𝄪x\r\nab".to_owned());
        for (offset, utf8, utf16) in [(0, 0, 0), (2, 2, 1), (6, 6, 3), (7, 7, 4)] {
            assert_eq!(text.place(offset, Columns::Utf8), at(0, utf8));
            assert_eq!(text.place(offset, Columns::Utf16), at(0, utf16));
            assert_eq!(text.offset(at(0, utf8), Columns::Utf8), Ok(offset));
            assert_eq!(text.offset(at(0, utf16), Columns::Utf16), Ok(offset));
        }
        assert_eq!(
            text.place(8, Columns::Utf16),
            at(0, 4),
            "between \\r and \\n is the line's end"
        );
        assert_eq!(text.place(10, Columns::Utf16), at(1, 1));
    }

    #[test]
    fn places_that_are_none() {
        let text = Text::new("𝄪\nab\n".to_owned());
        let offset = |line, column| text.offset(at(line, column), Columns::Utf16);
        assert_eq!(offset(0, 1), Err(BadPlace::InsideCharacter(at(0, 1))));
        assert_eq!(
            text.offset(at(0, 2), Columns::Utf8),
            Err(BadPlace::InsideCharacter(at(0, 2)))
        );
        assert_eq!(offset(1, 99), Ok(7), "past the line's end is its end");
        assert_eq!(offset(2, 0), Ok(8));
        assert_eq!(
            offset(3, 7),
            Ok(8),
            "the line after the last is the end of the text"
        );
        assert_eq!(offset(4, 0), Err(BadPlace::NoSuchLine(at(4, 0))));
        let range = text.range(at(1, 2), at(1, 1), Columns::Utf16);
        assert_eq!(range, Err(BadPlace::Reversed(at(1, 2), at(1, 1))));
        assert_eq!(text.offset_near(at(0, 1), Columns::Utf16), 0);
        assert_eq!(text.offset_near(at(0, 3), Columns::Utf8), 0);
        assert_eq!(text.offset_near(at(77, 3), Columns::Utf16), 8);
    }

    #[test]
    fn a_byte_order_mark_is_a_character_of_the_first_line() {
        let text = Text::new("\u{feff}S".to_owned());
        assert_eq!(text.place(3, Columns::Utf16), at(0, 1));
        assert_eq!(text.place(3, Columns::Utf8), at(0, 3));
    }

    fn some_text() -> impl Strategy<Value = String> {
        let piece = prop::sample::select(vec!["a", "é", "𝄪", "\n", "\r", "\r\n", "bc", "♯"]);
        prop::collection::vec(piece, 0..12).prop_map(|pieces| pieces.concat())
    }

    proptest! {
        #[test]
        fn edits_keep_the_lines(start in some_text(), edits in prop::collection::vec((0usize..30, 0usize..8, some_text()), 0..12)) {
            let mut text = Text::new(start);
            for (from, len, new) in edits {
                let mut bounds: Vec<usize> = text.string.char_indices().map(|(i, _)| i).collect();
                bounds.push(text.string.len());
                let first = from % bounds.len();
                let last = (first + len).min(bounds.len() - 1);
                text.replace(bounds[first]..bounds[last], &new);
                let again = Text::new(text.string.clone());
                prop_assert_eq!(&text.starts, &again.starts, "{:?}", text.string);
            }
        }

        #[test]
        fn places_and_offsets_agree(text in some_text(), long in 0usize..3) {
            // The long ones have lines beyond SHORT, which go through the table of units.
            let text = Text::new(text.repeat(1 + 700 * long));
            for columns in [Columns::Utf8, Columns::Utf16] {
                for (offset, _) in text.string.char_indices().step_by(1 + 97 * long) {
                    let place = text.place(offset, columns);
                    let back = text.offset(place, columns);
                    let line = text.line(place.line);
                    prop_assert_eq!(back, Ok(offset.min(line.end)));
                    let before = &text.string[line.start..offset.min(line.end)];
                    let column = match columns {
                        Columns::Utf8 => before.len(),
                        Columns::Utf16 => before.encode_utf16().count(),
                    };
                    prop_assert_eq!(place.column, column);
                }
            }
        }
    }
}
