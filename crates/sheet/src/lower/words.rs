//! The words under the notes: a syllable for each note struck.

use std::collections::HashMap;
use std::ops::Range;

use partwright_score::Note;

use super::Lowering;
use super::bars::{Fill, GridBar, fill};
use super::head::words_head;
use super::under::Under;
use crate::lines::RowKind;
use crate::near::short;
use crate::problem::Problem;
use crate::reading::{Syllable, Words};
use crate::span::Span;
use crate::system::problem;
use crate::tree::{DOUBLE, OPEN, Part, PartKind};

/// The words while their rows are lowered.
#[derive(Default)]
pub(super) struct Singing {
    /// The sets of voices and verse met so far, each with its place in the reading's words.
    groups: HashMap<(Vec<usize>, Option<u8>), usize>,
    /// What voices strike in bars of this system, counted once however many verses there are.
    struck: HashMap<(usize, usize), Struck>,
}

/// What a voice strikes in a bar.
#[derive(Clone)]
struct Struck {
    /// The notes that sound in it.
    notes: Range<usize>,
    count: usize,
    /// Part of the bar is not written, or not readable.
    unknown: bool,
}

impl Singing {
    /// Another system begins.
    pub(super) fn system(&mut self) {
        self.struck.clear();
    }

    fn struck(&mut self, bar: usize, grid: GridBar, voice: usize, notes: &[Note]) -> Struck {
        let found = self.struck.entry((bar, voice)).or_insert_with(|| {
            let range = during(notes, grid);
            let sounding = notes.get(range.clone()).unwrap_or_default();
            Struck {
                count: sounding.iter().filter(|note| is_struck(note, grid)).count(),
                unknown: sounding.iter().any(|note| note.sound.is_unknown()),
                notes: range,
            }
        });
        found.clone()
    }
}

impl Under<'_> {
    /// Whose words they are: labels and verse; nothing if they cannot be told.
    fn singers(&self, lowering: &mut Lowering<'_>) -> Option<(Vec<usize>, Option<u8>)> {
        let label = self.row.label.moved(self.base());
        let opening = self.row.opening.moved(self.base());
        let mut voices = Vec::new();
        let mut verse = None;
        let mut good = true;
        for word in words_head(lowering.text, label, opening) {
            let number = word.text.bytes().all(|b| b.is_ascii_digit());
            if verse.is_some() {
                let message = "The verse stands last, in front of the bar line.";
                lowering.wrong(word.span, message, &[]);
                good = false;
            } else if number {
                verse = word.text.parse().ok().filter(|n| (1..100).contains(n));
                if verse.is_none() || word.text.starts_with('0') {
                    lowering.wrong(word.span, "A verse is a number, 1 to 99.", &[]);
                    good = false;
                }
            } else if let Some(&voice) = lowering.labels.get(word.text) {
                if voices.contains(&voice) {
                    let message = format!("{} stands here twice.", short(word.text));
                    lowering.wrong(word.span, &message, &[]);
                } else {
                    voices.push(voice);
                }
            } else {
                good = false;
                if !lowering.refused.contains(word.text) {
                    lowering.unknown_voice(word);
                }
            }
        }
        if good && voices.is_empty() {
            let message = "Words name the voice that sings them: words S | …";
            lowering.wrong(label, message, &[]);
        }
        (good && !voices.is_empty()).then_some((voices, verse))
    }

    /// Lowers a words row.
    pub(super) fn words(&self, lowering: &mut Lowering<'_>, singing: &mut Singing) {
        let Some((voices, verse)) = self.singers(lowering) else {
            return;
        };
        let bars = &lowering.reading.score.bars;
        let first = bars.get(self.system.first);
        let last = (self.system.first + self.system.bars)
            .checked_sub(1)
            .and_then(|i| bars.get(i));
        let (Some(first), Some(last)) = (first, last) else {
            return;
        };
        let over = (first.onset, last.onset + last.length);
        let words = &mut lowering.reading.words;
        let set = (voices.clone(), verse);
        let group = *singing.groups.entry(set).or_insert(words.len());
        if group == words.len() {
            words.push(Words {
                voices: voices.clone(),
                verse,
                over: Vec::new(),
                syllables: Vec::new(),
            });
        }
        if let Some(words) = words.get_mut(group) {
            words.over.push(over);
        }
        for (bar, grid) in self.each() {
            // An empty bar has no text; one `-` or `_` stands for the whole of it.
            if self.tree().cells_of(bar).is_empty()
                || fill(self.tree(), RowKind::Words, bar) == Fill::Whole
            {
                continue;
            }
            self.counted(lowering, singing, &voices, (bar, grid));
            let found = self.syllables(lowering, singing, &voices, (bar, grid));
            if let Some(words) = lowering.reading.words.get_mut(group) {
                words.syllables.extend(found);
            }
        }
    }

    /// The place in the score of a bar of this row.
    fn nth(&self, bar: u32) -> usize {
        self.system.first + (bar - self.row.bars.start) as usize
    }

    /// Reports a voice whose notes are more or fewer than the syllables of a bar: the first such.
    fn counted(
        &self,
        lowering: &mut Lowering<'_>,
        singing: &mut Singing,
        voices: &[usize],
        (bar, grid): (u32, GridBar),
    ) {
        let given = self.tree().cells_of(bar).len();
        for &voice in voices {
            let score = &lowering.reading.score;
            let notes = score.voices.get(voice).map_or(&[][..], |v| &v.notes);
            let struck = singing.struck(self.nth(bar), grid, voice, notes);
            if struck.unknown || struck.count == given {
                continue;
            }
            let sounding = notes.get(struck.notes).unwrap_or_default();
            let mut own = sounding.iter().filter(|note| is_struck(note, grid));
            let name = |note: &Note| note.sound.pitch().map_or(String::new(), |p| p.to_string());
            let singer = lowering.called(voice);
            let (at, span, message) = if given > struck.count {
                let message = match own.next_back() {
                    Some(last) => format!(
                        "More syllables than notes. {singer} strikes no note in this bar after {}.",
                        name(last)
                    ),
                    None => format!("{singer} strikes no note in this bar: no syllable fits."),
                };
                let span = self.surplus(lowering.text, bar, struck.count);
                (grid.start().time(), span, message)
            } else {
                let without = own.nth(given);
                let message = format!(
                    "Fewer syllables than notes. {singer} strikes {} without one: write a syllable \
                     or - for each note.",
                    without.map(name).unwrap_or_default()
                );
                let at = without.map_or(grid.start().time(), |note| note.onset);
                (at, self.close(lowering.text, bar), message)
            };
            lowering.reading.problems.push(Problem {
                voice: Some(voice),
                at: Some(at),
                ..problem(span, message, &[])
            });
            return;
        }
    }

    /// The syllables of a bar beyond so many.
    fn surplus(&self, text: &str, bar: u32, count: usize) -> Span {
        let tree = self.tree();
        let cells = tree.cells_of(bar);
        let parts = tree.parts_of(cells.start + count).start..tree.parts_of(cells.end).start;
        self.span(text, parts).unwrap_or(Span::new(0, 0))
    }

    /// The line that closes a bar; its last syllable where there is none.
    fn close(&self, text: &str, bar: u32) -> Span {
        let line = self.tree().bars.get(bar as usize);
        let (at, flags) = line.map_or((0, 0), |line| (line.line, line.flags));
        let start = at + self.base();
        if flags & OPEN != 0 {
            let last = Part::new(at as usize, PartKind::Text, 0, 0, 0);
            return Span::new(start as usize, self.end(text, last));
        }
        let strokes = if flags & DOUBLE != 0 { 2 } else { 1 };
        Span {
            start,
            end: start + strokes,
        }
    }

    /// The syllables of a bar with their notes, as far as the notes are known.
    fn syllables(
        &self,
        lowering: &Lowering<'_>,
        singing: &mut Singing,
        voices: &[usize],
        (bar, grid): (u32, GridBar),
    ) -> Vec<Syllable> {
        let first = voices.first().copied().unwrap_or(0);
        let voice = lowering.reading.score.voices.get(first);
        let notes = voice.map_or(&[][..], |voice| &voice.notes);
        let struck = singing.struck(self.nth(bar), grid, first, notes);
        let sounding = notes.get(struck.notes).unwrap_or_default().iter();
        let known = sounding.take_while(|note| !note.sound.is_unknown());
        let tree = self.tree();
        let parts = tree.cells_of(bar).map(|cell| tree.parts_of(cell).start);
        let place = |(part, note): (usize, &Note)| {
            Some(Syllable {
                at: note.onset,
                span: self.span(lowering.text, part..part + 1)?,
            })
        };
        let own = known.filter(|note| is_struck(note, grid));
        parts.zip(own).filter_map(place).collect()
    }
}

fn is_struck(note: &Note, grid: GridBar) -> bool {
    note.sound.pitch().is_some() && note.onset >= grid.start().time()
}

/// The notes that sound in a bar, by index.
fn during(notes: &[Note], grid: GridBar) -> Range<usize> {
    let (start, end) = (grid.start().time(), grid.end().time());
    let from = notes.partition_point(|note| note.end() <= start);
    let to = notes.partition_point(|note| note.onset < end);
    from..to.max(from)
}
