//! A voice moves by an augmented interval.
//!
//! Why: singers have nothing to hold it by; it is the hardest interval to pitch, and an augmented
//! second or fourth stands out of any line.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | G4 Ab4 B4 C5 |
//! //         ^^ augmented interval: S
//! ```
//!
//! Where the dominant of minor turns aside to the sixth degree, the leading note must not fall with
//! the others:
//!
//! ```voices
//! style chorale
//! key A minor
//! metre 4/4
//!
//! S | C5 - B4 - | A4 - - - |
//! A | A4 - G#4 - | F4 - - - |
//! //               ^^ augmented interval: A
//! T | E4 - E4 - | C4 - - - |
//! B | A3 - E3 - | F3 - - - |
//! ```
//!
//! In open score writing it is a weakness:
//!
//! ```voices
//! S | C5 B4 F4 G4 |
//! //        ^^ augmented interval (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | G4 Ab4 Bb4 C5 |
//! ```
//!
//! # Does not apply
//!
//! Inside what may well be one chord:
//!
//! ```voices
//! style chorale
//!
//! S | B4 F5 |
//! A | G4 G4 |
//! B | D3 G2 |
//! ```
//!
//! An augmented fourth inside a sequence:
//!
//! ```voices
//! style chorale
//!
//! S | D5 G4 C5 F4 B4 E4 A4 |
//! ```
//!
//! The figuration of an instrument, in open score writing:
//!
//! ```voices
//! voice V violin
//!
//! V | C5 B4 F4 G4 |
//! ```
//!
//! # What to do
//!
//! Fill the interval, turn it into its diminished complement, or change the sign of one note.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I"),
        source::OPEN_MUSIC_THEORY.at("the deceptive cadence in minor"),
        source::PROUT_HARMONY.at("ch. IV"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "an augmented second, fourth, fifth or sixth between successive notes; in strict styles a note between two of them is told once",
    settings: &[
        weakness(
            Style::Free,
            "instruments take it more lightly (common practice)",
        ),
        fault(
            Style::Chorale,
            "the treatises forbid it (Prout, from memory)",
        ),
        fault(Style::Motet, "not among the intervals of the style"),
        fault(
            Style::Species1,
            "not among the permitted intervals (Lehmann, lesson I)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let strict = !matches!(found.style(), Style::Free | Style::Chorale);
    let played = line.declared().is_some_and(|v| !v.kind.is_sung());
    // One wrong sign makes two such moves, to the note and from it.
    let told = |i: usize| {
        let before = line.before(i).filter(|before| before.size() > 0);
        strict && before.is_some_and(LineMove::is_augmented)
    };
    for (i, step) in line.moves.iter().enumerate() {
        let excused = !strict && step.size() == 3 && line.is_in_sequence(i);
        let figured = found.style() == Style::Free && played;
        let one_chord = || {
            let there = line.sounding_at(step);
            match found.style() {
                Style::Free => there.is_some_and(|s| s.keeps_chord_under_leap(2)),
                Style::Chorale => there.is_some_and(|s| s.keeps_chord_under_leap(3)),
                _ => false,
            }
        };
        if line.is_given()
            || step.size() == 0
            || !step.is_augmented()
            || excused
            || told(i)
            || figured
            || one_chord()
        {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let (from, to) = step.ends();
            let name = step.interval.with_article();
            format!(
                "Augmented interval: {} goes from {from} to {to}, {name}. Fill it in by step, or change an accidental.",
                line.piece.name(line.voice)
            )
        });
    }
}
