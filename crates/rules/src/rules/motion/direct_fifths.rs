//! Two voices reach a perfect fifth in similar motion.
//!
//! Why: a fifth that both voices fall into together sounds bare, most of all between the outer
//! voices and when the upper one leaps. A step in the upper voice covers it.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | E4 A |
//! B | C4 D |
//! //     ^ direct fifths: S and B
//! ```
//!
//! In two strict parts a step does not help:
//!
//! ```voices
//! style species-1
//!
//! S | B4 A |
//! B | G3 D |
//! //     ^ direct fifths: S and B
//! ```
//!
//! In three parts, between voices that are not both outer, a leap in the upper one is a weakness:
//!
//! ```voices
//! style chorale
//!
//! S | E4 A |
//! A | C4 D |
//! B | C3 B2 |
//! //     ^ direct fifths (weakness): S and A
//! ```
//!
//! Where the upper voice leaps from an ornament between beats, it is a weakness:
//!
//! ```voices
//! style chorale
//!
//! S | D5.Eb5 C5 |
//! //         ^^ direct fifths (weakness): S and B
//! A | F4     F4 |
//! T | Bb3    A3 |
//! B | Bb3    F3 |
//! ```
//!
//! # Passes
//!
//! The upper voice moves by step:
//!
//! ```voices
//! style chorale
//!
//! S | B4 A |
//! B | G3 D |
//! ```
//!
//! # Does not apply
//!
//! In four parts, away from the outer voices:
//!
//! ```voices
//! style chorale
//!
//! S | C5 F5 |
//! A | E4 A4 |
//! T | C4 D4 |
//! B | F3 D3 |
//! ```
//!
//! Nor where the chord only changes its position, whatever passes between the beats:
//!
//! ```voices
//! style chorale
//!
//! S | D5     A4  |
//! A | A4     F#4 |
//! T | D4     D4  |
//! B | F#3.E3 D3  |
//! ```
//!
//! Nor where a voice lies above the upper of the two, whatever its place in the score:
//!
//! ```voices
//! style motet
//!
//! S | A3 D4 |
//! A | A4 G4 |
//! T | C4 B3 |
//! B | F3 G3 |
//! ```
//!
//! Two voices are not two parts while a third ends with the note before:
//!
//! ```voices
//! style motet
//!
//! S | E4 D4 |
//! A | C4 G3 |
//! B | C3 _  |
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
        source::OPEN_MUSIC_THEORY.looser("any direct fifth with a step in the upper voice"),
        source::LEHMANN
            .at("lesson XI")
            .stricter("in three parts all but the dominant and tonic"),
        source::FUX_FIGURES
            .at("none in 44 in two parts; 38 in 43 in three parts, 36 with an upper step"),
        source::BACH_CHORALES.at("outer voices: 448 with an upper step, 39 with a leap"),
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
            "39 with a leap in 370 chorales, against 448 with a step",
        ),
        weakness(
            Style::Motet,
            "lighter in many voices (Jeppesen, from memory)",
        ),
        allow(
            Style::Species1,
            "four parts are free of it (Fux's figures hold 83 in 29)",
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
        weakness(
            Style::Species1,
            "in 43 figures in three parts, Fux has two without an upper step",
        ),
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
    if !step.is_direct(Family::Fifth) {
        return;
    }
    let strict = found.style().is_species() || found.style() == Style::Motet;
    if !strict && step.only_changes_position() {
        return;
    }
    let helps = !(strict && step.parts() <= 2);
    let case = match step.direct() {
        Direct::TwoParts => &TWO_PARTS,
        Direct::TwoPartsStep if found.style() == Style::Motet && step.is_horn_fifth() => return,
        Direct::TwoPartsStep => &TWO_PARTS_STEP,
        Direct::ThreeOuter | Direct::Outer if !strict && step.leaves_ornament() => &ORNAMENT,
        Direct::ThreeOuter => &THREE_OUTER,
        Direct::ThreeInner => &THREE_INNER,
        Direct::Outer => &OUTER,
        Direct::Covered => return,
    };
    found.pair(case, step, || {
        format!("Direct fifths: {}", step.direct_story(helps))
    });
}
