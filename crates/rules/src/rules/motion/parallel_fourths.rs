//! Two voices, one of them the lowest, move in parallel perfect fourths.
//!
//! Why: a fourth over the bass is a dissonance; two in a row cannot both be treated as one, and
//! they sound as bare as fifths.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! B | G4 A4 |
//! //     ^^ parallel fourths: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C5 B4 |
//! B | G4 G4 |
//! ```
//!
//! # Does not apply
//!
//! Between upper voices over a bass in sixths or thirds with them:
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! A | G4 A4 |
//! B | E4 F4 |
//! ```
//!
//! # What to do
//!
//! Put a third or a fifth in the place of one fourth, or another voice below both.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &OFF_BEAT],
    numbers: &[],
    sources: &[
        source::PROUT_HARMONY.at("§ 106 (heading)"),
        source::NAVY.at("lesson 6"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the lower of the two lowest of all before and after",
    settings: &[
        weakness(Style::Free, "lighter among instruments"),
        fault(Style::Chorale, "forbidden with the bass (Prout)"),
        fault(Style::Motet, "a fourth over the bass is dissonant"),
        fault(Style::Species1, "a fourth over the bass is dissonant"),
    ],
};

static OFF_BEAT: Case = Case {
    name: "off-beat",
    when: "the same where an ornament may make one of the fourths",
    settings: &[allow(
        Style::Free,
        "ornaments are judged as dissonances, not as a succession of chords",
    )],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.goes_in_perfect_fourths() || !step.stays_with_bass() {
        return;
    }
    let case = if step.may_be_ornament() {
        &OFF_BEAT
    } else {
        &ORDINARY
    };
    found.pair(case, step, || {
        format!(
            "Parallel fourths with the bass: {}. Let one of them be a third or a fifth.",
            step.story()
        )
    });
}
