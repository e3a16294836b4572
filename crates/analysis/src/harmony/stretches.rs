//! The score in stretches, each read with its surroundings: an edit reaches one or two of them.
//!
//! A stretch is known again by its notes as the search sees them, wherever it stands; what cannot
//! have changed is not read again.

use std::collections::HashMap;
use std::hash::{BuildHasher, Hash, Hasher};
use std::ops::Range;
use std::sync::Arc;

use partwright_score::{Score, Texture};
use rustc_hash::{FxBuildHasher, FxHasher};

use super::keys::Home;
use super::slices::slices;
use super::{Read, SURROUNDINGS, read};
use crate::figures::Dissonance;

/// Bars in a stretch.
const BARS: usize = 32;

/// The most sonorities in a stretch, where bars are endless.
const MOST: usize = 512;

/// What was read of one stretch.
#[derive(Clone, Debug)]
pub(super) struct Stretch {
    /// Of its notes and those around it.
    mark: u64,
    /// One for each of its sonorities.
    pub read: Vec<Option<Read>>,
}

/// Reads a score, taking what is the same from an earlier reading.
pub(super) fn stretches(
    score: &Score,
    texture: &Texture,
    dissonances: &[Dissonance],
    home: Option<Home>,
    earlier: &[Arc<Stretch>],
) -> Vec<Arc<Stretch>> {
    let known: HashMap<u64, &Arc<Stretch>> = earlier
        .iter()
        .map(|stretch| (stretch.mark, stretch))
        .collect();
    let all = slices(score, texture, dissonances);
    let marks: Vec<u64> = all
        .iter()
        .map(|slice| FxBuildHasher.hash_one(slice))
        .collect();
    let one = |range: Range<usize>| {
        let from = range.start.saturating_sub(SURROUNDINGS);
        let end = all.len().min(range.end + SURROUNDINGS);
        let around = all.get(from..end).unwrap_or_default();
        let home = home.map(|home| home.at_start(from == 0));
        let marks = marks.get(from..end).unwrap_or_default();
        let mark = mark(marks, range.start - from, range.len(), home);
        if let Some(same) = known.get(&mark) {
            return Arc::clone(same);
        }
        let mut read = read(around, home);
        read.truncate(range.end - from);
        read.drain(..range.start - from);
        Arc::new(Stretch { mark, read })
    };
    bounds(score, texture).into_iter().map(one).collect()
}

/// The sonorities of each stretch into which a score is divided, so that an edit reaches few.
#[must_use]
pub fn bounds(score: &Score, texture: &Texture) -> Vec<Range<usize>> {
    let sonorities = texture.sonorities();
    let mut bounds = Vec::new();
    let mut from = 0;
    for bars in score.bars.chunks(BARS) {
        let until = bars.last().map(|bar| bar.onset + bar.length);
        let end = until.map_or(from, |until| {
            sonorities.partition_point(|s| s.onset < until)
        });
        while from < end {
            let next = end.min(from + MOST);
            bounds.push(from..next);
            from = next;
        }
    }
    if from < sonorities.len() {
        bounds.push(from..sonorities.len());
    }
    bounds
}

/// A hash of everything the reading depends on.
fn mark(around: &[u64], before: usize, length: usize, home: Option<Home>) -> u64 {
    let mut hasher = FxHasher::default();
    (before, length, home).hash(&mut hasher);
    around.hash(&mut hasher);
    hasher.finish()
}
