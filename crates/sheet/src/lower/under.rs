//! Words, harmony and figures: the rows under the notes.

use std::ops::Range;

use partwright_score::Pitch;

use super::Lowering;
use super::bars::{GridBar, Plan, SystemPlan, bar_of};
use super::flow::Moment;
use super::lane::Lane;
use super::stated::stated;
use super::words::Singing;
use crate::harmony::{chord, key_prefix, stack};
use crate::lines::RowKind;
use crate::reading::{Figures, Harmony};
use crate::span::Span;
use crate::tree::{Part, Row, System, part_end, syllable_end};

/// Lowers the rows under the notes.
pub(super) fn under(lowering: &mut Lowering<'_>, plan: &Plan) {
    let mut singing = Singing::default();
    let mut harmony = Lane::default();
    let mut figures = Lane::default();
    for system in &plan.systems {
        let start = plan.grid.get(system.first).map_or(0, |bar| bar.onset);
        let rows = &system.placed.system.rows;
        singing.system();
        if !rows.iter().any(|row| row.kind == RowKind::Harmony) {
            harmony.pause(Moment::of(start));
        }
        if !rows.iter().any(|row| row.kind == RowKind::Figures) {
            figures.pause(Moment::of(start));
        }
        for row in rows {
            if row.kind == RowKind::Music {
                continue;
            }
            let here = Under { plan, system, row };
            here.bars(lowering);
            match row.kind {
                RowKind::Words => here.words(lowering, &mut singing),
                RowKind::Harmony => harmony.row(lowering, here, harmony_item),
                RowKind::Figures => figures.row(lowering, here, figures_item),
                RowKind::Music => {}
            }
        }
    }
    let keys = harmony.keys();
    let end = Moment::of(plan.grid.last().map_or(0, |bar| bar.onset));
    lowering.reading.harmony = harmony.finish(end, |at, length, span, value| {
        let (key, chord) = value.map_or((None, None), |(key, chord)| (key, Some(chord)));
        Harmony {
            at,
            length,
            chord,
            key,
            span,
        }
    });
    lowering.reading.figures = figures.finish(end, |at, length, span, value| Figures {
        at,
        length,
        stack: value.unwrap_or_default(),
        span,
    });
    stated(lowering, &keys);
}

/// A row under the notes.
#[derive(Clone, Copy)]
pub(super) struct Under<'p> {
    plan: &'p Plan,
    pub(super) system: &'p SystemPlan,
    pub(super) row: &'p Row,
}

impl<'p> Under<'p> {
    pub(super) fn tree(&self) -> &'p System {
        &self.system.placed.system
    }

    pub(super) fn base(&self) -> u32 {
        self.system.placed.span.start
    }

    /// The bars that stand over music: place in the list, and in time.
    pub(super) fn each(&self) -> impl Iterator<Item = (u32, GridBar)> + use<'p> {
        let Under { plan, system, row } = *self;
        (0..system.bars.min(row.bars.len())).filter_map(move |nth| {
            let bar = bar_of(row, nth)?;
            Some((bar, *plan.grid.get(system.first + nth)?))
        })
    }

    /// From the first to the last of some parts.
    pub(super) fn span(&self, text: &str, parts: Range<usize>) -> Option<Span> {
        let list = self.tree().parts.get(parts)?;
        let (first, last) = (list.first()?, list.last()?);
        let base = self.base();
        let start = (first.start + base) as usize;
        Some(Span::new(start, self.end(text, *last)))
    }

    pub(super) fn end(&self, text: &str, part: Part) -> usize {
        let start = (part.start + self.base()) as usize;
        match self.row.kind {
            RowKind::Words => syllable_end(text.as_bytes(), start),
            _ => part_end(text.as_bytes(), start),
        }
    }

    /// Reports bars beyond those of the music.
    fn bars(&self, lowering: &mut Lowering<'_>) {
        let Some(extra) = bar_of(self.row, self.system.bars) else {
            return;
        };
        let tree = self.tree();
        if self.system.bars == 0 {
            if !self.system.placed.unseparated && !self.system.doubtful {
                let span = self.row.label.moved(self.base());
                let message = "This row stands in a system without notes: its bars go under those \
                               of the music.";
                lowering.wrong(span, message, &[]);
            }
            return;
        }
        let cells = tree.cells_of(extra);
        let parts = tree.parts_of(cells.start).start..tree.parts_of(cells.end).start;
        let line = tree.bars.get(extra as usize).map_or(0, |b| b.line) + self.base();
        let line = Span {
            start: line,
            end: line + 1,
        };
        let span = self.span(lowering.text, parts).unwrap_or(line);
        let message = "This row has more bars than the music above it.";
        lowering.wrong(span, message, &[]);
    }
}

/// The tonic a `D:` names, and whether it is minor.
type Key = (Pitch, bool);

fn harmony_item(key: Option<&str>, part: &str) -> Option<(Option<Key>, crate::Chord)> {
    let key = key.and_then(|key| key_prefix(key.as_bytes()));
    Some((key, chord(part.as_bytes())?))
}

fn figures_item(_: Option<&str>, part: &str) -> Option<Vec<crate::Figure>> {
    stack(part.as_bytes())
}
