//! The path of a step through a quotient, cut where it bounces and where it leaves the picture.
//!
//! The ordered path is a straight line. It is cut at the mirrors and at the seams, and each piece
//! is mapped by the branch of the quotient map that holds in its middle. On the strip a level
//! piece is parallel motion, an upright one exact contrary motion, one at 45 degrees oblique
//! motion, and the slope keeps its absolute value through every bounce. Everything is exact.

use crate::error::SpaceError;
use crate::octave::Octave;
use num_rational::Ratio;
use std::collections::BTreeSet;

type Exact = Ratio<i128>;

/// Beyond these a path is not drawn, so that its exact cuts fit and do not fill the memory.
const FURTHEST_PITCH: i32 = 1 << 24;
const MOST_VOICES: usize = 64;
const MOST_CUTS: i64 = 10_000;

/// The space to draw in.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Picture {
    /// Voices without their order: the half-plane for two. One mirror for each pair of voices.
    Unordered,
    /// Voices without their octaves: the torus, cut open at `0` and `N` in each direction.
    Torus,
    /// Neither order nor octaves, laid out flat along the layers: the strip, the prism and so on,
    /// repeated as often as the path needs. Mirrors, but no seam.
    Unrolled,
    /// The same, brought back into the fundamental domain: cut at its seam as well, where the
    /// next piece goes on after the glide.
    Chords,
}

/// A point of a picture: the pitches of its voices, in whole and broken lattice points.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Spot {
    pitches: Vec<Ratio<i64>>,
}

impl Spot {
    /// The pitches, ascending in every picture but the torus.
    #[must_use]
    pub fn pitches(&self) -> &[Ratio<i64>] {
        &self.pitches
    }

    /// Their sum: the layer, or `u` on the strip.
    #[must_use]
    pub fn layer(&self) -> Ratio<i64> {
        self.pitches.iter().sum()
    }

    /// The gaps from each pitch to the next, and from the last to the first an octave on. On the
    /// strip the first of the two is `v`.
    #[must_use]
    pub fn gaps(&self, octave: Octave) -> Vec<Ratio<i64>> {
        let mut gaps: Vec<_> = self.pitches.windows(2).map(|w| w[1] - w[0]).collect();
        if let (Some(first), Some(last)) = (self.pitches.first(), self.pitches.last()) {
            gaps.push(first + octave.wide() - last);
        }
        gaps
    }
}

/// A straight piece of a path.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Piece {
    /// When it starts, from 0 at the start of the step to 1 at its end.
    pub start: Ratio<i64>,
    /// When it ends.
    pub end: Ratio<i64>,
    /// Where it starts.
    pub from: Spot,
    /// Where it ends.
    pub to: Spot,
    /// In [`Picture::Chords`], which copy of the fundamental domain it was brought back from:
    /// how many seams lie between. 0 in the other pictures.
    pub copy: i64,
    /// Whether it ends because it meets a mirror: the path bounces.
    pub meets_mirror: bool,
    /// Whether it ends because it meets a seam: the path goes on at the other side.
    pub meets_seam: bool,
}

/// The pieces of the straight path from one ordered tuple of pitches to another. A step that
/// stands still is one piece of no length.
///
/// ```
/// use partwright_space::{Octave, draw};
///
/// // C4 E4 to E4 C4: up to the mirror and back.
/// let pieces = draw::path(draw::Picture::Chords, Octave::SEMITONES, &[60, 64], &[64, 60])?;
/// assert_eq!(pieces.len(), 2);
/// assert!(pieces[0].meets_mirror);
/// assert_eq!(pieces[0].from, pieces[1].to);
/// # Ok::<(), partwright_space::SpaceError>(())
/// ```
///
/// # Errors
/// [`SpaceError::DifferentSizes`] for tuples of different length; [`SpaceError::OutOfRange`] for
/// pitches millions of lattice points away; [`SpaceError::TooManyChoices`] for more than 64
/// voices or ten thousand cuts.
pub fn path(
    picture: Picture,
    octave: Octave,
    before: &[i32],
    after: &[i32],
) -> Result<Vec<Piece>, SpaceError> {
    if before.len() != after.len() {
        return Err(SpaceError::DifferentSizes(before.len(), after.len()));
    }
    if before.len() > MOST_VOICES {
        return Err(SpaceError::TooManyChoices);
    }
    let far = |p: &i32| p.unsigned_abs() > FURTHEST_PITCH.unsigned_abs();
    if before.iter().chain(after).any(far) {
        return Err(SpaceError::OutOfRange);
    }
    let line = Line {
        before: before.iter().map(|&p| i64::from(p)).collect(),
        after: after.iter().map(|&p| i64::from(p)).collect(),
        octave,
        picture,
    };
    let (mirrors, seams) = line.cuts()?;
    let mut times: BTreeSet<Exact> = mirrors.union(&seams).copied().collect();
    times.insert(Exact::from_integer(1));
    let mut start = Exact::from_integer(0);
    let mut pieces = Vec::with_capacity(times.len());
    for end in times {
        let branch = line.branch((start + end) / 2);
        pieces.push(Piece {
            start: narrow(start)?,
            end: narrow(end)?,
            from: line.spot(&branch, start)?,
            to: line.spot(&branch, end)?,
            copy: branch.copy,
            meets_mirror: mirrors.contains(&end),
            meets_seam: seams.contains(&end),
        });
        start = end;
    }
    Ok(pieces)
}

struct Line {
    before: Vec<i64>,
    after: Vec<i64>,
    octave: Octave,
    picture: Picture,
}

/// Which voice each pitch of a spot is, and what is added to it.
struct Branch {
    voices: Vec<(usize, i128)>,
    copy: i64,
}

impl Line {
    /// The times within the step at which the path meets a mirror, and a seam.
    fn cuts(&self) -> Result<(BTreeSet<Exact>, BTreeSet<Exact>), SpaceError> {
        let n = self.octave.wide();
        let mut cuts = Cuts::default();
        let mut mirrors = BTreeSet::new();
        let mut seams = BTreeSet::new();
        let ends = || self.before.iter().zip(&self.after);
        for (j, (&upper, &upper_after)) in ends().enumerate() {
            if self.picture == Picture::Torus {
                cuts.at_multiples(upper, upper_after, n, &mut seams)?;
                continue;
            }
            for (&lower, &lower_after) in ends().take(j) {
                let (from, to) = (upper - lower, upper_after - lower_after);
                if self.picture == Picture::Unordered {
                    // Only the mirror at the unison; no multiple of this lies between but 0.
                    let beyond = 1 + from.abs().max(to.abs());
                    cuts.at_multiples(from, to, beyond, &mut mirrors)?;
                } else {
                    cuts.at_multiples(from, to, n, &mut mirrors)?;
                }
            }
        }
        if self.picture == Picture::Chords {
            let (from, to) = (self.before.iter().sum(), self.after.iter().sum());
            cuts.at_multiples(from, to, n, &mut seams)?;
        }
        Ok((mirrors, seams))
    }

    fn at(&self, voice: usize, time: Exact) -> Exact {
        let end = |pitches: &[i64]| i128::from(pitches.get(voice).copied().unwrap_or(0));
        let (before, after) = (end(&self.before), end(&self.after));
        time * (after - before) + before
    }

    /// The branch of the quotient map that holds at a time inside a piece.
    fn branch(&self, time: Exact) -> Branch {
        let n = i128::from(self.octave.size());
        let floor = |value: Exact| (value / n).floor().to_integer();
        let pitches: Vec<Exact> = (0..self.before.len()).map(|v| self.at(v, time)).collect();
        let down = |pitch: &Exact| match self.picture {
            Picture::Unordered => 0,
            _ => floor(*pitch),
        };
        let mut voices: Vec<(usize, i128)> = pitches
            .iter()
            .map(|pitch| -n * down(pitch))
            .enumerate()
            .collect();
        if self.picture == Picture::Torus || voices.is_empty() {
            return Branch { voices, copy: 0 };
        }
        voices.sort_by_key(|&(voice, added)| pitches[voice] + added);
        if self.picture == Picture::Unordered {
            return Branch { voices, copy: 0 };
        }
        let octaves: i128 = pitches.iter().map(down).sum();
        let copy = match self.picture {
            Picture::Chords => floor(pitches.iter().sum()),
            _ => 0,
        };
        // The octaves taken away come back as glides, less those back to the first copy.
        let count = voices.len() as i128;
        let glides = octaves - copy;
        let glided = (0..count).map(|i| {
            let at = i + glides;
            let (voice, added) = voices[at.rem_euclid(count) as usize];
            (voice, added + n * at.div_euclid(count))
        });
        Branch {
            voices: glided.collect(),
            // Sums of 64 pitches below 2^24.
            copy: copy as i64,
        }
    }

    fn spot(&self, branch: &Branch, time: Exact) -> Result<Spot, SpaceError> {
        let pitches = branch
            .voices
            .iter()
            .map(|&(voice, added)| narrow(self.at(voice, time) + added));
        Ok(Spot {
            pitches: pitches.collect::<Result<_, _>>()?,
        })
    }
}

#[derive(Default)]
struct Cuts {
    made: i64,
}

impl Cuts {
    /// Notes the times strictly within the step at which a coordinate that goes evenly from
    /// `from` to `to` is a multiple of `n`.
    fn at_multiples(
        &mut self,
        from: i64,
        to: i64,
        n: i64,
        times: &mut BTreeSet<Exact>,
    ) -> Result<(), SpaceError> {
        let (low, high) = (from.min(to), from.max(to));
        let first = low.div_euclid(n) + 1;
        let last = (high - 1).div_euclid(n);
        self.made += (last - first + 1).max(0);
        if self.made > MOST_CUTS {
            return Err(SpaceError::TooManyChoices);
        }
        for k in first..=last {
            times.insert(Exact::new(i128::from(k * n - from), i128::from(to - from)));
        }
        Ok(())
    }
}

fn narrow(value: Exact) -> Result<Ratio<i64>, SpaceError> {
    let part = |whole: i128| i64::try_from(whole).map_err(|_| SpaceError::OutOfRange);
    // Reduced already, and a denominator is never nought.
    Ok(Ratio::new_raw(part(*value.numer())?, part(*value.denom())?))
}
