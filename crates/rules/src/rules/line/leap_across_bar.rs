//! A line steps inside the bar and leaps across the bar line.
//!
//! Why: the bar line is where a line is heard to go on; a leap is better placed inside the bar,
//! and the last note before the bar line left by step.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//! metre 2/2
//!
//! S | A4 B4 | G4 F4 |
//! //          ^^ leap across bar (remark): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-2
//! metre 2/2
//!
//! S | A4 C5 | B4 A4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//! metre 2/2
//!
//! S | A4 B4 | G4 F4 |
//! ```
//!
//! # What to do
//!
//! Nothing, if there is a reason; else leap inside the bar and step into the next.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("second and third species"),
        source::LEHMANN
            .at("lesson IV")
            .looser("the last quarter is usually left by step"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a step inside the bar, then a leap to the first note of the next",
    settings: &[
        allow(Style::Free, "said of strict counterpoint only"),
        remark(Style::Species2, "advice (Open Music Theory)"),
        remark(
            Style::Species3,
            "advice (Open Music Theory; Lehmann, lesson IV)",
        ),
        remark(Style::Species5, "advice, as in the species before"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() {
        return;
    }
    let bar = |note: &Note| line.piece.score.bar_at(note.onset);
    for (i, step) in line.moves.iter().enumerate() {
        let Some(before) = line.before(i) else {
            continue;
        };
        let across = bar(&step.from) != bar(&step.to) && line.piece.score.level(step.to.onset) == 0;
        let inside = bar(&before.from) == bar(&before.to) && before.size() == 1;
        if !(step.is_leap() && across && inside) {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Leap across the bar line: {} steps inside the bar and leaps from {from} to {to} into the next. Step across, if you can.",
                line.piece.name(line.voice)
            )
        });
    }
}
