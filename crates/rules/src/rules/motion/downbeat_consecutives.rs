//! Two voices reach the same perfect interval on successive downbeats.
//!
//! Why: the ear goes from one strong beat to the next; the note between hides the consecutives no
//! better than an ornament would.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 F4 | B4 G4 |
//! //          ^^ downbeat consecutives: S and C
//! C | D4 -  | E4 -  |
//! ```
//!
//! A leap of a fourth or more between the two makes it a weakness:
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 D5 | B4 G4 |
//! //          ^^ downbeat consecutives (weakness): S and C
//! C | D4 -  | E4 -  |
//! ```
//!
//! So it is in the third species:
//!
//! ```voices
//! style species-3
//! voice S
//! voice C cantus
//!
//! S | D5 C5 B4 D5 | E5 D5 C5 B4 |
//! //                ^^ downbeat consecutives (weakness): S and C
//! C | D4 -  -  -  | E4 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 F4 | G4 C5 |
//! C | D4 -  | E4 -  |
//! ```
//!
//! # Does not apply
//!
//! Outside the second and third species:
//!
//! ```voices
//! style chorale
//! metre 2/2
//!
//! S | A4 C5 | B4 - |
//! B | D4 -  | E4 - |
//! ```
//!
//! # What to do
//!
//! Let one voice reach a third or a sixth on the second downbeat, or come to it from the other
//! side.
//!
//! Lehmann and Grove forbid it whatever stands between; Fux lets a leap of a fourth excuse it
//! (`leap`); the Open Music Theory allows two bars in the third species, but not three.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &LEAP],
    numbers: &[],
    sources: &[
        source::FUX
            .at("Book II, second species")
            .looser("a leap of a fourth or more between the two excuses it, a third does not"),
        source::GROVE.at("Strict Counterpoint, second and third orders"),
        source::LEHMANN.at("lessons II and IV"),
        source::OPEN_MUSIC_THEORY.looser("in the third species two bars, but not three"),
        source::FUX_FIGURES.at("three in the second species, each after a fourth"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "both voices struck on both downbeats and moved the same way, with no leap of a fourth between",
    settings: &[
        allow(Style::Free, "a note between is enough"),
        allow(Style::Species1, "nothing stands between two downbeats"),
        fault(
            Style::Species2,
            "a third between does not save the fifths (Fux)",
        ),
        weakness(
            Style::Species3,
            "Fux has octaves twice (Figs. 55, 57); the Open Music Theory allows two bars",
        ),
        allow(Style::Species4, "ties change the downbeats"),
        allow(Style::Species5, "judged from beat to beat"),
    ],
};

static LEAP: Case = Case {
    name: "leap",
    when: "the same, with a leap of a fourth or more between",
    settings: &[
        allow(Style::Free, "a note between is enough"),
        weakness(
            Style::Species2,
            "Fux lets it pass (three figures); Lehmann and Grove do not",
        ),
        weakness(Style::Species3, "as without the leap"),
        allow(Style::Species4, "ties change the downbeats"),
        allow(Style::Species5, "judged from beat to beat"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if !step.both_strike() || step.sounding.family_of(step.pair).is_none() {
        return;
    }
    let Some(bar) = step.from_downbeat() else {
        return;
    };
    if bar.same_perfect().is_none() || !bar.has_notes_between() {
        return;
    }
    let case = if bar.leaps_between() {
        &LEAP
    } else {
        &ORDINARY
    };
    found.succession(case, &bar, || {
        let noun = bar.noun();
        format!(
            "Consecutive {noun} from downbeat to downbeat: {}. Let one of them reach a third or a sixth.",
            bar.story()
        )
    });
}
