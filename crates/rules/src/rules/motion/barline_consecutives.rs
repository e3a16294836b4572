//! A perfect interval late in the bar comes again on the next downbeat.
//!
//! Why: one or two quick notes between do not hide the consecutives.
//!
//! # Fails
//!
//! ```voices
//! style species-3
//! voice S
//! voice C cantus
//!
//! S | F4 G4 A4 C5 | B4 A4 G4 A4 |
//! //                ^^ barline consecutives: S and C
//! C | D4 -  -  -  | E4 -  -  -  |
//! ```
//!
//! A fifth on the second beat is a weakness:
//!
//! ```voices
//! style species-3
//! voice S
//! voice C cantus
//!
//! S | F4 A4 D5 C5 | B4 A4 G4 A4 |
//! //                ^^ barline consecutives (weakness): S and C
//! C | D4 -  -  -  | E4 -  -  -  |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-3
//! voice S
//! voice C cantus
//!
//! S | D5 C5 A4 B4 | C5 B4 A4 G4 |
//! C | D4 -  -  -  | E4 -  -  -  |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | F4 G4 A4 C5 | B4 - - - |
//! B | D4 -  -  -  | E4 - - - |
//! ```
//!
//! # What to do
//!
//! Let the first or the second be a third or a sixth.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &SECOND_BEAT],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("third species"),
        source::LEHMANN.at("lesson IV, Fig. 47"),
        source::GROVE.at("Strict Counterpoint, third order"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a fifth in the second half of the bar, or an octave after its first beat, and the same on the next downbeat, both voices moved the same way",
    settings: &[
        allow(Style::Free, "a note between is enough"),
        allow(Style::Species1, "nothing stands between two downbeats"),
        fault(
            Style::Species3,
            "the third or fourth beat to the downbeat (Lehmann, lesson IV)",
        ),
    ],
};

static SECOND_BEAT: Case = Case {
    name: "second-beat",
    when: "a fifth in the first half of the bar, after its first beat",
    settings: &[
        allow(Style::Free, "a note between is enough"),
        allow(Style::Species1, "nothing stands between two downbeats"),
        weakness(
            Style::Species3,
            "further off than those that treatises forbid",
        ),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(bar) = step.from_late_in_bar() else {
        return;
    };
    let Some(family) = bar.same_perfect() else {
        return;
    };
    let case = if family == Family::Fifth && bar.starts_early_in_bar() {
        &SECOND_BEAT
    } else {
        &ORDINARY
    };
    // What is that far off is told from downbeat to downbeat where it stood on both.
    if case.name == SECOND_BEAT.name && found.is_told_of_pair(&["downbeat-consecutives"], step) {
        return;
    }
    found.succession(case, &bar, || {
        let noun = bar.noun();
        format!(
            "Consecutive {noun} over the bar line: {}, and the notes between do not hide them. Let one of the two be a third or a sixth.",
            bar.story()
        )
    });
}
