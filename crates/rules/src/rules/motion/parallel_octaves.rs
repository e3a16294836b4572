//! Two voices move in parallel from one octave to another.
//!
//! Why: for two notes there is one voice less; an octave hides a line even more than a fifth.
//!
//! # Fails
//!
//! ```voices
//! S | C5 D |
//! B | C4 D |
//! //     ^ parallel octaves: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | C5 B4 |
//! B | C4 D  |
//! ```
//!
//! # Does not apply
//!
//! One voice is written as the double of the other:
//!
//! ```voices
//! voice V violin
//! voice C cello
//! voice D doublebass doubles C
//!
//! V | E5 F |
//! C | C3 A |
//! D | C2 A |
//! ```
//!
//! All the voices go in octaves for three notes or more:
//!
//! ```voices
//! S | C5 D E F |
//! A | C4 D E F |
//! B | C3 D E F |
//! ```
//!
//! # What to do
//!
//! Move one of the two voices the other way; if the doubling is meant, declare it with
//! `doubles`, or copy the bar.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II, the four rules of motion"),
        source::LEHMANN.at("lesson I"),
        source::GROVE.at("Strict Counterpoint"),
        source::FUX_FIGURES.at("none in 115 figures"),
        source::BACH_CHORALES.at("2 inside phrases"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between any two voices, from unison, octave or fifteenth to an octave or fifteenth",
    settings: &[fault(Style::Free, "every treatise forbids it")],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if step.consecutive() != Some(Consecutive::Same(Family::Octave))
        || step.step.keeps_classes()
        || step.is_in_unison_after()
        || step
            .sounding
            .is_in_octave_passage(if found.style() == Style::Free { 2 } else { 3 })
    {
        return;
    }
    found.pair(&ORDINARY, step, || {
        format!(
            "Parallel octaves: {}. Move one voice the other way.",
            step.story()
        )
    });
}
