//! Lines and columns.

/// Bytes between two checkpoints of [`Lines`]: a column is found by counting at most as many.
const STRIDE: usize = 256;

/// Where the lines of a text begin, for many look-ups in one text: each takes the same short time,
/// however long the line is.
#[derive(Clone, Debug)]
pub struct Lines<'a> {
    text: &'a str,
    /// First bytes of the lines.
    starts: Vec<u32>,
    /// Characters before every `STRIDE`th byte.
    characters: Vec<u32>,
}

/// Whether a byte begins a character.
const fn begins(byte: u8) -> bool {
    byte & 0xc0 != 0x80
}

fn count(bytes: &[u8]) -> usize {
    bytes.iter().filter(|byte| begins(**byte)).count()
}

fn small(n: usize) -> u32 {
    u32::try_from(n).unwrap_or(u32::MAX)
}

impl<'a> Lines<'a> {
    /// Finds the lines of a text.
    #[must_use]
    pub fn of(text: &'a str) -> Lines<'a> {
        let after = text.match_indices('\n').map(|(i, _)| small(i + 1));
        let starts = std::iter::once(0).chain(after).collect();
        let blocks = text.as_bytes().chunks(STRIDE).scan(0, |before, block| {
            let here = *before;
            *before += count(block);
            Some(small(here))
        });
        Lines {
            text,
            starts,
            characters: blocks.collect(),
        }
    }

    /// Line and column of a byte offset, both from 1, the column in Unicode scalars without a byte
    /// order mark. An offset inside a character counts as its beginning, one past the end as the
    /// end.
    #[must_use]
    pub fn position(&self, offset: usize) -> (usize, usize) {
        let mut offset = offset.min(self.text.len());
        while !self.text.is_char_boundary(offset) {
            offset -= 1;
        }
        let line = self
            .starts
            .partition_point(|&start| start as usize <= offset);
        let start = line.checked_sub(1).and_then(|i| self.starts.get(i));
        let start = start.map_or(0, |&start| start as usize);
        let mark = usize::from(line == 1 && offset > 0 && self.text.starts_with('\u{feff}'));
        let column = self.before(offset) - self.before(start) - mark;
        (line, column + 1)
    }

    /// Characters before an offset.
    fn before(&self, offset: usize) -> usize {
        let block = offset / STRIDE;
        let known = self.characters.get(block).map_or_else(
            // The very end, where a block would begin.
            || self.characters.last().map_or(0, |&n| n as usize),
            |&n| n as usize,
        );
        let from = block.min(self.characters.len().saturating_sub(1)) * STRIDE;
        let rest = self.text.as_bytes().get(from..offset);
        known + count(rest.unwrap_or_default())
    }
}

/// Line and column of one byte offset: see [`Lines::position`]. For many in one text make a
/// [`Lines`].
#[must_use]
pub fn line_column(text: &str, offset: usize) -> (usize, usize) {
    Lines::of(text).position(offset)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The same, counted one character after another.
    fn slowly(text: &str, offset: usize) -> (usize, usize) {
        let (mut line, mut column) = (1, 1);
        for (i, c) in text.char_indices() {
            if i + c.len_utf8() > offset {
                break;
            }
            match c {
                '\n' => (line, column) = (line + 1, 1),
                '\u{feff}' if i == 0 => {}
                _ => column += 1,
            }
        }
        (line, column)
    }

    #[test]
    fn positions_are_those_counted_one_by_one() {
        let long = "é".repeat(700) + "\nA\r\n\n" + &"x𝄪".repeat(300);
        for text in ["", "\n", "a\nb", "\u{feff}S | G4\n", long.as_str()] {
            let lines = Lines::of(text);
            for offset in 0..=text.len() {
                assert_eq!(
                    lines.position(offset),
                    slowly(text, offset),
                    "{text:?} {offset}"
                );
            }
            assert_eq!(lines.position(text.len() + 9), slowly(text, text.len()));
        }
    }
}
