//! A voice goes beyond the compass of its mode.
//!
//! Why: the compass tells the authentic mode from the plagal: final to octave, or from the fourth
//! below the final to the fifth above; a voice that wanders over both has no mode.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! key D dorian
//!
//! T | D3 F3 A3 B3 C4 D4 E4 F4 E4 A3 D3 |
//! //  ^^ mode ambitus (remark): T
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! key D dorian
//!
//! T | D3 C3 D3 A3 B3 C4 D4 E4 D4 A3 G3 |
//! ```
//!
//! # Does not apply
//!
//! Where no key is stated:
//!
//! ```voices
//! style motet
//!
//! T | D3 F3 A3 B3 C4 D4 E4 F4 E4 A3 G3 |
//! ```
//!
//! # What to do
//!
//! Keep a voice within the octave of its mode, and a step beyond either end.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[&BEYOND],
    sources: &[
        source::JEPPESEN,
        source::RENAISSANCE_WORKS.at(
            "103 of 312 top voices go beyond it, 334 of 785 inner ones, 185 of 312 lowest ones",
        ),
    ],
};

static BEYOND: NumberOf = NumberOf {
    name: "beyond",
    means: "scale steps that a voice may go beyond either end of its mode's octave",
    value: 1,
    bounds: (0, 7),
};

static ORDINARY: Case = Case {
    name: "",
    when: "in the highest voice or the tenor, neither within the octave over the final nor within that from a fourth below it to a fifth above, a step beyond either end let pass",
    settings: &[
        allow(Style::Free, "the compass is the singer's"),
        remark(
            Style::Motet,
            "authentic or plagal (Jeppesen, from memory), but a third of the top voices of 314 works go beyond",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    // The tenor and the highest voice carry the mode.
    if found.style() != Style::Motet || !(line.is_top() || line.is_tenor()) {
        return;
    }
    let runs = line.runs(|_| Some(()));
    let (Some(whole), Some(mode)) = (runs.first(), line.piece.stated_final()) else {
        return;
    };
    if line.keeps_ambitus(whole, mode, found.number(&BEYOND)) {
        return;
    }
    found.passage(&ORDINARY, &[line.voice], (whole.from, whole.until), || {
        format!(
            "Mode ambitus: {} goes from {} to {}, beyond the octave of its mode. Keep it authentic or plagal.",
            line.piece.name(line.voice),
            whole.lowest,
            whole.highest
        )
    });
}
