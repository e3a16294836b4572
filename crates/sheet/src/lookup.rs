//! From moments to places in the text, and back.

use std::sync::Arc;

use partwright_score::Time;

use crate::lower::bars::{Fill, Plan, SystemPlan, bar_of, fill};
use crate::reading::{Reading, Syllable};
use crate::sheet::Tree;
use crate::span::Span;
use crate::tree::{Row, part_end, unmarked_end};

/// Where everything stands in text and time.
#[derive(Clone, Debug)]
pub(crate) struct Map {
    pub(crate) tree: Arc<Tree>,
    pub(crate) plan: Plan,
    /// The labels of the voices where they are declared.
    pub(crate) declared: Vec<Span>,
}

/// The voice and the moment of a part of a music row, found from its index in its system and from
/// where it stands there; nothing for other rows, and for parts beyond the end of their bar.
pub(crate) fn place(
    plan: &Plan,
    system: &SystemPlan,
    part: usize,
    span: Span,
) -> Option<(usize, Time)> {
    let tree = &system.placed.system;
    let after = tree
        .rows
        .partition_point(|row| row.line.start <= span.start);
    let index = after.checked_sub(1)?;
    let row = tree.rows.get(index)?;
    let here = |(row, _): &&(u32, u8)| *row as usize == index;
    let voice = usize::from(system.rows.iter().find(here)?.1);
    let cell = tree
        .cells
        .partition_point(|first| *first as usize <= part)
        .checked_sub(1)?;
    let bar = tree
        .bars
        .partition_point(|bar| bar.cells as usize <= cell)
        .checked_sub(1)?;
    let bar = crate::system::small(bar);
    if !row.bars.contains(&bar) || part >= tree.parts.len() {
        return None;
    }
    let nth = (bar - row.bars.start) as usize;
    // Behind a bar line left out nobody knows.
    if system.lost_at(index as u32).is_some_and(|lost| nth > lost) {
        return None;
    }
    let grid = plan.grid.get(system.first + nth)?;
    if fill(tree, row.kind, bar) == Fill::Whole {
        return Some((voice, grid.moment(0, 0, 1).time()));
    }
    let cell_in_bar = cell - tree.cells_of(bar).start;
    if cell_in_bar >= grid.cells as usize {
        return None;
    }
    let parts = tree.parts_of(cell);
    let moment = grid.moment(cell_in_bar, part - parts.start, parts.len());
    Some((voice, moment.time()))
}

/// A bar line in the text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct BarLine {
    /// The bar of the score, by index.
    pub bar: usize,
    /// It stands in front of that bar, at the beginning of its row.
    pub opens: bool,
    /// Where it stands.
    pub span: Span,
}

impl Map {
    /// The system that holds a bar of the score.
    fn system(&self, bar: usize) -> Option<&SystemPlan> {
        let systems = &self.plan.systems;
        let after = systems.partition_point(|system| system.first <= bar);
        systems.get(after.checked_sub(1)?)
    }

    /// The system whose lines hold an offset.
    fn system_around(&self, offset: usize) -> Option<&SystemPlan> {
        let systems = &self.plan.systems;
        let after = systems.partition_point(|s| s.placed.span.start as usize <= offset);
        let found = systems.get(after.checked_sub(1)?)?;
        (offset <= found.placed.span.end as usize).then_some(found)
    }

    fn row<'m>(&self, system: &'m SystemPlan, voice: usize) -> Option<&'m Row> {
        let mut rows = system.rows.iter();
        let (row, _) = rows.find(|(_, of)| usize::from(*of) == voice)?;
        system.placed.system.rows.get(*row as usize)
    }
}

impl Reading {
    /// The part written at a moment in a voice, without its marks: the part that covers it (a `-`
    /// if the note is held, the whole `=S` in a copied bar); `None` where nothing is written.
    #[must_use]
    pub fn span_at(&self, voice: usize, at: Time) -> Option<Span> {
        if at >= self.score.end() {
            return None;
        }
        let bar = self.score.bar_at(at)?;
        let system = self.map.system(bar)?;
        let row = self.map.row(system, voice)?;
        let tree = &system.placed.system;
        let nth = bar - system.first;
        // Behind a bar line left out nobody knows.
        let behind = |row: &(u32, u8)| system.lost_at(row.0).is_some_and(|lost| nth > lost);
        let mut rows = system.rows.iter();
        if rows.any(|row| usize::from(row.1) == voice && behind(row)) {
            return None;
        }
        let index = bar_of(row, nth)?;
        let cells = tree.cells_of(index);
        let part = if fill(tree, row.kind, index) == Fill::Whole {
            tree.parts_of(cells.start).start
        } else {
            let bar = self.score.bars.get(bar)?;
            let cell_length = self.score.metres.get(bar.metre as usize)?.cell();
            let into = (at - bar.onset) / cell_length;
            let cell = cells.start + usize::try_from(into.to_integer()).ok()?;
            if !cells.contains(&cell) {
                return None;
            }
            let parts = tree.parts_of(cell);
            let share = into.fract() * i64::try_from(parts.len()).ok()?;
            parts.start + usize::try_from(share.to_integer()).ok()?
        };
        let start = (tree.parts.get(part)?.start + system.placed.span.start) as usize;
        let text = self.map.tree.text.as_bytes();
        Some(Span::new(start, unmarked_end(text, start)))
    }

    /// The part that strikes a note, without its marks.
    #[must_use]
    pub fn span_of_note(&self, voice: usize, note: usize) -> Option<Span> {
        let note = self.score.voices.get(voice)?.notes.get(note)?;
        self.span_at(voice, note.onset)
    }

    /// The voice and the moment of the part under a byte offset; the end of a part, its marks
    /// included, counts as under it.
    #[must_use]
    pub fn at_offset(&self, offset: usize) -> Option<(usize, Time)> {
        let system = self.map.system_around(offset)?;
        let tree = &system.placed.system;
        let base = system.placed.span.start;
        let within = u32::try_from(offset).ok()?.checked_sub(base)?;
        let after = tree.parts.partition_point(|part| part.start <= within);
        let index = after.checked_sub(1)?;
        let part = tree.parts.get(index)?;
        let start = (part.start + base) as usize;
        let end = part_end(self.map.tree.text.as_bytes(), start);
        let span = Span {
            start: part.start,
            end: part.start,
        };
        (offset <= end)
            .then(|| place(&self.map.plan, system, index, span))
            .flatten()
    }

    /// The bar line at an offset, with the bar it closes or, at the beginning of a row, opens.
    #[must_use]
    pub fn bar_line_at(&self, offset: usize) -> Option<BarLine> {
        let system = self.map.system_around(offset)?;
        let tree = &system.placed.system;
        let base = system.placed.span.start;
        let within = u32::try_from(offset).ok()?.checked_sub(base)?;
        let after = tree.rows.partition_point(|row| row.line.start <= within);
        let index = after.checked_sub(1)?;
        let row = tree.rows.get(index)?;
        let bars = tree
            .bars
            .get(row.bars.start as usize..row.bars.end as usize)?;
        let nth = bars.partition_point(|bar| bar.line <= within);
        let (start, bar, opens) = match nth.checked_sub(1) {
            Some(bar) => (bars.get(bar)?.line, bar, false),
            None => (row.opening.start, 0, true),
        };
        let text = self.map.tree.text.as_bytes();
        let start = (start + base) as usize;
        let strokes = text.get(start..)?.iter().take_while(|b| **b == b'|');
        let end = start + strokes.count();
        let known = bar < system.bars && system.lost_at(index as u32).is_none_or(|lost| bar < lost);
        (known && start <= offset && offset < end).then(|| BarLine {
            bar: system.first + bar,
            opens,
            span: Span::new(start, end),
        })
    }

    /// The whole lines of the system around an offset, from its first row to its last.
    #[must_use]
    pub fn system_at(&self, offset: usize) -> Option<Span> {
        self.map.system_around(offset).map(|s| s.placed.span)
    }

    /// The label of the voice's row in the system that holds a moment.
    #[must_use]
    pub fn label_span(&self, voice: usize, at: Time) -> Option<Span> {
        let system = self.map.system(self.score.bar_at(at)?)?;
        let row = self.map.row(system, voice)?;
        Some(row.label.moved(system.placed.span.start))
    }

    /// Where the voice is declared: the label in its `voice` line, or in the first system.
    #[must_use]
    pub fn declaration(&self, voice: usize) -> Option<Span> {
        self.map.declared.get(voice).copied()
    }

    /// The text of a syllable, escapes resolved, `~` as a blank.
    #[must_use]
    pub fn syllable(&self, syllable: Syllable) -> String {
        let written = self.map.tree.text.get(syllable.span.range());
        let mut out = String::new();
        let mut chars = written.unwrap_or_default().chars();
        while let Some(c) = chars.next() {
            match c {
                '\\' => out.extend(chars.next()),
                '~' => out.push(' '),
                c => out.push(c),
            }
        }
        out
    }
}
