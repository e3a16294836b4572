//! The cheapest way through the chords of a score.
//!
//! Dynamic programming (Viterbi): a state a chord, a column a sonority. Both directions are kept,
//! so that for each sonority the cost of the best way through every chord is known, and with it how
//! much dearer the best other root is.

use super::chord::{Chord, Quality};
use super::segments::{Cost, QUARTER, Slice};
use super::stated::Said;

/// What a chord lacks or leaves out in a sonority.
fn cost(slice: &Slice, chord: Chord) -> Cost {
    let tones = chord.quality.tones();
    let mut present = [false; 4];
    let mut total = 0;
    for tone in &slice.tones {
        let place = tone.place - chord.root;
        match tones.iter().position(|t| *t == place) {
            Some(index) => {
                if let Some(slot) = present.get_mut(index) {
                    *slot = true;
                }
                if tone.is_bass {
                    total += slice.length * [0, 5, 45, 20].get(index).copied().unwrap_or(0) / 100;
                }
            }
            None => total += tone.aside,
        }
    }
    let missing = [110, 70, 12, 120];
    for (index, weight) in missing.iter().enumerate().take(tones.len()) {
        if present.get(index) == Some(&false) {
            total += slice.length * weight / 100;
        }
    }
    let prior = match chord.quality {
        Quality::Major | Quality::Minor => 0,
        Quality::DominantSeventh => 8,
        Quality::MinorSeventh => 14,
        Quality::Diminished => 20,
        Quality::HalfDiminishedSeventh | Quality::MajorSeventh => 22,
        Quality::DiminishedSeventh => 25,
        Quality::Augmented => 60,
    };
    total + slice.length * prior / 100
}

/// The chord of each sonority, with what the best other root would cost more.
pub(super) fn chords(slices: &[Slice], said: &Said) -> Vec<Option<(Chord, Cost)>> {
    let states = said.among(states(slices));
    if states.is_empty() {
        return vec![None; slices.len()];
    }
    let n = states.len();
    let local: Vec<Vec<Cost>> = slices
        .iter()
        .enumerate()
        .map(|(k, slice)| {
            if slice.tones.is_empty() {
                return vec![0; n];
            }
            let mut costs: Vec<Cost> = states.iter().map(|chord| cost(slice, *chord)).collect();
            said.bind(k, &states, &mut costs);
            costs
        })
        .collect();
    // The cost of the best way up to each column, that column counted.
    let mut forward: Vec<Vec<Cost>> = Vec::with_capacity(slices.len());
    for (column, slice) in local.iter().zip(slices) {
        let row = match forward.last() {
            None => column.clone(),
            Some(before) => step(before, slice.change, column),
        };
        forward.push(row);
    }
    let mut out = vec![None; slices.len()];
    let mut behind: Vec<Cost> = vec![0; n];
    for (k, slice) in slices.iter().enumerate().rev() {
        let Some(ahead) = forward.get(k) else {
            continue;
        };
        let through: Vec<Cost> = ahead.iter().zip(&behind).map(|(a, b)| a + b).collect();
        if !slice.tones.is_empty() {
            let best = (0..n).min_by_key(|&s| through.get(s));
            if let Some(chord) = best.and_then(|s| states.get(s)) {
                let own = best.and_then(|s| through.get(s)).copied().unwrap_or(0);
                let others = states.iter().zip(&through);
                let other = others
                    .filter(|(state, _)| state.root != chord.root)
                    .map(|(_, cost)| *cost)
                    .min();
                let margin = other.map_or(QUARTER * 100, |other| other - own);
                if let Some(slot) = out.get_mut(k) {
                    *slot = Some((*chord, margin));
                }
            }
        }
        // What lies behind the column before this one: this column's own cost counted.
        let column = local.get(k).map_or(&[][..], |c| c);
        let with: Vec<Cost> = column.iter().zip(&behind).map(|(a, b)| a + b).collect();
        let cheapest = with.iter().min().copied().unwrap_or(0);
        behind = with
            .iter()
            .map(|stay| (*stay).min(cheapest + slice.change))
            .collect();
    }
    out
}

fn step(before: &[Cost], change: Cost, column: &[Cost]) -> Vec<Cost> {
    let cheapest = before.iter().min().copied().unwrap_or(0);
    before
        .iter()
        .zip(column)
        .map(|(stay, own)| (*stay).min(cheapest + change) + own)
        .collect()
}

/// Every chord on a root that sounds somewhere, or could stand between two that do.
fn states(slices: &[Slice]) -> Vec<Chord> {
    let places = slices.iter().flat_map(|s| s.tones.iter().map(|t| t.place));
    let (mut low, mut high) = (i32::MAX, i32::MIN);
    for place in places {
        low = low.min(place);
        high = high.max(place);
    }
    if low > high {
        return Vec::new();
    }
    // Signs beyond double ones are noise.
    let roots = low.max(-15)..=high.min(19);
    roots
        .flat_map(|root| Quality::ALL.map(|quality| Chord { root, quality }))
        .collect()
}
