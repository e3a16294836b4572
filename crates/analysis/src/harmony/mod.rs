//! Chords and keys, inferred from the notes.
//!
//! Nothing here is taken for truth: each answer says how much dearer the next best would be, and
//! rules stay silent where that is little.

mod aside;
mod certainty;
mod chord;
mod decode;
mod keys;
mod slices;
mod stated;
mod stretches;
mod symbol;
mod weigh;

use std::sync::Arc;

use partwright_score::{Score, Texture};

use crate::figures::Dissonance;

use decode::{Found, Search};
use keys::Home;
use slices::Slice;
use stretches::Stretch;

pub use certainty::SURE;
pub use chord::{Chord, Quality};
pub use keys::LocalKey;
pub use stated::stated;
pub use stretches::bounds;

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
    pub root_margin: i64,
    /// The same of the best chord on another root or with another triad.
    pub margin: i64,
    /// The same of the best chord that has a seventh where this has none, or the reverse.
    pub seventh_margin: i64,
    /// The local key.
    pub key: Option<LocalKey>,
    /// Hundredths of a quarter note by which the best other key is dearer.
    pub key_margin: i64,
    /// The composer states it: its chord, and its key where the row names one.
    pub stated: bool,
    /// Its length in hundredths of a quarter note, long sonorities cut short.
    weight: i64,
}

/// How many sonorities to either side settle a chord and its key: what is further off changed
/// nothing in 2,448 places of the chorales.
pub const SURROUNDINGS: usize = 64;

/// What one sonority is read as.
#[derive(Clone, Copy, Debug)]
struct Read {
    found: Found,
    key: Option<LocalKey>,
    key_margin: i64,
    stated: bool,
    length: i64,
}

/// The chords of a score, with their keys; none where nothing sounds.
#[derive(Clone, Debug, Default)]
pub struct Harmony {
    stretches: Vec<Arc<Stretch>>,
    segments: Vec<Segment>,
    /// The segment of each sonority.
    at: Vec<Option<u32>>,
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
        let reads = stretches.iter().flat_map(|stretch| &stretch.read);
        let segments = gather(reads.copied());
        let mut at = vec![None; texture.sonorities().len()];
        for (index, segment) in (0..).zip(&segments) {
            let own = at.get_mut(segment.first..segment.end);
            own.unwrap_or_default().fill(Some(index));
        }
        Harmony {
            stretches,
            segments,
            at,
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
        self.at
            .get(sonority)
            .copied()
            .flatten()
            .map(|at| at as usize)
    }

    /// The chord of a sonority.
    #[must_use]
    pub fn at(&self, sonority: usize) -> Option<&Segment> {
        self.segments.get(self.index_at(sonority)?)
    }
}

/// Runs of one chord.
fn gather(reads: impl Iterator<Item = Option<Read>>) -> Vec<Segment> {
    let mut list: Vec<Segment> = Vec::new();
    for (k, read) in reads.enumerate() {
        let Some(read) = read else { continue };
        let found = read.found;
        match list.last_mut() {
            Some(last)
                if last.end == k
                    && (last.chord, last.stated) == (found.chord, read.stated)
                    && (last.key == read.key || !read.stated) =>
            {
                last.end = k + 1;
                last.weight += read.length;
                last.root_margin = last.root_margin.max(found.root_margin);
                last.margin = last.margin.max(found.margin);
                last.seventh_margin = last.seventh_margin.max(found.seventh_margin);
            }
            _ => list.push(Segment {
                first: k,
                end: k + 1,
                chord: found.chord,
                root_margin: found.root_margin,
                margin: found.margin,
                seventh_margin: found.seventh_margin,
                key: read.key,
                key_margin: read.key_margin,
                stated: read.stated,
                weight: read.length,
            }),
        }
    }
    list
}

/// Reads a run of sonorities by itself: the chords, their keys, and both again, now that a chord
/// can be asked whether it is strange in its key.
fn read(slices: &[Slice], home: Option<Home>) -> Vec<Option<Read>> {
    let search = Search::new(slices);
    let first = in_keys(search.chords(&[]), slices, home);
    let keys: Vec<Option<LocalKey>> = first.iter().map(|read| (*read)?.key).collect();
    in_keys(search.chords(&keys), slices, home)
}

fn in_keys(found: Vec<Option<Found>>, slices: &[Slice], home: Option<Home>) -> Vec<Option<Read>> {
    let both = found.into_iter().zip(slices);
    let mut reads: Vec<Option<Read>> = both
        .map(|(found, slice)| {
            Some(Read {
                found: found?,
                key: None,
                key_margin: 0,
                stated: slice.said.is_some(),
                length: slice.length,
            })
        })
        .collect();
    let list = gather(reads.iter().copied());
    for (segment, (key, margin)) in list.iter().zip(keys::keys(home, &list, slices)) {
        let own = segment.first..segment.end;
        for read in reads.get_mut(own).unwrap_or_default().iter_mut().flatten() {
            read.key = Some(key);
            read.key_margin = margin;
        }
    }
    for (read, slice) in reads.iter_mut().zip(slices) {
        if let (Some(read), Some((_, Some(key)))) = (read, slice.said) {
            (read.key, read.key_margin) = (Some(key), SURE * 100);
        }
    }
    reads
}

/// Reads a score in one go, however long: what [`Harmony`] must agree with.
#[must_use]
pub fn in_one_go(score: &Score, texture: &Texture, dissonances: &[Dissonance]) -> Vec<Segment> {
    let slices = slices::slices(score, texture, dissonances);
    gather(read(&slices, keys::home(score)).into_iter())
}
