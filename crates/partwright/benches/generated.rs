//! Sheets for measuring: four voices, seeded, never periodic, with a finding in about one step
//! of twenty. They are no music to show.

#![allow(clippy::unwrap_used, clippy::nonminimal_bool)]

use std::fmt::Write as _;

use partwright_score::Pitch;
use partwright_space::{Consecutive, Leg};

/// A small generator of random numbers (xorshift, Marsaglia 2003): the same sheet for a seed.
struct Dice(u64);

impl Dice {
    fn roll(&mut self, below: u64) -> u64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        self.0 % below
    }
}

/// Letter positions each voice may take, soprano first.
const RANGES: [(i16, i16); 4] = [(29, 38), (25, 33), (22, 30), (17, 26)];

type Chord = [i16; 4];

fn voicing(dice: &mut Dice, root: i16, before: Option<&Chord>) -> Chord {
    let mut chord = [0; 4];
    for (voice, (low, high)) in RANGES.iter().enumerate() {
        let tones: Vec<i16> = (*low..=*high)
            .filter(|step| matches!((step - root).rem_euclid(7), 0 | 2 | 4))
            .collect();
        let near: Vec<i16> = match before {
            Some(before) => tones
                .iter()
                .copied()
                .filter(|s| (s - before[voice]).abs() <= if voice == 3 { 4 } else { 2 })
                .collect(),
            None => tones.clone(),
        };
        let from = if near.is_empty() { &tones } else { &near };
        chord[voice] = from[usize::try_from(dice.roll(from.len() as u64)).unwrap()];
    }
    if voicing_is_bass_root(&chord, root) {
        chord
    } else {
        chord[3] = nearest_root(root, before.map_or(21, |b| b[3]));
        chord
    }
}

fn voicing_is_bass_root(chord: &Chord, root: i16) -> bool {
    matches!((chord[3] - root).rem_euclid(7), 0 | 2)
}

fn nearest_root(root: i16, near: i16) -> i16 {
    (RANGES[3].0..=RANGES[3].1)
        .filter(|s| (s - root).rem_euclid(7) == 0)
        .min_by_key(|s| (s - near).abs())
        .unwrap()
}

fn is_clean(before: Option<&Chord>, after: &Chord) -> bool {
    let place = |step: i16| Pitch { step, sign: 0 }.place();
    let stacked = after.windows(2).all(|w| w[0] > w[1])
        && after[0] - after[1] <= 7
        && after[1] - after[2] <= 7
        && after[0] - after[2] <= 11
        && after[2] - after[3] <= 12;
    let Some(before) = before else { return stacked };
    // No tritone in a line, and no leap after a leap in one direction: only steps, thirds and
    // the bass's fourths and fifths.
    let tritone = |v: usize| {
        let (a, b) = (before[v], after[v]);
        matches!((a.rem_euclid(7), b.rem_euclid(7)), (3, 6) | (6, 3)) && (a - b).abs() > 2
    };
    if (0..4).any(tritone) {
        return false;
    }
    let mut pairs = (0..4).flat_map(|u| (u + 1..4).map(move |l| (u, l)));
    let directions: Vec<i16> = (0..4).map(|v| (after[v] - before[v]).signum()).collect();
    stacked
        && directions.iter().any(|&d| d != directions[0])
        && pairs.all(|(u, l)| {
            let leg = Leg {
                lower: (place(before[l]), place(after[l])),
                upper: (place(before[u]), place(after[u])),
            };
            let both_leap = (after[u] - before[u]).abs() >= 2 && (after[l] - before[l]).abs() >= 2;
            let leaps = (after[u] - before[u]).abs() >= 2;
            !(leg.same_direction() && both_leap)
                && !leg.overlaps()
                && match leg.consecutive() {
                    None | Some(Consecutive::Repeat(_)) => true,
                    Some(Consecutive::Direct(_)) => (u, l) != (0, 3) || !leaps,
                    _ => false,
                }
        })
}

/// A chorale-like sheet of that many bars of 4/4, four bars a system.
pub(crate) fn sheet(bars: usize, seed: u64) -> String {
    let mut dice = Dice(seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) | 1);
    let mut text = String::from(
        "title   Lamps for measuring\nstyle   chorale\nkey     C major\nmetre   4/4\n\nvoice S soprano\nvoice A alto\nvoice T tenor\nvoice B bass\n",
    );
    let mut before: Option<Chord> = None;
    let mut root: i16 = 28;
    let mut bar = 0;
    while bar < bars {
        let in_system = (bars - bar).min(4);
        let mut rows = ["S |", "A |", "T |", "B |"].map(String::from);
        let mut figure: [Option<i16>; 4] = [None; 4];
        for _ in 0..in_system {
            for _ in 0..4 {
                let careless = dice.roll(60) == 0;
                let mut chord;
                let mut tries = 0;
                loop {
                    root = 28
                        + (root + [3_i16, 4, 1, 5][usize::try_from(dice.roll(4)).unwrap()])
                            .rem_euclid(7);
                    chord = voicing(&mut dice, root, before.as_ref());
                    tries += 1;
                    if careless || tries > 2_000 || is_clean(before.as_ref(), &chord) {
                        break;
                    }
                }
                for (voice, row) in rows.iter_mut().enumerate() {
                    let pitch = Pitch {
                        step: chord[voice],
                        sign: 0,
                    };
                    let octave = i16::from(pitch.octave());
                    let far = before.is_some_and(|b| (b[voice] - chord[voice]).abs() >= 5);
                    let written = if figure[voice] == Some(octave) && !far {
                        pitch.class_name()
                    } else {
                        pitch.to_string()
                    };
                    figure[voice] = Some(octave);
                    let _ = write!(row, " {written}");
                }
                before = Some(chord);
            }
            for row in &mut rows {
                row.push_str(" |");
            }
        }
        let _ = write!(text, "\n{}\n", rows.join("\n"));
        bar += in_system;
    }
    text
}
