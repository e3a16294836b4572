//! A voice leaps a sixth that the style does not take.
//!
//! Why: strict lines know one sixth only, the rising minor one; the others break the line.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | D4 B4 A4 |
//! //     ^^ sixth leap: S
//! ```
//!
//! ```voices
//! style species-2
//!
//! S | C5 E4 F4 |
//! //     ^^ sixth leap (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | E4 C5 B4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | D4 B4 A4 |
//! ```
//!
//! # What to do
//!
//! Divide the leap, or take a fifth or an octave.
//!
//! # Who holds what
//!
//! The treatise forbids the falling minor sixth, and its figures 41, 42, 57 and 75 have it:
//! hence a fault in first species, a weakness in the others (the case `minor-down`).

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&MAJOR_UP, &MAJOR_DOWN, &MINOR_DOWN, &MANY_PARTS],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II: only the minor sixth, and only upward"),
        source::GROVE.at("Strict Counterpoint, second order"),
        source::FUX_FIGURES
            .at("four falling minor sixths in two parts")
            .looser("the falling minor sixth occurs"),
        source::CHORALES_READ
            .at("minor sixths rise 42 times and fall 57; major ones 53 and 12")
            .looser("the minor sixth falls as freely as it rises"),
    ],
};

static MAJOR_UP: Case = Case {
    name: "major-up",
    when: "a rising major sixth",
    settings: &[
        allow(Style::Free, "common in free lines"),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(Style::Species1, "not among the permitted intervals (Fux)"),
    ],
};

static MAJOR_DOWN: Case = Case {
    name: "major-down",
    when: "a falling major sixth",
    settings: &[
        allow(Style::Free, "common in free lines"),
        weakness(
            Style::Chorale,
            "awkward to sing (common practice); 12 fall, 53 rise (156 chorales)",
        ),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(Style::Species1, "not among the permitted intervals (Fux)"),
    ],
};

static MINOR_DOWN: Case = Case {
    name: "minor-down",
    when: "a falling minor sixth",
    settings: &[
        allow(Style::Free, "common in free lines"),
        allow(
            Style::Chorale,
            "57 fall, and 42 rise, as every style lets them (156 chorales)",
        ),
        fault(Style::Motet, "only upward in the style"),
        fault(Style::Species1, "only upward (Fux)"),
        weakness(Style::Species2, "Fux takes it in figures 41 and 42"),
        weakness(Style::Species3, "Fux takes it in figure 57"),
        weakness(Style::Species4, "Fux takes it in figure 75"),
        weakness(Style::Species5, "as in the species before"),
    ],
};

static MANY_PARTS: Case = Case {
    name: "many-parts",
    when: "any of them in strict counterpoint in three or more parts",
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
        let plain = step.is_plain();
        if line.is_given() || step.size() != 5 || !plain {
            continue;
        }
        let case = match (step.interval.is_minor(), step.rises()) {
            (true, true) => continue,
            _ if found.style().is_species() && line.parts_at(step) >= 3 => &MANY_PARTS,
            (true, false) => &MINOR_DOWN,
            (false, true) => &MAJOR_UP,
            (false, false) => &MAJOR_DOWN,
        };
        found.line(case, line, step, || {
            let (from, to) = step.ends();
            let way = step.way();
            format!(
                "Sixth leap: {} goes {way} a {} from {from} to {to}. Divide the leap, or take a fifth or an octave.",
                line.piece.name(line.voice),
                step.interval.name()
            )
        });
    }
}
