//! The local key: a second cheapest way, over the chords.

use partwright_score::{Key, Mode, Score};

use super::Segment;
use super::chord::{Chord, Quality};
use super::slices::{Cost, QUARTER, Slice};
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

/// The key a score states at its beginning.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub(super) struct Home {
    /// Major or minor by its third.
    key: LocalKey,
    /// The lowest place among the fifths of the seven notes of an old mode.
    lowest: Option<i32>,
    /// The music begins here: a stretch from inside the score need not set out from it.
    opens: bool,
}

impl Home {
    /// The same for music that begins the score, or does not.
    pub(super) fn at_start(self, opens: bool) -> Home {
        Home { opens, ..self }
    }
}

/// Leaving a key costs more than a strange quarter note; after a fermata less.
const CHANGE: Cost = QUARTER * 6 / 5;
const CHANGE_AFTER_FERMATA: Cost = QUARTER;

/// That the composer says so is worth as much for the key of the sheet.
const STATED: Cost = 30;

/// Going back to it is cheaper than going elsewhere, in hundredths.
const HOMEWARD: Cost = 60;

/// A long chord is no more evidence than this.
const LONGEST: Cost = QUARTER * 11 / 10;

/// A dominant goes to its tonic, both in root position; the same under a fermata; and in any other
/// position, or from the leading note.
const CADENCE: Cost = 30;
const CADENCE_AT_FERMATA: Cost = 100;
const TURN: Cost = 5;

/// How far among the fifths a chord of a key lies from its tonic: the leading note's lies furthest.
const REACH: i32 = 5;

/// A note that is none of the key, and the raised third of minor, in hundredths of its length.
const FOREIGN: Cost = 40;
const RAISED_THIRD: Cost = 10;

/// How strange a chord is in a key, in hundredths a quarter. The natural seventh of minor is
/// dearer than the raised one: with both for nothing, every major key would be its relative minor.
/// Tuned on half of the chorales that have been analysed; the other half agrees nearly as well.
pub(super) fn strangeness(chord: Chord, key: LocalKey) -> Cost {
    use Quality::{Diminished, FrenchSixth, ItalianSixth, Major, Minor};
    let degree = chord.root - key.tonic;
    let dominant = chord.quality == Quality::DominantSeventh;
    match (key.minor, degree, chord.quality.triad()) {
        (false, 0, Major) | (true, 0, Minor) if !dominant => -25,
        (_, 1, Major) if dominant => -25,
        (_, 1, Major) => -5,
        (false, -1, Major) if !dominant => -15,
        (true, -1, Minor) => -15,
        (false, 2 | 3, Minor) | (true, 2, Diminished) | (_, 5, Diminished) => 10,
        (true, 1, Minor) => 10,
        (false, 4, Minor) => 25,
        (true, -3 | -4, Major) if !dominant => 30,
        // A close in major.
        (true, 0, Major) if !dominant => 35,
        (true, 2, Minor) => 50,
        (true, -1, Major) if !dominant => 60,
        (true, -2, Major) => 90 + if dominant { 25 } else { 0 },
        (_, 6, ItalianSixth) | (_, 2, FrenchSixth) => 65,
        // The dominant of another degree, by its root or its leading note.
        (_, _, Diminished) if degree != 2 => 65,
        (_, 0 | 2..=5, Major) => 70,
        _ => 140,
    }
}

/// A key and the notes that are its own.
#[derive(Clone, Copy)]
struct State {
    key: LocalKey,
    /// The lowest place of the mode that the sheet states, where it is this key's.
    lowest: Option<i32>,
}

impl State {
    fn is_modal(&self, place: i32) -> bool {
        self.lowest
            .is_some_and(|lowest| (lowest..lowest + 7).contains(&place))
    }

    /// A chord of the stated mode's own notes is no stranger than any of the scale.
    fn strangeness(&self, chord: Chord) -> Cost {
        let cost = strangeness(chord, self.key);
        let mut tones = chord.quality.tones().iter();
        if cost > 10 && tones.all(|tone| self.is_modal(chord.root + tone)) {
            return 10;
        }
        cost
    }

    /// What a note costs in hundredths of its length.
    fn foreign(&self, place: i32) -> Cost {
        if self.is_modal(place) {
            return 0;
        }
        match (self.key.minor, place - self.key.tonic) {
            (false, -1..=5) | (true, -4..=3 | 5) => 0,
            (true, 4) => RAISED_THIRD,
            _ => FOREIGN,
        }
    }
}

/// What speaks for a key in one segment: its chord, how it came, its notes.
fn cost(state: &State, before: Option<&Reached>, here: &Reached) -> Cost {
    let key = state.key;
    let chord = here.segment.chord;
    let mut cost = state.strangeness(chord) * here.segment.weight.min(LONGEST) / 100;
    let triad = chord.quality.triad();
    let is_tonic = chord.root == key.tonic
        && chord.quality != Quality::DominantSeventh
        && (triad == Quality::Major || (key.minor && triad == Quality::Minor));
    if let Some(before) = before.filter(|_| is_tonic) {
        let from = before.segment.chord;
        let triad = from.quality.triad();
        if from.root == key.tonic + 1 && triad == Quality::Major {
            cost -= match (
                before.in_root_position && here.in_root_position,
                here.fermata,
            ) {
                (true, true) => CADENCE_AT_FERMATA,
                (true, false) => CADENCE,
                _ => TURN,
            };
        } else if from.root == key.tonic + 5 && triad == Quality::Diminished {
            cost -= TURN;
        }
    }
    let foreign = here.notes.iter();
    let foreign = foreign.map(|(place, length)| length * state.foreign(*place) / 100);
    cost + foreign.sum::<Cost>()
}

/// A segment with how it stands.
struct Reached<'a> {
    segment: &'a Segment,
    in_root_position: bool,
    fermata: bool,
    /// Its notes by place, and how long each sounds in all voices.
    notes: Vec<(i32, Cost)>,
}

impl Reached<'_> {
    fn of<'a>(segment: &'a Segment, slices: &[Slice]) -> Reached<'a> {
        let own = slices.get(segment.first..segment.end).unwrap_or_default();
        let mut notes: Vec<(i32, Cost)> = Vec::new();
        let mut in_root_position = false;
        for (slice, tone) in own.iter().flat_map(|s| s.tones.iter().map(move |t| (s, t))) {
            in_root_position |= tone.is_bass && tone.place == segment.chord.root;
            match notes.iter_mut().find(|(place, _)| *place == tone.place) {
                Some((_, length)) => *length += slice.length,
                None => notes.push((tone.place, slice.length)),
            }
        }
        Reached {
            segment,
            in_root_position,
            fermata: own.iter().any(|slice| slice.fermata),
            notes,
        }
    }
}

/// The key of each segment of a run of slices, setting out from the stated one where there is one,
/// and what the best other key would cost more.
pub(super) fn keys(
    home: Option<Home>,
    segments: &[Segment],
    slices: &[Slice],
) -> Vec<(LocalKey, Cost)> {
    let roots = || segments.iter().map(|s| s.chord.root);
    let (Some(low), Some(high)) = (roots().min(), roots().max()) else {
        return Vec::new();
    };
    let reached: Vec<Reached> = segments.iter().map(|s| Reached::of(s, slices)).collect();
    let states: Vec<State> = (low - REACH..=high + REACH)
        .flat_map(|tonic| [false, true].map(|minor| LocalKey { tonic, minor }))
        .map(|key| State {
            key,
            lowest: home
                .filter(|home| home.key == key)
                .and_then(|home| home.lowest),
        })
        .collect();
    let local: Vec<Vec<Cost>> = (0..reached.len())
        .filter_map(|i| {
            let here = reached.get(i)?;
            let before = i.checked_sub(1).and_then(|i| reached.get(i));
            let costs = states.iter().map(|state| cost(state, before, here));
            Some(costs.collect())
        })
        .collect();
    let changes: Vec<Cost> = (0..reached.len())
        .map(|i| {
            let before = i.checked_sub(1).and_then(|i| reached.get(i));
            let after_fermata = before.is_some_and(|before| before.fermata);
            if after_fermata {
                CHANGE_AFTER_FERMATA
            } else {
                CHANGE
            }
        })
        .collect();
    let start: Vec<Cost> = states
        .iter()
        .map(|state| match home {
            Some(home) if home.opens && home.key != state.key => CHANGE,
            _ => 0,
        })
        .collect();
    let mut keys = best(home, &states, &start, &local, &changes);
    for (key, margin) in &mut keys {
        if home.is_some_and(|home| home.key == *key) {
            *margin += STATED;
        }
    }
    keys
}

/// The cheapest key of each column, and what the best other one costs more.
fn best(
    home: Option<Home>,
    states: &[State],
    start: &[Cost],
    local: &[Vec<Cost>],
    changes: &[Cost],
) -> Vec<(LocalKey, Cost)> {
    let sum = |a: &[Cost], b: &[Cost]| a.iter().zip(b).map(|(a, b)| a + b).collect();
    let home = home.and_then(|home| states.iter().position(|state| state.key == home.key));
    let back = |at: usize, change: Cost| {
        if home == Some(at) {
            change * HOMEWARD / 100
        } else {
            change
        }
    };
    // Up to a column: staying, or the cheapest way to change into each key.
    let into = |from: &[Cost], change: Cost| -> Vec<Cost> {
        let least = from.iter().min().copied().unwrap_or(0);
        let keys = from.iter().enumerate();
        keys.map(|(at, stay)| (*stay).min(least + back(at, change)))
            .collect()
    };
    // From a column on: staying, or whatever key is cheapest to change into.
    let out_of = |to: &[Cost], change: Cost| -> Vec<Cost> {
        let keys = to.iter().enumerate();
        let least = keys.map(|(at, cost)| cost + back(at, change)).min();
        let most = least.unwrap_or(0);
        to.iter().map(|stay| (*stay).min(most)).collect()
    };
    let mut forward: Vec<Vec<Cost>> = Vec::with_capacity(local.len());
    for (column, change) in local.iter().zip(changes) {
        let row = match forward.last() {
            None => sum(start, column),
            Some(before) => sum(&into(before, *change), column),
        };
        forward.push(row);
    }
    let mut behind: Vec<Cost> = vec![0; states.len()];
    let mut keys = Vec::with_capacity(local.len());
    for ((ahead, column), change) in forward.iter().zip(local).zip(changes).rev() {
        let through: Vec<Cost> = sum(ahead, &behind);
        let all = || states.iter().map(|state| state.key).zip(&through);
        if let Some((key, own)) = all().min_by_key(|(_, cost)| **cost) {
            let others = all().filter(|(other, _)| *other != key);
            let other = others.map(|(_, cost)| *cost).min();
            keys.push((key, other.map_or(QUARTER * 100, |other| other - own)));
        }
        behind = out_of(&sum(column, &behind), *change);
    }
    keys.reverse();
    keys
}

/// The key the score states at its beginning, a mode by its third.
pub(super) fn home(score: &Score) -> Option<Home> {
    let Key::Of { tonic, mode, .. } = score.keys.first()?.value else {
        return None;
    };
    // How far the lowest of the seven places lies below the final.
    let (minor, below) = match mode {
        Mode::Lydian => (false, 0),
        Mode::Major | Mode::Ionian => (false, 1),
        Mode::Mixolydian => (false, 2),
        Mode::Dorian => (true, 3),
        Mode::Minor | Mode::Aeolian => (true, 4),
        Mode::Phrygian => (true, 5),
        // No key closes on a diminished triad.
        Mode::Locrian => return None,
    };
    let tonic = fifths(tonic);
    Some(Home {
        key: LocalKey { tonic, minor },
        lowest: (!matches!(mode, Mode::Major | Mode::Minor)).then_some(tonic - below),
        opens: true,
    })
}
