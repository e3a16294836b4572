//! The alcove: the prism over a simplex into which the mirrors fold ordered `n`-tuples.
//!
//! The mirrors are the hyperplanes `x_j - x_i = kN`. Between them lies the domain
//! `D = { x1 <= x2 <= ... <= xn <= x1 + N }`. What is left of octave shifts and permutations
//! inside `D` is the glide `tau(x1, ..., xn) = (x2, ..., xn, x1 + N)`, so the space of chords is
//! `D / tau`. Coordinates in `D` are the *layer* `s = x1 + ... + xn` and the *gaps*
//! `g_i = x_(i+1) - x_i`, `g_n = x1 + N - xn`, which are never negative and sum to `N`.

use crate::chord::Chord;
use crate::octave::Octave;

/// A lattice point of the alcove: a layer and its gaps.
#[derive(Clone, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct AlcovePoint {
    octave: Octave,
    layer: i64,
    gaps: Vec<i32>,
}

impl AlcovePoint {
    /// The point with this layer and these gaps; `None` if a gap is negative, the gaps do not
    /// sum to the octave, or no lattice point lies there.
    #[must_use]
    pub fn new(octave: Octave, layer: i64, gaps: Vec<i32>) -> Option<AlcovePoint> {
        let sum: i64 = gaps.iter().map(|&g| i64::from(g)).sum();
        let lawful = if gaps.is_empty() {
            layer == 0
        } else {
            gaps.iter().all(|&g| g >= 0) && sum == octave.wide()
        };
        let point = AlcovePoint {
            octave,
            layer,
            gaps,
        };
        (lawful && (point.is_empty() || point.times_lowest() % point.len() as i128 == 0))
            .then_some(point)
    }

    /// Where the mirrors fold an ordered tuple of pitches. The layer stays the sum of the
    /// pitches, so that a path of tuples becomes a path of points without a jump.
    #[must_use]
    pub fn under(octave: Octave, pitches: &[i32]) -> AlcovePoint {
        let n = octave.size();
        let mut residues: Vec<i32> = pitches.iter().map(|&p| octave.residue(p)).collect();
        residues.sort_unstable();
        let mut gaps: Vec<i32> = residues.windows(2).map(|w| w[1] - w[0]).collect();
        if let (Some(first), Some(last)) = (residues.first(), residues.last()) {
            gaps.push(first + n - last);
        }
        // The octaves taken away come back as glides, which keep the sum.
        let octaves: i64 = pitches.iter().map(|p| i64::from(p.div_euclid(n))).sum();
        let layer = residues.iter().map(|&r| i64::from(r)).sum();
        AlcovePoint {
            octave,
            layer,
            gaps,
        }
        .glided(octaves)
    }

    /// The octave of the lattice.
    #[must_use]
    pub const fn octave(&self) -> Octave {
        self.octave
    }

    /// The number of notes.
    #[must_use]
    pub fn len(&self) -> usize {
        self.gaps.len()
    }

    /// Whether there is no note.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.gaps.is_empty()
    }

    /// The layer: the sum of the pitches, the position along the space.
    #[must_use]
    pub const fn layer(&self) -> i64 {
        self.layer
    }

    /// The gaps from each note to the next above it, the last one up to the first an octave on.
    #[must_use]
    pub fn gaps(&self) -> &[i32] {
        &self.gaps
    }

    /// The glide `tau`, `times` times (backwards if negative): the lowest note goes up an octave.
    #[must_use]
    pub fn glided(mut self, times: i64) -> AlcovePoint {
        if !self.gaps.is_empty() {
            let notes = self.gaps.len();
            self.gaps
                .rotate_left(times.rem_euclid(notes as i64) as usize);
            let along = times.saturating_mul(self.octave.wide());
            self.layer = self.layer.saturating_add(along);
        }
        self
    }

    /// Glided into the fundamental domain `0 <= layer < N`.
    #[must_use]
    pub fn reduced(self) -> AlcovePoint {
        let times = self.layer.div_euclid(self.octave.wide()).saturating_neg();
        self.glided(times)
    }

    /// All notes moved up by `by` lattice points: the layer moves by `n * by`, the gaps stay.
    #[must_use]
    pub fn transposed(mut self, by: i32) -> AlcovePoint {
        let along = i64::from(by).saturating_mul(self.gaps.len() as i64);
        self.layer = self.layer.saturating_add(along);
        self
    }

    /// Turned upside down: the layer changes its sign and the cycle of gaps is read backwards.
    #[must_use]
    pub fn inverted(mut self) -> AlcovePoint {
        self.layer = self.layer.saturating_neg();
        if let [inner @ .., _] = self.gaps.as_mut_slice() {
            inner.reverse();
        }
        self
    }

    /// How many gaps are nought: the number of mirrors the point lies on. A single note lies on
    /// none.
    #[must_use]
    pub fn coincidences(&self) -> usize {
        if self.gaps.len() < 2 {
            return 0;
        }
        self.gaps.iter().filter(|&&g| g == 0).count()
    }

    /// The pitches `x1 <= ... <= xn <= x1 + N` themselves.
    #[must_use]
    pub fn pitches(&self) -> Vec<i64> {
        if self.is_empty() {
            return Vec::new();
        }
        let lowest = self.times_lowest() / self.len() as i128;
        let mut pitch = lowest as i64;
        let mut pitches = vec![pitch];
        for &gap in &self.gaps[..self.len() - 1] {
            pitch = pitch.saturating_add(i64::from(gap));
            pitches.push(pitch);
        }
        pitches
    }

    /// The chord that lies there.
    #[must_use]
    pub fn chord(&self) -> Chord {
        let n = self.octave.wide();
        let residues = self.pitches().into_iter().map(|p| p.rem_euclid(n) as i32);
        Chord::new(self.octave, residues)
    }

    /// The number of notes times the lowest pitch: the layer less what the gaps add to it.
    fn times_lowest(&self) -> i128 {
        let notes = self.gaps.len() as i128;
        let above: i128 = (1..notes)
            .zip(&self.gaps)
            .map(|(i, &gap)| (notes - i) * i128::from(gap))
            .sum();
        i128::from(self.layer) - above
    }
}
