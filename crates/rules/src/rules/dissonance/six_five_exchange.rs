//! Six to five comes twice running.
//!
//! Why: a sixth held over the bar line needs no resolution and may go to the fifth; done twice, the fifths
//! follow one another on every second half.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - B4 | - A4 | C5 - |
//! //                ^^^^ six five exchange (weakness): S and C
//! C | F4 - | E4 - | D4 - | A3 - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - B4 | - A4 | C5 - |
//! C | F4 - | E4 - | C4 - | A3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 - C5 - | - - B4 - | - - A4 - | C5 - - - |
//! B | F4 - - -  | E4 - - - | D4 - - - | A3 - - - |
//! ```
//!
//! # What to do
//!
//! Put a suspension or another consonance between the two.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::OPEN_MUSIC_THEORY.at("fourth species")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a held sixth goes to a fifth over the same note, in two bars running",
    settings: &[
        allow(Style::Free, "an old and lawful way round parallels"),
        weakness(Style::Species4, "once, not twice (Open Music Theory)"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    for voice in 0..piece.score.voices.len() {
        let exchanges = piece.six_five_exchanges(voice);
        for run in exchanges.windows(2) {
            let [first, second] = run else { continue };
            if !second.follows(first) {
                continue;
            }
            let voices = [voice, second.bass];
            found.passage(&ORDINARY, &voices, (second.at, second.until), || {
                format!(
                    "Six-five exchange: {} goes from a sixth over {} to a fifth twice running. Put another consonance between.",
                    piece.name(voice),
                    piece.name(second.bass)
                )
            });
        }
    }
}
