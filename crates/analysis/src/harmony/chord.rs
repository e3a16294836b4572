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
    /// Augmented sixth, Italian: over the raised fourth degree, here its root, a diminished third
    /// and a diminished fifth. In C minor F#, Ab, C; Ab is the bass.
    ItalianSixth,
    /// Augmented sixth, German: the Italian with a diminished seventh. In C minor F#, Ab, C, Eb.
    GermanSixth,
    /// Augmented sixth, French: over the second degree a major third, a diminished fifth and a
    /// minor seventh. In C minor D, F#, Ab, C.
    FrenchSixth,
}

impl Quality {
    /// Every quality, triads first.
    pub const ALL: [Quality; 12] = [
        Quality::Major,
        Quality::Minor,
        Quality::Diminished,
        Quality::Augmented,
        Quality::DominantSeventh,
        Quality::MajorSeventh,
        Quality::MinorSeventh,
        Quality::HalfDiminishedSeventh,
        Quality::DiminishedSeventh,
        Quality::ItalianSixth,
        Quality::GermanSixth,
        Quality::FrenchSixth,
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
            Quality::ItalianSixth => &[0, -10, -6],
            Quality::GermanSixth => &[0, -10, -6, -9],
            Quality::FrenchSixth => &[0, 4, -6, -2],
        }
    }

    /// It has a seventh. (Over the root; the French and the German sixth have one that way.)
    #[must_use]
    pub const fn has_seventh(self) -> bool {
        self.tones().len() > 3
    }

    /// The triad in it: what stands under the seventh. The French sixth has none but itself.
    #[must_use]
    pub const fn triad(self) -> Quality {
        match self {
            Quality::DominantSeventh | Quality::MajorSeventh => Quality::Major,
            Quality::MinorSeventh => Quality::Minor,
            Quality::HalfDiminishedSeventh | Quality::DiminishedSeventh => Quality::Diminished,
            Quality::GermanSixth => Quality::ItalianSixth,
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
            Quality::ItalianSixth => "Italian sixth",
            Quality::GermanSixth => "German sixth",
            Quality::FrenchSixth => "French sixth",
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
    /// `G dominant seventh`, `A minor`; an augmented sixth by its usual bass: `Ab German sixth`.
    #[must_use]
    pub fn name(self) -> String {
        format!("{} {}", named(self.called_by()), self.quality.name())
    }

    /// The place of the note it is called by: the root, or the usual bass of an augmented sixth.
    pub(super) const fn called_by(self) -> i32 {
        let under = match self.quality {
            Quality::ItalianSixth | Quality::GermanSixth => -10,
            Quality::FrenchSixth => -6,
            _ => 0,
        };
        self.root + under
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
