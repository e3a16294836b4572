//! Dyads modulo octave and order: the Möbius strip with a mirror for its edge.
//!
//! A pair of pitches is `u = x + y` along the strip and `v = y - x` across it. Octave shifts and
//! the exchange of the two notes fold the plane into the cell `0 <= u < N`, `0 <= v <= N`, whose
//! two short ends are glued after a half-turn: `(u, v) ~ (u + N, N - v)`. The two long edges
//! `v = 0` and `v = N` are one closed curve, the unisons.
//!
//! The strip cannot tell an interval from its complement in the octave: a fifth and a fourth
//! stand at the same height. Whoever needs the difference must look at the ordered pair.
//!
//! Source: D. Tymoczko, "The Geometry of Musical Chords", Science 313 (2006); the closed form is
//! ours, held against the canonical form of [`crate::Chord`] by a test.

use crate::octave::Octave;

/// A point of the strip: an unordered pair of pitch classes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct StripPoint {
    octave: Octave,
    u: i32,
    v: i32,
}

impl StripPoint {
    /// The point of the strip under the pair of pitches `(x, y)`, in whatever order and octave:
    /// the fold in the mirrors first, then the glide back to the first cell.
    #[must_use]
    pub const fn under(octave: Octave, x: i32, y: i32) -> StripPoint {
        let n = octave.wide();
        let (x, y) = (x as i64, y as i64);
        let across = (y - x).rem_euclid(2 * n);
        let folded = if across <= n { across } else { 2 * n - across };
        let glides = (x + y).div_euclid(n);
        let u = x + y - glides * n;
        let v = if glides.rem_euclid(2) == 0 {
            folded
        } else {
            n - folded
        };
        StripPoint {
            octave,
            u: u as i32,
            v: v as i32,
        }
    }

    /// The octave of the lattice.
    #[must_use]
    pub const fn octave(self) -> Octave {
        self.octave
    }

    /// Position along the strip, `0..N`: the sum of the two notes, the layer.
    #[must_use]
    pub const fn u(self) -> i32 {
        self.u
    }

    /// Position across the strip, `0..=N`; 0 and N are the mirror edge.
    #[must_use]
    pub const fn v(self) -> i32 {
        self.v
    }

    /// Height above the mirror edge, `0..=N / 2`: the smaller of the interval and its complement.
    #[must_use]
    pub const fn height(self) -> i32 {
        let complement = self.octave.size() - self.v;
        if self.v <= complement {
            self.v
        } else {
            complement
        }
    }

    /// Twice the signed height about the centre line, `2v - N`: doubled because the centre of an
    /// odd octave is no lattice point. The glide turns its sign.
    #[must_use]
    pub const fn twice_from_centre(self) -> i32 {
        2 * self.v - self.octave.size()
    }

    /// Whether the two notes are one pitch class: a point of the edge.
    #[must_use]
    pub const fn on_edge(self) -> bool {
        self.height() == 0
    }

    /// The two pitch classes, in ascending order.
    #[must_use]
    pub fn residues(self) -> [i32; 2] {
        // u and v have the parity of a lattice point of the plane, so the halves are whole.
        let (u, v) = (i64::from(self.u), i64::from(self.v));
        let n = self.octave.wide();
        let mut pair = [
            ((u - v) / 2).rem_euclid(n) as i32,
            ((u + v) / 2).rem_euclid(n) as i32,
        ];
        pair.sort_unstable();
        pair
    }
}
