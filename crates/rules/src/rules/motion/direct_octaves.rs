//! Two voices reach an octave in similar motion.
//!
//! Why: an octave that both voices fall into together sounds bare, most of all between the outer
//! voices and when the upper one leaps. A step in the upper voice covers it.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | A4 D5 |
//! B | C4 D4 |
//! //     ^^ direct octaves: S and B
//! ```
//!
//! In two strict parts a step does not help:
//!
//! ```voices
//! style species-1
//!
//! S | B4 C5 |
//! B | G3 C4 |
//! //     ^^ direct octaves: S and B
//! ```
//!
//! Where the upper voice leaps from an ornament between beats, it is a weakness:
//!
//! ```voices
//! style chorale
//!
//! S | E4.F4 D4 |
//! //        ^^ direct octaves (weakness): S and B
//! A | C#4   A3 |
//! T | A3    F3 |
//! B | A3    D3 |
//! ```
//!
//! # Passes
//!
//! The upper voice moves by step, as at every cadence:
//!
//! ```voices
//! style chorale
//!
//! S | B4 C5 |
//! B | G3 C4 |
//! ```
//!
//! # Does not apply
//!
//! In four parts, away from the outer voices:
//!
//! ```voices
//! style chorale
//!
//! S | D5 G5 |
//! A | A4 E5 |
//! T | F4 C4 |
//! B | D3 C3 |
//! ```
//!
//! # What to do
//!
//! Let the upper voice step, or one of the two stay or move the other way.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[
        &TWO_PARTS,
        &TWO_PARTS_STEP,
        &OUTER,
        &THREE_OUTER,
        &THREE_INNER,
        &ORNAMENT,
    ],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II, the four rules of motion"),
        source::GROVE.at("Hidden Fifths and Octaves"),
        source::KOSTKA_PAYNE.at("ch. 5"),
        source::OPEN_MUSIC_THEORY.looser("any direct octave with a step in the upper voice"),
        source::LEHMANN
            .at("lesson XI")
            .stricter("in three parts all but the dominant and tonic"),
        source::ARTHUR_HURON.at("only a step in the top voice helps"),
        source::BACH_CHORALES.at("outer voices: 703 with an upper step, 36 with a leap"),
    ],
};

static TWO_PARTS: Case = Case {
    name: "two-parts",
    when: "in two parts, the upper one leaping",
    settings: &[fault(
        Style::Free,
        "only a step in the upper voice covers it (Grove; Kostka & Payne)",
    )],
};

static TWO_PARTS_STEP: Case = Case {
    name: "two-parts-step",
    when: "in two parts, the upper one moving by step",
    settings: &[
        allow(
            Style::Free,
            "a step in the upper voice covers it (Open Music Theory)",
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

static OUTER: Case = Case {
    name: "outer",
    when: "in four or more parts, between the outer voices, the upper one leaping",
    settings: &[
        fault(
            Style::Free,
            "36 with a leap in 370 chorales, against 703 with a step",
        ),
        weakness(
            Style::Motet,
            "lighter in many voices (Jeppesen, from memory)",
        ),
        allow(
            Style::Species1,
            "four parts are free of it, as of direct fifths",
        ),
    ],
};

static THREE_OUTER: Case = Case {
    name: "three-parts-outer",
    when: "in three parts, between the outer voices, the upper one leaping",
    settings: &[
        fault(Style::Free, "as in four parts"),
        weakness(
            Style::Motet,
            "lighter in three parts (Jeppesen, from memory)",
        ),
        weakness(Style::Species1, "as for direct fifths"),
    ],
};

static THREE_INNER: Case = Case {
    name: "three-parts",
    when: "in three parts, between voices not both outer, the upper one leaping",
    settings: &[weakness(
        Style::Free,
        "slightly censured (Grove, Hidden Fifths and Octaves)",
    )],
};

static ORNAMENT: Case = Case {
    name: "ornament",
    when: "between the outer voices, the upper one leaping, where one of the two leaves an ornament between beats that it reached by step",
    settings: &[
        weakness(
            Style::Free,
            "as for parallels that an unaccented ornament makes (Dahn 2016)",
        ),
        allow(
            Style::Motet,
            "ornaments excuse nothing: told as without them",
        ),
        allow(
            Style::Species1,
            "ornaments excuse nothing: told as without them",
        ),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.is_direct(Family::Octave) || step.is_in_unison_after() {
        return;
    }
    let strict = found.style().is_species() || found.style() == Style::Motet;
    if !strict && step.only_changes_position() {
        return;
    }
    let helps = !(strict && step.parts() <= 2);
    let case = match step.direct() {
        Direct::TwoParts => &TWO_PARTS,
        Direct::TwoPartsStep => &TWO_PARTS_STEP,
        Direct::ThreeOuter | Direct::Outer if !strict && step.leaves_ornament() => &ORNAMENT,
        Direct::ThreeOuter => &THREE_OUTER,
        Direct::ThreeInner => &THREE_INNER,
        Direct::Outer => &OUTER,
        Direct::Covered => return,
    };
    found.pair(case, step, || {
        format!("Direct octaves: {}", step.direct_story(helps))
    });
}
