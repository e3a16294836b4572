//! The cheapest way through the chords of a score.
//!
//! Dynamic programming (Viterbi): a state a chord, a column a sonority. Both directions are kept,
//! so that for each sonority the cost of the best way through every chord is known, and with it how
//! much dearer the best other answer is. One more state is no chord at all: where that is nearly
//! as cheap, no answer is sure.

use std::collections::BTreeSet;

use super::SURE;
use super::chord::{Chord, Quality};
use super::keys::{LocalKey, strangeness};
use super::slices::{Cost, QUARTER, Slice};
use super::weigh::{Weights, bodies};

/// What a sonority costs under no chord, in hundredths of its length.
const NO_CHORD: Cost = 250;

/// How much of a chord's strangeness in the key counts against it, in hundredths.
const PULL: Cost = 30;

/// What another chord costs where one is stated: more than any music can make up for.
const AGAINST: Cost = QUARTER * 1_000_000;

/// The chord of one sonority.
#[derive(Clone, Copy, Debug)]
pub(super) struct Found {
    pub chord: Chord,
    /// What the best chord on another root costs more.
    pub root_margin: Cost,
    /// What the best chord of another root or triad costs more.
    pub margin: Cost,
    /// What the best chord costs more that has a seventh where this has none, or the reverse.
    pub seventh_margin: Cost,
}

/// The chords of a run of sonorities, and what each would cost in each by itself.
pub(super) struct Search<'a> {
    slices: &'a [Slice],
    weights: Vec<Weights<'a>>,
    /// Those on one root stand together.
    states: Vec<Chord>,
    /// How many states each root has, in their order.
    groups: Vec<usize>,
    /// Row after row: one cost a chord, and at the end that of no chord.
    local: Vec<Cost>,
}

impl<'a> Search<'a> {
    pub(super) fn new(slices: &'a [Slice]) -> Search<'a> {
        let weights: Vec<Weights<'a>> = slices.iter().map(Weights::of).collect();
        let states = states(slices, &weights);
        let mut local = Vec::with_capacity(slices.len() * (states.len() + 1));
        for (slice, weights) in slices.iter().zip(&weights) {
            if slice.tones.is_empty() {
                local.resize(local.len() + states.len() + 1, 0);
                continue;
            }
            let said = slice.said.map(|(chord, _)| chord);
            let said = said.filter(|chord| states.contains(chord));
            let against = |state: Chord| match said {
                Some(said) if said != state => AGAINST,
                _ => 0,
            };
            local.extend(
                states
                    .iter()
                    .map(|&chord| weights.cost(chord) + against(chord)),
            );
            local.push(said.map_or(slice.length * NO_CHORD / 100, |_| AGAINST));
        }
        let groups = states.chunk_by(|a, b| a.root == b.root);
        let groups = groups.map(<[Chord]>::len).collect();
        Search {
            slices,
            weights,
            states,
            groups,
            local,
        }
    }

    fn width(&self) -> usize {
        self.states.len() + 1
    }

    /// The chord of each sonority, in the key of each where one is known.
    pub(super) fn chords(&self, keys: &[Option<LocalKey>]) -> Vec<Option<Found>> {
        let n = self.width();
        if n == 1 {
            return vec![None; self.slices.len()];
        }
        let local = self.in_keys(keys);
        // The cost of the best way up to each column, that column counted.
        let mut forward: Vec<Cost> = Vec::with_capacity(local.len());
        let mut row: Vec<Cost> = vec![0; n];
        for ((k, column), slice) in local.chunks_exact(n).enumerate().zip(self.slices) {
            if k > 0 {
                self.step(&mut row, slice);
            }
            add(&mut row, column);
            forward.extend_from_slice(&row);
        }
        let mut out = vec![None; self.slices.len()];
        // The cost of the best way from each column on, that column not counted.
        let mut behind: Vec<Cost> = vec![0; n];
        let columns = forward.chunks_exact(n).zip(local.chunks_exact(n));
        let columns = columns
            .zip(self.slices.iter().zip(&self.weights))
            .zip(&mut out);
        for (((ahead, column), (slice, weights)), slot) in columns.rev() {
            if !slice.tones.is_empty() {
                row.copy_from_slice(ahead);
                add(&mut row, &behind);
                *slot = self.found(slice, weights, &row);
            }
            add(&mut behind, column);
            self.step(&mut behind, slice);
        }
        out
    }

    /// What each chord costs by itself, its strangeness in the key counted.
    fn in_keys(&self, keys: &[Option<LocalKey>]) -> Vec<Cost> {
        let mut local = self.local.clone();
        // A key holds for many sonorities, and asks the same of each chord.
        let mut known: Option<(LocalKey, Vec<Cost>)> = None;
        let rows = local.chunks_exact_mut(self.width()).zip(self.slices);
        for ((row, slice), key) in rows.zip(keys) {
            let Some(key) = key.filter(|_| !slice.tones.is_empty()) else {
                continue;
            };
            if known.as_ref().is_none_or(|(before, _)| *before != key) {
                let strange = self.states.iter().map(|chord| strangeness(*chord, key));
                known = Some((key, strange.collect()));
            }
            let strange = known.iter().flat_map(|(_, strange)| strange);
            for (cost, strange) in row.iter_mut().zip(strange) {
                *cost += strange * slice.length / 100 * PULL / 100;
            }
        }
        local
    }

    /// The best chord of a sonority by what the best way through each costs.
    fn found(&self, slice: &Slice, weights: &Weights<'_>, through: &[Cost]) -> Option<Found> {
        let all = || self.states.iter().zip(through);
        let (&chord, &own) = all().min_by_key(|(_, cost)| **cost)?;
        let none = through.last().copied().unwrap_or(0);
        let quality = chord.quality;
        let (mut root, mut triad, mut seventh) = (none, none, none);
        for (state, &cost) in all() {
            if state.root != chord.root {
                root = root.min(cost);
            }
            if state.root != chord.root || state.quality.triad() != quality.triad() {
                triad = triad.min(cost);
            }
            if state.quality.has_seventh() != quality.has_seventh() {
                seventh = seventh.min(cost);
            }
        }
        let heard = weights.heard(chord);
        let margin = |other: Cost, is_heard: bool| {
            let most = if slice.said.is_some() || is_heard {
                QUARTER * 100
            } else {
                SURE - 1
            };
            (other - own).clamp(0, most)
        };
        Some(Found {
            chord,
            root_margin: margin(root, heard.root),
            margin: margin(triad, heard.whole),
            seventh_margin: margin(seventh, heard.whole),
        })
    }

    /// The least of staying, changing what stands over the root, and changing the chord.
    fn step(&self, row: &mut [Cost], slice: &Slice) {
        let least = |of: &[Cost]| of.iter().min().copied().unwrap_or(0);
        let change = least(row) + slice.change;
        let mut rest = row;
        // No chord at all is a group of its own.
        for &length in self.groups.iter().chain(&[1]) {
            let (group, others) = rest.split_at_mut(length.min(rest.len()));
            let most = change.min(least(group) + slice.same_root);
            for cost in group {
                *cost = (*cost).min(most);
            }
            rest = others;
        }
    }
}

fn add(to: &mut [Cost], what: &[Cost]) {
    for (to, what) in to.iter_mut().zip(what) {
        *to += what;
    }
}

/// Every chord of which enough is somewhere heard together, and what is stated.
fn states(slices: &[Slice], weights: &[Weights<'_>]) -> Vec<Chord> {
    let places = slices.iter().flat_map(|s| s.tones.iter());
    let places = places.flat_map(|tone| tone.stands_for.into_iter().chain([tone.place]));
    let (mut low, mut high) = (i32::MAX, i32::MIN);
    let said: Vec<Chord> = slices.iter().filter_map(|s| Some(s.said?.0)).collect();
    for place in places.chain(said.iter().map(|chord| chord.root)) {
        low = low.min(place);
        high = high.max(place);
    }
    // Signs beyond double ones are noise.
    let roots = low.max(-15)..=high.min(19);
    let chords = roots.flat_map(|root| Quality::ALL.map(|quality| Chord { root, quality }));
    let heard: BTreeSet<u64> = weights.iter().map(Weights::all_meant).collect();
    let is_heard = |chord: &Chord| {
        let bodies = bodies(*chord);
        let mut heard = heard.iter();
        heard.any(|heard| bodies.iter().any(|body| heard & body == *body))
    };
    let mut chords: Vec<Chord> = chords.collect();
    chords.retain(|chord| said.contains(chord) || is_heard(chord));
    chords
}
