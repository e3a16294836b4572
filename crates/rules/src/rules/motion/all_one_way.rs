//! All the voices move in the same direction.
//!
//! Why: the texture slides as a block, and no voice balances another.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! //     ^^ all one way (weakness): S and A and B
//! A | E4 A4 |
//! B | C3 F3 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! A | F4 A4 |
//! B | A3 F3 |
//! ```
//!
//! # Does not apply
//!
//! A chain of sixth chords, and a chord that may be the same:
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! A | G4 A4 |
//! B | E4 F4 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | C5 E5 |
//! A | E4 G4 |
//! B | C3 G3 |
//! ```
//!
//! # What to do
//!
//! Let one voice stay or move the other way; most often the bass.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Sonorities(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::KOSTKA_PAYNE, source::PROUT_HARMONY],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in three parts or more, all of them sounding and moving, not in a chain of sixth chords nor inside one chord",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks warn of it (Prout, from memory)"),
        weakness(Style::Motet, "handbooks warn of it"),
        weakness(Style::Species1, "handbooks warn of it"),
    ],
};

fn check(there: &Sounding<'_>, found: &mut Found<'_>) {
    if there.parts() < 3 || there.keeps_chord() {
        return;
    }
    let Some(rising) = there.all_move_one_way() else {
        return;
    };
    if there.goes_in_sixth_chords() {
        return;
    }
    let voices: Vec<usize> = there.piece.texture.sounding(there.index).collect();
    found.sonority(&ORDINARY, &voices, there.onset(), || {
        let way = if rising { "up" } else { "down" };
        format!(
            "All one way: {} all move {way} together. Let one of them stay or move the other way.",
            there.piece.names(&voices)
        )
    });
}
