//! One voice as a line.

use partwright_score::{Pitch, Time};

use super::Line;

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

impl Line<'_> {
    /// The runs of notes to which `say` gives the same answer; silence does not break a run.
    #[must_use]
    pub fn runs<K: Copy + PartialEq>(&self, say: impl Fn(Pitch) -> Option<K>) -> Vec<Run<K>> {
        let mut runs: Vec<Run<K>> = Vec::new();
        let mut goes_on = false;
        let notes = self
            .piece
            .score
            .voices
            .get(self.voice)
            .map_or(&[][..], |v| &v.notes);
        for note in notes {
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
