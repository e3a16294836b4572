//! A voice goes below the one that stands under it in the score.
//!
//! Why: singers keep their place in the chord by the voices above and below them, and the ear
//! follows the pitch, not the part: where two voices cross, both lines are lost.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | E4 D E F |
//! A | C4 F G F |
//! //     ^ crossing (weakness): S and A
//! B | A3 B C D |
//! ```
//!
//! For a note or two it is worth a word only:
//!
//! ```voices
//! style chorale
//!
//! S | D4 E F |
//! A | C4 F E |
//! //     ^ crossing (remark): S and A
//! B | A3 C D |
//! ```
//!
//! Under the bass it is a fault in a chorale:
//!
//! ```voices
//! style chorale
//!
//! S | C5 B4 C5 |
//! T | E4 D3 E  |
//! B | C4 G3 C4 |
//! //     ^^ crossing: T and B
//! ```
//!
//! # Passes
//!
//! Meeting in a unison and parting again is no crossing:
//!
//! ```voices
//! style chorale
//!
//! S | E4 D E |
//! B | C4 D C |
//! ```
//!
//! # Does not apply
//!
//! Equal voices that may cross, and a bass doubled an octave lower:
//!
//! ```voices
//! style chorale
//! equal S1 S2
//! voice S1 soprano
//! voice S2 soprano
//!
//! S1 | D5 C B4 |
//! S2 | B4 E4 D4 |
//! ```
//!
//! ```voices
//! style chorale
//! voice T tenor
//! voice B bass sixteen-foot
//!
//! T | E4 A3 E4 |
//! B | C4 B3 C4 |
//! ```
//!
//! # What to do
//!
//! Exchange the two notes, or declare voices that share a register with `equal`.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY, &BRIEF, &BASS],
    numbers: &[],
    sources: &[
        source::JEPPESEN.looser("there is no real polyphony without crossing"),
        source::LEHMANN
            .at("lesson II")
            .looser("one or two notes, if the voices part at once"),
        source::FUX_FIGURES.at("6 of 44 in two parts cross"),
        source::BACH_CHORALES.at("782 of 30,038 sonorities"),
        source::CHORALES_READ.at("142 crossings of upper voices, 117 of one or two notes"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between any two voices but those declared equal",
    settings: &[
        weakness(
            Style::Free,
            "lasting, it is rare: 25 places in 156 chorales",
        ),
        allow(
            Style::Motet,
            "equal voices cross freely (Jeppesen, from memory)",
        ),
        weakness(
            Style::Species1,
            "for more than a note or two (Lehmann, lesson II)",
        ),
    ],
};

static BRIEF: Case = Case {
    name: "brief",
    when: "the same for one or two notes, if the voices part at once",
    settings: &[
        remark(
            Style::Free,
            "let pass even in strict counterpoint (Lehmann, lesson II); 117 of 142 crossings in 156 chorales",
        ),
        allow(
            Style::Motet,
            "equal voices cross freely (Jeppesen, from memory)",
        ),
        allow(Style::Species1, "let pass (Lehmann, lesson II)"),
    ],
};

static BASS: Case = Case {
    name: "bass",
    when: "an upper voice below the bass, unless that is doubled an octave lower",
    settings: &[
        weakness(Style::Free, "the chord changes its bass"),
        fault(
            Style::Chorale,
            "the chord changes its bass (common practice)",
        ),
        allow(Style::Motet, "any voice may be the lowest"),
        weakness(Style::Species1, "as between other voices"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    for &pair in piece.texture.pairs() {
        let bass = pair.lower + 1 == piece.score.voices.len();
        let doubled_below = piece
            .score
            .voices
            .get(pair.lower)
            .is_some_and(|v| v.sixteen_foot);
        if piece.score.are_equal(pair.upper, pair.lower) || doubled_below {
            continue;
        }
        for passage in piece.crossings(pair) {
            let brief = passage.returns && passage.notes <= 2;
            let case = if brief && (!bass || found.style().is_species()) {
                &BRIEF
            } else if bass {
                &BASS
            } else {
                &ORDINARY
            };
            found.passage(
                case,
                &[pair.upper, pair.lower],
                (passage.from, passage.until),
                || {
                    let (upper, lower) = (piece.name(pair.upper), piece.name(pair.lower));
                    let help = if piece.are_alike(pair) {
                        "Exchange their notes, or declare the two equal"
                    } else {
                        "Exchange their notes, or move one of them"
                    };
                    let extent = piece.extent_text(passage.from, passage.until);
                    let what = if passage.lower_moved {
                        format!("{lower} goes above {upper}")
                    } else {
                        format!("{upper} goes below {lower}")
                    };
                    format!("Crossing: {what} {extent}. {help}.")
                },
            );
        }
    }
}
