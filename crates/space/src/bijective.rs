//! Bijective voice leadings without crossings: one integer tells them apart.
//!
//! With both chords sorted and the second continued by octaves in both directions, the strongly
//! crossing-free voice leadings are exactly `a_i -> b_(i + k)` for whole `k`. The size is convex
//! in `k` in L1 and L2 (Monge costs on the circle: Delon, Salomon and Sobolevski 2010) and in
//! Linf at least falls weakly and then rises weakly, so a walk that passes over equal values and
//! stops at a strict rise finds every minimum. For every size of [`Norm`] some voice leading of
//! these is least among all. The method is the rotation of the sorted order in Tymoczko 2006 and
//! 2008.

use crate::chord::Chord;
use crate::error::SpaceError;
use crate::leading::{Leading, Pair};
use crate::norm::Norm;
use crate::octave::Octave;

/// Two chords of one size, not empty, ready to be turned against each other.
#[derive(Clone, Debug)]
pub(crate) struct Turns {
    octave: Octave,
    from: Vec<i32>,
    to: Vec<i32>,
}

impl Turns {
    pub(crate) fn new(a: &Chord, b: &Chord) -> Result<Turns, SpaceError> {
        if a.octave() != b.octave() {
            return Err(SpaceError::DifferentOctaves(
                a.octave().size(),
                b.octave().size(),
            ));
        }
        if a.len() != b.len() {
            return Err(SpaceError::DifferentSizes(a.len(), b.len()));
        }
        Ok(Turns {
            octave: a.octave(),
            from: a.residues().to_vec(),
            to: b.residues().to_vec(),
        })
    }

    fn displacements(&self, k: i64) -> impl Iterator<Item = i64> + '_ {
        let notes = (self.to.len() as i64).max(1);
        (0_i64..).zip(&self.from).map(move |(i, &a)| {
            let at = i.saturating_add(k);
            let octaves = at.div_euclid(notes).saturating_mul(self.octave.wide());
            let residue = self.to[at.rem_euclid(notes) as usize];
            octaves.saturating_add(i64::from(residue) - i64::from(a))
        })
    }

    pub(crate) fn size(&self, norm: Norm, k: i64) -> i64 {
        norm.size(self.displacements(k))
    }

    pub(crate) fn leading(&self, k: i64) -> Result<Leading, SpaceError> {
        let pairs: Result<Vec<Pair>, SpaceError> = self
            .from
            .iter()
            .zip(self.displacements(k))
            .map(|(&from, by)| {
                let by = i32::try_from(by).map_err(|_| SpaceError::OutOfRange)?;
                Ok(Pair { from, by })
            })
            .collect();
        Ok(Leading::new(self.octave, pairs?))
    }

    /// The least size, and the first and last `k` that have it: they are consecutive.
    pub(crate) fn least(&self, norm: Norm) -> (i64, i64, i64) {
        if self.from.is_empty() {
            return (0, 0, 0);
        }
        let sum = |chord: &[i32]| chord.iter().map(|&r| i64::from(r)).sum::<i64>();
        let n = self.octave.wide();
        // The k whose sum of displacements is nearest to nought; a half may go either way.
        let start = (2 * (sum(&self.from) - sum(&self.to)) + n).div_euclid(2 * n);
        let mut best = (self.size(norm, start), start, start);
        for direction in [1, -1] {
            let (mut k, mut size) = (start, self.size(norm, start));
            loop {
                let next = self.size(norm, k + direction);
                if next > size {
                    break;
                }
                (k, size) = (k + direction, next);
                if size < best.0 {
                    best = (size, k, k);
                } else if size == best.0 {
                    best = (size, best.1.min(k), best.2.max(k));
                }
            }
        }
        best
    }
}

/// The strongly crossing-free bijective voice leading number `k`: the sorted notes of `a` go to
/// the sorted notes of `b` from the `k`-th on. Its displacements sum to
/// `sum b - sum a + k * N` over the residues, so `k` counts the turns of the path.
///
/// # Errors
/// Different octaves or sizes; one chord empty; a displacement beyond `i32`.
pub fn turned(a: &Chord, b: &Chord, k: i64) -> Result<Leading, SpaceError> {
    if a.is_empty() != b.is_empty() {
        return Err(SpaceError::EmptyChord);
    }
    Turns::new(a, b)?.leading(k)
}

/// The crossing-free voice leadings in ascending order of size: outwards from the least.
#[derive(Clone, Debug)]
pub(crate) struct Outwards {
    turns: Turns,
    norm: Norm,
    /// The next `k` below and above those already seen.
    below: i64,
    above: i64,
    /// Equal sizes still to be given, last first.
    waiting: Vec<Leading>,
    size: i64,
    ended: bool,
}

impl Outwards {
    pub(crate) fn new(turns: Turns, norm: Norm) -> Outwards {
        let (size, first, last) = turns.least(norm);
        let mut outwards = Outwards {
            norm,
            below: first - 1,
            above: last + 1,
            waiting: Vec::new(),
            size,
            // Two empty chords have one voice leading and no turns.
            ended: turns.from.is_empty(),
            turns,
        };
        outwards.fill((first..=last).collect());
        outwards
    }

    fn fill(&mut self, ks: Vec<i64>) {
        for k in ks {
            match self.turns.leading(k) {
                Ok(leading) => self.waiting.push(leading),
                Err(_) => self.ended = true,
            }
        }
        self.waiting.sort_unstable_by(|a, b| b.cmp(a));
    }
}

impl Iterator for Outwards {
    type Item = (i64, Leading);

    fn next(&mut self) -> Option<(i64, Leading)> {
        if self.waiting.is_empty() && !self.ended {
            let down = self.turns.size(self.norm, self.below);
            let up = self.turns.size(self.norm, self.above);
            self.size = down.min(up);
            let mut ks = Vec::new();
            while self.turns.size(self.norm, self.above) == self.size && self.size < i64::MAX {
                ks.push(self.above);
                self.above += 1;
            }
            while self.turns.size(self.norm, self.below) == self.size && self.size < i64::MAX {
                ks.push(self.below);
                self.below -= 1;
            }
            self.fill(ks);
        }
        self.waiting.pop().map(|leading| (self.size, leading))
    }
}
