//! The final and its mode, and the seventh below it.
//!
//! A key that the sheet states tells both. In strict counterpoint the last note of the cantus is
//! the final, and the mode is that of its letter: D dorian, E phrygian, F lydian, G mixolydian,
//! A aeolian, C ionian (Fux, Gradus ad Parnassum, Book II).

use partwright_score::{Key, Mode, Pitch, Score, Time};

pub use partwright_score::fifths::{fifths, named};

/// A final with its mode.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Final {
    /// The final or tonic; its octave means nothing.
    pub pitch: Pitch,
    /// Its mode.
    pub mode: Mode,
    /// Flats of the signature as printed; sharps are negative.
    pub flats: i32,
}

/// The key stated at a moment. `None` where none is, or where `key none` says so.
#[must_use]
pub fn stated(score: &Score, at: Time) -> Option<Final> {
    let change = score.keys.iter().rev().find(|change| change.from <= at)?;
    match change.value {
        Key::Of {
            tonic,
            mode,
            signature,
        } => Some(Final {
            pitch: tonic,
            mode,
            flats: signature.map_or_else(|| flats_of(tonic, mode), |n| -i32::from(n)),
        }),
        Key::None => None,
    }
}

/// The last note of the cantus as the final, in the mode of its letter.
#[must_use]
pub fn of_cantus(score: &Score) -> Option<Final> {
    let cantus = score.voices.iter().find(|voice| voice.cantus)?;
    let last = cantus.notes.iter().rev().find_map(|n| n.sound.pitch())?;
    let mode = match (last.letter(), last.sign) {
        (0, 0) => Mode::Ionian,
        (1, 0) => Mode::Dorian,
        (2, 0) => Mode::Phrygian,
        (3, 0) => Mode::Lydian,
        (4, 0) => Mode::Mixolydian,
        (5, 0) => Mode::Aeolian,
        _ => return None,
    };
    Some(Final {
        pitch: last,
        mode,
        flats: 0,
    })
}

/// The signature that most notes of a score fit, as a number of flats; negative for sharps, and
/// the smallest where several fit as many.
#[must_use]
pub fn likely_flats(score: &Score) -> i32 {
    let mut counts = [0_u32; 64];
    let notes = score.voices.iter().flat_map(|voice| &voice.notes);
    for pitch in notes.filter_map(|note| note.sound.pitch()) {
        let slot = usize::try_from(fifths(pitch) + 32).ok();
        if let Some(count) = slot.and_then(|slot| counts.get_mut(slot)) {
            *count += 1;
        }
    }
    // Without signs the seven letters are F to B: -1 to 5 among the fifths.
    let fit = |flats: i32| -> u32 {
        let first = usize::try_from(31 - flats).unwrap_or(0);
        counts.iter().skip(first).take(7).sum()
    };
    (-7..=7)
        .max_by_key(|&flats| (fit(flats), -i32::abs(flats)))
        .unwrap_or(0)
}

fn flats_of(tonic: Pitch, mode: Mode) -> i32 {
    mode.natural_final() - fifths(tonic)
}

impl Final {
    /// A pitch is the final, in any octave.
    #[must_use]
    pub fn is(&self, pitch: Pitch) -> bool {
        pitch.letter() == self.pitch.letter() && pitch.sign == self.pitch.sign
    }

    /// The scale degree of a pitch by its letter: 0 the final, 6 the seventh.
    #[must_use]
    pub fn degree(&self, pitch: Pitch) -> u8 {
        (pitch.letter() + 7 - self.pitch.letter()) % 7
    }

    /// A pitch is the seventh degree a semitone below the final: B to C, five fifths up.
    #[must_use]
    pub fn is_leading_note(&self, pitch: Pitch) -> bool {
        fifths(pitch) - fifths(self.pitch) == 5
    }

    /// The final has a semitone above it: its close is 2-1, and its seventh is not raised.
    #[must_use]
    pub fn is_phrygian(&self) -> bool {
        matches!(self.mode, Mode::Phrygian | Mode::Locrian)
    }

    /// The mode's own seventh lies a whole tone below the final, and is raised at a close.
    #[must_use]
    pub fn raises_its_seventh(&self) -> bool {
        matches!(
            self.mode,
            Mode::Minor | Mode::Dorian | Mode::Mixolydian | Mode::Aeolian
        )
    }
}

#[cfg(test)]
mod tests {
    use partwright_score::{Change, Kind, Note, Sound, Voice, ZERO};

    use super::*;

    fn pitch(text: &str) -> Pitch {
        match text.parse() {
            Ok(pitch) => pitch,
            Err(_) => Pitch::new(0, 0, 4),
        }
    }

    fn cantus(last: &str) -> Score {
        let mut voice = Voice::new("C", Kind::plain());
        voice.cantus = true;
        let one = Time::from_integer(1);
        voice
            .notes
            .push(Note::new(ZERO, one, Sound::Pitch(pitch(last))));
        Score {
            voices: vec![voice],
            ..Score::default()
        }
    }

    #[test]
    fn the_letter_of_the_final_tells_the_mode() {
        let mode = |last| of_cantus(&cantus(last)).map(|found| found.mode);
        assert_eq!(mode("D4"), Some(Mode::Dorian));
        assert_eq!(mode("E3"), Some(Mode::Phrygian));
        assert_eq!(mode("F4"), Some(Mode::Lydian));
        assert_eq!(mode("G4"), Some(Mode::Mixolydian));
        assert_eq!(mode("A3"), Some(Mode::Aeolian));
        assert_eq!(mode("C4"), Some(Mode::Ionian));
        assert_eq!(mode("B3"), None);
        assert_eq!(mode("Bb3"), None);
    }

    #[test]
    fn a_stated_key_tells_its_signature() {
        let stated_flats = |tonic, mode, signature| {
            let score = Score {
                keys: vec![Change {
                    from: ZERO,
                    value: Key::Of {
                        tonic: pitch(tonic),
                        mode,
                        signature,
                    },
                }],
                ..Score::default()
            };
            stated(&score, ZERO).map(|found| found.flats)
        };
        assert_eq!(stated_flats("G4", Mode::Dorian, None), Some(1));
        assert_eq!(stated_flats("G4", Mode::Major, None), Some(-1));
        assert_eq!(stated_flats("C4", Mode::Minor, None), Some(3));
        assert_eq!(stated_flats("C4", Mode::Minor, Some(-2)), Some(2));
        assert_eq!(stated(&Score::default(), ZERO), None);
    }

    #[test]
    fn leading_notes() {
        let leads = |last: &str, seventh: &str| {
            let found = of_cantus(&cantus(last));
            found.is_some_and(|found| found.is_leading_note(pitch(seventh)))
        };
        assert!(leads("D4", "C#5") && !leads("D4", "C5") && !leads("D4", "Db5"));
        assert!(leads("F4", "E4") && leads("E4", "D#4") && leads("G4", "F#3"));
    }

    #[test]
    fn degrees_go_by_letter() {
        let dorian = of_cantus(&cantus("D4"));
        let degree = |text| dorian.map(|found| found.degree(pitch(text)));
        assert_eq!(
            [degree("D5"), degree("C#3"), degree("C5"), degree("Eb4")],
            [Some(0), Some(6), Some(6), Some(1)]
        );
    }
}
