//! Roman numerals resolved to notes, as handbooks of common practice read them.
//!
//! The root is the degree of the key; a capital has a major third over it, a small letter a minor
//! one, and o, ø and + say the fifth. A seventh or ninth is what the key makes of it, except over o
//! and ø. In minor the seventh degree is raised under vii, and the sixth under vio and viø.

use partwright_score::fifths::in_signature;
use partwright_score::{Mode, StatedKey};

use crate::harmony::{Chord, Numeral};

/// A chord's notes as places among the fifths.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Notes {
    pub(crate) root: i32,
    /// From the root up: root, third, fifth, and seventh and ninth where it has them.
    pub(crate) tones: Vec<i32>,
    /// What its figures ask for beside the chord.
    pub(crate) beside: Vec<i32>,
    /// What its figures put in the bass.
    pub(crate) bass: Option<i32>,
}

/// The first of the seven places of a key.
fn first_of(key: StatedKey) -> i32 {
    key.tonic - key.mode.natural_final() - 1
}

/// The note of the key on a degree, 1 to 7.
fn degree_in(key: StatedKey, degree: u8) -> i32 {
    in_signature(first_of(key), key.tonic, i32::from(degree) - 1)
}

fn is_minor(mode: Mode) -> bool {
    matches!(mode, Mode::Minor | Mode::Aeolian)
}

/// The root: the degree as the key has it, altered by its sign.
fn root(sign: i8, numeral: Numeral, quality: Option<char>, key: StatedKey) -> i32 {
    let own = degree_in(key, numeral.degree);
    let minor = is_minor(key.mode);
    let diminished = matches!(quality, Some('o' | 'ø'));
    match (sign, numeral.degree) {
        // A small vii stands on the leading note, a semitone below the final: B to C.
        (0, 7) if !numeral.capital && (minor || diminished) => key.tonic + 5,
        // vio and viø of minor stand on the raised sixth.
        (0, 6) if minor && diminished => key.tonic + 3,
        // Some count the degrees of minor from major: their bIII, bVI and bVII are the key's own.
        (-1, 3 | 6 | 7) if minor => own,
        (sign, _) => own + 7 * i32::from(sign),
    }
}

/// The key that a degree would have as a tonic.
fn key_of(numeral: Numeral, key: StatedKey) -> StatedKey {
    StatedKey {
        tonic: root(0, numeral, None, key),
        mode: if numeral.capital {
            Mode::Major
        } else {
            Mode::Minor
        },
    }
}

/// A chord's notes in a key.
pub(crate) fn resolve(chord: &Chord, key: StatedKey) -> Notes {
    let key = chord.applied.map_or(key, |degree| key_of(degree, key));
    let root = root(chord.sign, chord.numeral, chord.quality, key);
    let (third, fifth) = match chord.quality {
        Some('o' | 'ø') => (-3, -6),
        Some('+') => (4, 8),
        _ if chord.numeral.capital => (4, 1),
        _ => (-3, 1),
    };
    let in_key = |steps| in_signature(first_of(key), root, steps);
    let seventh = match chord.quality {
        Some('o') => root - 9,
        Some('ø') => root - 2,
        _ => in_key(6),
    };
    let figures = figured(&chord.figures);
    let mut tones = vec![root, root + third, root + fifth];
    if figures.seventh || chord.quality == Some('ø') {
        tones.push(seventh);
    }
    if figures.ninth {
        tones.push(in_key(1));
    }
    let beside = figures.fourth.then(|| in_key(3));
    Notes {
        root,
        bass: figures.bass.and_then(|tone| tones.get(tone).copied()),
        beside: beside.into_iter().collect(),
        tones,
    }
}

/// A six-four on the fifth degree that the dominant follows is the tonic over its fifth, whatever
/// degree it is named by.
pub(crate) fn cadential(chord: &Chord, next: Option<&Chord>, key: StatedKey) -> Option<Notes> {
    let is_dominant = |chord: &Chord| {
        let numeral = chord.numeral;
        numeral.degree == 5 && numeral.capital && chord.sign == 0 && chord.quality.is_none()
    };
    let next = next.filter(|next| is_dominant(next) && next.applied == chord.applied)?;
    let in_place = matches!(figured(&next.figures).bass, None | Some(0));
    if !is_dominant(chord) || figured(&chord.figures).bass != Some(2) || !in_place {
        return None;
    }
    if figured(&chord.figures).seventh {
        return None;
    }
    let key = chord.applied.map_or(key, |degree| key_of(degree, key));
    let tonic = Chord {
        numeral: Numeral {
            degree: 1,
            capital: !matches!(
                key.mode,
                Mode::Minor | Mode::Aeolian | Mode::Dorian | Mode::Phrygian | Mode::Locrian
            ),
        },
        applied: None,
        ..chord.clone()
    };
    Some(resolve(&tonic, key))
}

/// What the figures of a chord say.
#[derive(Default)]
struct Figured {
    seventh: bool,
    ninth: bool,
    /// A fourth over the root stands before the third.
    fourth: bool,
    /// Which of its tones is in the bass.
    bass: Option<usize>,
}

fn figured(figures: &[u8]) -> Figured {
    let has = |number| figures.contains(&number);
    let seventh = |tone| Figured {
        seventh: true,
        bass: Some(tone),
        ..Figured::default()
    };
    let triad = |tone| Figured {
        bass: Some(tone),
        ..Figured::default()
    };
    if figures.is_empty() {
        return Figured::default();
    }
    if has(9) || has(7) {
        return Figured {
            ninth: has(9),
            fourth: has(4),
            ..seventh(0)
        };
    }
    match (has(6), has(5), has(4), has(3), has(2)) {
        (_, false, _, _, true) => seventh(3),
        (true, true, false, _, false) => seventh(1),
        (_, false, true, true, false) => seventh(2),
        (true, false, true, false, false) => triad(2),
        (true, false, false, _, false) => triad(1),
        (false, _, true, _, false) => Figured {
            fourth: true,
            ..triad(0)
        },
        (false, _, false, _, false) => triad(0),
        _ => Figured::default(),
    }
}
