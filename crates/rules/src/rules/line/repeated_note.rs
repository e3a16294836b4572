//! A voice strikes the same note again where the species wants it to move.
//!
//! Why: a repeated note stops the line; in quicker species it is no second note at all.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | A4 A4 A4 G4 |
//! //        ^^ repeated note (weakness): S
//! ```
//!
//! ```voices
//! style species-2
//!
//! S | A4 A4 | B4 C5 |
//! //     ^^ repeated note: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | A4 A4 G4 F4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | A4 A4 A4 G4 |
//! ```
//!
//! # What to do
//!
//! Move to another note of the chord, or tie the notes where the species allows it.
//!
//! # Who holds what
//!
//! First species: no repetition (Butterfield), one (Open Music Theory), three notes in a row in
//! the upper voice (Lehmann); Fux has 12 in ten figures. Set `in-a-row` to 1, 2 or 3.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&THIRD, &QUICK, &FLORID],
    numbers: &[&IN_A_ROW],
    sources: &[
        source::LEHMANN.at("lessons I and II"),
        source::OPEN_MUSIC_THEORY.at("one repetition in first species"),
        source::BUTTERFIELD.stricter("none in first species"),
        source::FUX_FIGURES.at("12 in ten first-species figures, none in second and third species"),
    ],
};

static IN_A_ROW: NumberOf = NumberOf {
    name: "in-a-row",
    means: "notes of one pitch in a row that first species allows",
    value: 2,
    bounds: (1, 20),
};

static THIRD: Case = Case {
    name: "",
    when: "in first species the third time and more; in quicker ones, in three parts and more, the second",
    settings: &[
        allow(Style::Free, "common everywhere else"),
        weakness(
            Style::Species1,
            "three in a row at the most (Lehmann, lesson I)",
        ),
    ],
};

static QUICK: Case = Case {
    name: "second-or-third-species",
    when: "in second and third species in two parts, the second time",
    settings: &[
        allow(Style::Free, "common everywhere else"),
        fault(Style::Species1, "none in Fux's figures"),
    ],
};

static FLORID: Case = Case {
    name: "fifth-species",
    when: "in fifth species in two parts, the second time, unless the second note is tied on",
    settings: &[
        allow(Style::Free, "common everywhere else"),
        weakness(Style::Species1, "only as an anticipation (Fux has five)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let Some(species) = line.piece.species_of(line.voice, found.style()) else {
        return;
    };
    let most = found.number(&IN_A_ROW);
    let mut times = 1;
    for step in line.moves {
        times = match (step.is_repeat(), step.starts) {
            (false, _) => 1,
            (true, true) => 2,
            (true, false) => times + 1,
        };
        let case = match (times, species) {
            (1, _) | (_, 4) => continue,
            // Once for all the repetitions in a row.
            (times, 1) if times != most + 1 => continue,
            (times, 2..) if times > 2 => continue,
            (_, 1) => &THIRD,
            _ if line.parts_at(step) >= 3 => &THIRD,
            (_, 5) if step.to.length > step.from.length => continue,
            (_, 5) => &FLORID,
            _ => &QUICK,
        };
        found.line(case, line, step, || {
            format!(
                "Repeated note: {} strikes {} again. Move to another note.",
                line.piece.name(line.voice),
                step.ends().1
            )
        });
    }
}
