//! The cheapest way through the chords of a score.
//!
//! Dynamic programming (Viterbi): a state a chord, a column a sonority. Both directions are kept,
//! so that for each sonority the cost of the best way through every chord is known, and with it how
//! much dearer the best other answer is. One more state is no chord at all: where that is nearly
//! as cheap, no answer is sure.

use super::SURE;
use super::chord::{Chord, Quality};
use super::keys::{LocalKey, strangeness};
use super::segments::{Cost, QUARTER, Slice, Tone};

/// How many notes of a sonority must be of the chord for it to be sure: two fit several chords.
const ENOUGH: usize = 3;

/// What a sonority costs under no chord, in hundredths of its length.
const NO_CHORD: Cost = 250;

/// How much of a chord's strangeness in the key counts against it, in hundredths.
const PULL: Cost = 30;

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

/// What another chord costs where one is stated: more than any music can make up for.
const AGAINST: Cost = QUARTER * 1_000_000;

/// What a chord lacks or leaves out in a sonority.
fn cost(slice: &Slice, chord: Chord) -> Cost {
    let tones = chord.quality.tones();
    let index = |place: i32| tones.iter().position(|t| *t == place - chord.root);
    let mut present = [false; 4];
    let mut total = 0;
    for tone in &slice.tones {
        let own = index(tone.place);
        match own {
            Some(own) if tone.is_bass => {
                total += slice.length * [0, 5, 45, 20].get(own).copied().unwrap_or(0) / 100;
            }
            Some(_) => {}
            None => total += tone.aside,
        }
        let meant = own.or_else(|| tone.stands_for.and_then(index));
        if let Some(slot) = meant.and_then(|meant| present.get_mut(meant)) {
            *slot = true;
        }
    }
    // Two voices leave a root out more easily than four.
    let root = if slice.tones.len() < ENOUGH { 70 } else { 130 };
    let missing = [root, 70, 10, 240];
    for (index, weight) in missing.iter().enumerate().take(tones.len()) {
        if present.get(index) == Some(&false) {
            total += slice.length * weight / 100;
        }
    }
    let prior = match chord.quality {
        Quality::Major | Quality::Minor => 0,
        Quality::DominantSeventh => 10,
        Quality::Diminished | Quality::MajorSeventh => 20,
        Quality::DiminishedSeventh => 25,
        Quality::HalfDiminishedSeventh => 45,
        Quality::ItalianSixth | Quality::GermanSixth | Quality::FrenchSixth => 45,
        Quality::MinorSeventh => 50,
        Quality::Augmented => 60,
    };
    total + slice.length * prior / 100
}

/// A row of costs: one a chord, and at the end that of no chord.
type Row = Vec<Cost>;

/// The chords of a run of sonorities, and what each would cost in each by itself.
pub(super) struct Search<'a> {
    slices: &'a [Slice],
    states: Vec<Chord>,
    /// How many states each root has, in their order.
    groups: Vec<usize>,
    local: Vec<Row>,
}

impl<'a> Search<'a> {
    pub(super) fn new(slices: &'a [Slice]) -> Search<'a> {
        let states = states(slices);
        let row = |slice: &Slice| -> Row {
            if slice.tones.is_empty() {
                return vec![0; states.len() + 1];
            }
            let said = slice
                .said
                .map(|(chord, _)| chord)
                .filter(|c| states.contains(c));
            let against = |state: &Chord| match said {
                Some(said) if said != *state => AGAINST,
                _ => 0,
            };
            let chords = states
                .iter()
                .map(|chord| cost(slice, *chord) + against(chord));
            let none = said.map_or(slice.length * NO_CHORD / 100, |_| AGAINST);
            chords.chain([none]).collect()
        };
        let local = slices.iter().map(row).collect();
        let groups = states.chunk_by(|a, b| a.root == b.root);
        let groups = groups.map(<[Chord]>::len).collect();
        Search {
            slices,
            states,
            groups,
            local,
        }
    }

    /// The chord of each sonority, in the key of each where one is known.
    pub(super) fn chords(&self, keys: &[Option<LocalKey>]) -> Vec<Option<Found>> {
        if self.states.is_empty() {
            return vec![None; self.slices.len()];
        }
        let local: Vec<Row> = (0..self.slices.len())
            .map(|k| self.in_key(k, keys.get(k).copied().flatten()))
            .collect();
        // The cost of the best way up to each column, that column counted.
        let mut forward: Vec<Row> = Vec::with_capacity(local.len());
        for (column, slice) in local.iter().zip(self.slices) {
            let row = match forward.last() {
                None => column.clone(),
                Some(before) => sum(&step(before, slice, &self.groups), column),
            };
            forward.push(row);
        }
        let mut out = vec![None; local.len()];
        // The cost of the best way from each column on, that column not counted.
        let mut behind: Row = vec![0; self.states.len() + 1];
        let columns = forward.iter().zip(&local).zip(self.slices).zip(&mut out);
        for (((ahead, column), slice), slot) in columns.rev() {
            if !slice.tones.is_empty() {
                *slot = self.found(slice, &sum(ahead, &behind));
            }
            behind = step(&sum(column, &behind), slice, &self.groups);
        }
        out
    }

    fn in_key(&self, k: usize, key: Option<LocalKey>) -> Row {
        let mut row = self.local.get(k).cloned().unwrap_or_default();
        let (Some(key), Some(slice)) = (key, self.slices.get(k)) else {
            return row;
        };
        if !slice.tones.is_empty() {
            for (cost, chord) in row.iter_mut().zip(&self.states) {
                *cost += strangeness(*chord, key) * slice.length / 100 * PULL / 100;
            }
        }
        row
    }

    /// The best chord of a sonority by what the best way through each costs.
    fn found(&self, slice: &Slice, through: &[Cost]) -> Option<Found> {
        let all = || self.states.iter().zip(through);
        let (&chord, &own) = all().min_by_key(|(_, cost)| **cost)?;
        let none = through.last().copied().unwrap_or(0);
        let most = |is_heard: bool| {
            if slice.said.is_some() || is_heard {
                QUARTER * 100
            } else {
                SURE - 1
            }
        };
        let heard = Heard::of(slice, chord);
        let margin = |most: Cost, differs: &dyn Fn(Chord) -> bool| {
            let others = all().filter(|(state, _)| differs(**state));
            let other = others.map(|(_, cost)| *cost).min();
            (other.unwrap_or(none).min(none) - own).clamp(0, most)
        };
        let (root, whole) = (most(heard.root), most(heard.whole));
        let quality = chord.quality;
        Some(Found {
            chord,
            root_margin: margin(root, &|other| other.root != chord.root),
            margin: margin(whole, &|other| {
                other.root != chord.root || other.quality.triad() != quality.triad()
            }),
            seventh_margin: margin(whole, &|other| {
                other.quality.has_seventh() != quality.has_seventh()
            }),
        })
    }
}

/// What of a chord is heard in a sonority.
struct Heard {
    /// Three voices sound notes of the chord, and its root is among those or meant by others.
    root: bool,
    /// Its third too: an open fifth has no quality, whatever the key would make of it.
    whole: bool,
}

impl Heard {
    fn of(slice: &Slice, chord: Chord) -> Heard {
        let tones = chord.quality.tones();
        let index = |place: i32| tones.iter().position(|t| *t == place - chord.root);
        let own = |tone: &Tone| index(tone.place);
        let meant = |tone: &Tone| own(tone).or_else(|| tone.stands_for.and_then(index));
        let has = |which: usize| slice.tones.iter().any(|tone| meant(tone) == Some(which));
        let count = slice
            .tones
            .iter()
            .filter(|tone| own(tone).is_some())
            .count();
        let root = count >= ENOUGH && has(0);
        Heard {
            root,
            whole: root && has(1),
        }
    }
}

fn sum(a: &[Cost], b: &[Cost]) -> Row {
    a.iter().zip(b).map(|(a, b)| a + b).collect()
}

/// The least of staying, changing what stands over the root, and changing the chord; `groups` are
/// the numbers of chords on each root.
fn step(before: &[Cost], slice: &Slice, groups: &[usize]) -> Row {
    let least = |of: &[Cost]| of.iter().min().copied().unwrap_or(0);
    let change = least(before) + slice.change;
    let mut row = Row::with_capacity(before.len());
    let mut rest = before;
    for &length in groups {
        let (root, others) = rest.split_at(length.min(rest.len()));
        let most = change.min(least(root) + slice.same_root);
        row.extend(root.iter().map(|stay| (*stay).min(most)));
        rest = others;
    }
    row.extend(rest.iter().map(|stay| (*stay).min(change)));
    row
}

/// Every chord on a root that sounds somewhere, or could stand between two that do.
fn states(slices: &[Slice]) -> Vec<Chord> {
    let sounding = slices.iter().flat_map(|s| s.tones.iter().map(|t| t.place));
    let said = slices.iter().filter_map(|s| Some(s.said?.0.root));
    let places = sounding.chain(said);
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
