//! Most of the downbeats in two parts are perfect intervals.
//!
//! Why: fifths and octaves are bare; thirds and sixths make two voices sound full.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | D5 | E5 | F5 | C5 | B4 | C#5 | D5 ||
//! //  ^^ few imperfects (weakness): S and B
//! B | D4 | A4 | F4 | F4 | E4 | E4  | D4 ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | A4 | A4 | G4 | F4 | E4 | D4 | C#4 | D4 ||
//! B | D4 | F4 | E4 | D4 | C4 | B3 | E3  | D3 ||
//! ```
//!
//! # Does not apply
//!
//! To fragments of less than four bars inside, and in three parts.
//!
//! ```voices
//! style species-1
//!
//! S | D5 | C5 | D5 |
//! B | D4 | F4 | D4 |
//! ```
//!
//! # What to do
//!
//! Put thirds and sixths in the place of some of the fifths and octaves.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[&SHARE],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("first species"),
        source::LEHMANN,
        source::FUX_FIGURES.at("36 in a hundred in the first species, the ends included"),
    ],
};

static SHARE: NumberOf = NumberOf {
    name: "share",
    means: "how many in a hundred downbeats inside may be perfect intervals",
    value: 50,
    bounds: (0, 100),
};

/// Fewer downbeats inside make a fragment.
const LEAST: usize = 4;

static ORDINARY: Case = Case {
    name: "",
    when: "in two parts, more than half of the downbeats between the first bar and the last",
    settings: &[
        allow(Style::Free, "an exercise's concern"),
        weakness(
            Style::Species1,
            "imperfect intervals should prevail (Lehmann)",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let share = usize::try_from(found.number(&SHARE)).unwrap_or(0);
    let (&[pair], Some(start)) = (piece.texture.pairs(), piece.soundings().next()) else {
        return;
    };
    let (perfect, all) = piece.perfect_downbeats(pair);
    if all < LEAST || perfect * 100 <= all * share {
        return;
    }
    let extent = (start.onset(), piece.score.end());
    found.passage(&ORDINARY, &[pair.upper, pair.lower], extent, || {
        format!(
            "Few imperfects: of {all} downbeats inside, {} and {} have {perfect} fifths, octaves or unisons. Put thirds and sixths in their place.",
            piece.name(pair.upper),
            piece.name(pair.lower)
        )
    });
}
