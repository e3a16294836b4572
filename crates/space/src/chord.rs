//! Chords: points of the quotient `T^n / S_n`, multisets of pitch classes.
//!
//! Sources: D. Tymoczko, "The Geometry of Musical Chords", Science 313 (2006); C. Callender,
//! I. Quinn and D. Tymoczko, "Generalized Voice-Leading Spaces", Science 320 (2008).

use crate::alcove::AlcovePoint;
use crate::octave::Octave;

/// A chord: pitch classes with their doublings, in no order and no register.
///
/// Rules of counterpoint are decided on voicings, never on chords; the quotient is for distance,
/// search and drawing.
#[derive(Clone, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Chord {
    octave: Octave,
    residues: Vec<i32>,
}

impl Chord {
    /// The chord of these pitches, whatever their order and octaves. Doublings count.
    #[must_use]
    pub fn new(octave: Octave, pitches: impl IntoIterator<Item = i32>) -> Chord {
        let mut residues: Vec<i32> = pitches.into_iter().map(|p| octave.residue(p)).collect();
        residues.sort_unstable();
        Chord { octave, residues }
    }

    /// The octave of the lattice.
    #[must_use]
    pub const fn octave(&self) -> Octave {
        self.octave
    }

    /// The pitch classes in `0..N`, ascending, doublings repeated.
    #[must_use]
    pub fn residues(&self) -> &[i32] {
        &self.residues
    }

    /// The number of notes, doublings counted.
    #[must_use]
    pub fn len(&self) -> usize {
        self.residues.len()
    }

    /// Whether the chord has no note.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.residues.is_empty()
    }

    /// The pitch classes without doublings, each with how often it stands in the chord.
    #[must_use]
    pub fn counted(&self) -> Vec<(i32, usize)> {
        counted(&self.residues)
    }

    /// The chord moved up by a number of lattice points.
    #[must_use]
    pub fn transposed(&self, by: i32) -> Chord {
        let by = self.octave.residue(by);
        // Both summands lie below N, far from the ends of i32.
        Chord::new(self.octave, self.residues.iter().map(|r| r + by))
    }

    /// The chord turned upside down about pitch class 0.
    #[must_use]
    pub fn inverted(&self) -> Chord {
        Chord::new(self.octave, self.residues.iter().map(|r| -r))
    }

    /// The canonical form: the one point of the fundamental domain `x1 <= ... <= xn <= x1 + N`,
    /// `0 <= x1 + ... + xn < N`. Two chords are the same exactly when their forms are.
    #[must_use]
    pub fn canonical(&self) -> AlcovePoint {
        AlcovePoint::under(self.octave, &self.residues).reduced()
    }

    /// The sum of the notes modulo the octave: the position along the space.
    #[must_use]
    pub fn layer(&self) -> i32 {
        let sum: i64 = self.residues.iter().map(|&r| i64::from(r)).sum();
        sum.rem_euclid(self.octave.wide()) as i32
    }

    /// How many coincidences the chord has: notes less distinct notes, the number of mirrors it
    /// lies on. 0 in the interior, more on the boundary.
    #[must_use]
    pub fn coincidences(&self) -> usize {
        self.residues.windows(2).filter(|w| w[0] == w[1]).count()
    }

    /// The gaps from note to note round the circle, turned to the least rotation: the same for
    /// all transpositions of a chord, and for no other.
    #[must_use]
    pub fn transposition_type(&self) -> Vec<i32> {
        least_rotation(self.canonical().gaps())
    }

    /// The same for all transpositions and inversions of a chord, and for no other.
    #[must_use]
    pub fn inversion_type(&self) -> Vec<i32> {
        self.transposition_type()
            .min(self.inverted().transposition_type())
    }

    /// Every chord of `notes` notes, doublings included, in ascending order of the residues.
    pub fn all(octave: Octave, notes: usize) -> impl Iterator<Item = Chord> {
        multisets(octave.size(), notes).map(move |residues| Chord { octave, residues })
    }
}

/// Distinct values of a sorted list with how often each stands in it.
pub(crate) fn counted(sorted: &[i32]) -> Vec<(i32, usize)> {
    let mut found: Vec<(i32, usize)> = Vec::new();
    for &value in sorted {
        match found.last_mut() {
            Some((last, times)) if *last == value => *times += 1,
            _ => found.push((value, 1)),
        }
    }
    found
}

/// Every ascending list of `size` numbers below `below`, repeats allowed, in order.
pub(crate) fn multisets(below: i32, size: usize) -> impl Iterator<Item = Vec<i32>> {
    let first = (below > 0 || size == 0).then(|| vec![0; size]);
    std::iter::successors(first, move |list: &Vec<i32>| {
        let at = list.iter().rposition(|&value| value + 1 < below)?;
        let mut next = list.clone();
        let value = next[at] + 1;
        next[at..].fill(value);
        Some(next)
    })
}

fn least_rotation(cycle: &[i32]) -> Vec<i32> {
    (0..cycle.len())
        .map(|turn| [&cycle[turn..], &cycle[..turn]].concat())
        .min()
        .unwrap_or_default()
}
