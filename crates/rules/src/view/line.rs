//! One voice as a line.

use std::collections::BTreeSet;

use partwright_score::{Interval, Note, Pitch, Time, Voice};

use super::shape::is_triad;
use super::{Line, Piece, Sounding};

/// Notes in a row of which the same can be said.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Run<K> {
    /// What can be said.
    pub kind: K,
    /// Where the first begins.
    pub from: Time,
    /// Where the last ends.
    pub until: Time,
    /// How many they are.
    pub notes: usize,
    /// The lowest of them.
    pub lowest: Pitch,
    /// The highest of them.
    pub highest: Pitch,
}

impl<K> Run<K> {
    /// Scale steps from the lowest to the highest.
    #[must_use]
    pub fn span(&self) -> i32 {
        Interval(self.lowest.place().up_to(self.highest.place())).size()
    }
}

/// One voice going from a note to the next, inside a phrase and without a rest between.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct LineMove {
    /// The note left.
    pub from: Note,
    /// The note reached.
    pub to: Note,
    /// The interval, upward or downward.
    pub interval: Interval,
    /// Nothing of the line comes right before: it starts with the note left.
    pub starts: bool,
    pub(super) size: i32,
    pub(super) quality: Quality,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Quality {
    Plain,
    Augmented,
    Diminished,
}

impl LineMove {
    /// Scale steps, without direction: 0 a repetition or a chromatic semitone, 1 a step.
    #[must_use]
    pub fn size(&self) -> i32 {
        self.size
    }

    /// By an augmented interval.
    #[must_use]
    pub fn is_augmented(&self) -> bool {
        self.quality == Quality::Augmented
    }

    /// By a diminished interval.
    #[must_use]
    pub fn is_diminished(&self) -> bool {
        self.quality == Quality::Diminished
    }

    /// By a perfect, major or minor interval.
    #[must_use]
    pub fn is_plain(&self) -> bool {
        self.quality == Quality::Plain
    }

    /// Upward.
    #[must_use]
    pub fn rises(&self) -> bool {
        self.interval.0.semitones > 0
    }

    /// `up` or `down`.
    #[must_use]
    pub fn way(&self) -> &'static str {
        if self.rises() { "up" } else { "down" }
    }

    /// The same pitch again.
    #[must_use]
    pub fn is_repeat(&self) -> bool {
        self.interval.0.semitones == 0 && self.interval.0.steps == 0
    }

    /// A third or more.
    #[must_use]
    pub fn is_leap(&self) -> bool {
        self.size() >= 2
    }

    /// By a minor sixth upward.
    #[must_use]
    pub fn is_rising_minor_sixth(&self) -> bool {
        self.size() == 5 && self.interval.is_minor() && self.rises()
    }

    /// Both move, the same way.
    #[must_use]
    pub fn goes_on_from(&self, other: &LineMove) -> bool {
        !self.is_repeat() && !other.is_repeat() && self.rises() == other.rises()
    }

    /// The pitch left and the pitch reached, as text.
    #[must_use]
    pub fn ends(&self) -> (String, String) {
        (LineMove::text(&self.from), LineMove::text(&self.to))
    }

    /// The pitch of a note as text.
    #[must_use]
    pub fn text(note: &Note) -> String {
        let pitch = note.sound.pitch();
        pitch.map(|p| p.to_string()).unwrap_or_default()
    }
}

impl<'a> Piece<'a> {
    /// The moves of one voice.
    #[must_use]
    pub fn line_moves(self, voice: usize) -> Vec<LineMove> {
        let notes = self.score.voices.get(voice).map_or(&[][..], |v| &v.notes);
        let mut moves: Vec<LineMove> = Vec::with_capacity(notes.len());
        let ends = self.section_ends();
        let mut joined = false;
        for pair in notes.windows(2) {
            let &[from, to] = pair else { continue };
            let (Some(left), Some(reached)) = (from.sound.pitch(), to.sound.pitch()) else {
                joined = false;
                continue;
            };
            if from.ends_phrase() || ends.binary_search(&to.onset).is_ok() {
                joined = false;
                continue;
            }
            let interval = Interval(left.place().up_to(reached.place()));
            let quality = match interval {
                i if i.is_augmented() => Quality::Augmented,
                i if i.is_diminished() => Quality::Diminished,
                _ => Quality::Plain,
            };
            moves.push(LineMove {
                from,
                to,
                interval,
                starts: !joined,
                size: interval.size(),
                quality,
            });
            joined = true;
        }
        moves
    }

    /// Where sections of the score end.
    fn section_ends(self) -> Vec<Time> {
        let closed = self.score.bars.iter().filter(|bar| bar.section_end);
        closed.map(|bar| bar.onset + bar.length).collect()
    }
}

impl<'a> Line<'a> {
    /// The voice.
    #[must_use]
    pub fn declared(&self) -> Option<&'a Voice> {
        self.piece.score.voices.get(self.voice)
    }

    /// The voice is given, not composed: nothing is said about its line.
    #[must_use]
    pub fn is_given(&self) -> bool {
        self.declared()
            .is_some_and(|v| v.cantus || v.doubles.is_some())
    }

    /// The voice is the lowest in the score, under at least one other.
    #[must_use]
    pub fn is_bass(&self) -> bool {
        self.voice > 0 && self.voice + 1 == self.piece.score.voices.len()
    }

    /// The voice is the highest in the score.
    #[must_use]
    pub fn is_top(&self) -> bool {
        self.voice == 0
    }

    /// The voice is declared a tenor.
    #[must_use]
    pub fn is_tenor(&self) -> bool {
        self.declared().is_some_and(|v| v.kind.name == "tenor")
    }

    /// The number of independent voices that sound where a move arrives.
    #[must_use]
    pub fn parts_at(&self, step: &LineMove) -> usize {
        self.sounding_at(step).map_or(1, Sounding::parts)
    }

    /// The sonority a move arrives in.
    #[must_use]
    pub fn sounding_at(&self, step: &LineMove) -> Option<Sounding<'a>> {
        let index = self.piece.texture.at(step.to.onset)?;
        Some(Sounding {
            piece: self.piece,
            index,
        })
    }

    /// The next move to another pitch, if the line goes on to one.
    #[must_use]
    pub fn after(&self, index: usize) -> Option<&'a LineMove> {
        let rest = self.moves.get(index + 1..).unwrap_or_default();
        rest.iter()
            .take_while(|m| !m.starts)
            .find(|m| !m.is_repeat())
    }

    /// The move to another pitch that comes after the next one.
    #[must_use]
    pub fn after_next(&self, index: usize) -> Option<&'a LineMove> {
        let rest = self.moves.get(index + 1..).unwrap_or_default();
        rest.iter()
            .take_while(|m| !m.starts)
            .filter(|m| !m.is_repeat())
            .nth(1)
    }

    /// The move right before, if the line came from somewhere.
    #[must_use]
    pub fn before(&self, index: usize) -> Option<&'a LineMove> {
        let this = self.moves.get(index)?;
        if this.starts {
            None
        } else {
            self.moves.get(index.checked_sub(1)?)
        }
    }

    /// Two moves one way add up to a seventh, or to more than an octave.
    #[must_use]
    pub fn oversteps(first: &LineMove, second: &LineMove) -> bool {
        let sum = first.size() + second.size();
        sum == 6 || sum > 7
    }

    /// Three notes (a move and the one after it) outline a triad, or divide an octave into a
    /// fourth and a fifth.
    #[must_use]
    pub fn outlines_chord(first: &LineMove, second: &LineMove) -> bool {
        let pitches = [first.from, first.to, second.to].map(|n| n.sound.pitch());
        let [Some(a), Some(b), Some(c)] = pitches else {
            return true;
        };
        let class = |p: Pitch| p.place().semitone.rem_euclid(12);
        let classes: BTreeSet<i32> = [a, b, c].map(class).into();
        classes.len() < 3 || is_triad(&classes)
    }

    /// The runs of notes to which `say` gives the same answer; silence does not break a run.
    #[must_use]
    pub fn runs<K: Copy + PartialEq>(&self, say: impl Fn(Pitch) -> Option<K>) -> Vec<Run<K>> {
        let mut runs: Vec<Run<K>> = Vec::new();
        let mut goes_on = false;
        for note in self.declared().map_or(&[][..], |v| &v.notes) {
            let Some(pitch) = note.sound.pitch() else {
                continue;
            };
            let kind = say(pitch);
            match (kind, runs.last_mut()) {
                (None, _) => {}
                (Some(kind), Some(run)) if goes_on && run.kind == kind => {
                    run.until = note.end();
                    run.notes += 1;
                    if pitch.place().semitone < run.lowest.place().semitone {
                        run.lowest = pitch;
                    }
                    if pitch.place().semitone > run.highest.place().semitone {
                        run.highest = pitch;
                    }
                }
                (Some(kind), _) => runs.push(Run {
                    kind,
                    from: note.onset,
                    until: note.end(),
                    notes: 1,
                    lowest: pitch,
                    highest: pitch,
                }),
            }
            goes_on = kind.is_some();
        }
        runs
    }
}
