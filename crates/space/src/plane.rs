//! The plane of ordered pairs, and its first foldings: torus and half-plane.
//!
//! A pair of voices is a point `(x, y)`; along the diagonal lies `x + y`, across it the ordered
//! interval `y - x`. Octave shifts roll the plane up to the torus of pitch-class pairs; forgetting
//! which voice is which folds it in the mirror `y = x` to a half-plane. Both quotients at once
//! are the strip ([`crate::StripPoint`]). The same foldings for any number of voices are
//! [`on_torus`] and [`unordered`]; both at once are [`crate::Chord`].

use crate::octave::Octave;

/// An ordered pair of pitches on one lattice.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct PlanePoint {
    /// The nominally lower voice.
    pub x: i32,
    /// The nominally upper voice.
    pub y: i32,
}

impl PlanePoint {
    /// The position along the diagonal, doubled to stay whole: `x + y`.
    #[must_use]
    pub const fn along(self) -> i64 {
        self.x as i64 + self.y as i64
    }

    /// The position across the diagonal, doubled to stay whole: the ordered interval `y - x`.
    #[must_use]
    pub const fn across(self) -> i64 {
        self.y as i64 - self.x as i64
    }

    /// The point with these two coordinates; `None` where no lattice point lies (their parities
    /// differ) or it lies out of reach.
    #[must_use]
    pub fn at(along: i64, across: i64) -> Option<PlanePoint> {
        let twice_x = along.checked_sub(across)?;
        let twice_y = along.checked_add(across)?;
        if twice_x % 2 != 0 {
            return None;
        }
        Some(PlanePoint {
            x: i32::try_from(twice_x / 2).ok()?,
            y: i32::try_from(twice_y / 2).ok()?,
        })
    }

    /// The pair of pitch classes: the point of the torus.
    #[must_use]
    pub const fn on_torus(self, octave: Octave) -> PlanePoint {
        PlanePoint {
            x: octave.residue(self.x),
            y: octave.residue(self.y),
        }
    }

    /// Folded in the mirror `y = x`: the point of the half-plane `x <= y`.
    #[must_use]
    pub const fn unordered(self) -> PlanePoint {
        if self.x <= self.y {
            self
        } else {
            PlanePoint {
                x: self.y,
                y: self.x,
            }
        }
    }

    /// Reflected in the mirror `y - x = octaves * N`: along stays, across turns about the mirror.
    /// `None` out of reach.
    #[must_use]
    pub fn reflected(self, octave: Octave, octaves: i32) -> Option<PlanePoint> {
        let shift = octaves.checked_mul(octave.size())?;
        Some(PlanePoint {
            x: self.y.checked_sub(shift)?,
            y: self.x.checked_add(shift)?,
        })
    }

    /// The glide `(x, y) -> (y, x + N)`, which the strip does not see. `None` out of reach.
    #[must_use]
    pub fn glided(self, octave: Octave) -> Option<PlanePoint> {
        Some(PlanePoint {
            x: self.y,
            y: self.x.checked_add(octave.size())?,
        })
    }
}

/// The point of the torus `T^n` under an ordered tuple: its pitch classes, voice by voice.
#[must_use]
pub fn on_torus(octave: Octave, pitches: &[i32]) -> Vec<i32> {
    pitches.iter().map(|&p| octave.residue(p)).collect()
}

/// The point of `R^n / S_n` under an ordered tuple: its pitches from the bottom up.
#[must_use]
pub fn unordered(pitches: &[i32]) -> Vec<i32> {
    let mut sorted = pitches.to_vec();
    sorted.sort_unstable();
    sorted
}
