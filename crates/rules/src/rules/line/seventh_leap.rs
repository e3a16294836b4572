//! A voice leaps a seventh.
//!
//! Why: it is a step spoilt by an octave; singers miss it, and the line breaks.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C4 Bb4 A4 |
//! A | A3 D4  F4 |
//! //     ^^ seventh leap: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C4 A4 Bb4 |
//! ```
//!
//! # Does not apply
//!
//! In the bass a step up may be taken an octave lower, in open score writing:
//!
//! ```voices
//! S | A4 G4 |
//! B | F3 G2 |
//! ```
//!
//! Inside what may well be one chord:
//!
//! ```voices
//! style chorale
//!
//! S | G4 F5 |
//! A | D4 D4 |
//! B | B2 B2 |
//! ```
//!
//! # What to do
//!
//! Move by step in the same octave, take another interval, or divide the leap.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY, &BASS, &DISPLACED],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I"),
        source::BACH_CHORALES
            .at("43 in the bass, 3 or 4 in each other voice, of some 55,000 intervals"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a major or minor seventh, not inside one chord",
    settings: &[
        weakness(
            Style::Free,
            "instruments take it more lightly (common practice)",
        ),
        fault(Style::Chorale, "3 or 4 in each upper voice of 370 chorales"),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

static BASS: Case = Case {
    name: "bass",
    when: "in the bass, rising",
    settings: &[
        weakness(
            Style::Free,
            "instruments take it more lightly (common practice)",
        ),
        weakness(Style::Chorale, "43 in the basses of 370 chorales"),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

static DISPLACED: Case = Case {
    name: "bass-step-displaced",
    when: "in the bass, falling: a step up, taken an octave lower",
    settings: &[
        allow(Style::Free, "the step is heard (common practice)"),
        allow(Style::Chorale, "the step is heard (common practice)"),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    for step in line.moves {
        let one_chord = || {
            let there = line.sounding_at(step);
            match found.style() {
                Style::Free => there.is_some_and(|s| s.keeps_chord_under_leap(2)),
                Style::Chorale => there.is_some_and(|s| s.keeps_chord_under_leap(3)),
                _ => false,
            }
        };
        let plain = step.is_plain();
        if line.is_given() || step.size() != 6 || !plain || one_chord() {
            continue;
        }
        let case = match (line.is_bass(), step.rises()) {
            (false, _) => &ORDINARY,
            (true, true) => &BASS,
            (true, false) => &DISPLACED,
        };
        found.line(case, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Seventh leap: {} goes {} a {} from {from} to {to}. Divide the leap, or take another interval.",
                line.piece.name(line.voice),
                step.way(),
                step.interval.name()
            )
        });
    }
}
