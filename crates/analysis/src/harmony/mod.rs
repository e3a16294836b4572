//! Chords and keys, inferred from the notes.
//!
//! Nothing here is taken for truth: each answer says how much dearer the next best would be, and
//! rules stay silent where that is little.

mod chord;
mod decode;
mod keys;
mod segments;
mod stretches;
mod symbol;

use std::sync::Arc;

use partwright_score::{Score, Texture};

use crate::figures::Dissonance;
use segments::Slice;
use stretches::Stretch;

pub use chord::{Chord, Quality};
pub use keys::LocalKey;

/// A run of sonorities under one chord.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Segment {
    /// Its first sonority.
    pub first: usize,
    /// One past its last.
    pub end: usize,
    /// The chord.
    pub chord: Chord,
    /// Hundredths of a quarter note by which the best chord on another root is dearer.
    pub margin: i64,
    /// The local key.
    pub key: Option<LocalKey>,
    /// Its length in hundredths of a quarter note.
    weight: i64,
}

impl Segment {
    /// Root and triad are certain enough to act on.
    #[must_use]
    pub const fn is_sure(&self) -> bool {
        self.margin >= SURE
    }

    /// Not certain enough to act on, yet worth telling to whoever asks.
    #[must_use]
    pub const fn is_likely(&self) -> bool {
        self.margin * 2 >= SURE
    }

    /// That the chord has a seventh, or none, is certain enough to act on.
    #[must_use]
    pub const fn seventh_is_sure(&self) -> bool {
        self.is_sure()
    }

    /// The local key is certain enough to act on.
    #[must_use]
    pub const fn key_is_sure(&self) -> bool {
        self.is_sure() && self.key.is_some()
    }
}

/// From this margin on nineteen roots in twenty are what an analyst says; below the half of it a
/// third is not, and nothing is said.
pub const SURE: i64 = 100;

/// How many sonorities to either side settle a chord and its key: what is further off changed
/// nothing in 2,448 places of the chorales.
pub const SURROUNDINGS: usize = 64;

/// What one sonority is read as.
#[derive(Clone, Copy, Debug)]
struct Read {
    chord: Chord,
    margin: i64,
    key: Option<LocalKey>,
    length: i64,
}

/// The chords of a score, with their keys; none where nothing sounds.
#[derive(Clone, Debug, Default)]
pub struct Harmony {
    stretches: Vec<Arc<Stretch>>,
    segments: Vec<Segment>,
}

impl Harmony {
    /// Reads a score. Linear in sonorities.
    #[must_use]
    pub fn of(score: &Score, texture: &Texture, dissonances: &[Dissonance]) -> Harmony {
        Harmony::again(score, texture, dissonances, None)
    }

    /// Reads a score of which an earlier state was read before: only what an edit reaches is read
    /// again.
    #[must_use]
    pub fn again(
        score: &Score,
        texture: &Texture,
        dissonances: &[Dissonance],
        earlier: Option<&Harmony>,
    ) -> Harmony {
        let earlier = earlier.map_or(&[][..], |earlier| &earlier.stretches);
        let home = keys::home(score);
        let stretches = stretches::stretches(score, texture, dissonances, home, earlier);
        let segments = gather(
            stretches
                .iter()
                .flat_map(|stretch| stretch.read.iter().copied()),
        );
        Harmony {
            stretches,
            segments,
        }
    }

    /// The chords in order of time.
    #[must_use]
    pub fn segments(&self) -> &[Segment] {
        &self.segments
    }

    /// The chord of a sonority, by its place among the segments.
    #[must_use]
    pub fn index_at(&self, sonority: usize) -> Option<usize> {
        let after = self.segments.partition_point(|s| s.first <= sonority);
        let index = after.checked_sub(1)?;
        self.segments.get(index).filter(|s| sonority < s.end)?;
        Some(index)
    }

    /// The chord of a sonority.
    #[must_use]
    pub fn at(&self, sonority: usize) -> Option<&Segment> {
        self.segments.get(self.index_at(sonority)?)
    }
}

/// Runs of one chord and key.
fn gather(reads: impl Iterator<Item = Option<Read>>) -> Vec<Segment> {
    let mut list: Vec<Segment> = Vec::new();
    for (k, read) in reads.enumerate() {
        let Some(read) = read else { continue };
        match list.last_mut() {
            Some(last) if last.end == k && last.chord == read.chord => {
                last.end = k + 1;
                last.weight += read.length;
                last.margin = last.margin.max(read.margin);
            }
            _ => list.push(Segment {
                first: k,
                end: k + 1,
                chord: read.chord,
                margin: read.margin,
                key: read.key,
                weight: read.length,
            }),
        }
    }
    list
}

/// Reads a score in one go, however long: what [`Harmony`] must agree with.
#[must_use]
pub fn in_one_go(score: &Score, texture: &Texture, dissonances: &[Dissonance]) -> Vec<Segment> {
    let all = 0..texture.sonorities().len();
    let slices = segments::slices(score, texture, dissonances, all);
    gather(read(&slices, keys::home(score)).into_iter())
}

/// Reads a run of sonorities by itself.
fn read(slices: &[Slice], home: Option<LocalKey>) -> Vec<Option<Read>> {
    let found = decode::chords(slices).into_iter().zip(slices);
    let mut reads: Vec<Option<Read>> = found
        .map(|(found, slice)| {
            let (chord, margin) = found?;
            Some(Read {
                chord,
                margin,
                key: None,
                length: slice.length,
            })
        })
        .collect();
    let list = gather(reads.iter().copied());
    for (segment, key) in list.iter().zip(keys::keys(home, &list)) {
        let own = segment.first..segment.end;
        for read in reads.get_mut(own).unwrap_or_default().iter_mut().flatten() {
            read.key = key;
        }
    }
    reads
}
