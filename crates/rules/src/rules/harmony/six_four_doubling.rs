//! A six-four doubles another note than its bass.
//!
//! Why: over the bass the fourth and the sixth want to fall; doubled, they fall in octaves, while the bass stays.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - C5 B4 | C5 - - - |
//! //       ^ six four doubling (weakness): S and T
//! A | F4 - E4 D4 | E4 - - - |
//! T | A3 - C4 G3 | G3 - - - |
//! B | F3 - G3 G3 | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - C5 B4 | C5 - - - |
//! A | F4 - E4 D4 | E4 - - - |
//! T | A3 - G3 G3 | G3 - - - |
//! B | F3 - G3 G3 | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where the bass passes through by step, the voices may cross it as they will:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | G4 - G4 - | G4 - - - |
//! A | E4 - D4 - | C4 - - - |
//! T | C4 - B3 - | C4 - - - |
//! B | C3 - D3 - | E3 - - - |
//! ```
//!
//! # What to do
//!
//! Let one of the two double the bass.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Sonorities(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::ADVANCED_PLACEMENT.at("question 6: half the credit"),
        source::OPEN_MUSIC_THEORY,
        source::CHORALES_READ.at("six-fours of a beat and more, in four parts"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in four parts, a beat on the beat of fourths, sixths and octaves over the bass, of which the fourth or the sixth is doubled, and the bass does not pass through by step",
    settings: &[
        allow(Style::Free, "instruments may cover it"),
        weakness(
            Style::Chorale,
            "the bass is its steady note: 28 of 29 in the chorales double it, 19 of 22 in passing",
        ),
        allow(Style::Motet, "a fourth over the bass is told of by itself"),
        allow(
            Style::Species1,
            "a fourth over the bass is told of by itself",
        ),
    ],
};

fn check(there: &Sounding<'_>, found: &mut Found<'_>) {
    let Some(voices) = there.six_four_doubles().filter(|voices| voices.len() > 1) else {
        return;
    };
    if there.bass_passes() || found.is_told_of_sonority("six-four", there) {
        return;
    }
    found.sonority(&ORDINARY, &voices, there.onset(), || {
        let note = voices.first().and_then(|&voice| there.pitch(voice));
        format!(
            "Six-four doubling: {} have {}. Let one of them double the bass.",
            there.piece.names(&voices),
            note.map(|pitch| pitch.class_name()).unwrap_or_default(),
        )
    });
}
