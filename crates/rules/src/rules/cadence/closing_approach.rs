//! The close is not reached by step from both sides.
//!
//! Why: the sixth that opens into the octave, and the third that closes into the unison, are what
//! makes an ending of two lines: one steps down to the final, the other up.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 G4 D5 ||
//! //           ^^ closing approach: S and C
//! C | D4 F4 E4 D4 ||
//! ```
//!
//! ```voices
//! style motet
//! key D dorian
//!
//! S | A4 F4 E4 D4 ||
//! //           ^^ closing approach (weakness): S and T
//! T | D4 D4 A3 D4 ||
//! ```
//!
//! In three parts, where no two voices step:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//! voice B
//!
//! S | F4 A4 A4 F#4 ||
//! //           ^^^ closing approach: S and C and B
//! C | D4 F4 E4 D4 ||
//! B | D3 D3 A2 D3 ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 C#5 D5 ||
//! C | D4 F4 E4  D4 ||
//! ```
//!
//! In three parts the bass may leap, if two others step:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//! voice B
//!
//! S | F4 A4 C#4 D4 ||
//! C | D4 F4 E4  D4 ||
//! B | D3 D3 A2  D3 ||
//! ```
//!
//! # Does not apply
//!
//! Where nothing closes, and outside the strict styles:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 G4 D5 |
//! C | D4 F4 E4 D4 |
//! ```
//!
//! # What to do
//!
//! Let one voice step down to the final and another step up to it.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&TWO_PARTS, &MORE_PARTS],
    numbers: &[],
    sources: &[
        source::FUX_FIGURES.at(
            "two parts: the sixth above the cantus in 20 of 20, the third below it in 23 of 23",
        ),
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN.at("lesson I"),
        source::JEPPESEN,
    ],
};

static TWO_PARTS: Case = Case {
    name: "",
    when: "in two parts, not one voice stepping up and the other stepping down to the final: a sixth before the octave, or a third before the unison",
    settings: &[
        allow(Style::Free, "the bass may leap to its tonic"),
        weakness(
            Style::Motet,
            "two parts close with this clausula (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "no exception in 43 figures of Fux"),
    ],
};

static MORE_PARTS: Case = Case {
    name: "more-parts",
    when: "in three parts or more, no two of the voices do so",
    settings: &[
        allow(Style::Free, "the bass may leap to its tonic"),
        fault(
            Style::Species1,
            "the frame of two parts stays (Open Music Theory)",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let Some(close) = piece.close() else { return };
    let voices: Vec<usize> = piece.texture.sounding(close.index).collect();
    // Without a final, or in the wrong voice, there is another rule to say so.
    let known = close.bass().and_then(|bass| piece.has_final(close, bass));
    if voices.len() < 2 || known != Some(true) {
        return;
    }
    let moves = piece.moves_to_final(close);
    if moves.iter().any(LastMove::steps_up) && moves.iter().any(LastMove::steps_down) {
        return;
    }
    let names = piece.names(&voices);
    let (case, what) = if voices.len() == 2 {
        (&TWO_PARTS, format!("{names} do not step"))
    } else {
        (&MORE_PARTS, format!("no two of {names} step"))
    };
    found.sonority(case, &voices, close.onset(), || {
        format!(
            "Closing approach: {what} to the final from above and below. Let one step down to it and another up."
        )
    });
}
