//! Kinds of voice, with their compass.
//!
//! Ordinary and extreme compasses of the choir: the ordinary ones are the common ground of the
//! choral handbooks (Piston and Aldwell & Schachter, from memory); the extreme ones are the
//! outer limits of several handbooks and of the four-part chorales of J. S. Bach. Instruments:
//! orchestration handbooks, from memory, sounding pitch. They are values for trained adults,
//! no limit for a given person.

use crate::Pitch;

/// The lowest and highest pitch of a voice, both included.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Compass {
    /// Lowest pitch.
    pub low: Pitch,
    /// Highest pitch.
    pub high: Pitch,
}

impl Compass {
    /// On which side of the compass a pitch lies, by sound: 1 above, -1 below, 0 inside.
    #[must_use]
    pub const fn side(self, pitch: Pitch) -> i32 {
        let at = pitch.place().semitone;
        if at > self.high.place().semitone {
            1
        } else if at < self.low.place().semitone {
            -1
        } else {
            0
        }
    }
}

/// What a voice is, as declared in its `voice` line.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Kind {
    /// The word the notation uses: `soprano`.
    pub name: &'static str,
    /// Compass of everyday writing; `None` for a plain `voice`.
    pub ordinary: Option<Compass>,
    /// Compass never left without asking the player or singer.
    pub extreme: Option<Compass>,
    /// Usual clef.
    pub clef: &'static str,
    /// Octaves by which it sounds away from where it is usually written.
    pub sounding_octave: i8,
    /// Where the compasses are from.
    pub source: &'static str,
    /// Program number of General MIDI level 1 (from 1) for playback.
    pub program: u8,
}

const fn p(letter: u8, octave: i8) -> Pitch {
    Pitch::new(letter, 0, octave)
}
const C: u8 = 0;
const D: u8 = 1;
const E: u8 = 2;
const F: u8 = 3;
const G: u8 = 4;
const A: u8 = 5;
const B: u8 = 6;
const fn flat(letter: u8, octave: i8) -> Pitch {
    Pitch::new(letter, -1, octave)
}

const fn kind(
    name: &'static str,
    ordinary: (Pitch, Pitch),
    extreme: (Pitch, Pitch),
    clef: &'static str,
    sounding_octave: i8,
    program: u8,
    source: &'static str,
) -> Kind {
    Kind {
        name,
        ordinary: Some(Compass {
            low: ordinary.0,
            high: ordinary.1,
        }),
        extreme: Some(Compass {
            low: extreme.0,
            high: extreme.1,
        }),
        clef,
        sounding_octave,
        program,
        source,
    }
}

const CHOIR: &str = "common ground of Piston and Aldwell & Schachter, from memory; extremes: Bach's chorales and choral guides";
const MIDDLE: &str = "common practice, from memory: between the voices above and below";
const INSTRUMENT: &str = "common practice of orchestration handbooks, from memory; sounding pitch";

/// Every kind the notation knows, choir first.
pub static KINDS: [Kind; 20] = [
    kind(
        "soprano",
        (p(C, 4), p(G, 5)),
        (p(A, 3), p(C, 6)),
        "treble",
        0,
        53,
        CHOIR,
    ),
    kind(
        "mezzo",
        (p(A, 3), p(F, 5)),
        (p(F, 3), p(A, 5)),
        "treble",
        0,
        53,
        MIDDLE,
    ),
    kind(
        "alto",
        (p(G, 3), p(D, 5)),
        (p(E, 3), p(F, 5)),
        "treble",
        0,
        53,
        CHOIR,
    ),
    kind(
        "tenor",
        (p(C, 3), p(G, 4)),
        (p(A, 2), p(B, 4)),
        "treble8",
        0,
        53,
        CHOIR,
    ),
    kind(
        "baritone",
        (p(G, 2), p(E, 4)),
        (p(E, 2), p(G, 4)),
        "bass",
        0,
        53,
        MIDDLE,
    ),
    kind(
        "bass",
        (p(F, 2), p(C, 4)),
        (p(C, 2), p(E, 4)),
        "bass",
        0,
        53,
        CHOIR,
    ),
    kind(
        "violin",
        (p(G, 3), p(B, 6)),
        (p(G, 3), p(E, 7)),
        "treble",
        0,
        41,
        INSTRUMENT,
    ),
    kind(
        "viola",
        (p(C, 3), p(D, 6)),
        (p(C, 3), p(A, 6)),
        "alto",
        0,
        42,
        INSTRUMENT,
    ),
    kind(
        "cello",
        (p(C, 2), p(G, 5)),
        (p(C, 2), p(C, 6)),
        "bass",
        0,
        43,
        INSTRUMENT,
    ),
    kind(
        "doublebass",
        (p(E, 1), p(G, 3)),
        (p(C, 1), p(D, 4)),
        "bass",
        -1,
        44,
        INSTRUMENT,
    ),
    kind(
        "flute",
        (p(C, 4), p(A, 6)),
        (p(B, 3), p(D, 7)),
        "treble",
        0,
        74,
        INSTRUMENT,
    ),
    kind(
        "oboe",
        (p(B, 3), p(E, 6)),
        (flat(B, 3), p(A, 6)),
        "treble",
        0,
        69,
        INSTRUMENT,
    ),
    kind(
        "clarinet",
        (p(D, 3), p(D, 6)),
        (p(D, 3), flat(B, 6)),
        "treble",
        0,
        72,
        INSTRUMENT,
    ),
    kind(
        "bassoon",
        (flat(B, 1), p(B, 4)),
        (flat(B, 1), p(E, 5)),
        "bass",
        0,
        71,
        INSTRUMENT,
    ),
    kind(
        "horn",
        (flat(B, 1), p(F, 5)),
        (p(F, 1), p(A, 5)),
        "treble",
        0,
        61,
        INSTRUMENT,
    ),
    kind(
        "trumpet",
        (p(F, 3), p(B, 5)),
        (p(E, 3), p(D, 6)),
        "treble",
        0,
        57,
        INSTRUMENT,
    ),
    kind(
        "trombone",
        (p(E, 2), flat(B, 4)),
        (p(E, 1), p(F, 5)),
        "bass",
        0,
        58,
        INSTRUMENT,
    ),
    kind(
        "tuba",
        (p(F, 1), p(F, 4)),
        (p(D, 1), p(B, 4)),
        "bass",
        0,
        59,
        INSTRUMENT,
    ),
    kind(
        "organ",
        (p(C, 2), p(A, 6)),
        (p(C, 1), p(C, 8)),
        "treble",
        0,
        20,
        INSTRUMENT,
    ),
    Kind {
        name: "voice",
        ordinary: None,
        extreme: None,
        clef: "treble",
        sounding_octave: 0,
        program: 53,
        source: "a plain voice has no compass",
    },
];

impl Kind {
    /// The kind of that name, or `None`.
    #[must_use]
    pub fn named(name: &str) -> Option<&'static Kind> {
        KINDS.iter().find(|kind| kind.name == name)
    }

    /// Whether a singer has it.
    #[must_use]
    pub fn is_sung(&self) -> bool {
        matches!(
            self.name,
            "soprano" | "mezzo" | "alto" | "tenor" | "baritone" | "bass" | "voice"
        )
    }

    /// The kind of a voice about which nothing is declared.
    #[must_use]
    pub fn plain() -> &'static Kind {
        &KINDS[KINDS.len() - 1]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ordinary_lies_inside_extreme() {
        for kind in &KINDS {
            if let (Some(o), Some(x)) = (kind.ordinary, kind.extreme) {
                assert!(
                    x.low.place() <= o.low.place() && o.high.place() <= x.high.place(),
                    "{}",
                    kind.name
                );
                assert!(o.low.place() < o.high.place(), "{}", kind.name);
            }
        }
    }

    #[test]
    fn choir_compasses_are_those_settled_by_the_rule_research() {
        let text = |c: Compass| format!("{}..{}", c.low, c.high);
        for (name, ordinary, extreme) in [
            ("soprano", "C4..G5", "A3..C6"),
            ("alto", "G3..D5", "E3..F5"),
            ("tenor", "C3..G4", "A2..B4"),
            ("bass", "F2..C4", "C2..E4"),
        ] {
            let kind = Kind::named(name).unwrap();
            assert_eq!(text(kind.ordinary.unwrap()), ordinary);
            assert_eq!(text(kind.extreme.unwrap()), extreme);
        }
    }
}
