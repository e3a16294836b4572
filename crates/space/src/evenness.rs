//! How evenly a chord divides the octave: its distance from the core and from the boundary.

use crate::chord::Chord;
use crate::error::SpaceError;
use crate::norm::Norm;
use num_rational::Ratio;

/// The gaps of a chord as one complex number, `sum of g_j w^j` with `w = exp(2 pi i / n)`, for
/// the gaps of the canonical form counted from 0. Nought at the evenly spaced chord; the glide
/// turns it by `1 / w`. For drawing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Zeta {
    /// Real part, in lattice points.
    pub re: f64,
    /// Imaginary part, in lattice points.
    pub im: f64,
}

impl Zeta {
    /// The square of its absolute value.
    #[must_use]
    pub fn norm_squared(self) -> f64 {
        self.re * self.re + self.im * self.im
    }
}

impl Chord {
    /// The squared Euclidean distance from the core: from the nearest evenly spaced chord, over
    /// all real transpositions of it. Exact, in squared lattice points; nought for an empty
    /// chord.
    ///
    /// With the notes ascending and `r_i = x_i - N(i - 1)/n` it is the sum of the squared
    /// deviations of `r_i` from their mean.
    ///
    /// # Errors
    /// [`SpaceError::OutOfRange`] where the fraction does not fit (chords of thousands of notes).
    pub fn core_distance_squared(&self) -> Result<Ratio<i64>, SpaceError> {
        let notes = self.len() as i128;
        if notes == 0 {
            return Ok(Ratio::from_integer(0));
        }
        let exact = || {
            let (mut sum, mut squares) = (0_i128, 0_i128);
            for (i, &residue) in (0_i128..).zip(self.residues()) {
                // n times r_i, to stay whole.
                let r = notes * i128::from(residue) - i128::from(self.octave().size()) * i;
                sum = sum.checked_add(r)?;
                squares = squares.checked_add(r.checked_mul(r)?)?;
            }
            let over = notes
                .checked_mul(squares)?
                .checked_sub(sum.checked_mul(sum)?)?;
            let under = notes.checked_mul(notes)?.checked_mul(notes)?;
            let reduced = Ratio::new(over, under);
            let numer = i64::try_from(*reduced.numer()).ok()?;
            Some(Ratio::new(numer, i64::try_from(*reduced.denom()).ok()?))
        };
        exact().ok_or(SpaceError::OutOfRange)
    }

    /// The distance from the boundary: from the nearest chord with a doubled note (squared in
    /// [`Norm::L2`]), which is where the two notes of the smallest gap meet. `None` for fewer
    /// than two notes, which cannot meet.
    #[must_use]
    pub fn boundary_distance(&self, norm: Norm) -> Option<Ratio<i64>> {
        let gap = self.smallest_gap()?;
        Some(match norm {
            Norm::L1 => Ratio::from_integer(gap),
            // Each of the two goes half the way.
            Norm::L2 => Ratio::new(gap * gap, 2),
            Norm::Linf => Ratio::new(gap, 2),
        })
    }

    /// The smallest gap between neighbours on the circle; nought where a note is doubled. `None`
    /// for fewer than two notes.
    #[must_use]
    pub fn smallest_gap(&self) -> Option<i64> {
        if self.len() < 2 {
            return None;
        }
        self.canonical().gaps().iter().min().map(|&g| i64::from(g))
    }

    /// The gaps as one complex number.
    #[must_use]
    pub fn zeta(&self) -> Zeta {
        let point = self.canonical();
        let turn = std::f64::consts::TAU / point.len().max(1) as f64;
        let mut zeta = Zeta { re: 0.0, im: 0.0 };
        for (j, &gap) in point.gaps().iter().enumerate() {
            let (sin, cos) = (turn * j as f64).sin_cos();
            zeta.re += f64::from(gap) * cos;
            zeta.im += f64::from(gap) * sin;
        }
        zeta
    }
}
