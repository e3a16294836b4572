//! Lines of a sheet taken apart into bars, and pieces of them put together again by columns.

use std::ops::Range;

use unicode_width::UnicodeWidthChar;

use crate::prose::harmless_char;

/// The tab stops of terminals.
const TAB: usize = 8;

/// A line of the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Row {
    /// Its number, from 1.
    pub(crate) number: usize,
    /// Its bytes, without the line end.
    pub(crate) span: Range<usize>,
    /// Where its bars begin, behind the first bar line; the start of the line where it has none.
    pub(crate) prefix: usize,
    /// Its bars, each with the bar lines that close it; a comment belongs to none.
    pub(crate) bars: Vec<Range<usize>>,
    /// It holds notes.
    pub(crate) music: bool,
}

impl Row {
    /// Where its bars end, or the line where it has none.
    pub(crate) fn end(&self) -> usize {
        self.bars.last().map_or(self.span.end, |bar| bar.end)
    }

    fn of(text: &str, number: usize, mut span: Range<usize>) -> Row {
        // A byte order mark is no part of the first line.
        if span.start == 0 && text.starts_with('\u{feff}') {
            span.start = '\u{feff}'.len_utf8().min(span.end);
        }
        let line = text.get(span.clone()).unwrap_or_default();
        let mut row = Row {
            number,
            prefix: span.start,
            span,
            bars: Vec::new(),
            music: false,
        };
        let strokes: Vec<usize> = strokes(line);
        let Some(&first) = strokes.first() else {
            return row;
        };
        let words: Vec<&str> = line
            .get(..first)
            .unwrap_or_default()
            .split_whitespace()
            .collect();
        row.music =
            matches!(words.as_slice(), [word] if !matches!(*word, "harmony" | "figures" | "words"));
        row.prefix = row.span.start + first + 1;
        let mut start = first + 1;
        for (i, &stroke) in strokes.iter().enumerate().skip(1) {
            // The second stroke of a double bar line opens no bar.
            if strokes.get(i + 1) != Some(&(stroke + 1)) {
                row.bars
                    .push(row.span.start + start..row.span.start + stroke + 1);
                start = stroke + 1;
            }
        }
        let rest = line.get(start..).unwrap_or_default();
        let written = rest.len() - rest.trim_start().len();
        if !rest.trim().is_empty() && !is_comment(rest, written) {
            row.bars.push(row.span.start + start..row.span.end);
        }
        row
    }
}

/// The lines of a stretch of text that begins with a line.
pub(crate) fn rows(text: &str, span: Range<usize>, first: usize) -> Vec<Row> {
    let mut start = span.start;
    let lines = text.get(span).unwrap_or_default().split_inclusive('\n');
    lines
        .enumerate()
        .map(|(i, line)| {
            let written = line.trim_end_matches(['\n', '\r']).len();
            let row = Row::of(text, first + i, start..start + written);
            start += line.len();
            row
        })
        .collect()
}

/// Whether the line around an offset is a row of notes by its look: one word, then a bar line.
pub(crate) fn is_music_row(text: &str, offset: usize) -> bool {
    Row::of(text, 1, line_around(text, offset)).music
}

/// The line around an offset, without its end.
pub(crate) fn line_around(text: &str, offset: usize) -> Range<usize> {
    let offset = offset.min(text.len());
    let start = text
        .get(..offset)
        .and_then(|before| before.rfind('\n'))
        .map_or(0, |end| end + 1);
    let end = text
        .get(offset..)
        .and_then(|after| after.find('\n'))
        .map_or(text.len(), |end| offset + end);
    start..end
}

/// The bar lines of a line: strokes that no backslash makes plain, before any comment.
fn strokes(line: &str) -> Vec<usize> {
    let mut found = Vec::new();
    let mut plain = false;
    for (i, byte) in line.bytes().enumerate() {
        match byte {
            b'/' if is_comment(line, i) => break,
            b'|' if !plain => found.push(i),
            _ => {}
        }
        plain = byte == b'\\' && !plain;
    }
    found
}

/// Whether a comment begins there: two strokes at the start or behind a blank.
fn is_comment(line: &str, at: usize) -> bool {
    line.get(at..).is_some_and(|rest| rest.starts_with("//"))
        && line
            .get(..at)
            .is_some_and(|before| before.chars().next_back().is_none_or(char::is_whitespace))
}

/// A piece of a shown line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Piece {
    /// Some of the text.
    Text(Range<usize>),
    /// Words of ours: what is left out.
    Ours(&'static str),
}

/// A line put together from pieces.
#[derive(Debug, Default)]
pub(crate) struct Drawn {
    /// The line.
    pub(crate) text: String,
    /// Its width in columns.
    pub(crate) width: usize,
    /// Places in the text, in the line, and its columns, at every character of the text.
    places: Vec<(usize, usize, usize)>,
}

impl Drawn {
    /// Puts pieces together; `None` where that is wider than `room`.
    pub(crate) fn of(text: &str, pieces: &[Piece], room: usize) -> Option<Drawn> {
        let mut drawn = Drawn::default();
        for piece in pieces {
            match piece {
                Piece::Ours(words) => words.chars().for_each(|c| drawn.push(c)),
                Piece::Text(range) => {
                    for (i, c) in text.get(range.clone()).unwrap_or_default().char_indices() {
                        drawn
                            .places
                            .push((range.start + i, drawn.text.len(), drawn.width));
                        drawn.push(c);
                        if drawn.width > room {
                            return None;
                        }
                    }
                    drawn
                        .places
                        .push((range.end, drawn.text.len(), drawn.width));
                }
            }
        }
        (drawn.width <= room).then_some(drawn)
    }

    fn push(&mut self, c: char) {
        if c == '\t' {
            let blanks = TAB - self.width % TAB;
            self.text.extend(std::iter::repeat_n(' ', blanks));
            self.width += blanks;
        } else {
            let c = harmless_char(c);
            self.text.push(c);
            self.width += c.width().unwrap_or(1);
        }
    }

    /// Where a span of the text stands in the line, in bytes, and the column at which it ends.
    /// What was cut off of it is left out; `None` where all of it was.
    pub(crate) fn place(&self, span: &Range<usize>) -> Option<(Range<usize>, usize)> {
        let inside = |place: &&(usize, usize, usize)| (span.start..=span.end).contains(&place.0);
        let first = self.places.iter().find(inside)?;
        let last = self.places.iter().rev().find(inside)?;
        (span.is_empty() || first.1 < last.1).then_some((first.1..last.1, last.2))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn bars(line: &str) -> (Vec<&str>, bool) {
        let row = Row::of(line, 1, 0..line.len());
        (
            row.bars.iter().map(|bar| &line[bar.clone()]).collect(),
            row.music,
        )
    }

    #[test]
    fn a_row_falls_into_bars() {
        assert_eq!(bars("S | G4 A | B ||"), (vec![" G4 A |", " B ||"], true));
        assert_eq!(bars("S | G4 || B"), (vec![" G4 ||", " B"], true));
        assert_eq!(bars("S | G4 |  // the tide | turns"), (vec![" G4 |"], true));
        assert_eq!(
            bars(r"words S | a\|b | c |"),
            (vec![r" a\|b |", " c |"], false)
        );
        assert_eq!(bars("// a | b"), (vec![], false));
        assert_eq!(bars("title Harbour"), (vec![], false));
    }

    #[test]
    fn columns_are_those_a_terminal_shows() {
        let text = "S\t| F♯4 全 |";
        let drawn = Drawn::of(text, &[Piece::Text(0..text.len())], 80).unwrap();
        assert_eq!(drawn.text, "S       | F♯4 全 |");
        assert_eq!(drawn.width, 18);
        let at = text.find('全').unwrap();
        let (place, column) = drawn.place(&(at..at + 3)).unwrap();
        assert_eq!(&drawn.text[place], "全");
        assert_eq!(column, 16);
        assert!(Drawn::of(text, &[Piece::Text(0..text.len())], 17).is_none());
    }
}
