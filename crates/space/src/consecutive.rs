//! Consecutive, direct and unequal perfect intervals: where a step starts and ends against the
//! perfect lines of the plane.

use crate::lattice::Gap;
use crate::motion::{Leg, Motion};

/// A family of perfect lines: the 45-degree lines of unisons and octaves, or of fifths.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Family {
    /// Unison, octave, fifteenth and so on.
    Octave,
    /// Fifth, twelfth and so on.
    Fifth,
}

/// What a step does with the perfect lines.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Consecutive {
    /// From one perfect line to one of the same family, both voices moving the same way.
    Same(Family),
    /// The same, the voices moving in opposite directions (equal displacement modulo the octave,
    /// or a crossing).
    Contrary(Family),
    /// The same two pitch classes again, one voice moving by octaves: no consecutive.
    Repeat(Family),
    /// Arrival on a perfect line from outside its family, both voices moving the same way.
    Direct(Family),
    /// Parallel in scale steps, exactly one end perfect: see [`Way`].
    Unequal(Family, Way),
}

/// Which end of an unequal consecutive is the perfect one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Way {
    /// Diminished or augmented to perfect.
    IntoPerfect,
    /// Perfect to diminished or augmented.
    OutOfPerfect,
}

impl Gap {
    /// The family of the perfect line this interval lies on, as it sounds; `None` off them all.
    /// Letters and semitones must agree on the octave as well: C4 to B♯4 is no octave.
    #[must_use]
    pub const fn family(self) -> Option<Family> {
        let g = self.sounding();
        let octaves = g.steps.div_euclid(7) as i64;
        match (g.steps.rem_euclid(7), g.semitones as i64 - 12 * octaves) {
            (0, 0) => Some(Family::Octave),
            (4, 7) => Some(Family::Fifth),
            _ => None,
        }
    }

    /// The generic family by letters alone: an octave or fifth of any quality.
    #[must_use]
    pub const fn generic_family(self) -> Option<Family> {
        match self.sounding().steps.rem_euclid(7) {
            0 => Some(Family::Octave),
            4 => Some(Family::Fifth),
            _ => None,
        }
    }
}

impl Leg {
    /// What this step does with the perfect lines, or `None`. A sounding fifth that turns into a
    /// fourth is no consecutive, however equal the two displacements are modulo the octave.
    #[must_use]
    pub fn consecutive(self) -> Option<Consecutive> {
        let (before, after) = (self.before().family(), self.after().family());
        match self.motion() {
            Motion::Still => None,
            Motion::Oblique => match (before, after) {
                (Some(a), Some(b)) if a == b => Some(Consecutive::Repeat(a)),
                _ => None,
            },
            Motion::Contrary => match (before, after) {
                (Some(a), Some(b)) if a == b => Some(Consecutive::Contrary(a)),
                _ => None,
            },
            Motion::Parallel | Motion::Similar => self.same_way(before, after),
        }
    }

    fn same_way(self, before: Option<Family>, after: Option<Family>) -> Option<Consecutive> {
        let generic = |gap: Gap, family| gap.generic_family() == Some(family);
        match (before, after) {
            (Some(a), Some(b)) if a == b => Some(Consecutive::Same(a)),
            (_, Some(b)) if generic(self.before(), b) => {
                Some(Consecutive::Unequal(b, Way::IntoPerfect))
            }
            (_, Some(b)) => Some(Consecutive::Direct(b)),
            (Some(a), None) if generic(self.after(), a) => {
                Some(Consecutive::Unequal(a, Way::OutOfPerfect))
            }
            _ => None,
        }
    }
}
