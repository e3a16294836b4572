//! Spelled pitches in scientific pitch notation: middle C is C4.

use std::fmt;
use std::str::FromStr;

use partwright_space::Place;

/// Semitones above C of the seven letters, from C.
const SEMITONES: [i32; 7] = [0, 2, 4, 5, 7, 9, 11];
const LETTERS: [char; 7] = ['C', 'D', 'E', 'F', 'G', 'A', 'B'];

/// A spelled pitch: a letter in an octave, and its sign.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Pitch {
    /// Letter position, seven to the octave: C0 = 0, C4 = 28.
    pub step: i16,
    /// Semitones the sign adds: -2 (double flat) to 2 (double sharp).
    pub sign: i8,
}

impl Pitch {
    /// A pitch from its letter (0 = C … 6 = B), its sign in semitones and its octave figure.
    #[must_use]
    pub const fn new(letter: u8, sign: i8, octave: i8) -> Pitch {
        Pitch {
            step: octave as i16 * 7 + letter as i16,
            sign,
        }
    }

    /// The letter's place above C: 0 = C … 6 = B.
    #[must_use]
    pub const fn letter(self) -> u8 {
        self.step.rem_euclid(7) as u8
    }

    /// The octave figure of scientific pitch notation.
    #[must_use]
    pub const fn octave(self) -> i8 {
        self.step.div_euclid(7) as i8
    }

    /// The pitch as a point on both lattices.
    #[must_use]
    pub const fn place(self) -> Place {
        let natural = SEMITONES[self.letter() as usize];
        Place {
            step: self.step as i32,
            semitone: 12 * (self.octave() as i32 + 1) + natural + self.sign as i32,
        }
    }

    /// The same letter and sign, some octaves up (or down, if negative).
    #[must_use]
    pub const fn octaves_up(self, octaves: i8) -> Pitch {
        Pitch {
            step: self.step + 7 * octaves as i16,
            sign: self.sign,
        }
    }

    /// The letter with its sign, without the octave: `F#`.
    #[must_use]
    pub fn class_name(self) -> String {
        let letter = LETTERS[self.letter() as usize % 7];
        format!("{letter}{}", sign_text(self.sign))
    }
}

const fn sign_text(sign: i8) -> &'static str {
    match sign {
        -2 => "bb",
        -1 => "b",
        1 => "#",
        2 => "##",
        _ => "",
    }
}

impl fmt::Display for Pitch {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}{}", self.class_name(), self.octave())
    }
}

/// A text that is no spelled pitch.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct PitchError;

impl fmt::Display for PitchError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("expected a letter A to G, at most two signs and an octave figure, as in F#4")
    }
}

impl std::error::Error for PitchError {}

/// Reads the canonical ASCII form only (`F#4`, `Bb3`, `C##5`); the notation itself reads more.
impl FromStr for Pitch {
    type Err = PitchError;

    fn from_str(text: &str) -> Result<Pitch, PitchError> {
        let mut chars = text.chars();
        let first = chars.next().ok_or(PitchError)?;
        let letter = LETTERS.iter().position(|&l| l == first).ok_or(PitchError)?;
        let rest = chars.as_str();
        let digits = rest.trim_start_matches(['#', 'b']);
        let sign = match &rest[..rest.len() - digits.len()] {
            "" => 0,
            "#" => 1,
            "##" => 2,
            "b" => -1,
            "bb" => -2,
            _ => return Err(PitchError),
        };
        let octave: i8 = digits.parse().map_err(|_| PitchError)?;
        Ok(Pitch::new(letter as u8, sign, octave))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn middle_c_is_c4_and_the_signs_add_semitones() {
        // Scientific pitch notation: C4 = MIDI key 60, A4 = 69 (common practice).
        for (name, step, semitone) in [
            ("C4", 28, 60),
            ("A4", 33, 69),
            ("B3", 27, 59),
            ("B#3", 27, 60),
            ("Cb4", 28, 59),
            ("C##5", 35, 74),
            ("Ebb4", 30, 62),
            ("C0", 0, 12),
        ] {
            let pitch: Pitch = name.parse().unwrap();
            assert_eq!(pitch.place(), Place { step, semitone }, "{name}");
            assert_eq!(pitch.to_string(), name);
        }
    }

    #[test]
    fn other_texts_are_no_pitch() {
        for text in ["", "H4", "C", "C#b4", "C###4", "4", "Cx"] {
            assert!(text.parse::<Pitch>().is_err(), "{text}");
        }
    }
}
