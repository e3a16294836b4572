//! A diminished fifth over the lowest voice stands as a consonance.
//!
//! Why: the diminished fifth is a dissonance that later styles let close to a third.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | F4 - - - | E4 - - - |
//! C | B3 - - - | C4 - - - |
//! //  ^ diminished fifth (weakness): S and C
//! ```
//!
//! # Passes
//!
//! It passes:
//!
//! ```voices
//! style species-2
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | G4 - E4 - | G4 - F4 - | E4 - G4 - |
//! C | C4 - -  - | B3 - -  - | C4 - -  - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | F4 E4 |
//! B | B3 C4 |
//! ```
//!
//! # What to do
//!
//! Write a sixth or a third in its place.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &PREPARED],
    numbers: &[],
    sources: &[
        source::LEHMANN,
        source::PROUT_COUNTERPOINT
            .at("ch. 2")
            .looser("a consonance if it closes"),
        source::JEPPESEN,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "it closes to a third",
    settings: &[
        allow(Style::Free, "ordinary in every later style"),
        weakness(Style::Motet, "a dissonance, if a mild one"),
        weakness(
            Style::Species1,
            "Lehmann and Prout let it close to a third, stricter books do not",
        ),
    ],
};

static PREPARED: Case = Case {
    name: "prepared",
    when: "one of the two notes is held, and it closes to a third",
    settings: &[
        allow(Style::Free, "ordinary in every later style"),
        allow(
            Style::Motet,
            "prepared and resolved like a suspension (Jeppesen, from memory)",
        ),
        weakness(Style::Species1, "as when struck together"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::DiminishedFifth) = discord.figure() else {
        return;
    };
    let case = if discord.is_struck_together() {
        &ORDINARY
    } else {
        &PREPARED
    };
    found.dissonance(case, discord, || {
        format!(
            "Diminished fifth: {}. Write a sixth or a third in its place.",
            discord.words()
        )
    });
}
