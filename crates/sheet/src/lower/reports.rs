//! What is wrong with notes and bars, in a musician's words.

use std::ops::Range;

use partwright_score::{Pitch, show_time};

use super::bars::SystemPlan;
use super::flow::Moment;
use super::insertion;
use super::music::{Here, Pass};
use crate::problem::{Edit, Offer, Problem};
use crate::span::Span;
use crate::system::problem;
use crate::tree::{AFTER_COPY, MARKED, Part, PartKind, part_end};

/// A bad part longer than this is no part with marks.
const MOST_MARKED: usize = 4096;

impl Pass<'_, '_> {
    fn report(&mut self, here: Here<'_>, at: Moment, found: Problem) {
        self.lowering.reading.problems.push(Problem {
            voice: Some(here.voice),
            at: Some(at.time()),
            ..found
        });
    }

    pub(super) fn nothing_to_hold(
        &mut self,
        here: Here<'_>,
        part: Part,
        at: Moment,
        after_silence: bool,
    ) {
        let span = self.span(here.placed, part);
        let found = if after_silence {
            let message = "A dash goes on with a note; after silence write _ for more of it.";
            problem(span, message.to_owned(), &["_"])
        } else {
            let message = "A dash goes on with a note, and there is none before it.";
            problem(span, message.to_owned(), &["_"])
        };
        self.report(here, at, found);
    }

    /// A note without its octave figure where none carries.
    pub(super) fn no_octave(
        &mut self,
        here: Here<'_>,
        index: usize,
        part: Part,
        at: Moment,
        last: Option<Pitch>,
    ) {
        let span = self.span(here.placed, part);
        let letter = part.step;
        let near = last
            .map(|pitch| pitch.step)
            .or_else(|| self.next_written(here, index))
            .unwrap_or_else(|| self.middle(here.voice));
        // The octave in which the letter lies nearest to that.
        let octave = (near - letter + 3).div_euclid(7).clamp(0, 9);
        let pitch = Pitch {
            step: letter + 7 * octave,
            sign: part.sign(),
        };
        let why = if part.flags & AFTER_COPY != 0 {
            "The first note after a copied bar writes its octave figure"
        } else {
            "The first note of a row writes its octave figure"
        };
        let offer = Offer {
            title: format!("Write {pitch}"),
            edits: vec![Edit {
                span,
                // Letter and sign stay as they are written.
                text: format!("{}{}", self.lowering.at(span), pitch.octave()),
            }],
        };
        let found = Problem {
            offers: vec![offer],
            ..problem(span, format!("{why}: {pitch}, for instance."), &[])
        };
        self.report(here, at, found);
    }

    /// The next note of the row that has its place.
    fn next_written(&self, here: Here<'_>, index: usize) -> Option<i16> {
        let system = &here.placed.system;
        let last = system
            .parts_of(system.cells_of(here.row.bars.end).start)
            .start;
        // A note far off tells little; looking on without end would cost much.
        let parts = system.parts.get(index..last.min(index + 64))?;
        let next = parts.iter().find(|part| part.kind() == PartKind::Note)?;
        Some(next.step)
    }

    /// The middle of the voice's compass; of the treble staff for a plain voice.
    fn middle(&self, voice: usize) -> i16 {
        let voice = self.lowering.reading.score.voices.get(voice);
        let compass = voice.and_then(|v| v.easy.or(v.limit).or(v.kind.ordinary));
        compass.map_or(33, |c| (c.low.step + c.high.step).div_euclid(2))
    }

    pub(super) fn too_long(&mut self, here: Here<'_>, over: Range<usize>) {
        let system = &here.placed.system;
        let at = here.grid.end();
        let from = system.parts_of(over.start).start;
        let to = system.parts_of(over.end).start;
        for (offset, part) in system.parts.get(from..to).into_iter().flatten().enumerate() {
            if part.flags & MARKED != 0 {
                self.marks(here, from + offset, at);
            }
        }
        // What could not be read may be what is too much: one trouble is told, not two.
        let all = system.parts_of(system.cells_of(here.bar).start).start..to;
        let bad = |part: &Part| part.kind() == PartKind::Spoilt;
        let (Some(first), Some(last)) = (system.parts.get(from), to.checked_sub(1)) else {
            return;
        };
        let Some(last) = system.parts.get(last) else {
            return;
        };
        if system
            .parts
            .get(all)
            .is_some_and(|parts| parts.iter().any(bad))
        {
            return;
        }
        let base = here.placed.span.start;
        let end = part_end(self.lowering.text.as_bytes(), (last.start + base) as usize);
        let span = Span::new((first.start + base) as usize, end);
        let extra = over.len();
        let (cells, length) = (
            if extra == 1 { "one cell" } else { "cells" },
            Moment::of(here.grid.cell * extra as i64).time(),
        );
        let count = if extra == 1 {
            String::new()
        } else {
            format!("{extra} ")
        };
        let length = show_time(length);
        let message = format!(
            "The bar is too long by {count}{cells} ({length} of a whole note): it has room for {}.",
            here.grid.cells
        );
        if !here.lost {
            return self.report(here, at, problem(span, message, &[]));
        }
        let score = &self.lowering.reading.score;
        let name = score.spoken_name(here.voice);
        let plain = score
            .voices
            .get(here.voice)
            .is_none_or(|v| name.contains(&v.label));
        let the = if plain { "" } else { "the " };
        let number = score.place(here.grid.start().time()).bar;
        let message = format!(
            "The bar is too long by {count}{cells}: a bar line is missing in bar {number} of \
             {the}{name}. The rest of this row waits for it."
        );
        let offer = insertion(span.start, "| ", "Put a bar line here");
        let found = Problem {
            offers: vec![offer],
            ..problem(span, message, &[])
        };
        self.report(here, at, found);
    }

    /// What was wrong with parts when the system was read.
    pub(super) fn slips(&mut self, system: &SystemPlan) {
        let placed = &system.placed;
        let base = placed.span.start;
        for slip in &placed.system.slips {
            let place =
                crate::lookup::place(self.plan, system, slip.part as usize, slip.problem.span);
            let mut found = slip.problem.clone();
            found.span = found.span.moved(base);
            // A footnote mark in the wrong place is one trouble: its footnote is not idle.
            let text = self.lowering.at(found.span);
            for piece in text.split('*').skip(1).filter(|_| text.len() < MOST_MARKED) {
                let letters = piece.bytes().take_while(u8::is_ascii_alphabetic).count();
                let name = piece.get(..letters).unwrap_or_default().to_owned();
                self.lowering.stray_marks.insert(name);
            }
            for edit in found.offers.iter_mut().flat_map(|offer| &mut offer.edits) {
                edit.span = edit.span.moved(base);
            }
            found.voice = place.map(|(voice, _)| voice);
            found.at = place.map(|(_, at)| at);
            self.lowering.reading.problems.push(found);
        }
    }
}
