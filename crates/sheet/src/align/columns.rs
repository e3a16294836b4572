//! Columns: which display column each thing of a system stands in.

use std::borrow::Cow;
use std::ops::Range;

use super::SetLine;
use super::display::{blanks, width};
use crate::Span;

/// A cell, a bar line or what else stands in a column of its own.
pub(super) struct Item<'a> {
    /// Place in the order of columns: things of one slot begin in one display column.
    slot: u32,
    /// The row it stands in, among those that are set.
    row: u32,
    text: Cow<'a, str>,
    width: usize,
    /// It may reach over the columns behind: what fills its bar alone, and syllables.
    reaches: bool,
    /// Its display column.
    at: usize,
}

/// A row that is set.
pub(super) struct SetRow<'a> {
    /// Its line in the text of the system.
    pub(super) line: Span,
    /// What stands in front of its first bar line.
    pub(super) label: Cow<'a, str>,
    /// Its items, by index.
    pub(super) items: Range<usize>,
    /// The comment at its end.
    pub(super) comment: Option<Span>,
}

/// The rows of a system on their way into columns.
#[derive(Default)]
pub(super) struct Columns<'a> {
    pub(super) rows: Vec<SetRow<'a>>,
    items: Vec<Item<'a>>,
}

impl<'a> Columns<'a> {
    /// How many items there are.
    pub(super) fn len(&self) -> usize {
        self.items.len()
    }

    /// Takes items back.
    pub(super) fn truncate(&mut self, items: usize) {
        self.items.truncate(items);
    }

    /// Adds something to the row that comes next.
    pub(super) fn push(&mut self, slot: u32, text: Cow<'a, str>, reaches: bool) {
        self.items.push(Item {
            slot,
            row: crate::system::small(self.rows.len()),
            width: width(&text),
            text,
            reaches,
            at: 0,
        });
    }

    /// The slot of the last item.
    pub(super) fn last_slot(&self) -> u32 {
        self.items.last().map_or(0, |item| item.slot)
    }

    /// Adds something to the last item, behind a blank.
    pub(super) fn append(&mut self, text: &str) {
        if let Some(item) = self.items.last_mut() {
            let own = item.text.to_mut();
            own.push(' ');
            own.push_str(text);
            item.width += 1 + width(text);
        }
    }

    /// The lines of the rows; nothing if together they would take more than `most` bytes.
    pub(super) fn lines(mut self, most: usize) -> Option<Vec<SetLine>> {
        let labels = self.rows.iter().map(|row| width(&row.label));
        let labels = labels.max().unwrap_or(0);
        place(&mut self.items, self.rows.len(), labels);
        let mut left = most;
        let mut lines = Vec::with_capacity(self.rows.len());
        for row in &self.rows {
            let items = self.items.get(row.items.clone()).unwrap_or_default();
            let ends = items.iter().map(|item| item.at + item.width);
            let ends = std::iter::once(width(&row.label)).chain(ends);
            let gaps = items
                .iter()
                .zip(ends)
                .map(|(item, end)| item.at.saturating_sub(end));
            let words = items.iter().map(|item| item.text.len());
            let length = row.label.len() + gaps.clone().sum::<usize>() + words.sum::<usize>();
            left = left.checked_sub(length)?;
            let mut text = String::with_capacity(length);
            text.push_str(&row.label);
            for (item, gap) in items.iter().zip(gaps) {
                blanks(&mut text, gap);
                text.push_str(&item.text);
            }
            lines.push(SetLine {
                line: row.line,
                text,
                comment: row.comment,
            });
        }
        Some(lines)
    }
}

/// Gives each item its display column: one blank behind what stands before it in its own row, and
/// behind the columns before.
fn place(items: &mut [Item<'_>], rows: usize, labels: usize) {
    let mut order: Vec<(u32, usize)> = items.iter().map(|item| item.slot).zip(0..).collect();
    // Each row is sorted already: this merges them.
    order.sort_by_key(|(slot, _)| *slot);
    let mut ends = vec![labels; rows];
    let mut columns_end = labels;
    for group in order.chunk_by(|a, b| a.0 == b.0) {
        let rows_end = group.iter().filter_map(|(_, index)| {
            let row = items.get(*index)?.row;
            ends.get(row as usize).copied()
        });
        let at = 1 + rows_end.fold(columns_end, usize::max);
        for (_, index) in group {
            let Some(item) = items.get_mut(*index) else {
                continue;
            };
            item.at = at;
            let end = at + item.width;
            if !item.reaches {
                columns_end = columns_end.max(end);
            }
            if let Some(row) = ends.get_mut(item.row as usize) {
                *row = end;
            }
        }
    }
}
