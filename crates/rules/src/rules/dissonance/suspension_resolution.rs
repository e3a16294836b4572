//! A suspended note does not go down by step.
//!
//! Why: a held dissonance raises an expectation; the step down answers it.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _ _ D5 - | - - A4 - | F4 - - - |
//! C | D4 - - - | E4 - -  - | D4 - - - |
//! //             ^ suspension resolution: S and C
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _ _ D5 - | - - C#5 - | D5 - - - |
//! C | D4 - - - | E4 - -  - | D4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style free
//!
//! S | D5 - | -  A4 |
//! B | D4 - | E4 -  |
//! ```
//!
//! # What to do
//!
//! Let the held note go down by step while the other voice stays, or moves to a note that agrees.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::FUX_FIGURES.at("166 suspensions, all down by step"),
        source::GROVE.at("fourth order"),
        source::OPEN_MUSIC_THEORY,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "it leaps, goes up otherwise, or stays; where chords are heard, only a note strange to the chord that reaches its resolution by no short way round",
    settings: &[
        allow(Style::Free, "asked of strict lines and of the chorale"),
        fault(Style::Chorale, "unless the held note belongs to the chord"),
        fault(Style::Motet, "suspensions go down by step"),
        fault(
            Style::Species1,
            "suspensions go down by step: all 166 in the figures of Fux do",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let accused = discord.accused(found.style());
    if accused.is_none_or(|(_, near)| near != Some(Near::Resolution)) {
        return;
    }
    found.dissonance(&ORDINARY, discord, || {
        format!(
            "Suspension without resolution: {}. Let it go down by step.",
            discord.words()
        )
    });
}
