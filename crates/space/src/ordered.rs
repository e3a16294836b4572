//! All voice leadings in ascending order: best-first search over the voices.

use crate::chord::{Chord, counted, multisets};
use crate::error::SpaceError;
use crate::leading::{Leading, Pair};
use crate::norm::Norm;
use crate::octave::Octave;
use std::cmp::Ordering;
use std::collections::BinaryHeap;

/// What the search holds of ways to double, at most.
const MOST_DOUBLINGS: usize = 1 << 16;
const MOST_VOICES: usize = 1 << 8;

/// All voice leadings between two chords in ascending order, each once, without end: the iterator
/// of [`crate::in_order`]. Order: size, then the sorted list of voices.
///
/// The voices are settled one after another. What is known of a beginning is its own size and,
/// for the voices still open, the way to their nearest target: it can only be too small, so what
/// comes first off the heap when all voices are settled is next in order. There is no polynomial
/// bound on the work for one more voice leading (Murty 1968 would give one, at the price of
/// smaller assignment problems); for chords of up to six notes this is quicker.
#[derive(Clone, Debug)]
pub struct InOrder {
    octave: Octave,
    norm: Norm,
    settings: Vec<Setting>,
    heap: BinaryHeap<Beginning>,
}

/// One way to double the two chords to the number of voices.
#[derive(Clone, Debug)]
struct Setting {
    sources: Vec<i32>,
    targets: Vec<(i32, usize)>,
    /// The least size of the voices from each on, each going to its nearest target.
    rest: Vec<i64>,
}

/// The first voices of a voice leading; the next one moves by `distance` or more.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Beginning {
    bound: i64,
    pairs: Vec<Pair>,
    size: i64,
    distance: i64,
    setting: usize,
}

// Least bound first off the heap; between equals the first in the order of the voices, where a
// beginning comes before what it begins. So ties come out sorted without being collected.
impl Ord for Beginning {
    fn cmp(&self, other: &Self) -> Ordering {
        let key = |b: &Self| (b.bound, b.setting, b.size, b.distance);
        other
            .bound
            .cmp(&self.bound)
            .then_with(|| other.pairs.cmp(&self.pairs))
            .then_with(|| key(other).cmp(&key(self)))
    }
}

impl PartialOrd for Beginning {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl InOrder {
    pub(crate) fn new(
        a: &Chord,
        b: &Chord,
        voices: usize,
        norm: Norm,
    ) -> Result<InOrder, SpaceError> {
        if voices > MOST_VOICES {
            return Err(SpaceError::TooManyChoices);
        }
        let octave = a.octave();
        let sources = doublings(a, voices)?;
        let targets = doublings(b, voices)?;
        if sources.len().saturating_mul(targets.len()) > MOST_DOUBLINGS {
            return Err(SpaceError::TooManyChoices);
        }
        let mut order = InOrder {
            octave,
            norm,
            settings: Vec::new(),
            heap: BinaryHeap::new(),
        };
        for source in &sources {
            for target in &targets {
                order
                    .settings
                    .push(Setting::new(octave, norm, source, target));
                let setting = order.settings.len() - 1;
                order.push(Vec::new(), 0, 0, setting);
            }
        }
        Ok(order)
    }

    /// Puts a beginning on the heap whose next voice moves by `least` or more.
    fn push(&mut self, pairs: Vec<Pair>, size: i64, least: i64, setting: usize) {
        let Some(at) = self.settings.get(setting) else {
            return;
        };
        let (distance, bound) = if pairs.len() == at.sources.len() {
            (0, size)
        } else {
            let Some(distance) = at.next_distance(self.octave, &pairs, least) else {
                return;
            };
            let settled = self.norm.join(size, self.norm.of(distance));
            (distance, self.norm.join(settled, at.rest[pairs.len() + 1]))
        };
        self.heap.push(Beginning {
            bound,
            pairs,
            size,
            distance,
            setting,
        });
    }
}

impl Iterator for InOrder {
    type Item = (i64, Leading);

    fn next(&mut self) -> Option<(i64, Leading)> {
        loop {
            let Beginning {
                pairs,
                size,
                distance,
                setting,
                ..
            } = self.heap.pop()?;
            let at = self.settings.get(setting)?;
            let Some(&from) = at.sources.get(pairs.len()) else {
                return Some((size, Leading::new(self.octave, pairs)));
            };
            let grown = self.norm.join(size, self.norm.of(distance));
            let mut bys = vec![-distance, distance];
            bys.dedup();
            bys.retain(|&by| at.allows(self.octave, &pairs, by));
            for by in bys {
                let Ok(by) = i32::try_from(by) else { continue };
                let mut longer = pairs.clone();
                longer.push(Pair { from, by });
                self.push(longer, grown, 0, setting);
            }
            self.push(pairs, size, distance + 1, setting);
        }
    }
}

impl Setting {
    fn new(octave: Octave, norm: Norm, sources: &[i32], targets: &[i32]) -> Setting {
        let mut rest = vec![0; sources.len() + 1];
        for (i, &source) in sources.iter().enumerate().rev() {
            let nearest = targets
                .iter()
                .map(|&t| octave.circle_distance(source, t))
                .min();
            rest[i] = norm.join(norm.of(i64::from(nearest.unwrap_or(0))), rest[i + 1]);
        }
        Setting {
            sources: sources.to_vec(),
            targets: counted(targets),
            rest,
        }
    }

    /// Targets that the settled voices have left over.
    fn open_targets(&self, octave: Octave, pairs: &[Pair]) -> impl Iterator<Item = i32> {
        self.targets
            .iter()
            .filter(move |(target, times)| {
                pairs
                    .iter()
                    .filter(|pair| pair.to(octave) == *target)
                    .count()
                    < *times
            })
            .map(|&(target, _)| target)
    }

    /// The least displacement the next voice may have: voices from one note are told apart by
    /// nothing else, so they are settled in ascending order.
    fn floor(&self, pairs: &[Pair]) -> i64 {
        match pairs.last() {
            Some(last) if self.sources.get(pairs.len()) == Some(&last.from) => i64::from(last.by),
            _ => i64::MIN,
        }
    }

    fn allows(&self, octave: Octave, pairs: &[Pair], by: i64) -> bool {
        let from = self.sources.get(pairs.len()).copied().unwrap_or_default();
        let to = (i64::from(from) + by).rem_euclid(octave.wide());
        by >= self.floor(pairs)
            && self
                .open_targets(octave, pairs)
                .any(|target| i64::from(target) == to)
    }

    /// The least distance of `least` or more by which the next voice can reach an open target;
    /// `None` beyond `i32`.
    fn next_distance(&self, octave: Octave, pairs: &[Pair], least: i64) -> Option<i64> {
        let n = octave.wide();
        let from = i64::from(*self.sources.get(pairs.len())?);
        let floor = self.floor(pairs);
        self.open_targets(octave, pairs)
            .flat_map(|target| {
                let up = i64::from(target) - from;
                let lowest = least.max(floor);
                let rising = lowest + (up - lowest).rem_euclid(n);
                let falling = -least - (-least - up).rem_euclid(n);
                [Some(rising), (falling >= floor).then_some(-falling)]
            })
            .flatten()
            .min()
            .filter(|&distance| distance <= i64::from(i32::MAX))
    }
}

/// Every multiset of `voices` notes of the chord that has each of its notes.
fn doublings(chord: &Chord, voices: usize) -> Result<Vec<Vec<i32>>, SpaceError> {
    let notes = chord.counted();
    let spare = voices.saturating_sub(chord.len());
    let kinds = i32::try_from(notes.len()).map_err(|_| SpaceError::TooManyChoices)?;
    let mut found = Vec::new();
    for extra in multisets(kinds, spare) {
        if found.len() > MOST_DOUBLINGS {
            return Err(SpaceError::TooManyChoices);
        }
        let mut doubled = chord.residues().to_vec();
        doubled.extend(
            extra
                .iter()
                .filter_map(|&at| Some(notes.get(at as usize)?.0)),
        );
        doubled.sort_unstable();
        found.push(doubled);
    }
    Ok(found)
}
