//! The notes: every part of every music row, in the order of time.

use std::ops::Range;

use partwright_score::{MOST_VOICES, Pitch, Sound};

use super::bars::{Fill, GridBar, Plan, SystemPlan, bar_of, fill};
use super::flow::{Flow, Moment};
use super::{Lowering, copies, remark};
use crate::chars::is_blank;
use crate::lines::RowKind;
use crate::problem::{Problem, ProblemKind};
use crate::reading::Mark;
use crate::sheet::Placed;
use crate::span::Span;
use crate::system::is_copied;
use crate::tree::{
    BREATH, DOUBLE, FERMATA, MARKED, OPEN, Part, PartKind, Row, RowBar, part_end, unmarked_end,
};

/// Hints about silent voices beyond these are summed up in one: a sheet of thousands of systems
/// in which dozens of voices are silent would drown in them.
const MOST_SILENT: usize = 10_000;

/// Lowers the music rows: fills the voices' notes, the marks, and what is wrong with parts.
pub(super) fn music(lowering: &mut Lowering<'_>, plan: &Plan) {
    let voices = lowering.reading.score.voices.len();
    let mut room = vec![0; voices];
    for system in &plan.systems {
        for (row, voice) in &system.rows {
            if let Some(room) = room.get_mut(usize::from(*voice)) {
                *room += parts_of(&system.placed, *row).len();
            }
        }
    }
    let mut pass = Pass {
        lowering,
        plan,
        flows: room.into_iter().map(Flow::with_room).collect(),
        silent: 0,
        budget: copies::MOST_COPIED,
    };
    for system in &plan.systems {
        pass.slips(system);
        pass.system(system);
    }
    pass.finish();
}

/// One pass over the music.
pub(super) struct Pass<'p, 'a> {
    pub(super) lowering: &'p mut Lowering<'a>,
    pub(super) plan: &'p Plan,
    pub(super) flows: Vec<Flow>,
    /// Silent voices told so far.
    silent: usize,
    /// Notes that may still be copied.
    pub(super) budget: usize,
}

/// A bar of a row, on its way.
#[derive(Clone, Copy)]
pub(super) struct Here<'s> {
    pub(super) placed: &'s Placed,
    pub(super) row: &'s Row,
    pub(super) voice: usize,
    /// The bar in its system's list, and its own line.
    pub(super) bar: u32,
    pub(super) line: RowBar,
    pub(super) grid: GridBar,
    /// A bar line is missing in it.
    pub(super) lost: bool,
}

impl GridBar {
    /// Where it begins.
    pub(super) fn start(&self) -> Moment {
        Moment::of(self.onset)
    }

    /// Where it ends.
    pub(super) fn end(&self) -> Moment {
        Moment::of(self.onset + self.cell * i64::from(self.cells))
    }

    /// Where part `index` of `of` of a cell begins.
    pub(crate) fn moment(&self, cell: usize, index: usize, of: usize) -> Moment {
        let of = (of as i64).max(1);
        let at = self.onset + self.cell * cell as i64;
        Moment {
            n: at * of + self.cell * index as i64,
            d: super::flow::GRID * of,
        }
    }
}

impl<'a> Pass<'_, 'a> {
    fn grid(&self, bar: usize) -> GridBar {
        let none = GridBar {
            onset: 0,
            cell: 1,
            cells: 0,
        };
        self.plan.grid.get(bar).copied().unwrap_or(none)
    }

    fn system(&mut self, system: &SystemPlan) {
        let start = self.grid(system.first).start();
        self.absent(system, start);
        // Whether the time just before, in this row, is not written and was told.
        let mut dry = vec![false; system.rows.len()];
        for bar in 0..system.bars {
            let grid = self.grid(system.first + bar);
            let mut copies = false;
            for ((row, voice), dry) in system.rows.iter().zip(&mut dry) {
                let lost = system.lost_at(*row);
                let Some(row) = system.placed.system.rows.get(*row as usize) else {
                    continue;
                };
                let voice = usize::from(*voice);
                if lost.is_some_and(|lost| bar > lost) {
                    continue;
                }
                let Some((index, line)) = bar_of(row, bar).and_then(|i| {
                    let line = system.placed.system.bars.get(i as usize)?;
                    Some((i, *line))
                }) else {
                    if bar == row.bars.len() {
                        self.missing(&system.placed, row, voice, grid, dry);
                    }
                    continue;
                };
                let here = Here {
                    placed: &system.placed,
                    row,
                    voice,
                    bar: index,
                    line,
                    grid,
                    lost: lost == Some(bar),
                };
                if is_copied(line.flags) {
                    copies = true;
                    *dry = false;
                } else {
                    self.bar(here, dry);
                }
                if lost == Some(bar) {
                    self.lost(here);
                }
            }
            if copies {
                copies::copies(self, system, bar, grid);
            }
        }
    }

    /// Voices without a row: silent, or unknown where a row could not be read.
    fn absent(&mut self, system: &SystemPlan, start: Moment) {
        let mut present = [false; MOST_VOICES];
        for (_, voice) in &system.rows {
            if let Some(here) = present.get_mut(usize::from(*voice)) {
                *here = true;
            }
        }
        let told = !system.doubtful && !system.rows.is_empty() && !self.is_in_work(system);
        let mut silent: Vec<usize> = Vec::new();
        for (voice, flow) in self.flows.iter_mut().enumerate() {
            if present.get(voice) == Some(&true) || system.bars == 0 && !told {
                continue;
            }
            let sound = if system.doubtful {
                Sound::Spoilt
            } else {
                Sound::Rest
            };
            flow.turn(start, sound, None);
            silent.push(voice);
        }
        let first = system.placed.system.rows.first();
        let (true, Some(first), Some(&voice)) = (told, first, silent.first()) else {
            return;
        };
        self.silent += 1;
        if self.silent > MOST_SILENT {
            return;
        }
        // One word for all of them: a system begun with its first row is not three mistakes.
        let names: Vec<String> = silent.iter().map(|&v| self.lowering.called(v)).collect();
        let message = match names.as_slice() {
            [name] => format!(
                "{name} is silent in this system: it has no row here. If it only rests, a row of _ \
                 says so."
            ),
            [first, others @ ..] => {
                let small = |name: &String| name.replacen("The ", "the ", 1);
                let mut others: Vec<String> = others.iter().map(small).collect();
                let last = others.pop().unwrap_or_default();
                others.insert(0, first.clone());
                format!(
                    "{} and {last} are silent in this system: they have no rows here. If they \
                     only rest, rows of _ say so.",
                    others.join(", ")
                )
            }
            [] => return,
        };
        let span = first.label.moved(system.placed.span.start);
        self.lowering.reading.problems.push(Problem {
            voice: Some(voice),
            at: Some(start.time()),
            ..remark(ProblemKind::VoiceSilent, span, &message)
        });
    }

    /// The system stands at the end of the text and closes no section: rows may still come.
    fn is_in_work(&self, system: &SystemPlan) -> bool {
        let placed = &system.placed;
        let behind = self.lowering.text.get(placed.span.end as usize..);
        let last = behind.is_some_and(|behind| behind.trim().is_empty());
        let lines = &placed.system.bars;
        last && !lines.iter().any(|line| line.flags & DOUBLE != 0)
    }

    /// The bars a row does not have.
    fn missing(&mut self, placed: &Placed, row: &Row, voice: usize, grid: GridBar, dry: &mut bool) {
        let last = row
            .bars
            .end
            .checked_sub(1)
            .filter(|last| *last >= row.bars.start);
        let line = last.and_then(|last| placed.system.bars.get(last as usize));
        let span = match line {
            Some(line) if line.flags & OPEN == 0 => bar_line(self.lowering.text, placed, line),
            // The row has no bar line at its end, and that was told.
            Some(_) => return self.flows_turn(voice, grid.start(), Sound::Unwritten),
            None => row.opening.moved(placed.span.start),
        };
        self.unwritten(voice, grid.start(), span, dry);
    }

    fn flows_turn(&mut self, voice: usize, at: Moment, sound: Sound) {
        if let Some(flow) = self.flows.get_mut(voice) {
            flow.turn(at, sound, None);
        }
    }

    /// Time not written from a moment on; told once for a run of it.
    fn unwritten(&mut self, voice: usize, at: Moment, span: Span, dry: &mut bool) {
        self.flows_turn(voice, at, Sound::Unwritten);
        if !std::mem::replace(dry, true) {
            let message = "Not written yet from here on: notes, - or _ are awaited.";
            self.lowering.reading.problems.push(Problem {
                voice: Some(voice),
                at: Some(at.time()),
                ..remark(ProblemKind::Unwritten, span, message)
            });
        }
    }

    /// A bar line is missing in this bar: the rest of the row is unknown, and what is wrong with it
    /// is not told. Its marks are not idle for that.
    fn lost(&mut self, here: Here<'_>) {
        self.flows_turn(here.voice, here.grid.end(), Sound::Spoilt);
        let system = &here.placed.system;
        let first = |bar: u32| system.parts_of(system.cells_of(bar).start).start;
        for part in first(here.bar + 1)..first(here.row.bars.end) {
            let names = mark_names(self.lowering.text, here.placed, part);
            let names = names.map(|(name, _)| name.to_owned());
            self.lowering.stray_marks.extend(names);
        }
    }

    /// One bar of one row.
    fn bar(&mut self, here: Here<'_>, dry: &mut bool) {
        let system = &here.placed.system;
        let cells = system.cells_of(here.bar);
        let whole = fill(system, RowKind::Music, here.bar) == Fill::Whole;
        let full = here.grid.cells as usize;
        let given = cells.len();
        let first = cells.start;
        for cell in cells.clone().take(full) {
            let parts = system.parts_of(cell);
            let of = parts.len();
            for (index, part) in system
                .parts
                .get(parts.clone())
                .into_iter()
                .flatten()
                .enumerate()
            {
                let at = here.grid.moment(cell - first, index, of);
                self.part(here, parts.start + index, *part, at, dry);
            }
        }
        if whole || given == full {
            return;
        }
        if given > full {
            self.too_long(here, first + full..cells.end);
        } else if here.line.flags & OPEN != 0 {
            // The bar line is missing, and that was told: the rest is only not written.
            let at = here.grid.moment(given, 0, 1);
            self.flows_turn(here.voice, at, Sound::Unwritten);
        } else {
            let at = here.grid.moment(given, 0, 1);
            let span = bar_line(self.lowering.text, here.placed, &here.line);
            self.unwritten(here.voice, at, span, dry);
        }
    }

    fn part(&mut self, here: Here<'_>, index: usize, part: Part, at: Moment, dry: &mut bool) {
        let Some(flow) = self.flows.get_mut(here.voice) else {
            return;
        };
        match part.kind() {
            PartKind::Note => {
                let pitch = Pitch {
                    step: part.step,
                    sign: part.sign(),
                };
                flow.turn(at, Sound::Pitch(pitch), None);
                *dry = false;
            }
            PartKind::Hold => match flow.sound() {
                Some(Sound::Rest) | None => {
                    let after = flow.sound().is_some();
                    flow.turn(at, Sound::Spoilt, None);
                    *dry = false;
                    self.nothing_to_hold(here, part, at, after);
                }
                Some(_) => {}
            },
            PartKind::Rest => {
                flow.turn(at, Sound::Rest, None);
                *dry = false;
            }
            PartKind::Unwritten => {
                let span = self.span(here.placed, part);
                self.unwritten(here.voice, at, span, dry);
            }
            PartKind::Unplaced => {
                let last = flow.last;
                flow.turn(at, Sound::Spoilt, None);
                *dry = false;
                self.no_octave(here, index, part, at, last);
            }
            PartKind::Spoilt | PartKind::Copy | PartKind::Text | PartKind::Key => {
                flow.turn(at, Sound::Spoilt, None);
                *dry = false;
            }
        }
        if part.flags & (FERMATA | BREATH | MARKED) != 0 {
            if let Some(flow) = self.flows.get_mut(here.voice) {
                flow.mark(part.flags & FERMATA != 0, part.flags & BREATH != 0);
            }
            if part.flags & MARKED != 0 {
                self.marks(here, index, at);
            }
        }
    }

    pub(super) fn marks(&mut self, here: Here<'_>, index: usize, at: Moment) {
        for (name, span) in mark_names(self.lowering.text, here.placed, index) {
            self.lowering.reading.marks.push(Mark {
                name: name.to_owned(),
                voice: here.voice,
                at: at.time(),
                span,
            });
        }
    }

    pub(super) fn span(&self, placed: &Placed, part: Part) -> Span {
        let start = (part.start + placed.span.start) as usize;
        Span::new(start, unmarked_end(self.lowering.text.as_bytes(), start))
    }

    fn finish(self) {
        let end = self.plan.grid.last().map_or(0, |bar| bar.onset);
        let untold = self.silent.saturating_sub(MOST_SILENT);
        if untold > 0 {
            let systems = self.plan.systems.last();
            let first = systems.and_then(|s| Some((s, s.placed.system.rows.first()?)));
            if let Some((system, row)) = first {
                let span = row.label.moved(system.placed.span.start);
                let message =
                    format!("In {untold} more systems voices are silent for want of a row.");
                let found = remark(ProblemKind::VoiceSilent, span, &message);
                self.lowering.reading.problems.push(found);
            }
        }
        let voices = &mut self.lowering.reading.score.voices;
        for (voice, mut flow) in voices.iter_mut().zip(self.flows) {
            flow.end(Moment::of(end));
            if flow.notes.len() < flow.notes.capacity() / 2 {
                flow.notes.shrink_to_fit();
            }
            voice.notes = flow.notes;
        }
    }
}

/// The parts of a row, by index.
pub(super) fn parts_of(placed: &Placed, row: u32) -> Range<usize> {
    let system = &placed.system;
    let Some(row) = system.rows.get(row as usize) else {
        return 0..0;
    };
    let first = |bar: u32| system.parts_of(system.cells_of(bar).start).start;
    first(row.bars.start)..first(row.bars.end)
}

/// The bar line at the end of a bar.
fn bar_line(text: &str, placed: &Placed, line: &RowBar) -> Span {
    let start = (line.line + placed.span.start) as usize;
    let after = text.as_bytes().get(start..).unwrap_or_default();
    let strokes = after.iter().take_while(|b| **b == b'|').count();
    Span::new(start, start + strokes)
}

/// The footnote marks on a part, without their asterisks, with their places.
pub(super) fn mark_names<'t>(
    text: &'t str,
    placed: &Placed,
    part: usize,
) -> impl Iterator<Item = (&'t str, Span)> + use<'t> {
    let part = placed.system.parts.get(part);
    let marked = part.filter(|part| part.flags & MARKED != 0);
    let start = marked.map_or(0, |part| (part.start + placed.span.start) as usize);
    let end = match marked {
        Some(_) => part_end(text.as_bytes(), start),
        None => start,
    };
    let body = text.get(start..end).unwrap_or_default();
    debug_assert!(!body.contains(is_blank));
    body.match_indices('*').filter_map(move |(at, _)| {
        let after = body.get(at + 1..)?;
        let letters = after.bytes().take_while(u8::is_ascii_alphabetic).count();
        let name = after.get(..letters)?;
        // `*1` was reported: only letters make a mark.
        let next = after.as_bytes().get(letters);
        let whole = !next.is_some_and(u8::is_ascii_digit);
        (letters > 0 && whole).then(|| (name, Span::new(start + at, start + at + 1 + letters)))
    })
}
