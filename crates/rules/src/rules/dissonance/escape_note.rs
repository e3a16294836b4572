//! A dissonance is reached by step and left by a leap the other way.
//!
//! Why: strict styles let a dissonance go on by step, so that the ear can follow it.
//!
//! # Fails
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 B4 G4 F4 | E4 - - - |
//! C | A3 -  -  -  | C4 - - - |
//! //     ^ escape note: S and C
//! ```
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 - - B4 | G4 - - - |
//! B | A3 - - -  | E3 - - - |
//! //         ^ escape note (weakness): S and B
//! ```
//!
//! # Passes
//!
//! The note is consonant:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | E5 F5 C5 A4 | G4 - - - |
//! C | A3 -  -  -  | C4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | A4.B4 G4 |
//! B | A3 C4 |
//! ```
//!
//! # What to do
//!
//! Go on by step, or make the note consonant.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::GROVE.at("Strict Counterpoint"),
        source::OPEN_MUSIC_THEORY,
        source::BUTTERFIELD,
        source::KOSTKA_PAYNE
            .at("ch. 12")
            .looser("a figure like others"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a step, then a leap back",
    settings: &[
        allow(Style::Free, "a known ornament"),
        weakness(
            Style::Motet,
            "outside the style but for small notes (Jeppesen, from memory)",
        ),
        fault(
            Style::Species1,
            "a dissonance is left by step (Grove; Open Music Theory)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Escape) = discord.figure() else {
        return;
    };
    let case = &ORDINARY;
    // One that is too long is told as that, which weighs more.
    if found.is_told_of_dissonance("long-dissonance", discord) {
        return;
    }
    found.dissonance(case, discord, || {
        format!(
            "Escape note: {}. Go on by step, or make it consonant.",
            discord.words()
        )
    });
}
