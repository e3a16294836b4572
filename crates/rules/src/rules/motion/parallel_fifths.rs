//! Two voices move in parallel from one perfect fifth to another.
//!
//! Why: the two lines fuse into one, and the ear loses a voice.
//!
//! # Fails
//!
//! ```voices
//! S | D5 E |
//! B | G3 A |
//! //     ^ parallel fifths: S and B
//! ```
//!
//! A fifth to a twelfth in the same direction is no better:
//!
//! ```voices
//! S | G4 A5 |
//! B | C4 D4 |
//! //     ^^ parallel fifths: S and B
//! ```
//!
//! Off the beat, where a passing note or an anticipation may be the cause, it is a weakness:
//!
//! ```voices
//! style chorale
//!
//! S | C5 F5.E D |
//! B | C4 A3   G |
//! //          ^ parallel fifths (weakness): S and B
//! ```
//!
//! In a chorale the anticipation at a cadence over a passing inner voice is only remarked on:
//!
//! ```voices
//! style chorale
//!
//! S | E5 D5.C5 C5 |
//! //        ^^ parallel fifths (remark): S and A
//! A | G4 G4.F4 E4 |
//! T | C4 B3    C4 |
//! B | C3 G3    C3 |
//! ```
//!
//! # Passes
//!
//! The voices move against each other, or one of them stays:
//!
//! ```voices
//! S | D5 C |
//! B | G3 A |
//! ```
//!
//! ```voices
//! S | G4 G |
//! B | C4 C |
//! ```
//!
//! # Does not apply
//!
//! The phrase ends between the two fifths:
//!
//! ```voices
//! S | D5^ E |
//! B | G3  A |
//! ```
//!
//! Both voices only change the octave:
//!
//! ```voices
//! S | G4 G5 |
//! B | C4 C5 |
//! ```
//!
//! In free style the fifths of an augmented sixth that opens:
//!
//! ```voices
//! key C minor
//!
//! S | F#5 G5 |
//! A | C5  B4 |
//! T | Eb4 D4 |
//! B | Ab3 G3 |
//! ```
//!
//! # What to do
//!
//! Move one of the two voices the other way, or let one of them stay.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &OFF_BEAT, &ANTICIPATION, &AUGMENTED_SIXTH],
    numbers: &[],
    sources: &[
        source::FUX.at("Book II, the four rules of motion"),
        source::LEHMANN.at("lesson I"),
        source::GROVE.at("Strict Counterpoint"),
        source::FUX_FIGURES.at("none in 115 figures"),
        source::BACH_CHORALES.at("16, nine of them an anticipation at the cadence"),
        source::DAHN.looser("fifths that ornaments make are passed over"),
        source::COMMON_PRACTICE.looser("the fifths of an augmented sixth that opens"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between any two voices, compound fifths included",
    settings: &[fault(Style::Free, "every treatise forbids it")],
};

static OFF_BEAT: Case = Case {
    name: "off-beat",
    when: "a fifth begins between beats, and a voice steps into or out of it: an ornament may make it",
    settings: &[
        weakness(
            Style::Free,
            "an anticipation or an unaccented ornament may be the cause (Dahn 2016)",
        ),
        fault(
            Style::Motet,
            "the 16th century makes no exception for ornaments",
        ),
        fault(
            Style::Species1,
            "strict counterpoint makes no exception for ornaments",
        ),
    ],
};

static ANTICIPATION: Case = Case {
    name: "anticipation",
    when: "an upper voice anticipates by a step down the note it strikes next, over an inner voice that passes down, the lowest voice taking no part, over a dominant that goes to its tonic as far as the harmony is sure",
    settings: &[
        allow(Style::Free, "the figure is unobjectionable (Dahn 2016)"),
        remark(
            Style::Chorale,
            "nine of the 16 in 370 chorales; unobjectionable (Dahn 2016)",
        ),
        fault(
            Style::Motet,
            "the 16th century makes no exception for ornaments",
        ),
        fault(
            Style::Species1,
            "strict counterpoint makes no exception for ornaments",
        ),
    ],
};

static AUGMENTED_SIXTH: Case = Case {
    name: "augmented-sixth",
    when: "an augmented sixth with a fifth opens, both voices of the fifths falling a semitone, not both outer, to a dominant or a six-four on it as far as the harmony is sure",
    settings: &[
        allow(
            Style::Free,
            "the composers of the time let them stand (common practice)",
        ),
        fault(Style::Chorale, "every treatise forbids it"),
        fault(Style::Motet, "the style has no such chord"),
        fault(Style::Species1, "the style has no such chord"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if step.consecutive() != Some(Consecutive::Same(Family::Fifth)) || step.step.keeps_classes() {
        return;
    }
    let case = if step.is_anticipation_at_cadence() && step.may_be_over_dominant() {
        &ANTICIPATION
    } else if !step.is_outer() && step.opens_augmented_sixth() && step.may_reach_dominant() {
        &AUGMENTED_SIXTH
    } else if step.may_be_ornament() {
        &OFF_BEAT
    } else {
        &ORDINARY
    };
    let only_a_label = found.severity(case) == Some(Severity::Remark);
    found.pair(case, step, || {
        let help = if only_a_label {
            "An ornament makes them, and custom lets them stand."
        } else {
            "Move one voice the other way."
        };
        format!("Parallel fifths: {}. {help}", step.story())
    });
}
