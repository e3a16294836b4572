//! A suspension stands on a weaker moment than its resolution.
//!
//! Why: the pull of a suspension comes from the strong moment; on a weak one it is only a late note.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 -  -  - | B4 - - - |
//! B | F3 A3 D3 - | G3 - - - |
//! //        ^ suspension position: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - -  B4 | C5 - - - |
//! B | A3 - D3 G3 | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style free
//!
//! S | C5 - B4 - |
//! B | A3 B3 G3 - |
//! ```
//!
//! # What to do
//!
//! Move the dissonance to the stronger moment.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::GROVE.at("fourth order"),
        source::LEHMANN.at("lesson VI"),
        source::JEPPESEN,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the dissonance is weaker than the resolution",
    settings: &[
        allow(Style::Free, "a syncopated line is free"),
        fault(Style::Chorale, "unless the held note belongs to the chord"),
        fault(
            Style::Motet,
            "dissonance on the strong minim, resolution on the weak one",
        ),
        fault(
            Style::Species1,
            "dissonance on the strong half, resolution on the weak one",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let accused = discord.accused(found.style());
    if accused.is_none_or(|(_, near)| near != Some(Near::Position)) {
        return;
    }
    found.dissonance(&ORDINARY, discord, || {
        format!(
            "Suspension position: {}. Let it resolve on a weaker moment than it clashes on.",
            discord.words()
        )
    });
}
