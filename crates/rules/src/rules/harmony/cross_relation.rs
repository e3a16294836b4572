//! A note contradicts the form of it that another voice has just had.
//!
//! Why: F and F# belong to two scales; heard one after the other in two voices, neither voice explains the change.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key G major
//! metre 4/4
//!
//! S | A4 - A4 - |
//! A | F#4 - D4 - |
//! //        ^ cross relation (weakness): A and B
//! T | D4 - A3 - |
//! B | D3 - F3 - |
//! ```
//!
//! # Passes
//!
//! One voice takes both forms:
//!
//! ```voices
//! style chorale
//! key G major
//! metre 4/4
//!
//! S | A4 - A4 - |
//! A | F#4 - F4 - |
//! T | D4 - D4 - |
//! B | D3 - D3 - |
//! ```
//!
//! # Does not apply
//!
//! The melodic minor scale has one form up and another down:
//!
//! ```voices
//! style chorale
//! key A minor
//! metre 4/4
//!
//! S | B4 - G#4 - | A4 - A4 - |
//! B | E3 - E4 - | A3 G3 F3 - |
//! ```
//!
//! # What to do
//!
//! Let one voice take both forms, or keep to one of them.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &OUTER, &BETWEEN, &OUTER_BETWEEN],
    numbers: &[],
    sources: &[
        source::NAVY.at("chapter 17"),
        source::FEEZELL,
        source::GROVE.at("False Relation"),
        source::CHORALES_READ.at("24, none between the outer voices"),
        source::RENAISSANCE_WORKS
            .at("101 with nothing between, 325 with a note between")
            .looser("a note between excuses it"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "two forms of a letter in two voices, one straight after the other, neither an ornament nor a step and back between beats; not where one of the two has both, nor in a melodic minor line, a diminished seventh chord, or the Neapolitan before its dominant",
    settings: &[
        weakness(Style::Free, "handbooks warn of it (Feezell)"),
        fault(
            Style::Motet,
            "voices that sing without support miss the note",
        ),
        allow(Style::Species1, "its lines keep to the mode"),
    ],
};

static OUTER: Case = Case {
    name: "outer",
    when: "the same between the outer voices",
    settings: &[
        weakness(Style::Free, "handbooks warn of it (Feezell)"),
        fault(
            Style::Chorale,
            "plainest between the outer voices (Navy, chapter 17); none in 156 chorales",
        ),
        fault(
            Style::Motet,
            "voices that sing without support miss the note",
        ),
        allow(Style::Species1, "its lines keep to the mode"),
    ],
};

static BETWEEN: Case = Case {
    name: "between",
    when: "two forms with another note of the first voice between, within a beat",
    settings: &[
        weakness(Style::Free, "handbooks warn of it (Feezell)"),
        allow(
            Style::Motet,
            "325 times in 314 works, against 101 with nothing between",
        ),
        allow(Style::Species1, "its lines keep to the mode"),
    ],
};

static OUTER_BETWEEN: Case = Case {
    name: "outer-between",
    when: "the same between the outer voices",
    settings: &[
        weakness(Style::Free, "handbooks warn of it (Feezell)"),
        fault(
            Style::Chorale,
            "plainest between the outer voices (Navy, chapter 17); none in 156 chorales",
        ),
        allow(
            Style::Motet,
            "325 times in 314 works, against 101 with nothing between",
        ),
        allow(Style::Species1, "its lines keep to the mode"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(relation) = step.cross_relation() else {
        return;
    };
    if step.is_in_melodic_line(&relation)
        || step.is_in_diminished_seventh()
        || step.leaves_neapolitan()
    {
        return;
    }
    let case = match (relation.between, step.is_outer()) {
        (true, true) => &OUTER_BETWEEN,
        (true, false) => &BETWEEN,
        (false, true) => &OUTER,
        (false, false) => &ORDINARY,
    };
    found.pair(case, step, || {
        let piece = step.sounding.piece;
        let ((first, one), (second, other)) = (relation.first, relation.second);
        format!(
            "Cross relation: {} has {one}, then {} {other}. Let one voice take both, or keep to one of them.",
            piece.name(first),
            piece.name(second)
        )
    });
}
