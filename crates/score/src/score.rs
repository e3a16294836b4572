//! The score itself.

use std::borrow::Cow;

use crate::{Bar, BarPlace, Key, Metre, Pitch, StatedChord, StatedFigures, Time, Voice, ZERO};

/// What a voice does for a while.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Sound {
    /// It sounds a pitch, struck once.
    Pitch(Pitch),
    /// It is silent.
    Rest,
    /// It is not written yet: nothing can be said about it.
    Unwritten,
    /// It is written but could not be read: nothing can be said about it either.
    Spoilt,
}

impl Sound {
    /// The pitch, if one sounds.
    #[must_use]
    pub const fn pitch(self) -> Option<Pitch> {
        match self {
            Sound::Pitch(pitch) => Some(pitch),
            _ => None,
        }
    }

    /// Whether nothing can be said about this time.
    #[must_use]
    pub const fn is_unknown(self) -> bool {
        matches!(self, Sound::Unwritten | Sound::Spoilt)
    }
}

/// A note, a rest, or a while not written yet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Note {
    /// Where it begins, in whole notes from the start.
    pub onset: Time,
    /// How long it lasts; ties are merged.
    pub length: Time,
    /// What sounds.
    pub sound: Sound,
    /// A fermata stands on it.
    pub fermata: bool,
    /// A breath follows it.
    pub breath: bool,
    /// It stands in a bar copied from that voice: the two are one voice here.
    pub copies: Option<u8>,
}

impl Note {
    /// A plain note without marks.
    #[must_use]
    pub const fn new(onset: Time, length: Time, sound: Sound) -> Note {
        Note {
            onset,
            length,
            sound,
            fermata: false,
            breath: false,
            copies: None,
        }
    }

    /// Where it ends.
    #[must_use]
    pub fn end(&self) -> Time {
        self.onset + self.length
    }

    /// Whether the phrase of its voice ends with it.
    #[must_use]
    pub const fn ends_phrase(&self) -> bool {
        self.fermata || self.breath
    }
}

/// Something that holds from a moment on.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Change<T> {
    /// From when.
    pub from: Time,
    /// What holds.
    pub value: T,
}

/// A score: voices from the highest down, over one row of bars.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Score {
    /// Voices in score order, highest first; at most [`crate::MOST_VOICES`].
    pub voices: Vec<Voice>,
    /// Groups of voices (by index) that may cross freely.
    pub equal: Vec<Vec<usize>>,
    /// The metres in use; bars point into it.
    pub metres: Vec<Metre>,
    /// The bars in order; together they cover the score.
    pub bars: Vec<Bar>,
    /// Stated keys, each from a moment on; empty where none is stated.
    pub keys: Vec<Change<Key>>,
    /// Chords that are stated, in order of time; none overlap.
    pub harmony: Vec<StatedChord>,
    /// Figures over the bass, in order of time; none overlap.
    pub figures: Vec<StatedFigures>,
    /// The style the sheet names.
    pub style: Option<String>,
}

impl Score {
    /// Where the last bar ends.
    #[must_use]
    pub fn end(&self) -> Time {
        self.bars.last().map_or(ZERO, |bar| bar.onset + bar.length)
    }

    /// The bar (by index) that holds a moment; the last one from the end on.
    #[must_use]
    pub fn bar_at(&self, at: Time) -> Option<usize> {
        let after = self.bars.partition_point(|bar| bar.onset <= at);
        (!self.bars.is_empty()).then(|| after.saturating_sub(1))
    }

    /// A moment as a musician says it: bar and beat.
    #[must_use]
    pub fn place(&self, at: Time) -> BarPlace {
        let found = self.bar_at(at).and_then(|i| {
            let bar = self.bars.get(i)?;
            let metre = self.metres.get(bar.metre as usize)?;
            Some(BarPlace {
                bar: bar.number,
                beat: bar.beat(metre, at),
            })
        });
        found.unwrap_or(BarPlace {
            bar: 1,
            beat: Time::from_integer(1),
        })
    }

    /// How strong a moment is: see [`Metre::level`].
    #[must_use]
    pub fn level(&self, at: Time) -> u8 {
        let level = self.bar_at(at).and_then(|i| {
            let bar = self.bars.get(i)?;
            let metre = self.metres.get(bar.metre as usize)?;
            Some(metre.level(bar.lead + at - bar.onset))
        });
        level.unwrap_or(0)
    }

    /// The voice's note (by index) sounding at a moment.
    #[must_use]
    pub fn note_at(&self, voice: usize, at: Time) -> Option<usize> {
        let notes = &self.voices.get(voice)?.notes;
        let after = notes.partition_point(|note| note.onset <= at);
        let index = after.checked_sub(1)?;
        notes
            .get(index)
            .filter(|note| at < note.end())
            .map(|_| index)
    }

    /// What a musician calls the voice: its kind where no other voice is of that kind (`soprano`),
    /// else its label (`S1`).
    #[must_use]
    pub fn voice_name(&self, voice: usize) -> &str {
        let Some(this) = self.voices.get(voice) else {
            return "";
        };
        let alone = this.kind.ordinary.is_some()
            && self
                .voices
                .iter()
                .filter(|other| other.kind == this.kind)
                .count()
                == 1;
        if alone { this.kind.name } else { &this.label }
    }

    /// The same where words go on around it: `voice A` where the bare label would read as a note.
    #[must_use]
    pub fn spoken_name(&self, voice: usize) -> Cow<'_, str> {
        let name = self.voice_name(voice);
        match name {
            "A" | "B" | "C" | "D" | "E" | "F" | "G" | "H" => Cow::Owned(format!("voice {name}")),
            _ => Cow::Borrowed(name),
        }
    }

    /// Whether two voices may cross freely.
    #[must_use]
    pub fn are_equal(&self, a: usize, b: usize) -> bool {
        self.equal
            .iter()
            .any(|group| group.contains(&a) && group.contains(&b))
    }

    /// The voice that speaks for this one in pair rules: itself, or the one it doubles.
    #[must_use]
    pub fn leader(&self, voice: usize) -> usize {
        // A chain of doublings is no longer than the list of voices; a ring stops there too.
        let mut leader = voice;
        for _ in 0..self.voices.len() {
            match self.voices.get(leader).and_then(|v| v.doubles) {
                Some(next) => leader = next,
                None => break,
            }
        }
        leader
    }
}
