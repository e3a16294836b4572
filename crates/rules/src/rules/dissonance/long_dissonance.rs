//! An unprepared dissonance lasts too long.
//!
//! Why: what was not prepared is borne only in passing; the longer it sounds, the more it wants a reason.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 - - D5 | - - C5 - |
//! //         ^ long dissonance: S and B
//! B | C4 - - -  | - - A3 - |
//! ```
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | E5 - D5 - | E5 - - - |
//! //       ^ long dissonance: S and C
//! C | C4 - -  - | C4 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 - - D5 | C5 - - - |
//! B | C4 - - -  | A3 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//! metre 4/2
//!
//! S | E5 - - D5 | - - C5 - |
//! B | C4 - - -  | - - -  - |
//! ```
//!
//! # What to do
//!
//! Shorten the note, or prepare it as a suspension.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&MINIM, &QUARTER],
    numbers: &[&MOST, &MOST_QUARTERS],
    sources: &[
        source::TINCTORIS_GAFFURIUS,
        source::JEPPESEN,
        source::FUX_FIGURES.at("no half passes in third species"),
    ],
};

static MOST: NumberOf = NumberOf {
    name: "most",
    means: "how long an unprepared dissonance may last, in quarters",
    value: 2,
    bounds: (1, 16),
};
static MOST_QUARTERS: NumberOf = NumberOf {
    name: "most-in-quarters",
    means: "the same in a species of quarters, in quarters",
    value: 1,
    bounds: (1, 16),
};

static MINIM: Case = Case {
    name: "",
    when: "longer than a half",
    settings: &[
        allow(Style::Free, "length is free"),
        fault(Style::Motet, "a minim at the most (Tinctoris, Gaffurius)"),
    ],
};

static QUARTER: Case = Case {
    name: "quarter",
    when: "longer than a quarter, unless it is a half that passes on the weak half of the bar",
    settings: &[
        allow(Style::Free, "length is free"),
        fault(Style::Species3, "the species is quarters"),
        fault(Style::Species5, "as in the third species"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    // A leap to it is told by a rule of its own.
    if !discord.is_struck_ornament() || discord.figure() == Some(Figure::Appoggiatura) {
        return;
    }
    let style = found.style_of(&[discord.dissonant().0]);
    let passes = matches!(discord.figure(), Some(Figure::Passing { accented: false }));
    let (case, most) = if !style.is_species() {
        (&MINIM, found.number(&MOST))
    } else if passes {
        (&QUARTER, found.number(&MOST))
    } else {
        (&QUARTER, found.number(&MOST_QUARTERS))
    };
    if !discord.is_longer_than(most) {
        return;
    }
    found.dissonance(case, discord, || {
        format!(
            "Long dissonance: {}. Shorten it, or prepare it as a suspension.",
            discord.words()
        )
    });
}
