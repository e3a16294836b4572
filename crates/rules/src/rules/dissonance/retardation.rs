//! A held dissonance resolves upward.
//!
//! Why: a suspended note weighs on the voice and wants down; upward only a leading note may go, at a close.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | B4 - - - | -  - C5 - |
//! B | G3 - - - | A3 - - - |
//! //             ^ retardation: S and B
//! ```
//!
//! # Passes
//!
//! Down:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - - - | - - B4 - |
//! B | A3 - - - | D4 - G3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | B4 - | -  C5 |
//! B | G3 - | C4 -  |
//! ```
//!
//! # What to do
//!
//! Let it go down by step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &LEADING],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN
            .at("lesson VI")
            .looser("the leading note may rise"),
        source::FUX_FIGURES.at("166 suspensions, none upward"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a prepared note goes up by step",
    settings: &[
        allow(Style::Free, "the leading note at a close, and more"),
        fault(Style::Motet, "suspensions go down"),
        fault(
            Style::Species1,
            "suspensions go down: all 166 in the figures of Fux do; Lehmann (lesson VI) allows the leading note",
        ),
    ],
};

static LEADING: Case = Case {
    name: "leading-note",
    when: "a major seventh over the lowest voice that rises a semitone to the octave (7-8)",
    settings: &[
        allow(Style::Free, "the leading note at a close"),
        fault(Style::Motet, "suspensions go down"),
        fault(Style::Species1, "suspensions go down"),
        allow(
            Style::Species4,
            "the leading note may rise (Lehmann, lesson VI)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Retardation(_)) = discord.figure() else {
        return;
    };
    let case = if discord.is_leading_seventh() {
        &LEADING
    } else {
        &ORDINARY
    };
    found.dissonance(case, discord, || {
        format!("Retardation: {}. Let it go down by step.", discord.words())
    });
}
