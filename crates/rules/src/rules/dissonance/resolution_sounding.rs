//! The note a suspension waits for sounds already in another voice.
//!
//! Why: a suspension keeps the ear waiting for one note; if another voice sings it meanwhile, nothing is
//! left to wait for.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - - - | - - B4 - |
//! //             ^ resolution sounding: S and B
//! A | A4 - - - | B4 - D5 - |
//! B | A3 - - - | G3 - - - |
//! ```
//!
//! An octave away:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - - - | - - B4 - |
//! //             ^ resolution sounding (weakness): S and B
//! T | A3 - - - | B3 - G3 - |
//! B | A3 - - - | G3 - - - |
//! ```
//!
//! # Passes
//!
//! Nine to eight, with the root in the lowest voice:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | D5 - - - | -  - C5 - |
//! A | G4 - - - | -  - - -  |
//! T | D4 - - - | E4 - - -  |
//! B | B2 - - - | C3 - - -  |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style species-1
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - - - | G4 - - - |
//! C | F4 - - - | E4 - - - |
//! ```
//!
//! # What to do
//!
//! Give the other voice another note of the chord until the suspension has resolved.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&BESIDE, &OCTAVE],
    numbers: &[],
    sources: &[
        source::RENAISSANCE_WORKS
            .at("57 in 15,030 bars, some of them Palestrina's")
            .looser("an octave away"),
        source::OPEN_MUSIC_THEORY
            .at("fourth species")
            .looser("nine to eight over its root"),
    ],
};

static BESIDE: Case = Case {
    name: "",
    when: "right beside it, in a voice other than the one it is dissonant with",
    settings: &[
        weakness(Style::Free, "the suspension loses its point"),
        weakness(Style::Chorale, "the suspension loses its point"),
        fault(Style::Motet, "the note of resolution is kept free"),
        allow(Style::Species1, "no suspensions"),
        fault(Style::Species4, "the note of resolution is kept free"),
        fault(Style::Species5, "the note of resolution is kept free"),
    ],
};

static OCTAVE: Case = Case {
    name: "octave",
    when: "in another octave, unless it is the octave of a ninth's lower note",
    settings: &[
        weakness(Style::Free, "the suspension loses its point"),
        weakness(Style::Chorale, "the suspension loses its point"),
        weakness(
            Style::Motet,
            "57 in 15,030 bars of vocal polyphony, Palestrina's among them",
        ),
        allow(Style::Species1, "no suspensions"),
        fault(Style::Species4, "the note of resolution is kept free"),
        fault(Style::Species5, "the note of resolution is kept free"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some((voice, beside)) = discord.resolution_in() else {
        return;
    };
    // A note of the chord need not resolve.
    if found.style().has_chords() && discord.is_of_sure_chord() {
        return;
    }
    let case = if beside { &BESIDE } else { &OCTAVE };
    found.dissonance(case, discord, || {
        format!(
            "Resolution sounding: {}, and {} sounds the note of its resolution. Keep that note free.",
            discord.words(),
            discord.piece.name(voice)
        )
    });
}
