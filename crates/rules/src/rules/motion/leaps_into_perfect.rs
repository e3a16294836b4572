//! Two voices leap against each other into a perfect interval.
//!
//! Why: the leap in both voices throws all the weight on a bare sound.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | E5 G5 |
//! //     ^^ leaps into perfect (weakness): S and B
//! B | G4 C4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | A4 G4 |
//! B | F3 C4 |
//! ```
//!
//! # Does not apply
//!
//! In three parts, and in the other species:
//!
//! ```voices
//! style species-1
//!
//! S | E5 G5 |
//! A | B4 E5 |
//! B | G4 C4 |
//! ```
//!
//! # What to do
//!
//! Let one of the two step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::LEHMANN.at("lesson I, Fig. 11")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "both a third or more, in two parts",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Motet, "as in strict counterpoint"),
        weakness(Style::Species1, "listed as bad (Lehmann, Fig. 11)"),
        allow(Style::Species2, "not listed"),
        allow(Style::Species3, "not listed"),
        allow(Style::Species4, "not listed"),
        allow(Style::Species5, "not listed"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.leaps_against_into_perfect() || step.sounding.piece.voices() != 2 {
        return;
    }
    found.pair(&ORDINARY, step, || {
        format!(
            "Leaps into a perfect interval: {}. Let one of them step.",
            step.story()
        )
    });
}
