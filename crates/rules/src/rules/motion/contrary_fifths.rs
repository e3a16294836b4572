//! Two voices move in contrary motion from one perfect fifth to another.
//!
//! Why: a fifth that turns into a twelfth is still the same colour twice; the contrary motion
//! hides it from the eye more than from the ear.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | G4 D5 |
//! B | C4 G3 |
//! //     ^^ contrary fifths: S and B
//! ```
//!
//! Where an inner voice takes part it is a weakness:
//!
//! ```voices
//! style chorale
//!
//! S | E5 D5 |
//! A | G4 D5 |
//! B | C4 G3 |
//! //     ^^ contrary fifths (weakness): A and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | G4 B |
//! B | C4 G3 |
//! ```
//!
//! # Does not apply
//!
//! In five or more parts:
//!
//! ```voices
//! S | C5 B4 |
//! A | E4 G4 |
//! Q | C4 D4 |
//! T | G3 D4 |
//! B | C3 G2 |
//! ```
//!
//! # What to do
//!
//! Let one voice reach a third or a sixth instead.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&OUTER, &INNER, &CLOSE],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I, Fig. 12"),
        source::OPEN_MUSIC_THEORY.looser("only between the outer voices"),
        source::BACH_CHORALES.at("34, two of them between the outer voices"),
    ],
};

static OUTER: Case = Case {
    name: "",
    when: "between the outer voices, in up to four parts",
    settings: &[fault(
        Style::Free,
        "forbidden between the outer voices (Lehmann, lesson I; two in 370 chorales)",
    )],
};

static INNER: Case = Case {
    name: "inner",
    when: "where an inner voice takes part, in up to four parts",
    settings: &[weakness(Style::Free, "32 in 370 chorales")],
};

static CLOSE: Case = Case {
    name: "close",
    when: "into the last chord",
    settings: &[weakness(
        Style::Free,
        "tolerated at the close (Prout, from memory)",
    )],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if step.consecutive() != Some(Consecutive::Contrary(Family::Fifth))
        || step.step.keeps_classes()
        || step.parts() >= 5
    {
        return;
    }
    let case = step.close_outer_or_inner([&CLOSE, &OUTER, &INNER]);
    found.pair(case, step, || {
        format!(
            "Contrary fifths: {}. Let one voice reach a third or a sixth instead.",
            step.story()
        )
    });
}
