//! A line turns on two notes a tritone apart.
//!
//! Why: the ear measures a line by the points where it turns; a tritone between two of them sounds
//! through the steps that fill it.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | A4 F4 G4 A4 | B4 A4 G4 C5 |
//! //                ^^ tritone outline: S
//! ```
//!
//! The diminished fifth is weaker:
//!
//! ```voices
//! style species-1
//!
//! S | F4 E4 G4 A4 | Bb4 G4 A4 F4 |
//! //                ^^^ tritone outline (weakness): S
//! ```
//!
//! # Passes
//!
//! The line goes a step further, or turns back from a diminished fifth by step:
//!
//! ```voices
//! style species-1
//!
//! S | A4 F4 G4 A4 | B4 C5 A4 G4 |
//! ```
//!
//! ```voices
//! style species-1
//!
//! S | F4 E4 G4 A4 | Bb4 A4 G4 F4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | A4 F4 G4 A4 | B4 A4 G4 C5 |
//! ```
//!
//! # What to do
//!
//! Go one step further, or turn one note sooner.
//!
//! # Who holds what
//!
//! A. Mann's note on Fux forbids the outline unless the line goes on; Rockstro counts the limits
//! only; Fux himself outlines diminished fifths (figures 14, 15 and 21). Hence two cases.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&AUGMENTED, &DIMINISHED],
    numbers: &[],
    sources: &[
        source::FUX
            .at("a note to Book II")
            .stricter("the diminished fifth as well"),
        source::GROVE.at("Strict Counterpoint, third order: only the limits count"),
        source::FUX_FIGURES
            .at("in two parts no augmented fourth, three diminished fifths in 44 figures"),
        source::CHORALES_READ.at(
            "of 1,043 fourths between turning points, perfect or augmented, 17 are augmented; of 851 fifths 173 are diminished. One in seven of a scale's is either",
        ),
        source::RENAISSANCE_WORKS.at("augmented fourths: 7 in 1,016 bars of Palestrina"),
    ],
};

static AUGMENTED: Case = Case {
    name: "augmented-fourth",
    when: "an augmented fourth between two turning points",
    settings: &[
        allow(Style::Free, "common in free lines"),
        weakness(Style::Chorale, "the strict rule, taken lightly (Rockstro)"),
        fault(Style::Motet, "the strict rule (Rockstro)"),
        fault(Style::Species1, "none in the lines of 44 of Fux's figures"),
    ],
};

static DIMINISHED: Case = Case {
    name: "diminished-fifth",
    when: "a diminished fifth between two turning points, from which the line does not turn back by step",
    settings: &[
        allow(Style::Free, "common in free lines"),
        allow(
            Style::Chorale,
            "not avoided: 173 of 851 fifths between turning points are diminished, by chance 122 (156 chorales)",
        ),
        weakness(Style::Motet, "weaker than the augmented fourth"),
        weakness(Style::Species1, "Fux has three in 44 figures"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() || RULE.cases.iter().all(|c| found.severity(c).is_none()) {
        return;
    }
    for stretch in line.stretches() {
        // A leap from one to the other is an augmented or diminished interval itself.
        let Some(turn) = stretch
            .turn
            .filter(|_| stretch.is_inside && !stretch.is_one_move())
        else {
            continue;
        };
        let interval = stretch.interval;
        let case = match interval.size() {
            3 if interval.is_augmented() => &AUGMENTED,
            4 if interval.is_diminished() && turn.size() != 1 => &DIMINISHED,
            _ => continue,
        };
        found.line(case, line, &stretch.whole(), || {
            let (from, to) = stretch.whole().ends();
            format!(
                "Tritone outline: {} turns at {from} and at {to}, {} apart. Go a step further, or turn a note sooner.",
                line.piece.name(line.voice),
                interval.with_article()
            )
        });
    }
}
