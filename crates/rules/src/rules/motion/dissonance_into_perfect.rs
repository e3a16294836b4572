//! A second closes on a unison, or a seventh on an octave.
//!
//! Why: the clash vanishes into the same note, and a voice with it.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | A4 D5 C5 |
//! //        ^^ dissonance into perfect (weakness): S and A
//! A | F4 C5 C5 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | A4 D5 E5 |
//! A | F4 C5 C5 |
//! ```
//!
//! # Does not apply
//!
//! Where the dissonant note is held over as a suspension, or passes on by step:
//!
//! ```voices
//! style chorale
//!
//! S | A4 D5 -.C5 |
//! A | A4 B4 C5   |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | E5 D5 C5 |
//! A | C5 -  -  |
//! ```
//!
//! # What to do
//!
//! Resolve into a third or a sixth: let the other voice move.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&UNISON, &OCTAVE],
    numbers: &[],
    sources: &[
        source::PROUT_HARMONY.at("§ 109 (heading)"),
        source::LEHMANN
            .at("lesson IV")
            .looser("into a unison, if the line goes on"),
    ],
};

static UNISON: Case = Case {
    name: "unison",
    when: "a second struck on a beat closes on a unison by a step of one voice, neither passing nor suspended",
    settings: &[
        allow(Style::Free, "passing notes are not told apart yet"),
        weakness(Style::Chorale, "warned of (Prout)"),
        weakness(Style::Motet, "warned of (Prout)"),
        weakness(Style::Species1, "warned of (Lehmann, lesson IV)"),
    ],
};

static OCTAVE: Case = Case {
    name: "octave",
    when: "a seventh likewise on an octave",
    settings: &[
        allow(Style::Free, "passing notes are not told apart yet"),
        weakness(Style::Chorale, "warned of (Prout)"),
        weakness(Style::Motet, "warned of (Prout)"),
        weakness(Style::Species1, "warned of (Lehmann, lesson IV)"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(mover) = step.closes_from_dissonance() else {
        return;
    };
    if !step.leaves_struck_beat(mover) || step.passes_on(mover) || step.sounding.is_off_beat() {
        return;
    }
    let case = if step.is_in_unison_after() {
        &UNISON
    } else {
        &OCTAVE
    };
    found.pair(case, step, || {
        let (from, to) = if step.is_in_unison_after() {
            ("second", "unison")
        } else {
            ("seventh", "octave")
        };
        format!(
            "A {from} closes on {}: {}. Let the other voice move, into a third or a sixth.",
            if to == "unison" {
                "a unison"
            } else {
                "an octave"
            },
            step.story()
        )
    });
}
