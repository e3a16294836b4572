//! The harmony that the composer states: chords as their notes, and the figures of a bass.
//!
//! Notes are places among the fifths ([`crate::fifths`]), so that nobody below the notation reads
//! numerals.

use crate::{Mode, Time, fifths::named};

/// A key in which a chord is stated.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct StatedKey {
    /// The tonic's place among the fifths.
    pub tonic: i32,
    /// Its mode.
    pub mode: Mode,
}

/// A chord that the composer states for a while.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StatedChord {
    /// From when.
    pub from: Time,
    /// Until when.
    pub until: Time,
    /// As it is written: `V6/5`, or the figures of a bass.
    pub written: String,
    /// Its root.
    pub root: i32,
    /// Its notes from the root up, a third apart: root, third, fifth, and seventh and ninth where
    /// it has them.
    pub tones: Vec<i32>,
    /// Notes that its figures ask for beside the chord, as ornaments: the fourth before the third.
    pub beside: Vec<i32>,
    /// The note in the bass, where figures tell it.
    pub bass: Option<i32>,
    /// The key it is stated in; figures of a bass tell none.
    pub key: Option<StatedKey>,
}

impl StatedChord {
    /// Its notes by name, from the root up: `G B D F`.
    #[must_use]
    pub fn notes(&self) -> String {
        let names: Vec<String> = self.tones.iter().map(|place| named(*place)).collect();
        names.join(" ")
    }
}

/// What a sign does to a figure.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum FigureSign {
    /// `#`: a semitone above what the signature makes of it.
    Raised,
    /// `b`: a semitone below.
    Lowered,
    /// `n`: the bare letter.
    Natural,
}

/// One figure over a bass.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct StatedFigure {
    /// The interval over the bass, 2 to 9; a sign alone is a third.
    pub number: u8,
    /// Its sign.
    pub sign: Option<FigureSign>,
}

/// A stack of figures that holds for a while. What its notes are is known with the bass.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StatedFigures {
    /// From when.
    pub from: Time,
    /// Until when.
    pub until: Time,
    /// As it is written: `6/5`.
    pub written: String,
    /// The figures, highest first; never empty.
    pub stack: Vec<StatedFigure>,
}
