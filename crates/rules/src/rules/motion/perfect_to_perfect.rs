//! Two voices go from one kind of perfect interval straight to another.
//!
//! Why: two bare sounds in a row, even where the voices move against each other.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | D5 E5 |
//! //     ^^ perfect to perfect (weakness): S and B
//! B | G4 E4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | D5 E5 |
//! B | G4 C4 |
//! ```
//!
//! # Does not apply
//!
//! Where one voice stays, and outside the first species:
//!
//! ```voices
//! style species-1
//!
//! S | D5 G5 |
//! B | G4 G4 |
//! ```
//!
//! # What to do
//!
//! Put a third or a sixth in the place of one of the two.
//!
//! Lehmann lists it among the faults; the Open Music Theory allows it, and Fux has it.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I, Fig. 12"),
        source::OPEN_MUSIC_THEORY.looser("allowed"),
        source::FUX_FIGURES.looser("it occurs"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a fifth to an octave or back by contrary motion, in two parts, before the last note",
    settings: &[
        allow(Style::Free, "allowed (Open Music Theory)"),
        weakness(Style::Species1, "listed as bad (Lehmann, Fig. 12)"),
        allow(Style::Species2, "allowed (Open Music Theory)"),
        allow(Style::Species3, "allowed (Open Music Theory)"),
        allow(Style::Species4, "allowed (Open Music Theory)"),
        allow(Style::Species5, "allowed (Open Music Theory)"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.changes_perfect_family() || step.sounding.piece.voices() != 2 {
        return;
    }
    found.pair(&ORDINARY, step, || {
        format!(
            "Perfect to perfect: {}. Put a third or a sixth in the place of one of them.",
            step.story()
        )
    });
}
