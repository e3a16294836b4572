//! Setting a sheet in columns: blanks and spelling change, never what is read.
//!
//! - The cells of a system stand in columns by display width, one blank apart, and so do its bar
//!   lines. What fills a bar alone (`_`, `-`, `=S`) and what stands last in it may reach over the
//!   columns behind. A syllable stands under the note that strikes it.
//! - The values of headers and changes stand in one column, the labels, kinds and options of voice
//!   lines in theirs. Comments at the ends of neighbouring lines stand in a column too.
//! - Letters of notes become capitals and signs ASCII (`#`, `##`, `b`, `bb`; no natural); `meter`
//!   and `license` become `metre` and `licence`.
//! - Octave figures stay as they are. A carried figure says already what it says, so none is ever
//!   missing where the octave changes; one written at an octave-doubt is the composer's choice, and
//!   one that could be left out may stand there on purpose.
//! - What cannot be read stays as it is: a part within its cell, a line as a whole. Comments and
//!   blank lines stay; only marks drawn under the notes (`// ^^`) move with their notes.
//! - A carriage return that ends no line goes as other blanks go.
//! - A sheet that would grow beyond [`LARGEST`] in columns stays as it is.

mod carets;
mod columns;
mod display;
mod rows;
mod spelling;
mod strikes;
mod values;

use display::{blanks, width};

use crate::lines::{LineKind, lines};
use crate::sheet::{Block, Placed, Tree};
use crate::{Edit, LARGEST, Sheet, Span, apply};

/// A sheet in columns.
#[must_use]
pub fn align(text: &str) -> String {
    apply(text, &align_edits(text))
}

/// A sheet in columns; `None` where it would be larger than [`LARGEST`], or is so already.
#[must_use]
pub fn try_align(text: &str) -> Option<String> {
    let sheet = Sheet::read(text);
    let edits = edits(sheet.tree(), |_| true).filter(|_| !sheet.tree().too_large)?;
    Some(apply(text, &edits))
}

/// The edits that set a sheet in columns: at most one a line, within the line, in the order of the
/// text.
#[must_use]
pub fn align_edits(text: &str) -> Vec<Edit> {
    Sheet::read(text).align_edits()
}

impl Sheet {
    /// The edits that set the sheet in columns: at most one a line, within the line, in the order
    /// of the text.
    #[must_use]
    pub fn align_edits(&self) -> Vec<Edit> {
        edits(self.tree(), |_| true).unwrap_or_default()
    }

    /// The edits among them that concern what a span touches: whole systems, and single lines that
    /// are no rows.
    #[must_use]
    pub fn align_edits_in(&self, span: Span) -> Vec<Edit> {
        let touches = |other: Span| other.start <= span.end && span.start <= other.end;
        edits(self.tree(), touches).unwrap_or_default()
    }
}

/// How much a sheet may still grow.
struct Room(usize);

impl Room {
    /// So many bytes become so many; nothing if there is no room for them.
    fn change(&mut self, from: usize, to: usize) -> Option<()> {
        self.0 = (self.0 + from).checked_sub(to)?;
        Some(())
    }
}

/// A line as it is to stand.
struct SetLine {
    /// The whole line in the text of the sheet.
    line: Span,
    /// All of it up to the comment at its end.
    text: String,
    /// That comment.
    comment: Option<Span>,
}

/// The edits to what is wanted, lines and systems; nothing if the sheet would grow too large.
fn edits(tree: &Tree, wanted: impl Fn(Span) -> bool) -> Option<Vec<Edit>> {
    let text = &tree.text;
    let mut room = Room(LARGEST.saturating_sub(text.len()));
    let mut edits = Vec::new();
    let mut others = values::lines(tree);
    comments(&mut others, text, &mut room)?;
    for line in others.into_iter().filter(|line| wanted(line.line)) {
        edits.extend(difference(text, line.line, &line.text));
    }
    for block in &tree.blocks {
        if let Block::System(placed) = block
            && wanted(placed.span)
        {
            system(text, placed, &mut room, &mut edits)?;
        }
    }
    edits.sort_by_key(|edit| edit.span.start);
    Some(edits)
}

/// Sets one system, and the marks drawn under its notes.
fn system(text: &str, placed: &Placed, room: &mut Room, edits: &mut Vec<Edit>) -> Option<()> {
    let own = text.get(placed.span.range()).unwrap_or_default();
    let base = placed.span.start;
    let columns = rows::set(own, &placed.system);
    let mut set = columns.lines(own.len() + room.0)?;
    for line in &mut set {
        line.line = line.line.moved(base);
        line.comment = line.comment.map(|comment| comment.moved(base));
    }
    comments(&mut set, text, room)?;
    let before = edits.len();
    let changes = set
        .iter()
        .filter_map(|line| difference(text, line.line, &line.text));
    edits.extend(changes);
    if edits.len() == before {
        return Some(());
    }
    let mut drawn = carets::Drawn::default();
    let mut set = set.iter().peekable();
    for line in lines(text, base as usize) {
        let span = Span::new(line.start, line.end);
        let written = text.get(span.range()).unwrap_or_default();
        match line.kind {
            LineKind::Row(_) if span.start < placed.span.end => {
                let new = set.next_if(|set| set.line == span);
                drawn.row(written, new.map_or(written, |set| &set.text));
            }
            LineKind::Comment => {
                if let Some(moved) = drawn.moved(written, room)? {
                    edits.extend(difference(text, span, &moved));
                }
            }
            LineKind::Footnote => {}
            _ if span.start < placed.span.end => {}
            _ => break,
        }
    }
    Some(())
}

/// Puts the comments back at the ends of their lines, those of neighbouring lines in a column.
fn comments(set: &mut [SetLine], text: &str, room: &mut Room) -> Option<()> {
    let neighbours = |a: &SetLine, b: &SetLine| {
        let between = text.get(a.line.end as usize..b.line.start as usize);
        a.comment.is_some() && b.comment.is_some() && matches!(between, Some("\n" | "\r\n"))
    };
    for group in set.chunk_by_mut(neighbours) {
        let commented = group.iter().filter(|line| line.comment.is_some());
        let column = 1 + commented.map(|line| width(&line.text)).max().unwrap_or(0);
        for line in group {
            let old = line.line.range().len();
            let Some(comment) = line.comment else {
                room.change(old, line.text.len())?;
                continue;
            };
            let gap = column - width(&line.text);
            room.change(old, line.text.len() + gap + comment.range().len())?;
            blanks(&mut line.text, gap);
            line.text
                .push_str(text.get(comment.range()).unwrap_or_default());
        }
    }
    Some(())
}

/// The smallest edit that makes a new line of an old one; nothing if they are the same.
fn difference(text: &str, line: Span, new: &str) -> Option<Edit> {
    let old = text.get(line.range())?;
    // In front of a sheet such a character would turn into the mark of its byte order.
    let becomes_mark = line.start == 0 && new.starts_with('\u{feff}');
    if old == new || becomes_mark {
        return None;
    }
    let alike = |pair: &(u8, u8)| pair.0 == pair.1;
    let mut head = old.bytes().zip(new.bytes()).take_while(alike).count();
    while !old.is_char_boundary(head) || !new.is_char_boundary(head) {
        head -= 1;
    }
    let (rest, fresh) = (old.get(head..)?, new.get(head..)?);
    let backwards = rest.bytes().rev().zip(fresh.bytes().rev());
    let mut tail = backwards.take_while(alike).count();
    while !rest.is_char_boundary(rest.len() - tail) || !fresh.is_char_boundary(fresh.len() - tail) {
        tail -= 1;
    }
    let start = line.start as usize + head;
    Some(Edit {
        span: Span::new(start, start + rest.len() - tail),
        text: fresh.get(..fresh.len() - tail)?.to_owned(),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn differences_are_small_and_stand_between_characters() {
        let edit = |old: &str, new: &str| {
            let edit = difference(old, Span::new(0, old.len()), new)?;
            Some((edit.span.range(), edit.text))
        };
        assert_eq!(edit("S | G4 |", "S | G4 |"), None);
        assert_eq!(edit("S|G4", "S |G4"), Some((1..1, " ".to_owned())));
        assert_eq!(edit("S  |", "S |"), Some((2..3, String::new())));
        assert_eq!(edit("aéb", "aèb"), Some((1..3, "è".to_owned())));
        assert_eq!(edit("aêb", "aîb"), Some((1..3, "î".to_owned())));
        assert_eq!(edit("aa", "aaa"), Some((2..2, "a".to_owned())));
    }

    #[test]
    fn edits_give_back_the_room_they_leave() {
        let mut room = Room(3);
        assert_eq!(room.change(5, 8), Some(()));
        assert_eq!(room.change(5, 6), None);
        let mut room = Room(0);
        assert_eq!(room.change(5, 2), Some(()));
        assert_eq!(room.change(0, 3), Some(()));
    }
}
