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
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::OPEN_MUSIC_THEORY
        .at("fourth species")
        .looser("nine to eight over its root")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in a voice other than the one it is dissonant with; of a ninth only right beside it",
    settings: &[
        weakness(Style::Free, "the suspension loses its point"),
        weakness(Style::Chorale, "the suspension loses its point"),
        fault(Style::Motet, "the note of resolution is kept free"),
        allow(Style::Species1, "no suspensions"),
        fault(Style::Species4, "the note of resolution is kept free"),
        fault(Style::Species5, "the note of resolution is kept free"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(voice) = discord.resolution_in() else {
        return;
    };
    found.dissonance(&ORDINARY, discord, || {
        format!(
            "Resolution sounding: {}, and {} sounds the note of its resolution. Keep that note free.",
            discord.words(),
            discord.piece.name(voice)
        )
    });
}
