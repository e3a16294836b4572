//! An augmented sixth does not open to the octave.
//!
//! Why: both its notes were altered to lead, one down and one up, to the same note; anything else wastes them.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key A minor
//! metre 4/4
//!
//! S | E5 - D#5 - | B4 - - - |
//! //               ^^ augmented sixth: S and B
//! A | C5 - A4 - | G#4 - - - |
//! T | E4 - A3 - | B3 - - - |
//! B | A3 - F3 - | E3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key A minor
//! metre 4/4
//!
//! S | E5 - D#5 - | E5 - - - |
//! A | C5 - A4 - | B4 - - - |
//! T | E4 - A3 - | G#3 - - - |
//! B | A3 - F3 - | E3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where the raised note passes down by a semitone:
//!
//! ```voices
//! style chorale
//! key A minor
//! metre 4/4
//!
//! S | E5 - D#5 - | D5 - - - |
//! A | C5 - A4 - | G#4 - - - |
//! T | E4 - A3 - | B3 - - - |
//! B | A3 - F3 - | E3 - - - |
//! ```
//!
//! # What to do
//!
//! Let the upper note rise a semitone and the lower one fall a semitone.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::COLAROS],
};

static ORDINARY: Case = Case {
    name: "",
    when: "two voices leave an augmented sixth, and one of them goes elsewhere than out by a semitone; not where the upper one falls by a chromatic semitone, nor where an ornament between beats may make it",
    settings: &[
        weakness(Style::Free, "instruments change their register"),
        fault(Style::Chorale, "both notes lead (Colaros)"),
        allow(Style::Motet, "a sixth is never augmented by intent"),
        allow(Style::Species1, "an augmented interval is told for itself"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.leaves_augmented_sixth() || step.opens_augmented_sixth_here() || step.may_be_ornament()
    {
        return;
    }
    found.pair(&ORDINARY, step, || {
        format!(
            "Augmented sixth: {}. Let the upper note rise a semitone and the lower one fall a semitone, to the octave.",
            step.story()
        )
    });
}
