//! Two voices have the seventh of a chord.
//!
//! Why: it must fall by step; two voices that both do so go in octaves, and one that does not leaves it hanging.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - F4 - | E4 - - - |
//! //       ^ seventh doubled: S and T
//! A | E4 - B3 - | C4 - - - |
//! T | G3 - F3 - | G3 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! A | E4 - F4 - | E4 - - - |
//! T | G3 - B3 - | C4 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where one of the two only touches it between beats:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! A | E4 - F4 - | E4 - - - |
//! T | G3 - B3 - | G3 - - - |
//! B | C3 - G3.F3 G3 | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Keep the seventh in one voice; give the other the root, or the fifth.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::ADVANCED_PLACEMENT.at("question 6"), source::COLAROS],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in three parts or more, two independent voices have the seventh together for a beat, on the beat, and the root sounds; not where both pass through by step, nor a voice that has the note from before the chord until after it",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "both would fall in octaves"),
        allow(
            Style::Motet,
            "the style knows suspensions, not seventh chords",
        ),
        allow(Style::Species1, "the style knows no seventh chords"),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    if !chord.seventh_is_sure() {
        return;
    }
    let Some((there, members)) = chord.seventh_doubled() else {
        return;
    };
    let Some(first) = members.first() else { return };
    let voices: Vec<usize> = members.iter().map(|m| m.voice).collect();
    found.sonority(&ORDINARY, &voices, there.onset(), || {
        format!(
            "Seventh doubled: {} have {} of {}. Give one of them the root or the fifth.",
            there.piece.names(&voices),
            first.pitch.class_name(),
            chord.name(),
        )
    });
}
