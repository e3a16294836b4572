//! Which bars there are: how long each is, its number, and where sections close.

use partwright_score::{Bar, Change, MOST_VOICES, Metre, ZERO};

use super::flow::{GRID, Moment};
use super::head::{Event, Outline};
use super::{Lowering, insertion};
use crate::lines::RowKind;
use crate::problem::Problem;
use crate::reading::{ChangeLine, Changed};
use crate::sheet::Placed;
use crate::span::Span;
use crate::system::problem;
use crate::tree::{COPIED, DOUBLE, OPEN, PartKind, Row, RowBar, System, THROUGHOUT};

/// The systems with their bars.
#[derive(Clone, Debug, Default)]
pub(crate) struct Plan {
    pub(crate) systems: Vec<SystemPlan>,
    /// Bars in 64ths of a whole note, one more than there are: the last is the end.
    pub(crate) grid: Vec<GridBar>,
}

/// A bar in 64ths of a whole note.
#[derive(Clone, Copy, Debug)]
pub(crate) struct GridBar {
    pub(crate) onset: i64,
    /// Length of a cell.
    pub(crate) cell: i64,
    /// How many cells it has.
    pub(crate) cells: u32,
}

/// A system and whose its rows are.
#[derive(Clone, Debug)]
pub(crate) struct SystemPlan {
    pub(crate) placed: Placed,
    /// Music rows (by index) with their voices.
    pub(crate) rows: Vec<(u32, u8)>,
    /// Its first bar in the score, and how many it has.
    pub(crate) first: usize,
    pub(crate) bars: usize,
    /// A row or a line of it could not be read: its silent voices are unknown.
    pub(crate) doubtful: bool,
    /// Rows (by index) that lost a bar line, each with the bar of the system in which it did: what
    /// follows stands under other bars than it was written for.
    pub(crate) lost: Vec<(u32, usize)>,
}

/// What fills a bar of one row.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Fill {
    /// Nothing.
    Empty,
    /// One thing throughout, however long the bar is.
    Whole,
    /// So many cells.
    Cells(u32),
}

/// What fills a bar of a row of that kind.
pub(crate) fn fill(system: &System, kind: RowKind, bar: u32) -> Fill {
    let cells = system.cells_of(bar);
    let flags = system.bars.get(bar as usize).map_or(0, |b| b.flags);
    if flags & COPIED != 0 {
        return Fill::Whole;
    }
    match cells.len() {
        0 => Fill::Empty,
        1 => {
            let parts = system.parts.get(system.parts_of(cells.start));
            let bare = match parts {
                Some([only]) => match only.kind() {
                    PartKind::Hold | PartKind::Rest => true,
                    PartKind::Unwritten => kind == RowKind::Music,
                    PartKind::Spoilt => only.flags & THROUGHOUT != 0,
                    _ => false,
                },
                _ => false,
            };
            if bare { Fill::Whole } else { Fill::Cells(1) }
        }
        n => Fill::Cells(crate::system::small(n)),
    }
}

/// A bar before its length is settled.
#[derive(Clone, Copy, Debug, Default)]
struct Sketch {
    /// Bar lines that end it, and the double ones among them.
    lines: u32,
    doubles: u32,
    /// Cells of its longest row, leaving out rows that one thing fills.
    longest: u32,
    metre: u32,
    closes: bool,
    /// A change of metre stands right before it.
    changed: bool,
}

/// Settles the bars: fills in the score's bars, metres and keys.
pub(super) fn bars<'a>(lowering: &mut Lowering<'a>, outline: &Outline<'a>) -> Plan {
    let mut systems = Vec::new();
    let mut sketches: Vec<Sketch> = Vec::new();
    let first = lowering.reading.head.metre.as_ref();
    let mut metres = vec![first.map_or_else(Metre::free, |m| m.value.clone())];
    let mut changes = Vec::new();
    let mut changed = false;
    for event in &outline.events {
        match event {
            Event::Change(what, span) => {
                if let Changed::Metre(metre) = what {
                    changed = true;
                    if metres.last() != Some(metre) {
                        metres.push(metre.clone());
                    }
                }
                changes.push((sketches.len(), what, *span));
            }
            Event::System(placed) => {
                let mut plan = lowering.system(placed, sketches.len());
                plan.lose(metres.last().and_then(Metre::cells));
                let sketch = Sketch {
                    metre: crate::system::small(metres.len() - 1),
                    ..Sketch::default()
                };
                sketches.resize(plan.first + plan.bars, sketch);
                let own = sketches.get_mut(plan.first..).unwrap_or_default();
                if let Some(first) = own.first_mut() {
                    first.changed = std::mem::take(&mut changed);
                }
                lengths(&plan, own);
                lowering.sections(&plan, own);
                systems.push(plan);
            }
        }
    }
    let score = &mut lowering.reading.score;
    let grid = settle(&sketches, &metres, &mut score.bars);
    score.metres = metres;
    for (bar, what, span) in changes {
        let Some(bar) = score.bars.get(bar) else {
            continue;
        };
        if let Changed::Key(key) = what {
            score.keys.push(Change {
                from: bar.onset,
                value: *key,
            });
        }
        lowering.reading.changes.push(ChangeLine {
            bar: bar.number,
            at: bar.onset,
            what: what.clone(),
            span,
        });
    }
    Plan { systems, grid }
}

impl SystemPlan {
    /// Finds the rows that lost a bar line: a bar of theirs is too long, and they have fewer bars
    /// than the other rows.
    fn lose(&mut self, full: Option<usize>) {
        let Some(full) = full.and_then(|full| u32::try_from(full).ok()) else {
            return;
        };
        let system = &self.placed.system;
        for (index, _) in &self.rows {
            let Some(row) = system.rows.get(*index as usize) else {
                continue;
            };
            let long =
                |bar: u32| matches!(fill(system, RowKind::Music, bar), Fill::Cells(n) if n > full);
            if row.bars.len() < self.bars
                && let Some(bar) = row.bars.clone().position(long)
            {
                self.lost.push((*index, bar));
            }
        }
    }

    /// The bar in which a row lost a bar line.
    pub(crate) fn lost_at(&self, row: u32) -> Option<usize> {
        let mut lost = self.lost.iter();
        lost.find(|(lost, _)| *lost == row).map(|(_, bar)| *bar)
    }
}

/// How many cells the longest row has, bar by bar.
fn lengths(plan: &SystemPlan, sketches: &mut [Sketch]) {
    let system = &plan.placed.system;
    for (row, _) in &plan.rows {
        let bars = system.rows.get(*row as usize).map(|row| row.bars.clone());
        let kept = plan.lost_at(*row).unwrap_or(usize::MAX);
        let bars = bars.into_iter().flatten().take(kept);
        for (bar, sketch) in bars.zip(&mut *sketches) {
            if let Fill::Cells(n) = fill(system, RowKind::Music, bar) {
                sketch.longest = sketch.longest.max(n);
            }
        }
    }
}

/// A row's bar by its place in the system.
pub(crate) fn bar_of(row: &Row, bar: usize) -> Option<u32> {
    let at = row.bars.start + crate::system::small(bar);
    (at < row.bars.end).then_some(at)
}

/// Lengths and numbers of bars.
fn settle(sketches: &[Sketch], metres: &[Metre], bars: &mut Vec<Bar>) -> Vec<GridBar> {
    let mut grid = Vec::with_capacity(sketches.len() + 1);
    bars.reserve(sketches.len());
    let mut onset = 0;
    let mut number = 0;
    // Cells of the first half of a split bar, while its second half is awaited.
    let mut half = None;
    for (i, sketch) in sketches.iter().enumerate() {
        let metre = metres.get(sketch.metre as usize);
        let cell_time = metre.map_or(ZERO, Metre::cell);
        let cell = cell_time.numer() * GRID / cell_time.denom();
        let next = sketches.get(i + 1);
        let begins = i == 0 || sketches.get(i - 1).is_some_and(|before| before.closes);
        let mut lead = 0;
        let mut counts = true;
        let cells = match metre.and_then(Metre::cells) {
            None => sketch.longest.max(1),
            Some(full) => {
                let full = crate::system::small(full);
                let is_short = |s: &Sketch| s.longest > 0 && s.longest < full;
                let joined = next.filter(|next| {
                    sketch.closes
                        && is_short(next)
                        && !next.changed
                        && sketch.longest + next.longest == full
                });
                if let Some(first) = half.take() {
                    lead = first;
                    counts = false;
                    sketch.longest
                } else if !is_short(sketch) {
                    full
                } else if joined.is_some() {
                    half = Some(sketch.longest);
                    sketch.longest
                } else if begins && next.is_some() {
                    lead = full - sketch.longest;
                    counts = i > 0;
                    sketch.longest
                } else if sketch.closes || (next.is_none() && !begins) {
                    sketch.longest
                } else {
                    full
                }
            }
        };
        number += u32::from(counts);
        bars.push(Bar {
            number,
            onset: Moment::of(onset).time(),
            length: Moment::of(cell * i64::from(cells)).time(),
            lead: Moment::of(cell * i64::from(lead)).time(),
            metre: sketch.metre,
            section_end: sketch.closes,
        });
        grid.push(GridBar { onset, cell, cells });
        onset += cell * i64::from(cells);
    }
    grid.push(GridBar {
        onset,
        cell: GRID / 4,
        cells: 0,
    });
    grid
}

impl<'a> Lowering<'a> {
    /// Finds whose the rows of a system are, and reports those that are nobody's.
    fn system(&mut self, placed: &'a Placed, first: usize) -> SystemPlan {
        let system = &placed.system;
        if placed.unseparated
            && let Some(row) = system.rows.first()
        {
            let span = row.label.moved(placed.span.start);
            let end = self.line_end;
            let message =
                "A second row of this name begins a new system: a blank line goes before it.";
            let offer = insertion(placed.span.start, end, "Put a blank line before it");
            self.reading.problems.push(Problem {
                offers: vec![offer],
                ..problem(span, message.to_owned(), &[])
            });
        }
        let mut plan = SystemPlan {
            placed: placed.clone(),
            rows: Vec::with_capacity(system.rows.len()),
            first,
            bars: 0,
            doubtful: placed.flawed,
            lost: Vec::new(),
        };
        let (mut nobodys, mut again) = (Vec::new(), Vec::new());
        let mut present = [false; MOST_VOICES];
        for (index, row) in system.rows.iter().enumerate() {
            if row.kind != RowKind::Music {
                continue;
            }
            let label = self.at(row.label.moved(placed.span.start));
            match self.labels.get(label) {
                Some(&voice) => match present.get_mut(voice) {
                    Some(true) => again.push((index, row)),
                    here => {
                        plan.rows.push((index as u32, voice as u8));
                        here.into_iter().for_each(|here| *here = true);
                    }
                },
                None => nobodys.push((index, row, label)),
            }
        }
        for (index, row, label) in nobodys {
            self.nobodys(&mut plan, &mut present, index, row, label);
        }
        for (order, (index, row)) in again.into_iter().enumerate() {
            self.again(&mut plan, &mut present, index, row, order == 0);
        }
        plan.rows.sort_unstable();
        let rows = plan
            .rows
            .iter()
            .filter_map(|(row, _)| system.rows.get(*row as usize));
        plan.bars = rows.map(|row| row.bars.len()).max().unwrap_or(0);
        plan
    }

    /// Footnote marks of a row that is not read are not idle for that.
    pub(super) fn stray_marks(&mut self, placed: &Placed, row: u32) {
        for part in super::music::parts_of(placed, row) {
            let names = super::music::mark_names(self.text, placed, part);
            self.stray_marks
                .extend(names.map(|(name, _)| name.to_owned()));
        }
    }

    /// Finds where sections close: most of the rows say so. The others are reported.
    fn sections(&mut self, plan: &SystemPlan, sketches: &mut [Sketch]) {
        let system = &plan.placed.system;
        let lines = |index: usize, row: &Row| {
            let bars = system
                .bars
                .get(row.bars.start as usize..row.bars.end as usize);
            let kept = plan.lost_at(index as u32).unwrap_or(usize::MAX);
            bars.unwrap_or_default().iter().take(kept)
        };
        let ended = |line: &RowBar| line.flags & OPEN == 0;
        let double = |line: &RowBar| line.flags & DOUBLE != 0;
        for (index, row) in system.rows.iter().enumerate() {
            for (line, sketch) in lines(index, row).zip(&mut *sketches) {
                sketch.lines += u32::from(ended(line));
                sketch.doubles += u32::from(ended(line) && double(line));
            }
        }
        let mut split = false;
        for sketch in &mut *sketches {
            sketch.closes = sketch.doubles > 0 && sketch.doubles * 2 >= sketch.lines;
            split |= sketch.doubles > 0 && sketch.doubles < sketch.lines;
        }
        if !split {
            return;
        }
        for (index, row) in system.rows.iter().enumerate() {
            let voice = plan.rows.iter().find(|(row, _)| *row as usize == index);
            for (line, sketch) in lines(index, row).zip(&*sketches) {
                if !ended(line) || double(line) == sketch.closes {
                    continue;
                }
                let start = line.line + plan.placed.span.start;
                let (strokes, message, instead) = if sketch.closes {
                    (1, "The other rows close a section here: write ||.", "||")
                } else {
                    (2, "The other rows close no section here: write |.", "|")
                };
                let span = Span {
                    start,
                    end: start + strokes,
                };
                self.reading.problems.push(Problem {
                    voice: voice.map(|(_, voice)| usize::from(*voice)),
                    ..problem(span, message.to_owned(), &[instead])
                });
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn settled(lengths: &[(u32, bool)]) -> Vec<String> {
        let sketches: Vec<Sketch> = lengths
            .iter()
            .map(|&(longest, closes)| Sketch {
                longest,
                closes,
                ..Sketch::default()
            })
            .collect();
        let metres = [Metre::new(4, 4, None, &[]).unwrap()];
        let mut bars = Vec::new();
        let grid = settle(&sketches, &metres, &mut bars);
        let show = |(bar, at): (&Bar, &GridBar)| {
            let lead = bar.lead * 4;
            format!("{}:{}+{}", bar.number, at.cells, lead)
        };
        bars.iter().zip(&grid).map(show).collect()
    }

    #[test]
    fn pickups_closing_bars_and_split_bars() {
        assert_eq!(
            settled(&[(1, false), (4, false), (3, true)]),
            ["0:1+3", "1:4+0", "2:3+0"]
        );
        assert_eq!(
            settled(&[(4, false), (3, true), (1, false), (4, true)]),
            ["1:4+0", "2:3+0", "2:1+3", "3:4+0"]
        );
        assert_eq!(
            settled(&[(2, true), (2, false), (4, false)]),
            ["1:2+0", "1:2+2", "2:4+0"]
        );
        assert_eq!(
            settled(&[(4, true), (1, false), (4, false)]),
            ["1:4+0", "2:1+3", "3:4+0"]
        );
        assert_eq!(settled(&[(2, false)]), ["1:4+0"]);
        assert_eq!(settled(&[(2, true)]), ["1:2+0"]);
        assert_eq!(settled(&[(4, false), (2, false)]), ["1:4+0", "2:2+0"]);
        assert_eq!(
            settled(&[(4, false), (2, false), (4, false)]),
            ["1:4+0", "2:4+0", "3:4+0"]
        );
        assert_eq!(settled(&[(0, false), (0, false)]), ["1:4+0", "2:4+0"]);
    }
}
