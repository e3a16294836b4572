//! The size of the octave on a lattice: how many points go round the pitch-class circle.

use crate::error::SpaceError;

/// The number of lattice points in an octave, at least 1: 12 for semitones, 7 for scale steps.
///
/// Every quotient in this crate takes it as a parameter, so a finer division of the octave is
/// only another value. The upper limit [`Octave::LARGEST`] keeps all sums inside `i64`.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Octave(i32);

impl Octave {
    /// Twelve semitones.
    pub const SEMITONES: Octave = Octave(12);
    /// Seven scale steps.
    pub const STEPS: Octave = Octave(7);
    /// The finest division allowed: more than a million points.
    pub const LARGEST: i32 = 1 << 20;

    /// An octave of `size` points.
    ///
    /// # Errors
    /// [`SpaceError::OctaveSize`] unless `1 <= size <= Octave::LARGEST`.
    pub const fn new(size: i32) -> Result<Octave, SpaceError> {
        if size >= 1 && size <= Octave::LARGEST {
            Ok(Octave(size))
        } else {
            Err(SpaceError::OctaveSize(size))
        }
    }

    /// The number of points.
    #[must_use]
    pub const fn size(self) -> i32 {
        self.0
    }

    /// The number of points, wide enough for sums.
    #[must_use]
    pub const fn wide(self) -> i64 {
        self.0 as i64
    }

    /// The pitch class of a pitch: its residue in `0..size`.
    #[must_use]
    pub const fn residue(self, pitch: i32) -> i32 {
        pitch.rem_euclid(self.0)
    }

    /// The distance of two pitches on the pitch-class circle, `0..=size / 2`.
    #[must_use]
    pub const fn circle_distance(self, a: i32, b: i32) -> i32 {
        let up = (b as i64 - a as i64).rem_euclid(self.wide()) as i32;
        if up <= self.0 - up { up } else { self.0 - up }
    }
}
