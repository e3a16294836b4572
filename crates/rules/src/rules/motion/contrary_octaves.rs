//! Two voices move in contrary motion from one octave or unison to another.
//!
//! Why: the same note twice in both voices is heard as one voice, whichever way it is reached.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C5 G5 |
//! B | C4 G3 |
//! //     ^^ contrary octaves: S and B
//! ```
//!
//! An octave that closes to a unison counts too:
//!
//! ```voices
//! style chorale
//!
//! S | C5 G4 |
//! B | C4 G4 |
//! //     ^^ contrary octaves: S and B
//! ```
//!
//! Into the last chord it is a weakness:
//!
//! ```voices
//! style chorale
//! metre 2/4
//!
//! S | G4 C5 ||
//! B | G3 C3 ||
//! //     ^^ contrary octaves (weakness): S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C5 B4 |
//! B | C4 G3 |
//! ```
//!
//! # Does not apply
//!
//! One voice only changes the octave:
//!
//! ```voices
//! S | C5 C5 |
//! B | C4 C3 |
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
        source::BACH_CHORALES.at("8, none of them between the outer voices"),
    ],
};

static OUTER: Case = Case {
    name: "",
    when: "between the outer voices, in up to four parts",
    settings: &[fault(
        Style::Free,
        "forbidden between the outer voices (Lehmann, lesson I; none in 370 chorales)",
    )],
};

static INNER: Case = Case {
    name: "inner",
    when: "where an inner voice takes part, in up to four parts",
    settings: &[weakness(Style::Free, "8 in 370 chorales")],
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
    if step.consecutive() != Some(Consecutive::Contrary(Family::Octave))
        || step.step.keeps_classes()
        || step.parts() >= 5
    {
        return;
    }
    let case = step.close_outer_or_inner([&CLOSE, &OUTER, &INNER]);
    found.pair(case, step, || {
        format!(
            "Contrary octaves: {}. Let one voice reach a third or a sixth instead.",
            step.story()
        )
    });
}
