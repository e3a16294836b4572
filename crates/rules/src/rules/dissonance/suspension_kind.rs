//! A suspension whose numbers the style avoids.
//!
//! Why: a suspension lives by the sweetness of its resolution: to a third or a sixth it is full, to an octave
//! or a fifth it is thin, and to a unison it is hardly heard.
//!
//! # Fails
//!
//! Into a unison:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ E4 | - D4 |
//! C | C4 - | D4 - |
//! //         ^ suspension kind (weakness): S and C
//! ```
//!
//! Nine to eight, twice running:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ G4 | - F4 | - E4 |
//! //                ^ suspension kind (weakness): S and C
//! C | E3 - | F3 - | E3 - |
//! ```
//!
//! Seven to eight, under the cantus:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice C cantus
//! voice B
//!
//! C | F4 - | C4 - |
//! B | _ D3 | - C3 |
//! //         ^ suspension kind: C and B
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
//! S | _ D5 | - C#5 | D5 - |
//! C | D4 - | E4 -  | D4 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | E4 - | - D4 |
//! T | C4 - | D4 - |
//! ```
//!
//! # What to do
//!
//! Choose a suspension that goes to a third or a sixth: 7-6 or 4-3 above, 2-3 below.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&UNISON, &TWICE, &SEVENTH_BELOW, &COMPANY],
    numbers: &[],
    sources: &[
        source::FUX_FIGURES.at("of 166 suspensions 2-1 two, 4-5 five, 7-8 none"),
        source::OPEN_MUSIC_THEORY.at("fourth species"),
        source::LEHMANN.at("lesson VI"),
    ],
};

static UNISON: Case = Case {
    name: "",
    when: "a second that becomes a unison (2-1)",
    settings: &[
        allow(Style::Free, "rare, and nobody's fault"),
        weakness(Style::Species1, "poor: twice in the 166 suspensions of Fux"),
    ],
};

static TWICE: Case = Case {
    name: "twice",
    when: "9-8, or 4-5 below, twice running",
    settings: &[
        allow(Style::Free, "chains of them are known"),
        weakness(
            Style::Species1,
            "fair once, not twice: octaves or fifths on each resolution (Open Music Theory)",
        ),
    ],
};

static SEVENTH_BELOW: Case = Case {
    name: "seventh-below",
    when: "the lowest voice is held under a seventh that becomes an octave (7-8)",
    settings: &[
        allow(Style::Free, "rare, and nobody's fault"),
        fault(
            Style::Species1,
            "to be avoided: never in the figures of Fux",
        ),
    ],
};

static COMPANY: Case = Case {
    name: "company",
    when: "in three parts and more, 7-6 and 9-8 without a third, 4-3 without a fifth or an octave",
    settings: &[
        allow(Style::Free, "the harmony says what is wanted"),
        weakness(
            Style::Species1,
            "as in the three- and four-part figures of Fux",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(numbers) = discord.numbers() else {
        return;
    };
    let lonely = match numbers {
        Numbers::SevenSix | Numbers::NineEight => !discord.has_over_bass(&[3]),
        Numbers::FourThree => !discord.has_over_bass(&[5, 1]),
        _ => false,
    };
    let twice = matches!(numbers, Numbers::NineEight | Numbers::FourFive) && discord.running() == 2;
    let (case, advice) = match numbers {
        Numbers::TwoOne => (&UNISON, "Let it go to a third or a sixth"),
        Numbers::SevenEight => (&SEVENTH_BELOW, "Suspend the other voice instead"),
        _ if twice => (&TWICE, "Do not use it twice running"),
        _ if lonely && discord.parts() >= 3 => match numbers {
            Numbers::FourThree => (&COMPANY, "Give the fifth or the octave to another voice"),
            _ => (&COMPANY, "Give the third to another voice"),
        },
        _ => return,
    };
    found.dissonance(case, discord, || {
        format!(
            "Suspension {}: {}. {advice}.",
            numbers.text(),
            discord.words()
        )
    });
}
