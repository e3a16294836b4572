//! The notes of each sonority, weighed.

use std::collections::BTreeSet;
use std::ops::Range;

use partwright_score::{Score, Texture, Time, ZERO};

use crate::figures::{Dissonance, Figure};
use crate::mode::fifths;

/// Costs are whole numbers: hundredths of a quarter note left unexplained.
pub(super) type Cost = i64;

/// A quarter note's worth.
pub(super) const QUARTER: Cost = 100;

/// How many sonorities before a stretch a figure may begin that goes on into it.
const BEFORE: usize = 16;

/// One note in a sonority.
#[derive(Clone, Copy, Hash)]
pub(super) struct Tone {
    /// Its place among the fifths.
    pub place: i32,
    /// What it costs to leave it out of the chord.
    pub aside: Cost,
    /// It is the lowest.
    pub is_bass: bool,
}

/// One sonority as the search sees it.
#[derive(Hash)]
pub(super) struct Slice {
    pub tones: Vec<Tone>,
    pub length: Cost,
    /// What it costs to change the chord here.
    pub change: Cost,
}

/// The slices of a stretch of sonorities; silence and what is not known yet have no tones.
pub(super) fn slices(
    score: &Score,
    texture: &Texture,
    found: &[Dissonance],
    stretch: Range<usize>,
) -> Vec<Slice> {
    // A figure may begin before the stretch.
    let first = found.partition_point(|d| d.sonority + BEFORE < stretch.start);
    let figures: BTreeSet<(usize, usize)> = found
        .iter()
        .skip(first)
        .take_while(|d| d.sonority < stretch.end)
        .filter_map(|d| d.reading)
        .filter(|r| !matches!(r.figure, Figure::DiminishedFifth | Figure::Pedal))
        .map(|reading| (reading.voice, reading.note))
        .collect();
    let sonorities = texture.sonorities();
    let mut slices = Vec::with_capacity(stretch.len());
    for (k, sonority) in sonorities
        .iter()
        .enumerate()
        .take(stretch.end)
        .skip(stretch.start)
    {
        let end = sonorities
            .get(k + 1)
            .map_or_else(|| score.end(), |next| next.onset);
        let length = in_cost(end - sonority.onset);
        let bass = texture.bass(k);
        let tones = texture.sounding(k).filter_map(|voice| {
            if sonority.followers >> voice & 1 == 1 {
                return None;
            }
            let note = texture.note(k, voice)?;
            let pitch = texture.pitch(score, k, voice)?;
            let is_figure = figures.contains(&(voice, note));
            let factor = if is_figure {
                1
            } else if passes_by(score, voice, note) {
                2
            } else {
                6
            };
            let is_bass = bass == Some(voice);
            let weight = if is_bass { length * 3 / 2 } else { length };
            Some(Tone {
                place: fifths(pitch),
                aside: weight * factor,
                is_bass,
            })
        });
        let change = match sonority.level {
            0 | 1 => QUARTER * 6 / 10,
            2 => QUARTER * 9 / 10,
            _ => QUARTER * 7 / 4,
        };
        slices.push(Slice {
            tones: tones.collect(),
            length,
            change,
        });
    }
    slices
}

fn in_cost(length: Time) -> Cost {
    let quarters = length * 4 * QUARTER;
    quarters.to_integer().max(1)
}

/// A note reached and left by step on a moment weaker than the one before it.
fn passes_by(score: &Score, voice: usize, note: usize) -> bool {
    let Some(notes) = score.voices.get(voice).map(|v| &v.notes) else {
        return false;
    };
    let pitch = |i: Option<usize>| notes.get(i?)?.sound.pitch();
    let (before, here, after) = (
        pitch(note.checked_sub(1)),
        pitch(Some(note)),
        pitch(note.checked_add(1)),
    );
    let (Some(before), Some(here), Some(after)) = (before, here, after) else {
        return false;
    };
    let steps = |a: i16, b: i16| (b - a).abs() == 1;
    let level = |i: usize| notes.get(i).map_or(0, |n| score.level(n.onset));
    steps(before.step, here.step)
        && steps(here.step, after.step)
        && note > 0
        && level(note) > level(note - 1)
        && notes.get(note).is_some_and(|n| n.length > ZERO)
}
