//! A chord on a strong beat has neither third nor sixth.
//!
//! Why: with three voices and more there is room for the third, and without it the chord sounds empty.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! //       ^ third missing: S and A and T and B
//! A | E4 - D4 - | E4 - - - |
//! T | G3 - G3 - | G3 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! A first or a last chord may be bare:
//!
//! ```voices
//! style chorale
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! A | G4 - G4 - | G4 - - - |
//! T | E4 - B3 - | C4 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! In a motet, a close within the piece:
//!
//! ```voices
//! style motet
//! metre 4/4
//!
//! S | D5 - C5 - | D5 - E5 - |
//! A | A4 - G4 - | A4 - -  - |
//! B | F4 - E4 - | D4 - C4 - |
//! ```
//!
//! ```voices
//! style chorale
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Let one of the voices that double take the third.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Sonorities(check),
    cases: &[&ORDINARY, &CLOSE],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson XI"),
        source::ADVANCED_PLACEMENT.at("question 6"),
        source::BUTTERFIELD,
        source::FUX_FIGURES.at(
            "16 in a hundred downbeats in three parts, 11 in four, first and last bars among them",
        ),
        source::FUX_FIGURES.at("of 29 last chords in four parts 14 are open fifths"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "three parts or more in fifths and octaves over the lowest, for a beat, and no voice enters there or ends its phrase",
    settings: &[
        fault(Style::Free, "the chord is not whole"),
        fault(Style::Chorale, "the chord is not whole"),
        weakness(Style::Motet, "fuller chords are preferred"),
        weakness(Style::Species1, "fuller chords are preferred (Lehmann)"),
    ],
};

static CLOSE: Case = Case {
    name: "close",
    when: "the same where two voices close by steps in contrary motion into an octave or unison",
    settings: &[
        fault(Style::Free, "the chord is not whole"),
        fault(Style::Chorale, "the chord is not whole"),
        allow(
            Style::Motet,
            "a close may stay open, as 14 of 29 of Fux's in four parts",
        ),
        weakness(Style::Species1, "fuller chords are preferred (Lehmann)"),
    ],
};

fn check(sounding: &Sounding<'_>, found: &mut Found<'_>) {
    if !sounding.is_strong() || !sounding.lacks_third() || sounding.opens_or_closes() {
        return;
    }
    let voices: Vec<usize> = sounding.piece.texture.sounding(sounding.index).collect();
    let case = if sounding.closes_by_steps() {
        &CLOSE
    } else {
        &ORDINARY
    };
    let Some(bass) = sounding.bass() else { return };
    found.sonority(case, &voices, sounding.onset(), || {
        format!(
            "Third missing: the chord has only fifths and octaves over {} in {}. Give the third to a voice that doubles.",
            sounding.pitch_text(bass),
            sounding.piece.name(bass)
        )
    });
}
