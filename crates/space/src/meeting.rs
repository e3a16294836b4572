//! Crossing, overlap and exchange: the mirror at the unison.

use crate::lattice::Gap;
use crate::motion::Leg;

/// On which side of the mirror an ordered interval lies, by sound: 1 uncrossed, 0 on the mirror,
/// -1 crossed.
#[must_use]
pub const fn side(gap: Gap) -> i32 {
    gap.semitones.signum()
}

/// Whether the nominally lower voice sounds above the upper one.
#[must_use]
pub const fn crossed(gap: Gap) -> bool {
    gap.semitones < 0
}

impl Leg {
    /// The step passes through the mirror at the unison. A crossing that rests on a unison
    /// between needs the last side that was not the mirror: see [`side`].
    #[must_use]
    pub const fn crosses(self) -> bool {
        side(self.before()) * side(self.after()) < 0
    }

    /// A voice moves beyond where the other one just was, both ends uncrossed: the corner of the
    /// two one-voice-at-a-time routes lies behind the mirror.
    #[must_use]
    pub const fn overlaps(self) -> bool {
        side(self.before()) >= 0
            && side(self.after()) >= 0
            && (self.lower.1.semitone > self.upper.0.semitone
                || self.upper.1.semitone < self.lower.0.semitone)
    }

    /// The two voices take over each other's pitches.
    #[must_use]
    pub const fn exchanges(self) -> bool {
        self.before().semitones != 0
            && self.lower.1.semitone == self.upper.0.semitone
            && self.upper.1.semitone == self.lower.0.semitone
    }

    /// The two voices take over each other's pitch classes, in whatever octave.
    #[must_use]
    pub const fn exchanges_classes(self) -> bool {
        self.before().semitones.rem_euclid(12) != 0
            && (self.lower.1.semitone - self.upper.0.semitone).rem_euclid(12) == 0
            && (self.upper.1.semitone - self.lower.0.semitone).rem_euclid(12) == 0
    }

    /// The step ends in a unison it did not start from.
    #[must_use]
    pub const fn enters_unison(self) -> bool {
        self.before().semitones != 0 && self.after().semitones == 0
    }

    /// The step leaves a unison.
    #[must_use]
    pub const fn leaves_unison(self) -> bool {
        self.before().semitones == 0 && self.after().semitones != 0
    }
}
