//! Triads modulo octave and order: the triangular prism, its end glued after a third of a turn.
//!
//! A triad stands on the layer of its sum; inside the layer the three gaps are its coordinates in
//! an equilateral triangle, with the evenly spaced chord in the middle and doubled notes on the
//! sides. `(N; g1, g2, g3)` is the same place as `(0; g3, g1, g2)`.
//!
//! Source: Tymoczko 2006. The only floats are for drawing.

use crate::alcove::AlcovePoint;
use crate::chord::Chord;
use crate::error::SpaceError;
use crate::octave::Octave;

/// A lattice point of the prism: a triad, in its canonical form.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct PrismPoint {
    octave: Octave,
    layer: i32,
    gaps: [i32; 3],
}

impl PrismPoint {
    /// The point of the prism under three pitches, in whatever order and octaves.
    #[must_use]
    pub fn under(octave: Octave, pitches: [i32; 3]) -> PrismPoint {
        let point = AlcovePoint::under(octave, &pitches).reduced();
        let gaps = <[i32; 3]>::try_from(point.gaps()).unwrap_or_default();
        PrismPoint {
            octave,
            // Reduced: below N.
            layer: point.layer() as i32,
            gaps,
        }
    }

    /// The point of a chord.
    ///
    /// # Errors
    /// [`SpaceError::NoteCount`] unless the chord has three notes.
    pub fn of(chord: &Chord) -> Result<PrismPoint, SpaceError> {
        match *chord.residues() {
            [a, b, c] => Ok(PrismPoint::under(chord.octave(), [a, b, c])),
            _ => Err(SpaceError::NoteCount {
                wanted: 3,
                found: chord.len(),
            }),
        }
    }

    /// The octave of the lattice.
    #[must_use]
    pub const fn octave(self) -> Octave {
        self.octave
    }

    /// The layer, `0..N`: the position along the prism.
    #[must_use]
    pub const fn layer(self) -> i32 {
        self.layer
    }

    /// The three gaps: the barycentric coordinates in the triangle.
    #[must_use]
    pub const fn gaps(self) -> [i32; 3] {
        self.gaps
    }

    /// How many of the three sides the point lies on: 0 inside, 1 with a doubled note, 2 on the
    /// edge, where all three notes are one.
    #[must_use]
    pub fn sides(self) -> usize {
        self.gaps.iter().filter(|&&g| g == 0).count()
    }

    /// Isometric coordinates in lattice points: along the prism, then two in the triangle. Their
    /// Euclidean distance is the Euclidean size of the straight voice leading.
    #[must_use]
    pub fn isometric(self) -> [f64; 3] {
        let [g1, g2, _] = self.gaps.map(f64::from);
        [
            f64::from(self.layer) / 3_f64.sqrt(),
            g1 / 2_f64.sqrt(),
            (g1 + 2.0 * g2) / 6_f64.sqrt(),
        ]
    }
}
