//! Chords by their spelling: a root among the fifths and a quality.

use crate::mode::{fifths, named};
use partwright_score::Pitch;

/// What stands over a root.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Quality {
    /// Major triad.
    Major,
    /// Minor triad.
    Minor,
    /// Diminished triad.
    Diminished,
    /// Augmented triad.
    Augmented,
    /// Dominant seventh chord.
    DominantSeventh,
    /// Major seventh chord.
    MajorSeventh,
    /// Minor seventh chord.
    MinorSeventh,
    /// Half-diminished seventh chord.
    HalfDiminishedSeventh,
    /// Diminished seventh chord.
    DiminishedSeventh,
}

impl Quality {
    /// Every quality, triads first.
    pub const ALL: [Quality; 9] = [
        Quality::Major,
        Quality::Minor,
        Quality::Diminished,
        Quality::Augmented,
        Quality::DominantSeventh,
        Quality::MajorSeventh,
        Quality::MinorSeventh,
        Quality::HalfDiminishedSeventh,
        Quality::DiminishedSeventh,
    ];

    /// Its notes as places among the fifths from the root: root, third, fifth, seventh.
    #[must_use]
    pub const fn tones(self) -> &'static [i32] {
        match self {
            Quality::Major => &[0, 4, 1],
            Quality::Minor => &[0, -3, 1],
            Quality::Diminished => &[0, -3, -6],
            Quality::Augmented => &[0, 4, 8],
            Quality::DominantSeventh => &[0, 4, 1, -2],
            Quality::MajorSeventh => &[0, 4, 1, 5],
            Quality::MinorSeventh => &[0, -3, 1, -2],
            Quality::HalfDiminishedSeventh => &[0, -3, -6, -2],
            Quality::DiminishedSeventh => &[0, -3, -6, -9],
        }
    }

    /// The triad in it.
    #[must_use]
    pub const fn triad(self) -> Quality {
        match self {
            Quality::DominantSeventh | Quality::MajorSeventh => Quality::Major,
            Quality::MinorSeventh => Quality::Minor,
            Quality::HalfDiminishedSeventh | Quality::DiminishedSeventh => Quality::Diminished,
            triad => triad,
        }
    }

    /// What a musician calls it behind the root's name.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Quality::Major => "major",
            Quality::Minor => "minor",
            Quality::Diminished => "diminished",
            Quality::Augmented => "augmented",
            Quality::DominantSeventh => "dominant seventh",
            Quality::MajorSeventh => "major seventh",
            Quality::MinorSeventh => "minor seventh",
            Quality::HalfDiminishedSeventh => "half-diminished seventh",
            Quality::DiminishedSeventh => "diminished seventh",
        }
    }
}

/// A chord.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Chord {
    /// Its root's place among the fifths: 0 for C, 1 for G, -1 for F.
    pub root: i32,
    /// What stands over it.
    pub quality: Quality,
}

impl Chord {
    /// `G dominant seventh`, `A minor`.
    #[must_use]
    pub fn name(self) -> String {
        format!("{} {}", named(self.root), self.quality.name())
    }

    /// The letter of its root, 0 for C to 6 for B.
    #[must_use]
    pub fn root_letter(self) -> u8 {
        // Each fifth up is four letters on.
        u8::try_from((self.root * 4).rem_euclid(7)).unwrap_or(0)
    }

    /// Which of its notes a pitch is: 0 the root, 1 the third, 2 the fifth, 3 the seventh.
    #[must_use]
    pub fn tone(self, pitch: Pitch) -> Option<usize> {
        let place = fifths(pitch) - self.root;
        self.quality.tones().iter().position(|tone| *tone == place)
    }
}
