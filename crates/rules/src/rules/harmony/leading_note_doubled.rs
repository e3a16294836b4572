//! Two voices have the leading note.
//!
//! Why: it wants to rise to the tonic; two voices that both do so go in octaves, and one that does not leaves it hanging.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - B4 - | C5 - - - |
//! //       ^ leading note doubled: S and T
//! A | E4 - G4 - | G4 - - - |
//! T | C4 - B3 - | E4 - - - |
//! B | C3 - G3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - B4 - | C5 - - - |
//! A | E4 - G4 - | G4 - - - |
//! T | C4 - D4 - | E4 - - - |
//! B | C3 - G3 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where the chord does not lead, its third may be doubled:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - C5 - | B4 - C5 - |
//! A | G4 - F4 - | G4 - G4 - |
//! T | E4 - C4 - | D4 - E4 - |
//! B | C4 - A3 - | G3 - C3 - |
//! ```
//!
//! # What to do
//!
//! Give one of the two the root or the fifth of the chord.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::ADVANCED_PLACEMENT.at("question 6"),
        source::COLAROS,
        source::AARDEN_VON_HIPPEL.at("15 to 35 in a hundred in composed chords"),
        source::BACH_CHORALES
            .at("30 of 2,060 major chords whose root falls a fifth double the third"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "two independent voices have the third of a dominant, or the root of a diminished chord on the leading note, of the key or of the chord that follows",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "both would rise in octaves"),
        weakness(Style::Motet, "the raised seventh at a close stands alone"),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(there) = chord.plain().filter(|there| there.parts() >= 3) else {
        return;
    };
    let leading = chord
        .members(there)
        .into_iter()
        .filter(|m| chord.is_leading_note(m.pitch));
    let leading: Vec<Member> = leading.collect();
    let [first, _, ..] = leading.as_slice() else {
        return;
    };
    let voices: Vec<usize> = leading.iter().map(|m| m.voice).collect();
    found.sonority(&ORDINARY, &voices, there.onset(), || {
        format!(
            "Leading note doubled: {} both have {} of {}. Give one of them another note of the chord.",
            there.piece.names(&voices),
            first.pitch.class_name(),
            chord.name(),
        )
    });
}
