//! The two lattices on which a spelled pitch stands.

/// A spelled pitch as a point on both lattices: scale steps and semitones.
///
/// Units: `step` counts letter names (C0 = 0, D0 = 1, C4 = 28), `semitone` counts semitones with
/// C4 = 60. Neither decides the other: C♯4 and D♭4 share a semitone and differ by a step.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Place {
    /// Letter position, seven to the octave.
    pub step: i32,
    /// Semitone position, twelve to the octave, C4 = 60.
    pub semitone: i32,
}

/// An ordered interval, from one [`Place`] up to another: negative where the second is lower.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Gap {
    /// Scale steps: 0 for a unison, 4 for a fifth, 7 for an octave.
    pub steps: i32,
    /// Semitones.
    pub semitones: i32,
}

impl Place {
    /// The place of a white key, by its letter position. Seven notes spread over twelve as evenly
    /// as can be: `floor((12 step + 5) / 7)` above C0 (the J-function of Clough and Douthett
    /// 1991, from memory; held against the white keys by a test).
    #[must_use]
    pub const fn white_key(step: i32) -> Place {
        let semitone = (12 * step as i64 + 5).div_euclid(7) + 12;
        Place {
            step,
            semitone: if semitone > i32::MAX as i64 {
                i32::MAX
            } else if semitone < i32::MIN as i64 {
                i32::MIN
            } else {
                semitone as i32
            },
        }
    }

    /// The ordered interval from `self` up to `other`. Beyond the reach of `i32` it stays at the
    /// end of that reach.
    #[must_use]
    pub const fn up_to(self, other: Place) -> Gap {
        Gap {
            steps: other.step.saturating_sub(self.step),
            semitones: other.semitone.saturating_sub(self.semitone),
        }
    }
}

impl Gap {
    /// The interval as it sounds, from the lower note to the higher: the fold in the mirror at
    /// the unison. Sounding height decides; between enharmonic notes, the letters do.
    #[must_use]
    pub const fn sounding(self) -> Gap {
        if self.semitones < 0 || (self.semitones == 0 && self.steps < 0) {
            Gap {
                steps: self.steps.saturating_neg(),
                semitones: self.semitones.saturating_neg(),
            }
        } else {
            self
        }
    }
}
