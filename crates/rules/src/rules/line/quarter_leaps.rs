//! Two leaps in quarters go the same way.
//!
//! Why: quarters are the quick notes of the style; they run by step, and a leap among them turns
//! back at once.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/4
//!
//! S | D5 - C5 A4 F4 - G4 - |
//! //             ^^ quarter leaps (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/4
//!
//! S | C5 - A4 F4 G4 - A4 - |
//! ```
//!
//! # Does not apply
//!
//! To halves, and where the printed values may have been halved:
//!
//! ```voices
//! style motet
//! metre 4/4
//!
//! S | C5 A4 F4 G4 |
//! ```
//!
//! # What to do
//!
//! Fill one of the leaps with a step, or turn after it.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::JEPPESEN,
        source::RENAISSANCE_WORKS.at("none in 1,016 bars of Palestrina, 173 in all"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a quarter reached by leap and left by leap, both up or both down",
    settings: &[
        allow(Style::Free, "broken chords run in any note value"),
        weakness(Style::Motet, "not in the style (Jeppesen, from memory)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if found.style() != Style::Motet || line.is_given() {
        return;
    }
    // Two leaps that are wrong in any note value are told once.
    let told = found.told_on_line(&["leaps-one-way"], line);
    for (i, step) in line.moves.iter().enumerate() {
        let Some(before) = line.before(i) else {
            continue;
        };
        let same = step.is_leap() && before.is_leap() && step.goes_on_from(before);
        if !same || !line.is_quarter(&step.from) || !line.is_quarter(&before.from) {
            continue;
        }
        if told.binary_search(&step.to.onset).is_ok() {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let way = if step.rises() { "up" } else { "down" };
            format!(
                "Quarter leaps: {} leaps {way} twice in quarters, {} to {} to {}. Fill one leap with a step, or turn after it.",
                line.piece.name(line.voice),
                before.ends().0,
                before.ends().1,
                step.ends().1
            )
        });
    }
}
