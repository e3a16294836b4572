//! A suspension resolves with an ornament in a species of plain notes.
//!
//! Why: in the fourth species the step down stands alone, so that it is heard; the ornament belongs to
//! florid lines.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _  _ D5 - | -  B4 C#5 - | D5 - - - |
//! //              ^ ornamented resolution: S and C
//! C | D4 - -  - | E4 - -  -   | D4 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _  _ D5 - | -  C5.B4 C5 - | D5 - - - |
//! C | D4 - -  - | E4 -     -  - | D4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | D5 - - - | -  C5.C5 B4.C5 | D5 - - - |
//! B | D4 - - - | E4 -     -     | D4 - - - |
//! ```
//!
//! # What to do
//!
//! Go to the note of resolution at once.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson IX, Fig. 82"),
        source::FUX_FIGURES.at("ten, all in fifth species"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a leap to an agreeing note, or the note of resolution early, before it comes",
    settings: &[
        allow(Style::Free, "a common ornament"),
        fault(Style::Species4, "two notes to a bar"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    if !discord.suspension().is_some_and(|held| held.ornamented) {
        return;
    }
    found.dissonance(&ORDINARY, discord, || {
        format!(
            "Ornamented resolution: {}. Go down by step at once.",
            discord.words()
        )
    });
}
