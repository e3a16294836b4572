//! After a large leap the line does not turn back.
//!
//! Why: the ear waits for what the leap jumped over; going on the same way strains the singer too.
//!
//! # Fails
//!
//! ```voices
//! style motet
//!
//! S | E4 C5 D5 |
//! //     ^^ leap unrecovered (weakness): S
//! ```
//!
//! An octave weighs more:
//!
//! ```voices
//! style motet
//!
//! S | C4 C5 D5 |
//! //     ^^ leap unrecovered: S
//! ```
//!
//! A fourth or a fifth only if the line goes on for more than a step:
//!
//! ```voices
//! style motet
//!
//! S | C4 G4 A4 B4 |
//! //     ^^ leap unrecovered (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//!
//! S | E4 C5 B4 |
//! ```
//!
//! ```voices
//! style motet
//!
//! S | D4 A4 Bb4 A4 |
//! ```
//!
//! # Does not apply
//!
//! In the bass of three parts and more, octaves apart, in free writing, where a phrase ends, and in
//! a chorale after a fourth:
//!
//! ```voices
//! style chorale
//!
//! S | E4 C5^ D5 |
//! B | A2 E3  F3 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | D4 G4 A4 B4 |
//! ```
//!
//! # What to do
//!
//! Turn back after the leap, best by step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&LARGE, &OCTAVE, &FIFTH, &FOURTH],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::COLAROS.looser("only leaps beyond a fourth"),
        source::JEPPESEN,
        source::RENAISSANCE_WORKS
            .at("octaves turned back: 46 of 52 in Palestrina, 802 of 871 in other sacred music and songs, 698 of 763 in madrigals")
            .looser("one in ten goes on"),
        source::CHORALES_READ.at("upper voices after a fourth: back 957, on for two steps 133, most of these from an upbeat"),
        source::FUX_FIGURES.at("10 leaps of a fifth or more not turned back, in 44 figures"),
    ],
};

static LARGE: Case = Case {
    name: "",
    when: "a sixth or more, not followed by a move the other way",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks ask for it (Open Music Theory)"),
        weakness(Style::Motet, "handbooks ask for it (Jeppesen, from memory)"),
        weakness(Style::Species1, "handbooks ask for it (Open Music Theory)"),
    ],
};

static OCTAVE: Case = Case {
    name: "octave",
    when: "an octave, not followed by a move the other way",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks ask for it"),
        fault(
            Style::Motet,
            "the octave is always balanced (Jeppesen, from memory)",
        ),
        weakness(Style::Species1, "the octave is balanced (Fux)"),
    ],
};

static FIFTH: Case = Case {
    name: "fifth",
    when: "a fifth after which the line goes on the same way for two steps, or leaps on out of a triad",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks ask for it (Open Music Theory)"),
        weakness(Style::Motet, "handbooks ask for it (Jeppesen, from memory)"),
        weakness(Style::Species1, "Fux turns back after all but ten leaps"),
    ],
};

static FOURTH: Case = Case {
    name: "fourth",
    when: "the same of a fourth",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        allow(
            Style::Chorale,
            "asked only of leaps beyond a fourth (Colaros)",
        ),
        weakness(Style::Motet, "handbooks ask for it (Jeppesen, from memory)"),
        weakness(Style::Species1, "handbooks ask for it (Open Music Theory)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() {
        return;
    }
    let strict = found.style().is_species();
    // A leap that should not be there at all is told by its own rule.
    let told = found.leaps_told(&[], line);
    for (i, step) in line.moves.iter().enumerate() {
        // A bass leaps as it must, but for its octaves; in two parts it is a line like the other.
        let bass = line.is_bass() && !(strict && line.parts_at(step) < 3);
        let case = match step.size() {
            size if bass && size != 7 => continue,
            7 => &OCTAVE,
            5.. => &LARGE,
            4 => &FIFTH,
            3 => &FOURTH,
            _ => continue,
        };
        let Some(next) = line.after(i) else { continue };
        if told.binary_search(&step.to.onset).is_ok() {
            continue;
        }
        // After a fourth or fifth the line may fill out a triad, or top the leap with one step.
        let excused = step.size() <= 4
            && if next.is_leap() {
                Line::outlines_chord(step, next)
            } else {
                line.after_next(i)
                    .is_none_or(|third| !third.goes_on_from(step))
            };
        if !next.goes_on_from(step) || excused {
            continue;
        }
        found.line(case, line, step, || {
            let (from, to) = step.ends();
            let way = step.way();
            format!(
                "Leap unrecovered: {} leaps {way} from {from} to {to} and goes on {way} to {}. Turn back after the leap.",
                line.piece.name(line.voice),
                next.ends().1
            )
        });
    }
}
