//! A voice leaps further than an octave.
//!
//! Why: no singer takes it cleanly, and the line falls apart into two registers.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C4 D5 C5 |
//! //     ^^ leap beyond octave: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C4 C5 B4 |
//! ```
//!
//! # Does not apply
//!
//! An instrument, or the bass, in open score writing:
//!
//! ```voices
//! voice V violin
//! voice C cello
//!
//! V | G3 D5 E5 |
//! C | C3 B2 C3 |
//! ```
//!
//! # What to do
//!
//! Bring one of the notes into the octave.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY, &BROAD],
    numbers: &[],
    sources: &[source::OPEN_MUSIC_THEORY, source::LEHMANN.at("lesson I")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a ninth or more between successive notes",
    settings: &[
        weakness(Style::Free, "singers avoid it (common practice)"),
        fault(
            Style::Chorale,
            "beyond what a choir sings (common practice)",
        ),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

static BROAD: Case = Case {
    name: "bass-or-instrument",
    when: "in the bass, or on an instrument",
    settings: &[
        allow(Style::Free, "instruments and basses have the room"),
        fault(
            Style::Chorale,
            "beyond what a choir sings (common practice)",
        ),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let broad = line.is_bass() || line.declared().is_some_and(|v| !v.kind.is_sung());
    let case = if broad { &BROAD } else { &ORDINARY };
    let plain = |step: &&LineMove| step.is_plain();
    for step in line.moves.iter().filter(plain) {
        if line.is_given() || step.size() <= 7 {
            continue;
        }
        found.line(case, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Leap beyond an octave: {} goes from {from} to {to}, {}. Bring one of the notes into the octave.",
                line.piece.name(line.voice),
                step.interval.with_article()
            )
        });
    }
}
