//! The local key: a second cheapest way, over the chords.

use partwright_score::{Key, Mode, Score};

use super::Segment;
use super::chord::{Chord, Quality};
use super::segments::{Cost, QUARTER};
use crate::mode::{fifths, named};

/// A key by its tonic's place among the fifths.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct LocalKey {
    /// 0 for C, 1 for G, -1 for F.
    pub tonic: i32,
    /// Minor, with its raised sixth and seventh.
    pub minor: bool,
}

impl LocalKey {
    /// `G major`, `E minor`.
    #[must_use]
    pub fn name(self) -> String {
        let mode = if self.minor { "minor" } else { "major" };
        format!("{} {mode}", named(self.tonic))
    }
}

/// Leaving a key costs as much as a strange quarter note.
const CHANGE: Cost = QUARTER;

/// How strange a chord is in a key, in hundredths a quarter. The natural seventh of minor is
/// dearer than the raised one: with both for nothing, every major key would be its relative minor.
fn strangeness(chord: Chord, key: LocalKey) -> Cost {
    let degree = chord.root - key.tonic;
    let triad = chord.quality.triad();
    let dominant = chord.quality == Quality::DominantSeventh;
    let own = match (key.minor, degree, triad) {
        (false, 0, Quality::Major) | (true, 0, Quality::Minor) if !dominant => Some(-25),
        (_, 1, Quality::Major) => Some(if dominant { -25 } else { -10 }),
        (false, -1, Quality::Major) if !dominant => Some(0),
        (false, 2 | 3, Quality::Minor) | (_, 5, Quality::Diminished) => Some(0),
        (false, 4, Quality::Minor) => Some(20),
        (true, -1, Quality::Minor) | (true, 2, Quality::Diminished) => Some(0),
        (true, -4, Quality::Major) if !dominant => Some(12),
        (true, -3, Quality::Major) if !dominant => Some(30),
        (true, -2, Quality::Major) => Some(if dominant { 60 } else { 35 }),
        (true, -1, Quality::Major) if !dominant => Some(40),
        (true, 2, Quality::Minor) => Some(50),
        (true, 1, Quality::Minor) => Some(50),
        _ => None,
    };
    // A close in major, a dominant of another degree, a borrowed chord.
    own.unwrap_or(match (degree, triad) {
        (0, Quality::Major) if key.minor && !dominant => 35,
        (0 | 2..=5, Quality::Major) => 60,
        (-1, Quality::Minor) | (2, Quality::Diminished) => 70,
        (_, Quality::Diminished) => 90,
        _ => 160,
    })
}

/// The key of each segment, setting out from the stated one where there is one.
pub(super) fn keys(home: Option<LocalKey>, segments: &[Segment]) -> Vec<Option<LocalKey>> {
    let (Some(low), Some(high)) = (
        segments.iter().map(|s| s.chord.root).min(),
        segments.iter().map(|s| s.chord.root).max(),
    ) else {
        return Vec::new();
    };
    let states: Vec<LocalKey> = (low - 1..=high + 1)
        .flat_map(|tonic| [false, true].map(|minor| LocalKey { tonic, minor }))
        .collect();
    let mut best: Vec<Cost> = states
        .iter()
        .map(|key| {
            if home.is_none_or(|home| home == *key) {
                0
            } else {
                CHANGE
            }
        })
        .collect();
    let mut from: Vec<Vec<usize>> = Vec::with_capacity(segments.len());
    for segment in segments {
        let cheapest = (0..best.len()).min_by_key(|&s| best.get(s)).unwrap_or(0);
        let least = best.get(cheapest).copied().unwrap_or(0);
        let weight = segment.weight.min(QUARTER * 2);
        let mut came = Vec::with_capacity(states.len());
        let mut next = Vec::with_capacity(states.len());
        for (index, key) in states.iter().enumerate() {
            let stay = best.get(index).copied().unwrap_or(0);
            let (before, cost) = if stay <= least + CHANGE {
                (index, stay)
            } else {
                (cheapest, least + CHANGE)
            };
            came.push(before);
            next.push(cost + strangeness(segment.chord, *key) * weight / 100);
        }
        best = next;
        from.push(came);
    }
    let mut at = (0..best.len()).min_by_key(|&s| best.get(s)).unwrap_or(0);
    let mut keys = Vec::with_capacity(segments.len());
    for came in from.iter().rev() {
        keys.push(states.get(at).copied());
        at = came.get(at).copied().unwrap_or(at);
    }
    keys.reverse();
    keys
}

/// The key the score states at its beginning, where it is major or minor.
pub(super) fn home(score: &Score) -> Option<LocalKey> {
    match score.keys.first()?.value {
        Key::Of { tonic, mode, .. } if matches!(mode, Mode::Major | Mode::Minor) => {
            Some(LocalKey {
                tonic: fifths(tonic),
                minor: mode == Mode::Minor,
            })
        }
        _ => None,
    }
}
