//! One pair's step into a sonority, packed small.

use partwright_space::{Consecutive, Gap, Leg, Motion, side};

const BEFORE: u8 = 1;
const AFTER: u8 = 1 << 1;
const ONE_VOICE: u8 = 1 << 2;
const PHRASE: u8 = 1 << 3;
const OVERLAPS: u8 = 1 << 4;
const EXCHANGES: u8 = 1 << 5;
const SAME_CLASSES: u8 = 1 << 6;

#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
struct SmallGap {
    steps: i16,
    semitones: i16,
}

impl From<Gap> for SmallGap {
    fn from(gap: Gap) -> SmallGap {
        // A pitch has an octave figure of one digit: no interval comes near the limits.
        SmallGap {
            steps: gap.steps as i16,
            semitones: gap.semitones as i16,
        }
    }
}

impl From<SmallGap> for Gap {
    fn from(gap: SmallGap) -> Gap {
        Gap {
            steps: gap.steps.into(),
            semitones: gap.semitones.into(),
        }
    }
}

/// How one pair of voices takes the step into a sonority. All of it is computed by
/// `partwright_space`; rules only read.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct PairStep {
    before: SmallGap,
    after: SmallGap,
    motion: Option<Motion>,
    consecutive: Option<Consecutive>,
    side: i8,
    flags: u8,
}

impl PairStep {
    /// A pair of which at least one voice is silent or unknown at the arrival.
    pub(super) fn absent() -> PairStep {
        PairStep::default()
    }

    /// A pair that sounds now and did not before.
    pub(super) fn entry(after: Gap) -> PairStep {
        PairStep {
            after: after.into(),
            side: side(after) as i8,
            flags: AFTER,
            ..PairStep::default()
        }
    }

    /// A pair that sounds on both sides of the step. `last_side` is the side of the mirror it was
    /// on before, a unison not counted.
    pub(super) fn taken(leg: Leg, last_side: i8) -> PairStep {
        let now = side(leg.after()) as i8;
        let mut flags = BEFORE | AFTER;
        for (flag, holds) in [
            (OVERLAPS, leg.overlaps()),
            (EXCHANGES, leg.exchanges()),
            (SAME_CLASSES, leg.keeps_classes()),
        ] {
            if holds {
                flags |= flag;
            }
        }
        PairStep {
            before: leg.before().into(),
            after: leg.after().into(),
            motion: Some(leg.motion()),
            consecutive: leg.consecutive(),
            side: if now == 0 { last_side } else { now },
            flags,
        }
    }

    pub(super) fn as_one_voice(mut self) -> PairStep {
        self.flags |= ONE_VOICE;
        self
    }

    pub(super) fn looking_across_phrase(mut self) -> PairStep {
        self.flags |= PHRASE;
        self
    }

    pub(super) const fn last_side(&self) -> i8 {
        self.side
    }

    const fn has(&self, flag: u8) -> bool {
        self.flags & flag != 0
    }

    /// The motion, where both voices sound on both sides.
    #[must_use]
    pub const fn motion(&self) -> Option<Motion> {
        self.motion
    }

    /// What the step does with the perfect intervals.
    #[must_use]
    pub const fn consecutive(&self) -> Option<Consecutive> {
        self.consecutive
    }

    /// The ordered interval before the step, lower voice in the score to upper: negative where
    /// they are crossed.
    #[must_use]
    pub fn before(&self) -> Option<Gap> {
        self.has(BEFORE).then(|| self.before.into())
    }

    /// The ordered interval at the arrival.
    #[must_use]
    pub fn after(&self) -> Option<Gap> {
        self.has(AFTER).then(|| self.after.into())
    }

    /// The two count as one voice here: a doubling, or a copied bar.
    #[must_use]
    pub const fn is_one_voice(&self) -> bool {
        self.has(ONE_VOICE)
    }

    /// A phrase of either voice, or a section, ended between departure and arrival.
    #[must_use]
    pub const fn across_phrase(&self) -> bool {
        self.has(PHRASE)
    }

    /// One voice moves beyond where the other just was, both ends uncrossed.
    #[must_use]
    pub const fn overlaps(&self) -> bool {
        self.has(OVERLAPS)
    }

    /// The two take over each other's pitches.
    #[must_use]
    pub const fn exchanges(&self) -> bool {
        self.has(EXCHANGES)
    }

    /// The same two pitch classes before and after: a change of octave, or an exchange.
    #[must_use]
    pub const fn keeps_classes(&self) -> bool {
        self.has(SAME_CLASSES)
    }

    /// The voice lower in the score sounds above the other: since the last time they were apart,
    /// so that a unison on the way changes nothing.
    #[must_use]
    pub const fn is_crossed(&self) -> bool {
        self.side < 0
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_step_stays_small() {
        assert!(size_of::<PairStep>() <= 16, "{}", size_of::<PairStep>());
    }
}
