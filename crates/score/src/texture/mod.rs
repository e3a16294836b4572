//! Sonorities as points and steps as vectors, computed once for all rules.
//!
//! One table, laid out for scanning: a row a sonority, in it the note of every voice and one
//! [`PairStep`] for every pair of voices.

mod build;
mod step;

use partwright_space::{Gap, Place};

use crate::{Pitch, Score, Sound, Time};

pub use step::PairStep;

/// What all voices sound at one moment: a new one begins wherever any voice strikes, falls silent
/// or stops being written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Sonority {
    /// Where it begins, in whole notes from the start.
    pub onset: Time,
    /// Its bar, as an index into the score's bars.
    pub bar: u32,
    /// How strong its moment is: see [`crate::Metre::level`].
    pub level: u8,
    /// The voices that strike a pitch here, one bit each, the top voice lowest.
    pub struck: u64,
    /// The voices that sound a pitch.
    pub sounding: u64,
    /// The voices of which nothing is known here: not written yet, or not readable.
    pub unknown: u64,
    /// A section of the score ended just before.
    pub new_section: bool,
    /// Independent voices that sound or may: doublings count once, voices not known count.
    pub parts: u8,
    /// Voices that only double or copy another one that sounds: what is said of that one is said
    /// of them.
    pub followers: u64,
    bass: u8,
}

/// No voice is the bass.
const NO_BASS: u8 = u8::MAX;

/// Two voices by index, the upper one in the score first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Pair {
    /// The voice nearer the top of the score.
    pub upper: usize,
    /// The voice nearer its foot.
    pub lower: usize,
}

/// Every sonority of a score, and every pair's step into it.
#[derive(Clone, Debug, Default)]
pub struct Texture {
    sonorities: Vec<Sonority>,
    pairs: Vec<Pair>,
    voices: usize,
    /// Row by row: the index of each voice's note.
    notes: Vec<u32>,
    /// Row by row: each pair's step into the sonority.
    steps: Vec<PairStep>,
}

impl Texture {
    /// Computes the table. Linear in the number of sonorities times pairs of voices.
    #[must_use]
    pub fn of(score: &Score) -> Texture {
        build::texture(score)
    }

    /// The sonorities in order of time.
    #[must_use]
    pub fn sonorities(&self) -> &[Sonority] {
        &self.sonorities
    }

    /// The pairs of voices, in score order.
    #[must_use]
    pub fn pairs(&self) -> &[Pair] {
        &self.pairs
    }

    /// Each pair with its step into a sonority; empty past the end.
    pub fn steps(&self, sonority: usize) -> impl Iterator<Item = (Pair, &PairStep)> {
        let n = self.pairs.len();
        let row = self
            .steps
            .get(sonority * n..(sonority + 1) * n)
            .unwrap_or_default();
        self.pairs.iter().copied().zip(row)
    }

    /// One pair's step into a sonority, whichever way round the two voices are named.
    #[must_use]
    pub fn step(&self, sonority: usize, a: usize, b: usize) -> Option<&PairStep> {
        let (upper, lower) = (a.min(b), a.max(b));
        if upper == lower || lower >= self.voices {
            return None;
        }
        // Pairs stand as (0,1) (0,2) … (1,2) …: those of earlier upper voices come first.
        let index = upper * (2 * self.voices - upper - 1) / 2 + (lower - upper - 1);
        self.steps.get(sonority * self.pairs.len() + index)
    }

    /// The voice's note (by index) at a sonority.
    #[must_use]
    pub fn note(&self, sonority: usize, voice: usize) -> Option<usize> {
        if voice >= self.voices {
            return None;
        }
        self.notes
            .get(sonority * self.voices + voice)
            .map(|&index| index as usize)
    }

    /// The pitch a voice sounds at a sonority.
    #[must_use]
    pub fn pitch(&self, score: &Score, sonority: usize, voice: usize) -> Option<Pitch> {
        let note = self.note(sonority, voice)?;
        match score.voices.get(voice)?.notes.get(note)?.sound {
            Sound::Pitch(pitch) => Some(pitch),
            _ => None,
        }
    }

    /// The sonority (by index) that begins at a moment.
    #[must_use]
    pub fn at(&self, onset: Time) -> Option<usize> {
        self.sonorities
            .binary_search_by(|s| s.onset.cmp(&onset))
            .ok()
    }

    /// The sonority (by index) that sounds at a moment.
    #[must_use]
    pub fn sounding_at(&self, at: Time) -> Option<usize> {
        self.sonorities
            .partition_point(|s| s.onset <= at)
            .checked_sub(1)
    }

    /// The voices sounding at a sonority, in score order.
    pub fn sounding(&self, sonority: usize) -> impl Iterator<Item = usize> + use<> {
        let set = self.sonorities.get(sonority).map_or(0, |s| s.sounding);
        (0..self.voices).filter(move |v| set >> v & 1 == 1)
    }

    /// The voice with the lowest sounding note, a sixteen-foot voice taken an octave down; the
    /// lower in the score where two share it. `None` in silence, and where any voice is unknown.
    #[must_use]
    pub fn bass(&self, sonority: usize) -> Option<usize> {
        let bass = self.sonorities.get(sonority)?.bass;
        (bass != NO_BASS).then_some(usize::from(bass))
    }

    /// The interval of two voices as they sound at a sonority, from the lower in the score up.
    #[must_use]
    pub fn gap(&self, sonority: usize, a: usize, b: usize) -> Option<Gap> {
        self.step(sonority, a, b)?.after()
    }

    /// The displacement of one voice into a sonority; `None` where it did not sound on both sides.
    #[must_use]
    pub fn displacement(&self, score: &Score, sonority: usize, voice: usize) -> Option<Gap> {
        let from: Place = self.pitch(score, sonority.checked_sub(1)?, voice)?.place();
        Some(from.up_to(self.pitch(score, sonority, voice)?.place()))
    }
}
