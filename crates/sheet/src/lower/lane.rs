//! A row that states something from cell to cell: harmony, figures.

use std::ops::Range;

use partwright_score::{Time, show_time};

use super::Lowering;
use super::bars::{Fill, GridBar, fill};
use super::flow::Moment;
use super::under::Under;
use crate::span::Span;
use crate::tree::{Part, PartKind};

/// Reads what a part states from its text; the first is a key in front of it.
pub(super) type Stating<T> = fn(Option<&str>, &str) -> Option<T>;

/// A row that states something from cell to cell.
pub(super) struct Lane<T> {
    items: Vec<Item<T>>,
    /// What was stated last could not be read.
    spoilt: bool,
    /// Every key in front of a part, whatever the part is.
    keys: Vec<(Moment, Span)>,
}

struct Item<T> {
    at: Moment,
    span: Span,
    value: Option<T>,
}

impl<T> Default for Lane<T> {
    fn default() -> Lane<T> {
        Lane {
            items: Vec::new(),
            spoilt: false,
            keys: Vec::new(),
        }
    }
}

impl<T> Lane<T> {
    /// A system without a row of this kind states nothing.
    pub(super) fn pause(&mut self, at: Moment) {
        self.spoilt = false;
        if !self.items.is_empty() {
            self.state(at, Span::new(0, 0), None);
        }
    }

    /// Something is stated from a moment on, or nothing.
    fn state(&mut self, at: Moment, span: Span, value: Option<T>) {
        let going_on = self.items.last().is_some_and(|last| last.value.is_none());
        if value.is_none() && going_on {
            return;
        }
        if self.items.is_empty() && at.n > 0 {
            self.items.push(Item {
                at: Moment::of(0),
                span,
                value: None,
            });
        }
        if value.is_some() || self.items.last().is_none_or(|last| last.value.is_some()) {
            self.items.push(Item { at, span, value });
        }
    }

    /// Whether something stands before that a dash can hold.
    fn holds(&self) -> bool {
        self.spoilt || self.items.last().is_some_and(|last| last.value.is_some())
    }

    pub(super) fn row(&mut self, lowering: &mut Lowering<'_>, here: Under<'_>, read: Stating<T>) {
        for (bar, grid) in here.each() {
            let tree = here.tree();
            let cells = tree.cells_of(bar);
            let whole = fill(tree, here.row.kind, bar) == Fill::Whole;
            let full = grid.cells as usize;
            for cell in cells.clone().take(full) {
                self.cell(
                    lowering,
                    here,
                    grid,
                    cell - cells.start,
                    tree.parts_of(cell),
                    read,
                );
            }
            if whole || cells.len() == full {
                continue;
            }
            if cells.len() < full {
                self.spoilt = false;
                let at = grid.moment(cells.len(), 0, 1);
                self.state(at, here.row.label.moved(here.base()), None);
                continue;
            }
            let over = cells.start + full..cells.end;
            let parts = tree.parts_of(over.start).start..tree.parts_of(over.end).start;
            let span = here.span(lowering.text, parts).unwrap_or(Span::new(0, 0));
            let length = Moment::of(grid.cell * over.len() as i64).time();
            let message = format!(
                "The bar is too long by {} of a whole note: it has room for {full} cells.",
                show_time(length)
            );
            lowering.wrong(span, &message, &[]);
        }
    }

    fn cell(
        &mut self,
        lowering: &mut Lowering<'_>,
        here: Under<'_>,
        grid: GridBar,
        cell: usize,
        parts: Range<usize>,
        read: Stating<T>,
    ) {
        let text = lowering.text;
        let list = here.tree().parts.get(parts).unwrap_or_default();
        let key = list.first().filter(|part| part.kind() == PartKind::Key);
        let timed = list.get(usize::from(key.is_some())..).unwrap_or_default();
        let of = timed.len();
        let written = |part: &Part| {
            let span = Span::new((part.start + here.base()) as usize, here.end(text, *part));
            (span, text.get(span.range()).unwrap_or_default())
        };
        if let Some((span, _)) = key.map(written) {
            self.keys.push((grid.moment(cell, 0, 1), span));
        }
        for (index, part) in timed.iter().enumerate() {
            let at = grid.moment(cell, index, of);
            let (span, body) = written(part);
            // A key without its numeral.
            if part.kind() == PartKind::Spoilt && body.ends_with(':') {
                self.keys.push((at, span));
            }
            match part.kind() {
                PartKind::Hold => {
                    if !self.holds() {
                        let message = "A dash goes on with what was stated before it, and nothing \
                                       was: write _.";
                        lowering.wrong(span, message, &["_"]);
                        self.state(at, span, None);
                        self.spoilt = true;
                    }
                }
                PartKind::Text => {
                    let key = key.filter(|_| index == 0).map(written);
                    let start = key.map_or(span.start, |(key, _)| key.start);
                    let value = read(key.map(|(_, key)| key), body);
                    self.state(at, Span { start, ..span }, value);
                    self.spoilt = false;
                }
                PartKind::Spoilt => {
                    self.state(at, span, None);
                    self.spoilt = true;
                }
                _ => {
                    self.state(at, span, None);
                    self.spoilt = false;
                }
            }
        }
    }

    /// The keys in front of parts, taken out.
    pub(super) fn keys(&mut self) -> Vec<(Time, Span)> {
        let keys = std::mem::take(&mut self.keys);
        keys.into_iter().map(|(at, key)| (at.time(), key)).collect()
    }

    pub(super) fn finish<U>(
        self,
        end: Moment,
        make: impl Fn(Time, Time, Span, Option<T>) -> U,
    ) -> Vec<U> {
        let mut items = self.items.into_iter().peekable();
        let mut made = Vec::with_capacity(items.len());
        while let Some(item) = items.next() {
            let until = items.peek().map_or(end, |next| next.at);
            let length = item.at.until(until);
            if *length.numer() > 0 {
                made.push(make(item.at.time(), length, item.span, item.value));
            }
        }
        made
    }
}
