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
//! Nor where one of the two only comes down through it:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 A4 | G4 - - - |
//! A | E4 - D4 -  | E4 - - - |
//! T | G3 - B3 -  | C4 - - - |
//! B | C3 - G2 -  | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Give one of the two the root or the fifth of the chord.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY, &ELSEWHERE],
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
    when: "two independent voices have the third of a dominant, or the root of a diminished chord on the leading note, of the key or of the chord that follows, together for a beat, and one of them goes to a close, by steps in contrary motion with another voice; not in a sequence, nor where one of them comes down through it by step",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "both would rise in octaves"),
        weakness(Style::Motet, "the raised seventh at a close stands alone"),
    ],
};

static ELSEWHERE: Case = Case {
    name: "elsewhere",
    when: "the same where neither goes to a close",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "both would rise in octaves"),
        allow(
            Style::Motet,
            "away from a close the modes know no leading note",
        ),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some((there, leading)) = chord.leading_note_doubled() else {
        return;
    };
    let Some(first) = leading.first() else { return };
    let case = if chord.closes_with(&leading) {
        &ORDINARY
    } else {
        &ELSEWHERE
    };
    let voices: Vec<usize> = leading.iter().map(|m| m.voice).collect();
    found.sonority(case, &voices, there.onset(), || {
        format!(
            "Leading note doubled: {} have {} of {}. Give one of them another note of the chord.",
            there.piece.names(&voices),
            first.pitch.class_name(),
            chord.name(),
        )
    });
}
