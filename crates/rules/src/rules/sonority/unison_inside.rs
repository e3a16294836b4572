//! Two voices meet in a unison on a downbeat inside the piece.
//!
//! Why: for that moment one voice is missing, where it is heard most.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | C5 | A4 | G4 | C5 |
//! //       ^^ unison inside: S and B
//! B | C4 | A4 | B4 | C5 |
//! ```
//!
//! # Passes
//!
//! At the beginning and at the end:
//!
//! ```voices
//! style species-1
//!
//! S | D4 | F4 | E4 | D4 |
//! B | D4 | D4 | C4 | D4 |
//! ```
//!
//! # Does not apply
//!
//! Off the downbeat in the second species and after, and in chorales and motets:
//!
//! ```voices
//! style chorale
//!
//! S | G4 | E4 | F4 |
//! B | C4 | E4 | D4 |
//! ```
//!
//! # What to do
//!
//! Let one of the two take a third, a sixth or an octave, or meet off the beat.
//!
//! The strict French school forbids unisons off the beat as well; Grove, Lehmann and the Open
//! Music Theory let them pass.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &MORE_PARTS, &OFF_BEAT],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lessons I and II"),
        source::GROVE.at("Strict Counterpoint"),
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES.at("none on a downbeat inside; 31 off it"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in two parts, on a downbeat between the first note and the last",
    settings: &[
        allow(Style::Free, "voices meet freely"),
        fault(Style::Species1, "only at the ends (Lehmann, lesson I)"),
        weakness(Style::Species4, "a tie may bring it about"),
    ],
};

static MORE_PARTS: Case = Case {
    name: "more-parts",
    when: "the same in three parts or more",
    settings: &[
        allow(Style::Free, "voices meet freely"),
        weakness(Style::Species1, "lighter where others sound on"),
    ],
};

static OFF_BEAT: Case = Case {
    name: "off-beat",
    when: "off the downbeat, in two parts",
    settings: &[
        allow(Style::Free, "voices meet freely"),
        fault(
            Style::Species1,
            "only at the ends, whatever the bars (Lehmann, lesson I)",
        ),
        allow(
            Style::Species2,
            "31 in Fux's figures; the strict French school alone forbids it",
        ),
        allow(Style::Species3, "as in the second species"),
        allow(Style::Species4, "where the tie ends"),
        allow(Style::Species5, "as in the second species"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let held = step.is_in_unison_before() && !step.moves();
    if !step.is_in_unison_after() || held || step.is_at_an_end() {
        return;
    }
    let more = step.sounding.piece.voices() >= 3;
    let case = match (step.is_on_downbeat(), more) {
        (true, false) => &ORDINARY,
        (true, true) => &MORE_PARTS,
        (false, false) => &OFF_BEAT,
        (false, true) => return,
    };
    found.pair(case, step, || {
        format!(
            "Unison inside: {} meet on {}. Let one of them take another note.",
            step.names(),
            step.pitch_after(step.pair.upper)
        )
    });
}
