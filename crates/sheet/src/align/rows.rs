//! Rows: what stands in which column, in its canonical spelling.

use std::borrow::Cow;
use std::ops::Range;

use super::columns::{Columns, SetRow};
use super::spelling::{ascii_signs, respelt};
use super::strikes::Strikes;
use crate::Span;
use crate::chars::{after_blanks, blank_at, comment_at, plain, words};
use crate::harmony::key_prefix;
use crate::lines::{RowKind, is_reserved};
use crate::lower::bars::{Fill, fill};
use crate::system::small;
use crate::tree::{PartKind, Row, System, syllable_end};

/// The slot of the first bar line of all rows.
const OPENING: u32 = 0;

/// Takes the rows of a system apart; `text` is that of the system. Rows that cannot be set are
/// left out.
pub(super) fn set<'a>(text: &'a str, system: &'a System) -> Columns<'a> {
    let mut setting = Setting {
        text,
        system,
        bars: bars(system),
        strikes: Strikes::new(text, system),
        columns: Columns::default(),
    };
    for row in &system.rows {
        let before = setting.columns.len();
        if setting.row(row).is_none() {
            setting.columns.truncate(before);
        }
    }
    setting.columns
}

/// The first slot of each bar, one more than there are bars: each has a slot for every cell of its
/// longest row, one at least, and one for its bar line.
fn bars(system: &System) -> Vec<u32> {
    let mut lengths: Vec<u32> = Vec::new();
    for row in &system.rows {
        let bars = row.bars.clone();
        lengths.resize(lengths.len().max(bars.len()), 1);
        if row.kind == RowKind::Words {
            continue;
        }
        for (bar, length) in bars.zip(&mut lengths) {
            *length = (*length).max(small(system.cells_of(bar).len()));
        }
    }
    let mut slot = OPENING + 1;
    let mut firsts = vec![slot];
    for length in lengths {
        slot += length + 1;
        firsts.push(slot);
    }
    firsts
}

struct Setting<'a> {
    text: &'a str,
    system: &'a System,
    bars: Vec<u32>,
    strikes: Strikes<'a>,
    columns: Columns<'a>,
}

/// A row on its way.
struct Walk<'a> {
    kind: RowKind,
    /// The text up to the end of the row.
    row: &'a [u8],
    at: usize,
    /// The cell of the tree that comes next.
    cell: usize,
    /// Its first bar in the tree.
    first: u32,
    /// The bar, counted in the row; how many cells or syllables it has so far, and the first of its
    /// items.
    bar: usize,
    cells: u32,
    items: usize,
    /// Words that take no time (dynamics, say), waiting for the cell they stand before.
    loose: String,
    /// Where a colon stands right before a bar line: closely written, they are one sign.
    colon: Option<usize>,
    /// The row that sings these words, by index.
    singer: Option<usize>,
}

impl<'a> Setting<'a> {
    fn slice(&self, from: usize, to: usize) -> &'a str {
        self.text.get(from..to).unwrap_or_default()
    }

    /// Sets a row; nothing if it has to stay as it is.
    fn row(&mut self, row: &'a Row) -> Option<()> {
        // A row without its first bar line, or named by a word of the notation, may be meant for
        // something else.
        if row.opening.start == row.opening.end {
            return None;
        }
        let name = self.slice(row.label.start as usize, row.label.end as usize);
        if row.kind == RowKind::Music && is_reserved(name) {
            return None;
        }
        let mut label = Cow::Borrowed(name);
        let mut singer = None;
        if row.kind == RowKind::Words {
            let (from, to) = (row.label.end as usize, row.opening.start as usize);
            for word in words(self.text, from, to) {
                singer = singer.or_else(|| self.strikes.row(word.text));
                label = label + " " + word.text;
            }
        }
        let items = self.columns.len();
        let mut walk = Walk {
            kind: row.kind,
            row: self.text.as_bytes().get(..row.line.end as usize)?,
            at: row.opening.start as usize,
            cell: self.system.cells_of(row.bars.start).start,
            first: row.bars.start,
            bar: 0,
            cells: 0,
            items,
            loose: String::new(),
            colon: None,
            singer,
        };
        let comment = self.walk(&mut walk)?;
        // Else this would not be the row that was read.
        let all = walk.cell == self.system.cells_of(row.bars.end).start;
        all.then(|| {
            self.columns.rows.push(SetRow {
                line: row.line,
                label,
                items: items..self.columns.len(),
                comment,
            });
        })
    }

    /// Goes through a row; finds the comment at its end.
    fn walk(&mut self, walk: &mut Walk<'a>) -> Option<Option<Span>> {
        self.bar_line(walk, OPENING);
        let comment = loop {
            let before = walk.at;
            walk.at = after_blanks(walk.row, before);
            match walk.row.get(walk.at) {
                None => break None,
                Some(b'/') if comment_at(walk.row, walk.at) => {
                    // Right behind a bar line two strokes are no comment, and a blank between
                    // would make them one.
                    if walk.at == before {
                        return None;
                    }
                    break Some(Span::new(walk.at, walk.row.len()));
                }
                Some(b'|') => {
                    let slot = |bar: usize| self.bars.get(bar).copied();
                    let (first, next) = (slot(walk.bar)?, slot(walk.bar + 1)?);
                    self.lay_loose(walk, first);
                    self.bar_line(walk, next - 1);
                    walk.bar += 1;
                }
                Some(_) => self.word(walk)?,
            }
        };
        if !walk.loose.is_empty() {
            self.columns.append(&walk.loose);
        }
        Some(comment)
    }

    /// Puts words that no cell follows in their bar.
    fn lay_loose(&mut self, walk: &mut Walk<'a>, slot: u32) {
        let loose = std::mem::take(&mut walk.loose);
        if loose.is_empty() {
            return;
        }
        if self.columns.len() > walk.items {
            self.columns.append(&loose);
        } else {
            self.columns.push(slot, Cow::Owned(loose), false);
        }
    }

    /// A bar line with the colons of repeat signs about it.
    fn bar_line(&mut self, walk: &mut Walk<'a>, slot: u32) {
        let from = walk.colon.take().unwrap_or(walk.at);
        for sign in [b'|', b':'] {
            while walk.row.get(walk.at) == Some(&sign) {
                walk.at += 1;
            }
        }
        let text = self.slice(from, walk.at);
        self.columns.push(slot, Cow::Borrowed(text), false);
        walk.items = self.columns.len();
        walk.cells = 0;
    }

    /// A cell, a syllable, or a word that takes no time.
    fn word(&mut self, walk: &mut Walk<'a>) -> Option<()> {
        let start = walk.at;
        walk.at = word_end(walk, start);
        let text = self.slice(start, walk.at);
        let parts = self.system.parts_of(walk.cell);
        let first = self.system.parts.get(parts.start);
        let Some(first) = first.filter(|part| part.start as usize == start) else {
            if text == ":" && walk.row.get(walk.at) == Some(&b'|') {
                walk.colon = Some(start);
            } else {
                if !walk.loose.is_empty() {
                    walk.loose.push(' ');
                }
                walk.loose.push_str(text);
            }
            return Some(());
        };
        let slot = *self.bars.get(walk.bar)?;
        if walk.kind == RowKind::Words {
            self.syllable(walk, slot, text)?;
        } else {
            let mut text = match walk.kind {
                RowKind::Music => self.notes(start, walk.at, parts),
                RowKind::Harmony if first.kind() == PartKind::Key => self.chord(walk, text),
                _ => Cow::Borrowed(text),
            };
            if !walk.loose.is_empty() {
                text = Cow::Owned(std::mem::take(&mut walk.loose) + " " + &text);
            }
            let bar = walk.first + small(walk.bar);
            let alone = fill(self.system, walk.kind, bar) == Fill::Whole;
            self.columns.push(slot + walk.cells, text, alone);
        }
        walk.cell += 1;
        walk.cells += 1;
        Some(())
    }

    /// A syllable, under its note; those of one cell, and those beyond the notes, together.
    fn syllable(&mut self, walk: &Walk<'a>, slot: u32, text: &'a str) -> Option<()> {
        // A backslash that makes nothing plain would make the blank plain that comes behind it.
        if text.ends_with('\\') && plain(text).1 {
            return None;
        }
        let struck = match walk.singer {
            Some(row) => self.strikes.in_bar(row, walk.bar),
            None => &[],
        };
        let own = struck.get(walk.cells as usize).map(|cell| slot + cell);
        let last = (self.columns.len() > walk.items).then(|| self.columns.last_slot());
        match (own, last) {
            (Some(slot), Some(last)) if slot <= last => self.columns.append(text),
            (Some(slot), _) => self.columns.push(slot, Cow::Borrowed(text), true),
            (None, Some(_)) => self.columns.append(text),
            (None, None) => self.columns.push(slot, Cow::Borrowed(text), true),
        }
        Some(())
    }

    /// The notes of a cell in their canonical spelling.
    fn notes(&self, start: usize, end: usize, parts: Range<usize>) -> Cow<'a, str> {
        let mut text = String::new();
        let mut from = start;
        for part in self.system.parts.get(parts).unwrap_or_default() {
            let at = part.start as usize;
            if !matches!(part.kind(), PartKind::Note | PartKind::Unplaced) {
                continue;
            }
            if let Some((written, canonical)) = respelt(self.slice(at, end)) {
                text.push_str(self.slice(from, at));
                text.push_str(&canonical);
                from = at + written;
            }
        }
        if from == start {
            return Cow::Borrowed(self.slice(start, end));
        }
        text.push_str(self.slice(from, end));
        Cow::Owned(text)
    }

    /// A chord with the key in front of it.
    fn chord(&self, walk: &mut Walk<'a>, key: &'a str) -> Cow<'a, str> {
        if !key.ends_with(':') {
            return Cow::Borrowed(key);
        }
        let start = after_blanks(walk.row, walk.at);
        walk.at = word_end(walk, start);
        let chord = self.slice(start, walk.at);
        let key = match key_prefix(key.as_bytes()) {
            Some(_) => ascii_signs(key),
            None => Cow::Borrowed(key),
        };
        Cow::Owned(format!("{key} {chord}"))
    }
}

/// Where the word of a row that begins at an offset ends.
fn word_end(walk: &Walk<'_>, start: usize) -> usize {
    if walk.kind == RowKind::Words {
        return syllable_end(walk.row, start);
    }
    let mut at = start;
    while walk.row.get(at).is_some_and(|b| *b != b'|') && blank_at(walk.row, at) == 0 {
        at += 1;
    }
    at
}
