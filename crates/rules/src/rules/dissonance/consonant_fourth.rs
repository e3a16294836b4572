//! A fourth over a held bass is treated as a consonance.
//!
//! Why: the fourth over the lowest voice is a dissonance; only one figure of the old style lets it prepare
//! a suspension, reached by step and held.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | C5 - D5 - | -  - C5 - |
//! C | A3 - -  - | E4 - -  - |
//! //       ^ consonant fourth: S and C
//! ```
//!
//! # Passes
//!
//! The figure of the motet:
//!
//! ```voices
//! style free
//!
//! S | C5 D5 | - C#5 |
//! B | A3 -  | - -  |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _  _ E5 - | -  - D5 - |
//! C | A3 - -  - | B3 - -  - |
//! ```
//!
//! # What to do
//!
//! Prepare the suspension on a consonance.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::JEPPESEN, source::FUX],
};

static ORDINARY: Case = Case {
    name: "",
    when: "reached by step on a weak moment, held, resolved down",
    settings: &[
        allow(Style::Free, "known since the 16th century"),
        weakness(Style::Chorale, "a relic of the old style"),
        allow(Style::Motet, "Jeppesen, from memory"),
        fault(Style::Species1, "the fourth is dissonant (Fux)"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::ConsonantFourth) = discord.figure() else {
        return;
    };
    // The note over it may be the one that is held and resolves.
    if found.style().has_chords() && discord.upper_resolves() {
        return;
    }
    let case = &ORDINARY;
    found.dissonance(case, discord, || {
        format!(
            "Consonant fourth: {}. Prepare the suspension on a consonance.",
            discord.words()
        )
    });
}
