//! Marks drawn under the notes in comments (`//   ^^ some words`): they stay under the notes they
//! stand under.
//!
//! Columns are characters here, as in [`crate::drawn_marks`].

use std::cell::OnceCell;

use super::Room;
use super::display::blanks;
use crate::chars::is_blank;

/// The most rows above a comment in which the note of a mark is looked for.
const MOST_ROWS: usize = 64;

/// The rows of a system so far, and what stands in comments under them.
#[derive(Default)]
pub(super) struct Drawn<'a> {
    rows: Vec<DrawnRow<'a>>,
}

struct DrawnRow<'a> {
    old: &'a str,
    new: &'a str,
    atoms: OnceCell<Vec<Atom>>,
}

/// A piece of a row without a blank in it: a part, its marks, a bar line.
struct Atom {
    /// Its first character and how many it has, before and after.
    old: usize,
    length: usize,
    new: usize,
    new_length: usize,
}

/// Carets side by side.
struct Group {
    start: usize,
    width: usize,
}

impl<'a> Drawn<'a> {
    /// A row, before and after it is set.
    pub(super) fn row(&mut self, old: &'a str, new: &'a str) {
        self.rows.push(DrawnRow {
            old,
            new,
            atoms: OnceCell::new(),
        });
    }

    /// A comment with its marks moved: inner nothing if none has to, outer nothing if there is no
    /// room.
    pub(super) fn moved(&self, comment: &str, room: &mut Room) -> Option<Option<String>> {
        let Some((indent, groups, tail)) = taken_apart(comment) else {
            return Some(None);
        };
        let mut end = 0;
        let mut starts = Vec::with_capacity(groups.len());
        for group in &groups {
            let start = self.place(group);
            // Behind the strokes, and apart from the marks before.
            if start < if end == 0 { 2 } else { end + 1 } {
                return Some(None);
            }
            starts.push(start);
            end = start + group.width;
        }
        let Some(&first) = starts.first() else {
            return Some(None);
        };
        if starts
            .iter()
            .zip(&groups)
            .all(|(start, group)| *start == group.start)
        {
            return Some(None);
        }
        room.change(comment.len(), end + tail.len())?;
        let mut column = indent.chars().count().min(first - 2);
        let mut out: String = indent.chars().take(column).collect();
        out.push_str("//");
        column += 2;
        for (start, group) in starts.into_iter().zip(groups) {
            blanks(&mut out, start - column);
            out.extend(std::iter::repeat_n('^', group.width));
            column = start + group.width;
        }
        out.push_str(tail);
        Some(Some(out))
    }

    /// Where carets go: to what they stand under in the nearest row that has something there, else
    /// as far as what stands before them in the row above.
    fn place(&self, group: &Group) -> usize {
        let end = group.start + group.width;
        for row in self.rows.iter().rev().take(MOST_ROWS) {
            let atoms = row.atoms();
            let next = atoms.partition_point(|atom| atom.old + atom.length <= group.start);
            let Some(atom) = atoms.get(next).filter(|atom| atom.old < end) else {
                continue;
            };
            return match group.start.checked_sub(atom.old) {
                Some(into) => atom.new + into.min(atom.new_length.saturating_sub(1)),
                None => atom.new.saturating_sub(atom.old - group.start),
            };
        }
        let atoms = self.rows.last().map_or(&[][..], DrawnRow::atoms);
        let next = atoms.partition_point(|atom| atom.old < group.start);
        let before = next.checked_sub(1).and_then(|i| atoms.get(i));
        before.map_or(group.start, |atom| {
            let gap = group.start - (atom.old + atom.length);
            atom.new + atom.new_length + gap
        })
    }
}

impl DrawnRow<'_> {
    fn atoms(&self) -> &[Atom] {
        self.atoms.get_or_init(|| {
            let (old, new) = (atoms(self.old), atoms(self.new));
            if old.len() != new.len() {
                return Vec::new();
            }
            let pair = |((old, length), (new, new_length))| Atom {
                old,
                length,
                new,
                new_length,
            };
            old.into_iter().zip(new).map(pair).collect()
        })
    }
}

/// First character and length of everything in a row that blanks, bar lines, dots and marks part.
fn atoms(row: &str) -> Vec<(usize, usize)> {
    let mut atoms: Vec<(usize, usize)> = Vec::new();
    let mut open = false;
    for (column, c) in row.chars().enumerate() {
        if is_blank(c) {
            open = false;
            continue;
        }
        match atoms.last_mut() {
            Some((_, length)) if open && !".|^,*".contains(c) => *length += 1,
            _ => atoms.push((column, 1)),
        }
        open = c != '|';
    }
    atoms
}

/// The indent of a comment, its carets, and what stands behind them; nothing if it has none.
fn taken_apart(comment: &str) -> Option<(&str, Vec<Group>, &str)> {
    let after = comment.trim_start_matches(is_blank);
    let indent = comment.get(..comment.len() - after.len())?;
    let mut rest = after.strip_prefix("//")?;
    let mut column = indent.chars().count() + 2;
    let mut groups = Vec::new();
    loop {
        let carets = rest.trim_start_matches(is_blank);
        let behind = carets.trim_start_matches('^');
        let width = carets.len() - behind.len();
        if width == 0 {
            break;
        }
        let start = column + rest.get(..rest.len() - carets.len())?.chars().count();
        groups.push(Group { start, width });
        column = start + width;
        rest = behind;
    }
    (!groups.is_empty()).then_some((indent, groups, rest))
}
