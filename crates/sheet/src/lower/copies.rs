//! Bars copied from another voice: `=S`, `=S-8`, `=S+8`.

use partwright_score::{Note, Pitch, Sound};

use super::bars::{GridBar, SystemPlan, bar_of};
use super::flow::Moment;
use super::music::{Here, Pass};
use crate::chars::Word;
use crate::parts::label;
use crate::problem::Problem;
use crate::span::Span;
use crate::system::{is_copied, problem};
use crate::tree::{Part, part_end};

/// The most notes that copies may add to a sheet: a long bar copied by many voices many times
/// would fill any memory.
pub(super) const MOST_COPIED: usize = 1 << 21;

/// A copy waiting for the voice it copies.
struct Waiting<'s> {
    here: Here<'s>,
    source: usize,
    octaves: i8,
    span: Span,
}

/// Lowers the copies of one bar, once the rows that are none are done.
pub(super) fn copies(pass: &mut Pass<'_, '_>, system: &SystemPlan, bar: usize, grid: GridBar) {
    let mut waiting = Vec::new();
    for (row, voice) in &system.rows {
        let placed = &system.placed;
        let lost = system.lost_at(*row);
        let Some(row) = placed.system.rows.get(*row as usize) else {
            continue;
        };
        let Some(index) = bar_of(row, bar).filter(|_| lost.is_none_or(|lost| bar <= lost)) else {
            continue;
        };
        let Some(line) = placed.system.bars.get(index as usize) else {
            continue;
        };
        if !is_copied(line.flags) {
            continue;
        }
        let here = Here {
            placed,
            row,
            voice: usize::from(*voice),
            bar: index,
            line: *line,
            grid,
            lost: false,
        };
        waiting.extend(pass.wait(here));
    }
    // A copy of a copy waits for it; what still waits when nothing moves any more is a ring.
    loop {
        let pending: Vec<usize> = waiting.iter().map(|w| w.here.voice).collect();
        let count = waiting.len();
        waiting.retain(|copy| {
            if pending.contains(&copy.source) {
                return true;
            }
            pass.copy(copy);
            false
        });
        if waiting.len() == count {
            break;
        }
    }
    let ring = waiting.iter().map(|copy| copy.span).min();
    for copy in &waiting {
        if Some(copy.span) == ring {
            let message = "These bars copy each other, and no voice says what they sound.";
            pass.spoil(copy.here, copy.span, message);
        } else {
            pass.unknown(copy.here);
        }
    }
}

impl Pass<'_, '_> {
    /// Finds what a copy copies, or reports why it cannot.
    fn wait<'s>(&mut self, here: Here<'s>) -> Option<Waiting<'s>> {
        let system = &here.placed.system;
        let part = system.parts_of(system.cells_of(here.bar).start).start;
        let part: Part = *system.parts.get(part)?;
        let start = (part.start + here.placed.span.start) as usize;
        let text = self.lowering.text;
        let span = Span::new(start, part_end(text.as_bytes(), start));
        let after = text.as_bytes().get(start + 1..span.end as usize)?;
        let name = label(after).map(|(_, name)| name).unwrap_or_default();
        let Some(&source) = self.lowering.labels.get(name) else {
            let before = self.lowering.reading.problems.len();
            let word = Word {
                text: name,
                span: Span::new(start + 1, start + 1 + name.len()),
            };
            self.lowering.unknown_voice(word);
            // The whole copy is marked; what is offered still replaces the label alone.
            if let Some(found) = self.lowering.reading.problems.get_mut(before) {
                found.span = span;
                found.voice = Some(here.voice);
                found.at = Some(here.grid.start().time());
            }
            self.unknown(here);
            return None;
        };
        if source == here.voice {
            self.spoil(here, span, "A voice does not copy itself.");
            return None;
        }
        Some(Waiting {
            here,
            source,
            octaves: i8::try_from(part.step).unwrap_or(0),
            span,
        })
    }

    fn spoil(&mut self, here: Here<'_>, span: Span, message: &str) {
        self.lowering.reading.problems.push(Problem {
            voice: Some(here.voice),
            at: Some(here.grid.start().time()),
            ..problem(span, message.to_owned(), &[])
        });
        self.unknown(here);
    }

    fn unknown(&mut self, here: Here<'_>) {
        if let Some(flow) = self.flows.get_mut(here.voice) {
            flow.turn(here.grid.start(), Sound::Spoilt, None);
        }
    }

    fn copy(&mut self, copy: &Waiting<'_>) {
        let here = copy.here;
        let start = here.grid.start();
        let Some(source) = self.flows.get(copy.source) else {
            return;
        };
        // What the source does in this bar, the note that goes into it first.
        let from = start.time();
        let begun = source
            .notes
            .iter()
            .rev()
            .take_while(|note| note.end() > from)
            .count();
        let ended = source.notes.get(source.notes.len() - begun..);
        let notes: Vec<Note> = ended
            .into_iter()
            .flatten()
            .copied()
            .chain(source.now)
            .collect();
        if notes.len() > self.budget {
            let message = "The copies of this sheet add up to more notes than can be read.";
            return self.spoil(here, copy.span, message);
        }
        self.budget -= notes.len();
        let shift = |pitch: Pitch| Pitch {
            step: pitch.step + 7 * i16::from(copy.octaves),
            ..pitch
        };
        let outside = |note: &Note| {
            let moved = note.sound.pitch().map(shift);
            moved.is_some_and(|pitch| !(0..=9).contains(&pitch.octave()))
        };
        if notes.iter().any(outside) {
            let message = "An octave off, this copy would leave the octaves 0 to 9.";
            return self.spoil(here, copy.span, message);
        }
        let copies = u8::try_from(copy.source).ok();
        let Some(flow) = self.flows.get_mut(here.voice) else {
            return;
        };
        for note in notes {
            let sound = match note.sound {
                Sound::Pitch(pitch) => Sound::Pitch(shift(pitch)),
                other => other,
            };
            let held = note.onset < from;
            // Between neighbouring copies of one voice a held note is held.
            let goes_on = held
                && flow
                    .now
                    .is_some_and(|now| now.copies == copies && now.sound == sound);
            if !goes_on {
                let at = if held {
                    start
                } else {
                    Moment::from(note.onset)
                };
                flow.turn(at, sound, copies);
            }
            // A mark on a note that came before the bar stands before the bar.
            if !held {
                flow.mark(note.fermata, note.breath);
            }
        }
    }
}
