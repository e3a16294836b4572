//! Two voices reach a unison in similar motion.
//!
//! Why: both run into one note, and a voice is lost on the way there as well as at the end.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | E4 G4 |
//! B | C4 G4 |
//! //     ^^ direct unisons: S and B
//! ```
//!
//! # Passes
//!
//! The voices meet from opposite sides:
//!
//! ```voices
//! style species-1
//!
//! S | E4 D |
//! B | C4 D |
//! ```
//!
//! # Does not apply
//!
//! In four strict parts, and in a chorale at a close: the upper of the two rises a step over a bass
//! that leaps up a fourth or fifth:
//!
//! ```voices
//! style species-1
//!
//! S | C5 B4 |
//! A | A4 D4 |
//! T | F4 D4 |
//! B | F3 G3 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | D5 E5 |
//! A | G4 G4 |
//! T | B3 C4 |
//! B | G3 C4 |
//! ```
//!
//! # What to do
//!
//! Let one of the two stay or move the other way.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&TWO_PARTS, &THREE_PARTS, &CLOSE, &MORE_PARTS],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II, the four rules of motion"),
        source::GROVE.at("Hidden Fifths and Octaves"),
        source::BACH_CHORALES
            .at("about three in a hundred bars")
            .looser("inner voices run into unisons freely"),
        source::CHORALES_READ.at(
            "into a unison with the bass the tenor goes 66 times in similar motion and 231 in contrary, as elsewhere; between upper voices 11 and 214",
        ),
    ],
};

static TWO_PARTS: Case = Case {
    name: "two-parts",
    when: "in two parts",
    settings: &[
        weakness(
            Style::Free,
            "the chorales have about three in a hundred bars",
        ),
        fault(
            Style::Motet,
            "two parts keep the cardinal rules of motion (Fux)",
        ),
        fault(
            Style::Species1,
            "to a perfect consonance only by contrary or oblique motion (Fux)",
        ),
    ],
};

static THREE_PARTS: Case = Case {
    name: "three-parts",
    when: "in three parts, the upper one leaping",
    settings: &[weakness(Style::Free, "as for direct fifths and octaves")],
};

static CLOSE: Case = Case {
    name: "close",
    when: "in three parts or more, the upper one rising by step over a bass that leaps up a fourth or a fifth",
    settings: &[
        allow(
            Style::Free,
            "the leading note at a close, as for direct octaves: 48 of the 66 with the bass in 156 chorales",
        ),
        weakness(Style::Motet, "as over any other bass"),
        allow(
            Style::Species1,
            "four parts are free of direct perfects; a step covers in three",
        ),
    ],
};

static MORE_PARTS: Case = Case {
    name: "more-parts",
    when: "in three parts with the upper one moving by step, and in four or more parts",
    settings: &[
        weakness(
            Style::Free,
            "the chorales have about three in a hundred bars",
        ),
        allow(
            Style::Species1,
            "four parts are free of direct perfects; a step covers in three",
        ),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.is_direct(Family::Octave) || !step.is_in_unison_after() {
        return;
    }
    let strict = found.style().is_species() || found.style() == Style::Motet;
    if !strict && step.only_changes_position() {
        return;
    }
    let case = match step.direct() {
        _ if step.closes_into_unison() => &CLOSE,
        Direct::TwoParts | Direct::TwoPartsStep => &TWO_PARTS,
        Direct::ThreeOuter | Direct::ThreeInner => &THREE_PARTS,
        Direct::Outer | Direct::Covered => &MORE_PARTS,
    };
    found.pair(case, step, || {
        format!(
            "Direct unisons: {}, both {}. Let one of them stay or move the other way.",
            step.story(),
            if step.rises(step.top()) { "up" } else { "down" }
        )
    });
}
