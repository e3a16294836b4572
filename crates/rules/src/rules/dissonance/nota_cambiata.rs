//! A cambiata where the style has none, or not in full.
//!
//! Why: its leap from a dissonance is excused by the turn back by step that follows; without that it is a
//! leap from a dissonance.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - G4 - | E4 - F4 - | G4 - - - |
//! C | D4 - -  - | C4 - -  - | E4 - - - |
//! //       ^ nota cambiata: S and C
//! ```
//!
//! Upward:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | D4 E4 G4 F4 |
//! B | D3 -  B2 D3 |
//! //     ^ nota cambiata: S and B
//! ```
//!
//! # Passes
//!
//! Five notes, as Fux has it:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | C5 B4 G4 A4 | B4 - - - |
//! C | C4 -  -  -  | G4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | C5.B4 G4 |
//! B | C4 - |
//! ```
//!
//! # What to do
//!
//! Let the line turn back by two steps after the third, or pass on by step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &SHORT, &RISING],
    numbers: &[],
    sources: &[
        source::FUX_FIGURES.at("figures 55, 56 and 87"),
        source::OPEN_MUSIC_THEORY,
        source::JEPPESEN,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "downward, in a species without quarters",
    settings: &[
        allow(Style::Free, "rare but known"),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "no room for it"),
        allow(Style::Species3, "Fux, figures 55, 56 and 87"),
        fault(Style::Species4, "no room for it"),
        allow(Style::Species5, "as in the third species"),
    ],
};

static SHORT: Case = Case {
    name: "short",
    when: "one step only follows the third",
    settings: &[
        allow(Style::Free, "rare but known"),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "no room for it"),
        weakness(
            Style::Species3,
            "the five notes of Fux close with two steps (Open Music Theory)",
        ),
        fault(Style::Species4, "no room for it"),
        weakness(Style::Species5, "as in the third species"),
    ],
};

static RISING: Case = Case {
    name: "rising",
    when: "upward",
    settings: &[
        allow(Style::Free, "rare but known"),
        fault(Style::Motet, "only in textbooks"),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "no room for it"),
        weakness(Style::Species3, "only in textbooks"),
        fault(Style::Species4, "no room for it"),
        weakness(Style::Species5, "only in textbooks"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Cambiata { rising, whole }) = discord.figure() else {
        return;
    };
    let case = match (rising, whole) {
        (true, _) => &RISING,
        (_, false) => &SHORT,
        _ => &ORDINARY,
    };
    found.dissonance(case, discord, || {
        format!(
            "Nota cambiata: {}. Let two steps back follow the third, or pass on by step.",
            discord.words()
        )
    });
}
