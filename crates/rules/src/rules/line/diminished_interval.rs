//! A voice moves by a diminished interval and does not turn back inside it.
//!
//! Why: a diminished fifth or fourth wants to close; a line that leaves it outward leaves the
//! tension hanging.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | F4 B3 A3 |
//! //     ^^ diminished interval (weakness): S
//! ```
//!
//! In strict counterpoint it has no place at all:
//!
//! ```voices
//! style species-1
//!
//! S | F4 B3 C4 |
//! //     ^^ diminished interval: S
//! ```
//!
//! # Passes
//!
//! The line turns back by step inside the leap:
//!
//! ```voices
//! style chorale
//!
//! S | F4 B3 C4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | F4 B3 A3 |
//! ```
//!
//! # What to do
//!
//! Turn back by step inside the leap, or take another interval.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::LEHMANN
            .at("lesson I")
            .looser("all diminished intervals are allowed"),
        source::BACH_CHORALES.at("falling fifth: bass 125, tenor 100, alto 19, soprano 4"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a diminished third, fourth, fifth or seventh; outside strict styles only where the line does not turn back inside it by step",
    settings: &[
        allow(Style::Free, "common in instrumental lines"),
        weakness(
            Style::Chorale,
            "lawful when turned back inside; 125 in the basses of 370 chorales",
        ),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann allows it)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let motet = found.style() == Style::Motet;
    let strict = found.style().is_species() || motet;
    // A diminished second takes a note that the modes do not know: told as a foreign accidental.
    for (i, step) in line.moves.iter().enumerate() {
        let turns_back = || {
            line.after(i)
                .is_none_or(|next| next.size() == 1 && next.rises() != step.rises())
        };
        if line.is_given()
            || (step.size() == 0 || !(strict || matches!(step.size(), 2 | 3 | 4 | 6)))
            || !step.is_diminished()
            || (!strict && turns_back())
            || (motet && step.size() == 1)
        {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let (from, to) = step.ends();
            let help = if strict {
                "Fill it in by step, or take another interval."
            } else {
                "Turn back inside it by step, or take another interval."
            };
            format!(
                "Diminished interval: {} goes from {from} to {to}, {}. {help}",
                line.piece.name(line.voice),
                step.interval.with_article()
            )
        });
    }
}
