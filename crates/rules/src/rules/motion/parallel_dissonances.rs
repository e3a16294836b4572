//! Two voices move in parallel seconds, sevenths or ninths.
//!
//! Why: a dissonance followed by its like is not resolved, only handed on.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | B4 A4 |
//! //     ^^ parallel dissonances: S and B
//! B | C4 B3 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | D5 E5 |
//! //     ^^ parallel dissonances: S and B
//! B | C4 D4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | B4 A4 |
//! B | C4 C4 |
//! ```
//!
//! # Does not apply
//!
//! Between beats, where ornaments meet:
//!
//! ```voices
//! style chorale
//!
//! S | F5 E.D C5 |
//! B | D4 F.E A4 |
//! ```
//!
//! # What to do
//!
//! Resolve the first one before the next.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&SEVENTHS, &SECONDS, &OFF_BEAT],
    numbers: &[],
    sources: &[
        source::PROUT_HARMONY.at("§§ 107-108"),
        source::NAVY.at("lesson 6"),
    ],
};

static SEVENTHS: Case = Case {
    name: "sevenths",
    when: "sevenths, both voices moving",
    settings: &[
        weakness(Style::Free, "a row of seventh chords has them"),
        fault(Style::Chorale, "forbidden (Prout)"),
        fault(Style::Motet, "a dissonance must resolve"),
        fault(Style::Species1, "a dissonance must resolve"),
    ],
};

static SECONDS: Case = Case {
    name: "seconds",
    when: "seconds or ninths, both voices moving",
    settings: &[
        weakness(Style::Free, "lighter among instruments"),
        fault(Style::Chorale, "forbidden (Prout)"),
        fault(Style::Motet, "a dissonance must resolve"),
        fault(Style::Species1, "a dissonance must resolve"),
    ],
};

static OFF_BEAT: Case = Case {
    name: "off-beat",
    when: "either, where an ornament may make one of them",
    settings: &[allow(
        Style::Free,
        "ornaments are judged as dissonances, each by itself",
    )],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let case = match step.parallel_class() {
        Some(1) => &SECONDS,
        Some(6) => &SEVENTHS,
        _ => return,
    };
    let case = if step.may_be_ornament() {
        &OFF_BEAT
    } else {
        case
    };
    found.pair(case, step, || {
        let what = if step.parallel_class() == Some(6) {
            "sevenths"
        } else {
            "seconds or ninths"
        };
        format!(
            "Parallel {what}: {}. Resolve the first before the next.",
            step.story()
        )
    });
}
