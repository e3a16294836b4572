//! A line leaps up from an accented quarter note.
//!
//! Why: in 16th-century lines the high note of a quick leap falls off the accent; the other way
//! round the line jerks.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 G4.C5 B4.A4 G4 |
//! //        ^^ leap from accent: S
//! ```
//!
//! # Passes
//!
//! From the unaccented quarter it may:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 A4.G4 C5 B4 |
//! ```
//!
//! # Does not apply
//!
//! Fux's quarters leap so in third species, and a metre that counts quarters has no quicker
//! notes of this kind:
//!
//! ```voices
//! style motet
//! metre 4/4
//!
//! S | A4 G4 C5 B4 |
//! ```
//!
//! # Who holds what
//!
//! Jeppesen's law holds for masses and motets; late madrigals declaim in quarters and leap as
//! they will: a house for them switches the rule off.
//!
//! # What to do
//!
//! Step up, leap down, or let the leap leave the second of the two quarters.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::JEPPESEN.at("the high note of quarters"),
        source::RENAISSANCE_WORKS
            .at("none in 1,016 bars of Palestrina, 2 in 954 of Asola, 6 in 1,671 of Marenzio's sacred music")
            .looser("some 30 in 100 bars of Marenzio's and Stabile's madrigals"),
        source::FUX_FIGURES
            .at("38 times in third species")
            .looser("no rule of the species"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a quarter on the beat of a metre in halves or wholes, left by a leap upward",
    settings: &[
        allow(
            Style::Free,
            "a matter of the 16th century; Fux has it 38 times",
        ),
        fault(
            Style::Motet,
            "the law of the high note (Jeppesen, from memory)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    for step in line.moves {
        if line.is_given()
            || !step.is_leap()
            || !step.rises()
            || !line.is_accented_quarter(&step.from)
        {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Leap from an accent: {} leaps up from the accented quarter {from} to {to}. Step up, or leap from the next quarter.",
                line.piece.name(line.voice)
            )
        });
    }
}
