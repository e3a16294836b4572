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
//! Between beats, where ornaments meet, and where a note is held or passes by step:
//!
//! ```voices
//! style chorale
//!
//! S | F5 E.D C5 |
//! B | D4 F.E A4 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! T | D4 -  C4 |
//! B | F3 E3 D3 |
//! ```
//!
//! # What to do
//!
//! Resolve the first one before the next.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&SEVENTHS, &SECONDS, &FIGURED],
    numbers: &[],
    sources: &[
        source::PROUT_HARMONY.at("§§ 107-108 (headings)"),
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

static FIGURED: Case = Case {
    name: "figured",
    when: "either, where an ornament may make one of them, or a note is held, struck again or passing",
    settings: &[allow(Style::Free, "each dissonance is judged by itself")],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let case = match step.parallel_class() {
        Some(1) => &SECONDS,
        Some(6) => &SEVENTHS,
        _ => return,
    };
    let case = if step.may_be_ornament() || step.is_explained() {
        &FIGURED
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
