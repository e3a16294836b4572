//! A suspension only delays consecutive octaves, or in two parts fifths.
//!
//! Why: take the suspension away, and the two voices move in octaves.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | E5 D5 -.C5 B4 |
//! //          ^^ delayed consecutives: S and B
//! A | G4 G4 G4 G4 |
//! B | C4 D4 C4 G3 |
//! ```
//!
//! In two parts fifths are a weakness:
//!
//! ```voices
//! style motet
//!
//! S | A4 B4 -.A4 A4 |
//! //          ^^ delayed consecutives (weakness): S and B
//! B | F4 E4 D4   F4 |
//! ```
//!
//! So it is with every 9-8 that follows an octave in the fourth species:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _  A4 | - G4 |
//! //            ^^ delayed consecutives: S and C
//! C | A3 -  | G3 - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | E5 D5 -.C5 B4 |
//! A | G4 G4 G4 G4 |
//! B | C4 B3 A3 G3 |
//! ```
//!
//! # Does not apply
//!
//! Fifths in three parts and more:
//!
//! ```voices
//! style motet
//!
//! S | A4 B4 -.A4 A4 |
//! A | C4 G4 F4   F4 |
//! B | F3 E3 D3   F3 |
//! ```
//!
//! # What to do
//!
//! Prepare the suspension in another interval.
//!
//! Lehmann lets the suspension save fifths, not octaves; the Open Music Theory forbids two 6-5 in
//! a row as well.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&OCTAVES, &FIFTHS, &FIFTHS_MORE],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson XVII"),
        source::OPEN_MUSIC_THEORY
            .at("fourth species")
            .stricter("no two 6-5 in a row either"),
    ],
};

static OCTAVES: Case = Case {
    name: "octaves",
    when: "a note held over a stronger beat resolves down by step into an octave or unison, from one right before the other voice moved the same way",
    settings: &[
        weakness(Style::Free, "as in strict counterpoint, more lightly"),
        fault(
            Style::Chorale,
            "the suspension does not save octaves (Lehmann)",
        ),
        fault(
            Style::Motet,
            "the suspension does not save octaves (Lehmann)",
        ),
        allow(Style::Species1, "without suspensions"),
        fault(
            Style::Species4,
            "the suspension does not save octaves (Lehmann)",
        ),
        weakness(
            Style::Species5,
            "as in the fourth species, more lightly in florid",
        ),
    ],
};

static FIFTHS: Case = Case {
    name: "fifths",
    when: "the same with fifths, in two parts",
    settings: &[
        weakness(Style::Free, "saved in three parts and more (Lehmann)"),
        allow(Style::Species1, "without suspensions"),
        weakness(Style::Species4, "saved in three parts and more (Lehmann)"),
        weakness(Style::Species5, "saved in three parts and more (Lehmann)"),
    ],
};

static FIFTHS_MORE: Case = Case {
    name: "fifths-in-more-parts",
    when: "the same with fifths, in three parts or more",
    settings: &[allow(
        Style::Free,
        "the suspension saves them (Lehmann, lesson XVII)",
    )],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(family) = step.sounding.family_of(step.pair) else {
        return;
    };
    let Some(delayed) = step.over_suspension() else {
        return;
    };
    if delayed.same_perfect().is_none() {
        return;
    }
    let case = match family {
        Family::Octave => &OCTAVES,
        Family::Fifth if step.sounding.parts() >= 3 => &FIFTHS_MORE,
        Family::Fifth => &FIFTHS,
    };
    found.succession(case, &delayed, || {
        let noun = delayed.noun();
        format!(
            "Consecutive {noun} that a suspension delays: {}. Prepare the suspension in another interval.",
            delayed.story()
        )
    });
}
