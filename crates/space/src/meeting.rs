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

    /// The two voices take over each other's pitch classes, in whatever octave; two notes of one
    /// class have nothing to exchange.
    #[must_use]
    pub const fn exchanges_classes(self) -> bool {
        self.before().semitones.rem_euclid(12) != 0
            && self.lower.1.semitone.rem_euclid(12) == self.upper.0.semitone.rem_euclid(12)
            && self.upper.1.semitone.rem_euclid(12) == self.lower.0.semitone.rem_euclid(12)
    }

    /// Both voices move by the same displacement modulo the octave, and by some: parallel on the
    /// torus of pitch classes, whatever it is in pitch. No test for consecutives: a fifth may
    /// turn into a fourth that way.
    #[must_use]
    pub const fn parallel_in_classes(self) -> bool {
        let dx = self.lower.1.semitone.rem_euclid(12) - self.lower.0.semitone.rem_euclid(12);
        let dy = self.upper.1.semitone.rem_euclid(12) - self.upper.0.semitone.rem_euclid(12);
        dx.rem_euclid(12) == dy.rem_euclid(12) && dx != 0
    }

    /// How many mirrors `y - x = 12k` the straight path of this step passes through; starting or
    /// ending on one does not count. Only the mirror at the unison is a crossing, the others are
    /// where the picture on the strip bounces.
    #[must_use]
    pub const fn mirrors_passed(self) -> u32 {
        let before = self.upper.0.semitone as i64 - self.lower.0.semitone as i64;
        let after = self.upper.1.semitone as i64 - self.lower.1.semitone as i64;
        let (low, high) = if before <= after {
            (before, after)
        } else {
            (after, before)
        };
        // Multiples of 12 strictly between: the last below `high` less the last up to `low`.
        let passed = (high - 1).div_euclid(12) - low.div_euclid(12);
        if passed > 0 { passed as u32 } else { 0 }
    }

    /// The same two pitch classes before and after, in whatever octaves: each voice stays or
    /// moves by octaves, or the two exchange.
    #[must_use]
    pub const fn keeps_classes(self) -> bool {
        let v = self.semitones();
        (v.dx.rem_euclid(12) == 0 && v.dy.rem_euclid(12) == 0) || self.exchanges_classes()
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
