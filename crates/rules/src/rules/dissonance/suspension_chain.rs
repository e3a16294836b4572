//! The same suspension runs on too long.
//!
//! Why: a chain of one figure turns into a pattern, and the line loses its own shape.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - B4 | - A4 | - G4 | - F4 |
//! //                              ^ suspension chain (weakness): S and C
//! C | C4 - | D4 - | C4 - | B3 - | A3 - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - B4 | - A4 | - G4 | A4 - |
//! C | C4 - | D4 - | C4 - | B3 - | A3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 - C5 - | - - B4 - | - - A4 - | - - G4 - | - - F4 - |
//! B | A3 - - -  | D4 - - - | C4 - - - | B3 - - - | A3 - - - |
//! ```
//!
//! # What to do
//!
//! After the third, break the chain with a consonant tie or another suspension.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[&MOST],
    sources: &[source::OPEN_MUSIC_THEORY.at("fourth species")],
};

static MOST: NumberOf = NumberOf {
    name: "most",
    means: "how many suspensions of the same numbers may follow one another",
    value: 3,
    bounds: (1, 16),
};

static ORDINARY: Case = Case {
    name: "",
    when: "one more than may follow one another, each prepared by the resolution before",
    settings: &[
        allow(Style::Free, "chains are a device"),
        weakness(
            Style::Species4,
            "no more than three of a kind (Open Music Theory)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(numbers) = discord.numbers() else {
        return;
    };
    let most = usize::try_from(found.number(&MOST)).unwrap_or(0);
    // Told once a chain.
    if discord.running() != most + 1 {
        return;
    }
    found.dissonance(&ORDINARY, discord, || {
        format!(
            "Suspension chain: {} has {} over {} more than {most} times running. Break the chain with another interval.",
            discord.piece.name(discord.dissonant().0),
            numbers.text(),
            discord.piece.name(discord.other().0)
        )
    });
}
