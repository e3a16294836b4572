//! How large a voice leading is.

/// A size of a voice leading, from the displacements of its voices.
///
/// All three depend only on the multiset of distances, never fall when a distance grows, and
/// never grow when two distances are made more equal (they respect weak submajorization, the
/// "distribution constraint" of Tymoczko 2006; Hall and Tymoczko 2012, from memory). Uncrossing
/// two voices can only be trusted for such sizes: the number of voices that move is not one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Norm {
    /// The sum of the distances.
    L1,
    /// The sum of the squared distances: the square of the Euclidean length, kept whole.
    L2,
    /// The largest distance.
    Linf,
}

impl Norm {
    /// The three sizes.
    pub const ALL: [Norm; 3] = [Norm::L1, Norm::L2, Norm::Linf];

    /// The size of one displacement (squared in [`Norm::L2`]).
    #[must_use]
    pub const fn of(self, displacement: i64) -> i64 {
        let distance = displacement.saturating_abs();
        match self {
            Norm::L1 | Norm::Linf => distance,
            Norm::L2 => distance.saturating_mul(distance),
        }
    }

    /// The size of two parts taken together.
    #[must_use]
    pub const fn join(self, a: i64, b: i64) -> i64 {
        match self {
            Norm::L1 | Norm::L2 => a.saturating_add(b),
            Norm::Linf => {
                if a >= b {
                    a
                } else {
                    b
                }
            }
        }
    }

    /// The size of many displacements; 0 for none.
    #[must_use]
    pub fn size(self, displacements: impl IntoIterator<Item = i64>) -> i64 {
        displacements
            .into_iter()
            .fold(0, |size, d| self.join(size, self.of(d)))
    }

    /// The size as a length in lattice points: the root in [`Norm::L2`]. For show only.
    #[must_use]
    pub fn length(self, size: i64) -> f64 {
        match self {
            Norm::L1 | Norm::Linf => size as f64,
            Norm::L2 => (size as f64).sqrt(),
        }
    }
}
