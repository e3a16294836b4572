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
//! In a chorale a beat is long enough:
//!
//! ```voices
//! style chorale
//!
//! S | C5 - B4 - | C5 - - - | B4 - C5 - |
//! A | G4 - G4 - | F4 - - - | G4 - G4 - |
//! //              ^^ long dissonance (weakness): A and B
//! T | E4 - D4 - | E4 - - - | D4 - E4 - |
//! B | C3 - G3 - | C3 - - - | G3 - C3 - |
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
//! style free
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
    cases: &[&MINIM, &QUARTER, &BEAT],
    numbers: &[&MOST, &MOST_QUARTERS],
    sources: &[
        source::TINCTORIS_GAFFURIUS,
        source::JEPPESEN,
        source::FUX_FIGURES.at("no half passes in third species"),
        source::CHORALES_READ.at("no ornament of more than a beat but over a held final"),
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

static BEAT: Case = Case {
    name: "beat",
    when: "longer than a beat, where chords are heard and the sure chord does not have it; not over a bass or under a voice that is held throughout",
    settings: &[
        allow(Style::Free, "length is free"),
        weakness(
            Style::Chorale,
            "in 156 chorales 7 last longer, all notes of the chord or over a held final",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    // A leap to it is told by a rule of its own.
    if !discord.is_struck_ornament() || discord.figure() == Some(Figure::Appoggiatura) {
        return;
    }
    let style = found.style_of(&[discord.dissonant().0]);
    if style.has_chords() {
        if discord.is_longer_than_beat() && !discord.is_of_sure_chord() {
            tell(&BEAT, discord, found);
        }
        return;
    }
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
    tell(case, discord, found);
}

fn tell(case: &'static Case, discord: &Discord<'_>, found: &mut Found<'_>) {
    found.dissonance(case, discord, || {
        format!(
            "Long dissonance: {}. Shorten it, or prepare it as a suspension.",
            discord.words()
        )
    });
}
