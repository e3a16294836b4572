//! Keys and modes.

use std::fmt;

use crate::Pitch;

/// The mode of a key.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[allow(missing_docs)]
pub enum Mode {
    Major,
    Minor,
    Ionian,
    Dorian,
    Phrygian,
    Lydian,
    Mixolydian,
    Aeolian,
    Locrian,
}

impl Mode {
    /// Every mode, in the order in which messages list them.
    pub const ALL: [Mode; 9] = [
        Mode::Major,
        Mode::Minor,
        Mode::Ionian,
        Mode::Dorian,
        Mode::Phrygian,
        Mode::Lydian,
        Mode::Mixolydian,
        Mode::Aeolian,
        Mode::Locrian,
    ];

    /// The word the notation uses.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Mode::Major => "major",
            Mode::Minor => "minor",
            Mode::Ionian => "ionian",
            Mode::Dorian => "dorian",
            Mode::Phrygian => "phrygian",
            Mode::Lydian => "lydian",
            Mode::Mixolydian => "mixolydian",
            Mode::Aeolian => "aeolian",
            Mode::Locrian => "locrian",
        }
    }

    /// The place among the fifths of its final where nothing is signed: D dorian is 2.
    #[must_use]
    pub const fn natural_final(self) -> i32 {
        match self {
            Mode::Lydian => -1,
            Mode::Major | Mode::Ionian => 0,
            Mode::Mixolydian => 1,
            Mode::Dorian => 2,
            Mode::Minor | Mode::Aeolian => 3,
            Mode::Phrygian => 4,
            Mode::Locrian => 5,
        }
    }

    /// The mode of that name, or `None`.
    #[must_use]
    pub fn named(name: &str) -> Option<Mode> {
        Mode::ALL.into_iter().find(|mode| mode.name() == name)
    }
}

/// A key as stated: a tonic (or final) with its mode, or the statement that there is none.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Key {
    /// `key G major`, `key D dorian`, `key E minor signature 1b`.
    Of {
        /// The tonic or final; its octave means nothing.
        tonic: Pitch,
        /// Its mode.
        mode: Mode,
        /// The printed signature where it differs: sharps positive, flats negative.
        signature: Option<i8>,
    },
    /// `key none`: rules that need a key are silent.
    None,
}

impl fmt::Display for Key {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Key::None => f.write_str("none"),
            Key::Of {
                tonic,
                mode,
                signature,
            } => {
                write!(f, "{} {}", tonic.class_name(), mode.name())?;
                match signature {
                    Some(n) if *n < 0 => write!(f, " signature {}b", -n),
                    Some(n) => write!(f, " signature {n}#"),
                    None => Ok(()),
                }
            }
        }
    }
}
