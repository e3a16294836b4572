//! A voice as declared.

use crate::{Compass, Kind, Note};

/// One voice: what is declared of it, and what it sounds.
#[derive(Clone, Debug, PartialEq)]
pub struct Voice {
    /// The label its rows carry: `S`.
    pub label: String,
    /// What it is.
    pub kind: &'static Kind,
    /// This singer's own limit; outside is a fault.
    pub limit: Option<Compass>,
    /// Where this singer is at ease; outside is a weakness.
    pub easy: Option<Compass>,
    /// The fixed voice, which no repair may touch.
    pub cantus: bool,
    /// This voice's own species in a combined exercise, 1 to 5.
    pub species: Option<u8>,
    /// A clef other than the kind's.
    pub clef: Option<String>,
    /// The transposition a player reads: the pitch sounded where C is written.
    pub written: Option<String>,
    /// The voice with which this one counts as one voice for all pair rules.
    pub doubles: Option<usize>,
    /// May sound an octave lower when the bass is judged.
    pub sixteen_foot: bool,
    /// What it sounds, without gaps from the start of the score to its end.
    pub notes: Vec<Note>,
}

impl Voice {
    /// A voice of that label and kind, with nothing else declared and nothing to sound.
    #[must_use]
    pub fn new(label: &str, kind: &'static Kind) -> Voice {
        Voice {
            label: label.to_owned(),
            kind,
            limit: None,
            easy: None,
            cantus: false,
            species: None,
            clef: None,
            written: None,
            doubles: None,
            sixteen_foot: false,
            notes: Vec::new(),
        }
    }
}
