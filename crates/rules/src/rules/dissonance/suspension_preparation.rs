//! A suspended note is not prepared, or not long enough.
//!
//! Why: a suspension is a consonance that stays too long: it must have been one, and long enough to be heard.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | G4 - A4 G4.C5 | -  B4 C5 - |
//! B | E3 - F3 E3    | D3 -  C3 - |
//! //                  ^ suspension preparation: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | G4 - A4 C5 | -  B4 C5 - |
//! B | E3 - F3 E3 | D3 G3 C3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style free
//! metre 4/4
//!
//! S | G4 - A4 G4.C5 | -  B4 C5 - |
//! B | E3 - F3 E3    | D3 -  C3 - |
//! ```
//!
//! # What to do
//!
//! Strike the note on a consonance a half before.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&SHORT, &MISSING],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson VI"),
        source::OPEN_MUSIC_THEORY,
        source::GROVE.at("fourth order"),
        source::JEPPESEN,
    ],
};

static SHORT: Case = Case {
    name: "",
    when: "the preparation is shorter than the dissonance",
    settings: &[
        allow(Style::Free, "ornamental lines prepare as they can"),
        fault(Style::Motet, "a minim for a minim (Jeppesen, from memory)"),
        fault(Style::Species1, "a half at least (Lehmann, lesson VI)"),
        allow(Style::Species5, "the tied quarter is a fault of the rhythm"),
    ],
};

static MISSING: Case = Case {
    name: "missing",
    when: "the note was dissonant before; where chords are heard, only one strange to the chord of both moments",
    settings: &[
        weakness(
            Style::Free,
            "a held note strange to the chord was consonant before (Grove; Open Music Theory)",
        ),
        fault(
            Style::Chorale,
            "only a note of the chord needs no preparation",
        ),
        fault(Style::Motet, "the preparation is a consonance"),
        fault(Style::Species1, "the preparation is a consonance"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let accused = discord.accused(found.style());
    let is_short = discord.suspension().is_some_and(|held| held.is_short());
    let (case, lacks) = if accused.is_some_and(|(_, near)| near == Some(Near::Preparation)) {
        (&MISSING, "is dissonant before that")
    } else if is_short {
        (&SHORT, "is prepared for less time than it lasts")
    } else {
        return;
    };
    found.dissonance(case, discord, || {
        format!(
            "Suspension preparation: {}, and {lacks}. Strike it earlier, on a consonance.",
            discord.words()
        )
    });
}
