//! The two notes of a tritone follow each other in two voices.
//!
//! Why: the ear connects them across the voices; the old saying is that mi against fa is the
//! devil in music.
//!
//! # Fails
//!
//! Two major thirds by a whole tone hold one:
//!
//! ```voices
//! style species-1
//!
//! S | A4 B4 C5 |
//! //     ^^ mi contra fa (weakness): S and B
//! B | F4 G4 A4 |
//! ```
//!
//! So does a fifth that closes to a third:
//!
//! ```voices
//! style species-1
//!
//! S | C5 B4 G4 |
//! //     ^^ mi contra fa (weakness): S and B
//! B | F4 G4 E4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | A4 G4 |
//! B | F4 E4 |
//! ```
//!
//! # Does not apply
//!
//! Where a voice leaps, over a sixth, in three parts, or in a minor key:
//!
//! ```voices
//! style species-1
//!
//! S | A4 B4 |
//! A | F4 G4 |
//! B | D4 G3 |
//! ```
//!
//! ```voices
//! style species-1
//! key D dorian
//!
//! S | A4 B4 |
//! B | F4 G4 |
//! ```
//!
//! # What to do
//!
//! Let one voice leap, or go by a semitone in one of them.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &THIRDS],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson I, Figs. 13 and 14; lesson XI"),
        source::CHERUBINI,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in two parts, both voices stepping, from one third, fifth or octave to another",
    settings: &[
        allow(Style::Free, "no concern of later music"),
        weakness(Style::Motet, "avoided in two parts (Cherubini)"),
        weakness(Style::Species1, "avoided in two parts (Lehmann, Fig. 13)"),
    ],
};

static THIRDS: Case = Case {
    name: "major-thirds",
    when: "two major thirds by a whole tone, in two parts, not in a minor key",
    settings: &[
        allow(Style::Free, "no concern of later music"),
        weakness(
            Style::Species1,
            "forbidden in two parts, let pass in three (Lehmann, lessons I and XI)",
        ),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let piece = step.sounding.piece;
    if piece.voices() != 2 {
        return;
    }
    let Some(first) = step.tritone_across() else {
        return;
    };
    let thirds = step.goes_in_major_thirds_by_tone();
    if thirds && piece.is_minor_at(step.sounding) {
        return;
    }
    let case = if thirds { &THIRDS } else { &ORDINARY };
    found.pair(case, step, || {
        let next = if first == step.pair.upper {
            step.pair.lower
        } else {
            step.pair.upper
        };
        format!(
            "Mi contra fa: the {} of {} and the {} that {} takes next make a tritone. Let one voice leap, or change a note.",
            step.pitch_before(first),
            piece.name(first),
            step.pitch_after(next),
            piece.name(next)
        )
    });
}
