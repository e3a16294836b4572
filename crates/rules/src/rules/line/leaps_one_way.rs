//! Two or more leaps follow each other in one direction.
//!
//! Why: leap upon leap drives a line out of its register; a chord it spells out may excuse it,
//! a seventh or ninth between the ends never.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | F4 C5 G5 |
//! //        ^^ leaps one way: S
//! ```
//!
//! ```voices
//! style species-1
//!
//! S | F4 A4 C#5 D5 |
//! //        ^^^ leaps one way (weakness): S
//! ```
//!
//! Three in a row:
//!
//! ```voices
//! style motet
//!
//! S | C4 E4 G4 C5 |
//! //           ^^ leaps one way: S
//! ```
//!
//! # Passes
//!
//! Two leaps that spell out a triad:
//!
//! ```voices
//! style species-1
//!
//! S | F#4 A4 C5 B4 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | F4 C5 G5 |
//! ```
//!
//! # What to do
//!
//! Turn one of the leaps round, or put a step between.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&DISSONANT, &NO_CHORD, &THREE],
    numbers: &[],
    sources: &[
        source::LEHMANN
            .at("lesson I, Fig. 9")
            .stricter("no two equal skips but minor thirds"),
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES.at("28 pairs of leaps in one direction in 44 figures"),
    ],
};

static DISSONANT: Case = Case {
    name: "",
    when: "two leaps that add up to a seventh, or to more than an octave",
    settings: &[
        allow(Style::Free, "common in instrumental lines"),
        weakness(Style::Chorale, "handbooks warn of it"),
        fault(
            Style::Motet,
            "no seventh or ninth between the ends (Jeppesen, from memory)",
        ),
        fault(
            Style::Species1,
            "not more than an octave in two skips (Lehmann, lesson I)",
        ),
    ],
};

static NO_CHORD: Case = Case {
    name: "no-chord",
    when: "two leaps that spell out neither a triad nor a divided octave",
    settings: &[
        allow(Style::Free, "common in instrumental lines"),
        weakness(Style::Chorale, "handbooks warn of it"),
        weakness(Style::Motet, "handbooks warn of it"),
        weakness(Style::Species1, "Fux has it, but seldom"),
    ],
};

static THREE: Case = Case {
    name: "three",
    when: "three leaps or more; in a bass that spells out a chord they pass",
    settings: &[
        allow(Style::Free, "common in instrumental lines"),
        weakness(Style::Chorale, "handbooks warn of it"),
        fault(Style::Motet, "not in the style (Jeppesen, from memory)"),
        fault(
            Style::Species1,
            "Fux excuses it once, by the cantus (figure 37)",
        ),
        weakness(Style::Species2, "broken chords occur in quicker notes"),
        weakness(Style::Species3, "broken chords occur in quicker notes"),
        weakness(Style::Species4, "broken chords occur in quicker notes"),
        weakness(Style::Species5, "broken chords occur in quicker notes"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() {
        return;
    }
    let follows = |i: usize| {
        let (step, before) = (line.moves.get(i)?, line.before(i)?);
        (step.is_leap() && before.is_leap() && step.goes_on_from(before)).then_some((before, step))
    };
    for (i, (before, step)) in (0..line.moves.len()).filter_map(|i| Some((i, follows(i)?))) {
        let third = i.checked_sub(1).and_then(follows);
        let case = if Line::oversteps(before, step) {
            &DISSONANT
        } else if let Some((first, _)) = third {
            let chord = Line::outlines_chord(before, step) && Line::outlines_chord(first, before);
            if line.is_bass() && chord && !found.style().is_species() {
                continue;
            }
            &THREE
        } else if !Line::outlines_chord(before, step) {
            &NO_CHORD
        } else {
            continue;
        };
        found.line(case, line, step, || {
            let way = step.way();
            let notes = match third {
                Some((first, _)) => format!("three times, {} to {}", first.ends().0, first.ends().1),
                None => format!("twice, {}", before.ends().0),
            };
            format!(
                "Leaps one way: {} leaps {way} {notes} to {} to {}. Turn one of them round, or put a step between.",
                line.piece.name(line.voice),
                before.ends().1,
                step.ends().1
            )
        });
    }
}
