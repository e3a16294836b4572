//! An anticipation where the species has none.
//!
//! Why: a note sounded early takes its effect from the note that follows, and strict lines have no note twice.
//!
//! # Fails
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 C5 A4 G4 | G4 - - - |
//! C | A3 -  -  -  | C4 - - - |
//! //           ^ anticipation: S and C
//! ```
//!
//! # Passes
//!
//! In a florid line, before a tie:
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - - G4 | G4 - E4 - |
//! C | A3 - - -  | C4 - -  - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | D5 - C5 B4.A4 | A4 - - - |
//! B | A3 - E3 E3    | A2 - - - |
//! ```
//!
//! # What to do
//!
//! Write the note once, where it is consonant.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::JEPPESEN.at("portamento"),
        source::GROVE,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the next strong note, early",
    settings: &[
        allow(Style::Free, "ordinary at cadences"),
        fault(Style::Species1, "a dissonance is passing (Grove)"),
        allow(
            Style::Species5,
            "a quarter before a tie (Open Music Theory)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Anticipation) = discord.figure() else {
        return;
    };
    let case = &ORDINARY;
    found.dissonance(case, discord, || {
        format!(
            "Anticipation: {}. Write it once, where it is consonant.",
            discord.words()
        )
    });
}
