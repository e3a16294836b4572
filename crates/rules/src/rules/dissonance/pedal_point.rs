//! The lowest voice holds a note against dissonances.
//!
//! Why: a pedal is an instrument's device; in vocal counterpoint the bass follows the harmony.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 - F5 - | D5 - F5 - | E5 - - - |
//! B | C3 - -  - | -  - -  - | -  - - - |
//! //       ^ pedal point (weakness): S and B
//! ```
//!
//! # Passes
//!
//! The bass moves:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 - F5 - | D5 - E5 - |
//! B | C3 - D3 - | G3 - C3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//! metre 4/4
//!
//! S | E5 - F5 - | D5 - F5 - | E5 - - - |
//! B | C3 - -  - | -  - -  - | -  - - - |
//! ```
//!
//! # What to do
//!
//! Let the lowest voice move with the others.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::GROVE.at("Strict Counterpoint"),
        source::KOSTKA_PAYNE.at("ch. 12"),
        source::BUTTERFIELD,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "held through two bars or more",
    settings: &[
        allow(Style::Free, "ordinary: over it the next voice is the bass"),
        weakness(Style::Motet, "rare in the style"),
        fault(Style::Species1, "at a close only (Grove)"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Pedal) = discord.figure() else {
        return;
    };
    let case = &ORDINARY;
    found.dissonance(case, discord, || {
        format!(
            "Pedal point: {}. Let the lowest voice move with the others.",
            discord.words()
        )
    });
}
