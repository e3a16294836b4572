//! Chords and keys, inferred from the notes.
//!
//! Nothing here is taken for truth: each answer says how much dearer the next best would be, and
//! rules stay silent where that is little.

mod certainty;
mod chord;
mod decode;
mod keys;
mod segments;

use std::ops::Range;

use partwright_score::{Score, Texture};

use crate::figures::Dissonance;

use decode::{Found, Search};
use keys::Home;
use segments::Slice;

pub use certainty::SURE;
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
    pub root_margin: i64,
    /// The same of the best chord on another root or with another triad.
    pub margin: i64,
    /// The same of the best chord that has a seventh where this has none, or the reverse.
    pub seventh_margin: i64,
    /// The local key.
    pub key: Option<LocalKey>,
    /// Hundredths of a quarter note by which the best other key is dearer.
    pub key_margin: i64,
    /// Its length in hundredths of a quarter note, long sonorities cut short.
    weight: i64,
}

/// The chords of a score, with their keys; none where nothing sounds.
#[must_use]
pub fn segments(score: &Score, texture: &Texture, dissonances: &[Dissonance]) -> Vec<Segment> {
    stretch(score, texture, dissonances, 0..texture.sonorities().len())
}

/// The segment at a sonority, read from its surroundings: what is further off than
/// [`SURROUNDINGS`] changed nothing there in 2,448 places of the chorales.
#[must_use]
pub fn segment_at(
    score: &Score,
    texture: &Texture,
    dissonances: &[Dissonance],
    index: usize,
) -> Option<Segment> {
    let end = texture.sonorities().len().min(index + SURROUNDINGS);
    let from = index.saturating_sub(SURROUNDINGS).min(end);
    let found = stretch(score, texture, dissonances, from..end);
    found
        .into_iter()
        .find(|s| s.first <= index && index < s.end)
}

/// How many sonorities to either side settle a chord and its key.
pub const SURROUNDINGS: usize = 64;

/// What one sonority is read as.
#[derive(Clone, Copy, Debug)]
struct Read {
    found: Found,
    key: Option<LocalKey>,
    key_margin: i64,
    length: i64,
}

/// Runs of one chord.
fn gather(reads: impl Iterator<Item = Option<Read>>) -> Vec<Segment> {
    let mut list: Vec<Segment> = Vec::new();
    for (k, read) in reads.enumerate() {
        let Some(read) = read else { continue };
        let found = read.found;
        match list.last_mut() {
            Some(last) if last.end == k && last.chord == found.chord => {
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
    reads
}

fn stretch(
    score: &Score,
    texture: &Texture,
    dissonances: &[Dissonance],
    range: Range<usize>,
) -> Vec<Segment> {
    let from = range.start;
    let slices = segments::slices(score, texture, dissonances, range);
    // The stated key is where the piece sets out from, not where a stretch of it does.
    let home = (from == 0).then(|| keys::home(score)).flatten();
    let mut list = gather(read(&slices, home).into_iter());
    for segment in &mut list {
        segment.first += from;
        segment.end += from;
    }
    list
}
