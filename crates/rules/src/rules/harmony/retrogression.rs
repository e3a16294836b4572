//! The dominant goes back to the subdominant or the second degree.
//!
//! Why: the dominant points to the tonic; going back to what leads to the dominant, it takes the point away.
//!
//! # Fails
//!
//! No style minds by itself; a house style that sets it to `remark` gets:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - - - | G4 - - - | A4 - - - | G4 - - - ||
//! //                        ^^ retrogression (remark): S and B
//! A | E4 - - - | D4 - - - | C4 - - - | E4 - - - ||
//! T | C4 - - - | B3 - - - | C4 - - - | C4 - - - ||
//! B | C3 - - - | G3 - - - | F3 - - - | C3 - - - ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - - - | A4 - - - | G4 - - - | G4 - - - ||
//! A | E4 - - - | F4 - - - | D4 - - - | E4 - - - ||
//! T | C4 - - - | C4 - - - | B3 - - - | C4 - - - ||
//! B | C3 - - - | F3 - - - | G3 - - - | C3 - - - ||
//! ```
//!
//! # Does not apply
//!
//! To the sixth degree it only deceives:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - - - | G4 - - - | E4 - - - | G4 - - - ||
//! A | E4 - - - | D4 - - - | C4 - - - | E4 - - - ||
//! T | C4 - - - | B3 - - - | C4 - - - | C4 - - - ||
//! B | C3 - - - | G3 - - - | A3 - - - | C3 - - - ||
//! ```
//!
//! # What to do
//!
//! Put the subdominant before the dominant, or let the dominant go to the tonic.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::BUTTERFIELD.at("chapter 9")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in one key the major chord of the fifth degree goes to the chord of the fourth or of the second",
    settings: &[allow(
        Style::Free,
        "advice for beginners; a house style may want it (Butterfield)",
    )],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(next) = chord.goes_to() else { return };
    let goes_back = matches!(next.degree_in_key_of(chord), Some(2 | 4));
    if chord.degree() != Some(5) || !chord.has_major_third() || !goes_back {
        return;
    }
    let there = next.first();
    let Some(outer) = there.outer() else { return };
    found.sonority(&ORDINARY, &[outer.upper, outer.lower], there.onset(), || {
        format!(
            "Retrogression: {} go from {}, the dominant of {}, back to {}. Go on to the tonic, or put the other chord first.",
            chord.piece.names(&[outer.upper, outer.lower]),
            chord.name(),
            chord.key_name(),
            next.name(),
        )
    });
}
