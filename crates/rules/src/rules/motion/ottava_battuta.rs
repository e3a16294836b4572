//! An octave is beaten: the upper voice falls a step, the lower leaps up to it.
//!
//! Why: two voices that run together into an octave on a strong beat make it sound like a blow
//! (`ottava battuta`), and empty after what went before.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | A5 | G5 | E5 |
//! //       ^^ ottava battuta (weakness): S and B
//! B | C4 | G4 | C5 |
//! ```
//!
//! # Passes
//!
//! The lower voice moves by step:
//!
//! ```voices
//! style species-1
//!
//! S | E5 | D5 | C5 |
//! B | C4 | B3 | C4 |
//! ```
//!
//! # Does not apply
//!
//! In four parts, into the last bar, and in a motet over a bass that rises a fourth:
//!
//! ```voices
//! style motet
//!
//! S | E5 | D5 |
//! A | G4 | F4 |
//! T | C4 | A3 |
//! B | C3 | D3 |
//! ```
//!
//! ```voices
//! style motet
//!
//! S | E5 | D5 | C5 | B4 |
//! T | G4 | B4 | E4 | G4 |
//! B | C4 | G3 | C4 | G3 |
//! ```
//!
//! # What to do
//!
//! Let the lower voice step to the octave, or another interval take its place.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &FOURTH],
    numbers: &[],
    sources: &[
        source::GROVE.at("Strict Counterpoint, second order"),
        source::FUX.at("Book II, from memory"),
        source::FUX_FIGURES.at("none in 115 figures"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "contrary motion into an octave on a downbeat, the upper voice falling a step, the lower rising by a leap, in up to three parts, before the last bar",
    settings: &[
        allow(Style::Free, "an old scruple"),
        weakness(Style::Motet, "warned of in few parts (Grove)"),
        weakness(Style::Species1, "warned of in few parts (Grove)"),
    ],
};

static FOURTH: Case = Case {
    name: "fourth",
    when: "the same, the lowest voice rising a fourth, as at a cadence",
    settings: &[
        allow(Style::Free, "an old scruple"),
        allow(
            Style::Motet,
            "nine places in 314 pieces of the time, against one of any other leap",
        ),
        weakness(Style::Species1, "none in 115 figures of Fux"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.closes_on_octave_by_leap()
        || step.sounding.parts() >= 4
        || !step.is_on_downbeat()
        || step.is_in_last_bar()
    {
        return;
    }
    let fourth = step.size_of_move(step.foot()) == Some(3) && step.is_with_bass() != Some(false);
    let case = if fourth { &FOURTH } else { &ORDINARY };
    found.pair(case, step, || {
        format!(
            "Ottava battuta: {}, running together into an octave on the downbeat. Let the lower one step.",
            step.story()
        )
    });
}
