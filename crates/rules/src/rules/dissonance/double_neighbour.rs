//! A double neighbour where the style has none.
//!
//! Why: two neighbours in a row are an ornament of quick notes; in slower ones the main note is lost.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 B4.G4 A4 - |
//! B | D4 -     -  - |
//! //        ^ double neighbour: S and B
//! ```
//!
//! # Passes
//!
//! Among quarters:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 E C D | E5 - - - |
//! C | D4 - - - | C4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 G4 A4 - |
//! B | D4 -  -  - |
//! ```
//!
//! # What to do
//!
//! Keep one of the two neighbours.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN.at("lesson IV, Fig. 45"),
        source::JEPPESEN,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the two notes beside the main note, one after the other",
    settings: &[
        allow(Style::Free, "a common ornament"),
        fault(Style::Motet, "not in the style (Jeppesen, from memory)"),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "no room for it"),
        allow(
            Style::Species3,
            "the four quarters of a bar (Lehmann, lesson IV, Fig. 45)",
        ),
        fault(Style::Species4, "no room for it"),
        allow(Style::Species5, "as in the third species"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::DoubleNeighbour) = discord.figure() else {
        return;
    };
    let case = &ORDINARY;
    found.dissonance(case, discord, || {
        format!(
            "Double neighbour: {}. Keep one of the two neighbours.",
            discord.words()
        )
    });
}
