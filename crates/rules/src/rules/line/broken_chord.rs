//! A line breaks up a chord.
//!
//! Why: four notes of one triad make harmony in single notes, no longer a line.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//!
//! S | D4 F4 | A4 F4 | G4 E4 |
//! //  ^^ broken chord (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-2
//!
//! S | D4 F4 | A4 G4 | F4 E4 |
//! ```
//!
//! # Does not apply
//!
//! Note against note, and in free writing:
//!
//! ```voices
//! S | D4 F4 | A4 F4 | G4 E4 |
//! ```
//!
//! # What to do
//!
//! Put a step in place of one of the leaps. (Three leaps in one direction are `leaps-one-way`.)

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[&MOST],
    sources: &[
        source::LEHMANN.at("lesson II"),
        source::RENAISSANCE_WORKS
            .at("2 or 3 in 100 bars of Palestrina")
            .looser("basses have it now and then"),
    ],
};

static MOST: NumberOf = NumberOf {
    name: "notes",
    means: "notes of one triad running that are still a line",
    value: 3,
    bounds: (3, 20),
};

static ORDINARY: Case = Case {
    name: "",
    when: "more than three notes running that belong to one triad, all three of its notes among them",
    settings: &[
        allow(Style::Free, "broken chords are common in free writing"),
        weakness(Style::Motet, "the line is lost (Lehmann, lesson II)"),
        allow(Style::Species1, "note against note has few leaps as it is"),
        weakness(Style::Species2, "Lehmann, lesson II"),
        weakness(Style::Species3, "Lehmann, lesson II"),
        allow(Style::Species4, "suspensions leave little choice"),
        weakness(Style::Species5, "Lehmann, lesson II"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() || found.severity(&ORDINARY).is_none() {
        return;
    }
    let most = usize::try_from(found.number(&MOST)).unwrap_or(usize::MAX);
    for passage in line.broken_chords().into_iter().filter(|p| p.notes > most) {
        found.passage(&ORDINARY, &[line.voice], passage.extent(), || {
            let [first, _, last] = passage.pitches();
            format!(
                "Broken chord: {} has {} notes of one chord running, {first} to {last}. Put a step in place of a leap.",
                line.piece.name(line.voice),
                passage.notes
            )
        });
    }
}
