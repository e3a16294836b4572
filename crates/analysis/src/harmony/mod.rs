//! Chords and keys, inferred from the notes.
//!
//! Nothing here is taken for truth: each answer says how much dearer the next best would be, and
//! rules stay silent where that is little. Where the composer states the harmony, that is taken.

mod chord;
mod decode;
mod keys;
mod segments;
mod stated;

use std::ops::Range;

use partwright_score::{Score, Texture};

use crate::figures::Dissonance;

pub use chord::{Chord, Quality};
pub use keys::LocalKey;
pub use stated::stated;

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
    /// The chord is what the composer states, and the key with it where that is told.
    pub stated: bool,
    /// Its length in hundredths of a quarter note.
    weight: i64,
}

/// From this margin on nineteen roots in twenty are what an analyst says; below the half of it a
/// third is not, and nothing is said.
pub const SURE: i64 = 100;

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

fn stretch(
    score: &Score,
    texture: &Texture,
    dissonances: &[Dissonance],
    range: Range<usize>,
) -> Vec<Segment> {
    let from = range.start;
    let said = stated::Said::of(score, texture, range.clone());
    let slices = segments::slices(score, texture, dissonances, range);
    let mut list: Vec<Segment> = Vec::new();
    for (k, (found, slice)) in decode::chords(&slices, &said)
        .into_iter()
        .zip(&slices)
        .enumerate()
    {
        let Some((chord, margin)) = found else {
            continue;
        };
        let here = said.at(k);
        let (stated, key) = (here.is_some(), here.and_then(|(_, key)| key));
        let k = from + k;
        match list.last_mut() {
            Some(last)
                if (last.end, last.chord, last.stated, last.key) == (k, chord, stated, key) =>
            {
                last.end = k + 1;
                last.weight += slice.length;
                last.margin = last.margin.max(margin);
            }
            _ => list.push(Segment {
                first: k,
                end: k + 1,
                chord,
                margin,
                key,
                stated,
                weight: slice.length,
            }),
        }
    }
    // The stated key is where the piece sets out from, not where a stretch of it does.
    let home = (from == 0).then(|| keys::home(score)).flatten();
    let keys = keys::keys(home, &list);
    for (segment, key) in list.iter_mut().zip(keys) {
        segment.key = segment.key.or(key);
    }
    list
}
