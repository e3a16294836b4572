//! The lowest two voices stand close together low down.
//!
//! Why: low notes a third apart growl; the lower the chord, the wider the ear wants its lowest
//! interval.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | E4 |
//! A | C4 |
//! T | A2 |
//! //  ^^ low crowding (weakness): T and B
//! B | F2 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | A4 |
//! A | F4 |
//! T | C3 |
//! B | F2 |
//! ```
//!
//! # Does not apply
//!
//! Above the C below the bass stave's middle, and unisons:
//!
//! ```voices
//! style chorale
//!
//! T | E3 B2 |
//! B | C3 B2 |
//! ```
//!
//! # What to do
//!
//! Put a fifth, a sixth or an octave between the lowest two.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[&OCTAVE],
    sources: &[source::HURON.at("rules D4 and D5"), source::PROUT_HARMONY],
};

static OCTAVE: NumberOf = NumberOf {
    name: "octave",
    means: "the octave figure of the C below which both notes lie (3 for C3)",
    value: 3,
    bounds: (0, 9),
};

static ORDINARY: Case = Case {
    name: "",
    when: "a second or third between the lowest two voices, both below C3",
    settings: &[weakness(
        Style::Free,
        "wider below (Huron; Prout, from memory)",
    )],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let octave = found.number(&OCTAVE);
    for &pair in piece.texture.pairs() {
        for run in piece.passages(pair, |there| there.crowds_below(pair, octave)) {
            let voices = [pair.upper, pair.lower];
            found.passage(&ORDINARY, &voices, (run.from, run.until), || {
                format!(
                    "Low crowding: {} and {} stand a third or less apart below C{octave} {}. Put a fifth or an octave between them.",
                    piece.name(pair.upper),
                    piece.name(pair.lower),
                    piece.extent_text(run.from, run.until)
                )
            });
        }
    }
}
