//! Two voices come to their high points together.
//!
//! Why: voices are independent when each has its own moment; a common one makes a chord of two
//! lines.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 D5 E5 F5 | E5 D5 C#5 D5 ||
//! //           ^^ high points together (weakness): S and C
//! C | D4 F4 G4 A4 | G4 F4 E4  D4 ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 D5 B4 C5 | E5 D5 C#5 D5 ||
//! C | D4 F4 G4 A4 | G4 F4 E4  D4 ||
//! ```
//!
//! In motets, where one of them was there before:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 - B4 - | D5 - C5 - | B4 C5 D5 - | C5 - - - | D5 - - - ||
//! B | D3 - G3 - | G3 - A3 - | G3 A3 B3 - | A3 - - - | D3 - - - ||
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | A4 D5 E5 F5 | E5 D5 C#5 D5 ||
//! T | D4 F4 G4 A4 | G4 F4 E4  D4 ||
//! ```
//!
//! # What to do
//!
//! Bring one of the two high points earlier or later.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("first species"),
        source::RENAISSANCE_WORKS
            .at("in 314 pieces the highest voice comes to its highest note three times in the median, only once in 87")
            .looser("a highest note that comes back is no high point"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the outer voices strike their highest notes at one moment; in motets, each for the first time",
    settings: &[
        allow(Style::Free, "a climax may be common to all"),
        weakness(Style::Motet, "each voice has its own (Open Music Theory)"),
        weakness(
            Style::Species1,
            "each voice has its own (Open Music Theory)",
        ),
        allow(Style::Species2, "said of note against note only"),
        allow(Style::Species3, "said of note against note only"),
        allow(Style::Species4, "said of note against note only"),
        allow(Style::Species5, "said of note against note only"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    if !piece.closes() {
        return;
    }
    let lower = piece.score.voices.len().saturating_sub(1);
    let top = |voice| {
        let line = Line {
            piece: *piece,
            voice,
            moves: &[],
        };
        line.high_point(piece.start(), piece.score.end())
    };
    let (Some(above), Some(below)) = (top(0), top(lower).filter(|_| lower > 0)) else {
        return;
    };
    // A line does not come to the note it begins with.
    let reached = |at: &&Time| **at > piece.start() && below.times.contains(at);
    let Some(&at) = above.times.iter().find(reached) else {
        return;
    };
    // In a long piece the highest note comes back: what counts is the first time.
    let first = [&above, &below].map(|top| top.times.first());
    if found.style() == Style::Motet && first != [Some(&at); 2] {
        return;
    }
    found.sonority(&ORDINARY, &[0, lower], at, || {
        format!(
            "High points together: {} comes to {} and {} to {} in {}, the highest note of each. Bring one earlier or later.",
            piece.name(0),
            above.pitch,
            piece.name(lower),
            below.pitch,
            piece.place_text(at)
        )
    });
}
