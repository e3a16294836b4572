//! The motion of one step of two voices: where its vector lies against the 45-degree cone.

use crate::lattice::{Gap, Place};
use crate::norm::Norm;

/// How a pair of voices takes a step.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Motion {
    /// Neither voice moves.
    Still,
    /// Exactly one voice moves.
    Oblique,
    /// Both move the same way by the same interval.
    Parallel,
    /// Both move the same way by different intervals.
    Similar,
    /// The voices move in opposite directions.
    Contrary,
}

/// The displacement of a pair on one lattice: `dx` for the nominally lower voice, `dy` for the
/// upper one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Vector {
    /// Displacement of the nominally lower voice.
    pub dx: i32,
    /// Displacement of the nominally upper voice.
    pub dy: i32,
}

impl Vector {
    /// The component along the diagonal, doubled to stay whole: `dx + dy`.
    #[must_use]
    pub const fn along(self) -> i32 {
        self.dx.saturating_add(self.dy)
    }

    /// The component across the diagonal, doubled to stay whole: `dy - dx`, the change of the
    /// ordered interval.
    #[must_use]
    pub const fn across(self) -> i32 {
        self.dy.saturating_sub(self.dx)
    }

    /// The class of the vector by its place against the cone `|along| = |across|`, on this
    /// lattice alone.
    #[must_use]
    pub const fn class(self) -> Motion {
        // Wider than the fields, so that no extreme vector changes its class by saturating.
        let s = (self.dx as i64 + self.dy as i64).abs();
        let t = (self.dy as i64 - self.dx as i64).abs();
        if s == 0 && t == 0 {
            Motion::Still
        } else if s == t {
            Motion::Oblique
        } else if t == 0 {
            Motion::Parallel
        } else if s > t {
            Motion::Similar
        } else {
            Motion::Contrary
        }
    }

    /// Contrary motion by equal distances: straight across, at right angles to the mirror.
    #[must_use]
    pub const fn exactly_contrary(self) -> bool {
        self.dx != 0 && self.dx as i64 + self.dy as i64 == 0
    }

    /// The size of the step (squared in [`Norm::L2`]), read off the two components: the larger of
    /// them in L1, half the sum of their squares in L2, half their sum in Linf.
    #[must_use]
    pub const fn size(self, norm: Norm) -> i64 {
        let s = (self.dx as i64 + self.dy as i64).abs();
        let t = (self.dy as i64 - self.dx as i64).abs();
        match norm {
            Norm::L1 => {
                if s >= t {
                    s
                } else {
                    t
                }
            }
            // Both halves of a sum of squares of one parity; too large only at the ends of i32.
            Norm::L2 => match s.saturating_mul(s).checked_add(t.saturating_mul(t)) {
                Some(twice) => twice / 2,
                None => i64::MAX,
            },
            Norm::Linf => (s + t) / 2,
        }
    }
}

/// One step of a pair of voices: two points and the way between them. The voices keep their
/// order by name, whether or not they cross.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Leg {
    /// The nominally lower voice, before and after.
    pub lower: (Place, Place),
    /// The nominally upper voice, before and after.
    pub upper: (Place, Place),
}

impl Leg {
    /// The displacement in semitones.
    #[must_use]
    pub const fn semitones(self) -> Vector {
        Vector {
            dx: self.lower.1.semitone.saturating_sub(self.lower.0.semitone),
            dy: self.upper.1.semitone.saturating_sub(self.upper.0.semitone),
        }
    }

    /// The displacement in scale steps.
    #[must_use]
    pub const fn steps(self) -> Vector {
        Vector {
            dx: self.lower.1.step.saturating_sub(self.lower.0.step),
            dy: self.upper.1.step.saturating_sub(self.upper.0.step),
        }
    }

    /// The ordered interval before the step, lower voice to upper voice by name.
    #[must_use]
    pub const fn before(self) -> Gap {
        self.lower.0.up_to(self.upper.0)
    }

    /// The ordered interval after the step.
    #[must_use]
    pub const fn after(self) -> Gap {
        self.lower.1.up_to(self.upper.1)
    }

    /// The motion as counterpoint means it: direction from the semitones, sameness of the
    /// interval from the scale steps (a major third to a minor third is parallel; so is a
    /// chromatic slide of both voices).
    #[must_use]
    pub const fn motion(self) -> Motion {
        match self.semitones().class() {
            Motion::Parallel | Motion::Similar => {
                let steps = self.steps();
                if steps.across() == 0 {
                    Motion::Parallel
                } else {
                    Motion::Similar
                }
            }
            class => class,
        }
    }

    /// Both voices move the same way (parallel or similar).
    #[must_use]
    pub const fn same_direction(self) -> bool {
        matches!(self.motion(), Motion::Parallel | Motion::Similar)
    }
}
