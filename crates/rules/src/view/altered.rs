//! Notes altered against the scale of their key.

use partwright_analysis::harmony::{LocalKey, Quality};
use partwright_analysis::mode::{fifths, named};
use partwright_score::{Interval, Pitch};
use partwright_space::Gap;

use super::{Chord, Member, PairMove, Tone};

/// Which way a note is altered against the scale of its key.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Altered {
    /// Raised.
    Raised,
    /// Lowered.
    Lowered,
}

impl Altered {
    /// `raised`, `lowered`.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Altered::Raised => "raised",
            Altered::Lowered => "lowered",
        }
    }

    /// Where it wants to go.
    #[must_use]
    pub const fn goal(self) -> &'static str {
        match self {
            Altered::Raised => "up a semitone",
            Altered::Lowered => "down a step",
        }
    }
}

impl Chord<'_> {
    /// Its key where that is sure; else the one that a few chords before it and a few after are in.
    fn key_around(&self) -> Option<LocalKey> {
        const NEAR: usize = 4;
        let before = std::iter::successors(self.before(), Chord::before).take(NEAR);
        let after = std::iter::successors(self.next(), Chord::next).take(NEAR);
        self.key().or_else(|| {
            let (before, after) = (
                before.filter_map(|chord| chord.key()).next()?,
                after.filter_map(|chord| chord.key()).next()?,
            );
            (before == after).then_some(before)
        })
    }

    /// How a note is altered against the scale of the local key. The raised sixth and seventh of
    /// minor are its own.
    #[must_use]
    pub fn alteration(&self, pitch: Pitch) -> Option<Altered> {
        let LocalKey { tonic, minor } = self.key_around()?;
        let place = fifths(pitch) - tonic;
        let (own, also) = if minor {
            (-4..=2, [3, 5])
        } else {
            (-1..=5, [0, 0])
        };
        if own.contains(&place) || also.contains(&place) {
            return None;
        }
        Some(if place < *own.start() {
            Altered::Lowered
        } else {
            Altered::Raised
        })
    }

    /// The note belongs to the scale of its key, or its key is not sure.
    #[must_use]
    pub fn has_in_key(&self, pitch: Pitch) -> bool {
        self.alteration(pitch).is_none()
    }

    /// The note belongs to the scale of the key or of one a fifth from it, as the modes of one
    /// signature have it.
    #[must_use]
    pub fn has_in_modes(&self, pitch: Pitch) -> bool {
        let Some(LocalKey { tonic, minor }) = self.key() else {
            return true;
        };
        let place = fifths(pitch) - tonic;
        let own = if minor { -5..=3 } else { -2..=6 };
        own.contains(&place) || (minor && place == 5)
    }

    /// A note of the chord that may count as altered: raised, its third or the root of a
    /// diminished chord, which lead, or the fifth of an augmented one; lowered, any but in a
    /// dominant that goes to its tonic. What else is strange to the key belongs to the degree
    /// that the chord leads to.
    #[must_use]
    pub fn is_altered(&self, member: &Member) -> Option<Altered> {
        let way = self.alteration(member.pitch)?;
        let leads = match self.quality().triad() {
            Quality::Diminished => member.tone == Tone::Root,
            Quality::Augmented => member.tone >= Tone::Third,
            _ => member.tone == Tone::Third,
        };
        let counts = match way {
            Altered::Raised => leads,
            Altered::Lowered => self.resolves_to().is_none(),
        };
        (counts && self.heard_otherwise(member.pitch)).then_some(way)
    }

    /// The same letter was heard with another sign in this chord or one of the four before: the
    /// note is altered here, and no new key has begun.
    fn heard_otherwise(&self, pitch: Pitch) -> bool {
        let mut near = std::iter::successors(Some(*self), Chord::before).take(5);
        near.any(|chord| {
            chord.soundings().any(|there| {
                let mut voices = self.piece.texture.sounding(there.index);
                voices.any(|v| {
                    there
                        .pitch(v)
                        .is_some_and(|p| p.letter() == pitch.letter() && p.sign != pitch.sign)
                })
            })
        })
    }

    /// The leading note is strange to the natural scale: the raised seventh of minor, or one
    /// applied to another degree.
    #[must_use]
    pub fn has_raised_leading_note(&self) -> bool {
        let Some(key) = self.key() else { return false };
        let own = self.leads_to() == Some(key.tonic);
        key.minor || !own
    }

    /// The local key in words: `C major`; `its key` where that is not sure.
    #[must_use]
    pub fn key_name(&self) -> String {
        let Some(key) = self.key_around() else {
            return "its key".to_owned();
        };
        let mode = if key.minor { "minor" } else { "major" };
        format!("{} {mode}", named(key.tonic))
    }

    /// The place of its root in a key, 1 to 7, where the scale has it.
    #[must_use]
    pub fn degree_in_key_of(&self, other: &Chord<'_>) -> Option<u8> {
        let (own, key) = (self.key()?, other.key()?);
        (own.tonic == key.tonic && own.minor == key.minor)
            .then(|| self.degree())
            .flatten()
    }

    /// It has a major third, which leads: a dominant where it stands on the fifth degree.
    #[must_use]
    pub fn has_major_third(&self) -> bool {
        self.quality().triad() == Quality::Major
    }
}

impl PairMove<'_> {
    /// The interval left is an augmented sixth, in any octave.
    #[must_use]
    pub fn leaves_augmented_sixth(&self) -> bool {
        let sixth = |i: Interval| i.size() % 7 == 5 && i.is_augmented();
        self.moves() && self.before().is_some_and(sixth)
    }

    /// Each of two voices an augmented sixth apart that moves goes out by a semitone; or the
    /// upper one goes down by a chromatic semitone.
    #[must_use]
    pub fn opens_augmented_sixth_here(&self) -> bool {
        let gap = |voice| self.moved(voice).map(|i| i.0);
        let (top, foot) = if self.step.is_crossed() {
            (self.pair.lower, self.pair.upper)
        } else {
            (self.pair.upper, self.pair.lower)
        };
        let stays_or = |gap: Option<Gap>, way: i32| {
            gap.is_some_and(|g| {
                (g.steps, g.semitones) == (0, 0) || (g.steps, g.semitones) == (way, way)
            })
        };
        let chromatic = gap(top).is_some_and(|g| (g.steps, g.semitones) == (0, -1));
        (stays_or(gap(top), 1) || chromatic) && stays_or(gap(foot), -1)
    }
}
