//! A voice moves by a chromatic semitone.
//!
//! Why: in strict and 16th-century lines every step is diatonic; the chromatic semitone belongs to
//! another style.
//!
//! # Fails
//!
//! ```voices
//! style motet
//!
//! S | F4 F#4 G4 |
//! //     ^^^ chromatic semitone: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//!
//! S | E4 F#4 G4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | F4 F#4 G4 |
//! ```
//!
//! # What to do
//!
//! Go to the next note name, or leave out the accidental.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY, &MANY_PARTS],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I"),
        source::GROVE.at("Strict Counterpoint"),
        source::BACH_CHORALES
            .at("236 in the bass, 64 tenor, 69 alto, 4 soprano")
            .looser("free in the chorale"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between successive notes of one letter",
    settings: &[
        allow(Style::Free, "free in tonal music; 373 in 370 chorales"),
        fault(Style::Motet, "the style is diatonic"),
        fault(
            Style::Species1,
            "all progressions are diatonic (Lehmann, lesson I)",
        ),
    ],
};

static MANY_PARTS: Case = Case {
    name: "many-parts",
    when: "in strict counterpoint in three or more parts",
    settings: &[
        allow(Style::Free, "strict counterpoint only"),
        weakness(
            Style::Species1,
            "three and four parts are less strict in the line (Fux's figures)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    for step in line.moves {
        if line.is_given() || step.size() != 0 || step.is_repeat() {
            continue;
        }
        let many = found.style().is_species() && line.parts_at(step) >= 3;
        let case = if many { &MANY_PARTS } else { &ORDINARY };
        found.line(case, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Chromatic semitone: {} goes from {from} to {to}. Step to another letter, or leave the sign away.",
                line.piece.name(line.voice)
            )
        });
    }
}
