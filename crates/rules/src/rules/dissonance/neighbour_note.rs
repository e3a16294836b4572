//! A neighbour note where the species has none, or on a strong moment.
//!
//! Why: the neighbour decorates a note that stays; where every note is a step of its own it only clashes.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - G4 - | A4 - F4 - |
//! C | D4 - -  - | F4 - -  - |
//! //       ^ neighbour note (weakness): S and C
//! ```
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - G4 - | A4 - - - |
//! C | D4 - -  - | F4 - - - |
//! //       ^ neighbour note: S and C
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
//! S | A4 G A B | C5 - - - |
//! C | D4 - - - | C4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | C5.B4 C5 |
//! B | C4 - |
//! ```
//!
//! # What to do
//!
//! Go on by step instead of turning back, or make the note consonant.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&WEAK, &ACCENTED, &QUICK],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN.at("lesson II"),
        source::FUX_FIGURES.at("lower neighbours in fifth species only"),
        source::JEPPESEN,
    ],
};

static WEAK: Case = Case {
    name: "",
    when: "on a weak moment",
    settings: &[
        allow(Style::Free, "a common ornament"),
        fault(Style::Species1, "only consonances"),
        weakness(
            Style::Species2,
            "the textbooks differ: Lehmann (lesson II) has it, the Open Music Theory not",
        ),
        allow(Style::Species3, "Fux, Lehmann"),
        fault(Style::Species4, "the off-beat is consonant"),
        allow(Style::Species5, "as in the third species"),
    ],
};

static ACCENTED: Case = Case {
    name: "accented",
    when: "on a moment no weaker than its neighbours",
    settings: &[
        allow(Style::Free, "a common ornament"),
        weakness(
            Style::Motet,
            "the strong minim is for suspensions (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "the first half is consonant"),
        fault(Style::Species3, "the first quarter is consonant"),
        fault(Style::Species4, "only suspensions"),
        fault(Style::Species5, "the first beat is consonant unless tied"),
    ],
};

static QUICK: Case = Case {
    name: "quick",
    when: "in notes shorter than a quarter, outside the species",
    settings: &[
        allow(Style::Free, "a common ornament"),
        allow(Style::Motet, "eighths in pairs (Jeppesen, from memory)"),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Neighbour { accented, .. }) = discord.figure() else {
        return;
    };
    let strict = found.style_of(&[discord.dissonant().0]).is_species();
    let case = if accented && !strict && discord.is_shorter_than_quarter() {
        &QUICK
    } else if accented {
        &ACCENTED
    } else {
        &WEAK
    };
    // One that is too long is told as that, which weighs more.
    if found.is_told_of_dissonance("long-dissonance", discord) {
        return;
    }
    found.dissonance(case, discord, || {
        format!(
            "Neighbour note: {}. Go on by step, or make it consonant.",
            discord.words()
        )
    });
}
