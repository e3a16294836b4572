//! Voice leadings: how the notes of one chord go to the notes of another.
//!
//! A voice leading is a multiset of pairs such that every note of each chord is in some pair
//! (Tymoczko 2006). The path is kept, not only its ends: a tritone up and a tritone down are two
//! voice leadings.

use crate::chord::Chord;
use crate::norm::Norm;
use crate::octave::Octave;

/// One voice of a voice leading.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Pair {
    /// The pitch class it starts from, `0..N`.
    pub from: i32,
    /// Its displacement in lattice points, up if positive.
    pub by: i32,
}

impl Pair {
    /// The pitch class it arrives at, `0..N`.
    #[must_use]
    pub const fn to(self, octave: Octave) -> i32 {
        ((self.from as i64 + self.by as i64).rem_euclid(octave.wide())) as i32
    }
}

/// A voice leading: its voices, in ascending order. Two are equal exactly when they send the same
/// pitch classes along the same paths.
#[derive(Clone, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Leading {
    octave: Octave,
    pairs: Vec<Pair>,
}

impl Leading {
    /// The voice leading with these voices; where they start is taken modulo the octave.
    #[must_use]
    pub fn new(octave: Octave, pairs: impl IntoIterator<Item = Pair>) -> Leading {
        let mut pairs: Vec<Pair> = pairs
            .into_iter()
            .map(|pair| Pair {
                from: octave.residue(pair.from),
                ..pair
            })
            .collect();
        pairs.sort_unstable();
        Leading { octave, pairs }
    }

    /// The voice leading of a step from one voicing to the next, voice by voice; `None` if the
    /// voicings differ in their number of voices or a displacement is out of reach.
    #[must_use]
    pub fn between(octave: Octave, before: &[i32], after: &[i32]) -> Option<Leading> {
        if before.len() != after.len() {
            return None;
        }
        let pairs: Option<Vec<Pair>> = before
            .iter()
            .zip(after)
            .map(|(&from, &to)| {
                let by = to.checked_sub(from)?;
                Some(Pair { from, by })
            })
            .collect();
        Some(Leading::new(octave, pairs?))
    }

    /// The octave of the lattice.
    #[must_use]
    pub const fn octave(&self) -> Octave {
        self.octave
    }

    /// The voices, ascending.
    #[must_use]
    pub fn pairs(&self) -> &[Pair] {
        &self.pairs
    }

    /// The displacements, in the order of the voices.
    pub fn displacements(&self) -> impl Iterator<Item = i64> + '_ {
        self.pairs.iter().map(|pair| i64::from(pair.by))
    }

    /// The size (squared in [`Norm::L2`]).
    #[must_use]
    pub fn size(&self, norm: Norm) -> i64 {
        norm.size(self.displacements())
    }

    /// The sum of the displacements: how far the path leads along the space, and round which way.
    #[must_use]
    pub fn total(&self) -> i64 {
        self.displacements().sum()
    }

    /// The chord it starts from, with the doublings it uses.
    #[must_use]
    pub fn source(&self) -> Chord {
        Chord::new(self.octave, self.pairs.iter().map(|pair| pair.from))
    }

    /// The chord it arrives at, with the doublings it uses.
    #[must_use]
    pub fn target(&self) -> Chord {
        Chord::new(
            self.octave,
            self.pairs.iter().map(|pair| pair.to(self.octave)),
        )
    }

    /// The same paths walked backwards.
    #[must_use]
    pub fn inverse(&self) -> Leading {
        let octave = self.octave;
        Leading::new(
            octave,
            self.pairs.iter().map(|pair| Pair {
                from: pair.to(octave),
                by: pair.by.saturating_neg(),
            }),
        )
    }

    /// Whether no two voices cross in any octave placement of the voices: *strongly*
    /// crossing-free. Meeting in a unison is no crossing.
    #[must_use]
    pub fn crossing_free(&self) -> bool {
        let n = self.octave.wide();
        self.pairs.iter().enumerate().all(|(i, p)| {
            self.pairs[i + 1..].iter().all(|q| {
                let before = i64::from(p.from) - i64::from(q.from);
                let after = before + i64::from(p.by) - i64::from(q.by);
                // A crossing is an octave shift of q that lies above p before and below it
                // after, or the other way about: a multiple of N strictly between the two.
                let (low, high) = (before.min(after), before.max(after));
                low.div_euclid(n) + 1 > (high - 1).div_euclid(n)
            })
        })
    }
}
