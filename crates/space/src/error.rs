//! What can be wrong with a question put to this crate.

use std::fmt;

/// Why a computation has no answer. Nothing in this crate panics on its input.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum SpaceError {
    /// An octave must have at least one point and at most [`crate::Octave::LARGEST`].
    OctaveSize(i32),
    /// The two chords stand on lattices with different octaves.
    DifferentOctaves(i32, i32),
    /// One chord is empty and the other is not: no voice leading covers both.
    EmptyChord,
    /// A bijective voice leading needs chords of the same size.
    DifferentSizes(usize, usize),
    /// This space holds chords of another number of notes.
    NoteCount {
        /// Notes of a chord of this space.
        wanted: usize,
        /// Notes of the chord given.
        found: usize,
    },
    /// With free doubling and no number of voices there is no end of voice leadings to list.
    EndlessVoices,
    /// Fewer voices were asked for than a chord has notes.
    TooFewVoices {
        /// Voices asked for.
        voices: usize,
        /// Notes that must all be sung.
        notes: usize,
    },
    /// A number lies so far out that the result cannot be given exactly.
    OutOfRange,
    /// The question leaves more choices open than this crate is willing to hold in memory.
    TooManyChoices,
}

impl fmt::Display for SpaceError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::OctaveSize(size) => write!(f, "an octave cannot have {size} points"),
            Self::DifferentOctaves(a, b) => {
                write!(f, "the chords stand on octaves of {a} and {b} points")
            }
            Self::EmptyChord => write!(f, "one chord is empty and the other is not"),
            Self::DifferentSizes(a, b) => {
                write!(f, "the chords have {a} and {b} notes, not the same number")
            }
            Self::NoteCount { wanted, found } => {
                write!(
                    f,
                    "the chord has {found} notes, this space holds chords of {wanted}"
                )
            }
            Self::EndlessVoices => {
                write!(
                    f,
                    "free doubling needs a number of voices to be listed in full"
                )
            }
            Self::TooFewVoices { voices, notes } => {
                write!(f, "{voices} voices cannot sing {notes} notes")
            }
            Self::OutOfRange => write!(f, "a pitch lies too far out for an exact answer"),
            Self::TooManyChoices => write!(f, "too many choices are left open"),
        }
    }
}

impl std::error::Error for SpaceError {}
