//! Which notes may stand in place of another.

use std::collections::BTreeMap;

use partwright_score::{Key, Mode, Pitch, Score, Time, Voice};

/// Scale steps a mend may go away from the written note: an octave either way.
const FURTHEST: i16 = 7;

/// How many scale steps further a note outside the scale counts.
const ALTERED: i16 = 2;

/// The pitches a note may take instead, nearest first in scale steps, notes of the scale before
/// altered ones, upward before downward; all inside the voice's compass. Each with its distance: a
/// note outside the scale is as far as one of the scale two steps on, so that a sharp out of
/// nowhere is never the first thing offered.
pub(crate) fn candidates(score: &Score, voice: &Voice, at: Time, from: Pitch) -> Vec<(Pitch, i16)> {
    let signs = Signs::at(score, at);
    let mut found = Vec::new();
    for distance in 0..=FURTHEST {
        for order in 0..2_i16 {
            for step in [from.step + distance, from.step - distance] {
                let letter = Pitch { step, sign: 0 };
                let usual = signs.of(letter.letter(), order);
                for &sign in usual {
                    let pitch = Pitch { step, sign };
                    let known = found.iter().any(|(known, _)| *known == pitch);
                    if pitch != from && in_compass(voice, pitch) && !known {
                        found.push((pitch, distance + ALTERED * order));
                    }
                }
            }
        }
    }
    found
}

fn in_compass(voice: &Voice, pitch: Pitch) -> bool {
    let bounds = match voice.limit {
        Some(limit) => [Some(limit), voice.easy],
        None => [voice.easy.or(voice.kind.ordinary), voice.kind.extreme],
    };
    (0..=9).contains(&pitch.octave())
        && bounds
            .iter()
            .flatten()
            .all(|compass| compass.side(pitch) == 0)
}

/// The signs each letter may carry: those of the scale, and the usual alterations.
struct Signs {
    scale: [Vec<i8>; 7],
    altered: [Vec<i8>; 7],
}

impl Signs {
    fn at(score: &Score, at: Time) -> Signs {
        let key = score
            .keys
            .iter()
            .rev()
            .find(|change| change.from <= at)
            .map(|change| change.value);
        match key {
            Some(Key::Of { tonic, mode, .. }) => Signs::of_key(tonic, mode),
            _ => Signs::of_music(score),
        }
    }

    fn of(&self, letter: u8, order: i16) -> &[i8] {
        let list = if order == 0 {
            &self.scale
        } else {
            &self.altered
        };
        list.get(usize::from(letter)).map_or(&[], Vec::as_slice)
    }

    fn of_key(tonic: Pitch, mode: Mode) -> Signs {
        let mut signs = Signs {
            scale: Default::default(),
            altered: Default::default(),
        };
        let degree = |n: i16, semitones: i32| {
            let step = tonic.step + n;
            let plain = Pitch { step, sign: 0 }.place().semitone;
            let sign = tonic.place().semitone + semitones - plain;
            (
                Pitch { step, sign: 0 }.letter(),
                i8::try_from(sign).unwrap_or(0),
            )
        };
        for (n, semitones) in scale(mode).into_iter().enumerate() {
            let (letter, sign) = degree(i16::try_from(n).unwrap_or(0), semitones);
            if let Some(list) = signs.scale.get_mut(usize::from(letter)) {
                list.push(sign);
            }
        }
        for &(n, semitones) in alterations(mode) {
            let (letter, sign) = degree(n, semitones);
            if let Some(list) = signs.altered.get_mut(usize::from(letter)) {
                list.push(sign);
            }
        }
        signs
    }

    /// Without a key: the sign a letter carries most often in the piece, then its others; a
    /// letter that does not occur is natural.
    fn of_music(score: &Score) -> Signs {
        let mut counts: [BTreeMap<i8, usize>; 7] = Default::default();
        let notes = score.voices.iter().flat_map(|v| &v.notes);
        for pitch in notes.filter_map(|n| n.sound.pitch()) {
            if let Some(count) = counts.get_mut(usize::from(pitch.letter())) {
                *count.entry(pitch.sign).or_default() += 1;
            }
        }
        let mut signs = Signs {
            scale: Default::default(),
            altered: Default::default(),
        };
        for (letter, count) in counts.iter().enumerate() {
            let mut ranked: Vec<(usize, i8)> = count.iter().map(|(&sign, &n)| (n, sign)).collect();
            ranked.sort_by_key(|&(n, sign)| (std::cmp::Reverse(n), sign.abs()));
            let mut ranked = ranked.into_iter().map(|(_, sign)| sign);
            if let (Some(scale), Some(altered)) =
                (signs.scale.get_mut(letter), signs.altered.get_mut(letter))
            {
                scale.push(ranked.next().unwrap_or(0));
                altered.extend(ranked);
            }
        }
        signs
    }
}

/// Semitones of the seven degrees over the tonic or final.
fn scale(mode: Mode) -> [i32; 7] {
    match mode {
        Mode::Major | Mode::Ionian => [0, 2, 4, 5, 7, 9, 11],
        Mode::Minor | Mode::Aeolian => [0, 2, 3, 5, 7, 8, 10],
        Mode::Dorian => [0, 2, 3, 5, 7, 9, 10],
        Mode::Phrygian => [0, 1, 3, 5, 7, 8, 10],
        Mode::Lydian => [0, 2, 4, 6, 7, 9, 11],
        Mode::Mixolydian => [0, 2, 4, 5, 7, 9, 10],
        Mode::Locrian => [0, 1, 3, 5, 6, 8, 10],
    }
}

/// Degrees (from 0) with the semitones of their usual alterations (common practice): the raised
/// sixth and seventh of minor, the leading note of the modes, the softened fourth or sixth, and
/// in major the leading notes of the neighbouring keys.
fn alterations(mode: Mode) -> &'static [(i16, i32)] {
    match mode {
        Mode::Major | Mode::Ionian => &[(3, 6), (6, 10), (0, 1), (4, 8)],
        Mode::Minor | Mode::Aeolian => &[(6, 11), (5, 9), (3, 6)],
        Mode::Dorian => &[(6, 11), (5, 8)],
        Mode::Phrygian => &[(2, 4)],
        Mode::Lydian => &[(3, 5)],
        Mode::Mixolydian => &[(6, 11)],
        Mode::Locrian => &[],
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use partwright_score::{Change, Kind, ZERO};

    fn near(key: Key, kind: &str, from: &str) -> Vec<String> {
        let mut score = Score::default();
        score.keys.push(Change {
            from: ZERO,
            value: key,
        });
        let voice = Voice::new("S", Kind::named(kind).unwrap());
        let found = candidates(&score, &voice, ZERO, from.parse().unwrap());
        found
            .iter()
            .take(6)
            .map(|(pitch, _)| pitch.to_string())
            .collect()
    }

    #[test]
    fn nearest_first_inside_the_compass() {
        let g_major = Key::Of {
            tonic: Pitch::new(4, 0, 4),
            mode: Mode::Major,
            signature: None,
        };
        // An altered form of the same letter is the nearest of all: no step away.
        // Notes of the scale first, then the altered ones, step by step.
        assert_eq!(
            near(g_major, "soprano", "B4"),
            ["C5", "A4", "C#5", "D5", "G4", "D#5"]
        );
        // The top of the compass cuts the way up; another sign on the same letter is no step away.
        assert_eq!(near(g_major, "soprano", "G5")[..2], ["F#5", "F5"]);
    }
}
