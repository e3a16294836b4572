//! Two voices move together in unison.
//!
//! Why: while they do, one voice is missing.
//!
//! # Fails
//!
//! ```voices
//! S | C4 D |
//! B | C4 D |
//! //     ^ parallel unisons: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | C4 E |
//! B | C4 C |
//! ```
//!
//! # Does not apply
//!
//! The bar is copied on purpose:
//!
//! ```voices
//! metre 2/4
//!
//! S | C4 D | E F |
//! B | =S   | C4 D |
//! ```
//!
//! # What to do
//!
//! Move one of the two voices the other way; if the doubling is meant, copy the bar.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II, the four rules of motion"),
        source::LEHMANN.at("lesson I"),
        source::FUX_FIGURES.at("none in 115 figures"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between any two voices, arriving in the same pitch from a unison or octave",
    settings: &[fault(Style::Free, "every treatise forbids it")],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if step.consecutive() != Some(Consecutive::Same(Family::Octave))
        || step.step.keeps_classes()
        || !step.is_in_unison_after()
        || step
            .sounding
            .is_in_octave_passage(if found.style() == Style::Free { 2 } else { 3 })
    {
        return;
    }
    found.pair(&ORDINARY, step, || {
        format!(
            "Parallel unisons: {}. Move one voice the other way.",
            step.story()
        )
    });
}
